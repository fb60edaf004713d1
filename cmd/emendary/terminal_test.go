package main

import (
	"bufio"
	"bytes"
	"context"
	"io"
	"math/rand/v2"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"syscall"
	"testing"
	"time"

	"github.com/charmbracelet/x/ansi"
	"github.com/creack/pty"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// patient is how long a test waits for text on a terminal: less than the five
// seconds that a program waits which has asked the terminal something.
const patient = 4 * time.Second

// terminal is a pseudo-terminal that answers no question, with the program on it.
type terminal struct {
	t      *testing.T
	pty    *os.File
	cmd    *exec.Cmd
	raw    bytes.Buffer // all that was written
	chunks chan []byte
}

// onTerminal starts a command line in a folder.
func onTerminal(t *testing.T, folder string, args ...string) *terminal {
	t.Helper()
	cmd := exec.Command("emendary", args...)
	return startOn(t, cmd, folder)
}

func startOn(t *testing.T, cmd *exec.Cmd, folder string) *terminal {
	t.Helper()
	cmd.Dir = folder
	cmd.Env = append(os.Environ(), environment(folder)...)
	f, err := pty.StartWithSize(cmd, &pty.Winsize{Cols: 80, Rows: 24})
	require.NoError(t, err)
	term := &terminal{t: t, pty: f, cmd: cmd, chunks: make(chan []byte, 64)}
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

// until reads until text has been written, escape sequences apart.
func (term *terminal) until(text string) {
	term.t.Helper()
	ctx, cancel := context.WithTimeout(context.Background(), patient)
	defer cancel()
	for !strings.Contains(term.text(), text) {
		select {
		case b, ok := <-term.chunks:
			if !ok {
				term.t.Fatalf("the program ended before it wrote %q:\n%s", text, term.text())
			}
			term.raw.Write(b)
		case <-ctx.Done():
			term.t.Fatalf("%v went by without %q:\n%q", patient, text, term.raw.String())
		}
	}
}

func (term *terminal) text() string { return ansi.Strip(term.raw.String()) }

func (term *terminal) typeKeys(keys string) {
	term.t.Helper()
	_, err := term.pty.WriteString(keys)
	require.NoError(term.t, err)
}

// ends reads to the end and returns the exit status.
func (term *terminal) ends() int {
	term.t.Helper()
	ctx, cancel := context.WithTimeout(context.Background(), patient)
	defer cancel()
	for {
		select {
		case b, ok := <-term.chunks:
			term.raw.Write(b)
			if !ok {
				_ = term.cmd.Wait()
				return term.cmd.ProcessState.ExitCode()
			}
		case <-ctx.Done():
			term.t.Fatalf("the program does not end:\n%q", term.raw.String())
		}
	}
}

// small is a manuscript whose docket is soon laid out.
const small = "# The Mole\n\nThe harber lay still, and the harber wall with it.\n"

func TestNoCommandAsksTheTerminalAnything(t *testing.T) {
	for _, c := range []struct {
		args   string
		want   string
		keys   string
		status int
	}{
		{"", "Begin here", "", 0},
		{"--help", "commands:", "", 0},
		{"--version", "version", "", 0},
		{"help rule", "tab-separated", "", 0},
		{"review m.md", "substitute", "q", 0},
		{"review m.md --background light --ascii", "substitute", "q", 0},
		{"docket m.md", "harber", "", 0},
		{"candidates harber", "harbor", "", 0},
		{"candidates", "ctrl-d", "\x04", 0},
		{"align harber harbour", "substitute o for e", "", 0},
		{"rule m.md", "ctrl-d", "form\truling\tword\nharber\taccept\tharbour\n\x04", 0},
		{"apply m.md", "0 emendations, 1 entry still open", "", 0},
		{"report figures m.md", "words", "", 0},
		{"assay pairs.tsv --folds 2", "mean reciprocal rank", "", 0},
		{"version", "base lexicon", "", 0},
		{"completion bash", "bash completion", "", 0},
		{"reveiw m.md", "did you mean review?", "", 2},
		{"review nosuch.md", "emendary: nosuch.md: no such file or directory", "", 2},
	} {
		t.Run(c.args, func(t *testing.T) {
			folder := t.TempDir()
			writeFile(t, folder, "m.md", small)
			writeFile(t, folder, "pairs.tsv", "harber\tharbour\nlantrn\tlantern\nquuay\tquay\nstrom\tstorm\n")
			term := onTerminal(t, folder, strings.Fields(c.args)...)
			term.until(c.want)
			term.typeKeys(c.keys)
			assert.Equal(t, c.status, term.ends(), term.text())
			assert.NotContains(t, term.raw.String(), "\x1b]11", "asks for the background")
			assert.NotContains(t, term.raw.String(), "\x1b[6n", "asks for the cursor")
		})
	}
}

func TestAReviewIsKeptAndSaidInOneLine(t *testing.T) {
	folder := t.TempDir()
	manuscript := writeFile(t, folder, "m.md", small)
	term := onTerminal(t, folder, "review", "m.md", "--as", "Anna")
	term.until("substitute")
	term.typeKeys("dq")
	require.Equal(t, 0, term.ends(), term.text())
	assert.Contains(t, term.text(), "m.md: 0 open, 1 ruled, 0 queries")
	_, rulings, _ := inProcess(t, "", "report", "rulings", manuscript)
	assert.Contains(t, rulings, "harber\treject\t")
	assert.Contains(t, rulings, "\tAnna\t")
}

func TestNoColourWhereNoneIsWanted(t *testing.T) {
	folder := t.TempDir()
	for value, want := range map[string]bool{"": true, "1": false} {
		cmd := exec.Command("env", "NO_COLOR="+value, "emendary", "align", "harber", "harbour")
		term := startOn(t, cmd, folder)
		require.Equal(t, 0, term.ends())
		assert.Equal(t, want, strings.Contains(term.raw.String(), "33m"), "NO_COLOR=%q: %q", value, term.raw.String())
	}
}

// An interrupt ends what waits for input, and leaves nothing behind.
func TestAnInterruptEndsWaiting(t *testing.T) {
	for args, want := range map[string]string{"candidates": "ctrl-d", "rule m.md": "ctrl-d"} {
		t.Run(args, func(t *testing.T) {
			folder := t.TempDir()
			writeFile(t, folder, "m.md", small)
			term := onTerminal(t, folder, strings.Fields(args)...)
			term.until(want)
			require.NoError(t, term.cmd.Process.Signal(syscall.SIGINT))
			assert.Equal(t, 130, term.ends(), term.text())
			assert.NoFileExists(t, filepath.Join(folder, "m.md.ledger"))
		})
	}
}

// An assay shows how far it has come, and an interrupt ends it without a figure.
func TestAnInterruptEndsAnAssay(t *testing.T) {
	pairs, err := filepath.Abs(filepath.Join(root, "testdata", "wikipedia-misspellings.tsv"))
	require.NoError(t, err)
	many := strings.Repeat(readFile(t, pairs), 20) // more than can be through by then
	folder := t.TempDir()
	writeFile(t, folder, "pairs.tsv", many)
	term := onTerminal(t, folder, "assay", "pairs.tsv")
	term.until("measuring")
	require.NoError(t, term.cmd.Process.Signal(syscall.SIGINT))
	assert.Equal(t, 130, term.ends(), term.text())
	assert.NotContains(t, term.text(), "pairs.tsv")
}

// An interrupt in the middle of a long listing ends it; what is out stays.
func TestAnInterruptEndsALongListing(t *testing.T) {
	folder := t.TempDir()
	manuscript := writeFile(t, folder, "novel.md", writeNovel(rand.New(rand.NewPCG(3, 3)), 60_000).slips)
	cmd := exec.Command("emendary", "docket", manuscript, "--format", "jsonl", "-n", "9")
	cmd.Env = append(os.Environ(), environment(folder)...)
	var notes bytes.Buffer
	cmd.Stderr = &notes
	out, err := cmd.StdoutPipe()
	require.NoError(t, err)
	require.NoError(t, cmd.Start())
	listing := bufio.NewReader(out)
	first, err := listing.ReadString('\n')
	require.NoError(t, err)
	// It cannot be through: the listing is several times what a pipe holds.
	require.NoError(t, cmd.Process.Signal(syscall.SIGINT))
	rest, err := io.ReadAll(listing)
	require.NoError(t, err)
	assert.True(t, strings.HasSuffix(first+string(rest), "}\n"), "a line is cut short: %q", rest)
	_ = cmd.Wait()
	assert.Equal(t, 130, cmd.ProcessState.ExitCode())
	assert.Empty(t, notes.String())
}
