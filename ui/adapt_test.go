package ui

import (
	"testing"

	"github.com/stretchr/testify/assert"
)

// One slip in three words.
const ofEForO = `# The Storm

The pilet came by before the old sterm had turned the ships befere the old harbour.
`

// What was accepted is taken up by a key; then the bench says why a candidate rose.
func TestAcceptedCorrectionsAreTakenUpByAKey(t *testing.T) {
	h := ready(t, ofEForO)
	h.press("f", "f", "h", "l")
	assert.Equal(t, "befere", h.form())
	assert.NotContains(t, h.screen(), "this author")
	h.press("e")
	assert.Contains(t, h.screen(), "2 corrections taken up")
	h.press("h", "l")
	assert.Equal(t, "befere", h.form())
	assert.Regexp(t, `substitute o for the second e · this author: e for o ×2`, h.screen())
	h.press("u", "u", "e")
	assert.Contains(t, h.screen(), "0 corrections taken up")
}
