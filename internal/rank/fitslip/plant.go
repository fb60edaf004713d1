package main

import (
	"cmp"
	"context"
	"fmt"
	"math/rand/v2"
	"os"
	"slices"
	"strings"

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
	words  []spot            // what may be spoilt: listed words
	own    []spot            // and names and coinages that the text has often
	places map[string][]int  // into words, by key
	taken  map[[2]int]bool   // words spoilt already, by paragraph and word
	uses   map[string]int    // forms of the text and forms planted
	truth  map[string]string // by planted form
	edits  []manuscript.Emendation
}

func (g *garden) isTaken(s spot) bool { return g.taken[[2]int{s.paragraph, s.word}] }

// spot is one word of the text.
type spot struct {
	paragraph, word int
	text            string
}

// plant writes a copy of a text with n errors in it, and their truth: half of them
// misspellings from a list of pairs, one in ten a space too many or too few, own of
// them slips of the hand in names and coinages that the text has often, the rest
// slips of the hand in listed words.
func plant(ctx context.Context, text, pairs, out, truth string, n, own int, seed uint64) error {
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
	g.space(n / 10)
	g.slip(n-n/2-n/10-own, false)
	g.slip(own, true)
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
		places: map[string][]int{}, taken: map[[2]int]bool{}, uses: map[string]int{}, truth: map[string]string{},
	}
	for i, p := range g.doc.Paragraphs {
		for j, w := range p.Words {
			k := strings.ToLower(w.Text)
			g.uses[k]++
			const odd = manuscript.Number | manuscript.Ordinal | manuscript.Roman | manuscript.Initial |
				manuscript.AllCapitals | manuscript.Elision | manuscript.Broken | manuscript.Hyphenated
			switch plain := w.Traits&odd == 0 && p.Text[w.Start:w.End] == w.Text; {
			case plain && g.known(w.Text):
				g.places[k] = append(g.places[k], len(g.words))
				g.words = append(g.words, spot{i, j, w.Text})
			case plain:
				g.own = append(g.own, spot{i, j, w.Text})
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

// put puts form in place of words words from s on, if it may.
func (g *garden) put(s spot, words int, form, word string) bool {
	p := &g.doc.Paragraphs[s.paragraph]
	start, end := p.Words[s.word].Start, p.Words[s.word+words-1].End
	letters := make([]string, len(g.doc.Letters(s.paragraph, start, end)))
	letters[0] = form
	e := manuscript.Emendation{Paragraph: s.paragraph, Start: start, End: end, Letters: letters}
	if _, err := g.doc.Emend([]manuscript.Emendation{e}); err != nil {
		return false
	}
	for i := range words {
		g.taken[[2]int{s.paragraph, s.word + i}] = true
	}
	g.uses[strings.ToLower(form)]++
	g.truth[form] = word
	g.edits = append(g.edits, e)
	return true
}

// misspell plants n misspellings of the list, one in four of them again, and again.
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
		if n <= 0 {
			return
		}
		places := g.places[p.word]
		at := g.words[places[g.chance.IntN(len(places))]]
		form := like(at.text, p.form)
		if g.isTaken(at) || !g.fresh(form) || !g.put(at, 1, form, at.text) {
			continue
		}
		n--
		for g.chance.IntN(4) == 0 {
			again := g.words[places[g.chance.IntN(len(places))]]
			if !g.isTaken(again) && again.text == at.text && g.put(again, 1, form, at.text) {
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

// often is how many uses make a form the book's own.
const often = 5

// slip plants n slips of the hand in listed words of four letters and more, or in
// the text's own: a neighbouring key, a letter left out, doubled, or changed with
// the next.
func (g *garden) slip(n int, own bool) {
	words := g.words
	if own {
		words = g.own
	}
	for tries := 0; n > 0 && len(words) > 0 && tries < 1000*n; tries++ {
		at := words[g.chance.IntN(len(words))]
		if g.isTaken(at) || len(at.text) < 4 || strings.ContainsFunc(at.text, notLetter) {
			continue
		}
		if own && g.uses[strings.ToLower(at.text)] < often {
			continue
		}
		form := g.fumble(at.text)
		if form != "" && g.fresh(form) && g.put(at, 1, form, at.text) {
			n--
		}
	}
}

func notLetter(r rune) bool { return r > 'z' || r < 'A' || r > 'Z' && r < 'a' }

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
		return word[:i+1] + strings.ToLower(word[i:i+1]) + word[i+1:]
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
		if g.isTaken(s) || g.isTaken(next) {
			continue
		}
		if n%2 == 0 {
			p := &g.doc.Paragraphs[s.paragraph]
			together := s.text + next.text
			if next.paragraph != s.paragraph || next.word != s.word+1 || len(together) < 4 || !g.fresh(together) ||
				strings.ToLower(next.text) != next.text || p.Text[p.Words[s.word].End:p.Words[next.word].Start] != " " {
				continue
			}
			if g.put(s, 2, together, s.text+" "+next.text) {
				n--
			}
			continue
		}
		if len(s.text) < 6 || strings.ContainsFunc(s.text, notLetter) {
			continue
		}
		i := 2 + g.chance.IntN(len(s.text)-3)
		left, right := s.text[:i], s.text[i:]
		level, _ := g.lex.Find(s.text).Words[0].Level(g.lex.Variety())
		if level > 50 || !g.fresh(left) && !g.fresh(right) {
			continue
		}
		if g.put(s, 1, left+" "+right, s.text) {
			n--
		}
	}
}
