package lexicon_test

import (
	"cmp"
	"fmt"
	"math/bits"
	"math/rand/v2"
	"slices"
	"strings"
	"sync"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/align"
	"emendary/lexicon"
	"emendary/lexicon/english"
)

// near is a Near that can be compared, with its letters as a text.
type near struct {
	text, letters string
	layer         lexicon.Layer
	distance      int
}

func within(x *lexicon.Lexicon, form string, k int) []near {
	found := make([]near, 0)
	for _, n := range x.Within(form, k) {
		found = append(found, near{n.Word.Text, x.Alphabet().Text(n.Letters...), n.Word.Layer, n.Distance})
	}
	return found
}

// scan is the definition of Within: every word of every layer that Find finds
// known, compared one by one.
type scan struct {
	x     *lexicon.Lexicon
	words []scanned
}

type scanned struct {
	near
	letters []align.Letter
	set     uint64
}

// set returns the letters that occur, as bits. Each edit brings in one new letter
// at most and takes one out at most, so that words with more than k letters of
// their own, on either side, are further apart than k.
func set(letters []align.Letter) uint64 {
	var s uint64
	for _, letter := range letters {
		s |= 1 << (letter % 64)
	}
	return s
}

func newScan(x *lexicon.Lexicon, layers map[lexicon.Layer]*lexicon.List) scan {
	s := scan{x: x}
	highest := map[string]lexicon.Layer{}
	for layer, list := range layers {
		for w := range list.Words() {
			highest[w.Text] = max(layer, highest[w.Text])
		}
	}
	for layer, list := range layers {
		for w := range list.Words() {
			if highest[w.Text] != layer || x.Find(w.Text).Status != lexicon.Known {
				continue
			}
			if _, ok := w.Level(x.Variety()); w.Barred || !ok {
				continue
			}
			letters := x.Alphabet().Fold(x.Alphabet().Letters(w.Text))
			s.words = append(s.words, scanned{near{text: w.Text, letters: x.Alphabet().Text(letters...), layer: layer}, letters, set(letters)})
		}
	}
	return s
}

// within returns the answers for k from 0 to most.
func (s scan) within(form string, most int) [][]near {
	letters := s.x.Alphabet().Fold(s.x.Alphabet().Letters(form))
	own := set(letters)
	answers := make([][]near, most+1)
	for k := range answers {
		answers[k] = make([]near, 0)
	}
	for _, w := range s.words {
		if d := len(w.letters) - len(letters); d > most || -d > most {
			continue // so many insertions or deletions at least
		}
		if bits.OnesCount64(own&^w.set) > most || bits.OnesCount64(w.set&^own) > most {
			continue
		}
		w.distance = align.Restricted(letters, w.letters)
		for k := w.distance; k <= most; k++ {
			answers[k] = append(answers[k], w.near)
		}
	}
	for _, found := range answers {
		slices.SortFunc(found, func(a, b near) int {
			return cmp.Or(cmp.Compare(a.distance, b.distance), strings.Compare(a.text, b.text))
		})
	}
	return answers
}

func compareToScan(t *testing.T, s scan, forms []string, most int) {
	var all sync.WaitGroup
	for part := range slices.Chunk(forms, len(forms)/2+1) {
		all.Go(func() {
			for _, form := range part {
				for k, want := range s.within(form, most) {
					assert.Equal(t, want, within(s.x, form, k), "%q within %d", form, k)
				}
			}
		})
	}
	all.Wait()
}

func TestWithinEqualsAScanOfTheWholeBase(t *testing.T) {
	base := english.Base()
	forms := append(misspellings(texts(base), 50, 3), "harber", "recieve", "ca", "a", "", "thsi", "ZZZZZZ", "naïve", "Ångstrm")
	x := lexicon.New(base, lexicon.BritishIse)
	compareToScan(t, newScan(x, map[lexicon.Layer]*lexicon.List{lexicon.Base: base}), forms, 3)
}

