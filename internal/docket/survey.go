package docket

import (
	"emendary/internal/manuscript"
	"emendary/internal/rank"
)

// surveyed gathers the evidence of all entries as they were laid out.
func (d *Docket) surveyed() map[*Entry]rank.Evidence {
	around := d.crowd()
	out := make(map[*Entry]rank.Evidence, len(d.laid))
	near := d.neighbours()
	for i, e := range d.laid {
		v := d.evidence(e, around)
		v.NearUse, v.NearOwn = near[i].listed, near[i].own
		out[e] = v
	}
	return out
}

// crowd is the places of words that lists do not know, those with capitals left
// out: where many stand together the text is foreign or dialect.
type crowd map[place]bool

func (d *Docket) crowd() crowd {
	c := crowd{}
	for _, e := range d.laid {
		if e.Kind != UnknownForm || capitalsOf(e.Form) != lower {
			continue
		}
		for i := range e.Occurrences {
			o := &e.Occurrences[i]
			c[place{int32(o.Paragraph), int32(o.Word)}] = true
		}
	}
	return c
}

// reach is how many words on either side are company.
const reach = 6

// beside counts the words around o that are in the crowd or cut short.
func (c crowd) beside(doc *manuscript.Document, o *Occurrence) int {
	words := doc.Paragraphs[o.Paragraph].Words
	n := 0
	for i := max(o.Word-reach, 0); i <= min(o.Word+reach, len(words)-1); i++ {
		if i == o.Word {
			continue
		}
		if words[i].Traits&manuscript.Elision != 0 || c[place{int32(o.Paragraph), int32(i)}] {
			n++
		}
	}
	return n
}

// neighbour is how often the manuscript uses the commonest forms one edit away
// from an entry's: one that is listed, and one that is another entry's.
type neighbour struct{ listed, own int }

// neighbours finds the forms one edit away from each entry's, for entries of four
// letters or more. Two forms are one restricted edit apart only if what is left
// of both is the same for some letter dropped, or none (Mor and Fraenkel, “A Hash
// Code Method for Detecting and Correcting Spelling Errors”, Communications of
// the ACM 25(12), 1982): so it takes O(forms × letters) hashes, not a comparison
// for every pair.
func (d *Docket) neighbours() []neighbour {
	type entry struct {
		letters []rune
		last    int // the last form compared
	}
	entries := make([]entry, len(d.laid))
	ours := make(map[string]bool, len(d.laid))
	left := map[uint64][]int32{}
	var hashes []uint64
	for i, e := range d.laid {
		k := key(e.Form)
		ours[k] = true
		entries[i] = entry{letters: []rune(k)}
		if len(entries[i].letters) < leastStem || e.Kind == Join {
			continue
		}
		hashes = leftovers(hashes[:0], entries[i].letters)
		for _, h := range hashes {
			left[h] = append(left[h], int32(i))
		}
	}
	out := make([]neighbour, len(d.laid))
	form := 0
	for k, uses := range d.use {
		form++
		letters := []rune(k)
		hashes = leftovers(hashes[:0], letters)
		for _, h := range hashes {
			for _, i := range left[h] {
				e := &entries[i]
				if e.last == form || !oneEdit(e.letters, letters) {
					continue
				}
				e.last = form
				if ours[k] {
					out[i].own = max(out[i].own, uses)
				} else {
					out[i].listed = max(out[i].listed, uses)
				}
			}
		}
	}
	return out
}

// leftovers appends the hashes of letters and of what is left of them without
// each one (FNV-1a).
func leftovers(hashes []uint64, letters []rune) []uint64 {
	const offset, prime = 14695981039346656037, 1099511628211
	for skip := -1; skip < len(letters); skip++ {
		h := uint64(offset)
		for i, r := range letters {
			if i != skip {
				h = (h ^ uint64(r)) * prime
			}
		}
		hashes = append(hashes, h)
	}
	return hashes
}

// oneEdit reports whether a and b are exactly one insertion, deletion,
// substitution or transposition apart. O(n).
func oneEdit(a, b []rune) bool {
	if len(a) < len(b) {
		a, b = b, a
	}
	if len(a)-len(b) > 1 {
		return false
	}
	i := 0
	for i < len(b) && a[i] == b[i] {
		i++
	}
	if i == len(a) {
		return false // the same
	}
	a, b = a[i:], b[i:]
	for len(b) > 0 && a[len(a)-1] == b[len(b)-1] {
		a, b = a[:len(a)-1], b[:len(b)-1]
	}
	switch {
	case len(a) == 1 && len(b) <= 1:
		return true
	case len(a) == 2 && len(b) == 2:
		return a[0] == b[1] && a[1] == b[0]
	}
	return false
}
