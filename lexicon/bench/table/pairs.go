package main

import (
	"fmt"
	"io"
	"time"

	"emendary/lexicon/bench"
)

// pairs compares the ways to compute the distance of two words.
func pairs(w io.Writer, in input) error {
	near, far := in.misspellings, bench.FarPairs(in.misspellings)
	fmt.Fprintf(w, "Distances of %d pairs, each misspelling with its own word and with another, nanoseconds a pair:\n\n", len(near))
	fmt.Fprintln(w, "| | own word | another | ratio to ours, own | another |")
	fmt.Fprintln(w, "|---|---|---|---|---|")
	ownWords, others := bench.PairDistances(near), bench.PairDistances(far)
	nearTimes, err := timePairs(ownWords, len(near), in.rounds)
	if err != nil {
		return err
	}
	farTimes, err := timePairs(others, len(far), in.rounds)
	if err != nil {
		return err
	}
	first := map[bool]int{} // ours, by kind of distance
	for i, d := range ownWords {
		if _, ok := first[d.Transposed]; !ok {
			first[d.Transposed] = i
		}
		base := first[d.Transposed]
		fmt.Fprintf(w, "| %s | %.0f | %.0f | %.1f | %.1f |\n", d.Name,
			perPair(nearTimes[i], len(near)), perPair(farTimes[i], len(far)),
			ratio(nearTimes[i], nearTimes[base]), ratio(farTimes[i], farTimes[base]))
	}
	return nil
}

// timePairs returns how long each way takes for all pairs, whose distances it
// compares first. A pair is too short to be timed by itself.
func timePairs(ways []bench.Distances, n, rounds int) ([]time.Duration, error) {
	want := map[bool][]int{}
	for _, d := range ways {
		if want[d.Transposed] == nil {
			want[d.Transposed] = make([]int, n)
			for i := range n {
				want[d.Transposed][i] = d.Of(i)
			}
		}
	}
	contenders := make([]func(int) error, len(ways))
	for c, d := range ways {
		contenders[c] = func(int) error {
			for i := range n {
				if got := d.Of(i); got != want[d.Transposed][i] {
					return fmt.Errorf("pair %d: %s finds %d, ours %d", i+1, d.Name, got, want[d.Transposed][i])
				}
			}
			return nil
		}
	}
	timings, err := bench.Measure(1, 4*rounds, contenders...)
	if err != nil {
		return nil, err
	}
	times := make([]time.Duration, len(ways))
	for c, t := range timings {
		times[c] = t.Mean
	}
	return times, nil
}

func perPair(t time.Duration, n int) float64 { return float64(t) / float64(n) }

func ratio(a, b time.Duration) float64 { return float64(a) / float64(b) }
