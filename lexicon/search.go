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
	trie  *trie
	size  int      // letters of the form
	words int      // machine words in a row, one for up to 63 letters
	k     int      // edits allowed
	masks []uint64 // a row by label: bit i is set where the form's letter i has it
	rows  []uint64 // rows 0 to k for each depth
	path  []uint32 // labels

	deepest int // the most letters a path may have
}

// within returns the words of a layer within k of the folded form. They stand
// until the next search with the same scratch space.
func (s *search) within(y *layer, form []align.Letter, k int) hits {
	s.hits = hits{s.hits.words[:0], s.hits.labels[:0]}
	s.trie, s.size, s.k, s.words = &y.trie, len(form), k, len(form)/64+1
	s.masks = zeros(s.masks, len(y.toLetter)*s.words)
	for i, letter := range form {
		if label, ok := y.toLabel[letter]; ok {
			s.masks[int(label)*s.words+i/64] |= 1 << (i % 64)
		}
	}
	// No path of more than size+k letters leads on, and no word has more than
	// MaxLetters.
	s.path = s.path[:0]
	s.deepest = min(s.size+k, MaxLetters)
	s.rows = zeros(s.rows, (s.deepest+1)*(k+1)*s.words)
	for d := range k + 1 {
		for i := range min(d, s.size) + 1 { // i letters taken from the form
			s.rows[d*s.words+i/64] |= 1 << (i % 64)
		}
	}
	if root := s.trie.root; root != 0 && s.words == 1 {
		s.walkShort(root, 0, 0)
	} else if root != 0 {
		s.walkLong(root, 0, 0)
	}
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

// rowsAt returns the rows at a depth.
func (s *search) rowsAt(depth int) []uint64 {
	stride := (s.k + 1) * s.words
	return s.rows[depth*stride:][:stride]
}

// walkShort goes on from depth along the arcs of the node whose first arc is
// given, for a form of one machine word; number is that of the node's first word.
//
// An arc leads on where the last row after it has a bit. It has one if the form
// agrees with the arc, if an edit is left before it, or if it completes a
// transposition; every other way to the last row takes one of these first. Most
// arcs fail this test, which saves making their rows.
func (s *search) walkShort(arc uint32, depth int, number uint32) {
	if depth >= s.deepest {
		return
	}
	last, next := s.rowsAt(depth), s.rowsAt(depth+1)
	var two []uint64  // rows two letters ago
	var before uint64 // bit i: the form's letter i+1 is the letter before the arc
	if depth > 0 {
		two = s.rowsAt(depth - 1)
		before = s.masks[s.path[depth-1]] >> 1
	}
	agree, left, swap := last[s.k], uint64(0), uint64(0)
	if s.k > 0 {
		left = last[s.k-1]
		if depth > 0 {
			swap = two[s.k-1] & before
		}
	}
	for ; ; arc++ {
		head := s.trie.arcs[2*arc]
		label := head >> labelBit
		mask := s.masks[label]
		if agree&mask|left|swap&mask != 0 {
			s.stepShort(last, next, two, mask, mask&before)
			s.path = append(s.path[:depth], label)
			n := number + s.trie.skips[arc]
			if head&endsWord != 0 {
				s.found(depth+1, n)
				n++
			}
			if child := s.trie.arcs[2*arc+1]; child != 0 {
				s.walkShort(child, depth+1, n)
			}
		}
		if head&lastArc != 0 {
			return
		}
	}
}

// stepShort makes the rows next from the rows last and two, which is one letter
// further back. Bit i of swapped is set where the form has, from i on, the last
// two letters of the path in the other order.
func (s *search) stepShort(last, next, two []uint64, mask, swapped uint64) {
	valid := ^uint64(0) >> (63 - s.size)
	row := (last[0] & mask) << 1 // agreement
	next[0] = row
	for d := 1; d <= s.k; d++ {
		fewer := last[d-1]
		row = (last[d]&mask)<<1 | // agreement
			fewer | // a letter that the form lacks
			(fewer|row)<<1 // substitution, or a letter of the form too many
		if swapped != 0 {
			row |= (two[d-1] & swapped) << 2
		}
		row &= valid
		next[d] = row
	}
}

// walkLong is walkShort for a form of several machine words. Such forms are rare:
// it makes the rows of every arc.
func (s *search) walkLong(arc uint32, depth int, number uint32) {
	if depth >= s.deepest {
		return
	}
	last, next := s.rowsAt(depth), s.rowsAt(depth+1)
	var two, before []uint64
	if depth > 0 {
		two = s.rowsAt(depth - 1)
		before = s.masks[int(s.path[depth-1])*s.words:][:s.words]
	}
	for ; ; arc++ {
		head := s.trie.arcs[2*arc]
		label := head >> labelBit
		mask := s.masks[int(label)*s.words:][:s.words]
		if s.stepLong(last, next, two, mask, before) {
			s.path = append(s.path[:depth], label)
			n := number + s.trie.skips[arc]
			if head&endsWord != 0 {
				s.found(depth+1, n)
				n++
			}
			if child := s.trie.arcs[2*arc+1]; child != 0 {
				s.walkLong(child, depth+1, n)
			}
		}
		if head&lastArc != 0 {
			return
		}
	}
}

// stepLong is stepShort for a form of several machine words; before is the mask
// of the letter before. It reports whether the last row has a bit.
func (s *search) stepLong(last, next, two, mask, before []uint64) bool {
	n := s.words
	valid := ^uint64(0) >> (63 - s.size%64) // of the last machine word
	alive := false
	for d := 0; d <= s.k; d++ {
		alive = false
		for w := range n {
			row := shift(last[d*n:][:n], mask, w)
			if d > 0 {
				fewer := last[(d-1)*n:][:n]
				row |= fewer[w] | shift(fewer, nil, w) | shift(next[(d-1)*n:][:n], nil, w)
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

// shift returns machine word w of (row & mask) << 1; a nil mask has all bits.
func shift(row, mask []uint64, w int) uint64 {
	at := func(i int) uint64 {
		if mask == nil {
			return row[i]
		}
		return row[i] & mask[i]
	}
	bits := at(w) << 1
	if w > 0 {
		bits |= at(w-1) >> 63
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

// found records the word that ends at depth if it is within k.
func (s *search) found(depth int, number uint32) {
	rows := s.rowsAt(depth)
	for d := range s.k + 1 {
		if rows[d*s.words+s.size/64]>>(s.size%64)&1 != 0 {
			start := len(s.hits.labels)
			s.hits.labels = append(s.hits.labels, s.path[:depth]...)
			s.hits.words = append(s.hits.words, hit{number, start, len(s.hits.labels), d})
			return
		}
	}
}
