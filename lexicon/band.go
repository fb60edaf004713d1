package lexicon

import "math/bits"

const (
	// maxBand is the most edits whose states fit in one machine word.
	maxBand = 4

	// A state takes these many bits up to the next row, and its row has these many
	// places: one for each distance from the diagonal, -maxBand to maxBand, and two
	// to spare.
	rowBits = 2*maxBand + 3
	inRow   = 1<<rowBits - 1
)

// band simulates the nondeterministic automaton that accepts all strings within k
// edits of a form, few of them in the form's first letters (Mihov and Schulz,
// “Fast Approximate Search in Large Dictionaries”, Computational Linguistics
// 30(4), 2004, on backward dictionaries).
//
// A state (i, d) at a depth t, where t letters of a word are read, says that the
// first i letters of the form are d edits away from them, on some way there. i
// can't be further from t than d, so that the states at a depth are a band about
// the diagonal (as in their universal automaton). They make one machine
// word: a row for each d, in it a place for each i-t. The letter that is read
// takes (i, d) to
//
//	(i+1, d)    the same bit     where it agrees
//	(i, d+1)    rowBits-1 up     inserted: the form lacks it
//	(i+1, d+1)  rowBits up       substituted
//
// and without a letter read (i, d) leads to (i+1, d+1), which is rowBits+1 up: a
// letter of the form is deleted. Two letters that the form has in the other order
// take (i, d) to (i+2, d+1), rowBits up. What leaves the band comes to places to
// spare, and is masked off. (Hyyrö, “A Bit-Vector Algorithm for Computing
// Levenshtein and Damerau Edit Distances”, Nordic Journal of Computing 10(1),
// 2003, has the rows one by one.)
type band struct {
	levels []level // by depth: to the letters of the form and k, and two more
}

// level is what a band has at a depth, where the place of state (i, d) is p = i-t+k.
type level struct {
	after    *level // one letter further
	inserted uint64 // states that an insertion may lead to
	edited   uint64 // states that any other edit may lead to
	able     uint64 // states from which a transposition may start
	whole    uint64 // states with the whole form read

	// follow[p+1] has the bit of letter i of the form: 1 << label % 64. It is set
	// for each layer.
	follow *[16]uint64

	// agree has, for each code of a letter, the states whose next letter it is.
	agree [128]uint64

	depth int
	label uint32 // what was read here, on the path
}

// within sets b to all strings within k ≤ maxBand edits of a form, given by the
// codes of its letters, each below codes; of which at most few in its first start
// letters. What straddles the end of those letters counts as after it, and so do
// letters inserted there. The room for follow begins one place before the form.
func (b *band) within(form []uint8, codes, k, few, start int, follow []uint64) {
	n, depths := len(form), len(form)+k+3
	if cap(b.levels) < depths {
		b.levels = make([]level, depths)
	}
	b.levels = b.levels[:depths]
	var rows uint64
	for d := range k + 1 {
		rows |= 1 << (d * rowBits)
	}
	for t := range b.levels {
		l := &b.levels[t]
		clear(l.agree[:codes])
		l.depth, l.inserted, l.edited, l.able, l.whole = t, 0, 0, 0, 0
		l.follow = (*[16]uint64)(follow[t:])
		first, last := max(k-t, 0), min(n-t+k, 2*k) // the places of 0 to n
		if first <= last {
			l.inserted, l.edited = rows*span(first, last), rows*span(first, last)
			if few < k { // the row after few is not to be entered before start
				row := (few + 1) * rowBits
				l.inserted &^= inRow << row &^ (span(start-t+k, last) << row)
				l.edited &^= inRow << row &^ (span(start+1-t+k, last) << row)
			}
			if whole := n - t + k; whole <= 2*k {
				l.whole = rows << whole
			}
		}
		if t > 0 {
			b.levels[t-1].after = l
		}
		if t > 1 {
			b.levels[t-2].able = l.edited >> rowBits
		}
	}
	for i, code := range form {
		for t := max(i-k, 0); t <= i+k; t++ {
			b.levels[t].agree[code&127] |= rows << (i - t + k)
		}
	}
}

