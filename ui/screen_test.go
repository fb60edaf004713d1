package ui

import (
	"context"
	"errors"
	"flag"
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"testing"

	tea "github.com/charmbracelet/bubbletea"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/internal/ledger"
	"emendary/ui/text"
)

var update = flag.Bool("update", false, "write the golden screens anew")

// hard is a manuscript of what is hard to draw: a very long word, double-width
// letters, combining marks, letters from the right, a very long paragraph.
const hard = `# Ḧàrd’s

The donaudampfschifffahrtsgesellschaftskapitänsmütze of 漢字仮名交 and q̈̈ẍ̈ÿ̈ and שלוםשלום and é́.

`

// screens are the pages of the bench and the keys that lead to them.
var screens = []struct {
	name string
	keys []string
}{
	{"bench", nil},
	{"concordance", []string{"tab", "j"}},
	{"related", []string{"tab", "tab"}},
	{"correction", []string{";", "har bour"}},
	{"addition", []string{"s"}},
	{"query", []string{"a", "Is this meant?"}},
	{"actions", []string{" ", "right"}},
	{"finder", []string{"/", "ha"}},
	{"help", []string{"?"}},
	{"paragraph", []string{"tab", "o"}},
	{"ruled", []string{"f", "h"}},
}

func fits(t *testing.T, h *hand, width, height int, name string) {
	t.Helper()
	lines := strings.Split(h.m.View(), "\n")
	if len(lines) > height {
		t.Errorf("%s at %d×%d: %d lines", name, width, height, len(lines))
	}
	for i, l := range lines {
		if w := text.Width(l); w > width {
			t.Errorf("%s at %d×%d: line %d has %d columns: %q", name, width, height, i+1, w, l)
		}
	}
}

func TestNoScreenIsWiderOrTallerThanTheTerminal(t *testing.T) {
	sizes := [][2]int{{1, 1}, {59, 18}, {60, 17}, {60, 18}, {61, 19}, {79, 22}, {80, 23}, {80, 24},
		{100, 30}, {119, 40}, {120, 18}, {121, 41}, {200, 60}, {300, 60}}
	few := [][2]int{{60, 18}, {80, 24}, {121, 41}, {200, 60}}
	for i, manuscript := range []string{storm, hard + strings.Repeat("漢字 harbor qqq ", 80) + "\n", song} {
		for _, s := range screens {
			h := ready(t, manuscript)
			h.press(s.keys...)
			for _, size := range [][][2]int{sizes, few, few}[i] {
				h.send(tea.WindowSizeMsg{Width: size[0], Height: size[1]})
				h.drain()
				fits(t, h, size[0], size[1], s.name)
			}
		}
	}
}

func TestTheEndAndFailuresFitToo(t *testing.T) {
	h := ready(t, storm, func(o *Options) {
		o.Write = func(context.Context, ...ledger.Ruling) error { return errors.New(strings.Repeat("no room ", 60)) }
	})
	h.press("f")
	fits(t, h, 80, 24, "failure")
	h = ready(t, "The harbor.\n")
	h.press("f")
	for _, size := range [][2]int{{60, 18}, {80, 24}, {200, 60}} {
		h.send(tea.WindowSizeMsg{Width: size[0], Height: size[1]})
		fits(t, h, size[0], size[1], "finished")
	}
}

func TestATerminalTooSmallIsToldSo(t *testing.T) {
	h := ready(t, storm)
	h.send(tea.WindowSizeMsg{Width: 59, Height: 18})
	assert.Contains(t, h.screen(), "the bench needs 60×18")
	h.press("q")
	assert.True(t, h.quit)
}

// The golden screens are for people to read: -update writes them anew.
func TestGoldenScreens(t *testing.T) {
	for _, g := range []struct {
		name          string
		width, height int
		keys          []string
	}{
		{"bench-80x24", 80, 24, nil},
		{"concordance-80x24", 80, 24, []string{"tab", "j", "j"}},
		{"correction-80x24", 80, 24, []string{";", "harbourr"}},
		{"query-80x24", 80, 24, []string{"a", "Is this meant?", "down"}},
		{"addition-80x24", 80, 24, []string{"l", "s"}},
		{"finished-80x24", 80, 24, []string{"f", "d", "s", "s", "d"}}, // the last lets the citation in speech stand
		{"bench-120x40", 120, 40, nil},
		{"help-120x40", 120, 40, []string{"?"}},
	} {
		t.Run(g.name, func(t *testing.T) {
			s := start(t, storm)
			s.Docket.Document.Path = "storm.md"
			h := newHand(t, s, g.width, g.height)
			h.drain()
			h.press(g.keys...)
			path := filepath.Join("testdata", g.name+".txt")
			var b strings.Builder
			for _, l := range strings.Split(h.screen(), "\n") {
				fmt.Fprintln(&b, strings.TrimRight(l, " "))
			}
			got := b.String()
			if *update {
				require.NoError(t, os.MkdirAll("testdata", 0o777))
				require.NoError(t, os.WriteFile(path, []byte(got), 0o666))
			}
			want, err := os.ReadFile(path)
			require.NoError(t, err)
			assert.Equal(t, string(want), got)
		})
	}
}

// Text of the manuscript stays as it is; all that the bench draws is ASCII.
func TestTheStandInsAreASCII(t *testing.T) {
	for _, env := range []map[string]string{
		{"TERM": "dumb", "LANG": "C"},
		{"TERM": "dumb", "LANG": "en_GB.UTF-8", "LC_ALL": "POSIX"},
	} {
		for i, s := range screens {
			if i > 0 && env["LC_ALL"] != "" {
				break // the same signs, found another way
			}
			h := ready(t, strings.NewReplacer("“", "", "”", "").Replace(storm), func(o *Options) {
				o.Getenv = func(name string) string { return env[name] }
			})
			h.press(s.keys...)
			for i, r := range h.m.View() {
				if r > 0x7e || r < 0x20 && r != '\n' {
					t.Fatalf("%s: %q at byte %d of\n%s", s.name, r, i, h.m.View())
				}
			}
		}
	}
}
