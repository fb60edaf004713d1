package ui

import (
	"context"
	"os"
	"path/filepath"
	"strings"
	"testing"

	tea "github.com/charmbracelet/bubbletea"
	"github.com/charmbracelet/x/ansi"
	"github.com/stretchr/testify/require"

	"emendary/internal/docket"
	"emendary/internal/ledger"
)

// words is the lexicon of the small manuscripts of these tests.
var words = strings.Fields(`a all and at before boats brought by came clerk dawn down harbour harbours
	her in it left lot mole now of office on out pilot quay round said see she six stood storm
	the they to was were whole with what turned had point letter wrote old new ship ships`)

const storm = `# The Storm

## The Mole

The pilot brought her round the point before dawn, and by six the whole of the
harbor had turned out to see what the storm had left of the mole.

## The Office

She came down to the harbor with the clerk. The quai was old.

“The harbor was left to the boats,” said the clerk. She turned to the old harbors.

The stromm came in by the quai at dawn.
`

// start opens a manuscript on the small lexicon.
func start(t *testing.T, manuscript string) *docket.Session {
	t.Helper()
	dir := t.TempDir()
	path := filepath.Join(dir, "storm.md")
	require.NoError(t, os.WriteFile(path, []byte(manuscript), 0o600))
	return restart(t, path)
}

// restart opens the manuscript at path, whose lexicon stands beside it.
func restart(t *testing.T, path string, change ...func(*docket.Options)) *docket.Session {
	t.Helper()
	list := filepath.Join(filepath.Dir(path), "words.txt")
	require.NoError(t, os.WriteFile(list, []byte(strings.Join(words, "\n")+"\n"), 0o600))
	opt := docket.Options{Manuscript: path, Lexicon: list, Variety: "any", Who: "a tester"}
	for _, c := range change {
		c(&opt)
	}
	s, err := docket.Start(context.Background(), opt)
	require.NoError(t, err)
	t.Cleanup(func() { s.Close() })
	return s
}

// hand drives a model: it presses keys and runs the commands that come back,
// when told to.
type hand struct {
	t    *testing.T
	m    Model
	cmds []tea.Cmd
	quit bool
}

// plain is the environment of a terminal without colours.
func plain(name string) string {
	return map[string]string{"TERM": "xterm", "NO_COLOR": "1", "LANG": "C.UTF-8"}[name]
}

func newHand(t *testing.T, s *docket.Session, width, height int, change ...func(*Options)) *hand {
	t.Helper()
	opt := Options{Getenv: plain}
	for _, c := range change {
		c(&opt)
	}
	h := &hand{t: t, m: New(context.Background(), s, opt)}
	h.cmds = append(h.cmds, h.m.Init())
	h.send(tea.WindowSizeMsg{Width: width, Height: height})
	return h
}

// ready is a hand whose first screen is complete.
func ready(t *testing.T, manuscript string, change ...func(*Options)) *hand {
	h := newHand(t, start(t, manuscript), 80, 24, change...)
	h.drain()
	return h
}

// dumb is the environment of a terminal that shows nothing but text.
func dumb(name string) string {
	return map[string]string{"TERM": "dumb", "LANG": "C.UTF-8"}[name]
}

func (h *hand) send(msg tea.Msg) {
	m, cmd := h.m.Update(msg)
	h.m = m.(Model)
	if cmd != nil {
		h.cmds = append(h.cmds, cmd)
	}
}

// run runs the oldest command and sends its message; false where there is none.
func (h *hand) run() bool {
	if len(h.cmds) == 0 {
		return false
	}
	cmd := h.cmds[0]
	h.cmds = h.cmds[1:]
	if cmd == nil {
		return true
	}
	switch msg := cmd().(type) {
	case tea.BatchMsg:
		h.cmds = append(h.cmds, msg...)
	case tea.QuitMsg:
		h.quit = true
	case nil:
	default:
		h.send(msg)
	}
	return true
}

// drain runs commands until none is left.
func (h *hand) drain() {
	for range 100_000 {
		if !h.run() {
			return
		}
	}
	h.t.Fatal("the commands do not come to an end")
}

// runTo runs commands until one brings a message that stop asks for, which is
// returned and not sent.
func (h *hand) runTo(stop func(tea.Msg) bool) tea.Msg {
	h.t.Helper()
	for range 10_000 {
		if len(h.cmds) == 0 {
			break
		}
		cmd := h.cmds[0]
		h.cmds = h.cmds[1:]
		if cmd == nil {
			continue
		}
		msg := cmd()
		if batch, ok := msg.(tea.BatchMsg); ok {
			h.cmds = append(h.cmds, batch...)
			continue
		}
		if stop(msg) {
			return msg
		}
		if msg != nil {
			h.send(msg)
		}
	}
	h.t.Fatal("no command brings the message")
	return nil
}

// keys names keys that are more than a letter.
var keys = map[string]tea.KeyType{
	"enter": tea.KeyEnter, "esc": tea.KeyEsc, "tab": tea.KeyTab, "up": tea.KeyUp, "down": tea.KeyDown,
	"left": tea.KeyLeft, "right": tea.KeyRight, "ctrl+c": tea.KeyCtrlC, "backspace": tea.KeyBackspace,
	"home": tea.KeyHome, "delete": tea.KeyDelete, "ctrl+u": tea.KeyCtrlU, "end": tea.KeyEnd,
}

func keyMsg(name string) tea.KeyMsg {
	if t, ok := keys[name]; ok {
		return tea.KeyMsg{Type: t}
	}
	if name == " " {
		return tea.KeyMsg{Type: tea.KeySpace, Runes: []rune(" ")}
	}
	return tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune(name)}
}

// press presses keys one by one, each with all that follows from it. Several
// letters in one name arrive as one burst.
func (h *hand) press(names ...string) {
	for _, n := range names {
		h.send(keyMsg(n))
		h.drain()
	}
}

// screen is what stands on the screen, without styles.
func (h *hand) screen() string { return ansi.Strip(h.m.View()) }

// form is the form on screen.
func (h *hand) form() string {
	if h.m.entry == nil {
		return ""
	}
	return h.m.entry.Form
}

// rulings returns the rulings in force on a form.
func (h *hand) rulings(form string) []ledger.Ruling {
	e := h.m.docket.Find(form)
	require.NotNil(h.t, e, "no entry %s", form)
	return e.Rulings()
}
