package lexicon

import (
	"slices"

	"emendary/align"
)

// backward is on its way over a reversed trie from the words' ends: that of a layer,
// or that of the own words.
//
// What an edit costs depends on the letter of the word before it, which comes last
// here: the row for some letters is worked out when the next one is known, for each
// that there is. The letter then read is followed where it may lead on whatever
// stands before it.
type backward struct {
	*best
	reversed *reversed
	toLetter []align.Letter // by label
	symbol   []uint8        // by label
	floors   []int32        // by arc; nil where all words have the floor least
	least    int32
}

// start walks the whole trie.
func (w *backward) start() {
	w.node(w.reversed.root, 0, false)
}

// node walks the arcs of a node at a depth: so many letters are read, and there are
// rows for fewer. doubled says that only the letter read last leads on.
func (w *backward) node(node uint32, depth int, doubled bool) {
	bit := w.reversed.childBit & 31
	low := uint32(1)<<bit - 1
	for i := node; ; i++ {
		arc := w.reversed.arcs[i]
		label := arc & low >> labelBit
		if symbol := w.symbol[label] & 31; !doubled || symbol == w.symbols[depth] {
			floor := w.least
			if w.floors != nil {
				floor = w.floors[i]
			}
			w.follow(arc, depth, w.toLetter[label], symbol, w.backwardCuts(w.room(floor)))
		}
		if arc&lastArc != 0 {
			return
		}
	}
}

// follow follows an arc with a letter from a depth.
func (w *backward) follow(arc uint32, depth int, letter align.Letter, symbol uint8, c cuts) {
	w.step(depth, symbol, c)
	allowed, twice := w.next(depth, symbol, c)
	if (allowed|twice)>>symbol&1 == 0 {
		return
	}
	w.path[depth], w.symbols[depth+1] = letter, symbol
	if arc&endsWord != 0 {
		if w.step(depth+1, 0, c).at(0) < never {
			w.found(w.turned(depth + 1))
		}
	}
	if child := arc >> (w.reversed.childBit & 31); child != 0 && depth+1 < MaxLetters {
		w.node(child, depth+1, allowed>>symbol&1 == 0)
	}
}

// turned returns the first letters of path from the last on.
func (w *backward) turned(depth int) []align.Letter {
	w.letters = append(w.letters[:0], w.path[:depth]...)
	slices.Reverse(w.letters)
	return w.letters
}

// next returns the symbols of the letters that may lead on from the row at a depth
// whatever stands before them, of which only that one is asked for; and those that
// may only where the same letter stands before them.
func (w *backward) next(depth int, symbol uint8, c cuts) (allowed, twice uint32) {
	p, r := &w.prices, &w.rows[depth]
	r.half = 0
	for i := r.from; i < r.to; i++ {
		v := r.cells[i]
		if v >= never {
			continue
		}
		insert, one := c.last, c.last
		if i > p.middle {
			insert = c.first
			if i-1 > p.middle {
				one = c.first
			}
		}
		left := insert - v - p.lengths[depth+i+1] + p.lengths[depth+i]
		allowed |= atMost(&p.inserts[i], left)
		twice |= atMost(&p.twices[i], left)
		if i == 0 {
			continue
		}
		allowed |= 1<<p.symbols[i-1] | atMost(&p.ones[i-1], one-v)
		if i > 1 && v+p.swaps[i-2] <= c.last {
			r.half |= 1 << p.symbols[i-2]
		}
		for k := range p.ending[i] {
			e := &p.ending[i][k]
			if to := e.Symbols(); v+p.long(e, depth+i) <= c.last {
				if e.N > 1 {
					r.half |= 1 << to[e.N-1]
				} else {
					allowed |= 1 << to[0]
				}
			}
		}
	}
	allowed |= r.half
	if allowed>>symbol&1 == 0 && depth > 0 && w.completes(depth, symbol) {
		allowed |= 1 << symbol
	}
	return allowed, twice
}

