package align

// Sheet is the prices of every edit of one form under fitted costs, worked out as
// they are asked for and kept from form to form, so that a search that lays forms
// against many words pays for each once. All prices are in grains ([Grain] bits) and
// above 0.
//
// A price depends on the form's letters by the one or two it is about and their
// place, which many forms share: after some hundred forms most are known. They
// take some megabytes. So a Sheet is best used again, by [Sheet.Reset]; it serves
// one goroutine at a time.
type Sheet struct {
	costs   *Fitted
	form    []Letter
	symbols []symbol

	// By letter of the form, one more where they go with the gap after it:
	keep, extra   []*byLeft
	replace, omit []*byBoth

	// All that were asked for under these costs, by place, letter of the form (0
	// for gaps) and the one after it.
	keeps, extras   map[spotOfForm]*byLeft
	replaces, omits map[spotOfForm]*byBoth

	long   []LongEdit
	ending [symbols][]LongEdit // by the last letter they yield
	swaps  []int32
}

// spotOfForm is what prices take from the form.
type spotOfForm struct {
	p              position
	written, right symbol
}

// byLeft are prices by the letter of the word before; 0 where not yet known.
type byLeft struct {
	price [symbols]int32
	least int32
}

// byBoth are prices by the letter of the word and the one before it.
type byBoth struct {
	price [symbols * symbols]int32
	least [symbols]int32            // by letter of the word: where the one before is another
	reach [symbols]*[Reaches]uint32 // by the letter before: see atMost
}

// LongEdit is an edit of several letters: it takes M letters of the form from the
// I-th on, counted from 0, and yields N letters of a word.
type LongEdit struct {
	I, M, N int
	Price   int32
	to      stretch
}

// Sheet returns the prices for a form.
func (f *Fitted) Sheet(form []Letter) *Sheet {
	s := &Sheet{}
	s.Reset(f, form)
	return s
}

// Form returns the form that the prices are for. It is the sheet's own: do not
// change it.
func (s *Sheet) Form() []Letter { return s.form }

// Reset readies s for another form, under the same costs or others. It keeps form.
func (s *Sheet) Reset(costs *Fitted, form []Letter) {
	if s.costs != costs {
		*s = Sheet{
			costs: costs, keeps: map[spotOfForm]*byLeft{}, extras: map[spotOfForm]*byLeft{},
			replaces: map[spotOfForm]*byBoth{}, omits: map[spotOfForm]*byBoth{},
		}
	}
	s.form = form
	s.symbols = s.symbols[:0]
	for _, l := range form {
		s.symbols = append(s.symbols, symbolOf(l))
	}
	s.keep, s.extra, s.replace, s.omit, s.swaps = s.keep[:0], s.extra[:0], s.replace[:0], s.omit[:0], s.swaps[:0]
	for i := range form {
		at := spotOfForm{positionOf(i, len(form)), s.symbols[i], s.symbol(i + 1)}
		s.keep = append(s.keep, kept(s.keeps, at))
		s.extra = append(s.extra, kept(s.extras, at))
		s.replace = append(s.replace, kept(s.replaces, at))
		if i > 0 {
			s.swaps = append(s.swaps, costs.swap(stretch{s.symbols[i], s.symbols[i-1]}, positionOf(i-1, len(form))))
		}
	}
	for i := range len(form) + 1 {
		s.omit = append(s.omit, kept(s.omits, spotOfForm{positionOf(i, len(form)), edge, s.symbol(i)}))
	}
	s.findLong()
}

// kept returns the prices at a spot, from those there are or new ones.
func kept[P any](all map[spotOfForm]*P, at spotOfForm) *P {
	p := all[at]
	if p == nil {
		p = new(P)
		all[at] = p
	}
	return p
}

// findLong finds the edits of several letters that the form has room for.
func (s *Sheet) findLong() {
	s.long = s.long[:0]
	for i := range s.ending {
		s.ending[i] = s.ending[i][:0]
	}
	for i := range s.form {
		for m := 1; m <= 3 && i+m <= len(s.form); m++ {
			for _, e := range s.costs.longFrom(stretchOf(s.symbols[i : i+m])) {
				l := LongEdit{i, m, e.to.size(), e.price, e.to}
				s.long = append(s.long, l)
				last := e.to[l.N-1]
				s.ending[last] = append(s.ending[last], l)
			}
		}
	}
}

