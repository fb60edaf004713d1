package ui

import (
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/internal/docket"
	"emendary/internal/ledger"
)

func TestAReviewResumesAfterTheLastRuling(t *testing.T) {
	s := start(t, storm)
	path := s.Options.Manuscript
	h := newHand(t, s, 80, 24)
	h.drain()
	h.press("l", "d")
	require.NoError(t, s.Close())
	h = newHand(t, restart(t, path), 80, 24)
	h.drain()
	assert.Contains(t, h.m.message, "resumed: 1 entry ruled, the latest: quai stands")
	assert.Equal(t, "harbors", h.form())
	h.press("u")
	assert.Equal(t, "quai", h.form(), "undo works after a restart")
	assert.Empty(t, h.rulings("quai"))
	h.press("r")
	assert.Len(t, h.rulings("quai"), 1)
}

func TestAReviewBySlipResumesWithTheLikeliestThatIsOpen(t *testing.T) {
	s := start(t, many)
	path := s.Options.Manuscript
	s.Docket.Reorder(docket.BySlip, nil)
	h := newHand(t, s, 80, 24)
	h.drain()
	first := h.form()
	h.press("l", "l", "d") // the first two are passed over
	require.NoError(t, s.Close())
	s = restart(t, path)
	s.Docket.Reorder(docket.BySlip, nil)
	h = newHand(t, s, 80, 24)
	h.drain()
	assert.Equal(t, first, h.form())
}

func TestPlacesThatAreGoneAreTold(t *testing.T) {
	s := start(t, storm)
	path := s.Options.Manuscript
	h := newHand(t, s, 80, 24)
	h.drain()
	h.press("l", "d")
	require.NoError(t, s.Close())
	require.NoError(t, os.WriteFile(path, []byte(strings.ReplaceAll(storm, "quai", "quay")), 0o600))
	h = newHand(t, restart(t, path), 80, 24)
	h.drain()
	assert.Contains(t, h.screen(), "2 places of earlier rulings not in the manuscript as it is now (first: quai)")
}

func TestOnlyListsThatAreOnAreOffered(t *testing.T) {
	s := start(t, storm)
	path := s.Options.Manuscript
	h := newHand(t, s, 80, 24)
	h.drain()
	h.press("s")
	assert.NotContains(t, h.screen(), "series")
	require.NoError(t, s.Close())

	series := filepath.Join(filepath.Dir(path), "series.txt")
	require.NoError(t, os.WriteFile(series, []byte("Aldergast\tperson\n"), 0o600))
	h = newHand(t, restart(t, path, func(o *docket.Options) { o.Series = series }), 80, 24)
	h.drain()
	h.press("s", "k", "l", "s")
	r := h.rulings("harbor")[0]
	assert.Equal(t, ledger.Add, r.Act)
	assert.Equal(t, "series", r.List)
	written, err := os.ReadFile(series)
	require.NoError(t, err)
	assert.Contains(t, string(written), "harbor\tterm")
	h.press("s", "s")
	assert.Equal(t, "series", h.rulings("quai")[0].List, "the list last used is offered")
}
