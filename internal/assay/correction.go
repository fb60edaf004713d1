package assay

import (
	"context"
	"fmt"
	"slices"

	"emendary/align"
	"emendary/internal/docket"
	"emendary/lexicon"
)

// AssayPairs measures how often the intended word of a pair is among the first
// candidates of its misspelling, out of lex and under costs; nil costs are unit
// costs. A candidate is right if it is one of the intended words, capitals and the
// style of apostrophes apart.
//
// progress, where it is not nil, hears of each pair. The work goes on on all cores;
// how many there are makes no difference to the result.
func AssayPairs(ctx context.Context, pairs []Pair, lex *lexicon.Lexicon, costs *align.Fitted, progress func(done, total int)) (Accuracy, error) {
	kept, reasons := sift(pairs, lex)
	search := docket.NewSearch(lex, costs)
	return measure(ctx, pairs, kept, reasons, func(int) *docket.Search { return search }, course{progress, 0, len(kept)})
}

// AssayFolds measures as [AssayPairs] does, by k-fold cross-validation: the pairs of
// each of the [Folds] under costs fitted to those of all other folds.
func AssayFolds(ctx context.Context, pairs []Pair, lex *lexicon.Lexicon, k int, progress func(done, total int)) (Accuracy, error) {
	folds, err := Folds(pairs, k)
	if err != nil {
		return Accuracy{}, err
	}
	kept, reasons := sift(pairs, lex)
	total := 2 * len(kept) // fitting takes about as long as looking
	searches := make([]*docket.Search, k)
	fitted := func(done int) { course{progress, 0, total}.at(done * len(kept) / k) }
	err = onAllCores(ctx, k, fitted, func(ctx context.Context, fold int) error {
		in := func(i int) bool { return folds[i] == fold }
		if !slices.ContainsFunc(kept, in) {
			return nil
		}
		var others []Pair
		for i, p := range pairs {
			if !in(i) {
				others = append(others, p)
			}
		}
		fit, _ := ToFit(others)
		if len(fit) == 0 {
			return fmt.Errorf("%d folds leave no pairs to fit costs to beside those of one fold; give more pairs, or measure without folds", k)
		}
		costs, err := align.Fit(ctx, fit, align.Origin{}, nil)
		searches[fold] = docket.NewSearch(lex, costs)
		return err
	})
	if err != nil {
		return Accuracy{}, err
	}
	return measure(ctx, pairs, kept, reasons, func(i int) *docket.Search { return searches[folds[i]] }, course{progress, len(kept), total})
}

// course is where work stands that goes on from start to total.
type course struct {
	progress     func(done, total int) // nil for nobody who asks
	start, total int
}

func (c course) at(done int) {
	if c.progress != nil {
		c.progress(c.start+done, c.total)
	}
}

// sift returns the numbers of the pairs that count, and why the others do not.
func sift(pairs []Pair, lex *lexicon.Lexicon) (kept []int, reasons map[Reason]int) {
	reasons = map[Reason]int{NoForm: 0, NoIntended: 0, SameWord: 0, FormListed: 0, Unlisted: 0}
	for i, p := range pairs {
		if why := leftOut(p, lex); why != "" {
			reasons[why]++
		} else {
			kept = append(kept, i)
		}
	}
	return kept, reasons
}

// leftOut returns why p does not count, "" if it does.
func leftOut(p Pair, lex *lexicon.Lexicon) Reason {
	form := key(p.Form)
	switch {
	case form == "":
		return NoForm
	case len(p.Intended) == 0:
		return NoIntended
	case slices.ContainsFunc(p.Intended, func(word string) bool { return key(word) == form }):
		return SameWord
	case docket.Knows(lex, p.Form):
		return FormListed
	case !slices.ContainsFunc(p.Intended, func(word string) bool { return docket.Knows(lex, word) }):
		return Unlisted
	}
	return ""
}

// measure looks for the candidates of the kept pairs, each with its own search.
func measure(ctx context.Context, pairs []Pair, kept []int, reasons map[Reason]int, search func(i int) *docket.Search, c course) (Accuracy, error) {
	ranks, first := make([]int, len(kept)), make([][]docket.Candidate, len(kept))
	err := onAllCores(ctx, len(kept), c.at, func(ctx context.Context, at int) (err error) {
		p := pairs[kept[at]]
		first[at], err = search(kept[at]).Candidates(ctx, p.Form, Depth)
		ranks[at] = rank(first[at], p.Intended)
		return err
	})
	if err != nil {
		return Accuracy{}, err
	}
	a := accuracy(ranks, reasons)
	a.Misses = []Miss{}
	for at, r := range ranks {
		if p := pairs[kept[at]]; r != 1 {
			a.Misses = append(a.Misses, Miss{p.Form, p.Intended, r, texts(first[at])})
		}
	}
	return a, nil
}

// rank returns the rank of the first candidate that is one of words, from 1; 0 where
// none is.
func rank(candidates []docket.Candidate, words []string) int {
	return 1 + slices.IndexFunc(candidates, func(c docket.Candidate) bool {
		got := key(c.Text)
		return slices.ContainsFunc(words, func(word string) bool { return key(word) == got })
	})
}

// shownOfMiss is how many candidates a miss shows.
const shownOfMiss = 5

func texts(candidates []docket.Candidate) []string {
	out := make([]string, min(len(candidates), shownOfMiss))
	for i := range out {
		out[i] = candidates[i].Text
	}
	return out
}
