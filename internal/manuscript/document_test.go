package manuscript

import (
	"crypto/sha256"
	"io/fs"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/rivo/uniseg"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"golang.org/x/text/encoding"
	"golang.org/x/text/encoding/charmap"
	"golang.org/x/text/encoding/japanese"
	"golang.org/x/text/encoding/simplifiedchinese"
	"golang.org/x/text/encoding/traditionalchinese"
	"golang.org/x/text/encoding/unicode"
)

// encoded returns text as a file holds it.
func encoded(t testing.TB, e encoding.Encoding, text string) []byte {
	t.Helper()
	out, err := e.NewEncoder().Bytes([]byte(text))
	require.NoError(t, err)
	return out
}

func TestFilesThatCannotBeRead(t *testing.T) {
	dir := t.TempDir()
	for _, test := range []struct {
		name, data, want string
		opt              Options
	}{
		{"empty.md", "", "empty file; nothing to review", Options{}},
		{"latin.md", "caf\xe9", "byte 3: not valid UTF-8; name its encoding with --encoding, for instance --encoding windows-1252", Options{}},
		{"mark.md", "\xEF\xBB\xBFab\xff", "byte 5: not valid UTF-8; name its encoding with --encoding, for instance --encoding windows-1252", Options{}},
		{"binary", "ab\x00\x01", "byte 2: a zero byte, so this is no text; save the manuscript as plain text or Markdown", Options{}},
		{"wide.txt", "a\x00b\x00c\x00d\x00", "byte 1: a zero byte; this looks like UTF-16 without a byte-order mark, so add --encoding utf-16le", Options{}},
		{"wide.txt", "\x00a\x00b\x00c\x00d", "byte 0: a zero byte; this looks like UTF-16 without a byte-order mark, so add --encoding utf-16be", Options{}},
		{"odd.txt", "\xFF\xFEa\x00b", "byte 4: not valid UTF-16, the last byte stands alone; restore the file", Options{}},
		{"half.txt", "\xFF\xFEa\x00\x00\xD8", "byte 4: not valid UTF-16, half of a pair stands alone; restore the file", Options{}},
		{"zero.txt", "\xFF\xFEa\x00\x00\x00", "byte 4: a zero character, so this is no text; save the manuscript as plain text or Markdown", Options{}},
		{"m.docx", "PK\x03\x04abc", "a word processor's or other zipped file, which is not read; save the manuscript as plain text or Markdown", Options{}},
		{"m.rtf", "{\\rtf1 a}", "a rich-text file, which is not read; save the manuscript as plain text or Markdown", Options{}},
		{"m.txt", "a", `no encoding is called "latin-nine"; use a label of the WHATWG Encoding Standard, for instance windows-1252`, Options{Encoding: "latin-nine"}},
		{"m.txt", "a", "encoding iso-2022-jp cannot be emended letter by letter; convert the file to UTF-8", Options{Encoding: "iso-2022-jp"}},
		{"m.txt", "a\xff", "byte 1: not valid shift_jis; name the file's encoding with --encoding, for instance --encoding utf-8", Options{Encoding: "shift_jis"}},
		{"m.txt", "a", `no format is called "docx"; use text or markdown`, Options{Format: "docx"}},
	} {
		path := filepath.Join(dir, test.name)
		require.NoError(t, os.WriteFile(path, []byte(test.data), 0o600))
		_, err := Open(path, test.opt)
		assert.EqualError(t, err, path+": "+test.want)
	}
	_, err := Open(dir, Options{})
	assert.EqualError(t, err, dir+": a directory; name the manuscript's file")
	missing := filepath.Join(dir, "missing.md")
	_, err = Open(missing, Options{})
	assert.EqualError(t, err, missing+": no such file or directory")
	assert.ErrorIs(t, err, fs.ErrNotExist)
}

func TestFilesWithoutProseAreDocuments(t *testing.T) {
	for _, source := range []string{"\n", "\xEF\xBB\xBF", "\xFF\xFE", "***\n", "<!-- a -->", "```\na\n```"} {
		d, err := Read("m.md", []byte(source), Options{})
		require.NoError(t, err, "%q", source)
		assert.Empty(t, d.Paragraphs, "%q", source)
		line, column := d.Position(0)
		assert.Equal(t, [2]int{1, 1}, [2]int{line, column})
		out, err := d.Emend(nil)
		require.NoError(t, err)
		assert.Equal(t, source, string(out))
	}
}

// wide is UTF-16 with a byte-order mark.
func wide(order unicode.Endianness) encoding.Encoding {
	return unicode.UTF16(order, unicode.UseBOM)
}

