package docket

import (
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/internal/ledger"
)

// A writer of e for o: harber, majer, tailer, docter; and then errer.
const ofEForO = "The harber, a majer, the docter, that tailer and an anchers lay. He made no errer of sater.\n"

func costOf(t *testing.T, s *Session, form, word string) float64 {
	t.Helper()
	found, err := s.Docket.Candidates(t.Context(), s.Docket.Find(form), 10)
	require.NoError(t, err)
	for _, c := range found {
		if c.Text == word {
			return c.Cost
		}
	}
	t.Fatalf("%s is no candidate of %s: %v", word, form, found)
	return 0
}

func TestAcceptsMakeTheAuthorsSlipsLikelier(t *testing.T) {
	s := desk(t, ofEForO)
	before := costOf(t, s, "errer", "error")
	assert.Empty(t, s.Docket.Why("errer", "error"))
	rule(t, s, "majer", ledger.Accept, "major")
	rule(t, s, "docter", ledger.Accept, "doctor")
	assert.InDelta(t, before, costOf(t, s, "errer", "error"), 0, "only once they are taken up")
	assert.Equal(t, 2, s.Docket.Adapt())
	after := costOf(t, s, "errer", "error")
	assert.Less(t, after, before)
	assert.Regexp(t, `^this author: e for o ×2, \d+\.\d bits likelier$`, s.Docket.Why("errer", "error"))
}

func TestAdaptationIsAFunctionOfTheAcceptsInForce(t *testing.T) {
	one := desk(t, ofEForO)
	rule(t, one, "majer", ledger.Accept, "major")
	rule(t, one, "docter", ledger.Accept, "doctor")
	other := desk(t, ofEForO)
	rule(t, other, "docter", ledger.Accept, "doctor")
	undo(t, other, rule(t, other, "harber", ledger.Accept, "harbour"))
	rule(t, other, "tailer", ledger.Reject, "")
	rule(t, other, "majer", ledger.Accept, "major")
	one.Docket.Adapt()
	other.Docket.Adapt()
	assert.Equal(t, costOf(t, one, "errer", "error"), costOf(t, other, "errer", "error"))

	opened := reopen(t, one)
	assert.Equal(t, costOf(t, other, "errer", "error"), costOf(t, opened, "errer", "error"), "taken up on opening")
	fresh := desk(t, ofEForO)
	kept := reopen(t, opened, func(o *Options) { o.NoAdapt = true })
	assert.Equal(t, costOf(t, fresh, "errer", "error"), costOf(t, kept, "errer", "error"), "unless asked not to")
}

func TestTheOtherEnglishIsNoSlipOfTheAuthor(t *testing.T) {
	s := desk(t, "The colour and the honour; a harbour. The color grew; no honor, one harber.\n")
	require.Equal(t, OtherVariety, s.Docket.Find("color").Kind)
	rule(t, s, "color", ledger.Accept, "colour")
	assert.Zero(t, s.Docket.Adapt())
}
