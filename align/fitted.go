package align

import (
	"maps"
	"math"
	"slices"
)

// Grain is the unit that fitted costs are whole multiples of, in bits: sums of
// them are exact, in any order.
const Grain = 1.0 / 1024

// Fitted is costs in bits, −log₂ of the probability that a writer who means the
// word writes the form there: the noisy-channel model (Kernighan, Church and Gale
// 1990, section 2), with the slips conditioned on the neighbouring letters and on
// the place in the form, and with edits of up to three letters on a side (Brill
// and Moore 2000, section 3). [Fit] makes them of pairs, [ReadCosts] of a file.
//
// What a slip is conditioned on is known once the word is read as far as the edit
// goes: the word's letter before it, the form's letter after it, start, middle or
// end of the form. Probabilities at a rarely seen spot lean on those of more
// common ones: of the letter with one neighbour, of the letter, of all letters
// that look like it; and an unseen letter has its share of its kind, where a
// letter from a neighbouring key is likelier than another.
//
// A Fitted is immutable and may be used by several goroutines at once. Letters
// are taken to be folded ([Alphabet.Fold]).
type Fitted struct {
	Origin Origin

	tally    *tally
	keys     keyboard
	smooth   smoothing
	kinds    [sides][positions][kinds]float64 // probabilities of the kinds where something goes wrong
	swaps    [positions]float64               // probabilities of a transposition
	chances  *chances
	long     map[longEdit]int32      // in grains
	longFrom map[stretch][]longPrice // the same, by the letters of the form
}

// Origin says where costs come from.
type Origin struct {
	Source  string // the pairs: who made them, where from
	Licence string
	Date    string // of the fitting, as 2006-01-02
	Pairs   int
}

// smoothing is how many meetings the next coarser estimate counts for, from the
// coarsest level to the finest: for the chance that something goes wrong, and for
// what is written then.
type smoothing struct {
	wrong, written [3]float64
	swap, long     float64
}

// longPrice is the price of an edit of several letters.
type longPrice struct {
	to    stretch
	price int32
}

// chances are the counts of a tally by spot, and summed over neighbours, laid out
// to be looked up fast.
type chances struct {
	letter [sides][symbols]ratio
	left   [sides][symbols][symbols]ratio // letter before, letter
	spots  []ratio                        // by index
	// What was written, likewise; the rows of the finer levels are found by index.
	letterSlips [sides][symbols][symbols]float64
	leftRow     [sides][symbols][symbols]uint16
	spotRow     []uint16
	rows        [][symbols]float64 // row 0 is empty
}

func chancesOf(t *tally) *chances {
	c := &chances{
		spots: make([]ratio, 1<<16), spotRow: make([]uint16, 1<<16), rows: make([][symbols]float64, 1, 1+2*len(t.slips)),
	}
	add := func(r *ratio, q ratio) { r.met, r.wrong = r.met+q.met, r.wrong+q.wrong }
	for _, i := range slices.Sorted(maps.Keys(t.spots)) { // sums are the same again in the same order
		s, r := spotAt(i), t.spots[i]
		add(&c.letter[s.side()][s.letter], r)
		add(&c.left[s.side()][s.left][s.letter], r)
		c.spots[i] = r
	}
	for _, i := range slices.Sorted(maps.Keys(t.slips)) {
		s, written := spotAt(i), t.slips[i]
		c.spotRow[i] = uint16(len(c.rows))
		c.rows = append(c.rows, written)
		row := &c.leftRow[s.side()][s.left][s.letter]
		if *row == 0 {
			*row = uint16(len(c.rows))
			c.rows = append(c.rows, [symbols]float64{})
		}
		for w, n := range written {
			c.letterSlips[s.side()][s.letter][w] += n
			c.rows[*row][w] += n
		}
	}
	return c
}

// blend is a ratio smoothed towards p, which counts for strength meetings.
func (r ratio) blend(p, strength float64) float64 {
	return (r.wrong + strength*p) / (r.met + strength)
}

// wrong returns the probability that something goes wrong at s.
func (f *Fitted) wrong(s spot, p position) float64 {
	side, by := s.side(), &f.smooth.wrong
	q := f.tally.looks[side][p][s.look()].blend(0.03, 30)
	q = f.chances.letter[side][s.letter].blend(q, by[0])
	q = f.chances.left[side][s.left][s.letter].blend(q, by[1])
	q = f.chances.spots[s.index()].blend(q, by[2])
	return q
}

