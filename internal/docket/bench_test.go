package docket

import (
	"context"
	"fmt"
	"math/rand/v2"
	"slices"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"

	"emendary/internal/manuscript"
	"emendary/lexicon"
	"emendary/lexicon/english"
)

// novel is words running words of prose of our own making: commoner words oftener,
// one word in forty misspelt, so that some thousands of forms are unknown.
func novel(words int) []byte {
	r := rand.New(rand.NewPCG(1, 2))
	var stock []string
	for w := range english.Base().Words() {
		if len(w.Text) > 3 && r.IntN(12) == 0 {
			stock = append(stock, w.Text)
		}
	}
	r.Shuffle(len(stock), func(i, j int) { stock[i], stock[j] = stock[j], stock[i] })
	zipf := rand.NewZipf(r, 1.2, 8, uint64(len(stock)-1))
	var b strings.Builder
	for i := range words {
		switch {
		case i%20_000 == 0:
			fmt.Fprintf(&b, "\n\n## Chapter %d\n\n", i/20_000+1)
		case i%120 == 0:
			b.WriteString(".\n\n")
		}
		w := stock[zipf.Uint64()]
		if i%40 == 0 {
			letters := []rune(w)
			w = string(slices.Insert(letters, 1+r.IntN(len(letters)-1), 'a'+rune(r.IntN(26))))
		}
		b.WriteString(w)
		b.WriteByte(' ')
	}
	return []byte(b.String())
}

// build lays out the docket of a manuscript that nobody has ruled on.
func build(ctx context.Context, doc *manuscript.Document, lex *lexicon.Lexicon) (*Docket, error) {
	c, err := count(ctx, doc, lex, noProgress)
	if err != nil {
		return nil, err
	}
	return lay(doc, c, lex, english.Costs(), nil), nil
}

func BenchmarkDocketOfANovel(b *testing.B) {
	text := novel(250_000)
	lex := lexicon.New(english.Base(), lexicon.American)
	b.SetBytes(int64(len(text)))
	for b.Loop() {
		doc, err := manuscript.Read("novel.md", text, manuscript.Options{})
		require.NoError(b, err)
		d, err := build(context.Background(), doc, lex)
		require.NoError(b, err)
		require.Greater(b, len(d.Entries), 1000)
		b.ReportMetric(float64(len(d.Entries)), "entries")
	}
}

func BenchmarkCandidatesOfANovel(b *testing.B) {
	doc, err := manuscript.Read("novel.md", novel(50_000), manuscript.Options{})
	require.NoError(b, err)
	d, err := build(context.Background(), doc, lexicon.New(english.Base(), lexicon.American))
	require.NoError(b, err)
	for i := 0; b.Loop(); i++ {
		cs, err := d.Candidates(context.Background(), d.Entries[i%len(d.Entries)], 10)
		require.NoError(b, err)
		require.LessOrEqual(b, len(cs), 10)
	}
}

func BenchmarkSlipsOfANovel(b *testing.B) {
	doc, err := manuscript.Read("novel.md", novel(250_000), manuscript.Options{})
	require.NoError(b, err)
	d, err := build(context.Background(), doc, lexicon.New(english.Base(), lexicon.American))
	require.NoError(b, err)
	for b.Loop() {
		fresh := &Docket{Document: d.Document, census: d.census, base: d.base, use: d.use, laid: d.laid}
		for _, e := range fresh.laid {
			require.InDelta(b, 0.5, fresh.Slip(e), 0.5)
		}
	}
}
