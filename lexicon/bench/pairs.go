package bench

import (
	"github.com/agnivade/levenshtein"
	"github.com/hbollon/go-edlib"

	"emendary/align"
)

// Distances is one way to compute the distances of pairs.
type Distances struct {
	Name       string
	Transposed bool // restricted Damerau–Levenshtein distance; else Levenshtein
	Of         func(pair int) int
}

// PairDistances returns the ways to compute the distances of pairs. Ours are
// given letters, as the program has them, or the same strings as the peers.
func PairDistances(pairs []Pair) []Distances {
	var alphabet align.Alphabet
	type letters struct{ form, word []align.Letter }
	ready := make([]letters, len(pairs))
	for i, p := range pairs {
		ready[i] = letters{alphabet.Letters(p.Form), alphabet.Letters(p.Word)}
	}
	var form, word []align.Letter
	folded := func(i int) ([]align.Letter, []align.Letter) {
		form = alphabet.AppendFolded(form[:0], pairs[i].Form)
		word = alphabet.AppendFolded(word[:0], pairs[i].Word)
		return form, word
	}
	return []Distances{
		{"align.Levenshtein", false, func(i int) int { return align.Levenshtein(ready[i].form, ready[i].word) }},
		{"align.Levenshtein, from strings", false, func(i int) int { return align.Levenshtein(folded(i)) }},
		{"agnivade/levenshtein", false, func(i int) int { return levenshtein.ComputeDistance(pairs[i].Form, pairs[i].Word) }},
		{"hbollon/go-edlib, Levenshtein", false, func(i int) int { return edlib.LevenshteinDistance(pairs[i].Form, pairs[i].Word) }},
		{"align.Restricted", true, func(i int) int { return align.Restricted(ready[i].form, ready[i].word) }},
		{"align.Restricted, from strings", true, func(i int) int { return align.Restricted(folded(i)) }},
		{"hbollon/go-edlib, restricted", true, func(i int) int { return edlib.OSADamerauLevenshteinDistance(pairs[i].Form, pairs[i].Word) }},
	}
}

// FarPairs returns each form with the word of the pair half the list away.
func FarPairs(pairs []Pair) []Pair {
	far := make([]Pair, len(pairs))
	for i, p := range pairs {
		far[i] = Pair{p.Form, pairs[(i+len(pairs)/2)%len(pairs)].Word}
	}
	return far
}