// Spot is a letter of a word with the one before it, as prices look at them.
type Spot struct {
	letter Letter
	index  int // in byBoth
}

// Spot returns the spot of letter with left before it. First says that it is the
// word's first letter: left does not count.
func (s *Sheet) Spot(left Letter, first bool, letter Letter) Spot {
	l := edge
	if !first {
		l = symbolOf(left)
	}
	return Spot{letter, int(symbolOf(letter))<<5 | int(l)}
}

// SpotOf is Sheet.Spot for callers that know the symbols ([Symbol]) of letter and the
// one before it, 0 for none.
func SpotOf(letter Letter, symbol, left uint8) Spot {
	return Spot{letter, int(symbol&31)<<5 | int(left&31)}
}

func (at Spot) letterSymbol() symbol { return symbol(at.index >> 5) }
func (at Spot) left() symbol         { return symbol(at.index & 31) }

// One returns the price of turning letter i of the form into the letter at a spot,
// which is that of keeping it where they are the same.
func (s *Sheet) One(at Spot, i int) int32 {
	p := s.replace[i].price[at.index]
	if s.form[i] == at.letter {
		p = s.keep[i].price[at.index&31]
	}
	if p == 0 {
		return s.newOne(at, i)
	}
	return p
}

func (s *Sheet) newOne(at Spot, i int) int32 {
	p := positionOf(i, len(s.form))
	where := spot{left: at.left(), letter: at.letterSymbol(), right: s.symbol(i + 1)}
	if s.form[i] == at.letter {
		price := s.costs.kept(where, p)
		s.keep[i].price[at.left()] = price
		return price
	}
	price := s.costs.slipped(where, p, s.symbols[i])
	s.replace[i].price[at.index] = price
	return price
}

// Insert returns the price of inserting the letter at a spot before letter i of
// the form; len(form) is after the last.
func (s *Sheet) Insert(at Spot, i int) int32 {
	if p := s.omit[i].price[at.index]; p != 0 {
		return p
	}
	return s.newInsert(at, i)
}

func (s *Sheet) newInsert(at Spot, i int) int32 {
	where := spot{left: at.left(), letter: at.letterSymbol(), right: s.symbol(i)}
	price := s.costs.slipped(where, positionOf(i, len(s.form)), edge)
	s.omit[i].price[at.index] = price
	return price
}

// Delete returns the price of deleting letter i of the form after the letter at
// a spot.
func (s *Sheet) Delete(after Spot, i int) int32 {
	return s.deleted(after.letterSymbol(), i)
}

func (s *Sheet) deleted(left symbol, i int) int32 {
	if p := s.extra[i].price[left]; p != 0 {
		return p
	}
	return s.newDeleted(left, i)
}

func (s *Sheet) newDeleted(left symbol, i int) int32 {
	where := spot{gap: true, left: left, right: s.symbol(i + 1)}
	price := s.costs.slipped(where, positionOf(i, len(s.form)), s.symbols[i])
	s.extra[i].price[left] = price
	return price
}

// Swap returns the price of transposing letters i and i+1 of the form, which the
// word has the other way round.
func (s *Sheet) Swap(i int) int32 { return s.swaps[i] }

// Ending returns the edits of several letters, transpositions aside, that may
// yield the letter at a spot as their last one: see [LongEdit.Yields].
func (s *Sheet) Ending(at Spot) []LongEdit { return s.ending[at.letterSymbol()] }

// Long returns all edits of several letters, transpositions aside.
func (s *Sheet) Long() []LongEdit { return s.long }

// Yields reports whether e yields the last N of letters, where there are as many.
func (e *LongEdit) Yields(letters []Letter) bool {
	from := len(letters) - e.N
	if from < 0 {
		return false
	}
	for i, l := range letters[from:] {
		if symbolOf(l) != e.to[i] {
			return false
		}
	}
	return true
}

// Symbols returns the symbols ([Symbol]) of the letters that e yields.
func (e *LongEdit) Symbols() [3]uint8 {
	return [3]uint8{uint8(e.to[0]), uint8(e.to[1]), uint8(e.to[2])}
}

func (s *Sheet) symbol(i int) symbol { return at(s.symbols, i) }
