package lexicon

import (
	"slices"

	"emendary/align"
)

// reduced is the prices of one form with a potential taken off them, so that a
// search may count as paid what every way to the end pays: as in the search of
// Hart, Nilsson and Raphael, “A Formal Basis for the Heuristic Determination of
// Minimum Cost Paths”, IEEE Transactions on Systems Science and Cybernetics 4(2),
// 1968.
//
// Each letter of the form costs at least keep, whatever becomes of it; and a cell
// foretells a word's length, that of a word in which the rest of the form comes as
// it is, and with it what words of that length cost at least (see lengths). An edit
// costs what it costs less keep for the letters it takes, and more or less what the
// length it foretells then costs more or less. No edit costs less than nothing then,
// and what a word costs altogether is the sum of its reduced edits, base, and its
// prior less what its length costs at least.
type reduced struct {
	n       int
	middle  int // where the form's first part ends
	base    int32
	flat    bool    // prices are such that lengths must be left out of account
	lengths []int32 // by letters of the word
	keep    [maxBest]int32
	symbols [maxBest + 1]uint8

	swaps [maxBest]int32 // reduced, by the first letter's place

	// Edits of several letters that are no transpositions.
	starting  [maxBest + 1][]align.LongEdit // by where they start in the form
	ending    [maxBest + 1][]align.LongEdit // by where they end
	beginning [32][]align.LongEdit          // by the word's first letter, as a symbol

	inserts, twices, ones [][reaches]uint32 // by place: see under
	zeros                 [maxLengths]int32
}

const (
	// What a word costs at least may rise and fall with its length by these, in
	// grains for a letter: most forms' edits that lengthen or shorten cost as much.
	steepestRise = 1 << 10
	steepestFall = 1 << 9
)

// reset readies p for a form; lengths is what words cost at least by their letters.
func (p *reduced) reset(sheet *align.Sheet, least *align.Least, lengths []int32) {
	form := sheet.Form()
	n := len(form)
	p.n, p.middle, p.lengths = n, n*middlePart/100, lengths
	rise, fall := int32(steepestRise), int32(steepestFall)
	p.flat = least.Lengthen < fall || least.Shorten < rise
	if p.flat {
		rise, fall, p.lengths = 0, 0, p.zeros[:]
	}
	for i, letter := range form {
		p.symbols[i] = uint8(align.Symbol(letter))
	}
	p.reserve(sheet, least, rise, fall)
	p.multiple(sheet)
	p.inserts, p.twices = resized(p.inserts, n+1), resized(p.twices, n+1)
	p.ones = resized(p.ones, n)
	for i := range n + 1 {
		under(&p.inserts[i], least.Insert[:], i, 0)
		under(&p.twices[i], least.Twice[:], i, 0)
		if i < n {
			under(&p.ones[i], least.One[:], i, p.keep[i])
		}
	}
}

// maxLengths is more than the letters any cell foretells.
const maxLengths = maxBest + MaxLetters + 2

// reserve works out keep.
func (p *reduced) reserve(sheet *align.Sheet, least *align.Least, rise, fall int32) {
	for i := range p.n {
		k := least.Delete[i] - rise
		for c := 1; c < len(least.One); c++ {
			k = min(k, least.One[c][i])
		}
		if i > 0 {
			k = min(k, sheet.Swap(i-1)/2)
		}
		if i < p.n-1 {
			k = min(k, sheet.Swap(i)/2)
		}
		p.keep[i] = k
	}
	for _, e := range sheet.Long() {
		k := (e.Price - rise*int32(max(e.M-e.N, 0)) - fall*int32(max(e.N-e.M, 0))) / int32(e.M)
		for i := e.I; i < e.I+e.M; i++ {
			p.keep[i] = min(p.keep[i], k)
		}
	}
	p.base = p.lengths[p.n]
	for _, k := range p.keep[:p.n] {
		p.base += k
	}
}

// multiple sorts edits of several letters by where they may be.
func (p *reduced) multiple(sheet *align.Sheet) {
	for i := range p.n + 1 {
		p.starting[i], p.ending[i] = p.starting[i][:0], p.ending[i][:0]
	}
	for c := range p.beginning {
		p.beginning[c] = p.beginning[c][:0]
	}
	for i := range max(p.n, 1) - 1 {
		p.swaps[i] = sheet.Swap(i) - p.keep[i] - p.keep[i+1]
	}
	for _, e := range sheet.Long() {
		first := e.Symbols()[0]
		p.starting[e.I] = append(p.starting[e.I], e)
		p.ending[e.I+e.M] = append(p.ending[e.I+e.M], e)
		p.beginning[first] = append(p.beginning[first], e)
	}
}

// long returns the reduced price of an edit of several letters from a cell that
// foretells so many.
func (p *reduced) long(e *align.LongEdit, letters int) int32 {
	price := e.Price + p.lengths[letters+e.N-e.M] - p.lengths[letters]
	for _, k := range p.keep[e.I : e.I+e.M] {
		price -= k
	}
	return price
}

const (
	reaches   = align.Reaches
	reachBits = align.ReachBits
)

// under works out, for what may be paid in steps of half a bit, the set of symbols
// that cost no more than that at a place, less off.
func under(sets *[reaches]uint32, prices [][]int32, i int, off int32) {
	clear(sets[:])
	for c := 1; c < len(prices); c++ {
		if step := max(prices[c][i]-off, 0) >> reachBits; step < reaches {
			sets[step] |= 1 << c
		}
	}
	for step := 1; step < reaches; step++ {
		sets[step] |= sets[step-1]
	}
}

// atMost returns the symbols that sets have for at most price.
func atMost(sets *[reaches]uint32, price int32) uint32 {
	switch step := price >> reachBits; {
	case step < 0:
		return 0
	case step >= reaches:
		return ^uint32(0)
	default:
		return sets[step]
	}
}

// resized returns a slice of n, in the space of s where there is enough.
func resized[T any](s []T, n int) []T {
	return slices.Grow(s[:0], n)[:n]
}
