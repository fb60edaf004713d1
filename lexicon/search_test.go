package lexicon

import (
	"math/rand/v2"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// The scratch space and the slice are the caller's here: a pool keeps none for
// certain.
func TestSearchAllocatesNothingOnceUsed(t *testing.T) {
	random := rand.New(rand.NewPCG(21, 22))
	l := gradedList(t, random)
	over, err := NewList("over", []Word{{Text: "abca"}, {Text: "zz"}})
	require.NoError(t, err)
	x := New(l, AnyVariety).With(Book, over)
	s := new(search)
	var near []Near
	for k := range maxBand + 2 {
		for _, form := range []string{"abc", "ccbaaba", "", "zzz", "ABx"} {
			query := func() { near = x.appendWithin(near[:0], s, form, k) }
			for range 5 {
				query()
			}
			if form != "abc" { // a word the book list covers is looked up
				assert.Zero(t, testing.AllocsPerRun(20, query), "%q within %d", form, k)
			}
		}
	}
}

func TestSearchWithoutReversedAutomatonFindsTheSame(t *testing.T) {
	random := rand.New(rand.NewPCG(23, 24))
	l := gradedList(t, random)
	forwardOnly := *l
	forwardOnly.reversed = reversed{childBit: l.reversed.childBit}
	x, y := New(l, American), New(&forwardOnly, American)
	for k := range maxBand + 2 {
		for _, form := range []string{"abc", "ccbaaba", "", "zzz", "ABx", "cacaca"} {
			assert.Equal(t, x.Within(form, k), y.Within(form, k), "%q within %d", form, k)
		}
	}
}
