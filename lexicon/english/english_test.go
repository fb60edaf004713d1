package english_test

import (
	"crypto/sha256"
	"encoding/hex"
	"os"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/lexicon"
	"emendary/lexicon/english"
)

func TestEmbeddedBytesAreTheRecordedOnes(t *testing.T) {
	data, err := os.ReadFile("english.lexicon")
	require.NoError(t, err)
	_, err = lexicon.Open("English", string(data)) // with the checks that Base leaves out
	require.NoError(t, err)
	sum := sha256.Sum256(data)
	assert.Equal(t, english.SHA256, hex.EncodeToString(sum[:]))
	assert.Equal(t, english.Words, english.Base().Len())
	assert.Equal(t, "English", english.Base().Name())
	assert.Equal(t, "2020.12.07-2", english.Version)
}

// Every word is found, as itself; no other test looks at each.
func TestEveryWordIsFoundAsWritten(t *testing.T) {
	x := lexicon.New(english.Base(), lexicon.AnyVariety)
	count := 0
	for w := range english.Base().Words() {
		count++
		require.NotEmpty(t, w.Sources, w.Text)
		found := x.Find(w.Text)
		require.NotEqual(t, lexicon.Unknown, found.Status, w.Text)
		self := false
		for _, f := range found.Words {
			self = self || f.Text == w.Text
		}
		require.True(t, self, w.Text)
		for _, s := range w.Sources {
			require.True(t, s.Level >= 10 && s.Level <= 70, w.Text)
		}
	}
	assert.Equal(t, english.Words, count)
}

// Levels, categories and classes as the files of Debian's scowl 2020.12.07-2 have
// them, by a search of the files.
func TestKnownWords(t *testing.T) {
	x := lexicon.New(english.Base(), lexicon.AnyVariety)
	for _, c := range []struct {
		text, class string
		varieties   string
		level       int // in any variety
	}{
		{"water", "words", "american british-ise british-ize canadian australian", 10},
		{"Thames", "upper", "american british-ise british-ize canadian australian", 50},
		{"McKay", "proper-names", "american british-ise british-ize canadian australian", 50},
		{"etc", "abbreviations", "american british-ise british-ize canadian australian", 40},
		{"o'clock", "contractions", "american british-ise british-ize canadian australian", 35},
		{"café", "words", "american british-ise british-ize canadian australian", 20},
		{"colour", "words", "british-ise british-ize canadian australian", 10},
		{"color", "words", "american", 10},
		{"organisation", "words", "british-ise australian", 10},
		{"organization", "words", "american british-ize canadian", 10},
		{"aluminum", "words", "american canadian", 35},
		{"theatre", "words", "british-ise british-ize canadian australian", 20},
		{"arvo", "words", "american british-ise british-ize canadian australian", 35},
		{"'tis", "contractions", "american british-ise british-ize canadian australian", 35}, // of our own additions
	} {
		found := x.Find(c.text)
		require.NotEmpty(t, found.Words, c.text)
		w := found.Words[0]
		assert.Equal(t, c.text, w.Text)
		level, ok := w.Level(lexicon.AnyVariety)
		assert.True(t, ok, c.text)
		assert.Equal(t, c.level, level, c.text)
		assert.Equal(t, c.class, w.Sources[0].Class, c.text)
		var flags []string
		for _, v := range w.Varieties() {
			flags = append(flags, v.Flag())
		}
		assert.Equal(t, c.varieties, strings.Join(flags, " "), c.text)
	}
	for _, unlisted := range []string{"thames", "harbour's", "xii", "harber", "Mr's", "sallow-quay"} {
		assert.Equal(t, lexicon.Unknown, x.Find(unlisted).Status, unlisted)
	}
}

func TestBaseOpensOnce(t *testing.T) {
	assert.Same(t, english.Base(), english.Base())
}

// BenchmarkView tells what a program's start pays for the lexicon, BenchmarkOpen
// what it would pay with the checks.
func BenchmarkView(b *testing.B) { benchmarkOpening(b, lexicon.View) }
func BenchmarkOpen(b *testing.B) { benchmarkOpening(b, lexicon.Open) }

func benchmarkOpening(b *testing.B, open func(name, data string) (*lexicon.List, error)) {
	data, err := os.ReadFile("english.lexicon")
	require.NoError(b, err)
	flat := string(data)
	for b.Loop() {
		l, err := open("English", flat)
		require.NoError(b, err)
		lexicon.New(l, lexicon.American)
	}
}
