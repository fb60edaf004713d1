package lexicon

import (
	"math/rand/v2"
	"slices"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

func randomWords(random *rand.Rand, n, letters, length int) [][]uint32 {
	var words [][]uint32
	for range n {
		word := make([]uint32, 1+random.IntN(length))
		for i := range word {
			word[i] = uint32(random.IntN(letters))
		}
		words = append(words, word)
	}
	slices.SortFunc(words, slices.Compare[[]uint32])
	return slices.CompactFunc(words, slices.Equal[[]uint32])
}

func build(words [][]uint32) trie {
	b := newTrieBuilder()
	for _, w := range words {
		b.add(w)
	}
	return b.finish()
}

func TestNumberIsThePlaceInOrder(t *testing.T) {
	random := rand.New(rand.NewPCG(3, 4))
	for range 200 {
		words := randomWords(random, 60, 4, 7)
		tr := build(words)
		require.NoError(t, tr.check(4))
		for i, w := range words {
			n, ok := tr.number(w)
			require.True(t, ok)
			require.Equal(t, uint32(i), n)
		}
		for _, w := range randomWords(random, 60, 5, 7) {
			_, listed := slices.BinarySearchFunc(words, w, slices.Compare[[]uint32])
			_, ok := tr.number(w)
			require.Equal(t, listed, ok, w)
		}
	}
}

// The automaton is minimal where it has a node for every distinct set of
// endings, and no more (Myhill–Nerode; Daciuk et al. 2000, section 2).
func TestTrieIsMinimal(t *testing.T) {
	random := rand.New(rand.NewPCG(5, 6))
	for range 100 {
		words := randomWords(random, 60, 3, 6)
		endings := map[string]map[string]bool{} // by beginning
		for _, w := range words {
			text := make([]byte, len(w))
			for i, label := range w {
				text[i] = 'a' + byte(label)
			}
			for i := range text {
				begin := string(text[:i])
				if endings[begin] == nil {
					endings[begin] = map[string]bool{}
				}
				endings[begin][string(text[i:])] = true
			}
		}
		distinct := map[string]bool{}
		for _, set := range endings {
			var all []string
			for e := range set {
				all = append(all, e)
			}
			slices.Sort(all)
			distinct[strings.Join(all, " ")] = true
		}
		tr := build(words)
		nodes := 0
		for i := range tr.skips[1:] {
			if tr.arcs[2*(i+1)]&lastArc != 0 {
				nodes++
			}
		}
		require.Equal(t, len(distinct), nodes)
	}
}

func TestEmptyTrieHasNoWords(t *testing.T) {
	for name, tr := range map[string]trie{"zero": {}, "built": build(nil)} {
		_, ok := tr.number([]uint32{0})
		assert.False(t, ok, name)
		_, ok = tr.number(nil)
		assert.False(t, ok, name)
	}
}
