package docket

import (
	"cmp"
	"slices"

	"emendary/align"
	"emendary/internal/ledger"
)

// covered returns the occurrences of e that r is on. Scope Every covers all.
// Places of the manuscript as it is are found by their byte; those of an earlier
// state by form and context. What cannot be found goes to Unplaced.
func (d *Docket) covered(e *Entry, r *ledger.Ruling) []int {
	found, lost := d.place(e, r)
	for _, o := range lost {
		d.Unplaced = append(d.Unplaced, Unplaced{*r, o})
	}
	return found
}

// placed is covered for a ruling that has been recorded: it lists nothing.
func (d *Docket) placed(e *Entry, r *ledger.Ruling) []int {
	found, _ := d.place(e, r)
	return found
}

// place finds the occurrences of e that r is on, and tells those it cannot find.
func (d *Docket) place(e *Entry, r *ledger.Ruling) (found []int, lost []ledger.Occurrence) {
	if r.Scope == ledger.Every {
		out := make([]int, len(e.Occurrences))
		for i := range out {
			out[i] = i
		}
		return out, nil
	}
	if r.Manuscript != d.Document.SHA256 {
		return d.again(e, r)
	}
	at := make(map[int]int, len(e.Occurrences))
	for i := range e.Occurrences {
		at[d.span(e.Occurrences[i]).Start] = i
	}
	for _, o := range r.Occurrences {
		if i, ok := at[o.Start]; ok {
			found = append(found, i)
		} else {
			lost = append(lost, o)
		}
	}
	return found, lost
}

// leastContext is how many letters of its context must still stand beside an
// occurrence for a ruling to find it again.
const leastContext = 16

// match is how well an occurrence of the manuscript suits one of a ruling.
type match struct{ old, now, letters int }

// again finds the places of r in a manuscript that changed: the pairs of old and
// present occurrence that share most context are taken first. A place that two
// present ones suit equally well is left, so that no ruling lands by chance.
func (d *Docket) again(e *Entry, r *ledger.Ruling) (found []int, lost []ledger.Occurrence) {
	var matches []match
	for now, o := range e.Occurrences {
		start, end := d.extent(o)
		before, after := d.context(o.Paragraph, start, end)
		for old, was := range r.Occurrences {
			if Key(was.Text) != Key(o.Text) {
				continue
			}
			n := d.shared(was.Before, before, true) + d.shared(was.After, after, false)
			whole := was.Before == before && was.After == after
			if n >= leastContext || whole {
				matches = append(matches, match{old, now, n})
			}
		}
	}
	slices.SortStableFunc(matches, func(a, b match) int { return cmp.Compare(b.letters, a.letters) })
	nowOf := make([]int, len(r.Occurrences))
	for i := range nowOf {
		nowOf[i] = -1
	}
	taken := map[int]bool{}
	for i, m := range matches {
		if nowOf[m.old] >= 0 || taken[m.now] || rivalled(matches, i, taken) {
			continue
		}
		nowOf[m.old], taken[m.now] = m.now, true
	}
	for old, now := range nowOf {
		if now < 0 {
			lost = append(lost, r.Occurrences[old])
			continue
		}
		found = append(found, now)
	}
	return found, lost
}

// rivalled reports whether another free present place suits the same old one as
// well as matches[i] does.
func rivalled(matches []match, i int, taken map[int]bool) bool {
	m := matches[i]
	for j, other := range matches {
		if j != i && other.old == m.old && other.letters == m.letters && !taken[other.now] {
			return true
		}
	}
	return false
}

// shared counts the letters that a and b share at their ends (fromEnd) or starts.
func (d *Docket) shared(a, b string, fromEnd bool) int {
	alphabet := d.base.Alphabet()
	x, y := alphabet.Letters(a), alphabet.Letters(b)
	if fromEnd {
		slices.Reverse(x)
		slices.Reverse(y)
	}
	return common(x, y)
}

func common(x, y []align.Letter) int {
	n := 0
	for n < len(x) && n < len(y) && x[n] == y[n] {
		n++
	}
	return n
}
