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

	Shift int32 // below all prices of edits that lengthen or shorten, for each letter
}

// Symbol is a letter as prices tell letters apart.
func Symbol(l Letter) int { return int(symbolOf(l)) }

// Least works out the bounds for the form, in the space of l.
func (s *Sheet) Least(l *Least) {
	n := len(s.form)
	l.Delete = l.Delete[:0]
	l.Shift = math.MaxInt32
	for i := range n {
		p := s.extra[i]
		if p.least == 0 {
			p.least = math.MaxInt32
			for left := range symbol(symbols) {
				p.least = min(p.least, s.deleted(left, i))
			}
		}
		l.Delete = append(l.Delete, p.least)
		l.Shift = min(l.Shift, p.least)
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
			l.Shift = min(l.Shift, insert[i], twice[i])
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
		if shift := e.Shift(); shift > 0 {
			l.Shift = min(l.Shift, e.Price/int32(shift))
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
