package ui

import (
	"fmt"
	"strings"
	"unicode"
	"unicode/utf8"

	"emendary/internal/docket"
	"emendary/internal/ledger"
	"emendary/ui/text"
)

// visible returns s fit for the screen.
func (m *Model) visible(s string) string { return text.Visible(s, m.sheet.Signs.ASCII) }

// count returns n with its noun: "1 citation", "3 citations", "2 entries".
func count(n int, noun string) string { return fmt.Sprintf("%d %s", n, plural(n, noun)) }

// plural returns the form of noun that goes with n.
func plural(n int, noun string) string {
	switch {
	case n == 1:
		return noun
	case strings.HasSuffix(noun, "y") && !strings.HasSuffix(noun, "ey"):
		return strings.TrimSuffix(noun, "y") + "ies"
	}
	return noun + "s"
}

// capital reports whether s starts with a capital.
func capital(s string) bool {
	r, _ := utf8.DecodeRuneInString(s)
	return unicode.IsUpper(r)
}

// summary says what a ruling did: "accepted harbour for harber".
func (m *Model) summary(r ledger.Ruling) string {
	form := m.named(r.Form)
	var s string
	switch r.Act {
	case ledger.Accept:
		s = "accepted " + m.visible(r.Word) + " for " + form
	case ledger.Reject:
		s = m.standsAs(r)
	case ledger.Add:
		s = "added " + form + " to the " + m.visible(r.List) + " list"
		if r.Kind != "" {
			s += " as " + m.visible(r.Kind)
		}
	case ledger.Query:
		return "query to " + m.visible(r.To) + " on " + form
	case ledger.Later:
		return form + " put off"
	case ledger.Unfold:
		s = form + " unfolded"
	default:
		return string(r.Act) + " " + form
	}
	if r.Query != "" {
		s += ", with a query to " + m.visible(r.To)
	}
	return s
}

// told is the message after rulings: what the first did and to how many
// citations, what went with it, and how many of them were never on screen.
func (m *Model) told(rulings []ledger.Ruling) string {
	unseen := 0
	for _, r := range rulings {
		for _, o := range r.Occurrences {
			if !o.Seen {
				unseen++
			}
		}
	}
	s := m.summary(rulings[0]) + ", " + count(len(rulings[0].Occurrences), "citation")
	if n := len(rulings) - 1; n > 0 {
		var forms []string
		for _, r := range rulings[1:] {
			forms = append(forms, fmt.Sprintf("%s (%d)", m.named(r.Form), len(r.Occurrences)))
		}
		s += "; with it " + strings.Join(forms, ", ")
	}
	if unseen > 0 {
		s += fmt.Sprintf(" (%d never on screen)", unseen)
	}
	return s
}

// sayResult says what accept makes of the citation under the cursor, where that is
// not the candidate letter for letter.
func (m *Model) sayResult() {
	row, ok := m.alignment.Selected()
	if !ok {
		return
	}
	if result := m.docket.Result(m.entry, m.concordance.Cursor(), row.Text); result != row.Text {
		m.say("accept makes it " + m.visible(result) + " here")
	}
}

// ruled says in a word or two what is in force on an occurrence.
func (m *Model) ruled(r ledger.Ruling) string {
	switch r.Act {
	case ledger.Accept:
		return m.sheet.Signs.Arrow + " " + m.visible(r.Word)
	case ledger.Reject:
		return "stands"
	case ledger.Add:
		return "added"
	case ledger.Query:
		return "query"
	case ledger.Later:
		return "later"
	case ledger.Unfold:
		return "unfolded"
	}
	return string(r.Act)
}

// state says of an entry in the finder whether it is open or what was ruled.
func (m *Model) state(e *docket.Entry) string {
	rulings := e.Rulings()
	switch {
	case e.PutOff():
		return "later"
	case len(rulings) == 0:
		return "open"
	}
	s := m.ruled(rulings[len(rulings)-1])
	if e.Open() {
		s += ", open"
	}
	return s
}

