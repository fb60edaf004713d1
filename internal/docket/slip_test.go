package docket

import (
	"context"
	"strings"
	"sync"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/align"
	"emendary/internal/rank"
)

const quay = `# One

The harbour lay still. The harbuor master Brannock saw Brannock’s lamp on the harbour wall.
“He was a-goin’ nowheres,” said Brannock, “and nothin’ ailed him.”

# Two

Brannock and Branock met. The harbour froze over. In the 2th hour he came to gether his nets.
The color of it! The wall was quiet, the harbour quiteness itself; the lampless of the harbour.
`

func TestSlipsComeBeforeWordsOfTheBook(t *testing.T) {
	s := desk(t, quay)
	exact := func(form string) float64 {
		e := s.Docket.Find(form)
		require.NotNil(t, e, form)
		found, err := s.Docket.Candidates(context.Background(), e, 5)
		require.NoError(t, err)
		return s.Docket.SlipGiven(e, found)
	}
	provisional := func(form string) float64 { return s.Docket.Slip(s.Docket.Find(form)) }
	tests := []struct{ slip, word string }{
		{"harbuor", "Brannock"}, {"harbuor", "nothin'"}, {"harbuor", "lampless"},
		{"2th", "harbuor"}, {"Branock", "Brannock"},
	}
	for _, tt := range tests {
		t.Run(tt.slip+" before "+tt.word, func(t *testing.T) {
			assert.Greater(t, exact(tt.slip), exact(tt.word), "exact")
			assert.Greater(t, provisional(tt.slip), provisional(tt.word), "provisional")
		})
	}
	assert.Zero(t, exact("harbour"), "a listed word")
}

func TestEvidenceOfTheManuscript(t *testing.T) {
	d := desk(t, quay).Docket
	of := func(form string) rank.Evidence { return d.Evidence(d.Find(form)) }
	assert.Equal(t, 5, of("harbuor").NearUse)
	assert.Zero(t, of("harbuor").NearOwn)
	assert.Equal(t, d.use["brannock"], of("Branock").NearOwn)
	assert.Equal(t, 2, of("Brannock").Parts)
	assert.Equal(t, 4, of("Brannock").Count)
	assert.InDelta(t, 0.75, of("Brannock").Capital, 1e-9)
	assert.InDelta(t, 0.25, of("Brannock").Start, 1e-9)
	assert.InDelta(t, 0, of("Brannock").Speech, 1e-9)
	assert.InDelta(t, 1, of("nothin'").Elided, 1e-9)
	assert.True(t, of("lampless").Coined)
	assert.False(t, of("harbuor").Coined || of("harbuor").Derived)
	assert.InDelta(t, 1, of("nowheres").Speech, 1e-9)
	assert.InDelta(t, 2, of("nowheres").Company, 1e-9, "a-goin’ and nothin’")
	assert.Positive(t, of("nowheres").Dialect)
}

// The entries one edit away by hashes are those by comparing every pair.
func TestNeighboursEqualAComparisonOfAllPairs(t *testing.T) {
	letters := []rune("aeibn’é")
	var b strings.Builder
	state := uint32(1)
	for range 600 { // a chain of letters in every mixture, words of three to seven
		for range 3 + state>>8%5 {
			state = state*1664525 + 1013904223
			b.WriteRune(letters[state>>16%uint32(len(letters))])
		}
		b.WriteString("\n\n") // paragraphs of their own, or they would be a passage
	}
	d := desk(t, b.String()).Docket
	ours := map[string]bool{}
	for _, e := range d.laid {
		ours[Key(e.Form)] = true
	}
	fold := func(s string) []align.Letter { return d.base.Alphabet().Letters(s) }
	got := make([]rank.Evidence, len(d.laid))
	uses := d.surveyed().uses
	d.neighbours(got, uses)
	met := 0
	for i, e := range d.laid {
		want := rank.Evidence{}
		for k, u := range uses {
			if e.Kind == Join || len([]rune(Key(e.Form))) < leastStem || align.Restricted(fold(Key(e.Form)), fold(k)) != 1 {
				continue
			}
			met++
			if ours[k] {
				want.NearOwn = max(want.NearOwn, u.all)
			} else {
				want.NearUse = max(want.NearUse, u.all)
			}
		}
		require.Equal(t, want, got[i], e.Form)
	}
	assert.Greater(t, met, 100)
}

func TestSlipMayBeAskedAtOnce(t *testing.T) {
	d := desk(t, quay).Docket
	var wait sync.WaitGroup
	for range 4 {
		wait.Go(func() {
			for _, e := range d.laid {
				assert.InDelta(t, 0.5, d.Slip(e), 0.5)
				assert.InDelta(t, 0.5, d.SlipGiven(e, nil), 0.5)
			}
		})
	}
	wait.Wait()
}
