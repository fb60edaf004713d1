package main

import (
	"cmp"
	"fmt"
	"io"
	"slices"

	"emendary/lexicon/bench"
)

// search compares the ways to find all words within k edits.
func search(w io.Writer, in input) error {
	words := bench.Words(in.level)
	fmt.Fprintf(w, "All words within k edits, %d words, %d misspelt queries:\n\n", len(words), len(in.misspellings))
	fmt.Fprintln(w, "| k | | queries a second | median | 99th percentile |")
	fmt.Fprintln(w, "|---|---|---|---|---|")
	for k := 1; k <= 2; k++ {
		ours, peer, err := bench.Searches(words, k)
		if err != nil {
			return err
		}
		for _, p := range in.misspellings {
			if err := sameWords(ours, peer, p.Form); err != nil {
				return err
			}
		}
		timings, err := bench.Measure(len(in.misspellings), in.rounds,
			func(q int) error { return ours.Within(in.misspellings[q].Form, ignore) },
			func(q int) error { return peer.Within(in.misspellings[q].Form, ignore) })
		if err != nil {
			return err
		}
		for i, name := range []string{"lexicon.AppendWithin", "blevesearch/vellum"} {
			t := timings[i]
			fmt.Fprintf(w, "| %d | %s | %.0f | %.1f µs | %.1f µs |\n", k, name, t.PerSecond(),
				float64(t.Median)/1000, float64(t.P99)/1000)
		}
		fmt.Fprintf(w, "| %d | ratio | %.1f | %.1f | %.1f |\n", k, timings[0].PerSecond()/timings[1].PerSecond(),
			ratio(timings[1].Median, timings[0].Median), ratio(timings[1].P99, timings[0].P99))
		fmt.Fprintf(w, "| %d | peer's median to our 99th percentile | | | %.1f |\n", k, ratio(timings[1].Median, timings[0].P99))
	}
	return nil
}

func ignore([]byte, int) {}

type near struct {
	word     string
	distance int
}

// sameWords returns an error where two searches find other words near a form.
func sameWords(ours, peer bench.Search, form string) error {
	var found [2][]near
	for i, s := range []bench.Search{ours, peer} {
		err := s.Within(form, func(word []byte, distance int) {
			found[i] = append(found[i], near{string(word), distance})
		})
		if err != nil {
			return err
		}
		slices.SortFunc(found[i], func(a, b near) int { return cmp.Compare(a.word, b.word) })
	}
	if !slices.Equal(found[0], found[1]) {
		return fmt.Errorf("%s: we find %v, the peer %v", form, found[0], found[1])
	}
	return nil
}
