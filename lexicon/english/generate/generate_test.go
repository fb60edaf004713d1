package main

import (
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/lexicon"
	"emendary/lexicon/english"
)

const sample = "testdata/scowl"

// generated runs the generator on the sample: lines of the package's lists for
// some fifty words, all of their lines.
func generated(t *testing.T, additions string) (dir string, list *lexicon.List) {
	dir = t.TempDir()
	require.NoError(t, generate(sample, additions, dir))
	data, err := os.ReadFile(filepath.Join(dir, "english.lexicon"))
	require.NoError(t, err)
	list, err = lexicon.Open("sample", string(data))
	require.NoError(t, err)
	return dir, list
}

func sources(l *lexicon.List) map[string][]lexicon.Source {
	all := map[string][]lexicon.Source{}
	for w := range l.Words() {
		all[w.Text] = w.Sources
	}
	return all
}

func TestEmbeddedLexiconIsWhatTheGeneratorMakes(t *testing.T) {
	dir, list := generated(t, "../additions.txt")
	embedded := sources(english.Base())
	require.Greater(t, list.Len(), 60)
	for text, want := range sources(list) {
		assert.Equal(t, want, embedded[text], text)
	}
	source, err := os.ReadFile(filepath.Join(dir, "source.go"))
	require.NoError(t, err)
	committed, err := os.ReadFile("../source.go")
	require.NoError(t, err)
	without := func(b []byte, names ...string) []string { // lines that differ with the words
		return slices.DeleteFunc(strings.Split(string(b), "\n"), func(line string) bool {
			return slices.ContainsFunc(names, func(n string) bool { return strings.Contains(line, n+" ") && strings.Contains(line, "=") })
		})
	}
	assert.Equal(t, without(committed, "Words", "SHA256"), without(source, "Words", "SHA256"))
	copyright, err := os.ReadFile(filepath.Join(dir, "COPYRIGHT"))
	require.NoError(t, err)
	shipped, err := os.ReadFile("../COPYRIGHT")
	require.NoError(t, err)
	assert.Equal(t, string(shipped), string(copyright))
}

func TestGeneratorGivesTheSameBytesAgain(t *testing.T) {
	first, _ := generated(t, "../additions.txt")
	second, _ := generated(t, "../additions.txt")
	for _, name := range []string{"english.lexicon", "source.go"} {
		a, err := os.ReadFile(filepath.Join(first, name))
		require.NoError(t, err)
		b, err := os.ReadFile(filepath.Join(second, name))
		require.NoError(t, err)
		assert.Equal(t, a, b, name)
	}
}

// The lines are those of the sample's files.
func TestSourcesAreTheListsThatHaveTheWord(t *testing.T) {
	_, list := generated(t, "../additions.txt")
	got := sources(list)
	words := func(category string, level uint8) lexicon.Source {
		return lexicon.Source{Category: category, Class: "words", Level: level}
	}
	for text, want := range map[string][]lexicon.Source{
		"harbour": {words("australian", 35), words("british", 35), words("british_z", 35), words("canadian", 35)},
		"realise": {words("australian", 10), words("british", 10)},
		"Thames":  {{Category: "english", Class: "upper", Level: 50}},
		"Rose":    {{Category: "english", Class: "proper-names", Level: 50}},
		"don't":   {{Category: "english", Class: "contractions", Level: 10}},
		"'tis":    {{Category: "english", Class: "contractions", Level: 35}},
		// british_z lacks learnt, although it has nothing to do with -ize.
		"learnt": {
			words("australian", 10), words("british", 10), words("british_variant_1", 10), words("british_z", 10),
			words("canadian_variant_1", 10), words("variant_2", 10),
		},
		"Kinko's":   {{Category: "english", Class: "proper-names", Level: 50}},
		"harbour's": nil, // the possessive of a word that is in
		"thames":    nil, // sizes above 70
		"ok":        nil,
		"xii":       nil, // special lists
		"pilot":     {words("english", 20)},
	} {
		assert.Equal(t, want, got[text], text)
	}
}

func TestGeneratorSaysWhatIsWrong(t *testing.T) {
	doc := func(t *testing.T, dir string) {
		require.NoError(t, os.CopyFS(filepath.Join(dir, "usr/share/doc"), os.DirFS(filepath.Join(sample, "usr/share/doc"))))
	}
	for _, c := range []struct {
		name, additions, want string
		prepare               func(t *testing.T, dir, lists string)
	}{
		{"no package", "", "unpack the package scowl and name its folder with -dir", func(*testing.T, string, string) {}},
		{"no lists", "", "has no word lists; unpack the package scowl", func(t *testing.T, _, lists string) {
			require.NoError(t, os.MkdirAll(lists, 0o755))
		}},
		{"other file", "", "words.txt: not named category-class.level; take it out of the folder", func(t *testing.T, _, lists string) {
			require.NoError(t, os.MkdirAll(lists, 0o755))
			require.NoError(t, os.WriteFile(filepath.Join(lists, "words.txt"), nil, 0o644))
		}},
		{"not UTF-8", "", `English: word 1: byte 4 of "caf\xe9" is not UTF-8`, func(t *testing.T, dir, lists string) {
			require.NoError(t, os.MkdirAll(lists, 0o755))
			require.NoError(t, os.WriteFile(filepath.Join(lists, "english-words.10"), []byte("caf\xe9\n"), 0o644))
		}},
		{"no changelog", "", "changelog.Debian.gz", func(t *testing.T, dir, lists string) {
			require.NoError(t, os.MkdirAll(lists, 0o755))
			require.NoError(t, os.WriteFile(filepath.Join(lists, "english-words.10"), []byte("water\n"), 0o644))
		}},
		{"addition without level", "'tis\tcontractions", `additions.txt: the level of 'tis is ""; give a number up to 70`, func(t *testing.T, dir, lists string) {
			require.NoError(t, os.MkdirAll(lists, 0o755))
			require.NoError(t, os.WriteFile(filepath.Join(lists, "english-words.10"), []byte("water\n"), 0o644))
			doc(t, dir)
		}},
		{"addition that is listed", "water\twords\t35", "additions.txt: the package has water; take it out", func(t *testing.T, dir, lists string) {
			require.NoError(t, os.MkdirAll(lists, 0o755))
			require.NoError(t, os.WriteFile(filepath.Join(lists, "english-words.10"), []byte("water\n"), 0o644))
			doc(t, dir)
		}},
	} {
		t.Run(c.name, func(t *testing.T) {
			dir, out := t.TempDir(), t.TempDir()
			c.prepare(t, dir, filepath.Join(dir, "usr/share/dict/scowl"))
			additions := filepath.Join(out, "additions.txt")
			require.NoError(t, os.WriteFile(additions, []byte(c.additions), 0o644))
			assert.ErrorContains(t, generate(dir, additions, out), c.want)
			left, err := filepath.Glob(filepath.Join(out, "*.lexicon"))
			require.NoError(t, err)
			assert.Empty(t, left)
		})
	}
}
