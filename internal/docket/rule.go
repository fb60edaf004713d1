package docket

import (
	"cmp"
	"fmt"
	"slices"
	"strings"

	"emendary/internal/ledger"
	"emendary/internal/manuscript"
)

// Dispute is a line that was not taken, and why.
type Dispute struct {
	Line   Line
	Reason string // "ruled reject by anna on 2026-12-01", "line 12 rules it otherwise", "not in the manuscript"
}

// RulingsFrom turns lines into rulings on the docket. A line for places outranks
// one for a form with just those capitals, which outranks one whose capitals
// differ. A line that a ruling in force or another line contradicts becomes a
// dispute, and neither is overridden; one that is in force already gives nothing.
func (d *Docket) RulingsFrom(lines []Line) ([]ledger.Ruling, []Dispute) {
	m := &matching{d: d, exact: map[string]*Line{}, folded: map[string][]*Line{}, claims: map[*Entry][]*Line{}}
	for i := range lines {
		l := d.withoutEnding(lines[i])
		m.sort(&l)
	}
	for _, l := range m.placed {
		m.claimPlaces(l)
	}
	for _, l := range m.order {
		m.claimForm(l)
	}
	out := m.rulings()
	for _, l := range m.queries {
		out = append(out, m.ask(l)...)
	}
	return out, m.disputes
}

// matching finds for each occurrence the line that rules it.
type matching struct {
	d        *Docket
	placed   []*Line            // scope checked
	order    []*Line            // scope every, in order
	queries  []*Line            // queries alone: they contradict nothing
	exact    map[string]*Line   // by form
	folded   map[string][]*Line // by key
	claims   map[*Entry][]*Line // the line for each occurrence, nil for none
	entries  []*Entry           // those with claims, in order
	disputes []Dispute
}

// withoutEnding takes a possessive off the form and the word of a line, where the
// manuscript has the form only without: entries fold over endings.
func (d *Docket) withoutEnding(l Line) Line {
	base, ending := manuscript.Base(l.Form)
	if ending == "" || d.use[Key(l.Form)] > 0 || d.use[Key(base)] == 0 {
		return l
	}
	l.Form, l.Word = base, strings.TrimSuffix(plainApostrophe(l.Word), ending)
	return l
}

func (m *matching) dispute(l *Line, format string, args ...any) {
	m.disputes = append(m.disputes, Dispute{*l, fmt.Sprintf(format, args...)})
}

func (m *matching) sort(l *Line) {
	if l.Act == ledger.Query {
		m.queries = append(m.queries, l)
		return
	}
	if l.Scope == ledger.Checked {
		m.placed = append(m.placed, l)
		return
	}
	if first := m.exact[l.Form]; first != nil {
		if !alike(first, l) {
			m.dispute(l, "line %d rules it otherwise", first.Number)
		}
		return
	}
	m.exact[l.Form] = l
	m.folded[Key(l.Form)] = append(m.folded[Key(l.Form)], l)
	m.order = append(m.order, l)
}

// alike reports whether two lines say the same.
func alike(a, b *Line) bool {
	return a.Act == b.Act && a.Word == b.Word && a.List == b.List && a.Query == b.Query
}

func (m *matching) claim(e *Entry) []*Line {
	if m.claims[e] == nil {
		m.claims[e] = make([]*Line, len(e.Occurrences))
		m.entries = append(m.entries, e)
	}
	return m.claims[e]
}

func (m *matching) claimPlaces(l *Line) {
	entries := m.entriesOf(l)
	if len(entries) == 0 {
		m.dispute(l, "not in the manuscript")
		return
	}
	wanted := slices.Clone(l.Places)
	for _, e := range entries {
		if why := m.d.unfit(e, l.Act); why != "" {
			m.dispute(l, "%s", why)
			continue
		}
		claims := m.claim(e)
		for i := range e.Occurrences {
			at := slices.Index(wanted, m.d.at(e, i))
			if at < 0 {
				continue
			}
			if other := claims[i]; other != nil && !alike(other, l) {
				m.dispute(l, "line %d rules %s otherwise", other.Number, wanted[at])
			} else {
				claims[i] = l
			}
			wanted = slices.Delete(wanted, at, at+1)
		}
	}
	for _, place := range wanted {
		m.dispute(l, "no %s at %s", l.Form, place)
	}
}

// entriesOf returns the entries whose form a line may be on.
func (m *matching) entriesOf(l *Line) []*Entry {
	if es := m.d.byKey[Key(l.Form)]; len(es) > 0 {
		return slices.Clone(es)
	}
	if e := m.d.Find(l.Form); e != nil {
		return []*Entry{e}
	}
	return nil
}

