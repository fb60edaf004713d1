package lexicon

// rows simulate the nondeterministic automaton that accepts all strings within k
// edits of a form, for any k: they are for searches that a band can't do (Wu
// and Manber, “Fast Text Searching Allowing Errors”, Communications of the ACM
// 35(10), 1992, without its start loop; transpositions after Hyyrö, “A Bit-Vector
// Algorithm for Computing Levenshtein and Damerau Edit Distances”, Nordic Journal
// of Computing 10(1), 2003): bit i of row d at a depth is set where the first i
// letters of the form are within d edits of the letters on the path to that depth.
//
// No bit in the last row means that no word below can come within k. That holds
// with transpositions too, although one is complete only a letter later: after
// its first letter the row has the same edit as a substitution, at the same cost.
// It would not hold where a transposition costs less than a substitution.
type rows struct {
	size    int      // letters of the form
	words   int      // machine words in a row, one for up to 63 letters
	k       int      // edits allowed
	masks   []uint64 // a row by label: bit i is set where the form's letter i has it
	rows    []uint64 // rows 0 to k for each depth
	deepest int      // the most letters a path may have
	path    []uint32 // labels
}

// inRows finds the words of a layer within k of the form, walking forward alone.
func (s *search) inRows(y *layer, k int) {
	r := &s.rows
	r.size, r.k, r.words = len(s.form), k, len(s.form)/64+1
	r.masks = zeros(r.masks, len(y.toLetter)*r.words)
	for i, letter := range s.form {
		if label, ok := y.label(letter); ok {
			r.masks[int(label)*r.words+i/64] |= 1 << (i % 64)
		}
	}
	// No path of more than size+k letters leads on, and no word has more than
	// MaxLetters.
	r.deepest = min(r.size+k, MaxLetters)
	r.rows = zeros(r.rows, (r.deepest+1)*(k+1)*r.words)
	for d := range k + 1 {
		for i := range min(d, r.size) + 1 { // i letters taken from the form
			r.rows[d*r.words+i/64] |= 1 << (i % 64)
		}
	}
	s.walkRows(s.trie.root, 0, 0)
}

// rowsAt returns the rows at a depth.
func (r *rows) rowsAt(depth int) []uint64 {
	stride := (r.k + 1) * r.words
	return r.rows[depth*stride:][:stride]
}

// walkRows goes on from depth along the arcs of the node whose first arc is given;
// number is that of the node's first word.
func (s *search) walkRows(arc uint32, depth int, number uint32) {
	if depth >= s.rows.deepest {
		return
	}
	last, next := s.rows.rowsAt(depth), s.rows.rowsAt(depth+1)
	var two, before []uint64
	if depth > 0 {
		two = s.rows.rowsAt(depth - 1)
		before = s.rows.masks[int(s.rows.path[depth-1])*s.rows.words:][:s.rows.words]
	}
	free := s.rows.free(last, two, before)
	for ; ; arc++ {
		head := s.trie.arcs[2*arc]
		label := head >> labelBit
		mask := s.rows.masks[int(label)*s.rows.words:][:s.rows.words]
		if (free || meet(last[s.rows.k*s.rows.words:], mask)) && s.rows.stepRows(last, next, two, mask, before) {
			s.rows.path = append(s.rows.path[:depth], label)
			n := number + s.trie.skips[arc]
			if head&endsWord != 0 {
				s.foundRows(n, depth+1)
				n++
			}
			if child := s.trie.arcs[2*arc+1]; child != 0 {
				s.walkRows(child, depth+1, n)
			}
		}
		if head&lastArc != 0 {
			return
		}
	}
}

// free reports whether more than agreement may lead on from the rows last and two:
// an edit that is left, or the end of a transposition. Most arcs need neither rows
// nor more of a look where it is false.
func (r *rows) free(last, two, before []uint64) bool {
	if r.k == 0 {
		return false
	}
	from, to := (r.k-1)*r.words, r.k*r.words
	if meet(last[from:to], last[from:to]) {
		return true
	}
	for w := range before {
		if shiftSwapped(two[from:to], two[from:to], before, w) != 0 {
			return true
		}
	}
	return false
}

// meet reports whether a and b have a bit in common.
func meet(a, b []uint64) bool {
	for w := range b {
		if a[w]&b[w] != 0 {
			return true
		}
	}
	return false
}

// stepRows makes the rows next from the rows last and two, which is one letter
// further back; before is the mask of the letter before. It reports whether the
// last row has a bit.
func (r *rows) stepRows(last, next, two, mask, before []uint64) bool {
	n := r.words
	valid := ^uint64(0) >> (63 - r.size%64) // of the last machine word
	alive := false
	for d := 0; d <= r.k; d++ {
		alive = false
		for w := range n {
			row := shift(last[d*n:][:n], mask, w) // agreement
			if d > 0 {
				fewer := last[(d-1)*n:][:n]
				row |= fewer[w] | // a letter that the form lacks
					shift(fewer, nil, w) | // substitution
					shift(next[(d-1)*n:][:n], nil, w) // a letter of the form too many
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

// foundRows records word number, which ends at depth, if it is within k.
func (s *search) foundRows(number uint32, depth int) {
	r := &s.rows
	at := r.rowsAt(depth)
	for d := range r.k + 1 {
		if at[d*r.words+r.size/64]>>(r.size%64)&1 != 0 {
			s.hits = append(s.hits, hit{number, uint32(len(s.labels)), uint8(depth), uint16(d)})
			s.labels = append(s.labels, r.path[:depth]...)
			return
		}
	}
}
