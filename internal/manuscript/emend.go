package manuscript

import (
	"fmt"
	"slices"
	"strings"
	"unicode"
	"unicode/utf8"
)

// Emendation replaces the letters of bytes [Start,End) of a paragraph's Text.
// Letters has one element for each that Document.Letters returns of that range,
// marks included, and element i takes the place of letter i:
//
//   - the letter's own Text leaves its bytes in the file as they are, whether
//     they are plain, escaped, a character reference or decomposed;
//   - "" deletes it, a mark too;
//   - anything else is written in the file's encoding and format. An inserted
//     letter is part of the element of a neighbour; where the element begins or
//     ends with the letter's own Text, that part keeps its bytes.
type Emendation struct {
	Paragraph  int
	Start, End int
	Letters    []string
}

// splice replaces a span of the file.
type splice struct {
	Span
	with []byte
}

// Emend returns a copy of the file with the emendations spliced in, in any
// order; every other byte is as it was. It refuses, naming the place,
//
//   - a range outside the text, or with another number of letters;
//   - emendations that overlap;
//   - a letter that the encoding lacks, and a control character or line break;
//   - a letter that markup runs through, or that shares a character reference
//     with one outside the range, unless it stays;
//   - a result that does not read back as intended, because a letter became
//     markup that the format cannot escape.
//
// It takes as much time as reading the document, whatever the number of
// emendations.
func (d *Document) Emend(emendations []Emendation) ([]byte, error) {
	sorted := slices.Clone(emendations)
	slices.SortStableFunc(sorted, func(a, b Emendation) int {
		if a.Paragraph != b.Paragraph {
			return a.Paragraph - b.Paragraph
		}
		return a.Start - b.Start
	})
	intended := make(map[int]string)
	var splices []splice
	for i := 0; i < len(sorted); {
		paragraph := sorted[i].Paragraph
		if paragraph < 0 || paragraph >= len(d.Paragraphs) {
			return nil, fmt.Errorf("%s: there is no paragraph %d; review the manuscript again", d.Path, paragraph)
		}
		text := d.Paragraphs[paragraph].Text
		var out strings.Builder
		done := 0
		for ; i < len(sorted) && sorted[i].Paragraph == paragraph; i++ {
			e := sorted[i]
			if e.Start < 0 || e.Start > e.End || e.End > len(text) {
				return nil, fmt.Errorf("%s: paragraph %d: bytes %d to %d are not in its text; review the manuscript again", d.Path, paragraph, e.Start, e.End)
			}
			if e.Start < done {
				return nil, fmt.Errorf("%s: two emendations overlap; undo one of them", d.place(paragraph, e.Start))
			}
			out.WriteString(text[done:e.Start])
			replaced, err := d.emendOne(e, &out)
			if err != nil {
				return nil, err
			}
			splices = append(splices, replaced...)
			done = e.End
		}
		out.WriteString(text[done:])
		intended[paragraph] = out.String()
	}
	slices.SortStableFunc(splices, func(a, b splice) int { return a.Start - b.Start })
	data := make([]byte, 0, len(d.data)+len(splices)*4)
	done := 0
	for _, s := range splices {
		data = append(append(data, d.data[done:s.Start]...), s.with...)
		done = s.End
	}
	data = append(data, d.data[done:]...)
	if err := d.verify(data, intended); err != nil {
		return nil, err
	}
	return data, nil
}

// emendOne writes what the range is to read as to out, and returns its splices.
func (d *Document) emendOne(e Emendation, out *strings.Builder) ([]splice, error) {
	p := &d.Paragraphs[e.Paragraph]
	text := p.Text
	var letters []Letter
	var extents []extent
	d.eachLetter(e.Paragraph, e.Start, e.End, func(l Letter, at extent) {
		letters, extents = append(letters, l), append(extents, at)
	})
	if len(letters) != len(e.Letters) {
		return nil, fmt.Errorf("%s: %d letters for %d; review the manuscript again", d.place(e.Paragraph, e.Start), len(e.Letters), len(letters))
	}
	var splices []splice
	for i := 0; i < len(letters); {
		// Letters that share a character reference are written together.
		n := 1
		for i+n < len(letters) && p.shared(extents[i+n].start) {
			n++
		}
		with, changed := "", false
		for j := i; j < i+n; j++ {
			with += e.Letters[j]
			if composed(e.Letters[j]) == letters[j].Text {
				out.WriteString(text[extents[j].start:extents[j].end])
			} else {
				out.WriteString(composed(e.Letters[j]))
				changed = true
			}
		}
		if changed {
			s, err := d.replace(e.Paragraph, extent{extents[i].start, extents[i+n-1].end}, composed(with))
			if err != nil {
				return nil, err
			}
			splices = append(splices, s)
		}
		i += n
	}
	return splices, nil
}

