package main

import (
	"fmt"
	"io"
	"time"

	"emendary/lexicon/bench"
)

// bookLength is how many words a text is repeated to.
const bookLength = 250_000

// count compares the ways to split a text into words and count them, on one thread.
func count(w io.Writer, in input) error {
	text, err := bench.Prose(in.text, bookLength)
	if err != nil {
		return err
	}
	ways := bench.Countings()
	if err := bench.SameCounts(text, ways[0], ways[1]); err != nil {
		return err
	}
	different := ways[0].Count(text, nil)
	contenders := make([]func(int) error, len(ways), len(ways)+1)
	for c, way := range ways {
		contenders[c] = func(int) error {
			if got := way.Count(text, nil); got != different {
				return fmt.Errorf("%s finds %d words, before %d", way.Name, got, different)
			}
			return nil
		}
	}
	data := []byte(text)
	contenders = append(contenders, func(int) error {
		_, _, err := bench.Reading(data)
		return err
	})
	words, _, err := bench.Reading(data)
	if err != nil {
		return err
	}
	timings, err := bench.Measure(1, 2*in.rounds, contenders...)
	if err != nil {
		return err
	}
	fmt.Fprintf(w, "Splitting and counting %.1f MB of prose, %d different words by UAX #29, one thread:\n\n", float64(len(text))/1e6, different)
	fmt.Fprintln(w, "| | ms | MB/s | ratio to ours |")
	fmt.Fprintln(w, "|---|---|---|---|")
	names := []string{ways[0].Name, ways[1].Name, fmt.Sprintf("all of manuscript.Read, and counting its %d words", words)}
	for i, t := range timings {
		fmt.Fprintf(w, "| %s | %.1f | %.0f | %.1f |\n", names[i], float64(t.Mean)/float64(time.Millisecond),
			float64(len(text))/1e6/t.Mean.Seconds(), ratio(t.Mean, timings[0].Mean))
	}
	return nil
}
