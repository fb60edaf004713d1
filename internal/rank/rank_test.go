package rank

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/lexicon"
	"emendary/lexicon/english"
)

// Kernighan, Church & Gale 1990 (COLING, C90-2036), the corrections of "acress":
// prior (f+0.5)/N in 44 million words, times the channel, normalised.
func TestSharesGiveThePublishedExample(t *testing.T) {
	const corpus = 44e6
	tests := []struct {
		word           string
		frequency      float64
		channel, share float64
	}{
		{"actress", 1343, 55.0 / 470_000, 0.37},
		{"across", 8436, 93.0 / 10e6, 0.18},
		{"acres, s inserted", 2879, 417.0 / 13e6, 0.21},
		{"acres, s doubled", 2879, 205.0 / 6e6, 0.23},
		{"access", 2280, 0.98 / 4.7e6, 0},
		{"caress", 4, 0.95 / 580_000, 0},
		{"cress", 0, 46.0 / 32e6, 0},
	}
	var bits []float64
	for _, tt := range tests {
		bits = append(bits, -math.Log2((tt.frequency+0.5)/corpus)-math.Log2(tt.channel))
	}
	shares := Shares(bits)
	for i, tt := range tests {
		assert.InDelta(t, tt.share, shares[i], 0.0075, tt.word)
	}
}

func TestSharesAddUpToOne(t *testing.T) {
	tests := map[string][]float64{
		"one":       {12},
		"equal":     {7, 7, 7, 7},
		"far apart": {1, 2000},
		"large":     {5000, 5001},
	}
	for name, bits := range tests {
		t.Run(name, func(t *testing.T) {
			var sum float64
			for _, s := range Shares(bits) {
				sum += s
			}
			assert.InDelta(t, 1, sum, 1e-12)
		})
	}
	assert.Empty(t, Shares(nil))
}

func TestPriorPrefersWhatIsCommonAndWhatTheManuscriptUses(t *testing.T) {
	lex := lexicon.New(english.Base(), lexicon.BritishIse)
	word := func(text string) lexicon.Word {
		words := lex.Find(text).Words
		require.NotEmpty(t, words, text)
		return words[0]
	}
	m := Default()
	bits := func(text string, count int) float64 {
		return m.Prior(word(text), lexicon.BritishIse, len(text), false, count, 100_000)
	}
	assert.Less(t, bits("house", 0), bits("abbey", 0), "level 10 before a rarer level")
	assert.Less(t, bits("abbey", 40), bits("house", 0), "what the manuscript uses before what it does not")
	assert.Less(t, bits("abbey", 40), bits("abbey", 2))
	listed := lexicon.Word{Text: "Pellimoor", Layer: lexicon.Book}
	assert.Less(t, m.Prior(listed, lexicon.BritishIse, 9, true, 0, 100_000), bits("dispensary", 0), "a listed word counts as a common one")
}

func TestPriorPrefersNamesForFormsWithACapital(t *testing.T) {
	m := Default()
	name := lexicon.Word{Text: "Thames", Sources: []lexicon.Source{{Category: "english", Class: "upper", Level: 50}}}
	plain := lexicon.Word{Text: "themes", Sources: []lexicon.Source{{Category: "english", Class: "words", Level: 50}}}
	bits := func(w lexicon.Word, capital bool) float64 {
		return m.Prior(w, lexicon.BritishIse, 6, capital, 0, 0)
	}
	assert.Less(t, bits(name, true), bits(plain, true))
	assert.Less(t, bits(plain, false), bits(name, false))
}

// The table is fitted by program: what holds for running English (Zipf 1935, from
// memory: the commoner, the shorter) has to hold in it.
func TestTheTableOfPriorsFallsWithLengthAndLevel(t *testing.T) {
	p := table()
	require.Len(t, p.bits, 8)
	for level, row := range p.bits {
		require.Len(t, row, 14)
		assert.IsNonDecreasing(t, row, level)
		assert.Greater(t, row[4], p.bits[10][4]-1e-9, "level %d: no level is commoner than the first", level)
	}
	assert.InDelta(t, p.at(20, 5), p.at(15, 5), 0, "between two levels: the rarer one's")
	assert.InDelta(t, p.at(70, 14), p.at(95, 40), 0, "beyond both ends: the last")
}
