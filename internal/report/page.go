package report

import (
	"bytes"
	"fmt"
	"strings"
	"time"
	"unicode"
)

// page is a report in Markdown (CommonMark; nothing of any dialect).
type page struct{ *bytes.Buffer }

func (p *page) title(text, manuscript string) {
	fmt.Fprintf(p, "# %s: %s\n", escape(text), escape(manuscript))
}

func (p *page) heading(text string) { fmt.Fprintf(p, "\n## %s\n\n", escape(text)) }

// say writes a paragraph; its text is Markdown already.
func (p *page) say(format string, args ...any) { fmt.Fprintf(p, "\n"+format+"\n", args...) }

// item writes a list item; its text is Markdown already.
func (p *page) item(text string, more ...string) {
	p.WriteString("- " + text)
	for _, m := range more {
		if m != "" {
			p.WriteString("\\\n  " + lineStart(m))
		}
	}
	p.WriteByte('\n')
}

// lineStart returns a line of Markdown so that its start makes no list, heading
// or rule: manuscripts have speech that begins with a dash.
func lineStart(line string) string {
	digits := len(line) - len(strings.TrimLeft(line, "0123456789"))
	rest := line[digits:]
	if digits > 0 && strings.ContainsAny(rest[:min(1, len(rest))], ".)") ||
		digits == 0 && strings.ContainsAny(rest[:min(1, len(rest))], "-+=") {
		return line[:digits] + "\\" + rest
	}
	return line
}

// special is the characters that can mean something in Markdown within a line.
const special = "\\`*_[]<>|~&#"

// escape returns s as one line of text for Markdown that reads as s does,
// controls shown as symbols.
func escape(s string) string {
	var b strings.Builder
	for _, r := range oneLine(s) {
		if strings.ContainsRune(special, r) {
			b.WriteByte('\\')
		}
		b.WriteRune(r)
	}
	return b.String()
}

// strong returns s escaped and strongly emphasised; nothing for nothing.
func strong(s string) string {
	if s = escape(s); s != "" {
		s = "**" + s + "**"
	}
	return s
}

// oneLine returns s on one line: a run of white space is one space, none stands
// at either end, and what steers a terminal or turns the text is shown.
func oneLine(s string) string { return visible(strings.Join(strings.Fields(s), " ")) }

// visible shows control characters: those of ASCII by their pictures (U+2400
// block), all others, which have none, and bytes that are no UTF-8 as U+FFFD. The
// joiners that some scripts spell with pass.
func visible(s string) string {
	return strings.Map(func(r rune) rune {
		switch {
		case r < 0x20:
			return 0x2400 + r
		case r == 0x7f:
			return 0x2421
		case r == '\u200c', r == '\u200d', unicode.IsGraphic(r):
			return r
		}
		return unicode.ReplacementChar
	}, s)
}

// number is n with its noun.
func number(n int, noun string) string {
	switch {
	case n == 1:
		return "1 " + noun
	case strings.HasSuffix(noun, "ch"):
		return fmt.Sprintf("%d %ses", n, noun)
	case strings.HasSuffix(noun, "y"):
		return fmt.Sprintf("%d %sies", n, strings.TrimSuffix(noun, "y"))
	}
	return fmt.Sprintf("%d %ss", n, noun)
}

// join puts the texts that are not empty together.
func join(separator string, texts ...string) string {
	var full []string
	for _, t := range texts {
		if t != "" {
			full = append(full, t)
		}
	}
	return strings.Join(full, separator)
}

// day is a time as the reports give it to people.
func day(t time.Time) string {
	if t.IsZero() {
		return ""
	}
	return t.UTC().Format("2006-01-02 15:04 UTC")
}

// stamp is a time as the reports give it to programs.
func stamp(t time.Time) string {
	if t.IsZero() {
		return ""
	}
	return t.UTC().Format(time.RFC3339)
}
