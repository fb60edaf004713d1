package bench

import (
	"math"
	"slices"

	"emendary/align"
	"emendary/internal/rank"
	"emendary/lexicon"
	"emendary/lexicon/english"
)

// Best is the search for the best words of the base lexicon under the embedded costs
// and the program's prior, for forms without capitals in no manuscript.
type Best struct {
	lexicon *lexicon.Lexicon
	ranking *lexicon.Ranking
	costs   *align.Fitted
	prior   lexicon.Prior
	sheet   align.Sheet
	form    []align.Letter
	matches []lexicon.Match
}

// NewBest returns such a search.
func NewBest() *Best {
	x := lexicon.New(english.Base(), lexicon.AnyVariety)
	model := rank.Default()
	prior := func(w lexicon.Word, letters, use int) (int32, bool) {
		return int32(math.Round(model.Prior(w, x.Variety(), letters, false, use, 0) / align.Grain)), true
	}
	return &Best{lexicon: x, ranking: x.Ranking(prior, nil), costs: english.Costs(), prior: prior}
}

// Ten returns the ten best words for form. They stand until the next search.
func (b *Best) Ten(form string) []lexicon.Match {
	b.reset(form)
	b.matches = b.ranking.Best(b.matches[:0], &b.sheet, 10, math.MaxInt32)
	return b.matches
}

// Near returns the best words for form, ten at most, that are at most ten bits behind
// the first. They stand until the next search.
func (b *Best) Near(form string) []lexicon.Match {
	b.reset(form)
	b.matches = b.ranking.Near(b.matches[:0], &b.sheet, 10, math.MaxInt32, 10/align.Grain)
	return b.matches
}

func (b *Best) reset(form string) {
	b.form = b.lexicon.Alphabet().AppendFolded(b.form[:0], form)
	b.sheet.Reset(b.costs, b.form)
}

// Totals returns what the best words cost; words with the same letters count once.
func Totals(matches []lexicon.Match) []int32 {
	var totals []int32
	for i := range matches {
		same := func(m lexicon.Match) bool { return slices.Equal(m.Letters, matches[i].Letters) }
		if !slices.ContainsFunc(matches[:i], same) {
			totals = append(totals, matches[i].Total())
		}
	}
	return totals
}

// Scan returns what the n best words for form cost, by pricing every word of the
// lexicon; words with the same letters count once.
func (b *Best) Scan(form string, n int) []int32 {
	b.reset(form)
	var scorer align.Scorer
	var best []int32
	last := []align.Letter(nil)
	least := int32(math.MaxInt32)
	add := func() {
		if i, _ := slices.BinarySearch(best, least); i < n {
			best = slices.Insert(best, i, least)[:min(len(best)+1, n)]
		}
	}
	for w := range english.Base().Words() {
		letters := b.lexicon.Alphabet().AppendFolded(nil, w.Text)
		prior, _ := b.prior(w, min(len(letters), lexicon.PriorLetters), 0)
		edits, ok := scorer.Score(&b.sheet, letters, math.MaxInt32/2)
		switch {
		case !ok || b.lexicon.Find(w.Text).Status != lexicon.Known:
			continue
		case slices.Equal(letters, last):
			least = min(least, edits+prior)
			continue
		case last != nil:
			add()
		}
		last, least = letters, edits+prior
	}
	add()
	return best
}
