package report

import (
	"cmp"
	"fmt"
	"slices"
	"strings"
	"unicode/utf8"

	"emendary/internal/docket"
	"emendary/internal/ledger"
)

// place is where something stands in the manuscript, with its citation.
type place struct {
	part         int // number of the part, from 1; 0 where the manuscript has it no more
	title        string
	line, column int
	before, form string
	after        string
	setting      string

	entry      *docket.Entry // nil where the manuscript has the place no more
	occurrence int
}

func (p place) String() string { return fmt.Sprintf("%d:%d", p.line, p.column) }

// quote is the place's citation in Markdown, the form marked, with some forty
// letters on either side, cut between words.
func (p place) quote() string {
	before, after := strings.Fields(p.before), strings.Fields(p.after)
	start, n := len(before), 0
	for start > 0 && n < 40 {
		start--
		n += len([]rune(before[start])) + 1
	}
	end := 0
	for n = 0; end < len(after) && n < 40; end++ {
		n += len([]rune(after[end])) + 1
	}
	left, right := strings.Join(before[start:], " "), strings.Join(after[:end], " ")
	if start > 0 {
		left = "… " + left
	}
	if end < len(after) {
		right += " …"
	}
	if left != "" && endsInSpace(p.before) {
		left += " "
	}
	if right != "" && strings.HasPrefix(p.after, " ") {
		right = " " + right
	}
	return keepSpace(left) + strong(p.form) + keepSpace(right)
}

func endsInSpace(s string) bool { return strings.HasSuffix(s, " ") }

// keepSpace escapes s with the space at its ends, which escape would take off.
func keepSpace(s string) string {
	text := escape(s)
	if text == "" {
		return ""
	}
	if strings.HasPrefix(s, " ") {
		text = " " + text
	}
	if endsInSpace(s) {
		text += " "
	}
	return text
}

func placeOf(s *docket.Session, e *docket.Entry, i int) place {
	c := s.Docket.Citation(e, i)
	return place{
		part: c.Part + 1, title: s.Docket.Document.Parts[c.Part].Title, line: c.Line, column: c.Column,
		before: near(c.Before, true), form: c.Form, after: near(c.After, false), setting: string(c.Setting), entry: e, occurrence: i,
	}
}

// nearby is how many bytes beside a place are kept: more than any report shows.
const nearby = 1 << 10

// near is a copy of the end or the start of text: a paragraph may be the whole
// manuscript, and a place must not hold on to it.
func near(text string, end bool) string {
	if len(text) <= nearby {
		return text
	}
	cut := nearby
	if end {
		cut = len(text) - nearby
	}
	for cut < len(text) && !utf8.RuneStart(text[cut]) {
		cut++
	}
	if end {
		return strings.Clone(text[cut:])
	}
	return strings.Clone(text[:cut])
}

// byPlace orders places as they stand in the manuscript.
func byPlace(a, b place) int {
	return cmp.Or(cmp.Compare(a.line, b.line), cmp.Compare(a.column, b.column))
}

// ruled returns the places on which each ruling is in force, in order.
func ruled(s *docket.Session) map[ledger.ID][]place {
	out := map[ledger.ID][]place{}
	for _, e := range s.Docket.Entries {
		for i, o := range e.Occurrences {
			if o.Ruling != nil {
				out[o.Ruling.ID] = append(out[o.Ruling.ID], placeOf(s, e, i))
			}
		}
	}
	for _, places := range out {
		slices.SortFunc(places, byPlace)
	}
	return out
}

// recorded returns the places of a ruling as its ledger has them: for one that
// another covers, or that the manuscript as it is now has no place for.
func recorded(r ledger.Ruling) []place {
	var out []place
	for _, o := range r.Occurrences {
		out = append(out, place{
			part: o.PartIndex, title: o.Part, line: o.Line, column: o.Column,
			before: o.Before, form: o.Text, after: o.After,
		})
	}
	slices.SortFunc(out, byPlace)
	return out
}

// seen reports whether the citation at p was on screen when r was made. Where the
// manuscript has changed since, it counts as seen only if what was beside it then
// is beside it still, as far as its paragraph goes.
func seen(s *docket.Session, r *ledger.Ruling, p place) bool {
	start := s.Docket.Span(p.entry, p.occurrence).Start
	for _, o := range r.Occurrences {
		if !o.Seen {
			continue
		}
		if r.Manuscript == s.Docket.Document.SHA256 {
			if o.Start == start {
				return true
			}
			continue
		}
		before, wasBefore := oneLine(p.before), oneLine(o.Before)
		after, wasAfter := oneLine(p.after), oneLine(o.After)
		alike := (strings.HasSuffix(before, wasBefore) || strings.HasSuffix(wasBefore, before)) &&
			(strings.HasPrefix(after, wasAfter) || strings.HasPrefix(wasAfter, after))
		if alike && min(len(before), len(wasBefore))+min(len(after), len(wasAfter)) >= leastContext {
			return true
		}
	}
	return false
}

// leastContext is how many bytes must stand beside a citation for it to be
// recognised in a manuscript that changed: a line of one word is like any other.
const leastContext = 16
