package manuscript

import (
	"path/filepath"
	"strings"
	"unicode"
	"unicode/utf8"
)

// textFormat reads plain text.
//
// Paragraphs are parted by blank lines, and by an indented line that follows a
// line without indent and not ending in a hyphen. Where more than half of the text stands in lines longer
// than unwrappedLine bytes, lines are not wrapped, and each is a paragraph.
// Space at either end of a line is no part of the paragraph's text. A paragraph
// of two lines or more that are all indented is a quotation. Paragraphs that
// hold neither letter nor digit, as a row of asterisks, are dropped.
//
// Underscores and asterisks around words are italics, and no part of the text.
// What is a heading stands at isTextHeading; every heading opens a part.
type textFormat struct{}

const (
	unwrappedLine = 160 // bytes; no wrapped line is as long
	indentSpaces  = 2   // spaces, or one tab, make an indent
)

func (textFormat) name() string { return "text" }

func (textFormat) recognise(path, _ string) int {
	switch strings.ToLower(filepath.Ext(path)) {
	case ".txt", ".text", ".asc":
		return 35
	}
	return 10
}

// write returns the letter itself: plain text has no escapes.
func (textFormat) write(letter, _, _ string, _ bool) string { return letter }

// textLine is a line without the space at its ends and without its line end.
type textLine struct {
	start, end int // of what stands on it
	next       int // where the next line starts
	indented   bool
}

func (l textLine) blank() bool { return l.start == l.end }

func (textFormat) read(text string) (reading, error) {
	var found reading
	unwrapped := isUnwrapped(text)
	var open []textLine
	blank := 2 // blank lines before the open paragraph; the file's start counts as two
	flush := func(followed bool) {
		if len(open) == 0 {
			return
		}
		heading := len(open) == 1 && followed && isTextHeading(text[open[0].start:open[0].end], blank)
		if b, ok := textBlock(text, open, heading); ok {
			found.blocks = append(found.blocks, b)
		}
		open, blank = open[:0], 0
	}
	for at := 0; at < len(text); {
		l := lineAt(text, at)
		at = l.next
		switch {
		case l.blank():
			flush(true)
			blank++
			continue
		case len(open) > 0 && (unwrapped || l.indented && !open[len(open)-1].indented && !endsInHyphen(text, open[len(open)-1])):
			flush(false)
		}
		open = append(open, l)
	}
	flush(true)
	return found, nil
}

// endsInHyphen reports whether a line may end in the middle of a word.
func endsInHyphen(text string, l textLine) bool {
	r, _ := utf8.DecodeLastRuneInString(text[l.start:l.end])
	return isHyphen(r) || r == '\u00AD'
}

// isUnwrapped reports whether most of the text stands in long lines.
func isUnwrapped(text string) bool {
	long := 0
	for at := 0; at < len(text); {
		l := lineAt(text, at)
		if l.next-at > unwrappedLine {
			long += l.next - at
		}
		at = l.next
	}
	return long*2 > len(text)
}

// lineAt returns the line that starts at byte at.
func lineAt(text string, at int) textLine {
	end := len(text)
	next := end
	if i := strings.IndexAny(text[at:], "\r\n"); i >= 0 {
		end = at + i
		next = end + 1
		if text[end] == '\r' && next < len(text) && text[next] == '\n' {
			next++
		}
	}
	body := strings.TrimLeftFunc(text[at:end], unicode.IsSpace)
	start := end - len(body)
	indent := text[at:start]
	l := textLine{start: start, end: start + len(strings.TrimRightFunc(body, unicode.IsSpace)), next: next}
	l.indented = strings.ContainsAny(indent, "\t\u2003\u3000") || len(indent) >= indentSpaces
	return l
}

// textBlock makes a block of the lines of a paragraph; it reports false where
// they hold neither letter nor digit.
func textBlock(text string, lines []textLine, heading bool) (block, bool) {
	b := block{setting: Narration, opensPart: heading}
	indented := len(lines) > 1
	for _, l := range lines {
		indented = indented && l.indented
	}
	switch {
	case heading:
		b.setting = Heading
	case indented:
		b.setting = Quotation
	}
	start, end := lines[0].start, lines[len(lines)-1].end
	if strings.IndexFunc(text[start:end], isWordRune) < 0 {
		return b, false
	}
	marks := italicMarks(text[start:end])
	for i := range marks {
		marks[i] += start
	}
	opened := 0
	for i, l := range lines {
		if i > 0 {
			b.line(text, lines[i-1].end, l.start)
		}
		at := l.start
		for len(marks) > 0 && marks[0] < l.end {
			b.copy(text, at, marks[0])
			at = marks[0] + 1
			if opened++; opened%2 == 1 {
				b.italics = append(b.italics, extent{start: b.len()})
			} else {
				b.italics[len(b.italics)-1].end = b.len()
			}
			marks = marks[1:]
		}
		b.copy(text, at, l.end)
	}
	return b, true
}

func isWordRune(r rune) bool { return unicode.IsLetter(r) || unicode.IsNumber(r) }

// italicMarks returns where underscores and asterisks mark italics in a
// paragraph, opening and closing ones by turns. A mark opens after a space or
// punctuation and before a letter, digit or quote; it closes after anything but
// a space and before a space or punctuation; between the two stands no other
// mark of its kind. Double marks are none.
func italicMarks(text string) []int {
	if !strings.ContainsAny(text, "_*") {
		return nil
	}
	var marks []int
	open := -1
	for i := 0; i < len(text); i++ {
		c := text[i]
		if c != '_' && c != '*' {
			continue
		}
		before, size := utf8.DecodeLastRuneInString(text[:i])
		after, next := utf8.DecodeRuneInString(text[i+1:])
		inWord := size > 0 && isWordRune(before) && next > 0 && isWordRune(after)
		double := before == rune(c) || after == rune(c)
		switch {
		case double || inWord:
		case open >= 0 && text[open] == c && !unicode.IsSpace(before):
			marks = append(marks, open, i)
			open = -1
		case (size == 0 || !isWordRune(before)) && next > 0 && !unicode.IsSpace(after) && (isWordRune(after) || unicode.IsPunct(after)):
			open = i
		}
	}
	return marks
}
