package ui

import (
	"strings"

	"github.com/charmbracelet/bubbles/help"

	"emendary/ui/finder"
	"emendary/ui/line"
	"emendary/ui/style"
	"emendary/ui/text"
)

// openHelp shows the help page.
func (m *Model) openHelp() {
	m.behind = m.screen
	m.open(onHelp)
	m.page.Show(m.helpLines(), 0)
}

// helpSection is the keys of one part under a heading.
type helpSection struct {
	name string
	keys help.KeyMap
}

// helpSections composes the help of all parts, in the order of use.
func (m Model) helpSections() []helpSection {
	return []helpSection{
		{"on the bench", m.Keys},
		{"in the alignment", m.alignment.Keys},
		{"in the concordance", m.concordance.Keys},
		{"in the related forms", m.related.Keys},
		{"in the strip of actions", m.Strip},
		{"a correction of your own", line.CorrectionKeys()},
		{"adding to a list", line.AdditionKeys()},
		{"a query", line.QueryKeys()},
		{"the language of a passage", line.LanguageKeys()},
		{"finding a form", finder.Keys()},
		{"a page", m.page.Keys},
		{"when a ruling could not be written", m.Failure},
	}
}

// explained is what an editor has to know before the keys.
var explained = []string{
	"A ruling applies to the checked citations. It is on disk before the screen moves on, and any ruling " +
		"can be undone: nothing is unsaved when you leave, and the manuscript itself is never changed.",
	"Accept emends to the candidate under the cursor. Let stand leaves the form as it is. Add puts it on a " +
		"list of known words. Query asks the author, the publisher or yourself. Later puts the entry off.",
	"A passage is a run of words in another language or in dialect: let stand takes it as a whole, in the " +
		"language you name; unfold puts its words on the docket one by one.",
	"Quotations start unchecked, and so does speech where the form also stands in narration: accept leaves " +
		"them alone; let stand and add take them in, unless you have changed a check.",
}

// helpLines is the help page: the keys of every part, what is typed in a line,
// and the marks.
func (m Model) helpLines() []string {
	s := m.sheet.Signs
	var lines []string
	for i, paragraph := range explained {
		if i > 0 {
			lines = append(lines, "")
		}
		for _, l := range text.Wrap(paragraph, min(m.width-2, 80), [2]int{}) {
			lines = append(lines, " "+paragraph[l.Start:l.End])
		}
	}
	head := func(name string) { lines = append(lines, "", " "+m.sheet.Title.Render(name)) }
	row := func(name, desc string) {
		lines = append(lines, text.Cut("   "+text.Pad(m.sheet.Key.Render(m.keyName(name)), 16)+desc, m.width, s.Ellipsis))
	}
	for _, section := range m.helpSections() {
		head(section.name)
		for _, group := range section.keys.FullHelp() {
			for _, b := range group {
				row(b.Help().Key, b.Help().Desc)
			}
		}
	}
	head("editing within a line")
	for _, b := range line.FieldKeys().FullHelp()[0] {
		row(b.Help().Key, b.Help().Desc)
	}
	convention := m.opt.Marks
	if convention == "" {
		convention = style.British
	}
	head("marks (" + string(convention) + " convention)")
	for _, r := range [][2]string{
		{s.Agrees, "the candidate's letter is the form's"},
		{s.Caret, "insert, at this place, what stands below"},
		{"o" + s.Slash, "put o in place of the letter above"},
		{s.Dele, "delete the letter above"},
		{"tr " + s.Transpose, "transpose the two letters above"},
		{s.Space, "a space"},
		{s.CloseUp, "close up"},
		{s.Stet + s.Stet + s.Stet, "stet: the form above stands"},
		{s.Capital + " " + s.Lower, "capital, lower case"},
	} {
		row(r[0], r[1])
	}
	head("figures")
	row("cost", "what the edits cost; under unit costs each is 1")
	row("share", "probability among the candidates of the form")
	row("slip", "probability that the form is a slip, not a word of this book")
	row(s.Strip[0]+s.Strip[len(s.Strip)/2]+s.Strip[len(s.Strip)-1], "how often the form stands in each part")
	if m.opt.Version != "" {
		lines = append(lines, "", " "+m.sheet.Quiet.Render(m.opt.program()+" "+m.visible(m.opt.Version)))
	}
	return lines
}

// keyName returns the name of a key as help texts have it, with arrows named in
// words where the screen is ASCII.
func (m Model) keyName(name string) string {
	s := m.sheet.Signs
	return strings.NewReplacer("↑", s.Up, "↓", s.Down, "←", s.Left, "→", s.Right).Replace(name)
}
