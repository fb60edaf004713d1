package lexicon_test

import (
	"errors"
	"io"
	"slices"
	"strings"
	"testing"
	"testing/iotest"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/lexicon"
)

func load(t testing.TB, text string) *lexicon.List {
	l, err := lexicon.Load(strings.NewReader(text), "house.txt")
	require.NoError(t, err)
	return l
}

func TestLoadReadsALine(t *testing.T) {
	for _, c := range []struct {
		line string
		want []lexicon.Word
	}{
		{"", nil},
		{"   \t \t ", nil},
		{"# a comment", nil},
		{"  # a comment", nil},
		{"harbour", []lexicon.Word{{Text: "harbour"}}},
		{"  harbour  ", []lexicon.Word{{Text: "harbour"}}},
		{"harbour # a comment\twith a tab", []lexicon.Word{{Text: "harbour"}}},
		{"C#", []lexicon.Word{{Text: "C#"}}},
		{"Merrin\tperson", []lexicon.Word{{Text: "Merrin", Kind: "person"}}},
		{"Merrin\tperson\tthe pilot", []lexicon.Word{{Text: "Merrin", Kind: "person", Note: "the pilot"}}},
		{"Merrin\tperson\tpilot no. #3 # always", []lexicon.Word{{Text: "Merrin", Kind: "person", Note: "pilot no. #3 # always"}}},
		{"Merrin\t\tthe pilot", []lexicon.Word{{Text: "Merrin", Note: "the pilot"}}},
		{"Merrin\t# a comment\tmore of it", []lexicon.Word{{Text: "Merrin"}}},
		{"okay → OK", []lexicon.Word{{Text: "okay", Barred: true, Instead: "OK"}}},
		{"okay→OK", []lexicon.Word{{Text: "okay", Barred: true, Instead: "OK"}}},
		{"okay -> OK\tterm\tsince the first book", []lexicon.Word{{Text: "okay", Barred: true, Instead: "OK", Kind: "term", Note: "since the first book"}}},
		{"alot → a lot", []lexicon.Word{{Text: "alot", Barred: true, Instead: "a lot"}}},
		{"okay →", []lexicon.Word{{Text: "okay", Barred: true}}},
		{"cafe\u0301", []lexicon.Word{{Text: "caf\u00e9"}}},
		{"\ufeffharbour", []lexicon.Word{{Text: "harbour"}}},
		{"harbour\r", []lexicon.Word{{Text: "harbour"}}},
		{"harbour-master", []lexicon.Word{{Text: "harbour-master"}}},
		{"O’Shea", []lexicon.Word{{Text: "O’Shea"}}},
		{"1st", []lexicon.Word{{Text: "1st"}}},
	} {
		for _, end := range []string{"", "\n", "\r\n"} {
			assert.Equal(t, c.want, slices.Collect(load(t, c.line+end).Words()), "%q", c.line+end)
		}
	}
}

func TestOfLinesForOneWordTheLastStands(t *testing.T) {
	l := load(t, "okay → OK\nMerrin\tperson\nokay\nMerrin\tvessel\n")
	assert.Equal(t, []lexicon.Word{{Text: "Merrin", Kind: "vessel"}, {Text: "okay"}}, slices.Collect(l.Words()))
	assert.Equal(t, 2, l.Len())
}

func TestLoadNamesTheLineAndTheRemedy(t *testing.T) {
	for _, c := range []struct{ line, want string }{
		{"Sallow Quay", "more than one word; give each word a line of its own"},
		{"Sallow\u00a0Quay", "more than one word; give each word a line of its own"},
		{"a lot → alot", "more than one word; give each word a line of its own"},
		{"a\tb\tc\td", "more than three columns; give word, kind and note"},
		{"\tperson", "no word before the first tab; start the line with the word, or with # for a comment"},
		{"→ OK", "no word before the arrow; give the word that is barred"},
		{"har\xffbour", "byte 4 is not UTF-8; save the list as UTF-8"},
		{"harbour\tterm\tna\xefve", "byte 16 is not UTF-8; save the list as UTF-8"},
		{"har\x1bbour", "character U+001B cannot be seen; delete it"},
		{"har\u00adbour", "character U+00AD cannot be seen; delete it"},
		{"har\ufeffbour", "character U+FEFF cannot be seen; delete it"},
		{"harbour\tterm\t\x1b[31m", "character U+001B cannot be seen; delete it"},
		{"harbour\tterm\t\u202enote", "character U+202E cannot be seen; delete it"},
		{"---", `"---" has no letter; begin the line with # to make it a comment`},
		{strings.Repeat("é", 101), `"` + strings.Repeat("é", 40) + `"… has 101 letters; a word may have 100`},
		{strings.Repeat("a", 70_000), "longer than 65536 bytes; give each word a line of its own"},
	} {
		_, err := lexicon.Load(strings.NewReader("# house\nharbour\n"+c.line+"\nlast"), "house.txt")
		assert.EqualError(t, err, "house.txt: line 3: "+c.want, "%.60q", c.line)
	}
}

