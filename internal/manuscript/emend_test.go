package manuscript

import (
	"bytes"
	"fmt"
	"runtime"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"golang.org/x/text/encoding"
	"golang.org/x/text/encoding/charmap"
	"golang.org/x/text/encoding/japanese"
	"golang.org/x/text/encoding/unicode"
)

// change returns the emendation that turns the first occurrence of a word into
// what is given letter by letter; a letter may be empty or hold several.
func change(t testing.TB, d *Document, word string, letters ...string) Emendation {
	t.Helper()
	for i, p := range d.Paragraphs {
		for _, w := range p.Words {
			if w.Text == word {
				return Emendation{i, w.Start, w.End, letters}
			}
		}
	}
	require.Fail(t, "no such word", word)
	return Emendation{}
}

// split makes one element of each letter.
func split(word string) []string { return strings.Split(word, "") }

// In every sample the word harber (or what stands in its place) is emended, and
// the file is compared whole: the expected file differs in the letters alone.
func TestEmendLeavesEveryOtherByteAlone(t *testing.T) {
	harbour := []string{"h", "a", "r", "b", "ou", "r"}
	koi := charmap.KOI8R
	for _, test := range []struct {
		name, path   string
		opt          Options
		e            encoding.Encoding
		source, word string
		letters      []string
		want         string
	}{
		{name: "LF", path: "m.txt", source: "The harber\nis full.\n\n\nEnd.\n", want: "The harbour\nis full.\n\n\nEnd.\n"},
		{name: "no final newline", path: "m.md", source: "The harber", want: "The harbour"},
		{name: "CR LF", path: "m.txt", source: "A\r\nharber \r\n\r\nB\r\n", want: "A\r\nharbour \r\n\r\nB\r\n"},
		{name: "CR LF in Markdown", path: "m.md", source: "# A\r\n\r\nx\r\nharber  \r\nB\r\n", want: "# A\r\n\r\nx\r\nharbour  \r\nB\r\n"},
		{name: "CR", path: "m.txt", source: "A\rharber\r\rB\r", want: "A\rharbour\r\rB\r"},
		{name: "CR in Markdown", path: "m.md", source: "# A\r\rharber\rB\r", want: "# A\r\rharbour\rB\r"},
		{name: "mixed line ends", path: "m.md", source: "A\rB\r\nharber\nB\n\r", want: "A\rB\r\nharbour\nB\n\r"},
		{name: "byte-order mark", path: "m.md", e: unicode.UTF8BOM, source: "harber — é\n", want: "harbour — é\n"},
		{name: "UTF-16LE", path: "m.md", e: wide(unicode.LittleEndian), source: "“𝔞 harber”\r\né", want: "“𝔞 harbour”\r\né"},
		{name: "UTF-16BE", path: "m.txt", e: wide(unicode.BigEndian), source: "“𝔞 harber”\r\né", want: "“𝔞 harbour”\r\né"},
		{name: "windows-1252", path: "m.md", opt: Options{Encoding: "windows-1252"}, e: charmap.Windows1252, source: "“é harber” …\r\n", want: "“é harbour” …\r\n"},
		{name: "latin-1", path: "m.txt", opt: Options{Encoding: "iso-8859-1"}, e: charmap.ISO8859_1, source: "é cafe è", word: "cafe", letters: []string{"c", "a", "f", "é"}, want: "é café è"},
		{name: "KOI8-R", path: "m.txt", opt: Options{Encoding: "koi8-r"}, e: koi, source: "У гавни тихо.\n", word: "гавни", letters: []string{"г", "а", "ва", "н", "и"}, want: "У гавани тихо.\n"},
		{name: "Shift JIS", path: "m.txt", opt: Options{Encoding: "shift_jis"}, e: japanese.ShiftJIS, source: "港 harber 港。", want: "港 harbour 港。"},
		{name: "windows-1258 has the letter decomposed", path: "m.txt", opt: Options{Encoding: "windows-1258"}, e: charmap.Windows1258, source: "a viet a", word: "viet",
			letters: []string{"v", "i", "e\u0323", "t"}, want: "a vie\u0323t a"},
		{name: "escapes and references stay", path: "m.md", source: `x\*y&eacute;harber\!` + "\n", word: "yéharber", letters: append([]string{"y", "é"}, harbour...), want: `x\*y&eacute;harbour\!` + "\n"},
		{name: "a letter joins a reference", path: "m.md", source: "caf&eacute;", word: "café", letters: []string{"c", "a", "f", "és"}, want: "caf&eacute;s"},
		{name: "a letter joins a reference before it", path: "m.md", source: "caf&eacute;", word: "café", letters: []string{"c", "a", "f", "fé"}, want: "caff&eacute;"},
		{name: "a reference is replaced", path: "m.md", source: "caf&#233;s", word: "cafés", letters: split("cafes"), want: "cafes"},
		{name: "a decomposed letter stays", path: "m.txt", source: "cafe\u0301 e\u0301harber", word: "éharber", letters: append([]string{"é"}, harbour...), want: "cafe\u0301 e\u0301harbour"},
		{name: "a decomposed letter goes", path: "m.txt", source: "cafe\u0301s", word: "cafés", letters: split("cafes"), want: "cafes"},
		{name: "a reference for two letters", path: "m.md", source: "a &fjlig;ord", word: "fjord", letters: []string{"f", "i", "o", "r", "d"}, want: "a fiord"},
		{name: "a reference for two letters stays", path: "m.md", source: "a &fjlig;ord", word: "fjord", letters: []string{"f", "j", "o", "r", "ds"}, want: "a &fjlig;ords"},
		{name: "emphasis inside", path: "m.md", source: "the har*ber* b", want: "the har*bour* b"},
		{name: "emphasis around", path: "m.md", source: "the **_harber_** b", want: "the **_harbour_** b"},
		{name: "italics in plain text", path: "m.txt", source: "the _harber_ b", want: "the _harbour_ b"},
		{name: "a tag inside", path: "m.md", source: "har<b>ber</b>", want: "har<b>bour</b>"},
		{name: "soft hyphen", path: "m.txt", source: "har\u00ADber", letters: []string{"h", "a", "r", "\u00AD", "b", "ou", "r"}, word: "harber", want: "har\u00ADbour"},
		{name: "soft hyphen dropped", path: "m.txt", source: "har\u00ADber", letters: []string{"h", "a", "r", "", "b", "ou", "r"}, word: "harber", want: "harbour"},
		{name: "broken", path: "m.txt", source: "the har-\r\n  ber is", word: "har-ber", letters: []string{"h", "a", "r", "-", "\n", "b", "ou", "r"}, want: "the har-\r\n  bour is"},
		{name: "broken in a quotation", path: "m.md", source: "> > the har-\n> ber is\n", word: "har-ber", letters: []string{"h", "a", "r", "-", "\n", "b", "ou", "r"}, want: "> > the har-\n> bour is\n"},
		{name: "broken in a lazy line", path: "m.md", source: "> - the har-\nber is\n", word: "har-ber", letters: []string{"h", "a", "r", "-", "\n", "b", "ou", "r"}, want: "> - the har-\nbour is\n"},
		{name: "the break dropped", path: "m.md", source: "> the har-\n> ber is\n", word: "har-ber", letters: []string{"h", "a", "r", "", "", "b", "ou", "r"}, want: "> the harbour is\n"},
		{name: "table", path: "m.md", source: "|a|harber |\n|-|:-:|\n| x\\|y | `b|` |\n", want: "|a|harbour |\n|-|:-:|\n| x\\|y | `b|` |\n"},
		{name: "a bar in a table", path: "m.md", source: "|ab|c|\n|-|-|\n", word: "ab", letters: []string{"a|", "b"}, want: "|a\\|b|c|\n|-|-|\n"},
		{name: "footnote", path: "m.md", source: "a[^1]\n\n[^1]: the\n    harber\n", want: "a[^1]\n\n[^1]: the\n    harbour\n"},
		{name: "list", path: "m.md", source: "1. a\n   - b\n\n\t c harber\n", want: "1. a\n   - b\n\n\t c harbour\n"},
		{name: "setext heading", path: "m.md", source: "The harber\n===\n\na\n", want: "The harbour\n===\n\na\n"},
		{name: "ATX heading", path: "m.md", source: "## The harber ##\na", want: "## The harbour ##\na"},
		{name: "link", path: "m.md", source: "[the harber](harber.md 'harber')\n\n[harber]: harber \"harber\"\n", want: "[the harbour](harber.md 'harber')\n\n[harber]: harber \"harber\"\n"},
		{name: "image", path: "m.md", source: "![the harber](harber.png)", want: "![the harbour](harber.png)"},
		{name: "HTML, code and front matter", path: "m.md", source: "---\ntitle: harber\n---\n<p>harber</p>\n\n`harber` <!-- harber --> harber\n\n    harber\n", want: "---\ntitle: harber\n---\n<p>harber</p>\n\n`harber` <!-- harber --> harbour\n\n    harber\n"},
		{name: "definition", path: "m.md", source: "mole\n: in the harber\n", want: "mole\n: in the harbour\n"},
		{name: "markup is escaped", path: "m.md", source: "a harber b", letters: []string{"h", "*a*", "[r](x)", "_b_", "<e>&amp;", "`r`\\"}, want: "a h\\*a\\*\\[r\\](x)\\_b\\_\\<e\\>\\&amp;\\`r\\`\\\\ b"},
		{name: "a heading mark is escaped", path: "m.md", source: "a\nharber b", letters: []string{"# h", "a", "r", "b", "e", "r"}, want: "a\n\\# harber b"},
		{name: "a list marker is escaped", path: "m.md", source: "harber b", letters: []string{"1. h", "a", "r", "b", "e", "r"}, want: "1\\. harber b"},
		{name: "apostrophe and hyphen stay plain", path: "m.md", source: "a harbermaster", word: "harbermaster", letters: []string{"h", "a", "r", "b", "ou", "r’s-", "m", "a", "s", "t", "e", "r"}, want: "a harbour’s-master"},
		{name: "a word deleted", path: "m.txt", source: "a harber b", letters: []string{"", "", "", "", "", ""}, want: "a  b"},
	} {
		t.Run(test.name, func(t *testing.T) {
			e := test.e
			if e == nil {
				e = encoding.Nop
			}
			word, letters := test.word, test.letters
			if word == "" {
				word = "harber"
			}
			if letters == nil {
				letters = harbour
			}
			data := encoded(t, e, test.source)
			original := bytes.Clone(data)
			d, err := Read(test.path, data, test.opt)
			require.NoError(t, err)
			same, err := d.Emend(nil)
			require.NoError(t, err)
			require.Equal(t, data, same)
			out, err := d.Emend([]Emendation{change(t, d, word, letters...)})
			require.NoError(t, err)
			assert.Equal(t, string(encoded(t, e, test.want)), string(out))
			assert.Equal(t, original, data, "the document's own bytes")
		})
	}
}

