package manuscript

import (
	"slices"
	"sort"
	"strings"
	"unicode"
	"unicode/utf8"

	"github.com/rivo/uniseg"
	"golang.org/x/text/unicode/norm"
)

// Letter is one user-perceived character of a paragraph (an extended grapheme
// cluster of UAX #29) and where it comes from.
type Letter struct {
	Text string // NFC; a typographic ligature such as ﬁ stays one letter
	Span Span   // its bytes in the file; without those of a character reference that stands for the letter before it too
	Mark bool   // stands in the word but is no letter of its form: soft hyphen, line-end hyphen and the break
}

// Letters returns the letters of bytes [start,end) of a paragraph's Text, in
// order. A range that does not lie in the Text is cut to it; a paragraph that
// does not exist has none.
//
// Joined without the marks they read as the Text of a word, but for the hyphen
// at a line end, which the Text of a broken word keeps. It takes O(end−start)
// time and a binary search.
func (d *Document) Letters(paragraph, start, end int) []Letter {
	if paragraph < 0 || paragraph >= len(d.Paragraphs) {
		return nil
	}
	start, end = max(start, 0), min(end, len(d.Paragraphs[paragraph].Text))
	letters := make([]Letter, 0, max(end-start, 0))
	d.eachLetter(paragraph, start, end, func(l Letter, _ extent) { letters = append(letters, l) })
	return letters
}

// eachLetter calls yield with each letter and its bytes of the paragraph's Text,
// in which the range must lie.
func (d *Document) eachLetter(paragraph, start, end int, yield func(Letter, extent)) {
	p := &d.Paragraphs[paragraph]
	for begin := start; start < end; {
		n := letterLength(p.Text[start:end])
		from, to := p.sourceSpan(start, start+n)
		if start > begin && p.shared(start) {
			from = int(p.pieces[p.pieceAt(start)].end)
		}
		text := p.Text[start : start+n]
		letter := Letter{
			Text: composed(text),
			Span: d.source.fileSpan(from, max(from, to)),
			Mark: isFormatting(text) || isLineEnd(p.Text, start, end),
		}
		yield(letter, extent{start, start + n})
		start += n
	}
}

// letterLength returns the length in bytes of the first letter of text.
func letterLength(text string) int {
	if len(text) > 1 && text[0] < utf8.RuneSelf && text[1] < utf8.RuneSelf && text[0] != '\r' {
		return 1
	}
	cluster, _, _, _ := uniseg.FirstGraphemeClusterInString(text, -1)
	return max(len(cluster), 1)
}

// composed returns text in NFC, itself where it is so already.
func composed(text string) string {
	if norm.NFC.IsNormalString(text) {
		return text
	}
	return norm.NFC.String(text)
}

// reads returns a word as it reads: in NFC, without line breaks and without
// characters that only say where it may break. Most words are so already.
func reads(raw string) string {
	plain := true
	for i := range len(raw) {
		plain = plain && raw[i] < utf8.RuneSelf && raw[i] != '\n'
	}
	if plain {
		return raw
	}
	if strings.ContainsAny(raw, "\n\u00AD\u2060\uFEFF") {
		raw = strings.NewReplacer("\n", "", "\u00AD", "", "\u2060", "", "\uFEFF", "").Replace(raw)
	}
	return composed(raw)
}

// isFormatting tells the characters that say where a word may break: soft
// hyphen, word joiner and zero width no-break space.
func isFormatting(text string) bool {
	return text == "\u00AD" || text == "\u2060" || text == "\uFEFF"
}

// isLineEnd reports whether the letter at byte i of text, within [0,end), is
// the hyphen or the line break of a word broken at a line end.
func isLineEnd(text string, i, end int) bool {
	r, n := utf8.DecodeRuneInString(text[i:])
	switch {
	case r == '\n':
		before, _ := utf8.DecodeLastRuneInString(text[:i])
		return (isHyphen(before) || before == '\u00AD') && startsWithLetter(text[i+1:end])
	case isHyphen(r) && i > 0 && i+n < end && text[i+n] == '\n':
		before, _ := utf8.DecodeLastRuneInString(text[:i])
		return (unicode.IsLetter(before) || unicode.IsMark(before)) && startsWithLetter(text[i+n+1:end])
	}
	return false
}

func startsWithLetter(text string) bool {
	r, _ := utf8.DecodeRuneInString(text)
	return unicode.IsLetter(r)
}

