package shelf

import (
	"bytes"
	"fmt"
	"strings"
	"unicode"
	"unicode/utf8"

	"golang.org/x/text/unicode/norm"
)

// heading opens a list that Put creates.
const heading = "# one word a line; then a tab and its kind, a tab and a note\n"

// byteOrderMark may open a list that another program wrote.
const byteOrderMark = "\ufeff"

// format returns the line for word, without a line end, in NFC. A word that would
// not read back as that word is refused: one without a letter, with a space, an
// arrow or a character that cannot be seen in it, one that is not UTF-8 or that
// begins with #. In kind and note what is not printable becomes a space, and in
// kind # does too: there it would start a comment.
func format(word, kind, note string) (string, error) {
	switch {
	case word == "":
		return "", fmt.Errorf("an empty word cannot go on a list")
	case !utf8.ValidString(word):
		return "", fmt.Errorf("%.60q cannot go on a list: it is not UTF-8", word)
	case strings.HasPrefix(word, "#"):
		return "", fmt.Errorf("%.60q cannot go on a list: # starts a comment", word)
	case strings.Contains(word, "→"), strings.Contains(word, "->"):
		return "", fmt.Errorf("%.60q cannot go on a list: an arrow bars a word", word)
	case strings.ContainsFunc(word, func(r rune) bool { return unicode.IsSpace(r) || !visible(r) }):
		return "", fmt.Errorf("%.60q cannot go on a list: it has a space or a character that cannot be seen in it", word)
	case !strings.ContainsFunc(word, func(r rune) bool { return unicode.IsLetter(r) || unicode.IsNumber(r) }):
		return "", fmt.Errorf("%.60q cannot go on a list: it has no letter", word)
	}
	line := norm.NFC.String(word)
	kind, note = clean(strings.ReplaceAll(kind, "#", " ")), clean(note)
	if kind != "" || note != "" {
		line += "\t" + kind
	}
	if note != "" {
		line += "\t" + note
	}
	return line, nil
}

// clean makes s fit for a column: one line of printable text in NFC, words one
// space apart.
func clean(s string) string {
	s = strings.Map(func(r rune) rune {
		if !unicode.IsPrint(r) {
			return ' '
		}
		return r
	}, strings.ToValidUTF8(s, "\ufffd"))
	return norm.NFC.String(strings.Join(strings.Fields(s), " "))
}

// visible reports whether r can be seen, or is one of the two joiners that some
// scripts spell with.
func visible(r rune) bool {
	return unicode.IsGraphic(r) || r == '\u200c' || r == '\u200d'
}

// wordOf returns the word that a line of a list is about, "" for none.
func wordOf(line []byte) string {
	s := strings.TrimPrefix(string(body(line)), byteOrderMark)
	if strings.HasPrefix(strings.TrimSpace(s), "#") {
		return ""
	}
	s, _, _ = strings.Cut(s, "\t")
	s, _, _ = strings.Cut(s, " #")
	for _, arrow := range []string{"→", "->"} {
		s, _, _ = strings.Cut(s, arrow)
	}
	return norm.NFC.String(strings.TrimSpace(s))
}

// body returns line without its line end.
func body(line []byte) []byte { return bytes.TrimRight(line, "\r\n") }

// put returns text with line in it: in place of the last line about the same word,
// or at the end. All other lines stay as they are, and so does the way that lines
// end.
func put(text []byte, line string) []byte {
	end := "\n"
	if first, _, ok := bytes.Cut(text, []byte("\n")); ok && bytes.HasSuffix(first, []byte("\r")) {
		end = "\r\n"
	}
	lines := split(text)
	if i := last(lines, func(l []byte) bool { return wordOf(l) == wordOf([]byte(line)) }); i >= 0 {
		start := ""
		if bytes.HasPrefix(lines[i], []byte(byteOrderMark)) {
			start = byteOrderMark
		}
		lines[i] = []byte(start + line + string(lines[i][len(body(lines[i])):]))
		return bytes.Join(lines, nil)
	}
	if len(text) == 0 {
		return []byte(heading + line + end)
	}
	if !bytes.HasSuffix(text, []byte("\n")) {
		line = end + line
	}
	return append(bytes.Clone(text), line+end...)
}

// take returns text without the last line that equals line.
func take(text []byte, line string) (rest []byte, did bool) {
	lines := split(text)
	i := last(lines, func(l []byte) bool {
		return strings.TrimPrefix(string(body(l)), byteOrderMark) == line
	})
	if i < 0 {
		return text, false
	}
	start := ""
	if bytes.HasPrefix(lines[i], []byte(byteOrderMark)) {
		start = byteOrderMark
	}
	lines[i] = []byte(start)
	return bytes.Join(lines, nil), true
}

func split(text []byte) [][]byte { return bytes.SplitAfter(text, []byte("\n")) }

// last returns the index of the last line that is so, or -1.
func last(lines [][]byte, is func([]byte) bool) int {
	for i := len(lines) - 1; i >= 0; i-- {
		if is(lines[i]) {
			return i
		}
	}
	return -1
}
