package ui

import (
	"fmt"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"emendary/internal/docket"
	"emendary/internal/ledger"
	"emendary/ui/line"
	"emendary/ui/text"
)

// onPassage reports whether the entry on screen is a passage.
func (m *Model) onPassage() bool { return m.entry != nil && m.entry.Kind == docket.Passage }

// pressPassage takes the keys that do something else on a passage than on a form;
// taken is false for all others.
func (m *Model) pressPassage(k tea.KeyMsg) (cmd tea.Cmd, taken bool) {
	switch {
	case key.Matches(k, m.Keys.Unfold) && !m.onPassage():
		m.warn("only a passage can be unfolded; this is one form")
	case key.Matches(k, m.Keys.Unfold):
		return m.rule(ledger.Unfold, func(*ledger.Ruling, string) {}), true
	case !m.onPassage():
		return nil, false
	case key.Matches(k, m.Keys.Stand, m.Keys.Add):
		m.language = line.NewLanguage(m.sheet, m.proposedLanguage())
		m.open(onLanguage)
	case key.Matches(k, m.Keys.Accept, m.Keys.Correct):
		m.warn("a passage stands (d) or is unfolded (p): its words are then ruled on one by one")
	default:
		return nil, false
	}
	return nil, true
}

// proposedLanguage returns the language last named, else the one whose words are
// known, if that is a single one.
func (m *Model) proposedLanguage() string {
	if with := m.session.Options.With; m.lastLanguage == "" && len(with) == 1 {
		return with[0].Name
	}
	return m.lastLanguage
}

func (m *Model) pressLanguage(k tea.KeyMsg) tea.Cmd {
	switch {
	case key.Matches(k, m.language.Keys.Leave):
		m.open(onBench)
	case key.Matches(k, m.language.Keys.Stand):
		language := m.language.Value()
		m.lastLanguage = language
		return m.rule(ledger.Reject, func(r *ledger.Ruling, _ string) { r.Kind = language })
	default:
		m.language = m.language.Update(k)
	}
	return nil
}

// notePassage says in the place of candidates what can be done with a passage.
func (m *Model) notePassage() {
	note := count(m.entry.Occurrences[0].Words, "word") + ", mostly unknown: d lets them stand, p unfolds them into single forms"
	m.alignment.Note(nil, note)
}

// named is a form as messages give it: a passage by its first words.
func (m *Model) named(form string) string {
	const most = 40
	return text.Cut(m.visible(form), most, m.sheet.Signs.Ellipsis)
}

// rulingKeys are the rulings that can be made on the entry on screen.
func (m *Model) rulingKeys() []key.Binding {
	k := m.Keys
	if m.onPassage() {
		return []key.Binding{k.Stand, k.Unfold, k.Query, k.Later, k.Undo, k.Redo}
	}
	return k.rulings()
}

// actions are what the strip of actions offers, the commonest first.
func (m *Model) actions() []key.Binding {
	k := m.Keys
	return append(m.rulingKeys(), k.NextOpen, k.Find, k.Order, k.Help, k.Quit)
}

// standsAs says that a form stands, and in which language.
func (m *Model) standsAs(r ledger.Ruling) string {
	s := m.named(r.Form) + " stands"
	if r.Kind != "" {
		s += fmt.Sprintf(" as %s", m.visible(r.Kind))
	}
	return s
}
