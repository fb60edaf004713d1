package lexicon

import "emendary/align"

// forward is on its way over a trie from the words' starts: that of a layer, or
// that of the own words.
type forward struct {
	*best
	trie     *trie
	toLetter []align.Letter // by label
	symbol   []uint8        // by label
	below    []uint16       // by arc: the set of the words below; nil for own words
	listed   []uint16       // by word: its set
	floors   []int32        // by set, for own words by arc
	whole    bool           // there is no search backward
}

// start walks the whole trie.
func (w *forward) start(least int32) {
	c := w.cuts(w.room(least))
	r := &w.rows[0]
	r.from, r.to, r.cells[0] = 0, 1, 0
	at := align.SpotOf(0, 0, 0)
	for i := range w.prices.n {
		w.delete(r, at, 0, i+1, c)
		if r.to < i+2 {
			break
		}
	}
	w.node(w.trie.root, 0, 0, c)
}

// room returns what edits of words with that floor may cost.
func (b *best) room(floor int32) int32 { return b.bound() - b.prices.base - floor }

func (w *forward) cuts(room int32) cuts {
	if w.whole {
		return cuts{room, room}
	}
	return w.forwardCuts(room)
}

// floor returns the floor of the words through an arc, of which the first has that
// number.
func (w *forward) floor(arc, number uint32) int32 {
	if w.below == nil {
		return w.floors[arc]
	}
	floor := never
	if w.trie.arcs[2*arc+1] != 0 {
		floor = w.floorOf(w.below[arc])
	}
	if w.trie.arcs[2*arc]&endsWord != 0 {
		set := uint16(0)
		if int(number) < len(w.listed) {
			set = w.listed[number]
		}
		floor = min(floor, w.floorOf(set))
	}
	return floor
}

// floorOf returns the floor of a set, that of all words for one that does not exist,
// as in damaged data.
func (w *forward) floorOf(set uint16) int32 {
	if int(set) >= len(w.floors) {
		set = 0
	}
	return w.floors[set]
}

// node walks the arcs of a node at a depth, whose words have cuts c; number is that
// of its first word.
func (w *forward) node(node uint32, depth int, number uint32, c cuts) {
	if depth == MaxLetters {
		return
	}
	allowed := w.next(depth, c)
	for arc := node; ; arc++ {
		head := w.trie.arcs[2*arc]
		if symbol := w.symbol[head>>labelBit] & 31; allowed>>symbol&1 != 0 {
			w.follow(arc, depth+1, number+w.trie.skips[arc])
		}
		if head&lastArc != 0 {
			return
		}
	}
}

// next returns the symbols of the letters that may lead on from the row at a depth.
func (w *forward) next(depth int, c cuts) (allowed uint32) {
	p, r := &w.prices, &w.rows[depth]
	symbol := w.symbols[depth]
	r.half = 0
	for i := r.from; i < r.to; i++ {
		v := r.cells[i]
		if v >= never {
			continue
		}
		insert, one := c.last, c.last
		if i <= p.middle {
			insert = c.first
			if i < p.middle {
				one = c.first
			}
		}
		letters := depth + p.n - i
		allowed |= w.sheet.InsertsAtMost(symbol, i, insert-v-p.lengths[letters+1]+p.lengths[letters])
		if i == p.n {
			continue
		}
		allowed |= 1<<p.symbols[i] | w.sheet.OnesAtMost(symbol, i, one-v+p.keep[i])
		if i+1 < p.n && v+p.swaps[i] <= c.last {
			r.half |= 1 << p.symbols[i+1]
		}
		for k := range p.starting[i] {
			e := &p.starting[i][k]
			if v+p.long(e, letters) <= c.last {
				if e.N > 1 {
					r.half |= 1 << e.Symbols()[0]
				} else {
					allowed |= 1 << e.Symbols()[0]
				}
			}
		}
	}
	allowed |= r.half
	if depth > 0 {
		allowed |= w.completing(depth)
	}
	return allowed
}

// completing returns the symbols of letters that go on with edits half read at a
// depth.
func (w *forward) completing(depth int) (symbols uint32) {
	p, symbol := &w.prices, w.symbols[depth]&31
	r := &w.rows[depth-1]
	if r.half>>symbol&1 != 0 {
		for i := r.from; i < min(r.to, p.n-1); i++ {
			if p.symbols[i+1] == symbol {
				symbols |= 1 << p.symbols[i]
			}
		}
		for k := range p.beginning[symbol] {
			e := &p.beginning[symbol][k]
			if e.N > 1 && r.at(e.I) < never {
				symbols |= 1 << e.Symbols()[1]
			}
		}
	}
	if !w.halfOfThree(depth) {
		return symbols
	}
	r = &w.rows[depth-2]
	first := w.symbols[depth-1] & 31
	for k := range p.beginning[first] {
		e := &p.beginning[first][k]
		if to := e.Symbols(); e.N > 2 && to[1] == symbol && r.at(e.I) < never {
			symbols |= 1 << to[2]
		}
	}
	return symbols
}

