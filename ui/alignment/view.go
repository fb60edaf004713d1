package alignment

import (
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"github.com/charmbracelet/lipgloss"

	"emendary/align"
	"emendary/ui/text"
)

// spelt is how many lines the row under the cursor takes once spelt out.
const spelt = 3

// plan is where the columns of the grid go.
type plan struct {
	word        int   // columns for the candidates' words
	widths      []int // of each column of the grid, its gap included
	first, last int   // columns of the grid that are drawn, half open
	remark      int
}

// View returns the grid, the row under the cursor spelt out, and nothing wider
// or taller than asked.
func (m Model) View() string {
	p := m.plan()
	room := max(1, m.height-1-spelt)
	from := max(0, min(m.cursor-room/2, len(m.rows)-room))
	to := min(len(m.rows), from+room)
	lines := []string{m.heads(p, from, to)}
	if m.note != "" {
		lines = append(lines, "   "+m.sheet.Quiet.Render(text.Cut(m.note, m.width-3, m.sheet.Signs.Ellipsis)))
	}
	for r := from; r < to; r++ {
		lines = append(lines, m.row(r, p))
	}
	if len(m.rows) > 0 {
		for len(lines) < min(m.height-spelt, 1+m.shown()) {
			lines = append(lines, "")
		}
		lines = append(lines, m.speltOut(p)...)
	}
	return strings.Join(text.Fit(lines, m.width, m.height), "\n")
}

// shown is how many rows the part is asked to keep room for.
func (m Model) shown() int { return min(len(m.rows), max(1, m.height-1-spelt)) }

// plan gives every part of a row its columns. When the screen is too narrow the
// columns close up, the words are cut, the remarks go, and at last the grid shows
// the columns around the cursor row's first departure only.
func (m Model) plan() plan {
	p := plan{last: len(m.grid.Columns)}
	for _, r := range m.rows {
		p.word = max(p.word, text.Width(r.Text))
		p.remark = max(p.remark, text.Width(r.Remark))
	}
	p.word = max(p.word, 12) // so that the grid stays put from entry to entry
	if p.remark > 0 {
		p.remark += 2
	}
	for _, gap := range []int{2, 1} {
		p.widths = m.columnWidths(gap)
		if m.total(p) <= m.width {
			return p
		}
	}
	if p.word = min(p.word, 16); m.total(p) <= m.width {
		return p
	}
	if p.remark = 0; m.total(p) <= m.width {
		return p
	}
	m.window(&p)
	return p
}

// lead and tail are the columns left and right of the grid: the cursor and the
// gap after the word; cost and share.
const (
	lead = 3 + 2
	tail = 6 + 7
)

func (m Model) total(p plan) int {
	n := lead + p.word + tail + p.remark
	for _, w := range p.widths[p.first:p.last] {
		n += w
	}
	return n
}

func (m Model) columnWidths(gap int) []int {
	widths := make([]int, len(m.grid.Columns))
	for i, c := range m.grid.Columns {
		w := 1
		if c.Form >= 0 {
			w = text.Width(m.form[c.Form])
		}
		widths[i] = max(w, 1)
	}
	for r := range m.rows {
		for i, letters := range m.written(r) {
			span := m.grid.Rows[r][i].Span
			if len(letters) > span {
				widths[i] = max(widths[i], text.Width(strings.Join(letters, "")))
				continue
			}
			for k, l := range letters {
				if c := i + place(k, len(letters), span); c < len(widths) {
					widths[c] = max(widths[c], text.Width(l))
				}
			}
		}
	}
	for i := range widths {
		widths[i] += gap
	}
	return widths
}

// place returns which of span columns the k-th of n letters goes to: the last
// letter to the last column, so that a transposition shows as a crossing.
func place(k, n, span int) int {
	if n > 1 && k == n-1 {
		return span - 1
	}
	return k
}

// window keeps as many columns as fit around the first departure of the row
// under the cursor.
func (m Model) window(p *plan) {
	want := 0
	if m.cursor < len(m.rows) {
		written := m.written(m.cursor)
		for i, c := range m.grid.Rows[m.cursor] {
			if m.departs(c, m.grid.Columns[i], written[i]) {
				want = i
				break
			}
		}
	}
	p.first, p.last = want, want
	for grown := true; grown; {
		grown = false
		for _, step := range []struct{ first, last int }{{-1, 0}, {0, 1}} {
			q := *p
			q.first, q.last = p.first+step.first, p.last+step.last
			if q.first >= 0 && q.last <= len(p.widths) && m.total(q) <= m.width {
				*p, grown = q, true
			}
		}
	}
}

