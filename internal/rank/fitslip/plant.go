package main

import (
	"cmp"
	"context"
	"fmt"
	"math/rand/v2"
	"os"
	"slices"
	"strings"
	"unicode/utf8"

	"emendary/internal/assay"
	"emendary/internal/docket"
	"emendary/internal/manuscript"
	"emendary/lexicon"
)

// garden is a text that errors are planted in.
type garden struct {
	doc    *manuscript.Document
	lex    *lexicon.Lexicon
	chance *rand.Rand
	words  []spot            // what may be spoilt
	places map[string][]int  // into words, by key
	taken  map[int]bool      // words spoilt already
	uses   map[string]int    // forms of the text and forms planted
	truth  map[string]string // by planted form
	edits  []manuscript.Emendation
}

// spot is one word of the text.
type spot struct {
	paragraph, word int
	text            string
}

// plant writes a copy of a text with n errors in it, and their truth: half of them
// misspellings from a list of pairs, four in ten slips of the hand, one in ten a
// space too many or too few.
func plant(ctx context.Context, text, pairs, out, truth string, n int, seed uint64) error {
	s, err := docket.Start(ctx, docket.Options{Manuscript: text, ToRead: true})
	if err != nil {
		return err
	}
	defer s.Close()
	f, err := os.Open(pairs)
	if err != nil {
		return err
	}
	defer f.Close()
	list, err := assay.ReadTruth(f, pairs)
	if err != nil {
		return err
	}
	g := newGarden(s.Docket, seed)
	g.misspell(list, n/2)
	g.slip(n * 4 / 10)
	g.space(n - n/2 - n*4/10)
	data, err := g.doc.Emend(g.edits)
	if err != nil {
		return err
	}
	if err := os.WriteFile(out, data, 0o644); err != nil {
		return err
	}
	lines := []string{}
	for form, word := range g.truth {
		lines = append(lines, form+"\t"+word+"\n")
	}
	slices.Sort(lines)
	fmt.Printf("%s: %d forms planted\n", out, len(lines))
	return os.WriteFile(truth, []byte("form\tintended\n"+strings.Join(lines, "")), 0o644)
}

func newGarden(d *docket.Docket, seed uint64) *garden {
	g := &garden{
		doc: d.Document, lex: d.Lexicon(), chance: rand.New(rand.NewPCG(seed, 0)),
		places: map[string][]int{}, taken: map[int]bool{}, uses: map[string]int{}, truth: map[string]string{},
	}
	for i, p := range g.doc.Paragraphs {
		for j, w := range p.Words {
			k := strings.ToLower(w.Text)
			g.uses[k]++
			const odd = manuscript.Number | manuscript.Ordinal | manuscript.Roman | manuscript.Initial |
				manuscript.AllCapitals | manuscript.Elision | manuscript.Broken | manuscript.Hyphenated
			if w.Traits&odd == 0 && p.Text[w.Start:w.End] == w.Text && g.known(w.Text) {
				g.places[k] = append(g.places[k], len(g.words))
				g.words = append(g.words, spot{i, j, w.Text})
			}
		}
	}
	return g
}

func (g *garden) known(text string) bool { return g.lex.Find(text).Status == lexicon.Known }

// fresh reports whether a form is in no list and not in the text.
func (g *garden) fresh(form string) bool {
	return g.uses[strings.ToLower(form)] == 0 && g.lex.Find(form).Status == lexicon.Unknown
}

// put puts form in place of words words from at on, if it may.
func (g *garden) put(at, words int, form, word string) bool {
	s := g.words[at]
	p := &g.doc.Paragraphs[s.paragraph]
	start, end := p.Words[s.word].Start, p.Words[s.word+words-1].End
	letters := make([]string, len(g.doc.Letters(s.paragraph, start, end)))
	letters[0] = form
	e := manuscript.Emendation{Paragraph: s.paragraph, Start: start, End: end, Letters: letters}
	if _, err := g.doc.Emend([]manuscript.Emendation{e}); err != nil {
		return false
	}
	for i := range words {
		g.taken[at+i] = true
	}
	g.uses[strings.ToLower(form)]++
	g.truth[form] = word
	g.edits = append(g.edits, e)
	return true
}

