package align

import (
	"bufio"
	"os"
	"strconv"
	"strings"
	"sync"
	"testing"
	"unicode"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"golang.org/x/text/unicode/norm"
)

// Unicode's own test of extended grapheme clusters, of the version that the
// splitter implements; its lines are not all in NFC, so the splitter is called
// on its own.
func TestClustersPassUnicodesGraphemeBreakTest(t *testing.T) {
	file, err := os.Open("testdata/GraphemeBreakTest.txt")
	require.NoError(t, err)
	defer file.Close()

	cases := 0
	lines := bufio.NewScanner(file)
	for n := 1; lines.Scan(); n++ {
		if n == 1 {
			require.Equal(t, "# GraphemeBreakTest-15.0.0.txt", lines.Text())
		}
		line, _, _ := strings.Cut(lines.Text(), "#")
		if strings.TrimSpace(line) == "" {
			continue
		}
		var want []string
		for _, field := range strings.Fields(line) {
			switch field {
			case "÷": // a boundary
				want = append(want, "")
			case "×": // none
			default:
				code, err := strconv.ParseUint(field, 16, 32)
				require.NoError(t, err, "line %d", n)
				want[len(want)-1] += string(rune(code))
			}
		}
		want = want[:len(want)-1] // after the last boundary stands nothing
		text := strings.Join(want, "")
		var got []string
		for cluster := range clusters(text) {
			got = append(got, cluster)
		}
		assert.Equal(t, want, got, "line %d: %s", n, line)

		var a Alphabet
		if norm.NFC.IsNormalString(text) {
			assert.Len(t, a.Letters(text), len(want), "line %d: %s", n, line)
		}
		cases++
	}
	require.NoError(t, lines.Err())
	require.Equal(t, 602, cases, "the file says so in its last line")
}

func TestLettersAreUserPerceivedCharacters(t *testing.T) {
	const many = firstNumber
	tests := []struct {
		name, text string
		want       []Letter
	}{
		{"nothing", "", []Letter{}},
		{"ASCII", "ab\n\n", []Letter{'a', 'b', '\n', '\n'}},
		{"composed", "caf\u00e9", []Letter{'c', 'a', 'f', 0xe9}},
		{"decomposed", "cafe\u0301", []Letter{'c', 'a', 'f', 0xe9}},
		{"no composed form", "n\u0308n", []Letter{many, 'n'}},
		{"the same twice", "n\u0308n\u0308", []Letter{many, many}},
		{"two marks in either order", "q\u0323\u0307q\u0307\u0323", []Letter{many, many}},
		{"CR LF", "a\r\nb\r", []Letter{'a', many, 'b', '\r'}},
		{"Hangul jamo", "\u1112\u1161\u11ab", []Letter{0xd55c}},
		{"flags", "🇳🇴🇸🇪🇳", []Letter{many, many + 1, 0x1f1f3}},
		{"family", "👩\u200d👧", []Letter{many}},
		{"outside the basic plane", "𝔞", []Letter{0x1d51e}},
		{"replacement character", "\ufffd", []Letter{0xfffd}},
		{"bytes that are not UTF-8", "\xff\xfea", []Letter{many, many + 1, 'a'}},
		{"a mark alone", "\u0301", []Letter{0x301}},
	}
	for _, test := range tests {
		t.Run(test.name, func(t *testing.T) {
			var a Alphabet
			letters := a.Letters(test.text)
			assert.Equal(t, test.want, letters)
			assert.Equal(t, norm.NFC.String(test.text), a.Text(letters...))
		})
	}
}

func TestTextWritesWhatIsNoLetterAsReplacementCharacter(t *testing.T) {
	var a Alphabet
	known := a.Letters("n\u0308")[0]
	assert.Equal(t, "x\ufffd\ufffd\ufffdn\u0308", a.Text('x', -1, 0xd800, known+1, known))
	assert.Empty(t, a.Text())
}

