package align

import (
	"cmp"
	"maps"
	"slices"
)

// counts is a tally at rest: all that was counted, in order. Fitted costs look up
// in it what a price needs, so that costs are ready as soon as it is read.
type counts struct {
	general
	spots     []spotCount    // by index
	slips     []slipCount    // those of a spot together, by letter
	stretches []stretchCount // in the order of stretches
	long      []longCount    // by the letters of the word, then of the form
}

// spotCount is how often a spot was met, and how often something went wrong there.
type spotCount struct {
	ratio
	end int32  // of its slips: they begin where those of the spot before end
	at  uint16 // index of the spot
}

type slipCount struct {
	n       float64
	written symbol
}

type stretchCount struct {
	ratio // wrong where it came out the other way round
	of    stretch
}

type longCount struct {
	longEdit
	n float64
}

// rest puts t in order.
func (t *tally) rest() *counts {
	c := &counts{general: t.general, spots: make([]spotCount, 0, len(t.spots))}
	for _, i := range slices.Sorted(maps.Keys(t.spots)) {
		for w, n := range t.slips[i] {
			if n > 0 {
				c.slips = append(c.slips, slipCount{n, symbol(w)})
			}
		}
		c.spots = append(c.spots, spotCount{t.spots[i], int32(len(c.slips)), uint16(i)})
	}
	for _, s := range slices.SortedFunc(maps.Keys(t.met), stretch.compare) {
		c.stretches = append(c.stretches, stretchCount{ratio{t.met[s], t.swapped[s]}, s})
	}
	for e, n := range t.long {
		c.long = append(c.long, longCount{e, n})
	}
	slices.SortFunc(c.long, func(a, b longCount) int {
		return cmp.Or(a.to.compare(b.to), a.from.compare(b.from))
	})
	return c
}

func (t stretch) compare(u stretch) int { return slices.Compare(t[:], u[:]) }

// stretch returns how often a stretch was met, and came out the other way round.
func (c *counts) stretch(of stretch) ratio {
	i, ok := slices.BinarySearchFunc(c.stretches, of, func(s stretchCount, of stretch) int { return s.of.compare(of) })
	if !ok {
		return ratio{}
	}
	return c.stretches[i].ratio
}

// slipsOf returns the slips at the spots from the first to before the last of c.
func (c *counts) slipsOf(first, last int) []slipCount {
	return c.slips[c.slipsBefore(first):c.slipsBefore(last)]
}

func (c *counts) slipsBefore(spot int) int32 {
	if spot == 0 {
		return 0
	}
	return c.spots[spot-1].end
}

// written returns how many of slips wrote that letter.
func written(slips []slipCount, letter symbol) float64 {
	sum := 0.0
	for _, s := range slips {
		if s.written == letter {
			sum += s.n
		}
	}
	return sum
}

// groups are spots that differ in the letter to the right alone: numbers of a
// group are index/symbols.
const groups = sides * symbols * symbols

// chances are counts summed over neighbours, and where each group of spots is.
type chances struct {
	first       [groups + 1]int32 // spot of each group
	group       [groups]ratio
	letter      [sides][symbols]ratio
	letterSlips [sides][symbols][symbols]float64 // what was written
}

func chancesOf(c *counts) *chances {
	sum := &chances{}
	group, slip := 0, 0
	for i, r := range c.spots {
		for ; group <= int(r.at)/symbols; group++ {
			sum.first[group] = int32(i)
		}
		s := spotAt(int(r.at))
		sum.group[group-1].add(r.ratio)
		sum.letter[s.side()][s.letter].add(r.ratio)
		for ; slip < int(r.end); slip++ {
			sum.letterSlips[s.side()][s.letter][c.slips[slip].written] += c.slips[slip].n
		}
	}
	for ; group <= groups; group++ {
		sum.first[group] = int32(len(c.spots))
	}
	return sum
}

func (r *ratio) add(q ratio) { r.met, r.wrong = r.met+q.met, r.wrong+q.wrong }

// find returns the number of s among spots, and those of the first of its group and
// of the next; without s, the number is below 0.
func (f *Fitted) find(s spot) (number, first, next int) {
	index := s.index()
	first, next = int(f.chances.first[index/symbols]), int(f.chances.first[index/symbols+1])
	for i := first; i < next; i++ {
		if int(f.counts.spots[i].at) == index {
			return i, first, next
		}
	}
	return -1, first, next
}
