// Package passage is the paragraph around a citation, with the form marked in it
// and scrolled so that the form shows.
package passage

import (
	"strings"

	"emendary/ui/style"
	"emendary/ui/text"
)

// Model is the passage on screen.
type Model struct {
	sheet         style.Sheet
	whole         string
	form          [2]int // where in whole the form stands, brackets included
	lines         []text.Line
	width, height int
}

// New returns an empty passage.
func New(sheet style.Sheet) Model { return Model{sheet: sheet} }

// SetSize sets the columns and lines to draw in.
func (m *Model) SetSize(width, height int) {
	if width != m.width {
		m.width = width
		m.wrap()
	}
	m.height = height
}

// Show lays out a paragraph in three parts, in time linear in its length.
func (m *Model) Show(before, form, after string) {
	ascii := m.sheet.Signs.ASCII
	before, form, after = text.Visible(before, ascii), text.Visible(form, ascii), text.Visible(after, ascii)
	if m.sheet.Bracket && form != "" {
		form = m.sheet.Signs.Open + form + m.sheet.Signs.Close
	}
	m.whole = before + form + after
	m.form = [2]int{len(before), len(before) + len(form)}
	m.wrap()
}

// Lines returns how many lines the whole paragraph takes.
func (m Model) Lines() int { return len(m.lines) }

// FormLine returns the index of the line that the form starts on.
func (m Model) FormLine() int {
	at := 0
	for i, l := range m.lines {
		if l.Start <= m.form[0] {
			at = i
		}
	}
	return at
}

// wrap keeps a margin of one column on either side, and a form in one piece unless
// it is a long one.
func (m *Model) wrap() {
	keep := m.form
	if text.Width(m.whole[keep[0]:keep[1]]) > m.width/2 {
		keep = [2]int{}
	}
	m.lines = text.Wrap(m.whole, m.width-2, keep)
}

// View returns the lines around the form; a sign at the edge says that the
// paragraph goes on.
func (m Model) View() string {
	at := m.FormLine()
	from := max(0, min(at-m.height/2, len(m.lines)-m.height))
	to := min(len(m.lines), from+m.height)
	out := m.Render(from, to)
	if m.height > 0 && from > 0 {
		out[0] = m.sheet.Quiet.Render(text.Cut(m.sheet.Signs.Ellipsis, 1, "")) + out[0][1:]
	}
	if m.height > 0 && to < len(m.lines) {
		out[len(out)-1] = text.Pad(out[len(out)-1], m.width-1) + m.sheet.Quiet.Render(text.Cut(m.sheet.Signs.Ellipsis, 1, ""))
	}
	return strings.Join(text.Fit(out, m.width, m.height), "\n")
}

// Render returns lines [from,to) of the paragraph, with the form marked.
func (m Model) Render(from, to int) []string {
	var out []string
	for _, l := range m.lines[from:to] {
		cut := func(a, b int) string {
			a, b = max(a, l.Start), min(b, l.End)
			if a >= b {
				return ""
			}
			return m.whole[a:b]
		}
		line := " " + cut(0, m.form[0])
		if form := cut(m.form[0], m.form[1]); form != "" {
			line += m.sheet.Form.Render(form)
		}
		out = append(out, text.Cut(line+cut(m.form[1], len(m.whole)), m.width-1, ""))
	}
	return out
}
