package docket

import (
	"strings"

	"emendary/internal/ledger"
	"emendary/internal/manuscript"
)

// Citation is an occurrence shown in its line.
type Citation struct {
	Before, Form, After string // of the paragraph, line breaks as spaces; Form as it stands
	Part                int    // index into Document.Parts
	Paragraph           int    // number within its part, from 1
	Line, Column        int    // of the file, from 1; the column in letters
	Setting             manuscript.Setting
}

// Citation returns occurrence i of e with all of its paragraph before and after.
func (d *Docket) Citation(e *Entry, i int) Citation {
	o := e.Occurrences[i]
	p := &d.Document.Paragraphs[o.Paragraph]
	start, end := d.extent(o)
	line, column := d.Document.Position(d.span(o).Start)
	return Citation{
		Before: flat(p.Text[:start]), Form: flat(p.Text[start:end]), After: flat(p.Text[end:]),
		Part: p.Part, Paragraph: o.Paragraph - d.Document.Parts[p.Part].First + 1,
		Line: line, Column: column, Setting: p.Words[o.Word].Setting,
	}
}

// flat is text in one line; text that is so already is not copied.
func flat(text string) string {
	if !strings.ContainsAny(text, "\r\n\t") {
		return text
	}
	return strings.NewReplacer("\r\n", " ", "\n", " ", "\t", " ").Replace(text)
}

// extent returns the bytes of its paragraph's text that o covers, lead and tail
// included.
func (d *Docket) extent(o Occurrence) (start, end int) {
	words := d.Document.Paragraphs[o.Paragraph].Words
	return words[o.Word].Start, words[o.Word+o.Words-1].End
}

// span returns the bytes of the file that o covers.
func (d *Docket) span(o Occurrence) manuscript.Span {
	start, end := d.extent(o)
	letters := d.Document.Letters(o.Paragraph, start, end)
	return manuscript.Span{Start: letters[0].Span.Start, End: letters[len(letters)-1].Span.End}
}

// Span returns the bytes of the file that occurrence i of e covers.
func (d *Docket) Span(e *Entry, i int) manuscript.Span { return d.span(e.Occurrences[i]) }

// Checked returns which occurrences start checked: the open ones, but not those
// in quotations, nor those in speech where the form also stands in narration.
func (d *Docket) Checked(e *Entry) []bool {
	narrated := false
	for i := range e.Occurrences {
		narrated = narrated || d.setting(e, i) == manuscript.Narration
	}
	checked := make([]bool, len(e.Occurrences))
	for i, o := range e.Occurrences {
		s := d.setting(e, i)
		checked[i] = o.Ruling == nil && s != manuscript.Quotation && (s != manuscript.Speech || !narrated)
	}
	return checked
}

func (d *Docket) setting(e *Entry, i int) manuscript.Setting {
	o := e.Occurrences[i]
	return d.Document.Paragraphs[o.Paragraph].Words[o.Word].Setting
}

// contextLetters is how many letters either side of an occurrence a ruling keeps.
const contextLetters = 40

// witness returns occurrence i of e as a ruling keeps it.
func (d *Docket) witness(e *Entry, i int, seen bool) ledger.Occurrence {
	o := e.Occurrences[i]
	p := &d.Document.Paragraphs[o.Paragraph]
	start, end := d.extent(o)
	span := d.span(o)
	line, column := d.Document.Position(span.Start)
	before, after := d.context(o.Paragraph, start, end)
	return ledger.Occurrence{
		Part: d.Document.Parts[p.Part].Title, PartIndex: p.Part + 1, Paragraph: o.Paragraph,
		Start: span.Start, End: span.End, Line: line, Column: column,
		Text: o.Text, Before: before, After: after, Seen: seen,
	}
}

// context returns forty letters either side of bytes [start,end) of a
// paragraph, white space made plain; neighbouring paragraphs help out.
func (d *Docket) context(paragraph, start, end int) (before, after string) {
	const reach = 8 * contextLetters // bytes that are sure to hold them, but for piled-up marks
	text := d.Document.Paragraphs[paragraph].Text
	before, after = text[:start], text[end:]
	for i := paragraph - 1; i >= 0 && len(before) < reach; i-- {
		before = d.Document.Paragraphs[i].Text + "\n" + before
	}
	for i := paragraph + 1; i < len(d.Document.Paragraphs) && len(after) < reach; i++ {
		after += "\n" + d.Document.Paragraphs[i].Text
	}
	before = strings.ToValidUTF8(before[max(0, len(before)-reach):], "")
	after = strings.ToValidUTF8(after[:min(len(after), reach)], "")
	alphabet := d.base.Alphabet()
	left, right := alphabet.Letters(plainSpace(before)), alphabet.Letters(plainSpace(after))
	return alphabet.Text(left[max(0, len(left)-contextLetters):]...), alphabet.Text(right[:min(len(right), contextLetters)]...)
}

// plainSpace makes each run of white space one space.
func plainSpace(s string) string {
	var b strings.Builder
	space := false
	for _, r := range s {
		if r == ' ' || r == '\n' || r == '\t' || r == '\r' {
			space = true
			continue
		}
		if space {
			b.WriteByte(' ')
			space = false
		}
		b.WriteRune(r)
	}
	if space {
		b.WriteByte(' ')
	}
	return b.String()
}
