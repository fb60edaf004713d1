// Package bench measures the libraries of this project beside general ones that
// do the same: same inputs, same run, results compared before anything is timed.
// It is a module of its own, so that the peers are no dependencies of the program.
//
// To print the table of ratios, in this folder:
//
//	go run ./table
package bench

import (
	"bufio"
	"fmt"
	"os"
	"path/filepath"
	"slices"
	"strings"

	"emendary/align"
	"emendary/lexicon"
	"emendary/lexicon/english"
)

// Words returns the folded words of the base lexicon that stand in a list of size
// level at most, each once, in ascending order.
func Words(level int) []string {
	var alphabet align.Alphabet
	var words []string
	for w := range english.Base().Words() {
		if least := slices.MinFunc(w.Sources, func(a, b lexicon.Source) int { return int(a.Level) - int(b.Level) }); int(least.Level) <= level {
			words = append(words, alphabet.Text(alphabet.AppendFolded(nil, w.Text)...))
		}
	}
	slices.Sort(words)
	return slices.Compact(words)
}

// Pair is a misspelling, folded, and the first word it is listed for.
type Pair struct {
	Form, Word string
}

// Misspellings reads the list of common misspellings from the folder testdata of
// the project.
func Misspellings(testdata string) ([]Pair, error) {
	path := filepath.Join(testdata, "wikipedia-misspellings.tsv")
	f, err := os.Open(path)
	if err != nil {
		return nil, fmt.Errorf("%w; give the project's folder testdata", err)
	}
	defer f.Close()
	var alphabet align.Alphabet
	fold := func(s string) string { return alphabet.Text(alphabet.AppendFolded(nil, s)...) }
	var pairs []Pair
	lines := bufio.NewScanner(f)
	for n := 1; lines.Scan(); n++ {
		form, words, ok := strings.Cut(lines.Text(), "\t")
		if !ok {
			return nil, fmt.Errorf("%s:%d: no tab", path, n)
		}
		if n == 1 {
			continue // the heading
		}
		word, _, _ := strings.Cut(words, ",")
		pairs = append(pairs, Pair{fold(form), fold(word)})
	}
	return pairs, lines.Err()
}