// written returns the probability of that letter (the edge for none) being
// written at s where something goes wrong.
func (f *Fitted) written(s spot, p position, letter symbol) float64 {
	side, by := s.side(), &f.smooth.written
	kind, share := f.keys.kindOf(s, letter)
	q := f.kinds[side][p][kind] * share
	q = ratio{f.chances.letter[side][s.letter].wrong, f.chances.letterSlips[side][s.letter][letter]}.blend(q, by[0])
	q = ratio{f.chances.left[side][s.left][s.letter].wrong, f.chances.rows[f.chances.leftRow[side][s.left][s.letter]][letter]}.blend(q, by[1])
	q = ratio{f.chances.spots[s.index()].wrong, f.chances.rows[f.chances.spotRow[s.index()]][letter]}.blend(q, by[2])
	return q
}

// price turns a probability into grains; it is at least one grain, so that no
// path is free, and at most what no alignment of words comes to.
func price(p float64) int32 {
	return int32(max(1, min(math.Round(-math.Log2(p)/Grain), 64/Grain)))
}

// kept, slipped and added price what happens at a spot, in grains: the letter
// written as it is, another letter (or none) written, a letter too many.
func (f *Fitted) kept(s spot, p position) int32 { return price(1 - f.wrong(s, p)) }

func (f *Fitted) slipped(s spot, p position, letter symbol) int32 {
	if side, ok := s.spaceOf(letter); ok {
		return price(f.tally.spaces[side].blend(0.005, 200))
	}
	return price(f.wrong(s, p) * f.written(s, p, letter))
}

// swap prices the transposition of the letters to, as the word has them.
func (f *Fitted) swap(to stretch, p position) int32 {
	return price(ratio{f.tally.met[to], f.tally.swapped[to]}.blend(f.swaps[p], f.smooth.swap))
}

// newFitted works out the probabilities that a tally gives.
func newFitted(t *tally, k keyboard, by smoothing) *Fitted {
	f := &Fitted{tally: t, keys: k, smooth: by, chances: chancesOf(t), long: map[longEdit]int32{}, longFrom: map[stretch][]longPrice{}}
	for side := range sides {
		for p := range positions {
			all := 0.0
			for _, n := range t.kinds[side][p] {
				all += n
			}
			for kind, n := range t.kinds[side][p] {
				f.kinds[side][p][kind] = (n + 1) / (all + kinds)
			}
		}
	}
	for p := range positions {
		f.swaps[p] = t.swaps[p].blend(0.002, 100)
	}
	for _, e := range t.longEdits() {
		n, met := t.long[e], t.met[e.to]
		if e.to.size() == 1 {
			met += f.chances.letter[0][e.to[0]].met
		}
		c := price(n / (met + by.long))
		f.long[e] = c
		f.longFrom[e.from] = append(f.longFrom[e.from], longPrice{e.to, c})
	}
	return f
}

// Span implements [Costs].
func (f *Fitted) Span() (m, n int) { return 3, 3 }

// Cost implements [Costs], in bits. It allocates nothing.
func (f *Fitted) Cost(form []Letter, i, m int, word []Letter, j, n int) float64 {
	if i < 0 || m < 0 || i > len(form)-m || j < 0 || n < 0 || j > len(word)-n || m > 3 || n > 3 {
		return math.Inf(1)
	}
	p := positionOf(i, len(form))
	grains := int32(-1)
	switch {
	case m == 1 && n == 1 && form[i] == word[j]:
		grains = f.kept(spot{left: symbolAt(word, j-1), letter: symbolOf(word[j]), right: symbolAt(form, i+1)}, p)
	case m <= 1 && n == 1:
		grains = f.slipped(spot{left: symbolAt(word, j-1), letter: symbolOf(word[j]), right: symbolAt(form, i+m)}, p, symbolIn(form, i, m))
	case m == 1 && n == 0:
		grains = f.slipped(spot{gap: true, left: symbolAt(word, j-1), right: symbolAt(form, i+1)}, p, symbolOf(form[i]))
	case m == 2 && n == 2 && swapped(form[i:i+2], word[j:j+2]):
		grains = f.swap(stretchIn(word[j:j+2]), p)
	default:
		if long, ok := f.long[longEdit{stretchIn(form[i : i+m]), stretchIn(word[j : j+n])}]; ok {
			grains = long
		}
	}
	if grains < 0 {
		return math.Inf(1)
	}
	return float64(grains) * Grain
}

func symbolAt(letters []Letter, i int) symbol {
	if i < 0 || i >= len(letters) {
		return edge
	}
	return symbolOf(letters[i])
}

func symbolIn(letters []Letter, i, m int) symbol {
	if m == 0 {
		return edge
	}
	return symbolOf(letters[i])
}

func stretchIn(letters []Letter) stretch {
	var t stretch
	for i, l := range letters {
		t[i] = symbolOf(l)
	}
	return t
}