// span returns the bits from first, 0 if that is less, to last.
func span(first, last int) uint64 {
	first = max(first, 0)
	if first > last {
		return 0
	}
	return 1<<(last+1) - 1<<first
}

// begin returns the states before any letter is read.
func (b *band) begin(k int) uint64 {
	return b.levels[0].delete(1 << k)
}

// delete returns states with what deletions make of them.
func (l *level) delete(states uint64) uint64 {
	for more := states << (rowBits + 1) & l.edited; more != 0; more = more << (rowBits + 1) & l.edited {
		states |= more
	}
	return states
}

// distance returns the fewest edits with which one of some states is reached.
func distance(states uint64) int { return bits.TrailingZeros64(states) / rowBits }

// wanted returns the bits of the letters that alone lead on from states: those
// that follow them, those that follow the letter after able, and those that
// complete swapped. It takes them from one place earlier for each.
func (l *level) wanted(states, able, swapped uint64) uint64 {
	places := states<<1 | able<<2 | swapped
	places |= places >> rowBits
	places |= places >> (2 * rowBits)
	places = (places | places>>(4*rowBits)) & inRow
	var want uint64
	for ; places != 0; places &= places - 1 {
		want |= l.follow[bits.TrailingZeros64(places)&15]
	}
	return want
}

// forward walks the arcs of a node of the trie; number is that of its first word,
// swapped the states a letter ago whose next letter but one was read.
func (s *search) forward(node uint32, at *level, number uint32, states, swapped uint64) {
	to := at.after
	free := states<<(rowBits-1)&to.inserted | states<<rowBits&to.edited // whatever the letter
	able := states & at.able
	want := ^uint64(0)
	if free == 0 {
		want = at.wanted(states, able, swapped) | s.many
	}
	arcs := s.trie.arcs
	for arc := node; ; arc++ {
		head := arcs[2*arc]
		label := head >> labelBit
		rest := want >> (label & 63)
		if rest&1 != 0 {
			code := s.code[label] & 127
			m := at.agree[code]
			half := able & to.agree[code] // a transposition half read may be all there is
			next := states&m | free | swapped&(m<<1)<<rowBits&to.edited
			if next|half != 0 {
				next = to.delete(next)
				at.label = label
				n := number + s.trie.skips[arc]
				if head&endsWord != 0 {
					if whole := next & to.whole; whole != 0 {
						s.found(n, to.depth, distance(whole))
					}
					n++
				}
				if child := arcs[2*arc+1]; child != 0 {
					s.forward(child, to, n, next, half)
				}
			}
		}
		if head&lastArc != 0 || rest <= s.none {
			return
		}
	}
}

// backward is forward in the reversed automaton. Of the words it meets it looks
// up the numbers, and it leaves out those that forward finds for certain.
func (s *search) backward(node uint32, at *level, states, swapped uint64) {
	to := at.after
	free := states<<(rowBits-1)&to.inserted | states<<rowBits&to.edited
	able := states & at.able
	want := ^uint64(0)
	if free == 0 {
		want = at.wanted(states, able, swapped) | s.many
	}
	bit := s.reversed.childBit & 31
	low := uint32(1)<<bit - 1
	for i := node; ; i++ {
		arc := s.reversed.arcs[i]
		label := arc & low >> labelBit
		rest := want >> (label & 63)
		if rest&1 != 0 {
			code := s.code[label] & 127
			m := at.agree[code]
			half := able & to.agree[code]
			next := states&m | free | swapped&(m<<1)<<rowBits&to.edited
			if next|half != 0 {
				next = to.delete(next)
				at.label = label
				if arc&endsWord != 0 {
					if whole := next & to.whole; whole != 0 && whole&s.certain == 0 {
						s.foundBackward(to.depth, distance(whole))
					}
				}
				if child := arc >> bit; child != 0 {
					s.backward(child, to, next, half)
				}
			}
		}
		if arc&lastArc != 0 || rest <= s.none {
			return
		}
	}
}