// replace returns the splice that makes the letters at a place of a paragraph
// read with.
func (d *Document) replace(paragraph int, at extent, with string) (splice, error) {
	p := &d.Paragraphs[paragraph]
	old := composed(p.Text[at.start:at.end])
	for _, r := range with {
		if unicode.IsControl(r) || r == utf8.RuneError {
			return splice{}, fmt.Errorf("%s: %+q cannot be written into the text; take it out", d.place(paragraph, at.start), r)
		}
	}
	from, to := p.sourceSpan(at.start, at.end)
	if p.shared(at.start) || p.shared(at.end) {
		return splice{}, fmt.Errorf("%s: the letter %q shares a character reference with its neighbour; change it by hand", d.place(paragraph, at.start), old)
	}
	if p.markedWithin(at) {
		return splice{}, fmt.Errorf("%s: markup runs through the letter %q; change it by hand", d.place(paragraph, at.start), old)
	}
	first := at.start == 0 || p.Text[at.start-1] == '\n'
	switch {
	case with == "":
	case strings.HasPrefix(with, old):
		from, with, first = to, with[len(old):], false
	case strings.HasSuffix(with, old):
		to, with = from, with[:len(with)-len(old)]
	}
	source := d.source.text
	line := source[d.lines[d.lineOf(from)]:from]
	encoded, err := d.source.encode(d.format.write(with, line, source[to:min(len(source), to+1)], first))
	if err != nil {
		return splice{}, fmt.Errorf("%s: %s has no letter %q; choose another spelling or convert the file to UTF-8", d.place(paragraph, at.start), d.Encoding, with)
	}
	return splice{d.source.fileSpan(from, to), encoded}, nil
}

// markedWithin reports whether a mark stands in the source among the letters.
func (p *Paragraph) markedWithin(at extent) bool {
	for i := p.pieceAt(at.start); i < p.pieceAt(at.end-1); i++ {
		if p.pieces[i].end != p.pieces[i+1].start {
			return true
		}
	}
	return false
}

// place names the file, line and column of a byte of a paragraph's Text.
func (d *Document) place(paragraph, at int) string {
	start, _ := d.Paragraphs[paragraph].sourceSpan(at, at)
	line, column := d.Position(d.source.fileOffset(start))
	return fmt.Sprintf("%s: line %d, column %d", d.Path, line, column)
}

// verify reads the emended file and compares every paragraph with what was
// intended.
func (d *Document) verify(data []byte, intended map[int]string) error {
	source, err := decode(data, d.Encoding)
	if err != nil {
		return fmt.Errorf("%s: the emended copy does not read back: %w", d.Path, err)
	}
	found, err := d.format.read(source.text)
	if err != nil {
		return fmt.Errorf("%s: the emended copy does not read back: %w", d.Path, err)
	}
	for i := range d.Paragraphs {
		want, ok := intended[i]
		if !ok {
			want = d.Paragraphs[i].Text
		}
		if i < len(found.blocks) {
			if got := found.blocks[i].string(); got == want || settled(got) == settled(want) {
				continue
			}
		}
		return fmt.Errorf("%s: the emended paragraph would not read as intended, since a letter would become markup; change it by hand", d.place(i, 0))
	}
	if len(found.blocks) > len(d.Paragraphs) {
		return fmt.Errorf("%s: the emended copy would have a paragraph more, since a letter would become markup; change it by hand", d.Path)
	}
	return nil
}

// settled returns text in NFC and without space at the ends of its lines: an
// encoding may have a letter decomposed only, and the space beside a word that
// was deleted at a line's end is no text any more.
func settled(text string) string {
	lines := strings.Split(composed(text), "\n")
	for i, l := range lines {
		lines[i] = strings.TrimSpace(l)
	}
	return strings.Join(lines, "\n")
}
