// Command table prints how the libraries of this project measure up to general
// ones, as Markdown. Run it in the folder lexicon/bench:
//
//	go run ./table
//
// Each part compares the results before it times anything, and stops where they
// differ.
package main

import (
	"bufio"
	"flag"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"runtime"
	"strings"
	"time"

	"emendary/lexicon/bench"
)

// part writes a part of the table.
type part func(w io.Writer, in input) error

// parts are what is compared, in the order of the table.
var parts = []part{search, best, pairs, count}

// input is what the parts are measured on.
type input struct {
	misspellings []bench.Pair
	level        int // of size of the words searched
	rounds       int
	text         string // path of the prose that is counted
}

func main() {
	testdata := flag.String("testdata", "../../testdata", "the project's folder testdata")
	level := flag.Int("size", 60, "search the words of lists up to this size")
	rounds := flag.Int("rounds", 5, "measure each query so many times, of which the shortest counts")
	text := flag.String("text", "", "count the words of this text; by default the manuscript in testdata")
	flag.Parse()
	if *text == "" {
		*text = filepath.Join(*testdata, "demo", "manuscript.md")
	}
	if err := run(os.Stdout, *testdata, input{level: *level, rounds: *rounds, text: *text}); err != nil {
		fmt.Fprintln(os.Stderr, "table:", err)
		os.Exit(1)
	}
}

func run(w io.Writer, testdata string, in input) error {
	var err error
	in.misspellings, err = bench.Misspellings(testdata)
	if err != nil {
		return err
	}
	fmt.Fprintf(w, "%s, %s, %d cores, %s, `go run ./table%s`\n", time.Now().Format(time.DateOnly),
		processor(), runtime.NumCPU(), runtime.Version(), arguments())
	for _, p := range parts {
		fmt.Fprintln(w)
		if err := p(w, in); err != nil {
			return err
		}
	}
	return nil
}

func arguments() string {
	return strings.Join(append([]string{""}, os.Args[1:]...), " ")
}

// processor returns the model of the first processor where Linux tells it.
func processor() string {
	f, err := os.Open("/proc/cpuinfo")
	if err != nil {
		return runtime.GOARCH
	}
	defer f.Close()
	lines := bufio.NewScanner(f)
	for lines.Scan() {
		if key, value, ok := strings.Cut(lines.Text(), ":"); ok && strings.TrimSpace(key) == "model name" {
			return strings.TrimSpace(value)
		}
	}
	return runtime.GOARCH
}
