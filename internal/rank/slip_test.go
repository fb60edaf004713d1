package rank

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

func TestEmbeddedWeightsAreThoseOfTheFeatures(t *testing.T) {
	w, err := ParseWeights(fitted)
	require.NoError(t, err)
	names, provisional := SlipFeatures()
	assert.Len(t, w.Exact, len(names))
	assert.Len(t, w.Provisional, provisional)
	assert.True(t, strings.HasPrefix(fitted, "# Weights of the slip model, fitted by fitslip on 20"), "the file says how it was made")
}

func TestWeightsComeBackFromText(t *testing.T) {
	w := SlipWeights()
	back, err := ParseWeights(w.Text([]string{"from nothing", "in no time"}))
	require.NoError(t, err)
	assert.Equal(t, w, back)
}

func TestWeightsOfOtherFeaturesAreRefused(t *testing.T) {
	text := SlipWeights().Text(nil)
	lines := strings.Split(strings.TrimSpace(text), "\n")
	tests := []struct{ name, text, want string }{
		{"none", "", "0 weights"},
		{"one too few", strings.Join(lines[:len(lines)-1], "\n"), "fit the weights anew"},
		{"one too many", text + "more\t1\t1\n", "are not those of the program"},
		{"another", strings.Replace(text, "hyphen", "dash", 1), "are not those of the program"},
		{"no number", strings.Replace(text, "constant\t", "constant\tx", 1), "is no number"},
		{"a column short", strings.Replace(text, "once\t", "once", 1), "are not those of the program"},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			_, err := ParseWeights(tt.text)
			assert.ErrorContains(t, err, tt.want)
		})
	}
}

// What any editor would say of two entries that differ in one thing.
func TestSlipFollowsTheEvidence(t *testing.T) {
	slip := Evidence{
		Form: "harbuor", Count: 1, Parts: 1, NearUse: 12, Searched: true, Found: true,
		Distance: 1, Cost: 5, Bits: 17, Share: 0.95, Gap: 0.9, Level: 20, Use: 12, FirstKept: true,
	}
	with := func(change func(*Evidence)) Evidence {
		e := slip
		change(&e)
		return e
	}
	tests := []struct {
		name string
		word Evidence
	}{
		{"capitals within sentences", with(func(e *Evidence) { e.Capital = 1 })},
		{"many occurrences", with(func(e *Evidence) { e.Count, e.Parts = 40, 9 })},
		{"an apostrophe", with(func(e *Evidence) { e.Elided = 1 })},
		{"a rarer best candidate", with(func(e *Evidence) { e.Level, e.Use, e.NearUse = 70, 0, 0 })},
		{"a best candidate far away", with(func(e *Evidence) { e.Distance, e.Cost, e.Bits, e.NearUse = 3, 28, 40, 0 })},
		{"company", with(func(e *Evidence) { e.Company = 5 })},
		{"another variety", with(func(e *Evidence) { e.Variety = true })},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			assert.Greater(t, SlipWeights().Slip(slip), SlipWeights().Slip(tt.word))
			assert.InDelta(t, 0.5, SlipWeights().Slip(tt.word), 0.5)
		})
	}
}

func TestEvidenceWithoutCandidatesGoesByTheProvisionalWeights(t *testing.T) {
	e := Evidence{Form: "harbuor", Count: 1, Parts: 1, Found: true, Distance: 1, Level: 10, Share: 1}
	before := SlipWeights().Slip(e)
	e.Level, e.Distance = 70, 3
	assert.Equal(t, before, SlipWeights().Slip(e))
	e.Searched = true
	assert.NotEqual(t, before, SlipWeights().Slip(e))
	_, provisional := SlipFeatures()
	assert.Len(t, SlipValues(Evidence{}), provisional)
}
