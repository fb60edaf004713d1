package line

import (
	"strings"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"emendary/ui/style"
	"emendary/ui/text"
)

// CorrectionKeyMap is the keys of the line for one's own correction.
type CorrectionKeyMap struct {
	Accept, Query, Form, Candidate, Leave key.Binding
}

// CorrectionKeys returns the keys with their help.
func CorrectionKeys() CorrectionKeyMap {
	return CorrectionKeyMap{
		Accept:    key.NewBinding(key.WithKeys("enter"), key.WithHelp("enter", "accept it")),
		Query:     key.NewBinding(key.WithKeys("tab"), key.WithHelp("tab", "accept it with a query")),
		Form:      key.NewBinding(key.WithKeys("up"), key.WithHelp("↑", "start from the form")),
		Candidate: key.NewBinding(key.WithKeys("down"), key.WithHelp("↓", "start from the candidate")),
		Leave:     key.NewBinding(key.WithKeys("esc"), key.WithHelp("esc", "back")),
	}
}

// ShortHelp returns what the footer shows.
func (k CorrectionKeyMap) ShortHelp() []key.Binding {
	return []key.Binding{k.Accept, k.Query, k.Form, k.Candidate, k.Leave}
}

// FullHelp returns all keys.
func (k CorrectionKeyMap) FullHelp() [][]key.Binding { return [][]key.Binding{k.ShortHelp()} }

// Correction is the line for a correction of one's own.
type Correction struct {
	Keys            CorrectionKeyMap
	sheet           style.Sheet
	field           Field
	form, candidate string
}

// NewCorrection returns an empty line for a form; candidate may be "".
func NewCorrection(sheet style.Sheet, form, candidate string) Correction {
	return Correction{Keys: CorrectionKeys(), sheet: sheet, field: NewField(sheet), form: form, candidate: candidate}
}

// Value returns the correction, without spaces at its ends.
func (c Correction) Value() string { return strings.TrimSpace(c.field.Value()) }

// Update edits the line; accepting and leaving are the caller's business.
func (c Correction) Update(k tea.KeyMsg) Correction {
	switch {
	case key.Matches(k, c.Keys.Form):
		c.field.Set(c.form)
	case key.Matches(k, c.Keys.Candidate):
		c.field.Set(c.candidate)
	default:
		c.field = c.field.Update(k)
	}
	return c
}

// View returns the line in width columns.
func (c Correction) View(width int) []string {
	lead := " " + c.sheet.Title.Render("correction") + "  "
	return []string{lead + c.field.View(width-text.Width(lead)-1)}
}
