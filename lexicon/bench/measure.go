package bench

import (
	"runtime"
	"slices"
	"time"
)

// Timing is how long queries took, one by one.
type Timing struct {
	Mean, Median, P99 time.Duration // P99 is the 99th percentile
}

// PerSecond returns how many queries one thread answers in a second.
func (t Timing) PerSecond() float64 { return float64(time.Second) / float64(t.Mean) }

// Measure times each contender, a function of the query's number, on so many
// queries. They take turns, rounds times over, so that a busy machine is busy for
// all; of each query the shortest time counts, since others' work can only add.
func Measure(queries, rounds int, contenders ...func(query int) error) ([]Timing, error) {
	least := make([][]time.Duration, len(contenders))
	for i := range least {
		least[i] = slices.Repeat([]time.Duration{1<<63 - 1}, queries)
	}
	for range rounds {
		for c, contender := range contenders {
			runtime.GC()
			for q := range queries {
				start := time.Now()
				if err := contender(q); err != nil {
					return nil, err
				}
				least[c][q] = min(least[c][q], time.Since(start))
			}
		}
	}
	timings := make([]Timing, len(contenders))
	for c, times := range least {
		var sum time.Duration
		for _, t := range times {
			sum += t
		}
		slices.Sort(times)
		timings[c] = Timing{sum / time.Duration(queries), times[queries/2], times[queries*99/100]}
	}
	return timings, nil
}
