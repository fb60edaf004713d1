package lexicon_test

import (
	"context"
	"fmt"
	"maps"
	"math"
	"os"
	"slices"
	"strings"
	"testing"
	"time"

	"github.com/stretchr/testify/require"

	"emendary/align"
	"emendary/lexicon"
	"emendary/lexicon/english"
)

// misspelt returns the pairs of the open list of misspellings, folded; words that
// are two are left out.
func misspelt(t testing.TB) []align.Pair {
	data, err := os.ReadFile("../testdata/wikipedia-misspellings.tsv")
	require.NoError(t, err)
	var a align.Alphabet
	var pairs []align.Pair
	for _, line := range strings.Split(string(data), "\n")[1:] {
		form, word, _ := strings.Cut(line, "\t")
		word, _, _ = strings.Cut(word, ",")
		p := align.Pair{Form: a.AppendFolded(nil, form), Word: a.AppendFolded(nil, word), Weight: 1}
		if word != "" && !strings.Contains(word, " ") && !slices.Equal(p.Form, p.Word) {
			pairs = append(pairs, p)
		}
	}
	return pairs
}

// byLevel is a prior of the kind that a fitted one is: commoner words and shorter ones
// cost less.
func byLevel(w lexicon.Word, letters, use int) (int32, bool) {
	level, ok := w.Level(lexicon.AnyVariety)
	bits := 8 + float64(level)/8 + float64(min(letters, 12))/2
	if w.IsName() {
		bits += 4
	}
	return int32(max(bits-4*float64(use), 2) / align.Grain), ok
}

// cheapest returns those of words, which have their priors, that cost at most limit,
// by their letters.
func cheapest(words []lexicon.Match, sheet *align.Sheet, limit int32) map[string]lexicon.Match {
	var scorer align.Scorer
	best := map[string]lexicon.Match{}
	for _, m := range words {
		edits, ok := scorer.Score(sheet, m.Letters, limit-m.Prior+1)
		if !ok {
			continue
		}
		m.Edits = edits
		letters := fmt.Sprint(m.Letters)
		if other, ok := best[letters]; !ok || m.Total() < other.Total() || m.Total() == other.Total() && m.Word.Text < other.Word.Text {
			best[letters] = m
		}
	}
	return best
}

// The whole base lexicon on real misspellings, and on forms that ask for more than
// most.
func TestBestOfTheBaseIsThatOfAScan(t *testing.T) {
	pairs := misspelt(t)
	costs, err := align.Fit(context.Background(), pairs[:800], align.Origin{}, nil)
	require.NoError(t, err)
	x := lexicon.New(english.Base(), lexicon.AnyVariety)
	r := x.Ranking(byLevel, nil)
	var words []lexicon.Match
	for w := range english.Base().Words() {
		m := lexicon.Match{Word: w, Letters: x.Alphabet().AppendFolded(nil, w.Text)}
		var ok bool
		if m.Prior, ok = byLevel(w, min(len(m.Letters), lexicon.PriorLetters), 0); ok && x.Find(w.Text).Status == lexicon.Known {
			words = append(words, m)
		}
	}
	forms := [][]align.Letter{
		nil, []align.Letter("q"), []align.Letter("é"), []align.Letter("ж"), []align.Letter("teh"),
		[]align.Letter("3x"), []align.Letter("a"), []align.Letter("adn"), []align.Letter("responsabilty"), []align.Letter("entrpeneurialisim"), []align.Letter("naïvté"),
	}
	step := len(pairs) / 12
	for i := 0; i < len(pairs); i += step {
		forms = append(forms, pairs[i].Form)
	}
	for _, form := range forms {
		sheet := costs.Sheet(form)
		best := map[string]lexicon.Match{}
		for _, m := range r.Best(nil, sheet, 10, math.MaxInt32) {
			if letters := fmt.Sprint(m.Letters); best[letters].Word.Text == "" {
				best[letters] = m
			}
		}
		require.Len(t, best, 10, "%c", form)
		var last lexicon.Match
		for _, m := range best {
			if m.Total() > last.Total() || m.Total() == last.Total() && m.Word.Text > last.Word.Text {
				last = m
			}
		}
		want := cheapest(words, sheet, last.Total())
		maps.DeleteFunc(want, func(_ string, m lexicon.Match) bool { return m.Total() == last.Total() && m.Word.Text > last.Word.Text })
		require.Equal(t, want, best, "%c", form)
	}
}

func BenchmarkBest(b *testing.B) {
	pairs := misspelt(b)
	costs, err := align.Fit(context.Background(), pairs, align.Origin{}, nil)
	require.NoError(b, err)
	x := lexicon.New(english.Base(), lexicon.BritishIse)
	r := x.Ranking(byLevel, nil)
	sheet := new(align.Sheet)
	var matches []lexicon.Match
	for _, search := range []struct {
		name string
		of   func()
	}{
		{"ten", func() { matches = r.Best(matches[:0], sheet, 10, math.MaxInt32) }},
		{"near", func() { matches = r.Near(matches[:0], sheet, 10, math.MaxInt32, 10<<10) }},
	} {
		one := func(i int) {
			sheet.Reset(costs, pairs[i*7%len(pairs)].Form)
			search.of()
		}
		b.Run(search.name, func(b *testing.B) {
			for i := range 600 { // so that the prices are known, as after some hundred forms of a manuscript
				one(i)
			}
			var times []time.Duration
			b.ReportAllocs()
			for i := 0; b.Loop(); i++ {
				start := time.Now()
				one(i)
				times = append(times, time.Since(start))
			}
			slices.Sort(times)
			b.ReportMetric(float64(times[len(times)/2].Microseconds()), "median-µs")
			b.ReportMetric(float64(times[len(times)*99/100].Microseconds()), "p99-µs")
		})
	}
}

func BenchmarkRanking(b *testing.B) {
	x := lexicon.New(english.Base(), lexicon.BritishIse)
	words := texts(english.Base())
	used := func(yield func(string, int) bool) {
		for i := 0; i < 10_000; i++ {
			if !yield(words[i*13%len(words)], 1+i%7) {
				return
			}
		}
	}
	b.Run("base", func(b *testing.B) {
		for b.Loop() {
			x.Ranking(byLevel, nil)
		}
	})
	b.Run("used", func(b *testing.B) {
		for b.Loop() {
			x.Ranking(byLevel, used)
		}
	})
	b.Run("prior", func(b *testing.B) {
		r := x.Ranking(byLevel, used)
		for b.Loop() {
			r.WithPrior(byLevel)
		}
	})
}
