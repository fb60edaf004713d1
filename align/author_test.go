package align_test

import (
	"math/rand/v2"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/align"
)

func pairsOf(words ...string) []align.Pair {
	var a align.Alphabet
	var pairs []align.Pair
	for i := 0; i < len(words); i += 2 {
		pairs = append(pairs, align.Pair{Form: a.AppendFolded(nil, words[i]), Word: a.AppendFolded(nil, words[i+1]), Weight: 1})
	}
	return pairs
}

func cost(costs *align.Fitted, form, word string) float64 {
	p := pairsOf(form, word)[0]
	return align.Align(p.Form, p.Word, costs).Cost
}

// An author who writes e for o, and leaves one of two letters out.
var accepted = []string{
	"harber", "harbor", "majer", "major", "docter", "doctor", "anchers", "anchors", "tailer", "tailor",
	"leter", "letter", "sumer", "summer",
}

func TestAdaptedCostsKnowTheAuthorsSlips(t *testing.T) {
	base := someCosts(t)
	adapted := base.Adapt(pairsOf(accepted...))
	tests := []struct {
		name, form, word string
		cheaper          bool
	}{
		{"the same slip in another word", "paler", "palor", true},
		{"one of two letters left out", "diner", "dinner", true},
		{"a slip that the author never makes", "neighpour", "neighbour", false},
		{"a transposition, of which there was none", "nieghbour", "neighbour", false},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			before, after := cost(base, tt.form, tt.word), cost(adapted, tt.form, tt.word)
			if tt.cheaper {
				assert.Less(t, after, before)
			} else {
				assert.Greater(t, after, before)
			}
		})
	}
	assert.InDelta(t, cost(base, "harbour", "harbour"), cost(adapted, "harbour", "harbour"), 0, "no slip costs what it did")
	assert.Equal(t, base, base.Adapt(nil))
}

// Dirichlet smoothing (MacKay and Peto, “A Hierarchical Dirichlet Language Model”,
// Natural Language Engineering 1(3), 1995, section 2): with m of M slips the author's
// and a strength of twenty, a share of s becomes (m + 20 s)/(M + 20).
func TestAdaptationIsDirichletSmoothing(t *testing.T) {
	base := someCosts(t)
	adapted := base.Adapt(pairsOf("wierd", "weird"))
	// One slip of one kind: the share of transpositions grows by (1 + 20 s)/(21 s), and
	// within them, that of this one.
	saved := cost(base, "wierd", "weird") - cost(adapted, "wierd", "weird")
	other := cost(base, "wrod", "word") - cost(adapted, "wrod", "word")
	assert.Positive(t, other, "another transposition")
	assert.Greater(t, saved, other, "this one")
}

func TestAdaptationKnowsNoOrder(t *testing.T) {
	base := someCosts(t)
	pairs := pairsOf(accepted...)
	want := base.Adapt(pairs)
	random := rand.New(rand.NewPCG(3, 4))
	for range 10 {
		random.Shuffle(len(pairs), func(i, j int) { pairs[i], pairs[j] = pairs[j], pairs[i] })
		require.Equal(t, want, base.Adapt(pairs))
	}
}

func TestLearntSaysWhichEditsAreTheAuthors(t *testing.T) {
	adapted := someCosts(t).Adapt(pairsOf(accepted...))
	p := pairsOf("paler", "palor")[0]
	learnt := adapted.Learnt(p.Form, p.Word)
	require.Len(t, learnt, 1)
	assert.Equal(t, align.Substitution, learnt[0].Edit.Op)
	assert.Equal(t, 5, learnt[0].Seen)
	assert.Positive(t, learnt[0].Saved)
	p = pairsOf("nieghbour", "neighbour")[0]
	assert.Empty(t, adapted.Learnt(p.Form, p.Word))
	assert.Empty(t, someCosts(t).Learnt(p.Form, p.Word))
}
