package main

import (
	"io"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// root is the top of the tree.
const root = "../.."

func document(t *testing.T, name string) string {
	t.Helper()
	data, err := os.ReadFile(filepath.Join(root, name))
	require.NoError(t, err)
	return string(data)
}

// The README's transcript is what a shell shows, letter for letter.
func TestReadmeShowsARealTranscript(t *testing.T) {
	_, rest, ok := strings.Cut(document(t, "README.md"), "```console\n")
	require.True(t, ok, "no transcript in README.md")
	transcript, _, _ := strings.Cut(rest, "```")

	folder := t.TempDir()
	require.NoError(t, copyFile(filepath.Join(demo, "manuscript.md"), filepath.Join(folder, "manuscript.md")))
	rulings := "form\truling\tword\nlantrn\taccept\tlantern\ncomittee\taccept\tcommittee\nMarrack\tadd\t\n"
	require.NoError(t, os.WriteFile(filepath.Join(folder, "rulings.tsv"), []byte(rulings), 0o600))

	var got strings.Builder
	commands := 0
	for line := range strings.Lines(transcript) {
		command, ok := strings.CutPrefix(line, "$ ")
		if !ok {
			continue
		}
		commands++
		cmd := exec.Command("sh", "-c", command)
		cmd.Dir = folder
		cmd.Env = append(os.Environ(), environment(folder)...)
		out, err := cmd.CombinedOutput()
		require.NoError(t, err, "%s%s", command, out)
		got.WriteString(line)
		got.Write(out)
	}
	require.Positive(t, commands)
	assert.Equal(t, transcript, got.String())
}

// The commands of DEVELOPERS.md name packages, flags and files that are there: tests
// are built and benchmarks run, but no test that would run this one again.
func TestDocumentsCommands(t *testing.T) {
	commands := 0
	for line := range strings.Lines(document(t, "DEVELOPERS.md")) {
		command, ok := strings.CutPrefix(line, "    ")
		if !ok || strings.HasPrefix(command, " ") {
			continue
		}
		command, _, _ = strings.Cut(strings.TrimSpace(command), " #")
		commands++
		switch {
		case strings.HasPrefix(command, "go test"):
			command = strings.Replace(command, "go test", "go test -vet=off", 1) + " -run '^$'"
		case strings.HasPrefix(command, "go generate"):
			command = strings.Replace(command, "go generate", "go generate -n", 1)
		case strings.HasPrefix(command, "bash "):
			command = strings.Replace(command, "bash ", "bash -n ", 1)
		}
		cmd := exec.Command("sh", "-c", command)
		cmd.Dir = root
		out, err := cmd.CombinedOutput()
		assert.NoError(t, err, "%s\n%s", command, out)
	}
	require.Positive(t, commands, "no commands in DEVELOPERS.md")
}

// What the README says of keys and commands is there: each command of its table is
// one of the program's, and none is left out.
func TestReadmeListsEveryCommand(t *testing.T) {
	readme := document(t, "README.md")
	for _, c := range newRoot(&program{printer: newPrinter(nil, io.Discard, io.Discard)}).Commands() {
		if c.Name() != "help" {
			assert.Contains(t, readme, "`"+c.Name(), "command %s", c.Name())
		}
	}
}

// The embedded costs are, byte for byte, what the command beside them writes.
func TestEmbeddedCostsAreWhatTheirCommandWrites(t *testing.T) {
	const folder = root + "/lexicon/english"
	_, rest, ok := strings.Cut(readFile(t, folder+"/costs.go"), "\n//go:generate go run emendary/cmd/emendary ")
	require.True(t, ok, "no command in costs.go")
	line, _, _ := strings.Cut(rest, "\n")
	out := filepath.Join(t.TempDir(), "english.costs")
	line = strings.Replace(line, "-o english.costs", "-o "+out, 1)
	require.Contains(t, line, out)
	cmd := exec.Command("sh", "-c", "emendary "+line)
	cmd.Dir = folder
	said, err := cmd.CombinedOutput()
	require.NoError(t, err, "%s", said)
	assert.True(t, readFile(t, folder+"/english.costs") == readFile(t, out), "english.costs differs from what fit writes; go generate -run fit ./lexicon/english")
}
