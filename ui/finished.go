package ui

import (
	"fmt"
	"strings"

	"emendary/internal/docket"
	"emendary/internal/ledger"
	"emendary/ui/line"
	"emendary/ui/text"
)

// finished is the screen where nothing is open: what was done, what is still to
// be asked, and what to run next.
func (m Model) finished() []string {
	if len(m.docket.Entries) == 0 {
		return []string{"", " " + m.sheet.Title.Render("The docket is empty."), "",
			" Every form of the manuscript is known, so there is nothing to rule on.",
			" / finds any form all the same, and lets you rule on it.", ""}
	}
	acts := make(map[ledger.Act]int)
	lists := make(map[string]int)
	asked := make(map[string]int)
	for _, e := range m.docket.Entries {
		for r := range rulingsOn(e) {
			acts[r.Act]++
			if r.Act == ledger.Add {
				lists[r.List]++
			}
		}
		for _, r := range e.Rulings() {
			if r.Query != "" {
				asked[r.To]++
			}
		}
	}
	lines := []string{"", " " + m.sheet.Title.Render("Nothing is open: every entry is ruled on."), ""}
	row := func(n int, what string) {
		if n > 0 {
			lines = append(lines, text.PadLeft(fmt.Sprint(n), 7)+"  "+what)
		}
	}
	forms := func(n int, what string) { row(n, plural(n, "form")+" "+what) }
	forms(acts[ledger.Accept], "accepted, to be emended in the copy")
	forms(acts[ledger.Reject], "let stand")
	for _, list := range []string{"book", "series", "house"} {
		forms(lists[list], "added to the "+list+" list")
	}
	for _, whom := range line.Addressees() {
		row(asked[whom], plural(asked[whom], "query")+" to "+whom)
	}
	name := m.visible(m.docket.Document.Path)
	lines = append(lines, "", " "+m.sheet.Title.Render("Next"), "")
	for _, c := range [][2]string{
		{"apply", "write the emended copy beside the manuscript"},
		{"report style-sheet", "the word list for this book and the next"},
		{"report emendations", "every change with its place"},
		{"report queries", "what to ask, and whom"},
	} {
		command := m.opt.program() + " " + c[0] + " " + quoted(name)
		for _, l := range text.Wrap(command, m.width-4, [2]int{}) {
			lines = append(lines, "   "+m.sheet.Key.Render(command[l.Start:l.End]))
		}
		lines = append(lines, "      "+m.sheet.Quiet.Render(c[1]))
	}
	return lines
}

// rulingsOn returns the rulings that stand on the occurrences of e.
func rulingsOn(e *docket.Entry) map[*ledger.Ruling]bool {
	on := make(map[*ledger.Ruling]bool)
	for _, o := range e.Occurrences {
		if o.Ruling != nil {
			on[o.Ruling] = true
		}
	}
	return on
}

// quoted returns a file's name fit for a shell's command line.
func quoted(name string) string {
	if strings.ContainsFunc(name, func(r rune) bool { return strings.ContainsRune(" '\"\\$`&|;<>()*?[]#~!{}", r) }) {
		return "'" + strings.ReplaceAll(name, "'", `'\''`) + "'"
	}
	return name
}