func TestEmendTakesManyInAnyOrder(t *testing.T) {
	d, err := Read("m.md", []byte("a b c\n\n- d e"), Options{})
	require.NoError(t, err)
	out, err := d.Emend([]Emendation{change(t, d, "e", "E"), change(t, d, "a", "A"), change(t, d, "c", ""), change(t, d, "d", "dd")})
	require.NoError(t, err)
	assert.Equal(t, "A b \n\n- dd E", string(out))
}

func TestEmendRefuses(t *testing.T) {
	word := func(w string, letters ...string) func(*Document) []Emendation {
		return func(d *Document) []Emendation { return []Emendation{change(t, d, w, letters...)} }
	}
	raw := func(e ...Emendation) func(*Document) []Emendation {
		return func(*Document) []Emendation { return e }
	}
	for _, test := range []struct {
		name, source string
		opt          Options
		emend        func(*Document) []Emendation
		want         string
	}{
		{"a letter that the encoding lacks", "x\ngdansk", Options{Encoding: "windows-1252"}, word("gdansk", "g", "d", "a", "ń", "s", "k"),
			`m.md: line 2, column 4: windows-1252 has no letter "ń"; choose another spelling or convert the file to UTF-8`},
		{"overlap", "abc", Options{}, raw(Emendation{0, 0, 2, []string{"x", "y"}}, Emendation{0, 1, 3, []string{"x", "y"}}),
			"m.md: line 1, column 2: two emendations overlap; undo one of them"},
		{"the same place twice", "abc", Options{}, raw(Emendation{0, 0, 3, split("abd")}, Emendation{0, 0, 3, split("abd")}),
			"m.md: line 1, column 1: two emendations overlap; undo one of them"},
		{"no such paragraph", "abc", Options{}, raw(Emendation{1, 0, 1, []string{"a"}}), "m.md: there is no paragraph 1; review the manuscript again"},
		{"a negative paragraph", "abc", Options{}, raw(Emendation{-1, 0, 1, []string{"a"}}), "m.md: there is no paragraph -1; review the manuscript again"},
		{"outside the text", "abc", Options{}, raw(Emendation{0, 1, 4, split("abc")}), "m.md: paragraph 0: bytes 1 to 4 are not in its text; review the manuscript again"},
		{"too few letters", "abc", Options{}, raw(Emendation{0, 0, 3, split("ab")}), "m.md: line 1, column 1: 2 letters for 3; review the manuscript again"},
		{"a line break", "abc", Options{}, word("abc", "a\n", "b", "c"), `m.md: line 1, column 1: '\n' cannot be written into the text; take it out`},
		{"not valid UTF-8", "abc", Options{}, word("abc", "\xff", "b", "c"), `m.md: line 1, column 1: '\ufffd' cannot be written into the text; take it out`},
		{"markup through a letter", "ae*\u0301b*", Options{}, word("aéb", "a", "e", "b"), `m.md: line 1, column 2: markup runs through the letter "é"; change it by hand`},
		{"half of a reference", "a &fjlig;ord", Options{}, raw(Emendation{0, 3, 4, []string{"i"}}),
			`m.md: line 1, column 3: the letter "j" shares a character reference with its neighbour; change it by hand`},
		{"the other half", "a &fjlig;ord", Options{}, raw(Emendation{0, 2, 3, []string{"i"}}),
			`m.md: line 1, column 3: the letter "f" shares a character reference with its neighbour; change it by hand`},
		{"italics in plain text have no escape", "a b", Options{Format: "text"}, word("b", "_b_"),
			"m.md: line 1, column 1: the emended paragraph would not read as intended, since a letter would become markup; change it by hand"},
		{"text that turns into a list", "l. a", Options{}, word("l", "1"),
			"m.md: line 1, column 1: the emended paragraph would not read as intended, since a letter would become markup; change it by hand"},
		{"a paragraph deleted", "abc\n\nd", Options{}, word("abc", "", "", ""),
			"m.md: line 1, column 1: the emended paragraph would not read as intended, since a letter would become markup; change it by hand"},
	} {
		d, err := Read("m.md", []byte(test.source), test.opt)
		require.NoError(t, err, test.name)
		_, err = d.Emend(test.emend(d))
		assert.EqualError(t, err, test.want, test.name)
	}
}