// heads returns the line of column heads. Before them it says which rows are drawn
// and whether columns go on beyond the screen, where not all are there.
func (m Model) heads(p plan, from, to int) string {
	left := ""
	if to-from < len(m.rows) {
		left = fmt.Sprintf("%d to %d of %d", from+1, to, len(m.rows))
	}
	if p.first > 0 {
		left += " " + m.sheet.Signs.Less
	}
	if p.last < len(p.widths) {
		left += " " + m.sheet.Signs.More
	}
	var b strings.Builder
	b.WriteString("   " + text.Pad(m.sheet.Quiet.Render(text.Cut(left, p.word+1, "")), lead-3+p.word))
	for i := p.first; i < p.last; i++ {
		b.WriteString(text.Pad(m.head(i, m.sheet.Head), p.widths[i]))
	}
	if slices.ContainsFunc(m.rows, func(r Row) bool { return r.Priced }) {
		b.WriteString(m.sheet.Quiet.Render(text.PadLeft(m.unit(), 6) + "  share"))
	}
	return b.String()
}

func (m Model) head(i int, s lipgloss.Style) string {
	c := m.grid.Columns[i]
	if c.Form < 0 {
		return m.sheet.Quiet.Render(m.sheet.Signs.Caret)
	}
	return s.Render(m.letter(m.form[c.Form]))
}

// letter returns a letter as the grid shows it: a space by its mark.
func (m Model) letter(l string) string {
	if strings.TrimSpace(l) == "" {
		return m.sheet.Signs.Space
	}
	return text.Visible(l, m.sheet.Signs.ASCII)
}

func (m Model) row(r int, p plan) string {
	row := m.rows[r]
	word := text.Cut(text.Visible(row.Text, m.sheet.Signs.ASCII), p.word, m.sheet.Signs.Ellipsis)
	cursor := "   "
	if r == m.cursor {
		cursor = " " + m.sheet.Cursor.Render(m.sheet.Signs.Cursor) + " "
		cursor = text.Pad(cursor, 3)
		word = m.sheet.Cursor.Render(word)
	}
	var b strings.Builder
	b.WriteString(cursor + text.Pad(word, p.word+lead-3))
	b.WriteString(m.cells(r, p))
	if row.Priced {
		b.WriteString(text.PadLeft(m.price(row.Cost), 6) + text.PadLeft(share(row.Share), 7))
	} else {
		b.WriteString(strings.Repeat(" ", tail))
	}
	if p.remark > 0 {
		b.WriteString("  " + m.sheet.Quiet.Render(row.Remark))
	}
	return b.String()
}

// unit heads the column of costs.
func (m Model) unit() string {
	if m.inBits {
		return "bits"
	}
	return "cost"
}

func (m Model) price(cost float64) string {
	switch {
	case math.IsInf(cost, 0) || math.IsNaN(cost):
		return ""
	case m.inBits:
		return strconv.FormatFloat(cost, 'f', 1, 64)
	}
	return strconv.FormatFloat(math.Round(10*cost)/10, 'f', -1, 64)
}

func share(s float64) string {
	if s > 0 && s < 0.005 {
		return "<1 %"
	}
	return fmt.Sprintf("%.0f %%", 100*s)
}

// cells draws the cells of a row. What each column shows is settled first, so
// that the letters of a cell that covers several go to their own places.
func (m Model) cells(r int, p plan) string {
	shown := make([]string, len(p.widths))
	written := m.written(r)
	for i, c := range m.grid.Rows[r] {
		letters := written[i]
		switch {
		case c.Span == 0:
		case c.Op == align.Deletion:
			shown[i] = m.sheet.Differs.Render(m.sheet.Signs.Dele)
		case !m.departs(c, m.grid.Columns[i], letters):
			if len(letters) > 0 {
				shown[i] = m.sheet.Quiet.Render(m.sheet.Signs.Agrees)
			}
		case len(letters) > c.Span:
			shown[i] = m.sheet.Differs.Render(m.letter(strings.Join(letters, "")))
		default:
			for k, l := range letters {
				shown[i+place(k, len(letters), c.Span)] = m.sheet.Differs.Render(m.letter(l))
			}
		}
	}
	var b strings.Builder
	for i := p.first; i < p.last; i++ {
		b.WriteString(text.Pad(shown[i], p.widths[i]))
	}
	return b.String()
}
