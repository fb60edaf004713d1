// Command growth measures how the time and the memory that a docket takes grow with
// the manuscript: at 1, 4 and 16 times the text, whole processes, as Markdown. Run it
// in the folder lexicon/bench, on Linux:
//
//	go run ./growth
package main

import (
	"bytes"
	"flag"
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"runtime"
	"slices"
	"strings"
	"syscall"
	"time"
)

func main() {
	text := flag.String("text", "../../testdata/demo/manuscript.md", "grow this `FILE`")
	words := flag.Int("words", 62_500, "words of the smallest manuscript")
	runs := flag.Int("runs", 3, "run each so many times, of which the shortest counts")
	flag.Parse()
	if err := run(*text, *words, *runs); err != nil {
		fmt.Fprintln(os.Stderr, "growth:", err)
		os.Exit(1)
	}
}

// measured is what a docket of one manuscript took.
type measured struct {
	words, entries int
	took           time.Duration
	mib            float64 // peak of resident memory
}

func run(text string, words, runs int) error {
	base, err := os.ReadFile(text)
	if err != nil {
		return err
	}
	folder, err := os.MkdirTemp("", "growth")
	if err != nil {
		return err
	}
	defer os.RemoveAll(folder)
	program := filepath.Join(folder, "emendary")
	build := exec.Command("go", "build", "-o", program, "./cmd/emendary")
	build.Dir = "../.."
	if out, err := build.CombinedOutput(); err != nil {
		return fmt.Errorf("the program does not build: %w\n%s", err, out)
	}
	var all []measured
	for _, times := range []int{1, 4, 16} {
		file := filepath.Join(folder, fmt.Sprintf("%d.md", times))
		manuscript := grow(base, times*words)
		if err := os.WriteFile(file, manuscript, 0o600); err != nil {
			return err
		}
		m := measured{words: len(bytes.Fields(manuscript))}
		for range runs {
			if err := m.docket(program, file); err != nil {
				return err
			}
		}
		all = append(all, m)
	}
	report(all)
	return nil
}

// docket lists the docket of a file once.
func (m *measured) docket(program, file string) error {
	cmd := exec.Command(program, "docket", file, "--format", "jsonl")
	var out bytes.Buffer
	cmd.Stdout, cmd.Stderr = &out, os.Stderr
	start := time.Now()
	if err := cmd.Run(); err != nil {
		return fmt.Errorf("docket of %s: %w", filepath.Base(file), err)
	}
	took := time.Since(start)
	if m.took == 0 || took < m.took {
		m.took = took
	}
	m.entries = bytes.Count(out.Bytes(), []byte("\n"))
	if usage, ok := cmd.ProcessState.SysUsage().(*syscall.Rusage); ok {
		m.mib = max(m.mib, float64(usage.Maxrss)/1024) // Linux counts kibibytes
	}
	return nil
}

// widest is how many blocks the longest bar has.
const widest = 32

func report(all []measured) {
	fmt.Printf("%s, %d cores, %s, `go run ./growth%s`\n\n", time.Now().Format(time.DateOnly), runtime.NumCPU(), runtime.Version(), strings.Join(append([]string{""}, os.Args[1:]...), " "))
	fmt.Print("| words | entries | seconds | MiB | seconds for 62,500 words |\n|---|---|---|---|---|\n")
	for _, m := range all {
		fmt.Printf("| %d | %d | %.2f | %.0f | %.2f |\n", m.words, m.entries, m.took.Seconds(), m.mib, m.took.Seconds()*62_500/float64(m.words))
	}
	fmt.Println()
	plot("words  ", all, func(m measured) float64 { return float64(m.words) })
	plot("seconds", all, func(m measured) float64 { return m.took.Seconds() })
	plot("memory ", all, func(m measured) float64 { return m.mib })
}

// plot draws a bar for each manuscript, the longest across.
func plot(name string, all []measured, value func(measured) float64) {
	most := value(slices.MaxFunc(all, func(a, b measured) int { return int(1000 * (value(a) - value(b))) }))
	for i, m := range all {
		label := name
		if i > 0 {
			label = strings.Repeat(" ", len(name))
		}
		fmt.Printf("    %s %3d× %s\n", label, 1<<(2*i), strings.Repeat("█", max(1, int(widest*value(m)/most+0.5))))
	}
}
