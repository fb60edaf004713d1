package manuscript

import (
	"maps"
	"math/rand/v2"
	"os"
	"slices"
	"strings"
	"testing"
	"unicode/utf8"

	"github.com/rivo/uniseg"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// splitSlowly is split with every segment cut by the library and every word taken
// the long way: the truth that the quick ways are held to.
func splitSlowly(text string, base Setting, italics []extent) []Word {
	var s splitter
	slow := func(start, end int) {
		for state := -1; start < end; {
			var found string
			found, _, state = uniseg.FirstWordInString(text[start:end], state)
			if k := kindOf(found); k == wordToken {
				s.cut(found, start)
			} else {
				s.add(start, start+len(found), k)
			}
			start += len(found)
		}
	}
	at := 0
	for _, skipped := range withAddresses(text, nil, addressesSlowly(text)) {
		slow(at, max(at, skipped.start))
		if skipped.end > max(at, skipped.start) {
			s.add(max(at, skipped.start), skipped.end, skip)
			at = skipped.end
		}
	}
	slow(at, len(text))
	s.assignRoles(text)
	s.markSpeech(text)
	sentence := sentence{text: text, tokens: s.tokens, starts: true, heading: base == Heading}
	for i := 0; i < len(s.tokens); i++ {
		t := s.tokens[i]
		if t.kind != wordToken {
			sentence.pass(i)
			continue
		}
		first, last := s.extend(text, i)
		w := s.word(text, first, last)
		inItalics := false
		for _, e := range italics {
			inItalics = inItalics || e.start <= int(t.start) && int(t.start) < e.end
		}
		w.Setting = setting(base, t.speech, inItalics)
		if base == Heading {
			w.Traits |= HeadingWord
		}
		if sentence.word(last, &w) {
			w.Traits |= SentenceStart
		}
		s.words = append(s.words, w)
		i = last
	}
	return s.words
}

// addressesSlowly looks at each chunk of text by itself.
func addressesSlowly(text string) []reasoned {
	var found []reasoned
	for at := 0; at < len(text); {
		n := strings.IndexFunc(text[at:], endsChunk)
		if n < 0 {
			n = len(text) - at
		}
		chunk := text[at : at+n]
		if point := strings.IndexByte(chunk, '.'); n > 2 && (strings.ContainsAny(chunk, `@#/\_`) || point >= 0 && point+1 < n) {
			from, to := trimChunk(text, at, at+n)
			if reason := addressReason(text[from:to]); reason != "" {
				found = append(found, reasoned{extent{from, to}, reason})
			}
		}
		at += n
		_, size := utf8.DecodeRuneInString(text[at:])
		at += size
	}
	return found
}

// comparison compares the quick ways with the slow one, on text after text.
type comparison struct{ quick splitter }

// agrees asserts that both give the same words, with spans, settings, traits and
// faults, and pass the same over.
func (c *comparison) agrees(t *testing.T, text string) {
	t.Helper()
	for _, base := range []Setting{Narration, Heading} {
		got, skipped := c.quick.split(text, base, nil, nil)
		if want := addressesSlowly(text); !slices.Equal(want, skipped) {
			require.Equal(t, want, skipped, "%q", text)
		}
		if want := splitSlowly(text, base, nil); !slices.Equal(want, got) {
			require.Equal(t, want, got, "%q", text)
		}
	}
}

func TestQuickSplitsAgreeWithTheSlowOneOnBreakTests(t *testing.T) {
	var c comparison
	for _, segments := range breakTest(t, "testdata/WordBreakTest.txt", "WordBreakTest-15.0.0.txt") {
		text := strings.Join(segments, "")
		c.agrees(t, text)
		c.agrees(t, "It’s "+text+" well-known.")
	}
}

func TestQuickSplitsAgreeWithTheSlowOneOnAManuscript(t *testing.T) {
	var c comparison
	data, err := os.ReadFile("../../testdata/demo/manuscript.md")
	require.NoError(t, err)
	words := 0
	for _, format := range []string{"text", "markdown"} {
		doc, err := Read("manuscript.md", data, Options{Format: format})
		require.NoError(t, err)
		for _, p := range doc.Paragraphs {
			c.agrees(t, p.Text)
			words += len(p.Words)
		}
	}
	assert.Greater(t, words, 2000)
	c.agrees(t, string(data))
}

// pool is what random texts are made of: prose, its signs, and what is seldom in it.
var pool = []string{
	"the", "harbour", "pilots", "’", "'", "‘", "“", "”", "\"", " ", " ", " ", " ", " ", "  ", "\n", "-", "-", "—", "–", "…", ".", ".", ",", ":", ";",
	"!", "?", "I", "J", "U.S", "a.m.", "Mr.", "No", "7", "1920", "s", "nd", "2th", "l9", "hel1o", "xiv", "XIV", "tis", "o", "n", "and", "or", "nothin",
	"é", "Éire", "naïve", "ﬁ", "e\u0301", "\u0301", "\u00AD", "\u200D", "\u2060", "\uFEFF", "\u00A0", "\u2003", "×", "÷", "½", "£", "+", "−", "(", ")", "[", "]",
	"_", "__", "*", "@pell", "#mole", "/", "\\", "www.", "quay.com", "a_b", "\r", "\r\n", "\t", "\v", "Ω", "א", "ב\"", "港口", "カ", "🇫🇷", "🇩", "👩\u200D🚀", "ʼ", "•", "\u2027",
	"McKay", "QUAY", "supercalifragilistic", "abcdefg", "abcdefgh", "abcdefghi", "zzzzzzzzzzzzzzzz", "{", "`", "|", "~", "^",
}

func TestQuickSplitsAgreeWithTheSlowOneOnRandomText(t *testing.T) {
	var c comparison
	r := rand.New(rand.NewPCG(7, 9))
	plain := func() string { return string(rune(r.IntN(0x7F) + 1)) }
	for range 20_000 {
		var b strings.Builder
		ascii := r.IntN(4) == 0
		for range 1 + r.IntN(24) {
			switch {
			case ascii:
				b.WriteString(plain())
			default:
				b.WriteString(pool[r.IntN(len(pool))])
			}
		}
		c.agrees(t, b.String())
	}
}

func TestItalicsAreTakenAlikeBothWays(t *testing.T) {
	text, italics := "she read the Mole Gazette’s page again", []extent{{13, 27}, {33, 38}}
	var s splitter
	got, _ := s.split(text, Narration, italics, nil)
	assert.Equal(t, splitSlowly(text, Narration, italics), got)
	assert.Equal(t, Italics, got[3].Setting)
}

func TestSmallRunEndsAtTheFirstOtherByte(t *testing.T) {
	for length := range 20 {
		letters := strings.Repeat("az", 10)[:length]
		assert.Equal(t, length, smallRun(letters, 0), "at the end of the text")
		for c := range 256 {
			text := letters + string([]byte{byte(c)}) + "abcdefgh"
			want := length
			if 'a' <= c && c <= 'z' {
				want = len(text)
			}
			assert.Equal(t, want, smallRun(text, 0), "%d letters before byte %#x", length, c)
		}
	}
}

// FuzzSplit compares the quick ways with the slow one on any text.
func FuzzSplit(f *testing.F) {
	for _, s := range append(seeds(), pool...) {
		f.Add(s)
		f.Add("It’s " + s + " don't—well")
	}
	var c comparison
	f.Fuzz(func(t *testing.T, text string) {
		if utf8.ValidString(text) { // as all that is decoded is
			c.agrees(t, text)
			require.Equal(t, countSlowly(text), maps.Collect(CountSegments(text).All))
		}
	})
}
