package manuscript

import (
	"fmt"
	"strings"
)

// format is what the package knows of one kind of file. To add one, write a
// type in a file of its own and list it in formats.
type format interface {
	// name is what the user calls it.
	name() string
	// recognise says how surely the file is of this format; the surest wins.
	// It looks at the content first and takes the name as a hint.
	recognise(path, text string) int
	// read finds the prose in the text of a file. It returns blocks in the
	// order of the text, none overlapping another.
	read(text string) (reading, error)
	// write returns a new letter as it must stand in the file's text, between
	// what stands before and after it there, to be read back as that letter.
	// first tells that it opens a line of its paragraph.
	write(letter, before, after string, first bool) string
}

func formats() []format { return []format{textFormat{}, markdownFormat{}} }

// chooseFormat returns the format called name, or the surest one.
func chooseFormat(name, path, text string) (format, error) {
	var names []string
	var best format
	surest := -1
	for _, f := range formats() {
		if f.name() == name {
			return f, nil
		}
		names = append(names, f.name())
		if sure := f.recognise(path, text); sure > surest {
			best, surest = f, sure
		}
	}
	if name != "" {
		return nil, fmt.Errorf("no format is called %q; use %s", name, strings.Join(names, " or "))
	}
	return best, nil
}

// reading is what a format finds in a text. Offsets are bytes of that text.
type reading struct {
	title  string
	blocks []block
	passed []passage
}

// passage is a stretch that the format passes over.
type passage struct {
	reason     string
	start, end int
}

// block is a paragraph to be.
type block struct {
	prose
	setting   Setting // Heading, Note, Quotation, or Narration
	opensPart bool    // it is the heading of a part
}

// extent is a range of bytes of a block's text, half open.
type extent struct{ start, end int }

// piece says where a stretch of a paragraph's text comes from: it starts at
// byte text of the paragraph and ends where the next piece starts; it stands
// for bytes [start,end) of the file's text. Unless it is an atom, the two are
// the same bytes. An atom is one escape, reference or line break.
//
// What stands in the file between two pieces is a mark, and no part of the
// paragraph's text.
type piece struct {
	text, start, end int32
	atom             bool
}

// prose collects a paragraph's text. Its zero value is ready for use, and it may be
// copied, which is why it holds no strings.Builder.
type prose struct {
	text    []byte
	whole   string // the text, where it is one stretch of the source
	pieces  []piece
	italics []extent // in order, none overlapping another
	skips   []extent // stretches without words, such as code
}

func (p *prose) len() int {
	if p.whole != "" {
		return len(p.whole)
	}
	return len(p.text)
}

// string shares the source's memory where the text is one stretch of it.
func (p *prose) string() string {
	if p.whole != "" {
		return p.whole
	}
	return string(p.text)
}

// spill moves the text to the builder, before more is added.
func (p *prose) spill() {
	if p.whole != "" {
		p.text = append(p.text, p.whole...)
		p.whole = ""
	}
}

// copy adds bytes [start,end) of the source as they are.
func (p *prose) copy(source string, start, end int) {
	if start >= end {
		return
	}
	at := p.len()
	if n := len(p.pieces); n > 0 && !p.pieces[n-1].atom && int(p.pieces[n-1].end) == start {
		p.pieces[n-1].end = int32(end)
	} else {
		p.pieces = append(p.pieces, piece{int32(at), int32(start), int32(end), false})
	}
	if at == 0 {
		p.whole = source[start:end]
		return
	}
	if p.whole != "" && len(p.pieces) == 1 {
		p.whole = source[p.pieces[0].start:end]
		return
	}
	p.spill()
	p.text = append(p.text, source[start:end]...)
}

// put adds text that stands for bytes [start,end) of the source.
func (p *prose) put(text string, start, end int) {
	p.pieces = append(p.pieces, piece{int32(p.len()), int32(start), int32(end), true})
	p.spill()
	p.text = append(p.text, text...)
}

// line adds a line break that stands for bytes [start,end) of the source. A
// bare line feed is copied, so that hard-wrapped prose stays one piece.
func (p *prose) line(source string, start, end int) {
	if source[start:end] == "\n" {
		p.copy(source, start, end)
		return
	}
	p.put("\n", start, end)
}

// fill makes the paragraphs and parts of a document out of a reading, and
// splits the paragraphs into words.
func (d *Document) fill(found reading) {
	passed := found.passed
	var words splitter
	d.Paragraphs = make([]Paragraph, 0, len(found.blocks))
	for i := range found.blocks {
		b := &found.blocks[i]
		text := b.string()
		if b.opensPart || len(d.Parts) == 0 {
			title := ""
			if b.opensPart {
				title = strings.Join(strings.Fields(text), " ")
			}
			d.Parts = append(d.Parts, Part{Title: title, First: i})
		}
		p := Paragraph{Part: len(d.Parts) - 1, Text: text, pieces: append([]piece(nil), b.pieces...)}
		var skipped []reasoned
		p.Words, skipped = words.split(text, b.setting, b.italics, b.skips)
		for _, s := range skipped {
			start, end := p.sourceSpan(s.start, s.end)
			passed = append(passed, passage{s.reason, start, end})
		}
		d.Paragraphs = append(d.Paragraphs, p)
	}
	d.Passed = d.passages(passed)
}
