package assay

import (
	"fmt"
	"math/rand/v2"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// randomPairs makes n pairs that intend one to three of a few words, in any case.
func randomPairs(r *rand.Rand, n, words int) []Pair {
	pairs := make([]Pair, n)
	for i := range pairs {
		pairs[i].Form = fmt.Sprint("form", r.IntN(n))
		for range 1 + max(0, r.IntN(12)-9) {
			word := fmt.Sprint("word", r.IntN(words))
			if r.IntN(2) == 0 {
				word = strings.ToUpper(word)
			}
			pairs[i].Intended = append(pairs[i].Intended, word)
		}
	}
	return pairs
}

func TestFoldsPartPairsByTheWordIntended(t *testing.T) {
	r := rand.New(rand.NewPCG(8, 15))
	for range 200 {
		pairs, k := randomPairs(r, 2+r.IntN(60), 1+r.IntN(200)), 2
		k += r.IntN(min(len(pairs)-1, 10))
		folds, err := Folds(pairs, k)
		require.NoError(t, err)
		require.Len(t, folds, len(pairs), "each pair is in one fold")
		of := map[string]int{}
		for i, p := range pairs {
			require.Less(t, folds[i], k)
			require.GreaterOrEqual(t, folds[i], 0)
			for _, word := range p.Intended {
				fold, seen := of[strings.ToLower(word)]
				require.True(t, !seen || fold == folds[i], "%s is in two folds", word)
				of[strings.ToLower(word)] = folds[i]
			}
		}
		order := r.Perm(len(pairs))
		shuffled := make([]Pair, len(pairs))
		for to, from := range order {
			shuffled[to] = Pair{"other " + pairs[from].Form, pairs[from].Intended}
		}
		again, err := Folds(shuffled, k)
		require.NoError(t, err)
		for to, from := range order {
			require.Equal(t, folds[from], again[to], "neither order nor forms make a difference")
		}
	}
}

func TestFolds(t *testing.T) {
	tests := []struct {
		name     string
		pairs    []Pair
		together [][2]int
	}{
		{"one word", []Pair{{"teh", []string{"the"}}, {"hte", []string{"the"}}}, [][2]int{{0, 1}}},
		{"capitals", []Pair{{"amercia", []string{"America"}}, {"amrica", []string{"america"}}}, [][2]int{{0, 1}}},
		{"apostrophes", []Pair{{"dont", []string{"don't"}}, {"dnt", []string{"don’t"}}}, [][2]int{{0, 1}}},
		{"accents", []Pair{{"cresh", []string{"cr\u00e8che"}}, {"cretch", []string{"cre\u0300che"}}}, [][2]int{{0, 1}}},
		{"linked by others", []Pair{{"a", []string{"x", "y"}}, {"b", []string{"y", "z"}}, {"c", []string{"z"}}}, [][2]int{{0, 1}, {0, 2}}},
		{"no word", []Pair{{"a", nil}, {"b", nil}}, [][2]int{{0, 1}}},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			// In as many folds as these no two words meet by chance.
			padded := tt.pairs
			for range 1000 {
				padded = append(padded, Pair{"teh", []string{"the"}})
			}
			folds, err := Folds(padded, 1000)
			require.NoError(t, err)
			for _, p := range tt.together {
				assert.Equal(t, folds[p[0]], folds[p[1]])
			}
		})
	}
}

// Folds are near equal in size where there are many words.
func TestFoldsAreNearEqual(t *testing.T) {
	pairs := make([]Pair, 5000)
	for i := range pairs {
		pairs[i] = Pair{"form", []string{fmt.Sprint("word", i)}}
	}
	folds, err := Folds(pairs, 10)
	require.NoError(t, err)
	sizes := make([]int, 10)
	for _, f := range folds {
		sizes[f]++
	}
	for _, n := range sizes {
		assert.InDelta(t, 500, n, 100, "%v", sizes)
	}
}

func TestFoldsRefused(t *testing.T) {
	pairs := []Pair{{"a", []string{"b"}}, {"c", []string{"d"}}}
	_, err := Folds(pairs, 1)
	assert.EqualError(t, err, "1 folds; 2 are the least")
	_, err = Folds(pairs, 3)
	assert.EqualError(t, err, "3 folds of 2 pairs; take fewer")
}