// misspell plants n misspellings of the list, one in ten of them twice.
func (g *garden) misspell(list assay.Truth, n int) {
	type pair struct{ form, word string }
	var able []pair
	for form, words := range list {
		for _, word := range words {
			if len(g.places[word]) > 0 && g.fresh(form) && !strings.Contains(form, " ") {
				able = append(able, pair{form, word})
			}
		}
	}
	slices.SortFunc(able, func(a, b pair) int {
		return cmp.Or(cmp.Compare(a.form, b.form), cmp.Compare(a.word, b.word))
	})
	g.chance.Shuffle(len(able), func(i, j int) { able[i], able[j] = able[j], able[i] })
	for _, p := range able {
		if n == 0 {
			return
		}
		places := g.places[p.word]
		at := places[g.chance.IntN(len(places))]
		form := like(g.words[at].text, p.form)
		if g.taken[at] || !g.fresh(form) || !g.put(at, 1, form, g.words[at].text) {
			continue
		}
		n--
		if again := places[g.chance.IntN(len(places))]; g.chance.IntN(10) == 0 && !g.taken[again] {
			if g.words[again].text == g.words[at].text && g.put(again, 1, form, g.words[at].text) {
				n--
			}
		}
	}
}

// like gives form the capital that word has.
func like(word, form string) string {
	if word[:1] != strings.ToLower(word[:1]) {
		return strings.ToUpper(form[:1]) + form[1:]
	}
	return form
}

// keyboard is the rows of letters that American and British keyboards share.
var keyboard = []string{"qwertyuiop", "asdfghjkl", "zxcvbnm"}

// beside returns the letters whose keys touch that of c.
func beside(c byte) string {
	var out []byte
	for y, row := range keyboard {
		x := strings.IndexByte(row, c)
		if x < 0 {
			continue
		}
		// Each row stands half a key to the right of the one above.
		for _, at := range [][2]int{{y, x - 1}, {y, x + 1}, {y - 1, x}, {y - 1, x + 1}, {y + 1, x - 1}, {y + 1, x}} {
			if at[0] >= 0 && at[0] < len(keyboard) && at[1] >= 0 && at[1] < len(keyboard[at[0]]) {
				out = append(out, keyboard[at[0]][at[1]])
			}
		}
	}
	return string(out)
}

// slip plants n slips of the hand in words of four letters and more: a neighbouring
// key, a letter left out, doubled, or changed with the next.
func (g *garden) slip(n int) {
	for tries := 0; n > 0 && tries < 1000*n; tries++ {
		at := g.chance.IntN(len(g.words))
		word := g.words[at].text
		if g.taken[at] || len(word) < 4 || utf8.RuneCountInString(word) != len(word) {
			continue
		}
		form := g.fumble(word)
		if form != "" && g.fresh(form) && g.put(at, 1, form, word) {
			n--
		}
	}
}

// fumble returns a word of ASCII letters as a slip of the hand leaves it; "" where
// chance came to nothing.
func (g *garden) fumble(word string) string {
	i := g.chance.IntN(len(word))
	if i == 0 && g.chance.IntN(3) > 0 {
		return "" // first letters are seldom wrong
	}
	switch g.chance.IntN(10) {
	case 0, 1, 2:
		near := beside(word[i])
		if near == "" {
			return ""
		}
		return word[:i] + string(near[g.chance.IntN(len(near))]) + word[i+1:]
	case 3, 4, 5:
		if i == 0 {
			return ""
		}
		return word[:i] + word[i+1:]
	case 6, 7:
		return word[:i] + strings.ToLower(word[i:i+1]) + word[i:]
	}
	if i == 0 || i+1 == len(word) || word[i] == word[i+1] {
		return ""
	}
	return word[:i] + string(word[i+1]) + string(word[i]) + word[i+2:]
}

// space plants n words run together or torn apart.
func (g *garden) space(n int) {
	for tries := 0; n > 0 && tries < 1000*n; tries++ {
		at := g.chance.IntN(len(g.words) - 1)
		s, next := g.words[at], g.words[at+1]
		if g.taken[at] || g.taken[at+1] {
			continue
		}
		if n%2 == 0 {
			p := &g.doc.Paragraphs[s.paragraph]
			together := s.text + next.text
			if next.paragraph != s.paragraph || next.word != s.word+1 || len(together) < 4 || !g.fresh(together) ||
				strings.ToLower(next.text) != next.text || p.Text[p.Words[s.word].End:p.Words[next.word].Start] != " " {
				continue
			}
			if g.put(at, 2, together, s.text+" "+next.text) {
				n--
			}
			continue
		}
		if len(s.text) < 6 || utf8.RuneCountInString(s.text) != len(s.text) {
			continue
		}
		i := 2 + g.chance.IntN(len(s.text)-3)
		left, right := s.text[:i], s.text[i:]
		level, _ := g.lex.Find(s.text).Words[0].Level(g.lex.Variety())
		if level > 50 || !g.fresh(left) && !g.fresh(right) {
			continue
		}
		if g.put(at, 1, left+" "+right, s.text) {
			n--
		}
	}
}