// Each letter's span, cut out of the file and decoded, is the letter.
func TestLettersKeepTheirBytesInEveryEncoding(t *testing.T) {
	for _, test := range []struct {
		label, want string
		e           encoding.Encoding
		text        string
	}{
		{"", "utf-8", encoding.Nop, "The café—“Sallow” 𝔞 e\u0301nd."},
		{"", "utf-8", unicode.UTF8BOM, "The café—“Sallow” end."},
		{"", "utf-16le", wide(unicode.LittleEndian), "The café—“Sallow” 𝔞 end."},
		{"", "utf-16be", wide(unicode.BigEndian), "The café—“Sallow” 𝔞 end."},
		{"utf-16le", "utf-16le", unicode.UTF16(unicode.LittleEndian, unicode.IgnoreBOM), "The café 𝔞 end."},
		{"windows-1252", "windows-1252", charmap.Windows1252, "The café—“Sallow” end."},
		{"latin1", "windows-1252", charmap.Windows1252, "The café end."},
		{"koi8-r", "koi8-r", charmap.KOI8R, "Гавань у моря."},
		{"shift_jis", "shift_jis", japanese.ShiftJIS, "港のabcカ。"},
		{"gb18030", "gb18030", simplifiedchinese.GB18030, "港口 abc 𝔞。"},
		{"big5", "big5", traditionalchinese.Big5, "港口 abc。"},
	} {
		t.Run(test.label+" "+test.want, func(t *testing.T) {
			data := encoded(t, test.e, test.text)
			d, err := Read("m.txt", data, Options{Encoding: test.label})
			require.NoError(t, err)
			assert.Equal(t, test.want, d.Encoding)
			assert.Equal(t, sha256.Sum256(data), d.SHA256)
			require.Len(t, d.Paragraphs, 1)
			assert.Equal(t, test.text, d.Paragraphs[0].Text)
			decoder := test.e
			if test.want[:3] == "utf" && test.want != "utf-8" {
				order := map[string]unicode.Endianness{"utf-16le": unicode.LittleEndian, "utf-16be": unicode.BigEndian}[test.want]
				decoder = unicode.UTF16(order, unicode.IgnoreBOM)
			} else if test.want == "utf-8" {
				decoder = encoding.Nop
			}
			letters := d.Letters(0, 0, len(test.text))
			at := letters[0].Span.Start
			for _, l := range letters {
				assert.Equal(t, at, l.Span.Start)
				at = l.Span.End
				got, err := decoder.NewDecoder().Bytes(data[l.Span.Start:l.Span.End])
				require.NoError(t, err)
				assert.Equal(t, l.Text, composed(string(got)))
			}
			assert.Equal(t, len(data), at)
		})
	}
}

func TestLetters(t *testing.T) {
	source := "har*b*our caf&eacute; \\* e\u0301 &fjlig;ord har-\n> bour so\u00ADft"
	d, err := Read("m.md", []byte("> "+source), Options{})
	require.NoError(t, err)
	p := d.Paragraphs[0]
	var got []string
	last := 0
	for _, l := range d.Letters(0, 0, len(p.Text)) {
		assert.GreaterOrEqual(t, l.Span.Start, last)
		last = l.Span.End
		text := l.Text
		if l.Mark {
			text = "mark"
		}
		if raw := ("> " + source)[l.Span.Start:l.Span.End]; raw != l.Text {
			text += "<" + raw + ">"
		}
		got = append(got, text)
	}
	assert.Equal(t, "h a r b o u r   c a f é<&eacute;>   *<\\*>   é<e\u0301>   f<&fjlig;> j<> o r d   h a r mark mark<\n> > b o u r   s o mark f t",
		strings.ReplaceAll(strings.Join(got, " "), "mark<-\n", "mark mark<\n"))
	assert.Empty(t, d.Letters(0, 5, 2))
	assert.Empty(t, d.Letters(1, 0, 1))
	assert.Empty(t, d.Letters(-1, 0, 1))
	assert.Len(t, d.Letters(0, -5, math.MaxInt), len(got))
}

// The column of a letter in a long line is its number among the line's grapheme
// clusters, as the general library counts them.
func TestPositionInALongLine(t *testing.T) {
	line := strings.Repeat("the caf\u00e9 e\u0301 ", 3*betweenPosts/14) + "end"
	d, err := Read("m.txt", []byte("first\n"+line+"\nlast\n"), Options{})
	require.NoError(t, err)
	require.NotEmpty(t, d.posts)
	offset, column := len("first\n"), 0
	for letters := uniseg.NewGraphemes(line); letters.Next(); {
		column++
		gotLine, gotColumn := d.Position(offset)
		require.Equal(t, [2]int{2, column}, [2]int{gotLine, gotColumn}, "byte %d", offset)
		offset += len(letters.Str())
	}
	gotLine, gotColumn := d.Position(offset + 1)
	assert.Equal(t, [2]int{3, 1}, [2]int{gotLine, gotColumn})
}

func TestPosition(t *testing.T) {
	utf16 := encoded(t, wide(unicode.LittleEndian), "é\nab")
	for _, test := range []struct {
		data                 string
		offset, line, column int
	}{
		{"ab\ncd", 0, 1, 1},
		{"ab\ncd", 2, 1, 3},
		{"ab\ncd", 3, 2, 1},
		{"ab\ncd", 5, 2, 3},
		{"ab\ncd", 99, 2, 3},
		{"ab\ncd", -1, 1, 1},
		{"ab\r\ncd", 3, 1, 3},
		{"ab\r\ncd", 4, 2, 1},
		{"ab\rcd", 4, 2, 2},
		{"e\u0301x", 3, 1, 2},
		{"éx", 1, 1, 1},
		{"\xEF\xBB\xBFab", 4, 1, 2},
		{"\xEF\xBB\xBFab", 0, 1, 1},
		{"ab\n", 3, 2, 1},
		{string(utf16), 2, 1, 1},
		{string(utf16), 8, 2, 2},
	} {
		d, err := Read("m.txt", []byte(test.data), Options{})
		require.NoError(t, err)
		line, column := d.Position(test.offset)
		assert.Equal(t, [2]int{test.line, test.column}, [2]int{line, column}, "%q at %d", test.data, test.offset)
	}
	line, column := new(Document).Position(3)
	assert.Equal(t, [2]int{1, 1}, [2]int{line, column})
}
