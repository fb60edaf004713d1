package ui

import (
	"bytes"
	"context"
	"fmt"
	"io"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"syscall"
	"testing"
	"time"

	"github.com/charmbracelet/x/vt"
	"github.com/creack/pty"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/internal/docket"
	"emendary/internal/ledger"
)

// manuscriptVariable names the manuscript when the test binary is run as the bench.
const (
	manuscriptVariable = "EMENDARY_TEST_MANUSCRIPT"
	crashVariable      = "EMENDARY_TEST_CRASH"
)

// TestMain runs the tests, or the bench itself where a terminal test starts this
// binary once more.
func TestMain(m *testing.M) {
	if path := os.Getenv(manuscriptVariable); path != "" {
		if err := runBench(path); err != nil {
			fmt.Fprintln(os.Stderr, err)
			os.Exit(1)
		}
		os.Exit(0)
	}
	os.Exit(m.Run())
}

func runBench(path string) error {
	ctx := context.Background()
	s, err := docket.Start(ctx, docket.Options{Manuscript: path, Lexicon: filepath.Join(filepath.Dir(path), "words.txt"), Variety: "any"})
	if err != nil {
		return err
	}
	defer s.Close()
	var opt Options
	if os.Getenv(crashVariable) != "" {
		opt.Write = func(context.Context, ...ledger.Ruling) error { panic("a crash of the test's making") }
	}
	return Run(ctx, "novel.md", func() (*docket.Session, error) { return s, nil }, opt)
}

// terminal is a pseudo-terminal that answers no question, with a program on it.
type terminal struct {
	t      *testing.T
	pty    *os.File
	cmd    *exec.Cmd
	screen *vt.Emulator
	raw    bytes.Buffer // all that was written
	chunks chan []byte
}

func onTerminal(t *testing.T, manuscript string, width, height int, env ...string) *terminal {
	t.Helper()
	dir := t.TempDir()
	path := filepath.Join(dir, "storm.md")
	require.NoError(t, os.WriteFile(path, []byte(manuscript), 0o600))
	require.NoError(t, os.WriteFile(filepath.Join(dir, "words.txt"), []byte(strings.Join(words, "\n")+"\n"), 0o600))
	return startOn(t, path, width, height, env...)
}

func startOn(t *testing.T, path string, width, height int, env ...string) *terminal {
	t.Helper()
	self, err := os.Executable()
	require.NoError(t, err)
	cmd := exec.Command(self)
	cmd.Env = append(os.Environ(), "TERM=xterm-256color", "GORACE=atexit_sleep_ms=0", "COLORTERM=", "NO_COLOR=", "LC_ALL=C.UTF-8", manuscriptVariable+"="+path)
	cmd.Env = append(cmd.Env, env...)
	f, err := pty.StartWithSize(cmd, &pty.Winsize{Cols: uint16(width), Rows: uint16(height)})
	require.NoError(t, err)
	term := &terminal{t: t, pty: f, cmd: cmd, screen: vt.NewEmulator(width, height), chunks: make(chan []byte, 64)}
	// What the screen would answer goes nowhere. It is never closed: its Close races
	// with its Read.
	go func() { _, _ = io.Copy(io.Discard, term.screen) }()
	go func() {
		defer close(term.chunks)
		for {
			b := make([]byte, 32<<10)
			n, err := f.Read(b)
			if n > 0 {
				term.chunks <- b[:n]
			}
			if err != nil {
				return
			}
		}
	}()
	t.Cleanup(func() {
		_ = cmd.Process.Kill()
		_ = f.Close()
	})
	return term
}

// until reads until the screen shows all of the texts.
func (term *terminal) until(texts ...string) {
	term.t.Helper()
	for !term.shows(texts) {
		if !term.read() {
			term.t.Fatalf("the program ended before the screen showed %q:\n%s", texts, term.screen.String())
		}
	}
}

func (term *terminal) shows(texts []string) bool {
	s := term.screen.String()
	for _, x := range texts {
		if !strings.Contains(s, x) {
			return false
		}
	}
	return true
}

// read takes in what the program writes next; false once it has ended.
func (term *terminal) read() bool {
	term.t.Helper()
	select {
	case b, ok := <-term.chunks:
		term.raw.Write(b)
		_, _ = term.screen.Write(b)
		return ok
	case <-time.After(30 * time.Second): // a watchdog: the test has failed by then
		term.t.Fatalf("nothing comes any more; the screen:\n%s", term.screen.String())
		return false
	}
}

func (term *terminal) typeKeys(keys string) {
	term.t.Helper()
	_, err := term.pty.WriteString(keys)
	require.NoError(term.t, err)
}

// ends reads to the end and returns the exit code; -1 for a signal.
func (term *terminal) ends() int {
	term.t.Helper()
	for term.read() {
	}
	_ = term.cmd.Wait()
	return term.cmd.ProcessState.ExitCode()
}

