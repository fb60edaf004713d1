package main

import (
	"io"
	"os"
	"os/exec"
	"strings"
	"testing"

	"github.com/spf13/cobra"
	"github.com/spf13/pflag"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// commands returns the whole command line, help included.
func commands() []*cobra.Command {
	root := newRoot(&program{printer: newPrinter(strings.NewReader(""), io.Discard, io.Discard)})
	root.InitDefaultHelpCmd()
	out := []*cobra.Command{root}
	for i := 0; i < len(out); i++ {
		out = append(out, out[i].Commands()...)
	}
	return out
}

// Each line of each example runs as it stands, in a folder that has the demo as
// manuscript.md, and some labelled misspellings.
func TestExamplesRun(t *testing.T) {
	list := strings.SplitAfter(readFile(t, root+"/testdata/wikipedia-misspellings.tsv"), "\n")
	pairs := strings.Join(list[:40], "")
	for _, c := range commands() {
		t.Run(c.CommandPath(), func(t *testing.T) {
			t.Parallel()
			require.NotEmpty(t, c.Example)
			for _, line := range strings.Split(c.Example, "\n") {
				require.Contains(t, line, c.CommandPath())
				folder := t.TempDir()
				require.NoError(t, copyFile(demo+"/manuscript.md", folder+"/manuscript.md"))
				writeFile(t, folder, "pairs.tsv", pairs)
				writeFile(t, folder, "planted.tsv", "lantrn\tlantern\n")
				cmd := exec.Command("sh", "-c", strings.TrimSpace(line))
				if c.Name() == "review" {
					term := startOn(t, cmd, folder)
					term.until("ruled")
					term.typeKeys("q")
					assert.Equal(t, 0, term.ends(), "%s\n%s", line, term.text())
					continue
				}
				cmd.Dir = folder
				cmd.Env = append(os.Environ(), environment(folder)...)
				said, err := cmd.CombinedOutput()
				require.NoError(t, err, "%s\n%s", line, said)
				assert.NotContains(t, string(said), "emendary: ", line)
			}
		})
	}
}

// Help keeps to the rules that print.go states.
func TestEveryCommandAndFlagIsExplained(t *testing.T) {
	for _, c := range commands() {
		require.NotEmpty(t, c.Short, c.CommandPath())
		assert.Equal(t, strings.ToLower(c.Short[:1]), c.Short[:1], c.CommandPath())
		assert.NotContains(t, c.Short, ".", c.CommandPath())
		for _, l := range strings.Split(c.Long, "\n") {
			assert.LessOrEqual(t, len([]rune(l)), 80, "%s: %s", c.CommandPath(), l)
		}
		c.Flags().VisitAll(func(f *pflag.Flag) {
			assert.NotEmpty(t, f.Usage, "%s --%s", c.CommandPath(), f.Name)
			assert.NotContains(t, f.Usage, ".", "%s --%s", c.CommandPath(), f.Name)
		})
	}
}