// invented returns words of invented prose with marks of all kinds among them.
func invented(words int) string {
	var b strings.Builder
	for i := range words {
		switch {
		case i > 0 && i%2000 == 0:
			fmt.Fprintf(&b, ".\n\n## Chapter %d\n\n", i/2000)
		case i > 0 && i%60 == 0:
			b.WriteString(".”\n\n“")
		case i > 0 && i%12 == 0:
			b.WriteString(",\n")
		case i > 0:
			b.WriteByte(' ')
		}
		b.WriteString([]string{"the", "pilot", "brought", "her", "*round*", "before", "dawn", "and", "had", "harbour’s", "mole", "two-masted", "café", "o’", "Sallow", "1,200"}[i*7%16])
	}
	return b.String() + ".\n"
}

func BenchmarkRead(b *testing.B) {
	data := []byte(invented(250_000))
	b.SetBytes(int64(len(data)))
	b.ReportAllocs()
	for b.Loop() {
		d, err := Read("m.md", data, Options{})
		require.NoError(b, err)
		require.Greater(b, len(d.Paragraphs), 4000)
	}
	var before, after runtime.MemStats
	runtime.GC()
	runtime.ReadMemStats(&before)
	d, err := Read("m.md", data, Options{})
	require.NoError(b, err)
	runtime.GC()
	runtime.ReadMemStats(&after)
	runtime.KeepAlive(d)
	kept := float64(after.HeapAlloc-before.HeapAlloc) / 1e6
	require.Less(b, kept, 40.0)
	b.ReportMetric(kept, "MB-kept")
}

func BenchmarkEmend(b *testing.B) {
	d, err := Read("m.md", []byte(invented(250_000)), Options{})
	require.NoError(b, err)
	var emendations []Emendation
	for i, p := range d.Paragraphs {
		for _, w := range p.Words {
			if w.Text == "pilot" {
				emendations = append(emendations, Emendation{i, w.Start, w.End, split("pilos")})
			}
		}
	}
	require.Greater(b, len(emendations), 10_000)
	for b.Loop() {
		out, err := d.Emend(emendations)
		require.NoError(b, err)
		require.NotContains(b, string(out), "pilot")
	}
}
