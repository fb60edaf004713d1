package align

import (
	"context"
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// fittedToFew returns costs with all kinds of edits in them.
func fittedToFew(t *testing.T) *Fitted {
	var pairs []Pair
	for _, p := range [][2]string{
		{"acomodate", "accommodate"}, {"recieve", "receive"}, {"beleive", "believe"}, {"untill", "until"}, {"seperate", "separate"},
		{"fotograf", "photograph"}, {"responsable", "responsible"}, {"teh", "the"}, {"wich", "which"}, {"occured", "occurred"},
		{"fone", "phone"}, {"foto", "photo"}, {"adress", "address"}, {"tommorow", "tomorrow"}, {"its", "it's"}, {"reponsable", "responsible"},
	} {
		pairs = append(pairs, Pair{Form: fold(p[0]), Word: fold(p[1]), Weight: 1})
	}
	f, err := Fit(context.Background(), pairs, Origin{}, nil)
	require.NoError(t, err)
	return f
}

func fold(s string) []Letter {
	var a Alphabet
	return a.AppendFolded(nil, s)
}

// before are the letters that may stand before one, 0 for none.
var before = []Letter{0, 'a', 'b', 'c', 'e', 'h', 'l', 'm', 'o', 'p', 's', 't', 'z', '\'', '-', 'é', 'ж'}

// Whatever stands before, no edit costs less than its bound, and some edit costs as much.
func TestLeastIsBelowAllPrices(t *testing.T) {
	f := fittedToFew(t)
	for _, text := range []string{"", "a", "fotos", "acomodable", "naïve", "teh", "abcdefghijklmnopqrstuvwxyz"} {
		s := f.Sheet(fold(text))
		var least Least
		s.Least(&least)
		letters := append([]Letter{}, before[1:]...)
		for _, letter := range letters {
			c := Symbol(letter)
			for i := range len(s.Form()) + 1 {
				for _, left := range before {
					at := s.Spot(left, left == 0, letter)
					bound := least.Insert[c][i]
					if left != 0 && Symbol(left) == c {
						bound = least.Twice[c][i]
					}
					require.LessOrEqual(t, bound, s.Insert(at, i), "%s: %c%c before %d", text, left, letter, i)
					require.LessOrEqual(t, least.Lengthen, bound)
					if i == len(s.Form()) {
						continue
					}
					require.LessOrEqual(t, least.One[c][i], s.One(at, i), "%s: %c%c for %d", text, left, letter, i)
					require.LessOrEqual(t, least.Delete[i], s.Delete(at, i), "%s: %d after %c", text, i, letter)
					require.LessOrEqual(t, least.Shorten, least.Delete[i])
				}
			}
		}
		for i := range s.Form() {
			reached := int32(math.MaxInt32)
			for left := range uint8(symbols) {
				reached = min(reached, s.Delete(SpotOf(0, left, 0), i))
			}
			assert.Equal(t, least.Delete[i], reached)
		}
		for _, e := range s.Long() {
			if e.N > e.M {
				assert.LessOrEqual(t, least.Lengthen*int32(e.N-e.M), e.Price)
			}
			if e.M > e.N {
				assert.LessOrEqual(t, least.Shorten*int32(e.M-e.N), e.Price)
			}
		}
	}
}

// The sets of symbols have all that cost at most so much, and none that costs half a bit
// more.
func TestAtMostHasAllThatCostNoMore(t *testing.T) {
	f := fittedToFew(t)
	s := f.Sheet(fold("acomodable"))
	for left := range uint8(symbols) {
		for i := range len(s.Form()) + 1 {
			for _, price := range []int32{-1, 0, 511, 512, 3000, 5000, 8191, 9000, 20_000, 32_767, 32_768, 60_000} {
				inserts, ones := s.InsertsAtMost(left, i, price), ^uint32(0)
				if i < len(s.Form()) {
					ones = s.OnesAtMost(left, i, price)
				}
				for c := uint8(1); c < symbols; c++ {
					at := SpotOf(-1, c, left)
					check := func(set uint32, cost int32) {
						if cost <= price {
							require.NotZero(t, set>>c&1, "%d after %d at %d for %d", c, left, i, price)
						}
						if price < Reaches<<ReachBits && cost > price+1<<ReachBits {
							require.Zero(t, set>>c&1, "%d after %d at %d for %d", c, left, i, price)
						}
					}
					check(inserts, s.Insert(at, i))
					if i < len(s.Form()) {
						check(ones, s.One(at, i))
					}
				}
			}
		}
	}
}
