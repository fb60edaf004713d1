// Package related shows the forms that are built on the form under review
// (harbers, harber-master on harber), each with its check and with what it becomes.
package related

import (
	"fmt"
	"strings"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"emendary/ui/style"
	"emendary/ui/text"
)

// Row is one related form.
type Row struct {
	Form    string
	Becomes string // "" where it has no result of its own
	Known   bool   // the lexicon knows the result
	Count   int
	Checked bool
}

// KeyMap is the keys of the related forms.
type KeyMap struct {
	Up, Down, Check key.Binding
}

// Keys returns the keys with their help.
func Keys() KeyMap {
	return KeyMap{
		Down:  key.NewBinding(key.WithKeys("j", "down"), key.WithHelp("j ↓", "next related form")),
		Up:    key.NewBinding(key.WithKeys("k", "up"), key.WithHelp("k ↑", "previous related form")),
		Check: key.NewBinding(key.WithKeys(" "), key.WithHelp("space", "check or uncheck the form")),
	}
}

// ShortHelp returns what the footer shows.
func (k KeyMap) ShortHelp() []key.Binding { return []key.Binding{k.Down, k.Up, k.Check} }

// FullHelp returns all keys.
func (k KeyMap) FullHelp() [][]key.Binding { return [][]key.Binding{k.ShortHelp()} }

// Model is the related forms on screen.
type Model struct {
	Keys          KeyMap
	sheet         style.Sheet
	rows          []Row
	cursor        int
	focused       bool
	width, height int
}

// New returns a part without forms.
func New(sheet style.Sheet) Model { return Model{Keys: Keys(), sheet: sheet} }

// SetSize sets the columns and lines to draw in, the heading included.
func (m *Model) SetSize(width, height int) { m.width, m.height = width, height }

// Focus says whether the keys come here; the cursor shows only then.
func (m *Model) Focus(on bool) { m.focused = on }

// Show lays out rows, the cursor where it was as far as there are rows.
func (m *Model) Show(rows []Row) {
	m.rows = rows
	m.cursor = max(0, min(m.cursor, len(rows)-1))
}

// Top puts the cursor on the first row.
func (m *Model) Top() { m.cursor = 0 }

// Rows returns the rows with their checks as they stand.
func (m Model) Rows() []Row { return m.rows }

// Update moves the cursor and changes checks.
func (m Model) Update(msg tea.Msg) (Model, tea.Cmd) {
	k, ok := msg.(tea.KeyMsg)
	if !ok || len(m.rows) == 0 {
		return m, nil
	}
	switch {
	case key.Matches(k, m.Keys.Down):
		m.cursor = min(m.cursor+1, len(m.rows)-1)
	case key.Matches(k, m.Keys.Up):
		m.cursor = max(m.cursor-1, 0)
	case key.Matches(k, m.Keys.Check):
		m.rows[m.cursor].Checked = !m.rows[m.cursor].Checked
	}
	return m, nil
}

// View returns a heading and the forms around the cursor; nothing where there are none.
func (m Model) View() string {
	if len(m.rows) == 0 {
		return strings.Join(text.Fit(nil, m.width, m.height), "\n")
	}
	s := m.sheet.Signs
	room := max(0, m.height-1)
	from := max(0, min(m.cursor-room/2, len(m.rows)-room))
	to := min(len(m.rows), from+room)
	head := " " + m.sheet.Title.Render("related forms")
	if m.focused {
		head = m.sheet.Cursor.Render(s.Cursor) + m.sheet.Title.Render("related forms")
	}
	checked, wide := 0, 0
	for _, r := range m.rows {
		if r.Checked {
			checked++
		}
		wide = max(wide, min(text.Width(m.visible(r.Form)), m.width/3))
	}
	where := ""
	if from < to && to-from < len(m.rows) {
		where = m.sheet.Quiet.Render(fmt.Sprintf("%d to %d ", from+1, to))
	}
	lines := []string{text.Ends(fmt.Sprintf("%s %s %d of %d checked", head, s.Dot, checked, len(m.rows)), where, m.width, s.Ellipsis)}
	for i := from; i < to; i++ {
		lines = append(lines, m.row(i, wide))
	}
	return strings.Join(text.Fit(lines, m.width, m.height), "\n")
}

func (m Model) visible(v string) string { return text.Visible(v, m.sheet.Signs.ASCII) }

func (m Model) row(i, wide int) string {
	r, s := m.rows[i], m.sheet.Signs
	cursor, check := " ", s.Unchecked
	if m.focused && i == m.cursor {
		cursor = m.sheet.Cursor.Render(s.Cursor)
	}
	if r.Checked {
		check = m.sheet.Settled.Render(s.Checked)
	}
	line := cursor + check + " " + text.Pad(text.Cut(m.visible(r.Form), wide, s.Ellipsis), wide)
	if r.Becomes != "" {
		line += " " + m.sheet.Quiet.Render(s.Arrow) + " " + m.visible(r.Becomes)
		if !r.Known {
			line += m.sheet.Quiet.Render(" (in no list)")
		}
	}
	return line + m.sheet.Quiet.Render(fmt.Sprintf("  %s%d", s.Times, r.Count))
}
