// Package concordance shows all citations of a form, one a line and aligned on
// it, each with its check mark: a ruling applies to the checked ones.
package concordance

import (
	"fmt"
	"strings"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"emendary/ui/style"
	"emendary/ui/text"
)

// Row is one citation.
type Row struct {
	Part, Paragraph     int // from 1
	Before, Form, After string
	Ruled               string // the ruling in force on it, in a word or two; "" while it is open
}

// KeyMap is the keys of the concordance.
type KeyMap struct {
	Up, Down, Check, Setting, Open key.Binding
}

// Keys returns the keys with their help.
func Keys() KeyMap {
	return KeyMap{
		Down:    key.NewBinding(key.WithKeys("j", "down"), key.WithHelp("j ↓", "next citation")),
		Up:      key.NewBinding(key.WithKeys("k", "up"), key.WithHelp("k ↑", "previous citation")),
		Check:   key.NewBinding(key.WithKeys(" "), key.WithHelp("space", "check or uncheck the citation")),
		Setting: key.NewBinding(key.WithKeys("v"), key.WithHelp("v", "check or uncheck its whole setting")),
		Open:    key.NewBinding(key.WithKeys("o"), key.WithHelp("o", "show its paragraph in full")),
	}
}

// ShortHelp returns what the footer shows.
func (k KeyMap) ShortHelp() []key.Binding {
	return []key.Binding{k.Down, k.Up, k.Check, k.Setting, k.Open}
}

// FullHelp returns all keys.
func (k KeyMap) FullHelp() [][]key.Binding { return [][]key.Binding{k.ShortHelp()} }

// Model is the concordance on screen.
type Model struct {
	Keys          KeyMap
	sheet         style.Sheet
	settings      []string
	row           func(i int) Row
	checked, seen []bool
	cursor        int
	focused       bool
	width, height int
}

// New returns an empty concordance.
func New(sheet style.Sheet) Model { return Model{Keys: Keys(), sheet: sheet} }

// SetSize sets the columns and lines to draw in, the heading included.
func (m *Model) SetSize(width, height int) {
	m.width, m.height = width, height
	m.look()
}

// Show lays out a citation for each of settings, the cursor on citation at. row
// gives citation i and is called for those on screen alone. The two slices are
// shared with the caller: checked changes with the keys, and seen is set for
// every citation that comes on screen.
func (m *Model) Show(settings []string, row func(i int) Row, checked, seen []bool, at int) {
	m.settings, m.row, m.checked, m.seen = settings, row, checked, seen
	m.cursor = max(0, min(at, len(settings)-1))
	m.look()
}

// Focus says whether the keys come here; the cursor shows only then.
func (m *Model) Focus(on bool) { m.focused = on }

// Cursor returns the index of the row under the cursor.
func (m Model) Cursor() int { return m.cursor }

// Update moves the cursor and changes checks.
func (m Model) Update(msg tea.Msg) (Model, tea.Cmd) {
	k, ok := msg.(tea.KeyMsg)
	if !ok || len(m.settings) == 0 {
		return m, nil
	}
	switch {
	case key.Matches(k, m.Keys.Down):
		m.cursor = min(m.cursor+1, len(m.settings)-1)
	case key.Matches(k, m.Keys.Up):
		m.cursor = max(m.cursor-1, 0)
	case key.Matches(k, m.Keys.Check):
		m.checked[m.cursor] = !m.checked[m.cursor]
	case key.Matches(k, m.Keys.Setting):
		on := !m.checked[m.cursor]
		for i, setting := range m.settings {
			if setting == m.settings[m.cursor] {
				m.checked[i] = on
			}
		}
	}
	m.look()
	return m, nil
}

// window returns the rows that are drawn, half open.
func (m Model) window() (from, to int) {
	room := max(0, m.height-1)
	from = max(0, min(m.cursor-room/2, len(m.settings)-room))
	return from, min(len(m.settings), from+room)
}

// look marks the drawn rows as seen.
func (m *Model) look() {
	from, to := m.window()
	for i := from; i < to; i++ {
		m.seen[i] = true
	}
}

// Checked returns how many citations are checked.
func (m Model) Checked() int {
	n := 0
	for _, c := range m.checked {
		if c {
			n++
		}
	}
	return n
}

