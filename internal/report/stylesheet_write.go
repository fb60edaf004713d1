package report

import (
	"bytes"
	"fmt"
	"strings"

	"golang.org/x/text/unicode/norm"

	"emendary/lexicon"
)

func (s *styleSheet) markdown(p *page) {
	p.title("Style sheet", s.manuscript)
	p.heading("General")
	for _, g := range s.general {
		p.item(escape(g[0]) + ": " + escape(g[1]))
	}
	group := ""
	for i, it := range s.items {
		if g := groupOf(it.word); i == 0 || g != group {
			group = g
			p.heading(group)
		}
		p.item(it.line())
	}
}

// line is the item in Markdown, its apostrophes as the manuscript sets them:
// Thessaly (not Thessally) · the clerk · 4 times, first in part 2, 7:12.
func (it *item) line() string {
	word := it.word
	if it.curly {
		word = strings.ReplaceAll(word, "'", "’")
	}
	word = strong(word)
	if len(it.not) > 0 {
		word += " (not " + escape(strings.Join(it.not, ", ")) + ")"
	}
	return join(" · ", join(", ", word, escape(it.kind())), escape(strings.Join(it.notes, "; ")), it.standing())
}

func (it *item) kind() string {
	stand := ""
	if it.stand {
		stand = "let stand"
	}
	return join(", ", strings.Join(it.kinds, ", "), stand)
}

func (it *item) standing() string {
	if it.count == 0 {
		return "not in the manuscript as it is now"
	}
	return fmt.Sprintf("%s, first at %s in %s", number(it.count, "time"), it.first, escape(partName(it.first.part, it.first.title)))
}

// tsv writes the style sheet as a list that lexicon.Load reads as a series list.
// Its words are those that adds put on a list. It bars the forms not used where
// the lexicon knows them, another variety's and barred words. All else is comment:
// forms let stand, which stand in this manuscript (an old spelling in a letter
// would be a slip in the next), and words that no list can hold or that a
// spreadsheet would compute.
func (s *styleSheet) tsv(t *table) {
	comment := func(text string) { fmt.Fprintf(t, "# %s\n", oneLine(text)) }
	comment("Style sheet: " + s.manuscript)
	for _, g := range s.general {
		comment(g[0] + ": " + g[1])
	}
	comment("word, kind, note")
	known := map[string]bool{}
	for _, it := range s.items {
		known[it.word] = it.known
	}
	barred := map[string]bool{}
	for _, it := range s.items {
		kind, note := strings.ReplaceAll(it.kind(), "#", " "), strings.Join(it.notes, "; ")
		if line := listLine(it.word, kind, note); !it.known || !loads(line, it.word) {
			comment(join(" · ", it.plain(), note))
		} else {
			t.WriteString(line)
		}
		for _, form := range it.not {
			bar := oneLine(form) + " → " + oneLine(it.word) + "\n"
			if it.bars[form] && !known[form] && !barred[form] && loads(bar, form) {
				barred[form] = true
				t.WriteString(bar)
			}
		}
	}
}

// plain is the item's head without marks.
func (it *item) plain() string {
	head := it.word
	if len(it.not) > 0 {
		head += " (not " + strings.Join(it.not, ", ") + ")"
	}
	return join(", ", head, it.kind())
}

func listLine(word, kind, note string) string {
	line := oneLine(word)
	if kind, note = cell(kind), cell(note); kind != "" || note != "" {
		line += "\t" + kind
		if note != "" {
			line += "\t" + note
		}
	}
	return line + "\n"
}

// loads reports whether line puts word, and nothing else, on a list, and begins
// no formula.
func loads(line, word string) bool {
	if formula(line) {
		return false
	}
	list, err := lexicon.Load(bytes.NewBufferString(line), "style sheet")
	if err != nil || list.Len() != 1 {
		return false
	}
	for w := range list.Words() {
		if w.Text != norm.NFC.String(word) {
			return false
		}
	}
	return true
}

func (s *styleSheet) jsonl(l *lines) {
	for _, g := range s.general {
		l.add(struct {
			Section string `json:"section"`
			Name    string `json:"name"`
			Value   string `json:"value"`
		}{"general", g[0], g[1]})
	}
	for _, it := range s.items {
		l.add(struct {
			Section string   `json:"section"`
			Group   string   `json:"group"`
			Word    string   `json:"word"`
			Not     []string `json:"not,omitempty"`
			Lists   []string `json:"lists,omitempty"`
			Kinds   []string `json:"kinds,omitempty"`
			Stand   bool     `json:"stand"`
			Notes   []string `json:"notes,omitempty"`
			Count   int      `json:"count"`
			Part    int      `json:"part,omitempty"`
			Line    int      `json:"line,omitempty"`
			Column  int      `json:"column,omitempty"`
		}{"words", groupOf(it.word), it.word, it.not, it.lists, it.kinds, it.stand, it.notes,
			it.count, it.first.part, it.first.line, it.first.column})
	}
}
