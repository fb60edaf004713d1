// Package rank weighs the words that a form may stand for: how likely each is
// before the form is seen (its prior), and, once the edits between the two are
// priced, which share of the belief it deserves (its posterior among the
// candidates of its form).
//
// Everything is in bits, −log₂ of a probability, so that what the edits cost and
// what the prior costs add up (the noisy-channel model: Kernighan, Church & Gale
// 1990, section 2). A Model's zero value is of no use; Default gives the figures
// in use.
package rank

import (
	"math"

	"emendary/lexicon"
)

// Model holds the figures that turn a word into bits.
type Model struct {
	// Edit is what one unit edit costs, in bits.
	Edit float64
	// Letter is added for each letter that the form or the word has and the other
	// lacks: none for a transposition, one for an insertion or a deletion, two
	// for a substitution.
	Letter float64
	// First is added where the first letters differ, which writers seldom get wrong
	// (Yannakoudakis & Fawthrop 1983, from memory).
	First float64
	// Smoothing is how many running words the lexicon's own frequencies count
	// for, against the manuscript's (a Dirichlet prior's weight).
	Smoothing float64
	// Capital is added where a form without capitals would become a word that
	// has them, in bits.
	Capital float64
	// Abbreviation is added to words that are listed as abbreviations only.
	Abbreviation float64
	// SameWord is taken off where the form belongs to another variety and the
	// word is one that the varieties spell differently: then the two are most
	// likely one word, in bits.
	SameWord float64
}

// Default returns the figures in use while edits cost one unit each. They are
// set by hand: a transposition costs 6 bits, an insertion or a deletion 8, a
// substitution 10, about the span of the size levels (8 bits). So candidates
// come by distance first, then by commonness, and only what the manuscript itself
// uses often, or a much commoner word, overtakes a nearer one.
func Default() Model {
	return Model{Edit: 6, Letter: 2, First: 4, Smoothing: 10_000, Capital: 4, Abbreviation: 8, SameWord: 8}
}

// level bits: Zipf's law, p(r) = 1/(r·H(N)), averaged over the ranks that each
// size level spans when the levels of the English lists are laid end to end
// (4,000 words in level 10, 10,900 up to level 20, 39,000 up to 35, 45,000 up to
// 40, 83,000 up to 50, 88,000 up to 55, 100,000 up to 60, 148,000 up to 70).
var levelBits = [...]struct {
	level uint8
	bits  float64
}{{10, 12.4}, {20, 16.4}, {35, 18.1}, {40, 19.0}, {50, 19.5}, {55, 20.0}, {60, 20.1}, {70, 20.5}}

// listBits is the prior of a word that an editor put on a list: as common as a
// word of level 20, since somebody met it often enough to list it.
const listBits = 16.4

// Prior returns the cost in bits of meeting word in a manuscript of size running
// words that uses it count times: the lexicon's frequency and the manuscript's,
// blended by Dirichlet smoothing.
func (m Model) Prior(word lexicon.Word, v lexicon.Variety, count, size int) float64 {
	p := math.Exp2(-lexiconBits(word, v))
	p = (float64(count) + m.Smoothing*p) / (float64(size) + m.Smoothing)
	bits := -math.Log2(p)
	if word.IsAbbreviation() {
		bits += m.Abbreviation
	}
	return bits
}

func lexiconBits(word lexicon.Word, v lexicon.Variety) float64 {
	level, ok := word.Level(v)
	if !ok {
		return levelBits[len(levelBits)-1].bits
	}
	if level == 0 {
		return listBits
	}
	for _, l := range levelBits {
		if level <= int(l.level) {
			return l.bits
		}
	}
	return levelBits[len(levelBits)-1].bits
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