// leftClean asserts that the terminal is as it was: main screen, cursor shown,
// bracketed paste off.
func (term *terminal) leftClean() {
	term.t.Helper()
	raw := term.raw.String()
	for _, pair := range [][2]string{{"\x1b[?1049h", "\x1b[?1049l"}, {"\x1b[?25l", "\x1b[?25h"}, {"\x1b[?2004h", "\x1b[?2004l"}} {
		assert.Greater(term.t, strings.LastIndex(raw, pair[1]), strings.LastIndex(raw, pair[0]), "%q is not undone", pair[0])
	}
}

func TestASilentTerminalIsNotAskedAnything(t *testing.T) {
	began := time.Now()
	term := onTerminal(t, storm, 80, 24)
	term.until("harbor", "▸ harbour")
	assert.Less(t, time.Since(began), 4*time.Second, "Bubble Tea waits five seconds for an answer")
	term.typeKeys("q")
	assert.Equal(t, 0, term.ends())
	assert.NotContains(t, term.raw.String(), "\x1b]1", "asks for a colour")
	assert.NotContains(t, term.raw.String(), "\x1b[6n", "asks for the cursor")
	term.leftClean()
}

func TestAReviewKeyByKey(t *testing.T) {
	term := onTerminal(t, storm, 80, 24)
	term.until("4 open · 0 ruled", "▸ harbour")
	term.typeKeys("\t")
	term.until("space check")
	term.typeKeys("\x1b[B\x1b[B ") // down, down, space: the one in speech
	term.until("3 of 3 checked")
	term.typeKeys("f")
	term.until("accepted harbour for harbor, 3 citations; with it harbors (1)", "▸ quay", "2 open · 2 ruled")
	term.typeKeys("a")
	term.until("goes")
	term.typeKeys("Or quay, as elsewhere?\r")
	term.until("query to author on quai", "1 query", "stromm")
	term.typeKeys(";storm")
	term.until("delete")
	term.typeKeys("\r")
	term.until("Nothing is open", "emendary apply")
	term.typeKeys("u")
	term.until("undone: accepted storm for stromm")
	term.typeKeys("q")
	assert.Equal(t, 0, term.ends())
	term.leftClean()
}

func TestABurstOfKeysOnATerminal(t *testing.T) {
	term := onTerminal(t, "The harbor.\n\nThe quai.\n\nThe stromm and the pilott.\n", 80, 24)
	term.typeKeys("fdd;pilot\rq") // before the first screen is there
	assert.Equal(t, 0, term.ends())
	path := ""
	for _, e := range term.cmd.Env {
		if p, ok := strings.CutPrefix(e, manuscriptVariable+"="); ok {
			path = p
		}
	}
	h := newHand(t, restart(t, path), 80, 24)
	h.drain()
	assert.Equal(t, ledger.Accept, h.rulings("harbor")[0].Act)
	assert.Equal(t, ledger.Reject, h.rulings("quai")[0].Act)
	assert.Equal(t, ledger.Reject, h.rulings("stromm")[0].Act)
	assert.Equal(t, "pilot", h.rulings("pilott")[0].Word)
}

// Under the race detector the program ends with another exit code if candidates
// are computed from what a ruling or an undo is changing.
func TestRulingsAndUndosBesideComputations(t *testing.T) {
	var manuscript strings.Builder
	for a := 'a'; a <= 'z'; a++ {
		fmt.Fprintf(&manuscript, "The qu%[1]cck came to the st%[1]cppm of the harb%[1]cq.\n\n", a)
	}
	term := onTerminal(t, manuscript.String(), 80, 24)
	term.until("share")
	term.typeKeys(strings.Repeat("d", 15) + strings.Repeat("u", 8) + strings.Repeat("r", 4) + strings.Repeat("ss", 5) + strings.Repeat("lu", 5) + "q")
	assert.Equal(t, 0, term.ends())
	term.leftClean()
}

func TestSignalsLeaveTheTerminalClean(t *testing.T) {
	for _, sig := range []syscall.Signal{syscall.SIGTERM, syscall.SIGHUP, syscall.SIGINT} {
		t.Run(sig.String(), func(t *testing.T) {
			term := onTerminal(t, storm, 80, 24)
			term.until("▸ harbour")
			require.NoError(t, term.cmd.Process.Signal(sig))
			assert.Equal(t, 0, term.ends())
			term.leftClean()
		})
	}
}

func TestACrashLeavesTheTerminalClean(t *testing.T) {
	term := onTerminal(t, storm, 80, 24, crashVariable+"=1")
	term.until("▸ harbour")
	term.typeKeys("f")
	assert.Equal(t, 1, term.ends())
	term.leftClean()
}