func TestLongestWord(t *testing.T) {
	for letters, ok := range map[int]bool{lexicon.MaxLetters - 1: true, lexicon.MaxLetters: true, lexicon.MaxLetters + 1: false} {
		word := strings.Repeat("ẍ", letters) // two code points each
		l, err := lexicon.NewList("long", []lexicon.Word{{Text: word}})
		assert.Equal(t, ok, err == nil, letters)
		if ok {
			x := lexicon.New(l, lexicon.AnyVariety)
			assert.Equal(t, lexicon.Known, x.Find(word).Status)
			assert.Len(t, x.Within(word[3:], 1), 1)
		}
	}
}

func TestLoadGivesReadErrors(t *testing.T) {
	_, err := lexicon.Load(io.MultiReader(strings.NewReader("harbour\n"), iotest.ErrReader(errors.New("disk gone"))), "house.txt")
	assert.EqualError(t, err, "house.txt: after line 1: disk gone")
}

func TestNewListNamesTheWord(t *testing.T) {
	_, err := lexicon.NewList("names", []lexicon.Word{{Text: "Merrin"}, {Text: ""}})
	assert.EqualError(t, err, "names: word 2: the word is empty; give it or leave it out")
	_, err = lexicon.NewList("names", []lexicon.Word{{Text: "Mer\xffrin"}})
	assert.EqualError(t, err, `names: word 1: byte 4 of "Mer\xffrin" is not UTF-8; save the list as UTF-8`)
}

func TestNoListHasNoWords(t *testing.T) {
	var none *lexicon.List
	for _, l := range []*lexicon.List{none, {}, load(t, "")} {
		assert.Zero(t, l.Len())
		assert.Empty(t, slices.Collect(l.Words()))
		x := lexicon.New(l, lexicon.American)
		assert.Equal(t, lexicon.Finding{}, x.Find("harbour"))
		assert.Empty(t, x.Within("harbour", 9))
	}
}

// What loads is in NFC, found again as written, and loads again from its own
// words to the same list.
func FuzzLoad(f *testing.F) {
	for _, s := range []string{
		"", "harbour", "\ufeffharbour\r\nokay → OK\n", "a\tb\tc", "# x\n\n a -> b # c", "ẍ\nẌ\nx", "İstanbul\nistanbul",
		"Dr.\nDr", "a\u0300\u0301b", "\xff", "🇬🇧a", "O’Shea\nO'Shea\n", "ſ\nS", "ǅ\nǆ", "ß\nẞ", "a\u200db", "ﬁ", "\u0e33a", "Ω\nΩ",
	} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, text string) {
		l, err := lexicon.Load(strings.NewReader(text), "fuzz")
		if err != nil {
			require.True(t, strings.HasPrefix(err.Error(), "fuzz: line "), err)
			return
		}
		words := slices.Collect(l.Words())
		require.Len(t, words, l.Len())
		x := lexicon.New(nil, lexicon.AnyVariety).With(lexicon.House, l)
		for _, w := range words {
			found := x.Find(w.Text)
			w.Layer = lexicon.House
			require.Contains(t, found.Words, w)
			near := x.Within(w.Text, 0)
			listed := slices.ContainsFunc(near, func(n lexicon.Near) bool { return n.Word.Text == w.Text })
			require.Equal(t, !w.Barred, listed, "%q", w.Text)
		}
		again, err := lexicon.NewList("fuzz", words)
		require.NoError(t, err)
		require.Equal(t, words, slices.Collect(again.Words()))
	})
}

func TestReadWordsReadsWhatLoadDoes(t *testing.T) {
	const text = "# ours\nharbour\nMerrin\tperson\tthe pilot\nokay → OK\nharbour\tterm\n"
	words, err := lexicon.ReadWords(strings.NewReader(text), "house.txt")
	require.NoError(t, err)
	assert.Equal(t, []lexicon.Word{
		{Text: "harbour"}, {Text: "Merrin", Kind: "person", Note: "the pilot"},
		{Text: "okay", Barred: true, Instead: "OK"}, {Text: "harbour", Kind: "term"},
	}, words)
	list, err := lexicon.NewList("house.txt", words)
	require.NoError(t, err)
	assert.Equal(t, slices.Collect(load(t, text).Words()), slices.Collect(list.Words()))

	for _, bad := range []string{"a\nSallow Quay\n", "a\n\xff\n", "a\n\x07\n", "a\nb\tc\td\te\n"} {
		_, want := lexicon.Load(strings.NewReader(bad), "house.txt")
		words, err := lexicon.ReadWords(strings.NewReader(bad), "house.txt")
		assert.Empty(t, words)
		require.Error(t, err)
		assert.EqualError(t, err, want.Error())
	}
}
