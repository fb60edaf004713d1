package ui

import (
	"context"
	"errors"
	"strings"
	"testing"

	tea "github.com/charmbracelet/bubbletea"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/internal/docket"
)

func newTestOpening() opening {
	never := func() (*docket.Session, error) { return nil, errors.New("not asked for in this test") }
	return newOpening(context.Background(), "novel\x1b.md", never, Options{Getenv: func(string) string { return "" }})
}

// step is one Update of the opening.
func step(t *testing.T, o opening, msg tea.Msg) (opening, tea.Cmd) {
	t.Helper()
	next, cmd := o.Update(msg)
	after, ok := next.(opening)
	require.True(t, ok)
	return after, cmd
}

func TestOpeningFitsEveryScreen(t *testing.T) {
	for _, size := range [][2]int{{0, 0}, {1, 1}, {5, 2}, {80, 24}, {200, 60}} {
		o, _ := step(t, newTestOpening(), tea.WindowSizeMsg{Width: size[0], Height: size[1]})
		lines := strings.Split(o.View(), "\n")
		assert.LessOrEqual(t, len(lines), max(size[1], 1))
		assert.NotContains(t, o.View(), "\x1b.md", "the name is data")
	}
	o, _ := step(t, newTestOpening(), tea.WindowSizeMsg{Width: 80, Height: 24})
	assert.Contains(t, o.View(), "laying out the docket")
}

func TestKeysTypedWhileOpeningCount(t *testing.T) {
	s := start(t, "The harbor froze.\n\nThe quai.\n")
	o, _ := step(t, newTestOpening(), tea.WindowSizeMsg{Width: 80, Height: 24})
	o, _ = step(t, o, tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune("dd")})
	assert.Nil(t, o.bench)
	o, cmd := step(t, o, opened{session: s})
	require.NotNil(t, cmd)
	require.NotNil(t, o.bench)
	assert.Len(t, o.bench.held, 2, "they wait for the first screen")
	assert.Equal(t, 80, o.bench.width)
	assert.Contains(t, o.View(), "laying out the docket", "until the bench has its first entry")
	o, _ = step(t, o, begin{})
	assert.Contains(t, o.View(), "concordance")
}

func TestOpeningEndsWithWhatIsWrong(t *testing.T) {
	wrong := errors.New("novel.md: empty file; nothing to review")
	o, cmd := step(t, newTestOpening(), opened{err: wrong})
	assert.Equal(t, wrong, o.err)
	require.NotNil(t, cmd)
	assert.Equal(t, tea.Quit(), cmd())
	o, cmd = step(t, newTestOpening(), tea.KeyMsg{Type: tea.KeyCtrlC})
	require.NotNil(t, cmd)
	assert.Equal(t, tea.Quit(), cmd())
	assert.NoError(t, o.err)
}
