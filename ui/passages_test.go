package ui

import (
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/internal/docket"
	"emendary/internal/ledger"
)

const song = `The pilot stood on the mole.

The clerk said, “Genir pawb yn rhydd ac yn gydradd mewn urddas a hawliau,” and left.

The harbor was old.
`

// genir is the form of its passage.
const genir = "Genir pawb yn rhydd ac yn gydradd mewn urddas a hawliau"

func TestAPassageIsLetStandInItsLanguage(t *testing.T) {
	h := ready(t, song)
	require.Equal(t, genir, h.form())
	assert.Contains(t, h.screen(), "11 words, mostly unknown")
	assert.Contains(t, h.screen(), "p unfold")
	assert.Contains(t, h.screen(), "2 open")
	h.press("d", "Welsh")
	assert.Contains(t, h.screen(), "language")
	h.press("esc")
	assert.Empty(t, h.rulings(genir))
	h.press("d", "Welsh", "enter")
	r := h.rulings(genir)
	require.Len(t, r, 1)
	assert.Equal(t, ledger.Reject, r[0].Act)
	assert.Equal(t, "Welsh", r[0].Kind)
	assert.Equal(t, "harbor", h.form())
	assert.Contains(t, h.screen(), "stands as Welsh, 1 citation")
	h.press("h", "d")
	assert.Equal(t, "Welsh", h.m.language.Value(), "the language last named is proposed")
}

func TestAPassageIsUnfoldedByOneKey(t *testing.T) {
	h := ready(t, song)
	h.press("p")
	assert.Equal(t, ledger.Unfold, h.rulings(genir)[0].Act)
	assert.Equal(t, "Genir", h.form(), "its first word is next")
	assert.Contains(t, h.screen(), "10 open")
	h.press("d")
	assert.Equal(t, "pawb", h.form())
	h.press("u")
	assert.Equal(t, "Genir", h.form())
	h.press("u")
	assert.Equal(t, genir, h.form(), "undo folds it again")
	assert.Contains(t, h.screen(), "2 open · 0 ruled")
	h.press("r")
	assert.Contains(t, h.screen(), "10 open")
}

func TestWhatIsNotForAPassageSaysSo(t *testing.T) {
	h := ready(t, song)
	for _, key := range []string{"f", ";"} {
		h.press(key)
		assert.Contains(t, h.m.message, "a passage stands (d) or is unfolded (p)")
		assert.Equal(t, onBench, h.m.screen)
	}
	h.press("s")
	assert.Equal(t, onLanguage, h.m.screen)
	h.press("esc", "a", "Whose words?", "enter")
	assert.Equal(t, "Whose words?", h.rulings(genir)[0].Query)
	h.press("/", "harbor", "enter", "p")
	assert.Contains(t, h.m.message, "only a passage can be unfolded")
}

func TestTheOnlyLanguageKnownIsProposed(t *testing.T) {
	h := ready(t, song)
	h.m.session.Options.With = []docket.Language{{Name: "Welsh", File: "welsh.txt"}}
	h.press("d")
	assert.Equal(t, "Welsh", h.m.language.Value())
}
