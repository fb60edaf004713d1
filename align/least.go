package align

import "math"

// Least is bounds below the prices of a form's edits, whatever letter of the word
// stands before: for a search that looks ahead. They are by symbol ([Symbol]) of the
// word's letter and by letter of the form.
type Least struct {
	One    [symbols][]int32
	Insert [symbols][]int32 // where the letter before is another …
	Twice  [symbols][]int32 // … and where it is the same
	Delete []int32

	Lengthen int32 // below all prices of edits that make the word longer than the form, for each letter
	Shorten  int32 // likewise shorter
}

// Symbol is a letter as prices tell letters apart.
func Symbol(l Letter) int { return int(symbolOf(l)) }

// Least works out the bounds for the form, in the space of l.
func (s *Sheet) Least(l *Least) {
	n := len(s.form)
	l.Delete = l.Delete[:0]
	l.Lengthen, l.Shorten = math.MaxInt32, math.MaxInt32
	for i := range n {
		p := s.extra[i]
		if p.least == 0 {
			p.least = math.MaxInt32
			for left := range symbol(symbols) {
				p.least = min(p.least, s.deleted(left, i))
			}
		}
		l.Delete = append(l.Delete, p.least)
		l.Shorten = min(l.Shorten, p.least)
	}
	for c := symbol(1); c < symbols; c++ {
		one, insert, twice := l.One[c][:0], l.Insert[c][:0], l.Twice[c][:0]
		for i := range n + 1 {
			p := s.omit[i]
			if p.least[c] == 0 {
				p.least[c] = s.leastInsert(c, i)
			}
			insert = append(insert, p.least[c])
			twice = append(twice, s.Insert(Spot{index: int(c)<<5 | int(c)}, i))
			l.Lengthen = min(l.Lengthen, insert[i], twice[i])
			if i < n {
				q := s.replace[i]
				if q.least[c] == 0 {
					q.least[c] = s.leastOne(c, i)
				}
				one = append(one, q.least[c])
			}
		}
		l.One[c], l.Insert[c], l.Twice[c] = one, insert, twice
	}
	for _, e := range s.long {
		switch {
		case e.N > e.M:
			l.Lengthen = min(l.Lengthen, e.Price/int32(e.N-e.M))
		case e.N < e.M:
			l.Shorten = min(l.Shorten, e.Price/int32(e.M-e.N))
		}
	}
}

func (s *Sheet) leastInsert(c symbol, i int) int32 {
	least := int32(math.MaxInt32)
	for left := range symbols {
		if symbol(left) != c {
			least = min(least, s.Insert(Spot{index: int(c)<<5 | left}, i))
		}
	}
	return least
}

// leastOne is the least price of turning letter i of the form into a letter with
// symbol c, which may be that very letter.
func (s *Sheet) leastOne(c symbol, i int) int32 {
	least := int32(math.MaxInt32)
	for left := range symbols {
		least = min(least, s.One(Spot{-1, int(c)<<5 | left}, i))
		if c == s.symbols[i] {
			least = min(least, s.One(Spot{s.form[i], int(c)<<5 | left}, i))
		}
	}
	return least
}

const (
	// ReachBits and Reaches are the steps in which [Sheet.InsertsAtMost] and
	// [Sheet.OnesAtMost] tell prices apart: half a bit each, up to 32 bits.
	ReachBits = 9
	Reaches   = 64
)

// InsertsAtMost returns a set of symbols ([Symbol]), a bit each, with all those whose
// insertion before letter i of the form, after a letter with symbol left, costs at
// most price; and maybe some that cost up to half a bit more.
func (s *Sheet) InsertsAtMost(left uint8, i int, price int32) uint32 {
	return s.omit[i].atMost(left, price, func(at Spot) int32 { return s.Insert(at, i) })
}

// OnesAtMost is the same for the symbols of letters that letter i of the form may be
// written for: other letters than that one.
func (s *Sheet) OnesAtMost(left uint8, i int, price int32) uint32 {
	return s.replace[i].atMost(left, price, func(at Spot) int32 { return s.One(at, i) })
}

func (b *byBoth) atMost(left uint8, price int32, of func(Spot) int32) uint32 {
	step := price >> ReachBits
	switch {
	case step < 0:
		return 0
	case step >= Reaches:
		return math.MaxUint32
	}
	sets := b.reach[left&(symbols-1)]
	if sets == nil {
		sets = new([Reaches]uint32)
		for c := symbol(1); c < symbols; c++ {
			for n := of(Spot{-1, int(c)<<5 | int(left)}) >> ReachBits; n < Reaches; n++ {
				sets[n] |= 1 << c
			}
		}
		b.reach[left&(symbols-1)] = sets
	}
	return sets[step]
}