// isHyphen tells the hyphens that join a word: hyphen-minus, hyphen and
// non-breaking hyphen; not the dashes.
func isHyphen(r rune) bool { return r == '-' || r == '\u2010' || r == '\u2011' }

// pieceAt returns the index of the piece that holds byte at of the text.
func (p *Paragraph) pieceAt(at int) int {
	i := sort.Search(len(p.pieces), func(i int) bool { return int(p.pieces[i].text) > at })
	return max(i-1, 0)
}

// shared reports whether byte at of the text comes from the same character
// reference as the byte before it.
func (p *Paragraph) shared(at int) bool {
	if at <= 0 || at >= len(p.Text) {
		return false
	}
	i := p.pieceAt(at)
	return p.pieces[i].atom && int(p.pieces[i].text) < at
}

// sourceSpan returns the bytes of the file's text that [start,end) of the
// paragraph's text comes from, marks between them included.
func (p *Paragraph) sourceSpan(start, end int) (from, to int) {
	if len(p.pieces) == 0 {
		return 0, 0
	}
	first := p.pieces[p.pieceAt(start)]
	from = int(first.start)
	if !first.atom {
		from += start - int(first.text)
	}
	if end <= start {
		return from, from
	}
	last := p.pieces[p.pieceAt(end-1)]
	to = int(last.end)
	if !last.atom {
		to = int(last.start) + end - int(last.text)
	}
	return from, to
}

// Position returns the line and column, from 1, of a byte of the file; the
// column in letters. Lines end at LF, CR LF or CR. A byte inside a letter has
// the letter's column; one past the end, the column after the last letter. It
// takes time linear in the length of the line, but no longer than some thousands
// of letters do.
func (d *Document) Position(offset int) (line, column int) {
	if d.source == nil {
		return 1, 1
	}
	at := 0
	if offset >= len(d.data) {
		at = len(d.source.text)
	} else if offset > 0 {
		at = d.source.textOffset(offset)
	}
	i := d.lineOf(at)
	start, column := int(d.lines[i]), 1
	if k := sort.Search(len(d.posts), func(k int) bool { return int(d.posts[k].at) > at }) - 1; k >= 0 && int(d.posts[k].at) > start {
		start, column = int(d.posts[k].at), int(d.posts[k].column)
	}
	rest := strings.TrimRight(d.source.text[start:d.lineEnd(i)], "\r\n")
	for len(rest) > 0 {
		n := letterLength(rest)
		if start+n > at {
			return i + 1, column
		}
		start, rest = start+n, rest[n:]
		column++
	}
	return i + 1, column
}

// post tells the column of a byte of source.text where a letter starts, so that
// columns of long lines need not be counted from the line's start.
type post struct{ at, column int32 }

// betweenPosts is how many bytes a line may have without a post.
const betweenPosts = 4096

// setPosts sets posts in all long lines. O(their length).
func (d *Document) setPosts() []post {
	var posts []post
	for i, start := range d.lines {
		end := d.lineEnd(i)
		if end-int(start) <= betweenPosts {
			continue
		}
		at, column, last := int(start), int32(1), int(start)
		for at < end {
			if at-last >= betweenPosts {
				posts = append(posts, post{int32(at), column})
				last = at
			}
			at += letterLength(d.source.text[at:end])
			column++
		}
	}
	return posts
}

// lineOf returns the index of the line that holds byte at of the file's text.
func (d *Document) lineOf(at int) int {
	return sort.Search(len(d.lines), func(i int) bool { return int(d.lines[i]) > at }) - 1
}

func (d *Document) lineEnd(line int) int {
	if line+1 < len(d.lines) {
		return int(d.lines[line+1])
	}
	return len(d.source.text)
}

// lineStarts returns where the lines of text start.
func lineStarts(text string) []int32 {
	starts := []int32{0}
	for i := 0; i < len(text); i++ {
		if text[i] == '\n' || text[i] == '\r' && (i+1 == len(text) || text[i+1] != '\n') {
			starts = append(starts, int32(i+1))
		}
	}
	return starts
}

// passages turns what was passed over into the document's terms, in order.
func (d *Document) passages(passed []passage) []Passed {
	slices.SortStableFunc(passed, func(a, b passage) int { return a.start - b.start })
	out := make([]Passed, 0, len(passed))
	for _, p := range passed {
		out = append(out, Passed{p.reason, d.source.text[p.start:p.end], d.source.fileSpan(p.start, p.end)})
	}
	return out
}
