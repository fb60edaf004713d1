package lexicon_test

import (
	"cmp"
	"fmt"
	"math/bits"
	"math/rand/v2"
	"os"
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

// Every fortieth of the misspellings in testdata/wikipedia-misspellings.tsv.
func TestWithinEqualsAScanOfTheWholeBaseForRealMisspellings(t *testing.T) {
	data, err := os.ReadFile("../testdata/wikipedia-misspellings.tsv")
	require.NoError(t, err)
	var forms []string
	for i, line := range strings.Split(string(data), "\n")[1:] {
		if form, _, ok := strings.Cut(line, "\t"); ok && i%40 == 0 {
			forms = append(forms, form)
		}
	}
	require.Greater(t, len(forms), 100)
	base := english.Base()
	x := lexicon.New(base, lexicon.American)
	compareToScan(t, newScan(x, map[lexicon.Layer]*lexicon.List{lexicon.Base: base}), forms, 4)
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

// allStrings returns all strings over letters of at most so many of them.
func allStrings(letters string, most int) []string {
	all := []string{""}
	for from := 0; most > 0; most-- {
		to := len(all)
		for _, s := range all[from:to] {
			for _, letter := range letters {
				all = append(all, s+string(letter))
			}
		}
		from = to
	}
	return all
}

func listOf(t *testing.T, name string, words []string) *lexicon.List {
	var listed []lexicon.Word
	for _, w := range words {
		if w != "" {
			listed = append(listed, lexicon.Word{Text: w})
		}
	}
	list, err := lexicon.NewList(name, listed)
	require.NoError(t, err)
	return list
}

// All strings of a small alphabet meet every transposition there is (a prune that
// forgets them fails here), and k beyond every distance finds all.
func TestWithinEqualsAScanOfAllShortStrings(t *testing.T) {
	list := listOf(t, "abc", allStrings("abc", 5))
	require.Equal(t, 3+9+27+81+243, list.Len())
	x := lexicon.New(list, lexicon.AnyVariety)
	s := newScan(x, map[lexicon.Layer]*lexicon.List{lexicon.Base: list})
	compareToScan(t, s, []string{"", "a", "ba", "cab", "abca", "bacab", "ccabba", "d", "adb"}, 7)
	assert.Len(t, x.Within("cab", 1_000_000), 363)
	assert.Empty(t, x.Within("cab", -1))
}

// In a list of a few of all short strings most branches come to nothing, and every
// form has words with their edits in either half or across the middle.
func TestWithinEqualsAScanOfFewShortStrings(t *testing.T) {
	random := rand.New(rand.NewPCG(17, 18))
	all := allStrings("ab", 7)
	for range 20 {
		var some []string
		for _, w := range all {
			if random.IntN(6) == 0 {
				some = append(some, w)
			}
		}
		list := listOf(t, "some", append(some, "abba"))
		x := lexicon.New(list, lexicon.AnyVariety)
		compareToScan(t, newScan(x, map[lexicon.Layer]*lexicon.List{lexicon.Base: list}), all, 5)
	}
}

// More letters than a machine word has bits, those 64 apart often in one place.
func TestWithinEqualsAScanOfWordsInManyLetters(t *testing.T) {
	random := rand.New(rand.NewPCG(19, 20))
	const letters = 200
	letter := func(i int) rune { return '一' + rune(i) }
	var words []string
	for i := range letters {
		words = append(words, string(letter(i)))
	}
	for range 400 {
		word := make([]rune, 1+random.IntN(6))
		for i := range word {
			word[i] = letter(random.IntN(4) + 64*random.IntN(3))
		}
		words = append(words, string(word))
	}
	list := listOf(t, "many", words)
	x := lexicon.New(list, lexicon.AnyVariety)
	compareToScan(t, newScan(x, map[lexicon.Layer]*lexicon.List{lexicon.Base: list}), words[letters-20:letters+150], 4)
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

// What a slice held before makes no difference, and its elements keep apart.
func TestAppendWithinTakesASliceUsedBefore(t *testing.T) {
	base := english.Base()
	x := lexicon.New(base, lexicon.AnyVariety).With(lexicon.Book, load(t, "harbar\tplace\nharbér"))
	var used []lexicon.Near
	for _, form := range append(misspellings(texts(base), 100, 3), "harber") {
		kept := lexicon.Near{Distance: -1}
		used = x.AppendWithin(append(used[:0], kept), form, 2)
		require.Equal(t, kept, used[0])
		fresh := x.AppendWithin(nil, form, 2)
		require.Equal(t, len(fresh), len(used)-1)
		for i, n := range fresh {
			require.Equal(t, n, used[i+1])
			require.Equal(t, x.Alphabet().Fold(x.Alphabet().Letters(n.Word.Text)), n.Letters)
		}
	}
}

func TestAppendWithinGoesByLayerThenDistanceThenOrderOfTheList(t *testing.T) {
	x := lexicon.New(load(t, "bat\nCat\ncut\ncoat"), lexicon.AnyVariety).With(lexicon.House, load(t, "czt\ncat's\tterm"))
	var order []string
	for _, n := range x.AppendWithin(nil, "cat", 2) {
		order = append(order, n.Word.Text)
	}
	assert.Equal(t, []string{"czt", "cat's", "Cat", "bat", "coat", "cut"}, order)
}

func TestWithinGivesTheWordAsItsHighestLayerHasIt(t *testing.T) {
	x := lexicon.New(load(t, "Merrin\nmerrin"), lexicon.AnyVariety).With(lexicon.Series, load(t, "Merrin\tperson\tthe pilot"))
	found := x.Within("merin", 1)
	require.Len(t, found, 2)
	assert.Equal(t, lexicon.Word{Text: "Merrin", Layer: lexicon.Series, Kind: "person", Note: "the pilot"}, found[0].Word)
	assert.Equal(t, lexicon.Word{Text: "merrin"}, found[1].Word)
	assert.Equal(t, "merrin", x.Alphabet().Text(found[0].Letters...))
}
