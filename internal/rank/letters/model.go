package main

import (
	"encoding/binary"
	"math"

	"emendary/internal/rank"
)

const symbols = rank.LetterSymbols

// model counts how often each symbol follows contexts of up to three. A word is
// preceded by three edges and ends with one.
type model struct {
	one   [symbols]float64
	two   [symbols][symbols]float64
	three [symbols * symbols][symbols]float64
	four  [rank.LetterContexts][symbols]float64
}

func (m *model) add(word string) {
	context := 0
	step := func(symbol int) {
		m.four[context][symbol]++
		m.three[context%(symbols*symbols)][symbol]++
		m.two[context%symbols][symbol]++
		m.one[symbol]++
		context = (context*symbols + symbol) % rank.LetterContexts
	}
	for _, r := range word {
		step(rank.LetterSymbol(r))
	}
	step(0)
}

type distribution = [symbols]float64

// smooth interpolates what was counted in one context with the distribution in
// the next shorter one: as much weight goes to the shorter one as distinct
// symbols were seen (Witten and Bell 1991, method C).
func smooth(counts *[symbols]float64, shorter *distribution) *distribution {
	var total, kinds float64
	for _, n := range counts {
		total += n
		if n > 0 {
			kinds++
		}
	}
	if total == 0 {
		return shorter
	}
	var p distribution
	for s := range p {
		p[s] = (counts[s] + kinds*shorter[s]) / (total + kinds)
	}
	return &p
}

// table returns the model in the form that package rank reads.
func (m *model) table() []byte {
	var uniform distribution
	for s := range uniform {
		uniform[s] = 1.0 / symbols
	}
	one := smooth(&m.one, &uniform)
	index := make([]byte, 0, 2*rank.LetterContexts)
	var rows []byte
	numbers := map[*distribution]uint16{} // contexts never seen share the row of a shorter one
	shorter := map[int]*distribution{}
	for context := range m.four {
		tail := context % (symbols * symbols)
		if shorter[tail] == nil {
			shorter[tail] = smooth(&m.three[tail], smooth(&m.two[context%symbols], one))
		}
		p := smooth(&m.four[context], shorter[tail])
		n, ok := numbers[p]
		if !ok {
			n = uint16(len(numbers))
			numbers[p] = n
			for _, q := range p {
				units := math.Round(-math.Log2(q) * rank.LetterUnits)
				rows = append(rows, byte(min(units, math.MaxUint8)))
			}
		}
		index = binary.LittleEndian.AppendUint16(index, n)
	}
	return append(index, rows...)
}
