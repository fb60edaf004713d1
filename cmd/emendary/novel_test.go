package main

import (
	"encoding/json"
	"fmt"
	"math/rand/v2"
	"path/filepath"
	"slices"
	"strings"
	"testing"
	"unicode"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/lexicon"
	"emendary/lexicon/english"
)

// novel is a text of known words, the same with errors planted, and the rulings
// that take the errors out again.
type novel struct {
	clean, slips string
	truth        map[string]string // the word that each slip stands for
}

// rulings returns the truth as the lines that rule reads.
func (n novel) rulings() string {
	lines := []string{}
	for form, word := range n.truth {
		lines = append(lines, form+"\taccept\t"+word)
	}
	slices.Sort(lines)
	return "form\truling\tword\n" + strings.Join(lines, "\n") + "\n"
}

// writeNovel writes a novel of so many words; one in about forty is a slip.
func writeNovel(random *rand.Rand, words int) novel {
	lex := lexicon.New(english.Base(), lexicon.AnyVariety)
	vocabulary := commonWords()
	w := &novelist{random: random, lex: lex, truth: map[string]string{}}
	for _, word := range pick(random, vocabulary, len(vocabulary)/8) {
		if slip, ok := w.slipFor(word); ok {
			w.truth[slip] = word
			w.slips = append(w.slips, slip)
		}
	}
	for n := 0; n < words; {
		if n%20_000 < 12 { // a chapter now and then
			w.both(fmt.Sprintf("\n# Chapter %d\n\n", w.chapter))
			w.chapter++
			n += 12
		}
		n += w.sentence(vocabulary)
		if random.IntN(6) == 0 {
			w.both("\n\n")
		} else {
			w.both(" ")
		}
	}
	w.both("\n")
	return novel{w.clean.String(), w.dirty.String(), w.used}
}

// commonWords returns lower-case words of ASCII that every variety has.
func commonWords() []string {
	var out []string
	for w := range english.Base().Words() {
		level, ok := w.Level(lexicon.AnyVariety)
		plain := !strings.ContainsFunc(w.Text, func(r rune) bool { return r < 'a' || r > 'z' })
		if ok && plain && level <= 35 && len(w.Text) > 3 && len(w.Varieties()) == len(lexicon.Varieties()) {
			out = append(out, w.Text)
		}
	}
	return out
}

func pick(random *rand.Rand, from []string, n int) []string {
	out := make([]string, n)
	for i := range out {
		out[i] = from[random.IntN(len(from))]
	}
	return out
}

type novelist struct {
	random       *rand.Rand
	lex          *lexicon.Lexicon
	truth        map[string]string
	used         map[string]string
	slips        []string
	chapter      int
	clean, dirty strings.Builder
	last         string // the last word of the text with slips
}

func (w *novelist) both(s string) {
	w.clean.WriteString(s)
	w.dirty.WriteString(s)
}

// slipFor makes one or two edits in a word, and returns the result if no
// lexicon knows it, whatever its capitals, and it is nobody else's slip.
func (w *novelist) slipFor(word string) (string, bool) {
	letters := []byte(word)
	for range 1 + w.random.IntN(2) {
		i, letter := w.random.IntN(len(letters)), byte('a'+w.random.IntN(26))
		switch w.random.IntN(4) {
		case 0:
			letters[i] = letter
		case 1:
			letters = slices.Insert(letters, i, letter)
		case 2:
			letters = slices.Delete(letters, i, i+1)
		case 3:
			if i > 0 {
				letters[i-1], letters[i] = letters[i], letters[i-1]
			}
		}
	}
	slip := string(letters)
	if len(slip) < 3 || w.truth[slip] != "" {
		return "", false
	}
	for _, form := range []string{slip, capital(slip), strings.ToUpper(slip)} {
		if w.lex.Find(form).Status != lexicon.Unknown {
			return "", false
		}
	}
	return slip, romanless(slip)
}

// romanless reports whether no letters could be read as a numeral.
func romanless(s string) bool {
	return strings.ContainsFunc(s, func(r rune) bool { return !strings.ContainsRune("ivxlcdm", r) })
}

