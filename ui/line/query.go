package line

import (
	"strings"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"emendary/ui/style"
	"emendary/ui/text"
)

// Addressees are whom a query may ask.
func Addressees() []string { return []string{"author", "publisher", "self"} }

// QueryKeyMap is the keys of the line for a query.
type QueryKeyMap struct {
	Ask, Whom, With, Leave key.Binding
}

// QueryKeys returns the keys with their help.
func QueryKeys() QueryKeyMap {
	return QueryKeyMap{
		Ask:   key.NewBinding(key.WithKeys("enter"), key.WithHelp("enter", "ask")),
		Whom:  key.NewBinding(key.WithKeys("tab", "up"), key.WithHelp("tab ↑", "whom")),
		With:  key.NewBinding(key.WithKeys("down", "shift+tab"), key.WithHelp("↓", "alone or with a ruling")),
		Leave: key.NewBinding(key.WithKeys("esc"), key.WithHelp("esc", "back")),
	}
}

// ShortHelp returns what the footer shows.
func (k QueryKeyMap) ShortHelp() []key.Binding {
	return []key.Binding{k.Ask, k.Whom, k.With, k.Leave}
}

// FullHelp returns all keys.
func (k QueryKeyMap) FullHelp() [][]key.Binding { return [][]key.Binding{k.ShortHelp()} }

// Query is the line for a query: the question, whom it asks, and whether it goes
// alone or with a ruling made in the same stroke, so that none waits unwritten.
type Query struct {
	Keys       QueryKeyMap
	Whom, With Choice
	sheet      style.Sheet
	field      Field
}

// NewQuery returns an empty line. with are the rulings it may go with, "alone" first.
func NewQuery(sheet style.Sheet, whom string, with []string, at int) Query {
	q := Query{
		Keys: QueryKeys(), sheet: sheet, field: NewField(sheet),
		Whom: Choice{Name: "to", Options: Addressees()}, With: Choice{Name: "goes", Options: with, At: at},
	}
	q.Whom.Choose(whom)
	return q
}

// Value returns the question, without spaces at its ends.
func (q Query) Value() string { return strings.TrimSpace(q.field.Value()) }

// Update chooses and edits; asking and leaving are the caller's business.
func (q Query) Update(k tea.KeyMsg) Query {
	switch {
	case key.Matches(k, q.Keys.Whom):
		q.Whom.Step(1)
	case key.Matches(k, q.Keys.With):
		q.With.Step(1)
	default:
		q.field = q.field.Update(k)
	}
	return q
}

// View returns three lines in width columns.
func (q Query) View(width int) []string {
	lead := text.Pad(" "+q.sheet.Cursor.Render(q.sheet.Signs.Cursor), 2) + text.Pad(q.sheet.Title.Render("query"), 13)
	return []string{
		lead + q.field.View(width-text.Width(lead)-1),
		q.Whom.view(q.sheet, width, false),
		q.With.view(q.sheet, width, false),
	}
}
