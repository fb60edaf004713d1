package docket

import (
	"math"

	"emendary/internal/manuscript"
	"emendary/internal/rank"
)

// survey is what the evidence needs of the whole manuscript.
type survey struct {
	evidence map[*Entry]rank.Evidence // of the entries as they were laid out
	uses     map[string]uses          // by key
	crowd    crowd
}

// uses is how often a form stands in the manuscript, and how often of that with a
// capital.
type uses struct{ all, capital int }

// like returns how many of the uses have capitals like those of an entry. A word
// that mostly has a capital is no neighbour of one that has none, nor the other
// way round; the start of a sentence speaks for neither.
func (u uses) like(v rank.Evidence) int {
	switch {
	case v.Capital >= 0.5 && 2*u.capital >= u.all:
		return u.capital
	case v.Capital < 0.5 && (v.Start > 0 || 2*u.capital <= u.all):
		return u.all
	}
	return 0
}

// surveyed surveys the manuscript, once.
func (d *Docket) surveyed() *survey {
	d.surveying.Do(func() {
		s := &survey{evidence: make(map[*Entry]rank.Evidence, len(d.laid)), uses: make(map[string]uses, len(d.use)), crowd: d.crowd()}
		for text, f := range d.census.forms {
			k := Key(text)
			u := s.uses[k]
			u.all += len(f.places)
			if capitalsOf(text) != lower {
				u.capital += len(f.places)
			}
			s.uses[k] = u
		}
		near := make([]rank.Evidence, len(d.laid))
		for i, e := range d.laid {
			near[i] = d.evidence(e, s)
		}
		d.neighbours(near, s.uses)
		for i, e := range d.laid {
			s.evidence[e] = near[i]
		}
		d.survey = s
	})
	return d.survey
}

// crowd is the places of words that lists do not know, those with capitals left
// out: where many stand together the text is foreign or dialect.
type crowd struct {
	first   []int // of each paragraph, where its words begin in there
	there   []bool
	dialect float64 // see rank.Evidence
}

func (d *Docket) crowd() crowd {
	c := crowd{first: make([]int, len(d.Document.Paragraphs))}
	n := 0
	var words, crowded [2]float64 // elsewhere, in speech
	for i := range d.Document.Paragraphs {
		c.first[i] = n
		n += len(d.Document.Paragraphs[i].Words)
		for j := range d.Document.Paragraphs[i].Words {
			words[spoken(&d.Document.Paragraphs[i].Words[j])]++
		}
	}
	c.there = make([]bool, n)
	for _, e := range d.laid {
		if e.Kind != UnknownForm || capitalsOf(e.Form) != lower {
			continue
		}
		for i := range e.Occurrences {
			o := &e.Occurrences[i]
			c.there[c.first[o.Paragraph]+o.Word] = true
			crowded[spoken(&d.Document.Paragraphs[o.Paragraph].Words[o.Word])]++
		}
	}
	// Ten words of the usual density on either side smooth what is small.
	usual := (crowded[0] + crowded[1] + 1) / (words[0] + words[1] + 1)
	density := func(k int) float64 { return (crowded[k] + 10) / (words[k] + 10/usual) }
	c.dialect = min(max(math.Log2(density(1)/density(0)), -3), 3)
	return c
}

// spoken returns 1 for a word in speech, else 0.
func spoken(w *manuscript.Word) int {
	if w.Setting == manuscript.Speech {
		return 1
	}
	return 0
}

// reach is how many words on either side are company.
const reach = 6

// beside counts the words around o that are in the crowd or cut short.
func (c *crowd) beside(doc *manuscript.Document, o *Occurrence) int {
	words := doc.Paragraphs[o.Paragraph].Words
	n := 0
	for i := max(o.Word-reach, 0); i <= min(o.Word+reach, len(words)-1); i++ {
		if i == o.Word {
			continue
		}
		if words[i].Traits&manuscript.Elision != 0 || c.there[c.first[o.Paragraph]+i] {
			n++
		}
	}
	return n
}

// neighbours notes in the evidence of each entry laid out how often the manuscript
// uses the commonest forms one edit away: one that is listed, and one that is
// another entry's. Entries of fewer than four letters have none.
//
// Two forms are one restricted edit apart only if what is left of both is the
// same for some letter dropped, or none (Mor and Fraenkel, “A Hash Code Method for
// Detecting and Correcting Spelling Errors”, Communications of the ACM 25(12),
// 1982): so it takes O(forms × letters) hashes, not a comparison for every pair.
func (d *Docket) neighbours(found []rank.Evidence, forms map[string]uses) {
	type entry struct {
		letters []rune
		met     int // the last form compared
	}
	entries := make([]entry, len(d.laid))
	ours := make(map[string]bool, len(d.laid))
	// The entries that leave a hash are a chain: last gives its newest link.
	type link struct{ entry, before int32 }
	links := make([]link, 1, 12*len(d.laid))
	last := make(map[uint64]int32, 8*len(d.laid))
	var hashes []uint64
	for i, e := range d.laid {
		k := Key(e.Form)
		ours[k] = true
		entries[i] = entry{letters: []rune(k)}
		if len(entries[i].letters) < leastStem || e.Kind == Join {
			continue
		}
		hashes = leftovers(hashes[:0], entries[i].letters)
		for _, h := range hashes {
			links = append(links, link{int32(i), last[h]})
			last[h] = int32(len(links) - 1)
		}
	}
	form := 0
	for k, u := range forms {
		form++
		letters := []rune(k)
		hashes = leftovers(hashes[:0], letters)
		for _, h := range hashes {
			for at := last[h]; at > 0; at = links[at].before {
				i := links[at].entry
				e := &entries[i]
				if e.met == form || !oneEdit(e.letters, letters) {
					continue
				}
				e.met = form
				n, v := u.like(found[i]), &found[i]
				if ours[k] {
					v.NearOwn = max(v.NearOwn, n)
				} else {
					v.NearUse = max(v.NearUse, n)
				}
			}
		}
	}
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
