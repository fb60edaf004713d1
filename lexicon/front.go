package lexicon

import "emendary/align"

// front is a row of the table of restricted alignments as far as it is of use:
// cells[i] is the least price of turning the first i letters of the form into
// what is read of a word, for i in [from, to); other cells cost too much.
type front struct {
	cells    []int32
	from, to int
}

// at returns the price of cell i.
func (f *front) at(i int) int32 {
	if i < f.from || i >= f.to {
		return never
	}
	return f.cells[i]
}

// lower takes a way to cell i in.
func (f *front) lower(i int, price int32) {
	if f.from >= f.to {
		f.from, f.to = i, i+1
		f.cells[i] = price
		return
	}
	for ; f.from > i; f.from-- {
		f.cells[f.from-1] = never
	}
	for ; f.to <= i; f.to++ {
		f.cells[f.to] = never
	}
	f.cells[i] = min(f.cells[i], price)
}

// reach says which cells are of use: those whose price, with the least prior of
// words that end as the cell foretells and what is still to be paid, is within what
// the last of the best costs.
//
// A cell foretells that the letters left of the form all come as they are. A word
// that comes out longer or shorter costs perLetter for each letter, which floors
// have in them.
type reach struct {
	limit   int32
	floors  []int32 // by letters of the word, PriorLetters for more
	lost    []int32 // by cell
	ending  int32   // the prior of a word that ends here
	letters int     // of the word, as foretold by cell 0
}

// floor returns the least prior that cell i foretells.
func (r *reach) floor(i int) int32 { return r.floors[min(r.letters-i, PriorLetters)] }

// step works out the front after one more letter, the last of path.
func (b *best) step(depth int, r *reach) {
	s, n := b.sheet, len(b.form)
	path := b.path[:depth]
	letter := path[depth-1]
	left := align.Letter(0)
	if depth > 1 {
		left = path[depth-2]
	}
	at := s.Spot(left, depth == 1, letter)
	last, next := &b.fronts[depth-1], &b.fronts[depth]
	next.from, next.to = last.from, last.to
	cells := next.cells
	if last.from < last.to {
		v := never
		before := last.cells[:last.to]
		for i := last.from; i < len(before); i++ {
			cells[i] = min(v, before[i]+s.Insert(at, i))
			if i < n {
				v = before[i] + s.One(at, i)
			}
		}
		if last.to <= n {
			cells[last.to] = v
			next.to++
		}
	}
	if depth >= 2 && left != letter {
		two := &b.fronts[depth-2]
		for i := two.from; i < min(two.to, n-1); i++ {
			if b.form[i] == letter && b.form[i+1] == left {
				next.lower(i+2, two.cells[i]+s.Swap(i))
			}
		}
	}
	ending := s.Ending(at)
	for k := range ending {
		e := &ending[k]
		if e.N <= depth {
			if v := b.fronts[depth-e.N].at(e.I); v < never && e.Yields(path) {
				next.lower(e.I+e.M, v+e.Price)
			}
		}
	}
	v, from, to := never, n+1, 0
	for i := next.from; i < next.to || i <= n && v < never; i++ {
		c := never
		if i < next.to {
			c = cells[i]
		}
		if v < never {
			c = min(c, v+s.Delete(at, i-1))
		}
		if c > r.limit-min(r.ending, r.floor(i)+r.lost[i]) {
			c = never
		} else {
			from, to = min(from, i), i+1
		}
		cells[i], v = c, c
	}
	next.from, next.to = from, to
}

// chances are what letters may do after a front. Those in next may do this or
// that; all others may only be inserted or come in for another, for which so much
// is left.
type chances struct {
	next        uint32 // symbols
	insert, one int32
}

// long is an edit of several letters.
type long struct {
	i, n  int
	price int32
	to    [3]uint8 // symbols
}

// chances returns what letters may do after the front at a depth, which had reach r.
func (b *best) chances(depth int, r *reach) chances {
	n := len(b.form)
	c := chances{0, -never, -never}
	f := &b.fronts[depth]
	for i := f.from; i < f.to; i++ {
		// lost may count one letter as inserted that is the one to come.
		rest := r.limit - r.floor(i) - f.cells[i] + b.losses.leastInsert
		c.insert = max(c.insert, rest-r.lost[i])
		if i < n {
			c.next |= 1 << b.losses.symbols[i]
			c.one = max(c.one, rest-r.lost[i+1])
		}
		if i+1 < n && b.sheet.Swap(i) <= rest {
			c.next |= 1 << b.losses.symbols[i+1]
		}
	}
	if depth > 0 {
		f = &b.fronts[depth-1]
		for i := f.from; i < min(f.to, n-1); i++ {
			if b.form[i+1] == b.path[depth-1] {
				c.next |= 1 << b.losses.symbols[i]
			}
		}
	}
	for k := range b.longs {
		e := &b.longs[k]
		if v := b.fronts[depth].at(e.i); v+e.price <= r.limit {
			c.next |= 1 << e.to[0]
		}
		for read := 1; read < min(e.n, depth+1); read++ {
			if e.to[read-1] != b.symbols[depth] || read > 1 && e.to[0] != b.symbols[depth-1] {
				continue
			}
			if v := b.fronts[depth-read].at(e.i); v+e.price <= r.limit {
				c.next |= 1 << e.to[read]
			}
		}
	}
	return c
}

// allow reports whether a letter with a symbol may lead on from a depth.
func (b *best) allow(c *chances, symbol uint8, depth int) bool {
	symbol &= 31
	if c.next>>symbol&1 != 0 || c.one >= b.losses.one[symbol] {
		return true
	}
	if depth > 0 && b.symbols[depth] == symbol {
		return c.insert >= b.losses.twice[symbol]
	}
	return c.insert >= b.losses.insert[symbol]
}
