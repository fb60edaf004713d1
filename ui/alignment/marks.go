package alignment

import (
	"strings"

	"emendary/align"
	"emendary/ui/text"
)

// speltOut returns the row under the cursor as a corrector would mark it: the
// form with its marks in the text, under it the marks of the margin in the
// columns they belong to (British practice: the new letter, closed by a slash),
// and the same as a sentence.
func (m Model) speltOut(p plan) []string {
	var letters, marks strings.Builder
	margin := strings.Repeat(" ", lead+p.word)
	if m.stet {
		return m.speltStet(p, margin)
	}
	letters.WriteString(margin)
	marks.WriteString(margin)
	written := m.written(m.cursor)
	cells := m.grid.Rows[m.cursor]
	at, marked := 0, 0 // columns written so far of each line
	struck := 0        // columns that a cell to the left covers
	last := ""
	for i := range cells {
		if i < p.first || i >= p.last {
			continue
		}
		c := cells[i]
		mark := m.mark(c, m.grid.Columns[i], written[i])
		if c.Span > 0 {
			struck = 0
			if mark != "" {
				struck = c.Span
			}
		}
		letters.WriteString(text.Pad(m.inText(i, c, struck > 0), p.widths[i]))
		struck = max(0, struck-1)
		if mark != "" {
			if mark == last && (mark == m.sheet.Signs.Capital || mark == m.sheet.Signs.Lower) {
				mark = strings.Repeat(m.sheet.Signs.Rule, max(1, p.widths[i]-1))
			} else {
				last = mark
			}
			if marked < at {
				marks.WriteString(strings.Repeat(" ", at-marked))
				marked = at
			}
			marks.WriteString(m.sheet.Differs.Render(mark))
			marked += text.Width(mark)
		} else if c.Span > 0 && (len(written[i]) > 0 || m.grid.Columns[i].Form >= 0) {
			last = ""
		}
		at += p.widths[i]
	}
	said := Sentence(m.form, m.rows[m.cursor])
	if why := m.rows[m.cursor].Why; why != "" {
		said += " " + m.sheet.Signs.Agrees + " " + why
	}
	sentence := "   " + text.Cut(said, m.width-4, m.sheet.Signs.Ellipsis)
	return []string{letters.String(), marks.String(), sentence}
}

// speltStet marks the form as let stand: a dot under every letter.
func (m Model) speltStet(p plan, margin string) []string {
	letters, dots := margin, margin
	for i := p.first; i < p.last; i++ {
		letter, dot := "", ""
		if m.grid.Columns[i].Form >= 0 {
			letter, dot = m.head(i, m.sheet.Text), m.sheet.Settled.Render(m.sheet.Signs.Stet)
		}
		letters += text.Pad(letter, p.widths[i])
		dots += text.Pad(dot, p.widths[i])
	}
	return []string{letters, dots, "   " + text.Cut("stet: the form stands", m.width-4, m.sheet.Signs.Ellipsis)}
}

// inText returns what stands in the line of letters at column i: the letter,
// struck where a mark is on it, or a caret where this row inserts.
func (m Model) inText(i int, c align.Cell, struck bool) string {
	if m.grid.Columns[i].Form < 0 {
		if c.Op == align.Insertion {
			return m.sheet.Differs.Render(m.sheet.Signs.Caret)
		}
		return ""
	}
	if struck {
		return m.head(i, m.sheet.Struck)
	}
	return m.head(i, m.sheet.Text)
}

// mark returns the margin's mark for a cell; "" where the form stands.
func (m Model) mark(c align.Cell, column align.Column, word []string) string {
	s := m.sheet.Signs
	joined := ""
	for _, l := range word {
		joined += m.letter(l)
	}
	switch {
	case c.Span == 0 || !m.departs(c, column, word):
		return ""
	case c.Op == align.Deletion && joins(m.form[column.Form]):
		return s.CloseUp
	case c.Op == align.Deletion:
		return s.Dele
	case c.Op == align.Insertion:
		return joined
	case c.Op == align.Transposition:
		return "tr " + s.Transpose
	case c.Op == align.Agreement && word[0] == strings.ToLower(word[0]):
		return s.Lower
	case c.Op == align.Agreement:
		return s.Capital
	}
	return joined + s.Slash
}

// joins reports whether taking letter l away joins what is beside it.
func joins(l string) bool { return strings.TrimSpace(l) == "" || l == "-" || l == "‐" || l == "‑" }
