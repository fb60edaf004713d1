package lexicon

import "emendary/align"

// hits are the words that a search found, with their labels one after another.
type hits struct {
	words  []hit
	labels []uint32
}

type hit struct {
	number     uint32
	start, end int // of its labels
	distance   int
}

// search is the scratch space of one search at a time. It simulates the
// nondeterministic automaton that accepts all strings within k edits of a form
// (Wu and Manber, “Fast Text Searching Allowing Errors”, Communications of the
// ACM 35(10), 1992, without its start loop; transpositions after Hyyrö, “A
// Bit-Vector Algorithm for Computing Levenshtein and Damerau Edit Distances”,
// Nordic Journal of Computing 10(1), 2003): bit i of row d at a depth is set where
// the first i letters of the form are within d edits of the letters on the path
// to that depth.
//
// No bit in the last row means that no word below can come within k. That holds
// with transpositions too, although one is complete only a letter later: after
// its first letter the row has the same edit as a substitution, at the same cost.
// It would not hold where a transposition costs less than a substitution.
type search struct {
	hits
	size  int      // letters of the form
	words int      // machine words in a row, one for up to 63 letters
	k     int      // edits allowed
	masks []uint64 // a row by label: bit i is set where the form's letter i has it
	rows  []uint64 // rows 0 to k for each depth
	path  []uint32 // labels
}

// within returns the words of a layer within k of the folded form. They stand
// until the next search with the same scratch space.
func (s *search) within(y *layer, form []align.Letter, k int) hits {
	s.hits = hits{s.hits.words[:0], s.hits.labels[:0]}
	s.size, s.k, s.words, s.path = len(form), k, len(form)/64+1, s.path[:0]
	s.masks = zeros(s.masks, len(y.toLetter)*s.words)
	for i, letter := range form {
		if label, ok := y.toLabel[letter]; ok {
			s.masks[int(label)*s.words+i/64] |= 1 << (i % 64)
		}
	}
	s.rows = zeros(s.rows, (k+1)*s.words)
	for d := range k + 1 {
		for i := range min(d, s.size) + 1 { // i letters deleted
			s.rows[d*s.words+i/64] |= 1 << (i % 64)
		}
	}
	y.trie.walk(s, y.trie.root, 0, 0)
	return s.hits
}

// zeros returns n zeros, in the space of b where there is enough.
func zeros(b []uint64, n int) []uint64 {
	if cap(b) < n {
		return make([]uint64, n)
	}
	b = b[:n]
	clear(b)
	return b
}

// enter makes the rows of depth+1 from those of depth and depth−1, and reports
// whether words below can still come within k.
func (s *search) enter(depth int, label uint32) bool {
	s.path = append(s.path[:depth], label)
	stride := (s.k + 1) * s.words
	for len(s.rows) < (depth+2)*stride {
		s.rows = append(s.rows, 0)
	}
	row := s.rows[depth*stride : (depth+2)*stride]
	before := s.masks[:0] // of the letter before this one, where there is one
	var two []uint64      // rows two letters ago
	if depth > 0 {
		two = s.rows[(depth-1)*stride : depth*stride]
		before = s.masks[int(s.path[depth-1])*s.words:][:s.words]
	}
	mask := s.masks[int(label)*s.words:][:s.words]
	if s.words == 1 {
		var swapped uint64
		if depth > 0 {
			swapped = mask[0] & (before[0] >> 1)
		}
		return s.enterShort(row[:stride], row[stride:], two, mask[0], swapped)
	}
	return s.enterLong(row[:stride], row[stride:], two, mask, before)
}

// enterShort makes the rows next from the rows last and those before them, for a
// form of one machine word. Bit i of swapped is set where the form has, from i
// on, the last two letters of the path in the other order.
func (s *search) enterShort(last, next, two []uint64, mask, swapped uint64) bool {
	valid := ^uint64(0) >> (63 - s.size)
	row := (last[0] & mask) << 1 // agreement
	next[0] = row
	for d := 1; d < len(last) && d < len(next); d++ {
		fewer := last[d-1]
		row = (last[d]&mask)<<1 | // agreement
			fewer | // a letter of the word that the form lacks
			(fewer|row)<<1 // substitution, or a letter of the form too many
		if swapped != 0 {
			row |= (two[d-1] & swapped) << 2
		}
		row &= valid
		next[d] = row
	}
	return row != 0
}

// enterLong is enterShort for forms of several machine words.
func (s *search) enterLong(last, next, two, mask, before []uint64) bool {
	n := s.words
	valid := ^uint64(0) >> (63 - s.size%64) // of the last machine word
	alive := false
	for d := 0; d <= s.k; d++ {
		alive = false
		for w := range n {
			row := shift(last[d*n:][:n], mask, w, 1)
			if d > 0 {
				fewer := last[(d-1)*n:][:n]
				row |= fewer[w] | shift(fewer, nil, w, 1) | shift(next[(d-1)*n:][:n], nil, w, 1)
				if two != nil {
					row |= shiftSwapped(two[(d-1)*n:][:n], mask, before, w)
				}
			}
			if w == n-1 {
				row &= valid
			}
			next[d*n+w] = row
			alive = alive || row != 0
		}
	}
	return alive
}

// shift returns machine word w of (row & mask) << by; a nil mask has all bits.
func shift(row, mask []uint64, w, by int) uint64 {
	at := func(i int) uint64 {
		if mask == nil {
			return row[i]
		}
		return row[i] & mask[i]
	}
	bits := at(w) << by
	if w > 0 {
		bits |= at(w-1) >> (64 - by)
	}
	return bits
}

// shiftSwapped returns machine word w of (row & mask & before>>1) << 2.
func shiftSwapped(row, mask, before []uint64, w int) uint64 {
	at := func(i int) uint64 {
		b := before[i] >> 1
		if i+1 < len(before) {
			b |= before[i+1] << 63
		}
		return row[i] & mask[i] & b
	}
	bits := at(w) << 2
	if w > 0 {
		bits |= at(w-1) >> 62
	}
	return bits
}

// word records the word that ends at depth if it is within k.
func (s *search) word(depth int, number uint32) {
	stride := (s.k + 1) * s.words
	rows := s.rows[depth*stride:][:stride]
	for d := range s.k + 1 {
		if rows[d*s.words+s.size/64]>>(s.size%64)&1 != 0 {
			start := len(s.hits.labels)
			s.hits.labels = append(s.hits.labels, s.path[:depth]...)
			s.hits.words = append(s.hits.words, hit{number, start, len(s.hits.labels), d})
			return
		}
	}
}
