package line

import (
	"strings"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"emendary/ui/style"
	"emendary/ui/text"
)

// Kinds are the kinds a word may have on a list, the usual ones of a style sheet.
func Kinds() []string {
	return []string{"person", "place", "vessel", "title", "term", "coinage", "dialect", "foreign", "abbreviation", "word"}
}

// AdditionKeyMap is the keys of the line that puts a form on a list.
type AdditionKeyMap struct {
	Add, Up, Down, Left, Right, Query, Leave key.Binding
}

// AdditionKeys returns the keys with their help. While the note is typed, letters
// are letters: only enter adds, and the arrows move.
func AdditionKeys() AdditionKeyMap {
	return AdditionKeyMap{
		Add:   key.NewBinding(key.WithKeys("enter", "s"), key.WithHelp("s enter", "add")),
		Left:  key.NewBinding(key.WithKeys("left", "h"), key.WithHelp("h ←", "left")),
		Right: key.NewBinding(key.WithKeys("right", "l"), key.WithHelp("l →", "right")),
		Down:  key.NewBinding(key.WithKeys("down", "j"), key.WithHelp("j ↓", "list, kind, note")),
		Up:    key.NewBinding(key.WithKeys("up", "k"), key.WithHelp("k ↑", "back up")),
		Query: key.NewBinding(key.WithKeys("tab"), key.WithHelp("tab", "add with a query")),
		Leave: key.NewBinding(key.WithKeys("esc"), key.WithHelp("esc", "back")),
	}
}

// ShortHelp returns what the footer shows.
func (k AdditionKeyMap) ShortHelp() []key.Binding {
	return []key.Binding{k.Add, k.Left, k.Right, k.Down, k.Up, k.Query, k.Leave}
}

// FullHelp returns all keys.
func (k AdditionKeyMap) FullHelp() [][]key.Binding { return [][]key.Binding{k.ShortHelp()} }

// Addition is the line that puts a form on a list: which list, which kind, and a note.
type Addition struct {
	Keys       AdditionKeyMap
	List, Kind Choice
	sheet      style.Sheet
	note       Field
	row        int // 0 list, 1 kind, 2 note
	kindOf     func(list string) string
}

// NewAddition returns the line for the lists that are on, the cursor on the kind.
// kindOf names the kind that a list starts with.
func NewAddition(sheet style.Sheet, lists []string, list string, kindOf func(list string) string) Addition {
	a := Addition{
		Keys: AdditionKeys(), sheet: sheet, note: NewField(sheet), row: 1, kindOf: kindOf,
		List: Choice{Name: "list", Options: lists}, Kind: Choice{Name: "kind", Options: Kinds()},
	}
	a.List.Choose(list)
	a.Kind.Choose(kindOf(a.List.Chosen()))
	return a
}

// Note returns the note, without spaces at its ends.
func (a Addition) Note() string { return strings.TrimSpace(a.note.Value()) }

// Takes reports whether k adds: s is a letter while the note is typed.
func (a Addition) Takes(k tea.KeyMsg) bool {
	return key.Matches(k, a.Keys.Add) && (a.row < 2 || k.Type != tea.KeyRunes)
}

// Update moves, chooses and edits; adding and leaving are the caller's business.
func (a Addition) Update(k tea.KeyMsg) Addition {
	if a.row == 2 {
		if k.Type == tea.KeyUp {
			a.row = 1
		} else {
			a.note = a.note.Update(k)
		}
		return a
	}
	c := &a.List
	if a.row == 1 {
		c = &a.Kind
	}
	switch {
	case key.Matches(k, a.Keys.Up):
		a.row = max(0, a.row-1)
	case key.Matches(k, a.Keys.Down):
		a.row++
	case key.Matches(k, a.Keys.Left):
		c.Step(-1)
	case key.Matches(k, a.Keys.Right):
		c.Step(1)
	}
	if a.row == 0 && (key.Matches(k, a.Keys.Left) || key.Matches(k, a.Keys.Right)) {
		a.Kind.Choose(a.kindOf(a.List.Chosen()))
	}
	return a
}

// View returns three lines in width columns.
func (a Addition) View(width int) []string {
	lead := "  "
	note := text.Visible(a.note.Value(), a.sheet.Signs.ASCII)
	if a.row == 2 {
		lead = text.Pad(" "+a.sheet.Cursor.Render(a.sheet.Signs.Cursor), 2)
		note = a.note.View(width - 16)
	}
	return []string{
		a.List.view(a.sheet, width, a.row == 0),
		a.Kind.view(a.sheet, width, a.row == 1),
		text.Cut(lead+text.Pad(a.sheet.Title.Render("note"), 13)+note, width, a.sheet.Signs.Ellipsis),
	}
}
