package lexicon

import (
	"cmp"
	"context"
	"maps"
	"math"
	"math/rand/v2"
	"os"
	"slices"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"

	"emendary/align"
)

// listedPairs returns the pairs of the open list of misspellings: every step-th.
func listedPairs(t testing.TB, step int) [][2]string {
	data, err := os.ReadFile("../testdata/wikipedia-misspellings.tsv")
	require.NoError(t, err)
	var pairs [][2]string
	for i, line := range strings.Split(string(data), "\n") {
		form, word, ok := strings.Cut(line, "\t")
		word, _, _ = strings.Cut(word, ",")
		if ok && i%step == 1 && !strings.Contains(word, " ") {
			pairs = append(pairs, [2]string{form, word})
		}
	}
	return pairs
}

func fitted(t testing.TB, pairs [][2]string) *align.Fitted {
	var a align.Alphabet
	var labelled []align.Pair
	for _, p := range pairs {
		form, word := a.AppendFolded(nil, p[0]), a.AppendFolded(nil, p[1])
		if !slices.Equal(form, word) {
			labelled = append(labelled, align.Pair{Form: form, Word: word, Weight: 1})
		}
	}
	f, err := align.Fit(context.Background(), labelled, align.Origin{}, nil)
	require.NoError(t, err)
	return f
}

// scanned is the answer of Best by pricing every word of the lexicon.
func scanned(x *Lexicon, costs *align.Fitted, p Prior, used map[string]int, form string, n int, limit int32) []Match {
	letters := x.alphabet.AppendFolded(nil, form)
	sheet := costs.Sheet(letters)
	var scorer align.Scorer
	var all []Match
	seen := map[string]bool{} // in a higher layer
	for which := layers - 1; which >= 0; which-- {
		y := x.layers[which]
		if y == nil {
			continue
		}
		for w := range y.Words() {
			w.Layer = Layer(which)
			hidden := seen[w.Text]
			seen[w.Text] = true
			if hidden || w.Barred || !sourceVarieties(w.Sources).has(x.variety) {
				continue
			}
			if f := x.Find(w.Text); f.Status != Known {
				continue
			}
			m := Match{Word: w, Letters: x.alphabet.AppendFolded(nil, w.Text)}
			asked := w
			if used[w.Text] == 0 {
				asked.Text = ""
			}
			prior, ok := p(asked, min(len(m.Letters), PriorLetters), used[w.Text])
			if !ok {
				continue
			}
			m.Prior = prior
			if m.Edits, ok = scorer.Score(sheet, m.Letters, never); ok && m.Total() <= limit {
				all = append(all, m)
			}
		}
	}
	slices.SortFunc(all, func(x, y Match) int {
		return cmp.Or(cmp.Compare(x.Total(), y.Total()), strings.Compare(x.Word.Text, y.Word.Text))
	})
	var heads [][]align.Letter
	for _, m := range all {
		if len(heads) < n && !slices.ContainsFunc(heads, func(l []align.Letter) bool { return slices.Equal(l, m.Letters) }) {
			heads = append(heads, m.Letters)
		}
	}
	return slices.DeleteFunc(all, func(m Match) bool {
		return !slices.ContainsFunc(heads, func(l []align.Letter) bool { return slices.Equal(l, m.Letters) })
	})
}

// randomPrior looks at all that a prior may look at.
func randomPrior(random *rand.Rand, v Variety) Prior {
	seed, scale := random.Uint64(), int32(1+random.IntN(12000))
	return func(w Word, letters, use int) (int32, bool) {
		level, _ := w.Level(v)
		h := seed + uint64(level)*31 + uint64(letters)*7919 + uint64(w.Layer)*104729 + uint64(use)*15485863
		if w.IsName() {
			h += 3
		}
		h *= 0x9e3779b97f4a7c15
		return int32(h>>33) % scale, h>>60 != 0
	}
}

func TestBestIsThatOfAScan(t *testing.T) {
	costs := fitted(t, listedPairs(t, 7))
	random := rand.New(rand.NewPCG(21, 22))
	for range 150 {
		v := Variety(random.IntN(len(varieties)))
		x := New(gradedList(t, random), v)
		for which := Foreign; which <= Book; which++ {
			if random.IntN(3) == 0 {
				x = x.With(which, gradedList(t, random))
			}
		}
		used := map[string]int{}
		for _, y := range x.layers {
			if y == nil {
				continue
			}
			for w := range y.Words() {
				if random.IntN(5) == 0 {
					used[w.Text] = 1 + random.IntN(9)
				}
			}
		}
		used["unknown"] = 4
		p := randomPrior(random, v)
		r := x.Ranking(p, maps.All(used))
		if random.IntN(2) == 0 {
			p = randomPrior(random, v)
			r = r.WithPrior(p)
		}
		for range 6 {
			form := ""
			for range random.IntN(8) {
				form += string([]rune("abcé")[random.IntN(4)])
			}
			n := 1 + random.IntN(12)
			limit := int32(math.MaxInt32)
			if random.IntN(2) == 0 {
				limit = int32(random.IntN(40 << 10))
			}
			want := scanned(x, costs, p, used, form, n, limit)
			sheet := costs.Sheet(x.alphabet.AppendFolded(nil, form))
			got := r.Best(nil, sheet, n, limit)
			if random.IntN(3) == 0 {
				margin := int32(random.IntN(8 << 10))
				want = scanned(x, costs, p, used, form, n, math.MaxInt32)
				want = slices.DeleteFunc(want, func(m Match) bool { return m.Total() > want[0].Total()+margin })
				got = r.Near(got[:0], sheet, n, math.MaxInt32, margin)
			}
			require.Equal(t, len(want), len(got), "%q", form)
			for i := range want {
				require.Equal(t, want[i], got[i], "%q, %d", form, i)
			}
		}
	}
}