func TestAlphabetServesSeveralGoroutines(t *testing.T) {
	const text = "q\u0307r\u0323x\u0302🇳🇴w\u0331z\u0327"
	var a Alphabet
	var wait sync.WaitGroup
	letters := make([][]Letter, 8)
	for i := range letters {
		wait.Go(func() {
			for range 50 {
				letters[i] = a.Fold(a.Letters(text))
				_ = a.Text(letters[i]...)
			}
		})
	}
	wait.Wait()
	for _, l := range letters {
		assert.Equal(t, letters[0], l)
	}
	assert.Equal(t, norm.NFC.String(text), a.Text(letters[0]...))
}

func TestFold(t *testing.T) {
	tests := []struct{ name, text, want string }{
		{"ASCII", "Harbour-MASTER’s [@`{", "harbour-master's [@`{"},
		{"marks stay", "ÉTÉ Åse", "été åse"},
		{"final sigma", "ΣΊΣΥΦΟΣ σίσυφος", "σίσυφοσ σίσυφοσ"},
		{"sharp s", "STRAẞE straße", "straße straße"},
		{"Turkish i", "İIıi", "İiıi"},
		{"long s", "ſhip", "ship"},
		{"title case digraph", "ǅǄ", "ǆǆ"},
		{"apostrophes", "o’clock ‘tis ʼn '", "o'clock 'tis 'n '"},
		{"hyphens", "quay\u2010side quay\u2011side", "quay-side quay-side"},
		{"dashes are no hyphens", "–—", "–—"},
		{"several code points", "N\u0308", "n\u0308"},
		{"one code point in lower case only", "H\u0331", "\u1e96"},
		{"not UTF-8", "A\xffB\xfe", "a\xffb\xfe"},
	}
	for _, test := range tests {
		t.Run(test.name, func(t *testing.T) {
			var a Alphabet
			letters := a.Letters(test.text)
			before := a.Text(letters...)
			folded := a.Fold(letters)
			assert.Equal(t, test.want, a.Text(folded...))
			assert.Equal(t, a.Letters(test.want), folded, "one for one")
			assert.Equal(t, folded, a.Fold(folded), "twice is once")
			assert.Equal(t, before, a.Text(letters...), "the argument stays")
		})
	}
}

// Letters that differ by case only are an orbit of unicode.SimpleFold.
func TestFoldTakesEachOrbitOfCaseToOneLetterOfIt(t *testing.T) {
	orbits := make(map[rune]rune) // folded → least of the orbit
	for r := rune(0); r <= unicode.MaxRune; r++ {
		switch r {
		case '\u0345', '‘', '’', 'ʼ', '\u2010', '\u2011':
			continue
		}
		least, member := r, false
		for o := unicode.SimpleFold(r); ; o = unicode.SimpleFold(o) {
			if o != '\u0345' {
				least = min(least, o)
			}
			member = member || o == foldRune(r)
			if o == r {
				break
			}
		}
		if !member {
			t.Fatalf("%U folds to %U, another letter", r, foldRune(r))
		}
		if other, ok := orbits[foldRune(r)]; ok && other != least {
			t.Fatalf("%U and %U fold to the same letter", r, other)
		}
		orbits[foldRune(r)] = least
		if f := foldRune(r); foldRune(f) != f {
			t.Fatalf("%U folds to %U, which folds on", r, f)
		}
		if o := unicode.SimpleFold(r); o != '\u0345' && foldRune(o) != foldRune(r) {
			t.Fatalf("%U and %U fold to different letters", r, o)
		}
	}
}

func FuzzLettersTextIsNFC(f *testing.F) {
	for _, text := range []string{
		"", "harbour", "caf\u00e9", "cafe\u0301", "n\u0308N\u0308", "a\r\nb", "🇳🇴🇸🇪🇳", "👩\u200d👧", "\xff\xfea\xcc",
		"\u1112\u1161\u11ab", "\u0301\u0301", strings.Repeat("\u0301", 40), "\u0344\u0343", "H\u0331", "İ\u0307", "क्षि",
	} {
		f.Add(text)
	}
	f.Fuzz(func(t *testing.T, text string) {
		var a Alphabet
		letters := a.Letters(text)
		require.Equal(t, norm.NFC.String(text), a.Text(letters...))
		folded := a.Fold(letters)
		require.Len(t, folded, len(letters))
		require.Equal(t, folded, a.Fold(folded))
	})
}
