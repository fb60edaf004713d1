package main

import (
	"fmt"
	"io"
	"slices"

	"emendary/lexicon/bench"
)

const (
	// asked says that one in so many queries is asked, scanned that the best words of
	// one in so many of these are compared with those of a scan of the whole lexicon,
	// which takes far longer than all else.
	asked, scanned = 4, 25
)

// best compares the exact search for the best ten words, by fitted costs and prior,
// with the peer's for all words within two edits, which are in no order.
func best(w io.Writer, in input) error {
	words := bench.Words(lexiconLevel)
	var forms []string
	for q := 0; q < len(in.misspellings); q += asked {
		forms = append(forms, in.misspellings[q].Form)
	}
	fmt.Fprintf(w, "The best ten words by fitted costs and prior, default lexicon, %d words, %d misspelt queries:\n\n", len(words), len(forms))
	ours := bench.NewBest()
	for q := 0; q < len(forms); q += scanned {
		form := forms[q]
		if want, got := ours.Scan(form, 10), bench.Totals(ours.Ten(form)); !slices.Equal(want, got) {
			return fmt.Errorf("%s: the best ten words cost %v grains, by a scan %v", form, got, want)
		}
	}
	peer, err := bench.NewVellum(words, 2)
	if err != nil {
		return err
	}
	timings, err := bench.Measure(len(forms), in.rounds,
		func(q int) error { ours.Ten(forms[q]); return nil },
		func(q int) error { ours.Near(forms[q]); return nil },
		func(q int) error { return peer.Within(forms[q], ignore) })
	if err != nil {
		return err
	}
	fmt.Fprintln(w, "| | median | 99th percentile | median to the peer's | 99th percentile to own median |")
	fmt.Fprintln(w, "|---|---|---|---|---|")
	for i, name := range []string{
		"lexicon.Ranking.Best, ten", "lexicon.Ranking.Near, ten within 10 bits of the first", "blevesearch/vellum, all within 2 edits",
	} {
		t := timings[i]
		fmt.Fprintf(w, "| %s | %.1f µs | %.1f µs | %.2f | %.1f |\n", name, float64(t.Median)/1000, float64(t.P99)/1000,
			ratio(t.Median, timings[2].Median), ratio(t.P99, t.Median))
	}
	return nil
}

// lexiconLevel is the greatest size level of the default lexicon.
const lexiconLevel = 70
