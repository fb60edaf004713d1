package align

import (
	"math/rand/v2"
	"testing"

	"github.com/stretchr/testify/require"
)

// The plain matrix is the definition, and every length about that of a machine
// word is met, with few letters, with many, and with some above ASCII.
func TestDistancesByColumnsAreThoseByRows(t *testing.T) {
	random := rand.New(rand.NewPCG(1, 2))
	letters := func(n, kinds int, above Letter) []Letter {
		s := make([]Letter, n)
		for i := range s {
			s[i] = 'a' + Letter(random.IntN(kinds))
			if above > 0 && random.IntN(4) == 0 {
				s[i] += above
			}
		}
		return s
	}
	check := func(a, b []Letter) {
		require.Equal(t, levenshteinByRows(a, b), byColumns(a, b, false), "%v %v", a, b)
		require.Equal(t, restrictedByRows(a, b), byColumns(a, b, true), "%v %v", a, b)
	}
	for range 200 {
		for _, kinds := range []int{2, 4, 26} {
			for _, above := range []Letter{0, -32, 32, 128, 1 << 21} { // equal in their last bits
				check(letters(random.IntN(12), kinds, above), letters(random.IntN(12), kinds, above))
			}
		}
	}
	for _, n := range []int{0, 1, 31, 32, 33, 62, 63, 64} {
		for _, m := range []int{0, 1, 62, 63, 64, 65, 66, 127, 128, 129, 300} {
			for _, kinds := range []int{2, 26} {
				check(letters(m, kinds, 0), letters(n, kinds, 0))
			}
		}
		a := letters(n, 3, 0) // and near ones
		b := append([]Letter(nil), a...)
		for i := 1; i < n; i += 5 {
			b[i-1], b[i] = b[i], b[i-1]
		}
		check(a, b)
	}
}

// Strings that differ from their first letter to their last, so that nothing of
// them is cut off, on both sides of what a column holds.
func TestDistancesAgreeWhereColumnsEnd(t *testing.T) {
	for n := 60; n <= 70; n++ {
		a, b := make([]Letter, n), make([]Letter, n)
		for i := range n {
			a[i], b[i] = 'a'+Letter(i%2), 'b'-Letter(i%2)
		}
		b = append(b, 'c')
		require.Equal(t, levenshteinByRows(b, a), Levenshtein(a, b), n)
		require.Equal(t, restrictedByRows(b, a), Restricted(a, b), n)
	}
}

func TestDistancesOfShortStringsAllocateNothing(t *testing.T) {
	a, b := []Letter("acomodationally"), []Letter("accommodatoinaly")
	require.Zero(t, testing.AllocsPerRun(10, func() { Levenshtein(a, b); Restricted(a, b) }))
}
