package align

import (
	"cmp"
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

	counts  *counts
	keys    keyboard
	smooth  smoothing
	kinds   [sides][positions][kinds]float64 // probabilities of the kinds where something goes wrong
	swaps   [positions]float64               // probabilities of a transposition
	chances *chances
	long    []longPrice // by the letters of the form, then of the word
	author  *author     // nil where they are those of all writers
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

// longPrice is the price of an edit of several letters, in grains.
type longPrice struct {
	longEdit
	price int32
}

// blend is a ratio smoothed towards p, which counts for strength meetings.
func (r ratio) blend(p, strength float64) float64 {
	return (r.wrong + strength*p) / (r.met + strength)
}

// wrong returns the probability that something goes wrong at s.
func (f *Fitted) wrong(s spot, p position) float64 {
	side, by := s.side(), &f.smooth.wrong
	here := ratio{}
	number, _, _ := f.find(s)
	if number >= 0 {
		here = f.counts.spots[number].ratio
	}
	q := f.counts.looks[side][p][s.look()].blend(0.03, 30)
	q = f.chances.letter[side][s.letter].blend(q, by[0])
	q = f.chances.group[s.index()/symbols].blend(q, by[1])
	return here.blend(q, by[2])
}

// written returns the probability of that letter (the edge for none) being
// written at s where something goes wrong.
func (f *Fitted) written(s spot, p position, letter symbol) float64 {
	side, by := s.side(), &f.smooth.written
	here := ratio{}
	number, first, next := f.find(s)
	if number >= 0 {
		here = ratio{f.counts.spots[number].wrong, written(f.counts.slipsOf(number, number+1), letter)}
	}
	kind, share := f.keys.kindOf(s, letter)
	q := f.kinds[side][p][kind] * share
	q = ratio{f.chances.letter[side][s.letter].wrong, f.chances.letterSlips[side][s.letter][letter]}.blend(q, by[0])
	q = ratio{f.chances.group[s.index()/symbols].wrong, written(f.counts.slipsOf(first, next), letter)}.blend(q, by[1])
	return here.blend(q, by[2])
}

// price turns a probability into grains; it is at least one grain, so that no
// path is free, and at most what no alignment of words comes to.
func price(p float64) int32 {
	return int32(max(1, min(math.Round(-math.Log2(p)/Grain), 64/Grain)))
}

// marksOff is the probability that a letter comes with other marks than the word
// has, or without: cliche. It is judged, not counted: lists of misspellings hold few
// words with marks, while many writers leave them all out.
const marksOff = 1. / 12

// kept, slipped and added price what happens at a spot, in grains: the letter
// written as it is, another letter (or none) written, a letter too many.
func (f *Fitted) kept(s spot, p position) int32 { return price(1 - f.wrong(s, p)) }

func (f *Fitted) slipped(s spot, p position, letter symbol) int32 {
	if side, ok := s.spaceOf(letter); ok {
		return price(f.counts.spaces[side].blend(0.005, 200))
	}
	if !s.gap && letter == s.letter && letter != other {
		return price(marksOff)
	}
	grains := price(f.wrong(s, p) * f.written(s, p, letter))
	if f.author == nil {
		return grains
	}
	return f.author.price(grains, f.slipAt(s, letter))
}

// swap prices the transposition of the letters to, as the word has them.
func (f *Fitted) swap(to stretch, p position) int32 {
	return f.author.price(price(f.counts.stretch(to).blend(f.swaps[p], f.smooth.swap)), slip{swapKind, to[0], to[1]})
}

// newFitted works out the probabilities that counts give.
func newFitted(c *counts, k keyboard, by smoothing) *Fitted {
	f := &Fitted{counts: c, keys: k, smooth: by, chances: chancesOf(c)}
	for side := range sides {
		for p := range positions {
			all := 0.0
			for _, n := range c.kinds[side][p] {
				all += n
			}
			for kind, n := range c.kinds[side][p] {
				f.kinds[side][p][kind] = (n + 1) / (all + kinds)
			}
		}
	}
	for p := range positions {
		f.swaps[p] = c.swaps[p].blend(0.002, 100)
	}
	f.long = make([]longPrice, len(c.long))
	for i, e := range c.long {
		met := c.stretch(e.to).met
		if e.to.size() == 1 {
			met += f.chances.letter[0][e.to[0]].met
		}
		f.long[i] = longPrice{e.longEdit, price(e.n / (met + by.long))}
	}
	slices.SortFunc(f.long, func(a, b longPrice) int { return cmp.Or(a.from.compare(b.from), a.to.compare(b.to)) })
	return f
}

// longFrom returns the edits of those letters of a form as several or into several.
func (f *Fitted) longFrom(from stretch) []longPrice {
	first, _ := slices.BinarySearchFunc(f.long, from, func(e longPrice, from stretch) int { return e.from.compare(from) })
	last := first
	for last < len(f.long) && f.long[last].from == from {
		last++
	}
	return f.long[first:last]
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
		to := stretchIn(word[j : j+n])
		for _, e := range f.longFrom(stretchIn(form[i : i+m])) {
			if e.to == to {
				grains = e.price
			}
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