// halfOfThree reports whether the last two letters at a depth may be the first ones of
// an edit of three.
func (w *forward) halfOfThree(depth int) bool {
	if depth < 2 || w.rows[depth-2].half>>(w.symbols[depth-1]&31)&1 == 0 {
		return false
	}
	beginning := w.prices.beginning[w.symbols[depth-1]&31]
	for k := range beginning {
		if e := &beginning[k]; e.N > 2 && e.Symbols()[1] == w.symbols[depth] {
			return true
		}
	}
	return false
}

// follow follows an arc to a depth; number is that of the first word there.
func (w *forward) follow(arc uint32, depth int, number uint32) {
	head, child := w.trie.arcs[2*arc], w.trie.arcs[2*arc+1]
	label := head >> labelBit
	w.path[depth-1], w.symbols[depth] = w.toLetter[label], w.symbol[label]&31
	c := w.cuts(w.room(w.floor(arc, number)))
	r := w.step(depth, c)
	if head&endsWord != 0 {
		if r.to > w.prices.n {
			w.found(w.path[:depth])
		}
		number++
	}
	if child == 0 {
		return
	}
	if r.from < r.to || w.rows[depth-1].half>>w.symbols[depth]&1 != 0 || w.halfOfThree(depth) {
		w.node(child, depth, number, c)
	}
}

// step works out the row after one more letter, the last of path.
func (w *forward) step(depth int, c cuts) *row {
	p, s := &w.prices, w.sheet
	letter, symbol, left := w.path[depth-1], w.symbols[depth], w.symbols[depth-1]
	at := align.SpotOf(letter, symbol, left)
	last, r := &w.rows[depth-1], &w.rows[depth]
	r.from, r.to = last.from, last.from
	if last.from < last.to {
		v := never // by One
		letters := depth - 1 + p.n - last.from
		for i := last.from; i < last.to; i, letters = i+1, letters-1 {
			before := last.cells[i]
			r.cells[i] = min(v, before+s.Insert(at, i)+p.lengths[letters+1]-p.lengths[letters])
			v = never
			if i < p.n {
				v = before + s.One(at, i) - p.keep[i]
			}
		}
		r.to = last.to
		if last.to <= p.n {
			r.cells[last.to] = v
			r.to++
		}
	}
	if depth >= 2 {
		w.swapped(r, depth)
	}
	w.ending(r, depth, at)
	w.prune(r, at, depth, c)
	return r
}

// swapped takes transpositions into row r at a depth.
func (w *forward) swapped(r *row, depth int) {
	before, p := &w.rows[depth-2], &w.prices
	if before.half>>(w.symbols[depth-1]&31)&1 == 0 {
		return
	}
	letter, left := w.path[depth-1], w.path[depth-2]
	if letter == left {
		return
	}
	for i := before.from; i < min(before.to, p.n-1); i++ {
		if w.form[i] == letter && w.form[i+1] == left && before.cells[i] < never {
			r.lower(i+2, before.cells[i]+p.swaps[i])
		}
	}
}

// ending takes edits of several letters, transpositions aside, into row r at a depth.
func (w *forward) ending(r *row, depth int, at align.Spot) {
	ending := w.sheet.Ending(at)
	for k := range ending {
		e := &ending[k]
		if e.N > depth {
			continue
		}
		v := w.rows[depth-e.N].at(e.I)
		if v < never && e.Yields(w.path[:depth]) {
			r.lower(e.I+e.M, v+w.prices.long(e, depth-e.N+w.prices.n-e.I))
		}
	}
}

// prune takes deletions into row r, and leaves out cells that cost too much.
func (w *forward) prune(r *row, at align.Spot, depth int, c cuts) {
	p := &w.prices
	from, to := p.n+1, 0
	for i := r.from; i < r.to; i++ {
		cut := c.last
		if i <= p.middle {
			cut = c.first
		}
		if r.cells[i] > cut {
			r.cells[i] = never
		} else {
			from, to = min(from, i), i+1
		}
		if to == i+1 && i < p.n {
			w.delete(r, at, depth, i+1, c)
		}
	}
	if from >= to {
		from, to = 0, 0
	}
	r.from, r.to = from, to
}

// delete takes the deletion of the form's letter before cell i into row r where it
// does not cost too much.
func (w *forward) delete(r *row, at align.Spot, depth, i int, c cuts) {
	p := &w.prices
	letters := depth + p.n - i
	v := r.cells[i-1] + w.sheet.Delete(at, i-1) - p.keep[i-1] + p.lengths[letters] - p.lengths[letters+1]
	cut := c.last
	if i <= p.middle {
		cut = c.first
	}
	if v > cut {
		return
	}
	if i == r.to {
		r.cells[i] = v
		r.to++
	} else {
		r.cells[i] = min(r.cells[i], v)
	}
}