func (m *matching) claimForm(l *Line) {
	entries := m.entriesOf(l)
	if len(entries) == 0 {
		m.dispute(l, "not in the manuscript")
		return
	}
	for _, e := range entries {
		if why := m.d.unfit(e, l.Act); why != "" {
			m.dispute(l, "%s", why)
			continue
		}
		claims := m.claim(e)
		for i := range claims {
			if claims[i] == nil && m.best(e, e.Occurrences[i]) == l {
				claims[i] = l
			}
		}
	}
}

// best returns the line for an occurrence among those of scope every: with its
// very capitals, else with those of its entry, else the first.
func (m *matching) best(e *Entry, o Occurrence) *Line {
	if l := m.exact[plainApostrophe(o.Text)]; l != nil {
		return l
	}
	if l := m.exact[e.Form]; l != nil {
		return l
	}
	return m.folded[Key(e.Form)][0]
}

// unfit says why an act is not for e; "" where it is.
func (d *Docket) unfit(e *Entry, act ledger.Act) string {
	switch passage := e.Kind == Passage; {
	case passage && (act == ledger.Accept || act == ledger.Add):
		return "a passage; reject lets it stand, unfold puts its words on the docket"
	case !passage && act == ledger.Unfold:
		return "no passage; only a passage can be unfolded"
	}
	return ""
}

// rulings makes one ruling of each line on each entry, for the occurrences that
// are not ruled on yet.
func (m *matching) rulings() []ledger.Ruling {
	var out []ledger.Ruling
	for _, e := range m.entries {
		claims := m.claims[e]
		var lines []*Line
		for _, l := range claims {
			if l != nil && !slices.Contains(lines, l) {
				lines = append(lines, l)
			}
		}
		// A ruling on places overrides one on every place, so it has to come later.
		slices.SortStableFunc(lines, func(a, b *Line) int { return cmp.Compare(b.Scope, a.Scope) })
		for _, l := range lines {
			if r, ok := m.ruling(e, l, claims); ok {
				out = append(out, r)
			}
		}
	}
	return out
}

func (m *matching) ruling(e *Entry, l *Line, claims []*Line) (ledger.Ruling, bool) {
	word := l.Word
	if l.Act == ledger.Accept {
		lex := m.d.Lexicon()
		word = carry(l.Form, e.Form, l.Word, func(s string) bool { return known(lex, s) })
	}
	checked := make([]bool, len(claims))
	any := false
	for i, claim := range claims {
		overridden := l.Scope == ledger.Every && claim != nil && claim.Scope == ledger.Checked
		if claim != l && !overridden {
			continue
		}
		old := e.Occurrences[i].Ruling
		switch {
		case old == nil:
			checked[i], any = true, any || claim == l
		case overridden:
		case old.Act != l.Act || old.Word != word:
			m.dispute(l, "ruled %s by %s on %s", saying(old), old.Who, old.When.Format("2006-01-02"))
			return ledger.Ruling{}, false
		}
	}
	if !any || l.Act == ledger.Later && e.PutOff() {
		return ledger.Ruling{}, false
	}
	r := m.d.fill(l, m.d.ruling(e, l.Act, checked, nil))
	r.Word = word
	return r, true
}

// ask makes the rulings of a query alone: on the entries with its very form, else
// on all whose form differs in capitals only.
func (m *matching) ask(l *Line) []ledger.Ruling {
	entries := m.entriesOf(l)
	if len(entries) == 0 {
		m.dispute(l, "not in the manuscript")
	}
	if e := m.d.byForm[l.Form]; e != nil {
		entries = []*Entry{e}
	}
	var out []ledger.Ruling
	wanted := slices.Clone(l.Places)
	for _, e := range entries {
		checked := make([]bool, len(e.Occurrences))
		for i := range checked {
			at := slices.Index(wanted, m.d.at(e, i))
			checked[i] = l.Scope == ledger.Every || at >= 0
			if at >= 0 {
				wanted = slices.Delete(wanted, at, at+1)
			}
		}
		asked := slices.ContainsFunc(e.rulings, func(r *ledger.Ruling) bool { return r.Query == l.Query && r.To == l.To })
		if !asked && slices.Contains(checked, true) {
			out = append(out, m.d.fill(l, m.d.ruling(e, l.Act, checked, nil)))
		}
	}
	for _, place := range wanted {
		m.dispute(l, "no %s at %s", l.Form, place)
	}
	return out
}

// fill gives a ruling what its line says of it.
func (d *Docket) fill(l *Line, r ledger.Ruling) ledger.Ruling {
	r.List, r.Kind, r.Note, r.Query, r.To = l.List, l.Kind, l.Note, l.Query, l.To
	if r.Act == ledger.Add && r.List == "" {
		r.List = "book"
	}
	if l.Who != "" {
		r.Who = l.Who
	}
	if !l.When.IsZero() {
		r.When = l.When
	}
	return r
}

// saying is a ruling in a word or two.
func saying(r *ledger.Ruling) string {
	if r.Act == ledger.Accept {
		return "accept " + r.Word
	}
	return string(r.Act)
}
