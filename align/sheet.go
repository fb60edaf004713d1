package align

// Sheet is the prices of every edit of one form under fitted costs, worked out as
// they are asked for and kept, so that a search that lays the form against many
// words pays for each once. All prices are in grains ([Grain] bits) and above 0.
//
// A Sheet serves one goroutine at a time; [Sheet.Reset] readies it for the next
// form in the space it has.
type Sheet struct {
	costs   *Fitted
	form    []Letter
	symbols []symbol
	columns [symbols * symbols]*Prices // of plain letters, by letter before and letter
	rare    map[rareColumn]*Prices     // of all other letters
	spare   []*Prices
	used    []*Prices
	extras  [symbols][]int32 // by letter before
	long    map[stretch][]LongStep
}

// Form returns the form that the prices are for. It is the sheet's own: do not change it.
func (s *Sheet) Form() []Letter { return s.form }

type rareColumn struct {
	left   symbol
	letter Letter
}

// Prices are those of edits that yield one letter of a word after another one.
// It is filled as it is asked.
type Prices struct {
	spot      spot
	letter    Letter
	one, omit []int32 // by letter of the form; 0 where not yet known
}

// LongStep is an edit of several letters: it takes M letters of the form from the
// I-th on, counted from 0.
type LongStep struct {
	I, M  int
	Price int32
}

// Sheet returns the prices for a form.
func (f *Fitted) Sheet(form []Letter) *Sheet {
	s := &Sheet{}
	s.Reset(f, form)
	return s
}

// Reset readies s for another form, under the same costs or others. It keeps form.
func (s *Sheet) Reset(costs *Fitted, form []Letter) {
	s.costs, s.form = costs, form
	s.symbols = s.symbols[:0]
	for _, l := range form {
		s.symbols = append(s.symbols, symbolOf(l))
	}
	clear(s.columns[:])
	clear(s.rare)
	s.spare = append(s.spare, s.used...)
	s.used = s.used[:0]
	for i := range s.extras {
		s.extras[i] = s.extras[i][:0]
	}
	if s.long == nil {
		s.long, s.rare = map[stretch][]LongStep{}, map[rareColumn]*Prices{}
	}
	for to, steps := range s.long {
		s.long[to] = steps[:0]
	}
	for i := range form {
		for m := 1; m <= 3 && i+m <= len(form); m++ {
			for _, e := range costs.longFrom[stretchOf(s.symbols[i:i+m])] {
				s.long[e.to] = append(s.long[e.to], LongStep{i, m, e.price})
			}
		}
	}
}

// Prices returns the prices of edits that yield letter where the word has left
// before it. First says that it is the word's first letter: left does not count.
func (s *Sheet) Prices(left Letter, first bool, letter Letter) *Prices {
	l, c := edge, symbolOf(letter)
	if !first {
		l = symbolOf(left)
	}
	if plain := letter < 0x80 && c != other; plain {
		slot := &s.columns[int(l)*symbols+int(c)]
		if *slot == nil {
			*slot = s.column(l, c, letter)
		}
		return *slot
	}
	key := rareColumn{l, letter}
	if s.rare[key] == nil {
		s.rare[key] = s.column(l, c, letter)
	}
	return s.rare[key]
}

func (s *Sheet) column(left, sym symbol, letter Letter) *Prices {
	var c *Prices
	if n := len(s.spare); n > 0 {
		c, s.spare = s.spare[n-1], s.spare[:n-1]
	} else {
		c = &Prices{}
	}
	s.used = append(s.used, c)
	c.spot, c.letter = spot{left: left, letter: sym}, letter
	c.one, c.omit = zeros(c.one, len(s.form)), zeros(c.omit, len(s.form)+1)
	return c
}

// zeros returns n zeros, in the space of b where there is enough.
func zeros(b []int32, n int) []int32 {
	if cap(b) < n {
		return make([]int32, n)
	}
	b = b[:n]
	clear(b)
	return b
}

// One returns the price of turning letter i of the form into the column's letter,
// which is that of keeping it where they are the same.
func (s *Sheet) One(c *Prices, i int) int32 {
	if p := c.one[i]; p != 0 {
		return p
	}
	at := c.spot
	at.right = s.symbol(i + 1)
	p := positionOf(i, len(s.form))
	if s.form[i] == c.letter {
		c.one[i] = s.costs.kept(at, p)
	} else {
		c.one[i] = s.costs.slipped(at, p, s.symbols[i])
	}
	return c.one[i]
}

// Insert returns the price of inserting the column's letter before letter i of
// the form; len(form) is after the last.
func (s *Sheet) Insert(c *Prices, i int) int32 {
	if p := c.omit[i]; p != 0 {
		return p
	}
	at := c.spot
	at.right = s.symbol(i)
	c.omit[i] = s.costs.slipped(at, positionOf(i, len(s.form)), edge)
	return c.omit[i]
}

// Deletes returns the prices of deleting each letter of the form where the last
// letter of the word so far is left; first says that there is none.
func (s *Sheet) Deletes(left Letter, first bool) []int32 {
	l := edge
	if !first {
		l = symbolOf(left)
	}
	prices := s.extras[l]
	if len(prices) == len(s.form) {
		return prices
	}
	for i := range s.form {
		at := spot{gap: true, left: l, right: s.symbol(i + 1)}
		prices = append(prices, s.costs.slipped(at, positionOf(i, len(s.form)), s.symbols[i]))
	}
	s.extras[l] = prices
	return prices
}

// Swap returns the price of transposing letters i and i+1 of the form, which the
// word has the other way round.
func (s *Sheet) Swap(i int) int32 {
	return s.costs.swap(stretch{s.symbols[i+1], s.symbols[i]}, positionOf(i, len(s.form)))
}

// Long returns the edits of several letters that yield those letters of the word,
// one to three of them, transpositions aside. It allocates nothing.
func (s *Sheet) Long(to []Letter) []LongStep {
	return s.long[stretchIn(to)]
}

func (s *Sheet) symbol(i int) symbol { return at(s.symbols, i) }
