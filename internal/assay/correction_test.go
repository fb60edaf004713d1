package assay

import (
	"context"
	"errors"
	"os"
	"runtime"
	"strings"
	"sync/atomic"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/align"
	"emendary/internal/docket"
	"emendary/lexicon"
	"emendary/lexicon/english"
)

// port is a lexicon of few words.
func port(t *testing.T) *lexicon.Lexicon {
	t.Helper()
	list, err := lexicon.Load(strings.NewReader("a\nlot\nharbour\nharbours\nlantern\nquay\nNewlyn\nall\nright\ntime\nisn't\nsea\nwall\nstall\nstill\n"), "port")
	require.NoError(t, err)
	return lexicon.New(list, lexicon.AnyVariety)
}

func TestPairsLeftOut(t *testing.T) {
	tests := []struct {
		form, intended string
		want           Reason
	}{
		{"harber", "harbour", ""},
		{"harber", "harbinger,harbour", ""},
		{"alot", "a lot", ""},
		{"seawal", "sea-wall", ""},
		{"newlin", "Newlyn", ""},
		{"", "harbour", NoForm},
		{"harber", "", NoIntended},
		{"", "", NoForm},
		{"HARBOUR", "harbour", SameWord},
		{"isn’t", "isn't", SameWord},
		{"harbour", "harbours,harbour", SameWord},
		{"quayside", "Quayside", SameWord},
		{"harbour", "harbours", FormListed},
		{"sea wall", "seawall", FormListed},
		{"sea-wall", "seawall", FormListed},
		{"lighthous", "lighthouse", Unlisted},
		{"alrigt", "all rite", Unlisted},
	}
	lex := port(t)
	for _, tt := range tests {
		t.Run(tt.form+" "+tt.intended, func(t *testing.T) {
			pairs, err := ReadPairs(strings.NewReader(tt.form+"\t"+tt.intended), "pairs")
			require.NoError(t, err)
			assert.Equal(t, tt.want, leftOut(pairs[0], lex))
			a, err := AssayPairs(context.Background(), pairs, lex, nil, nil)
			require.NoError(t, err)
			if tt.want == "" {
				assert.Equal(t, [2]int{1, 0}, [2]int{a.N, a.LeftOut})
			} else {
				assert.Equal(t, [2]int{0, 1}, [2]int{a.N, a.LeftOut})
				assert.Equal(t, 1, a.Reasons[tt.want])
				assert.Contains(t, Reasons(), tt.want)
			}
		})
	}
}

func TestRank(t *testing.T) {
	candidates := []docket.Candidate{{Text: "Harbor"}, {Text: "HARBOUR"}, {Text: "isn’t"}, {Text: "a lot"}, {Text: "cr\u00e8che"}}
	tests := []struct {
		name, intended string
		want           int
	}{
		{"the first", "harbor", 1},
		{"the second, in capitals", "harbour", 2},
		{"the first of several", "a lot,harbour", 2},
		{"straight for curly", "isn't", 3},
		{"two words", "a lot", 4},
		{"an accent encoded otherwise", "cre\u0300che", 5},
		{"none", "quay", 0},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			assert.Equal(t, tt.want, rank(candidates, strings.Split(tt.intended, ",")))
		})
	}
}

func TestPairsAreMeasured(t *testing.T) {
	pairs := []Pair{
		{"lantrn", []string{"lantern"}}, {"Harbuor", []string{"harbour"}}, {"stll", []string{"still"}},
		{"seawall", []string{"sea wall"}}, {"qzzy", []string{"wall"}}, {"quay", []string{"wall"}},
	}
	steps := 0
	a, err := AssayPairs(context.Background(), pairs, port(t), nil, func(done, total int) {
		steps++
		assert.Equal(t, [2]int{steps, 5}, [2]int{done, total})
	})
	require.NoError(t, err)
	assert.Equal(t, 5, steps)
	assert.Equal(t, [2]int{5, 1}, [2]int{a.N, a.LeftOut})
	assert.InDelta(t, 3.0/5, a.Top1, 1e-12)
	assert.InDelta(t, 4.0/5, a.Top3, 1e-12)
	assert.InDelta(t, (3+1.0/2)/5, a.MRR, 1e-12)
	require.Len(t, a.Misses, 2)
	assert.Equal(t, Miss{"stll", []string{"still"}, 2, a.Misses[0].Candidates}, a.Misses[0])
	assert.Equal(t, []string{"stall", "still"}, a.Misses[0].Candidates[:2])
	assert.Equal(t, 0, a.Misses[1].Rank)
}

