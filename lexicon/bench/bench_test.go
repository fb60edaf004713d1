package bench_test

import (
	"cmp"
	"slices"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/lexicon/bench"
)

const testdata = "../../testdata"

type near struct {
	word     string
	distance int
}

func within(t *testing.T, s bench.Search, form string) []near {
	all := make([]near, 0)
	require.NoError(t, s.Within(form, func(word []byte, distance int) {
		all = append(all, near{string(word), distance})
	}))
	slices.SortFunc(all, func(a, b near) int {
		return cmp.Or(cmp.Compare(a.distance, b.distance), cmp.Compare(a.word, b.word))
	})
	return all
}

func TestSearchesFindTheSame(t *testing.T) {
	words := bench.Words(60)
	require.Greater(t, len(words), 90_000)
	pairs, err := bench.Misspellings(testdata)
	require.NoError(t, err)
	require.Greater(t, len(pairs), 4000)
	for k := 1; k <= 2; k++ {
		ours, peer, err := bench.Searches(words, k)
		require.NoError(t, err)
		found := 0
		for _, p := range pairs {
			want := within(t, peer, p.Form)
			require.Equal(t, want, within(t, ours, p.Form), "%s within %d", p.Form, k)
			found += len(want)
		}
		assert.Greater(t, found, len(pairs))
	}
}

func TestDistancesAreTheSame(t *testing.T) {
	pairs, err := bench.Misspellings(testdata)
	require.NoError(t, err)
	pairs = append(pairs, bench.FarPairs(pairs)...)
	all := bench.PairDistances(pairs)
	for i, p := range pairs {
		first := map[bool]int{}
		for _, d := range all {
			distance := d.Of(i)
			if want, ok := first[d.Transposed]; ok {
				require.Equal(t, want, distance, "%s: %s", d.Name, p)
			}
			first[d.Transposed] = distance
		}
	}
}

func TestCountingsFindTheSame(t *testing.T) {
	text, err := bench.Prose(testdata+"/demo/manuscript.md", 5000)
	require.NoError(t, err)
	ways := bench.Countings()
	require.NoError(t, bench.SameCounts(text, ways[0], ways[1]))
	assert.Greater(t, ways[1].Count(text, nil), 1000)
	more := bench.Counting{Name: "more", Count: func(text string, found func(string, int)) int {
		found("harbour", 1)
		return 1 + ways[0].Count(text, found)
	}}
	require.Error(t, bench.SameCounts(text, ways[0], more))
	words, different, err := bench.Reading([]byte(text))
	require.NoError(t, err)
	assert.Greater(t, words, 4000)
	assert.Greater(t, different, 1000)
}

func TestMeasureTakesTheShortestOfEachQuery(t *testing.T) {
	calls := make([]int, 3)
	timings, err := bench.Measure(3, 4, func(q int) error { calls[q]++; return nil })
	require.NoError(t, err)
	assert.Equal(t, []int{4, 4, 4}, calls)
	require.Len(t, timings, 1)
	assert.LessOrEqual(t, timings[0].Median, timings[0].P99)
	_, err = bench.Measure(1, 1, func(int) error { return assert.AnError })
	assert.ErrorIs(t, err, assert.AnError)
}

func TestBestWordsAreThoseOfAScan(t *testing.T) {
	pairs, err := bench.Misspellings(testdata)
	require.NoError(t, err)
	b := bench.NewBest()
	for _, p := range pairs[:4] {
		want := b.Scan(p.Form, 10)
		require.Equal(t, want, bench.Totals(b.Ten(p.Form)), p.Form)
		near := slices.DeleteFunc(want, func(total int32) bool { return total > want[0]+10<<10 })
		require.Equal(t, near, bench.Totals(b.Near(p.Form)), p.Form)
	}
}
