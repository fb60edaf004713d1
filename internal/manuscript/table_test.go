package manuscript

import (
	"maps"
	"math/rand/v2"
	"os"
	"strings"
	"testing"

	"github.com/rivo/uniseg"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

func TestTableCountsAsAMapDoes(t *testing.T) {
	r := rand.New(rand.NewPCG(3, 4))
	var table Table[int]
	want := map[string]int{}
	for range 200_000 {
		word := make([]byte, r.IntN(20))
		for i := range word {
			word[i] = "\x00ab\xFF"[r.IntN(2+2*(len(word)%2))] // zeros, so that only the length tells some apart
		}
		want[string(word)]++
		*table.At(string(word))++
	}
	assert.Equal(t, len(want), table.Len())
	assert.Greater(t, len(want), 10_000)
	assert.Equal(t, want, maps.Collect(table.All))
}

func TestHeadsOfShortWordsHoldAllOfThem(t *testing.T) {
	for n := range 9 {
		word, want := "", uint64(0)
		for i := range n {
			word += string([]byte{byte(0xF8 + i)})
			want |= uint64(0xF8+i) << (8 * i)
		}
		assert.Equal(t, want, headOf(word), "%d bytes", n)
	}
}

// countSlowly counts the segments of the general library in a map.
func countSlowly(text string) map[string]int {
	counts := map[string]int{}
	for state := -1; text != ""; {
		var word string
		word, text, state = uniseg.FirstWordInString(text, state)
		if strings.IndexFunc(word, isWordRune) >= 0 {
			counts[word]++
		}
	}
	return counts
}

func TestSegmentsAreCountedAsTheLibraryCutsThem(t *testing.T) {
	data, err := os.ReadFile("../../testdata/demo/manuscript.md")
	require.NoError(t, err)
	texts := append(seeds(), string(data))
	for _, segments := range breakTest(t, "testdata/WordBreakTest.txt", "WordBreakTest-15.0.0.txt") {
		texts = append(texts, strings.Join(segments, ""))
	}
	for _, text := range texts {
		assert.Equal(t, countSlowly(text), maps.Collect(CountSegments(text).All), "%q", text)
	}
}
