package lexicon_test

import (
	"fmt"
	"testing"

	"github.com/agnivade/levenshtein"

	"emendary/lexicon"
	"emendary/lexicon/english"
)

// BenchmarkWithin searches the whole base lexicon for misspelt words; the last
// one is its baseline, a scan of all words by a general library (Levenshtein, so
// that it finds fewer).
func BenchmarkWithin(b *testing.B) {
	x := lexicon.New(english.Base(), lexicon.AnyVariety)
	forms := misspellings(texts(english.Base()), 300, 3)
	for k := 1; k <= 5; k++ {
		b.Run(fmt.Sprint("k=", k), func(b *testing.B) {
			b.ReportAllocs()
			found := 0
			var near []lexicon.Near
			for i := 0; b.Loop(); i++ {
				near = x.AppendWithin(near[:0], forms[i%len(forms)], k)
				found += len(near)
			}
			b.ReportMetric(float64(found)/float64(b.N), "words/op")
		})
	}
	b.Run("k=2/scan", func(b *testing.B) {
		words := texts(english.Base())
		found := 0
		for i := 0; b.Loop(); i++ {
			for _, w := range words {
				if levenshtein.ComputeDistance(forms[i%len(forms)], w) <= 2 {
					found++
				}
			}
		}
		b.ReportMetric(float64(found)/float64(b.N), "words/op")
	})
}

func BenchmarkFind(b *testing.B) {
	x := lexicon.New(english.Base(), lexicon.American)
	forms := misspellings(texts(english.Base()), 300, 1)
	b.ReportAllocs()
	for i := 0; b.Loop(); i++ {
		x.Find(forms[i%len(forms)])
	}
}
