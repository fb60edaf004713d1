package line

import (
	"strings"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"emendary/ui/style"
	"emendary/ui/text"
)

// LanguageKeyMap is the keys of the line for a passage's language.
type LanguageKeyMap struct {
	Stand, Leave key.Binding
}

// LanguageKeys returns the keys with their help.
func LanguageKeys() LanguageKeyMap {
	return LanguageKeyMap{
		Stand: key.NewBinding(key.WithKeys("enter"), key.WithHelp("enter", "let it stand in this language, or in none named")),
		Leave: key.NewBinding(key.WithKeys("esc"), key.WithHelp("esc", "back")),
	}
}

// ShortHelp returns what the footer shows.
func (k LanguageKeyMap) ShortHelp() []key.Binding { return []key.Binding{k.Stand, k.Leave} }

// FullHelp returns all keys.
func (k LanguageKeyMap) FullHelp() [][]key.Binding { return [][]key.Binding{k.ShortHelp()} }

// Language is the line for a passage's language.
type Language struct {
	Keys  LanguageKeyMap
	sheet style.Sheet
	field Field
}

// NewLanguage returns a line that proposes a language; it may be "".
func NewLanguage(sheet style.Sheet, proposed string) Language {
	l := Language{Keys: LanguageKeys(), sheet: sheet, field: NewField(sheet)}
	l.field.Set(proposed)
	return l
}

// Value returns the language, without spaces at its ends.
func (l Language) Value() string { return strings.TrimSpace(l.field.Value()) }

// Update edits the line; letting stand and leaving are the caller's business.
func (l Language) Update(k tea.KeyMsg) Language {
	l.field = l.field.Update(k)
	return l
}

// View returns the line in width columns.
func (l Language) View(width int) []string {
	lead := " " + l.sheet.Title.Render("language") + "  "
	return []string{lead + l.field.View(width-text.Width(lead)-1)}
}
