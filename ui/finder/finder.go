// Package finder finds a form of the manuscript by fuzzy match, ruled on or not,
// listed or not, so that any of them can be ruled on or ruled on again.
package finder

import (
	"cmp"
	"fmt"
	"slices"
	"strings"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"
	"github.com/sahilm/fuzzy"

	"emendary/ui/line"
	"emendary/ui/style"
	"emendary/ui/text"
)

// Item is a form that can be found.
type Item struct {
	Form  string
	Count int
	State string // "open", "listed", or what was ruled on it
}

// KeyMap is the keys of the finder.
type KeyMap struct {
	Show, Up, Down, Leave key.Binding
}

// Keys returns the keys with their help.
func Keys() KeyMap {
	return KeyMap{
		Show:  key.NewBinding(key.WithKeys("enter"), key.WithHelp("enter", "show the form")),
		Down:  key.NewBinding(key.WithKeys("down", "tab", "ctrl+n"), key.WithHelp("tab ↓", "next form")),
		Up:    key.NewBinding(key.WithKeys("up", "shift+tab", "ctrl+p"), key.WithHelp("↑", "previous form")),
		Leave: key.NewBinding(key.WithKeys("esc"), key.WithHelp("esc", "back")),
	}
}

// ShortHelp returns what the footer shows.
func (k KeyMap) ShortHelp() []key.Binding { return []key.Binding{k.Show, k.Down, k.Up, k.Leave} }

// FullHelp returns all keys.
func (k KeyMap) FullHelp() [][]key.Binding { return [][]key.Binding{k.ShortHelp()} }

// Found is the answer to a search: the items that match, best first. ID says
// which search it answers, so that a stale answer is dropped.
type Found struct {
	ID      int
	Matches []int // indexes of items
	Total   int
}

// most is how many matches are kept: nobody scrolls further, typing on is quicker.
const most = 500

// Model is the finder on screen.
type Model struct {
	Keys          KeyMap
	sheet         style.Sheet
	field         line.Field
	items         []Item
	found         Found
	id            int // of the latest search
	cursor        int
	width, height int
}

// New returns a finder over items, all of them found.
func New(sheet style.Sheet, items []Item) Model {
	m := Model{Keys: Keys(), sheet: sheet, field: line.NewField(sheet), items: items}
	m.found = search(0, "", items)
	return m
}

// SetSize sets the columns and lines to draw in.
func (m *Model) SetSize(width, height int) { m.width, m.height = width, height }

// Searching reports whether the list on screen answers an older question than
// the one typed.
func (m Model) Searching() bool { return m.found.ID != m.id }

// Selected returns the form under the cursor; "" where nothing is found.
func (m Model) Selected() string {
	if m.cursor >= len(m.found.Matches) {
		return ""
	}
	return m.items[m.found.Matches[m.cursor]].Form
}

// Update edits the pattern, moves, and takes in what was found. The search itself
// is the command it returns.
func (m Model) Update(msg tea.Msg) (Model, tea.Cmd) {
	switch msg := msg.(type) {
	case Found:
		if msg.ID == m.id {
			m.found, m.cursor = msg, 0
		}
	case tea.KeyMsg:
		switch {
		case key.Matches(msg, m.Keys.Down):
			m.cursor = min(m.cursor+1, max(0, len(m.found.Matches)-1))
		case key.Matches(msg, m.Keys.Up):
			m.cursor = max(m.cursor-1, 0)
		default:
			before := m.field.Value()
			m.field = m.field.Update(msg)
			if pattern := m.field.Value(); pattern != before {
				m.id++
				id, items := m.id, m.items
				return m, func() tea.Msg { return search(id, pattern, items) }
			}
		}
	}
	return m, nil
}

// search matches pattern against all items in O(n·m) and sorts what it finds;
// exact matches come first.
func search(id int, pattern string, items []Item) Found {
	f := Found{ID: id, Total: len(items)}
	pattern = plain(strings.TrimSpace(pattern))
	if pattern == "" {
		for i := range min(len(items), most) {
			f.Matches = append(f.Matches, i)
		}
		return f
	}
	matches := fuzzy.FindFrom(pattern, source(items))
	f.Total = len(matches)
	slices.SortStableFunc(matches, func(a, b fuzzy.Match) int {
		return cmp.Compare(likeness(b.Str, pattern), likeness(a.Str, pattern))
	})
	for _, m := range matches[:min(len(matches), most)] {
		f.Matches = append(f.Matches, m.Index)
	}
	return f
}

// likeness puts the form that was typed, letter for letter, before the same with
// other capitals, and both before what is merely similar.
func likeness(form, pattern string) int {
	switch {
	case form == pattern:
		return 2
	case strings.EqualFold(form, pattern):
		return 1
	}
	return 0
}

// plain returns s with straight apostrophes and the common hyphen: whichever was
// typed finds either.
func plain(s string) string {
	return strings.NewReplacer("’", "'", "‘", "'", "‐", "-", "‑", "-").Replace(s)
}

type source []Item

func (s source) String(i int) string { return plain(s[i].Form) }
func (s source) Len() int            { return len(s) }

// View returns the pattern and the forms found, in the lines it was given.
func (m Model) View() string {
	s := m.sheet.Signs
	lead := " " + m.sheet.Title.Render("find a form") + "  "
	head := lead + m.field.View(max(0, m.width-text.Width(lead)-24))
	count := fmt.Sprintf("%d of %d forms ", m.found.Total, len(m.items))
	if m.Searching() {
		count = "searching " + s.Ellipsis + " "
	}
	lines := []string{text.Ends(head, m.sheet.Quiet.Render(count), m.width, s.Ellipsis), ""}
	room := max(1, m.height-2)
	from := max(0, min(m.cursor-room/2, len(m.found.Matches)-room))
	wide := 12
	to := min(len(m.found.Matches), from+room)
	for _, i := range m.found.Matches[from:to] {
		wide = max(wide, min(text.Width(m.visible(m.items[i].Form)), m.width/2))
	}
	for k := from; k < to; k++ {
		item := m.items[m.found.Matches[k]]
		form := text.Pad(text.Cut(m.visible(item.Form), wide, s.Ellipsis), wide)
		cursor := "   "
		if k == m.cursor {
			cursor = text.Pad(" "+m.sheet.Cursor.Render(s.Cursor), 3)
			form = m.sheet.Cursor.Render(form)
		}
		lines = append(lines, cursor+form+text.PadLeft(fmt.Sprint(item.Count), 7)+"   "+m.sheet.Quiet.Render(m.visible(item.State)))
	}
	if to == 0 {
		lines = append(lines, m.sheet.Quiet.Render("   no form of the manuscript matches"))
	}
	return strings.Join(text.Fit(lines, m.width, m.height), "\n")
}

func (m Model) visible(v string) string { return text.Visible(v, m.sheet.Signs.ASCII) }
