// Command fitprior fits the table of how common words are, by size level and
// length, which internal/rank embeds. It counts the words of some texts, works out
// for each level how many bits a running word's being one certain word of that
// level and length comes to, and draws a curve through those of each level, weighted
// by the words behind each point: a parabola for the commonest, among which short
// words are commoner by far, and a line for the others. No curve falls.
//
//	go run ./internal/rank/fitprior -o internal/rank/prior.table -source TEXT FILE…
package main

import (
	"flag"
	"fmt"
	"log"
	"math"
	"os"
	"strings"
	"time"

	"emendary/internal/manuscript"
	"emendary/lexicon"
	"emendary/lexicon/english"
)

// lengths of words that have points of their own; longer ones count as the last.
const (
	shortest = 1
	longest  = 14
)

var levels = []int{10, 20, 35, 40, 50, 55, 60, 70}

func main() {
	out := flag.String("o", "", "write the table to `FILE`")
	source := flag.String("source", "", "say in the table what the `TEXTS` are")
	flag.Parse()
	if err := run(*out, *source, flag.Args()); err != nil {
		log.Fatal(err)
	}
}

func run(out, source string, files []string) error {
	if out == "" || source == "" || len(files) == 0 {
		return fmt.Errorf("usage: fitprior -o FILE -source TEXTS FILE…")
	}
	counts, total := map[string]int{}, 0
	for _, file := range files {
		doc, err := manuscript.Open(file, manuscript.Options{})
		if err != nil {
			return err
		}
		for i := range doc.Paragraphs {
			for _, w := range doc.Paragraphs[i].Words {
				counts[strings.ToLower(strings.ReplaceAll(w.Text, "’", "'"))]++
				total++
			}
		}
	}
	var b strings.Builder
	fmt.Fprintf(&b, "# Bits of meeting one certain word, by size level and by length from %d to %d letters.\n", shortest, longest)
	fmt.Fprintf(&b, "# Fitted by go run ./internal/rank/fitprior on %s, to %d running words of: %s\n", time.Now().Format(time.DateOnly), total, source)
	for _, level := range levels {
		degree := 1
		if level == levels[0] {
			degree = 2
		}
		curve := fit(points(level, counts, total), degree)
		fmt.Fprintf(&b, "%d", level)
		bits := 0.0
		for n := shortest; n <= longest; n++ {
			bits = max(bits, curve.at(float64(n)))
			fmt.Fprintf(&b, "\t%.2f", bits)
		}
		b.WriteByte('\n')
	}
	return os.WriteFile(out, []byte(b.String()), 0o644)
}

// point is the mean bits of the words of one length, and how many there are.
type point struct{ length, bits, words float64 }

// points returns what the counts say of a level, words of all varieties together.
func points(level int, counts map[string]int, total int) []point {
	words, met := map[int]float64{}, map[int]float64{}
	seen := map[string]bool{}
	for w := range english.Base().Words() {
		text := strings.ToLower(w.Text)
		if l, ok := w.Level(lexicon.AnyVariety); !ok || l != level || w.IsName() || seen[text] {
			continue
		}
		seen[text] = true
		n := min(len([]rune(text)), longest)
		words[n]++
		met[n] += float64(counts[text])
	}
	var out []point
	for n := shortest; n <= longest; n++ {
		if words[n] >= 5 {
			p := (met[n] + 0.5) / (words[n] + 1) / float64(total)
			out = append(out, point{float64(n), -math.Log2(p), words[n]})
		}
	}
	return out
}

// curve is a polynomial of degree 2 at most, by its coefficients.
type curve [3]float64

func (c curve) at(x float64) float64 { return c[0] + c[1]*x + c[2]*x*x }

// fit returns the polynomial of the least squared distance to the points, each
// weighted by the square root of its words: the normal equations, solved by
// elimination.
func fit(points []point, degree int) curve {
	var m [3][4]float64
	for _, p := range points {
		w := math.Sqrt(p.words)
		x := [3]float64{1, p.length, p.length * p.length}
		for i := range 3 {
			for j := range 3 {
				m[i][j] += w * x[i] * x[j]
			}
			m[i][3] += w * x[i] * p.bits
		}
	}
	for i := 0; i <= degree; i++ {
		for k := 0; k <= degree; k++ {
			if k == i {
				continue
			}
			f := m[k][i] / m[i][i]
			for j := range 4 {
				m[k][j] -= f * m[i][j]
			}
		}
	}
	var c curve
	for i := 0; i <= degree; i++ {
		c[i] = m[i][3] / m[i][i]
	}
	return c
}
