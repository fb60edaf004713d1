package docket

import (
	"context"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/lexicon"
	"emendary/lexicon/english"
)

// What an editor would put first. The costs are those of the open list of
// misspellings; the answers are common practice.
func TestTheFirstCandidateIsWhatAnEditorWouldPutFirst(t *testing.T) {
	s := NewSearch(lexicon.New(english.Base(), lexicon.BritishIse), english.Costs())
	tests := []struct{ name, form, want string }{
		{"a transposition", "teh", "the"},
		{"a doubled letter", "neeed", "need"},
		{"an undoubled letter", "accomodate", "accommodate"},
		{"a letter for letters", "fotograf", "photograph"},
		{"letters for a letter", "rnorning", "morning"},
		{"an ending", "responsable", "responsible"},
		{"two words run together", "alot", "a lot"},
		{"two others", "inthe", "in the"},
		{"an apostrophe left out", "dont", "don't"},
		{"a long word with four errors", "responcabilaty", "responsibility"},
		{"capitals", "SEPERATE", "SEPARATE"},
		{"a first capital", "Seperate", "Separate"},
		{"a compound", "lantrn-light", "lantern-light"},
		{"a name for a form with a capital", "Febuary", "February"},
		{"the other English", "color", "colour"},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			found, err := s.Candidates(context.Background(), tt.form, 5)
			require.NoError(t, err)
			require.NotEmpty(t, found)
			assert.Equal(t, tt.want, found[0].Text)
			var sum float64
			for i, c := range found {
				sum += c.Share
				if i > 0 {
					assert.LessOrEqual(t, c.Share, found[i-1].Share)
				}
				assert.Positive(t, c.Cost)
			}
			assert.LessOrEqual(t, sum, 1+1e-9)
		})
	}
}

func TestCandidatesOfAFormWithoutAnApostrophe(t *testing.T) {
	s := NewSearch(lexicon.New(english.Base(), lexicon.BritishIse), english.Costs())
	found, err := s.Candidates(context.Background(), "charwomans", 3)
	require.NoError(t, err)
	var texts []string
	for _, c := range found {
		texts = append(texts, c.Text)
	}
	assert.Contains(t, texts, "charwoman's")
}

func TestWhatIsLikeNoWordHasNoCandidates(t *testing.T) {
	s := NewSearch(lexicon.New(english.Base(), lexicon.BritishIse), english.Costs())
	for _, form := range []string{"xqzvvvv", "ж", ""} {
		found, err := s.Candidates(context.Background(), form, 3)
		require.NoError(t, err)
		assert.Empty(t, found, form)
	}
}

func TestUnitCostsCountEdits(t *testing.T) {
	s := NewSearch(lexicon.New(english.Base(), lexicon.BritishIse), nil)
	found, err := s.Candidates(context.Background(), "nieghbour", 2)
	require.NoError(t, err)
	require.NotEmpty(t, found)
	assert.Equal(t, "neighbour", found[0].Text)
	assert.InDelta(t, 1, found[0].Cost, 0)
}

// What the manuscript itself uses is likelier there, two words side by side too.
func TestTheManuscriptsOwnWordsComeFirst(t *testing.T) {
	share := func(text string) float64 {
		s := desk(t, text)
		found, err := s.Docket.Candidates(t.Context(), s.Docket.Find("larbour"), 5)
		require.NoError(t, err)
		for _, c := range found {
			if c.Text == "harbour" {
				return c.Share
			}
		}
		return 0
	}
	const form = "The larbour froze.\n"
	assert.Greater(t, share(form+"The harbour, a harbour, one harbour, this harbour, that harbour.\n"), 2*share(form))
	h := desk(t, "An all-time low, the all-time best. It was alltime.\n")
	compound, err := h.Docket.Candidates(t.Context(), h.Docket.Find("alltime"), 5)
	require.NoError(t, err)
	require.NotEmpty(t, compound)
	assert.Equal(t, "all-time", compound[0].Text)
	s := desk(t, "He met the tide wife. A tide wife, the tide wife, no tide wife and that tide wife. The tidewife sang.\n")
	found, err := s.Docket.Candidates(t.Context(), s.Docket.Find("tidewife"), 5)
	require.NoError(t, err)
	require.NotEmpty(t, found)
	assert.Equal(t, "tide wife", found[0].Text)
	assert.Equal(t, "two words", found[0].Remark)
}

// A name that drifts: what the manuscript has often is what a rarer form like it may
// stand for, though no list knows it.
func TestAFamiliarFormIsACandidateOfARarerOne(t *testing.T) {
	s := desk(t, "Captain Brannock came. He saw Brannock; Brannock spoke. Then Brannock and old Brannock left Branock.\n")
	found, err := s.Docket.Candidates(t.Context(), s.Docket.Find("Branock"), 5)
	require.NoError(t, err)
	require.NotEmpty(t, found)
	assert.Equal(t, "Brannock", found[0].Text)
	assert.Equal(t, "×5 here", found[0].Remark)
	plural := desk(t, "Brannock saw Brannock; Brannock spoke to Brannock. The Brannocks left.\n")
	found, err = plural.Docket.Candidates(t.Context(), plural.Docket.Find("Brannocks"), 5)
	require.NoError(t, err)
	for _, c := range found {
		assert.NotEqual(t, "Brannock", c.Text, "a plural is no slip for its singular")
	}
	found, err = s.Docket.Candidates(t.Context(), s.Docket.Find("Brannock"), 5)
	require.NoError(t, err)
	for _, c := range found {
		assert.NotEqual(t, "Branock", c.Text, "not the other way round")
	}
}
