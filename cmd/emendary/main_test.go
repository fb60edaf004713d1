package main

import (
	"flag"
	"fmt"
	"io"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"

	"github.com/rogpeppe/go-internal/testscript"
	"github.com/stretchr/testify/require"

	"emendary/internal/ledger"
)

var update = flag.Bool("update", false, "write what the scripts print into their golden files")

// TestMain puts the program itself on the PATH of scripts and tests, and a
// second one that keeps a ledger in use.
func TestMain(m *testing.M) {
	testscript.Main(m, map[string]func(){
		"emendary":   main,
		"keepledger": keepLedger,
	})
}

// demo is the folder of the demo manuscript.
const demo = "../../testdata/demo"

// environment is that of every command under test: a known locale and size, no
// colours asked for, lists in a folder of their own, no second to wait at exit
// under the race detector.
func environment(folder string) []string {
	return []string{
		"LC_ALL=C.UTF-8", "TERM=xterm-256color", "COLORTERM=", "COLORFGBG=", "NO_COLOR=", "COLUMNS=",
		"HOME=" + folder, "XDG_DATA_HOME=" + filepath.Join(folder, "data"), "GORACE=atexit_sleep_ms=0",
	}
}

func TestScripts(t *testing.T) {
	testscript.Run(t, testscript.Params{
		Dir:                 "testdata/script",
		UpdateScripts:       *update,
		RequireExplicitExec: true,
		RequireUniqueNames:  true,
		Setup: func(env *testscript.Env) error {
			env.Vars = append(env.Vars, environment(env.WorkDir)...)
			for _, name := range []string{"manuscript.md", "emended.md"} {
				if err := copyFile(filepath.Join(demo, name), filepath.Join(env.WorkDir, "demo", name)); err != nil {
					return err
				}
			}
			return nil
		},
		Cmds: map[string]func(*testscript.TestScript, bool, []string){
			"keep":  keep,
			"bytes": writeBytes,
		},
	})
}

func copyFile(from, to string) error {
	data, err := os.ReadFile(from)
	if err != nil {
		return err
	}
	if err := os.MkdirAll(filepath.Dir(to), 0o700); err != nil {
		return err
	}
	return os.WriteFile(to, data, 0o600)
}

// keepLedger keeps the ledger that is named in its argument in use until its
// standard input ends.
func keepLedger() {
	l, err := ledger.Open(os.Args[1], "Anna")
	if err != nil {
		fmt.Fprintln(os.Stderr, err)
		os.Exit(1)
	}
	fmt.Println("kept")
	_, _ = io.Copy(io.Discard, os.Stdin)
	_ = l.Close()
}

// keep LEDGER has another process keep a ledger in use until the script ends.
func keep(ts *testscript.TestScript, _ bool, args []string) {
	cmd := exec.Command("keepledger", ts.MkAbs(args[0]))
	in, err := cmd.StdinPipe()
	ts.Check(err)
	out, err := cmd.StdoutPipe()
	ts.Check(err)
	ts.Check(cmd.Start())
	ts.Defer(func() {
		_ = in.Close()
		_ = cmd.Wait()
	})
	answer := make([]byte, len("kept\n"))
	_, err = io.ReadFull(out, answer)
	ts.Check(err)
}

// bytes FILE TEXT writes a file that no script can hold: \x and the like in TEXT
// are read as Go does.
func writeBytes(ts *testscript.TestScript, _ bool, args []string) {
	var text string
	_, err := fmt.Sscanf(`"`+args[1]+`"`, "%q", &text)
	ts.Check(err)
	ts.Check(os.WriteFile(ts.MkAbs(args[0]), []byte(text), 0o600))
}

// inProcess runs a command line in this process, in a folder of its own choice of
// paths, and returns what it wrote.
func inProcess(t *testing.T, stdin string, args ...string) (status int, stdout, stderr string) {
	t.Helper()
	var out, notes strings.Builder
	status = run(args, strings.NewReader(stdin), &out, &notes)
	return status, out.String(), notes.String()
}

// writeFile writes a file in a folder and returns its path.
func writeFile(t *testing.T, folder, name, text string) string {
	t.Helper()
	path := filepath.Join(folder, name)
	require.NoError(t, os.WriteFile(path, []byte(text), 0o600))
	return path
}

func readFile(t *testing.T, path string) string {
	t.Helper()
	data, err := os.ReadFile(path)
	require.NoError(t, err)
	return string(data)
}
