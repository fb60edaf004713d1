// Package alignment is the centre of the bench: the form's letters as column
// heads, each candidate a row under them, and the row under the cursor spelt out
// with proof-correction marks.
//
// A dot stands where a candidate agrees with the form and the letter where it
// departs, so one look down a column shows which letter is in doubt. The part
// draws what it is given; it neither searches nor aligns.
package alignment

import (
	"slices"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"emendary/align"
	"emendary/ui/style"
)

// Row is a candidate laid against the form.
type Row struct {
	Text      string   // what would stand in the form's place
	Letters   []string // its letters, as written
	Alignment align.Alignment
	Cost      float64 // of the edits
	Share     float64 // of all candidates, 0 to 1
	Priced    bool    // Cost and Share are known: a word that was typed has none
	Remark    string
	Why       string // why it comes so far forward, if there is a reason to say
}

// KeyMap is the keys of the alignment.
type KeyMap struct {
	Up, Down key.Binding
}

// Keys returns the keys with their help.
func Keys() KeyMap {
	return KeyMap{
		Down: key.NewBinding(key.WithKeys("j", "down"), key.WithHelp("j ↓", "next candidate")),
		Up:   key.NewBinding(key.WithKeys("k", "up"), key.WithHelp("k ↑", "previous candidate")),
	}
}

// ShortHelp returns what the footer shows.
func (k KeyMap) ShortHelp() []key.Binding { return []key.Binding{k.Down, k.Up} }

// FullHelp returns all keys.
func (k KeyMap) FullHelp() [][]key.Binding { return [][]key.Binding{{k.Down, k.Up}} }

// Model is the alignment on screen.
type Model struct {
	Keys          KeyMap
	sheet         style.Sheet
	form          []string
	rows          []Row
	grid          align.Grid
	note          string
	inBits        bool // costs are in bits, not in edits
	stet          bool // the form was let stand: spelt out until the cursor moves
	cursor        int
	width, height int
}

// New returns an empty alignment.
func New(sheet style.Sheet) Model { return Model{Keys: Keys(), sheet: sheet} }

// InBits says that costs are in bits.
func (m *Model) InBits() { m.inBits = true }

// SetSize sets the columns and lines to draw in.
func (m *Model) SetSize(width, height int) { m.width, m.height = width, height }

// Lay shows rows under the letters of form, the cursor on the first of them.
func (m *Model) Lay(form []string, rows []Row) {
	m.form, m.rows, m.note, m.stet, m.cursor = form, rows, "", false, 0
	alignments := make([]align.Alignment, len(rows))
	for i, r := range rows {
		alignments[i] = r.Alignment
	}
	m.grid = align.Star(make([]align.Letter, len(form)), alignments)
}

// Note shows why there are no candidates, in their place.
func (m *Model) Note(form []string, note string) {
	m.Lay(form, nil)
	m.note = note
}

// Stet spells the form out as let stand, until the cursor moves.
func (m *Model) Stet() { m.stet = true }

// Move puts the cursor on row i, or the nearest there is.
func (m *Model) Move(i int) { m.cursor = max(0, min(i, len(m.rows)-1)) }

// Cursor returns the index of the row under the cursor.
func (m Model) Cursor() int { return m.cursor }

// Selected returns the row under the cursor; ok is false where there is none.
func (m Model) Selected() (row Row, ok bool) {
	if m.cursor >= len(m.rows) {
		return Row{}, false
	}
	return m.rows[m.cursor], true
}

// Rows returns how many candidates there are.
func (m Model) Rows() int { return len(m.rows) }

// Update moves the cursor.
func (m Model) Update(msg tea.Msg) (Model, tea.Cmd) {
	if msg, ok := msg.(tea.KeyMsg); ok {
		m.stet = false
		switch {
		case key.Matches(msg, m.Keys.Down):
			m.Move(m.cursor + 1)
		case key.Matches(msg, m.Keys.Up):
			m.Move(m.cursor - 1)
		}
	}
	return m, nil
}

// departs reports whether cell c, whose letters are word, differs from the form
// in more than nothing: letters that agree may still differ in their capitals.
func (m Model) departs(c align.Cell, column align.Column, word []string) bool {
	if c.Op != align.Agreement {
		return true
	}
	return column.Form >= 0 && len(word) == 1 && word[0] != m.form[column.Form]
}

// written returns the letters of row r cell by cell as they are written; the
// grid itself holds them folded.
func (m Model) written(r int) [][]string {
	cells := m.grid.Rows[r]
	out := make([][]string, len(cells))
	left := m.rows[r].Letters
	for i, c := range cells {
		n := min(len(c.To), len(left))
		out[i], left = slices.Clip(left[:n]), left[n:]
	}
	return out
}
