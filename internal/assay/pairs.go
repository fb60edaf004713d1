package assay

import (
	"fmt"
	"io"
	"slices"
	"strings"
	"unicode/utf8"

	"golang.org/x/text/unicode/norm"

	"emendary/align"
	"emendary/internal/docket"
)

// Pair is a misspelling with the words that its writer may have meant.
type Pair struct {
	Form     string
	Intended []string
}

// longestSide bounds each side of a pair, in bytes: the work of fitting grows with
// the product of the two.
const longestSide = 256

// ReadPairs reads lines misspelling<TAB>intended[,intended…]. The first line may be
// that of the columns' names; empty lines, lines that begin with # and what follows
// a second tab are passed over. A side may be empty: who uses the pair has to say
// what becomes of it. Errors give name and the line.
func ReadPairs(r io.Reader, name string) ([]Pair, error) {
	var pairs []Pair
	err := eachLine(r, name, func(n int, line string) error {
		form, rest, ok := strings.Cut(line, "\t")
		if !ok {
			return fmt.Errorf("%s: line %d: no tab; want misspelling, tab, intended word", name, n)
		}
		if !utf8.ValidString(line) {
			return fmt.Errorf("%s: line %d: not valid UTF-8; convert it first", name, n)
		}
		intended, _, _ := strings.Cut(rest, "\t")
		p := Pair{Form: spaced(form)}
		longest := len(p.Form)
		for word := range strings.SplitSeq(intended, ",") {
			if word = spaced(word); word != "" && !slices.Contains(p.Intended, word) {
				p.Intended = append(p.Intended, word)
				longest = max(longest, len(word))
			}
		}
		if longest > longestSide {
			return fmt.Errorf("%s: line %d: a word of %d bytes; %d are the most", name, n, longest, longestSide)
		}
		if n > 1 || !heads(p) {
			pairs = append(pairs, p)
		}
		return nil
	})
	if err == nil && len(pairs) == 0 {
		err = fmt.Errorf("%s: no pairs; want misspelling, tab, intended word, a pair a line", name)
	}
	return pairs, err
}

// spaced returns text with one space between its words and none around them.
func spaced(text string) string { return strings.Join(strings.Fields(text), " ") }

// key is what two spellings of one word have in common: capitals, the style of
// apostrophes and the way that accents are encoded apart, they are the same.
func key(text string) string { return docket.Key(norm.NFC.String(text)) }

// heads reports whether a first line names the columns.
func heads(p Pair) bool {
	return p.Form == "misspelling" || len(p.Intended) == 1 && p.Intended[0] == "intended"
}

// ToFit returns pairs as costs are fitted to them: folded, each word that may be
// meant in its turn, all words of a pair together with the weight of one. Pairs
// with an empty side, or that differ in capitals or apostrophes alone, have nothing
// to tell: they are left out, and counted by the reason.
func ToFit(pairs []Pair) (fit []align.Pair, leftOut map[Reason]int) {
	var alphabet align.Alphabet
	fold := func(text string) []align.Letter { return alphabet.AppendFolded(nil, key(text)) }
	fit, leftOut = make([]align.Pair, 0, len(pairs)), map[Reason]int{}
	for _, p := range pairs {
		form, before := fold(p.Form), len(fit)
		if len(form) == 0 {
			leftOut[NoForm]++
			continue
		}
		if len(p.Intended) == 0 {
			leftOut[NoIntended]++
			continue
		}
		for _, intended := range p.Intended {
			if word := fold(intended); !slices.Equal(form, word) {
				fit = append(fit, align.Pair{Form: form, Word: word, Weight: 1 / float64(len(p.Intended))})
			}
		}
		if len(fit) == before {
			leftOut[SameWord]++
		}
	}
	return fit, leftOut
}
