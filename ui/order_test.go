package ui

import (
	"slices"
	"testing"

	tea "github.com/charmbracelet/bubbletea"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/internal/docket"
)

func isWeighed(msg tea.Msg) bool { _, ok := msg.(weighed); return ok }

const many = `The pilott, the harbor, the quai and the stromm. The clrek saw the bots, the ofice,
the lettr, the mol, the dwn, the shpi. Old Marrack came with Marack.
`

// The exact order comes once all candidates are there; it moves nothing that has
// been on screen.
func TestTheExactOrderMovesOnlyWhatLiesAhead(t *testing.T) {
	s := start(t, many)
	s.Docket.Reorder(docket.BySlip, nil)
	h := newHand(t, s, 80, 24)
	h.run() // begin
	last := h.runTo(isWeighed).(weighed)
	for e := range last.slips { // as if the candidates had turned all upside down
		last.slips[e] = 1 - s.Docket.Slip(e)
	}
	h.send(keyMsg("l"))
	h.send(keyMsg("l"))
	passed := slices.Clone(s.Docket.Entries[:3])
	here := h.m.entry
	require.Equal(t, passed[2], here)
	h.send(last)
	assert.Equal(t, here, h.m.entry, "the entry on screen stays")
	assert.Equal(t, passed, s.Docket.Entries[:3])
	ahead := s.Docket.Entries[3:]
	for i := range ahead[1:] {
		assert.LessOrEqual(t, s.Docket.Group(ahead[i]), s.Docket.Group(ahead[i+1]))
	}
	assert.NotEmpty(t, ahead)
	h.drain()
	h.press("h")
	assert.Equal(t, passed[1], h.m.entry)
}

func TestAKeyTurnsTheOrder(t *testing.T) {
	s := start(t, many)
	s.Docket.Reorder(docket.BySlip, nil)
	h := newHand(t, s, 80, 24)
	h.drain()
	first := h.form()
	for _, want := range []string{"place", "alphabet", "count", "dispersion", "slip"} {
		h.press("t")
		assert.Contains(t, h.screen(), "in order of "+want+" from here on")
		assert.Equal(t, docket.Order(want), s.Docket.Order())
		assert.Equal(t, first, h.form(), "the entry on screen stays")
		assert.Equal(t, first, s.Docket.Entries[0].Form)
	}
	h.press("t", "t", "l")
	var rest []string
	for _, e := range s.Docket.Entries[1:] {
		rest = append(rest, docket.FiledUnder(e.Form))
	}
	assert.True(t, slices.IsSorted(rest), "%v", rest)
}

func TestTheFactsTellHowLikelyASlipIs(t *testing.T) {
	h := ready(t, storm)
	assert.Regexp(t, `slip (<1|\d+) %`, h.screen())
	h.press("/", "mole", "enter")
	assert.NotRegexp(t, `slip (<1|\d+) %`, h.screen(), "a listed word is none")
}