func capital(s string) string { return strings.ToUpper(s[:1]) + s[1:] }

// sentence writes a sentence and returns how many words it has.
func (w *novelist) sentence(vocabulary []string) int {
	n := 5 + w.random.IntN(20)
	spoken := w.random.IntN(5) == 0
	if spoken {
		w.both("“")
	}
	for i := range n {
		word := vocabulary[w.random.IntN(len(vocabulary))]
		slip := word
		if w.random.IntN(40) == 0 {
			candidate := w.slips[w.random.IntN(len(w.slips))]
			if !w.joins(w.last, candidate) {
				slip, word = candidate, w.truth[candidate]
			}
		}
		if slip == word && w.joins(w.last, word) {
			word = "lamp"
			slip = word
		}
		w.use(slip, word)
		w.last = slip
		style := func(s string) string { return s }
		switch {
		case i == 0:
			style = capital
		case w.random.IntN(60) == 0:
			style = strings.ToUpper
		case w.random.IntN(60) == 0:
			style = func(s string) string { return "*" + s + "*" }
		case w.random.IntN(30) == 0 && i < n-1:
			style = func(s string) string { return s + "’s" }
		}
		w.clean.WriteString(style(word))
		w.dirty.WriteString(style(slip))
		if i < n-1 {
			w.both([]string{" ", " ", " ", " ", ", ", "\n"}[w.random.IntN(6)])
		}
	}
	w.both(".")
	if spoken {
		w.both("”")
	}
	return n
}

func (w *novelist) use(slip, word string) {
	if slip == word {
		return
	}
	if w.used == nil {
		w.used = map[string]string{}
	}
	w.used[slip] = word
}

// joins reports whether two neighbours make one listed word, so that a docket may
// ask about the two together.
func (w *novelist) joins(a, b string) bool {
	return w.lex.Find(a+b).Status != lexicon.Unknown
}

func TestRulingsByTheTruthGiveTheCleanTextBack(t *testing.T) {
	for seed, words := range []int{1000, 3000, longNovel} {
		t.Run(fmt.Sprintf("%d words", words), func(t *testing.T) {
			t.Parallel()
			n := writeNovel(rand.New(rand.NewPCG(uint64(seed), 7)), words)
			require.Greater(t, len(n.truth), words/200)
			manuscript := writeFile(t, t.TempDir(), "novel.md", n.slips)

			status, listing, stderr := inProcess(t, "", "docket", manuscript, "--format", "jsonl", "-n", "0")
			require.Equal(t, 0, status, stderr)
			assert.Empty(t, missing(t, listing, n.truth), "planted, but not on the docket")

			status, stdout, stderr := inProcess(t, n.rulings(), "rule", manuscript)
			require.Equal(t, 0, status, stdout+stderr)
			status, _, stderr = inProcess(t, "", "apply", manuscript)
			require.Equal(t, 0, status, stderr)
			emended := readFile(t, filepath.Join(filepath.Dir(manuscript), "novel.emended.md"))
			if emended != n.clean { // two novels in full would be no message
				t.Fatal(firstDifference(n.clean, emended))
			}
		})
	}
}

// missing returns the slips that a listing lacks.
func missing(t *testing.T, listing string, truth map[string]string) []string {
	t.Helper()
	found := map[string]bool{}
	for line := range strings.Lines(listing) {
		var entry struct{ Form string }
		require.NoError(t, json.Unmarshal([]byte(line), &entry), line)
		found[strings.Map(unicode.ToLower, entry.Form)] = true
	}
	var out []string
	for slip := range truth {
		if !found[slip] {
			out = append(out, slip)
		}
	}
	return out
}

// firstDifference shows where two texts part.
func firstDifference(want, got string) string {
	i := 0
	for i < len(want) && i < len(got) && want[i] == got[i] {
		i++
	}
	around := func(s string) string { return s[max(0, min(len(s), i-60)):min(len(s), i+40)] }
	return fmt.Sprintf("byte %d:\nwant %q\ngot  %q", i, around(want), around(got))
}
