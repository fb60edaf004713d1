package finder_test

import (
	"strings"
	"testing"

	tea "github.com/charmbracelet/bubbletea"
	"github.com/muesli/termenv"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/ui/finder"
	"emendary/ui/style"
)

var items = []finder.Item{{"harbourmaster", 2, ""}, {"harber", 3, "open"}, {"harbour", 9, ""}, {"quay", 4, ""}}

func newFinder() finder.Model {
	m := finder.New(style.Make(style.Ability{Profile: termenv.Ascii, Plain: true}), items)
	m.SetSize(70, 10)
	return m
}

func typed(t *testing.T, m finder.Model, s string) (finder.Model, tea.Cmd) {
	t.Helper()
	var cmd tea.Cmd
	for _, r := range s {
		m, cmd = m.Update(tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune{r}})
	}
	require.NotNil(t, cmd)
	return m, cmd
}

func TestAnExactMatchComesFirst(t *testing.T) {
	m, cmd := typed(t, newFinder(), "Harbour")
	assert.True(t, m.Searching())
	m, _ = m.Update(cmd())
	assert.False(t, m.Searching())
	assert.Equal(t, "harbour", m.Selected())
}

func TestEitherApostropheFindsTheOther(t *testing.T) {
	for _, c := range [][2]string{{"'tis", "’tis"}, {"’tis", "'tis"}} {
		m := finder.New(style.Make(style.Ability{}), []finder.Item{{Form: c[0]}, {Form: "is"}})
		m, cmd := typed(t, m, c[1])
		m, _ = m.Update(cmd())
		assert.Equal(t, c[0], m.Selected())
	}
}

func TestLettersMayBeLeftOut(t *testing.T) {
	m, cmd := typed(t, newFinder(), "hrbr")
	m, _ = m.Update(cmd())
	assert.Contains(t, m.View(), "3 of 4 forms")
	assert.NotContains(t, m.View(), "quay")
}

func TestAStaleAnswerIsDropped(t *testing.T) {
	m, stale := typed(t, newFinder(), "q")
	m, fresh := typed(t, m, "x")
	m, _ = m.Update(fresh())
	m, _ = m.Update(stale())
	assert.Equal(t, "", m.Selected())
	assert.Contains(t, m.View(), "no form of the manuscript matches")
}

func TestTheCursorStaysInTheList(t *testing.T) {
	m := newFinder()
	for range 9 {
		m, _ = m.Update(tea.KeyMsg{Type: tea.KeyDown})
	}
	assert.Equal(t, "quay", m.Selected())
	for range 9 {
		m, _ = m.Update(tea.KeyMsg{Type: tea.KeyUp})
	}
	assert.Equal(t, "harbourmaster", m.Selected())
	assert.LessOrEqual(t, strings.Count(m.View(), "\n")+1, 10)
}