// requireScanned asks for the best n words of forms and compares them with those of a
// scan.
func requireScanned(t *testing.T, x *Lexicon, costs *align.Fitted, p Prior, forms []string, n int) {
	r := x.Ranking(p, nil)
	sheet := new(align.Sheet)
	for _, form := range forms {
		sheet.Reset(costs, x.alphabet.AppendFolded(nil, form))
		want := scanned(x, costs, p, nil, form, n, math.MaxInt32)
		require.Equal(t, want, r.Best(nil, sheet, n, math.MaxInt32), "%q", form)
		want = slices.DeleteFunc(want, func(m Match) bool { return m.Total() > want[0].Total()+8<<10 })
		require.Equal(t, want, r.Near(nil, sheet, n, math.MaxInt32, 8<<10), "%q", form)
	}
}

func listOf(t *testing.T, texts []string) *List {
	var words []Word
	for _, text := range texts {
		words = append(words, Word{Text: text, Sources: []Source{{Category: "english", Class: "words", Level: 10}}})
	}
	l, err := NewList("words", words)
	require.NoError(t, err)
	return l
}

// randomTexts returns words of least to most letters out of some.
func randomTexts(random *rand.Rand, n, least, most int, letters string) []string {
	texts := make([]string, n)
	for i := range texts {
		for range least + random.IntN(most-least+1) {
			texts[i] += string(letters[random.IntN(len(letters))])
		}
	}
	return texts
}

// Where two letters changed over cost less than one written for another, the row with
// the first of them may cost too much by itself, and the whole be within the bound.
func TestBestWithTranspositionsCheaperThanSubstitutions(t *testing.T) {
	random := rand.New(rand.NewPCG(23, 24))
	var pairs [][2]string
	for _, w := range randomTexts(random, 300, 2, 7, "abcd") {
		i := random.IntN(len(w) - 1)
		pairs = append(pairs, [2]string{w[:i] + w[i+1:i+2] + w[i:i+1] + w[i+2:], w})
	}
	costs := fitted(t, pairs)
	sheet := costs.Sheet([]align.Letter("abcd"))
	var least align.Least
	sheet.Least(&least)
	for i := range 3 {
		for _, c := range "abcd" {
			if c != rune(sheet.Form()[i]) {
				require.Less(t, sheet.Swap(i), least.One[align.Symbol(align.Letter(c))][i])
			}
		}
	}
	x := New(listOf(t, randomTexts(random, 400, 1, 9, "abcd")), AnyVariety)
	p := func(w Word, letters, use int) (int32, bool) { return int32(letters) << 9, true }
	requireScanned(t, x, costs, p, randomTexts(random, 150, 1, 9, "abcd"), 5)
}

// Long words with four errors, and words longer than a machine word has bits, are no
// further out of reach than others.
func TestBestOfLongWordsWithFourErrors(t *testing.T) {
	costs := fitted(t, listedPairs(t, 7))
	random := rand.New(rand.NewPCG(25, 26))
	for _, c := range []struct{ words, least, most int }{{300, 12, 24}, {60, 60, 75}, {30, 90, MaxLetters}} {
		words := randomTexts(random, c.words, c.least, c.most, "abcdefgh")
		x := New(listOf(t, words), AnyVariety)
		var forms []string
		for range 12 {
			form := []byte(words[random.IntN(len(words))])
			for range 4 {
				i := random.IntN(len(form) - 1)
				switch random.IntN(4) {
				case 0:
					form = slices.Delete(form, i, i+1)
				case 1:
					form = slices.Insert(form, i, form[random.IntN(len(form))])
				case 2:
					form[i] = form[random.IntN(len(form))]
				case 3:
					form[i], form[i+1] = form[i+1], form[i]
				}
			}
			forms = append(forms, string(form))
		}
		p := func(w Word, letters, use int) (int32, bool) { return 8<<10 + int32(letters)<<9, true }
		requireScanned(t, x, costs, p, forms, 3)
	}
}

// Once the prices of some forms are known, a search allocates nothing.
func TestBestAllocatesNothing(t *testing.T) {
	pairs := listedPairs(t, 20)
	costs := fitted(t, pairs)
	var words []Word
	var forms [][]align.Letter
	for _, p := range pairs {
		words = append(words, Word{Text: p[1]})
	}
	list, err := NewList("intended", words)
	require.NoError(t, err)
	x := New(list, AnyVariety)
	for _, p := range pairs[:20] {
		forms = append(forms, x.alphabet.AppendFolded(nil, p[0]))
	}
	r := x.Ranking(func(Word, int, int) (int32, bool) { return 9 << 10, true }, nil)
	b, sheet := new(best), new(align.Sheet)
	var matches []Match
	search := func() {
		for _, form := range forms {
			sheet.Reset(costs, form)
			matches = b.appendBest(matches[:0], r, sheet, 10, never, never)
		}
	}
	search()
	require.Len(t, matches, 10)
	require.Zero(t, testing.AllocsPerRun(3, search))
}