// misspellings are the first n pairs of the open list.
func misspellings(t *testing.T, n int) []Pair {
	t.Helper()
	f, err := os.Open("../../testdata/wikipedia-misspellings.tsv")
	require.NoError(t, err)
	defer f.Close()
	pairs, err := ReadPairs(f, "wikipedia-misspellings.tsv")
	require.NoError(t, err)
	return pairs[:n]
}

// What all cores make of folds is what one makes of them, one after the other: each
// pair under costs that never saw a word that it intends.
func TestFoldsAreMeasuredAsOneByOne(t *testing.T) {
	ctx, lex, pairs := context.Background(), lexicon.New(english.Base(), lexicon.AnyVariety), misspellings(t, 150)
	const k = 3
	folds, err := Folds(pairs, k)
	require.NoError(t, err)
	var want []Miss
	n := 0
	searches := [k]*docket.Search{}
	for fold := range k {
		var others []Pair
		for i, p := range pairs {
			if folds[i] != fold {
				others = append(others, p)
			}
		}
		fit, _ := ToFit(others)
		costs, err := align.Fit(ctx, fit, align.Origin{}, nil)
		require.NoError(t, err)
		searches[fold] = docket.NewSearch(lex, costs)
	}
	for i, p := range pairs {
		if leftOut(p, lex) != "" {
			continue
		}
		n++
		found, err := searches[folds[i]].Candidates(ctx, p.Form, Depth)
		require.NoError(t, err)
		if r := rank(found, p.Intended); r != 1 {
			want = append(want, Miss{p.Form, p.Intended, r, texts(found)})
		}
	}
	require.NotEmpty(t, want)

	last := 0
	got, err := AssayFolds(ctx, pairs, lex, k, func(done, total int) {
		assert.GreaterOrEqual(t, done, last)
		assert.Equal(t, 2*n, total)
		last = done
	})
	require.NoError(t, err)
	assert.Equal(t, 2*n, last)
	assert.Equal(t, n, got.N)
	assert.Equal(t, want, got.Misses)

	cores := runtime.GOMAXPROCS(1)
	defer runtime.GOMAXPROCS(cores)
	again, err := AssayFolds(ctx, pairs, lex, k, nil)
	require.NoError(t, err)
	assert.Equal(t, got, again, "on one core")
}

func TestFoldsThatCannotBeFitted(t *testing.T) {
	pairs := []Pair{{"harber", []string{"harbour"}}, {"harbuor", []string{"harbour"}}}
	_, err := AssayFolds(context.Background(), pairs, port(t), 2, nil)
	assert.EqualError(t, err, "2 folds leave no pairs to fit costs to beside those of one fold; give more pairs, or measure without folds")
	_, err = AssayFolds(context.Background(), pairs, port(t), 3, nil)
	assert.ErrorContains(t, err, "3 folds of 2 pairs")
}

func TestMeasuringPairsStopsWithItsContext(t *testing.T) {
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	pairs := misspellings(t, 20)
	_, err := AssayPairs(ctx, pairs, port(t), nil, nil)
	assert.ErrorIs(t, err, context.Canceled)
	_, err = AssayFolds(ctx, pairs, port(t), 2, nil)
	assert.ErrorIs(t, err, context.Canceled)
}

func TestOnAllCores(t *testing.T) {
	for _, n := range []int{0, 1, 2, 100} {
		calls := make([]atomic.Int32, n)
		last := 0
		err := onAllCores(context.Background(), n, func(done int) {
			assert.Equal(t, last+1, done)
			last = done
		}, func(_ context.Context, i int) error {
			calls[i].Add(1)
			return nil
		})
		require.NoError(t, err)
		assert.Equal(t, n, last)
		for i := range calls {
			assert.EqualValues(t, 1, calls[i].Load(), "%d of %d", i, n)
		}
	}
}

func TestOnAllCoresStopsAtAnError(t *testing.T) {
	bad := errors.New("bad")
	var calls atomic.Int32
	err := onAllCores(context.Background(), 1000, nil, func(context.Context, int) error {
		calls.Add(1)
		return bad
	})
	assert.ErrorIs(t, err, bad)
	assert.LessOrEqual(t, int(calls.Load()), runtime.GOMAXPROCS(0))
}