// completes reports whether a letter goes on with an edit half read at a depth.
func (w *backward) completes(depth int, symbol uint8) bool {
	p, last := &w.prices, w.symbols[depth]&31
	r := &w.rows[depth-1]
	if r.half>>last&1 != 0 {
		for i := max(r.from, 2); i < r.to; i++ {
			if p.symbols[i-2] == last && p.symbols[i-1] == symbol {
				return true
			}
		}
		for _, e := range w.sheet.Long() {
			if to := e.Symbols(); e.N > 1 && to[e.N-1] == last && to[e.N-2] == symbol && r.at(e.I+e.M) < never {
				return true
			}
		}
	}
	if depth < 2 || w.rows[depth-2].half>>(w.symbols[depth-1]&31)&1 == 0 {
		return false
	}
	r = &w.rows[depth-2]
	for k := range p.beginning[symbol] {
		e := &p.beginning[symbol][k]
		if to := e.Symbols(); e.N > 2 && to[1] == last && to[2] == w.symbols[depth-1] && r.at(e.I+e.M) < never {
			return true
		}
	}
	return false
}

// step works out the row at a depth, with the letter before as a symbol; 0 stands for
// none.
func (w *backward) step(depth int, left uint8, c cuts) *row {
	p, s := &w.prices, w.sheet
	r := &w.rows[depth]
	if depth == 0 {
		r.from, r.to, r.cells[p.n] = p.n, p.n+1, 0
		w.prune(r, align.SpotOf(0, left, 0), depth, c)
		return r
	}
	at := align.SpotOf(w.path[depth-1], w.symbols[depth], left)
	last := &w.rows[depth-1]
	r.from, r.to = last.from, last.from
	if last.from < last.to {
		v := never // by One
		for i := last.to - 1; i >= last.from; i-- {
			before := last.cells[i]
			letters := depth - 1 + i
			r.cells[i] = min(v, before+s.Insert(at, i)+p.lengths[letters+1]-p.lengths[letters])
			v = never
			if i > 0 {
				v = before + s.One(at, i-1) - p.keep[i-1]
			}
		}
		r.to = last.to
		if last.from > 0 {
			r.from--
			r.cells[r.from] = v
		}
	}
	w.several(r, depth)
	w.prune(r, align.SpotOf(0, left, 0), depth, c)
	return r
}

// several takes edits of several letters into row r at a depth.
func (w *backward) several(r *row, depth int) {
	p, symbol := &w.prices, w.symbols[depth]&31
	if depth >= 2 {
		before := &w.rows[depth-2]
		letter, right := w.path[depth-1], w.path[depth-2]
		if letter != right && before.half>>(w.symbols[depth-1]&31)&1 != 0 {
			for i := max(before.from, 2); i < before.to; i++ {
				if w.form[i-1] == letter && w.form[i-2] == right && before.cells[i] < never {
					r.lower(i-2, before.cells[i]+p.swaps[i-2])
				}
			}
		}
	}
	for k := range p.beginning[symbol] {
		e := &p.beginning[symbol][k]
		if e.N > depth {
			continue
		}
		v := w.rows[depth-e.N].at(e.I + e.M)
		if v < never && w.yields(e, depth) {
			r.lower(e.I, v+p.long(e, depth-e.N+e.I+e.M))
		}
	}
}

// yields reports whether an edit yields the letters read last.
func (w *backward) yields(e *align.LongEdit, depth int) bool {
	to := e.Symbols()
	for k, c := range to[:e.N] {
		if w.symbols[depth-k] != c {
			return false
		}
	}
	return true
}

// prune takes deletions after a spot into row r, and leaves out cells that cost too
// much.
func (w *backward) prune(r *row, after align.Spot, depth int, c cuts) {
	p := &w.prices
	from, to := p.n+1, 0
	v := never
	for i := r.to - 1; i >= r.from || i >= 0 && v < never; i-- {
		cell := never
		if i >= r.from {
			cell = r.cells[i]
		}
		if v < never {
			letters := depth + i
			cell = min(cell, v+w.sheet.Delete(after, i)-p.keep[i]+p.lengths[letters]-p.lengths[letters+1])
		}
		cut := c.last
		if i > p.middle {
			cut = c.first
		}
		if cell > cut {
			cell = never
		} else {
			from, to = i, max(to, i+1)
		}
		r.cells[i], v = cell, cell
	}
	if from >= to {
		from, to = 0, 0
	}
	r.from, r.to = from, to
}
