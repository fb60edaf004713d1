// Package rank weighs the words that a form may stand for: how likely each is
// before the form is seen (its prior), which share of the belief it deserves once
// the edits between the two are priced (its posterior among the candidates of its
// form), and how likely an entry is a slip at all.
//
// Everything is in bits, −log₂ of a probability, so that what the edits cost and
// what the prior costs add up (the noisy-channel model: Kernighan, Church & Gale
// 1990, section 2). A Model's zero value is of no use; Default gives the figures
// in use.
package rank

import (
	_ "embed"
	"fmt"
	"math"
	"strconv"
	"strings"
	"sync"

	"emendary/lexicon"
)

// Model holds the figures that turn a word into bits.
type Model struct {
	// Edit is what one unit edit counts for, in bits, where edits have unit costs.
	Edit float64
	// Weight is how much of a word's rarity counts against what its edits cost: 1
	// would be right were the word drawn from running text, but misspelt words are
	// the rarer ones.
	Weight float64
	// Smoothing is how many running words the lexicon's own frequencies count
	// for, against the manuscript's (a Dirichlet prior's weight).
	Smoothing float64
	// Name is added where a form without capitals would become a name, in bits;
	// Common where a form with a capital would become a word that is none.
	Name, Common float64
	// Company is how many bits likelier than by chance two of the commonest words
	// stand together that writers run together, since those are such as belong
	// together (a lot).
	Company float64
	// Abbreviation is added to words that are listed as abbreviations only.
	Abbreviation float64
	// Possessive is added for a word with 's at its end where the form lacks the
	// apostrophe.
	Possessive float64
	// Familiar is added for a form that no list knows but the manuscript has often.
	Familiar float64
	// SameWord is taken off where the form belongs to another variety and the
	// word is one that the varieties spell differently: then the two are most
	// likely one word, in bits.
	SameWord float64
}

// Default returns the figures in use. Weight, Name and Smoothing were chosen by
// how often the first candidate was right on pairs and planted errors that the
// costs were not fitted to, where anything from 0.7 to 0.9, 2 to 5, and 5,000 to
// 20,000 does as well; the others decide few cases and are set by hand.
func Default() Model {
	return Model{Edit: 9, Weight: 0.8, Smoothing: 10_000, Name: 3, Common: 1, Company: 6, Abbreviation: 6, Possessive: 4, Familiar: 3, SameWord: 8}
}

// listLevel is the size level that a word on an editor's list counts as: somebody
// met it often enough to list it.
const listLevel = 20

//go:embed prior.table
var priorTable string

// priors are the bits of a word by size level and length, and the shortest length
// that has figures.
type priors struct {
	shortest int
	bits     map[int][]float64
}

// table reads prior.table, which cmd fitprior writes.
var table = sync.OnceValue(func() priors {
	p := priors{shortest: 1, bits: map[int][]float64{}}
	for line := range strings.Lines(priorTable) {
		if line[0] == '#' {
			continue
		}
		fields := strings.Split(strings.TrimSpace(line), "\t")
		level, err := strconv.Atoi(fields[0])
		for _, f := range fields[1:] {
			bits, e := strconv.ParseFloat(f, 64)
			if e != nil {
				err = e
			}
			p.bits[level] = append(p.bits[level], bits)
		}
		if err != nil {
			panic(fmt.Sprintf("prior.table: %q: %v", line, err)) // the build is broken: a test reads it
		}
	}
	return p
})

// at returns the bits of a word of a level, which falls between two that have
// figures to the rarer one, and of that many letters.
func (p priors) at(level, letters int) float64 {
	for _, l := range [...]int{10, 20, 35, 40, 50, 55, 60} {
		if level <= l {
			level = l
			break
		}
	}
	row := p.bits[level]
	if row == nil {
		row = p.bits[70]
	}
	return row[max(0, min(letters-p.shortest, len(row)-1))]
}

// Lexicon returns how many bits meeting the word comes to in any text, by its
// size level in variety v and its length in letters.
func (m Model) Lexicon(word lexicon.Word, v lexicon.Variety, letters int) float64 {
	return table().at(m.Level(word, v), letters)
}

// Meeting returns the probability that a running word of a manuscript is this
// word, which has that many letters: the lexicon's frequency and the
// manuscript's, which uses it count times in size running words, blended by
// Dirichlet smoothing.
func (m Model) Meeting(word lexicon.Word, v lexicon.Variety, letters, count, size int) float64 {
	p := math.Exp2(-m.Lexicon(word, v, letters))
	return (float64(count) + m.Smoothing*p) / (float64(size) + m.Smoothing)
}

// Prior returns the cost in bits of meeting word, all else as for [Model.Meeting],
// where a form was written that has a capital or has none.
func (m Model) Prior(word lexicon.Word, v lexicon.Variety, letters int, capital bool, count, size int) float64 {
	bits := -m.Weight * math.Log2(m.Meeting(word, v, letters, count, size))
	switch name := word.IsName(); {
	case name && !capital:
		bits += m.Name
	case !name && capital:
		bits += m.Common
	}
	if word.IsAbbreviation() {
		bits += m.Abbreviation
	}
	return bits
}

// TwoWords returns the cost in bits of meeting two words side by side, which stand
// so together times in a manuscript of size running words. p and q are their
// probabilities, level is the size level of the rarer one; capital as for
// [Model.Prior].
func (m Model) TwoWords(p, q float64, level int, capital bool, together, size int) float64 {
	both := p * q
	if level <= 10 {
		both *= math.Exp2(m.Company)
	}
	bits := -m.Weight * math.Log2((float64(together)+m.Smoothing*both)/(float64(size)+m.Smoothing))
	if capital {
		bits += m.Common
	}
	return bits
}

// Seen returns the cost in bits of meeting a form that no list has, but a manuscript
// of size running words count times.
func (m Model) Seen(count, size int) float64 {
	return -m.Weight * math.Log2(float64(count)/(float64(size)+m.Smoothing))
}

// Level returns the size level that a word counts as in variety v.
func (m Model) Level(word lexicon.Word, v lexicon.Variety) int {
	level, ok := word.Level(v)
	switch {
	case !ok:
		return 70
	case level == 0:
		return listLevel
	}
	return level
}

// Shares turns the bits of all candidates of a form into their shares: the
// posterior of each among them. They add up to 1; none gives none. O(n).
func Shares(bits []float64) []float64 {
	least := math.Inf(1)
	for _, b := range bits {
		least = min(least, b)
	}
	shares := make([]float64, len(bits))
	var sum float64
	for i, b := range bits {
		shares[i] = math.Exp2(least - b)
		sum += shares[i]
	}
	for i := range shares {
		shares[i] /= sum
	}
	return shares
}