// View returns a heading and the citations around the cursor.
func (m Model) View() string {
	s := m.sheet.Signs
	from, to := m.window()
	head := m.sheet.Title.Render("concordance")
	count := fmt.Sprintf(" %s %d of %d checked", s.Dot, m.Checked(), len(m.settings))
	if m.focused {
		head = m.sheet.Cursor.Render(s.Cursor) + head
	} else {
		head = " " + head
	}
	where := ""
	if from < to && to-from < len(m.settings) {
		where = m.sheet.Quiet.Render(fmt.Sprintf("%d to %d ", from+1, to))
	}
	lines := []string{text.Ends(head+count, where, m.width, s.Ellipsis)}
	rows := make([]Row, 0, to-from)
	for i := from; i < to; i++ {
		rows = append(rows, m.row(i))
	}
	w := m.columns(rows)
	for i, r := range rows {
		lines = append(lines, m.line(from+i, r, w))
	}
	return strings.Join(text.Fit(lines, m.width, m.height), "\n")
}

// columns is the widths of a row's columns.
type columns struct{ place, setting, ruled, form, before int }

func (m Model) columns(rows []Row) columns {
	var w columns
	for _, s := range m.settings {
		w.setting = max(w.setting, text.Width(named(s)))
	}
	for _, r := range rows {
		w.place = max(w.place, text.Width(m.place(r))+1)
		w.form = max(w.form, text.Width(m.visible(r.Form)))
		w.ruled = max(w.ruled, text.Width(r.Ruled))
	}
	if w.setting > 0 {
		w.setting++
	}
	if w.ruled > 0 {
		w.ruled = min(w.ruled+1, m.width/4)
	}
	w.form = min(w.form, m.width/3)
	w.before = max(0, (m.width-3-w.place-w.setting-w.ruled-w.form-1)/2)
	return w
}

// named is what the column of settings says: nothing for narration, the common case.
func named(setting string) string {
	if setting == "narration" {
		return ""
	}
	return setting
}

func (m Model) place(r Row) string {
	return fmt.Sprintf("%d %s%d", r.Part, m.sheet.Signs.Paragraph, r.Paragraph)
}

func (m Model) visible(s string) string { return text.Visible(s, m.sheet.Signs.ASCII) }

func (m Model) line(i int, r Row, w columns) string {
	s := m.sheet.Signs
	cursor, check := " ", s.Unchecked
	if m.focused && i == m.cursor {
		cursor = m.sheet.Cursor.Render(s.Cursor)
	}
	if m.checked[i] {
		check = m.sheet.Settled.Render(s.Checked)
	}
	form := text.Cut(m.visible(r.Form), w.form, s.Ellipsis)
	before := text.PadLeft(text.CutLeft(tail(m.visible(r.Before), w.before), w.before, ""), w.before)
	styled := m.sheet.Head.Render(form)
	if !m.checked[i] {
		before, styled = m.sheet.Quiet.Render(before), form
	}
	after := max(0, m.width-3-w.place-w.setting-w.ruled-w.before-text.Width(form)-1)
	right := text.Cut(head(m.visible(r.After), after), after, "")
	if !m.checked[i] {
		right = m.sheet.Quiet.Render(right)
	}
	line := cursor + check + " " + m.sheet.Quiet.Render(text.Pad(m.place(r), w.place)+text.Pad(named(m.settings[i]), w.setting)) + before + styled + right
	if w.ruled > 0 {
		line = text.Ends(text.Pad(line, m.width-w.ruled), m.sheet.Settled.Render(text.Pad(text.Cut(r.Ruled, w.ruled-1, s.Ellipsis), w.ruled-1)), m.width, "")
	}
	return line
}

// tail and head keep as much of s as can matter in width columns, so that a very
// long paragraph is not measured as a whole for every line.
func tail(s string, width int) string {
	if n := len(s) - 16*width; n > 0 {
		for n < len(s) && s[n]&0xc0 == 0x80 {
			n++
		}
		return s[n:]
	}
	return s
}

func head(s string, width int) string {
	if n := 16 * width; n < len(s) {
		for n > 0 && s[n]&0xc0 == 0x80 {
			n--
		}
		return s[:n]
	}
	return s
}
