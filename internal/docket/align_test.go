package docket

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/align"
	"emendary/internal/ledger"
)

// Words too long for a full table are still aligned to the letter: the edits make
// the word of the form, and where both are alike for long, at no other cost.
func TestAlignmentOfWordsBeyondMeasure(t *testing.T) {
	long := strings.Repeat("ab", 2_000)
	tests := []struct {
		name, form, word string
		cost             float64
	}{
		{"alike", long, long, 0},
		{"a letter within", long + "x" + long, long + "y" + long, 1},
		{"a letter more at the end", long, long + "x", 1},
		{"a letter less at the start", "x" + long, long, 1},
		{"nothing alike", strings.Repeat("a", 4_000), strings.Repeat("b", 4_001), 4_001},
	}
	var alphabet align.Alphabet
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			form, word := alphabet.Letters(tt.form), alphabet.Letters(tt.word)
			a := alignment(form, word, align.Unit{})
			assert.InDelta(t, tt.cost, a.Cost, 0)
			got, err := a.Apply(form)
			require.NoError(t, err)
			assert.Equal(t, tt.word, alphabet.Text(got...))
		})
	}
}

func TestAWordBeyondMeasureIsRuledOnLikeAnyOther(t *testing.T) {
	long := strings.Repeat("ab", 20_000)
	s := desk(t, "The "+long+"harber froze.\n")
	e := s.Docket.Entries[0]
	cs, err := s.Docket.Candidates(t.Context(), e, 5)
	require.NoError(t, err)
	assert.Empty(t, cs)
	rule(t, s, e.Form, ledger.Accept, long+"harbour")
	assert.Equal(t, "The "+long+"harbour froze.\n", emended(t, s))
}
