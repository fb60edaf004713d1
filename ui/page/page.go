// Package page is a full page that scrolls: the help, or a paragraph in full.
package page

import (
	"strings"

	"github.com/charmbracelet/bubbles/key"
	"github.com/charmbracelet/bubbles/viewport"
	tea "github.com/charmbracelet/bubbletea"

	"emendary/ui/style"
	"emendary/ui/text"
)

// KeyMap is the keys of a page.
type KeyMap struct {
	Up, Down, PageUp, PageDown, Close key.Binding
}

// Keys returns the keys with their help.
func Keys() KeyMap {
	return KeyMap{
		Down:     key.NewBinding(key.WithKeys("j", "down"), key.WithHelp("j ↓", "line down")),
		Up:       key.NewBinding(key.WithKeys("k", "up"), key.WithHelp("k ↑", "line up")),
		PageDown: key.NewBinding(key.WithKeys("l", " ", "right", "pgdown"), key.WithHelp("l → space", "page down")),
		PageUp:   key.NewBinding(key.WithKeys("h", "left", "pgup"), key.WithHelp("h ←", "page up")),
		Close:    key.NewBinding(key.WithKeys("esc", "q", "?", "o", "enter"), key.WithHelp("esc enter", "back to the bench")),
	}
}

// ShortHelp returns what the footer shows.
func (k KeyMap) ShortHelp() []key.Binding {
	return []key.Binding{k.Close, k.Down, k.Up, k.PageDown, k.PageUp}
}

// FullHelp returns all keys.
func (k KeyMap) FullHelp() [][]key.Binding { return [][]key.Binding{k.ShortHelp()} }

// Model is the page on screen.
type Model struct {
	Keys  KeyMap
	sheet style.Sheet
	view  viewport.Model
}

// New returns an empty page.
func New(sheet style.Sheet) Model {
	return Model{Keys: Keys(), sheet: sheet, view: viewport.New(0, 0)}
}

// SetSize sets the columns and lines to draw in.
func (m *Model) SetSize(width, height int) { m.view.Width, m.view.Height = width, max(0, height) }

// Show puts lines on the page, line at among those in sight.
func (m *Model) Show(lines []string, at int) {
	m.view.SetContent(strings.Join(lines, "\n"))
	m.view.SetYOffset(max(0, at-m.view.Height/2))
}

// Update scrolls. Closing is the caller's business.
func (m Model) Update(msg tea.Msg) (Model, tea.Cmd) {
	if k, ok := msg.(tea.KeyMsg); ok {
		switch {
		case key.Matches(k, m.Keys.Down):
			m.view.ScrollDown(1)
		case key.Matches(k, m.Keys.Up):
			m.view.ScrollUp(1)
		case key.Matches(k, m.Keys.PageDown):
			m.view.PageDown()
		case key.Matches(k, m.Keys.PageUp):
			m.view.PageUp()
		}
	}
	return m, nil
}

// Rest returns how many lines are still below the page.
func (m Model) Rest() int {
	return max(0, m.view.TotalLineCount()-m.view.YOffset-m.view.Height)
}

// View returns the lines in sight.
func (m Model) View() string {
	lines := strings.Split(m.view.View(), "\n")
	return strings.Join(text.Fit(lines, m.view.Width, m.view.Height), "\n")
}