// A part of the base, so that hundreds of forms can be compared, with lists that
// list, bar and un-bar words of it, words above ASCII and letters of two code
// points.
func TestWithinEqualsAScanOfAllLayers(t *testing.T) {
	random := rand.New(rand.NewPCG(7, 8))
	var some []lexicon.Word
	var house, book strings.Builder
	for w := range english.Base().Words() {
		if random.IntN(80) != 0 && !strings.ContainsAny(w.Text, "éöñ") {
			continue
		}
		some = append(some, w)
		switch random.IntN(8) {
		case 0:
			fmt.Fprintf(&house, "%s → %s\n", w.Text, "other")
		case 1:
			fmt.Fprintf(&house, "%s\n", w.Text)
		case 2:
			fmt.Fprintf(&house, "%s → \n", strings.ToLower(w.Text))
			fmt.Fprintf(&book, "%s\tperson\n", w.Text)
		case 3:
			fmt.Fprintf(&book, "%sẍ\n", w.Text)
		}
	}
	base, err := lexicon.NewList("some", some)
	require.NoError(t, err)
	layers := map[lexicon.Layer]*lexicon.List{
		lexicon.Base: base, lexicon.House: load(t, house.String()), lexicon.Book: load(t, book.String()),
	}
	x := lexicon.New(base, lexicon.American).With(lexicon.House, layers[lexicon.House]).With(lexicon.Book, layers[lexicon.Book])
	forms := misspellings(append(texts(base), texts(layers[lexicon.Book])...), 300, 4)
	compareToScan(t, newScan(x, layers), forms, 3)
}

// All strings of a small alphabet meet every transposition there is (a prune that
// forgets them fails here), and k beyond every distance finds all.
func TestWithinEqualsAScanOfAllShortStrings(t *testing.T) {
	var words []lexicon.Word
	for i := range 1 << 10 { // each two bits a letter, 0 the end
		text := ""
		for ; i > 0; i >>= 2 {
			text += []string{"", "a", "b", "c"}[i&3]
		}
		if text != "" {
			words = append(words, lexicon.Word{Text: text})
		}
	}
	list, err := lexicon.NewList("abc", words)
	require.NoError(t, err)
	require.Equal(t, 3+9+27+81+243, list.Len())
	x := lexicon.New(list, lexicon.AnyVariety)
	s := newScan(x, map[lexicon.Layer]*lexicon.List{lexicon.Base: list})
	compareToScan(t, s, []string{"", "a", "ba", "cab", "abca", "bacab", "ccabba", "d", "adb"}, 7)
	assert.Len(t, x.Within("cab", 1_000_000), 363)
	assert.Empty(t, x.Within("cab", -1))
}

// Forms and words about the sizes at which a machine word is full.
func TestWithinEqualsAScanOfLongWords(t *testing.T) {
	random := rand.New(rand.NewPCG(9, 10))
	var words []lexicon.Word
	var forms []string
	for _, n := range []int{61, 62, 63, 64, 65, 66, 98, 99, 100} {
		for range 2 {
			word := make([]rune, n)
			for i := range word {
				word[i] = rune("abé"[0]) + rune(random.IntN(2))
			}
			words = append(words, lexicon.Word{Text: string(word)})
			form := slices.Clone(word)
			for range random.IntN(4) {
				form = misspell(random, form, []rune("abé"))
			}
			forms = append(forms, string(form))
		}
	}
	list, err := lexicon.NewList("long", words)
	require.NoError(t, err)
	x := lexicon.New(list, lexicon.AnyVariety)
	s := newScan(x, map[lexicon.Layer]*lexicon.List{lexicon.Base: list})
	compareToScan(t, s, forms, 4)
	compareToScan(t, s, []string{forms[0] + forms[10], strings.Repeat("ab", 64)}, 30)
	assert.Empty(t, x.Within(strings.Repeat("a", 1_000_000), 1_000_000))
}

// Find is the same for Dr and Dr., so a bar on one keeps the other out too.
func TestWithinLeavesOutWhatAFullStopBars(t *testing.T) {
	x := lexicon.New(load(t, "Dr\nPh.D.\nfro"), lexicon.AnyVariety).With(lexicon.House, load(t, "Dr. → Doctor\nPh.D → PhD"))
	for form, k := range map[string]int{"Dr": 0, "Drs": 1, "Dr.": 1, "Ph.D.": 1} {
		assert.Empty(t, x.Within(form, k), form)
	}
	assert.Len(t, x.Within("for", 1), 1)
}

func TestWithinGivesTheWordAsItsHighestLayerHasIt(t *testing.T) {
	x := lexicon.New(load(t, "Merrin\nmerrin"), lexicon.AnyVariety).With(lexicon.Series, load(t, "Merrin\tperson\tthe pilot"))
	found := x.Within("merin", 1)
	require.Len(t, found, 2)
	assert.Equal(t, lexicon.Word{Text: "Merrin", Layer: lexicon.Series, Kind: "person", Note: "the pilot"}, found[0].Word)
	assert.Equal(t, lexicon.Word{Text: "merrin"}, found[1].Word)
	assert.Equal(t, "merrin", x.Alphabet().Text(found[0].Letters...))
}