// welcome is the first message: what was done before, and what of it is lost.
func (m *Model) welcome(last *ledger.Ruling) string {
	var s []string
	if n := len(m.docket.Unplaced); n > 0 {
		s = append(s, fmt.Sprintf("%s of earlier rulings not in the manuscript as it is now (first: %s)",
			count(n, "place"), m.named(m.docket.Unplaced[0].Ruling.Form)))
	}
	if last != nil {
		s = append(s, "resumed: "+count(m.docket.Tally().Ruled, "entry")+" ruled, the latest: "+m.summary(*last))
	} else if len(m.session.Attested) > 0 {
		english := "English: " + m.session.Variety.String()
		if !m.session.Chosen {
			english += ", as the manuscript has it"
		}
		s = append(s, english)
	}
	return strings.Join(s, "; ")
}

// facts are what there is to say about the entry: what is the matter, what was
// ruled, how likely it is a slip, where it stands, what is near it.
func (m *Model) facts(e *docket.Entry) (say []string, strip string) {
	say = []string{string(e.Kind)}
	if e.Why != "" {
		say[0] += ": " + m.visible(e.Why)
	}
	if rulings := e.Rulings(); len(rulings) > 0 {
		say = append(say, m.summary(rulings[len(rulings)-1]))
	}
	stands := "once"
	if n := len(e.Occurrences); n != 1 {
		stands = count(n, "time")
	}
	f := m.work(e).facts
	if f == nil {
		say = append(say, stands)
		return say, ""
	}
	if e.Kind != docket.WordInContext && e.Kind != docket.Passage {
		say = append(say, "slip "+text.Percent(f.slip))
	}
	if chapters := f.parts[min(m.firstChapter(), len(f.parts)):]; len(chapters) > 1 {
		in := 0
		for _, n := range chapters {
			if n > 0 {
				in++
			}
		}
		if len(e.Occurrences) != 1 {
			stands += fmt.Sprintf(" in %d of %s", in, count(len(chapters), "chapter"))
		}
		strip = m.strip(chapters, max(8, m.frame().left/4))
	}
	say = append(say, stands)
	if len(f.near) > 0 {
		var near []string
		for _, n := range f.near[:min(len(f.near), 6)] {
			near = append(near, fmt.Sprintf("%s %s%d", m.visible(n.Form), m.sheet.Signs.Times, n.Count))
		}
		say = append(say, "near: "+strings.Join(near, ", "))
	}
	return say, strip
}

// factsLines lays the facts out on as many lines as the frame has, whole ones as far
// as they fit; the strip stands at the end of the first.
func (m *Model) factsLines(f frame) []string {
	s := m.sheet.Signs
	say, strip := m.facts(m.entry)
	lines := make([]string, f.facts)
	room := f.left - text.Width(strip) - 5
	at := 0
	for i, fact := range say {
		joined := fact
		if lines[at] != "" {
			joined = lines[at] + " " + s.Dot + " " + fact
		}
		if i > 0 && text.Width(joined) > room && at+1 < len(lines) {
			at, joined, room = at+1, fact, f.left-3
		}
		lines[at] = joined
	}
	for i, l := range lines {
		room = f.left - 3
		end := ""
		if i == 0 {
			room, end = f.left-text.Width(strip)-5, strip
		}
		lines[i] = text.Ends(" "+m.sheet.Quiet.Render(text.Cut(l, room, s.Ellipsis)), m.sheet.Quiet.Render(end)+" ", f.left, "")
	}
	return lines
}

// firstChapter returns the index of the first part that counts as a chapter: what
// stands before the first heading does not, nor does the title by itself.
func (m *Model) firstChapter() int {
	parts := m.docket.Document.Parts
	if len(parts) > 1 && (parts[0].Title == "" || parts[1].First-parts[0].First == 1) {
		return 1
	}
	return 0
}

// strip draws how often the form stands in each part, the highest bar the most,
// in at most width columns; where there are more parts, neighbours share one.
func (m *Model) strip(parts []int, width int) string {
	bars := parts
	if len(parts) > width {
		bars = make([]int, width)
		for i, n := range parts {
			bars[i*width/len(parts)] += n
		}
	}
	most := 1
	for _, n := range bars {
		most = max(most, n)
	}
	signs := m.sheet.Signs.Strip
	var b strings.Builder
	for _, n := range bars {
		level := 0
		if n > 0 {
			level = 1 + (n*(len(signs)-1)-1)/most
		}
		b.WriteString(signs[min(level, len(signs)-1)])
	}
	return b.String()
}
