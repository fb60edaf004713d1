package ui

import (
	"fmt"
	"slices"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"emendary/internal/ledger"
)

// pressBench takes the keys of the bench itself.
func (m *Model) pressBench(k tea.KeyMsg) tea.Cmd {
	if k.Paste {
		m.warn("pasted text is taken in a line only: press ; / or a first")
		return nil
	}
	m.say("")
	switch {
	case key.Matches(k, m.Keys.Quit):
		return tea.Quit
	case key.Matches(k, m.Keys.Help):
		m.openHelp()
	case key.Matches(k, m.Keys.Find):
		m.openFinder()
	case key.Matches(k, m.Keys.Undo):
		return m.undo()
	case key.Matches(k, m.Keys.Redo):
		return m.redo()
	case key.Matches(k, m.Keys.Next):
		return m.moveBy(1, "this is the last entry")
	case key.Matches(k, m.Keys.Previous):
		return m.moveBy(-1, "this is the first entry")
	case key.Matches(k, m.Keys.NextOpen):
		return m.move(m.openAfter(m.index()))
	case key.Matches(k, m.Keys.Order):
		return m.turnOrder()
	case key.Matches(k, m.Keys.Adapt):
		return m.adapt()
	case m.screen == onFinished:
	default:
		if cmd, taken := m.pressPassage(k); taken {
			return cmd
		}
		return m.pressRuling(k)
	}
	return nil
}

// pressRuling takes the rulings on the entry, and what its parts do.
func (m *Model) pressRuling(k tea.KeyMsg) tea.Cmd {
	switch {
	case key.Matches(k, m.Keys.Accept):
		return m.accept("")
	case key.Matches(k, m.Keys.Stand):
		return m.stand()
	case key.Matches(k, m.Keys.Add):
		m.openAddition()
	case key.Matches(k, m.Keys.Query):
		m.openQuery(ledger.Query)
	case key.Matches(k, m.Keys.Later):
		return m.later()
	case key.Matches(k, m.Keys.Correct):
		m.openCorrection()
	case key.Matches(k, m.Keys.Focus):
		m.nextFocus()
	default:
		m.pressPart(k)
	}
	return nil
}

// pressPart takes the keys of the part in focus.
func (m *Model) pressPart(k tea.KeyMsg) {
	switch m.focus {
	case onAlignment:
		if key.Matches(k, m.Keys.Actions) {
			m.open(onActions)
			m.action = 0
			return
		}
		before := m.alignment.Cursor()
		m.alignment, _ = m.alignment.Update(k)
		if m.alignment.Cursor() != before {
			m.showRelated()
		}
	case onConcordance:
		if key.Matches(k, m.concordance.Keys.Open) {
			m.openParagraph()
			return
		}
		before := m.concordance.Cursor()
		m.concordance, _ = m.concordance.Update(k)
		if m.concordance.Cursor() != before {
			m.showPassage()
			m.sayResult()
		}
	case onRelated:
		before := slices.Clone(m.related.Rows())
		m.related, _ = m.related.Update(k)
		for i, r := range m.related.Rows() {
			if r.Checked != before[i].Checked {
				m.work(m.entry).kin[m.kin[i].Entry] = r.Checked
			}
		}
	}
}

func (m *Model) nextFocus() {
	switch f := m.focus; {
	case f == onAlignment:
		m.setFocus(onConcordance)
	case f == onConcordance && len(m.kin) > 0:
		m.setFocus(onRelated)
	default:
		m.setFocus(onAlignment)
	}
}

// pressActions takes the keys of the strip; a key that is none of them closes it
// and does what it always does.
func (m *Model) pressActions(k tea.KeyMsg) tea.Cmd {
	n := len(m.actions())
	switch {
	case key.Matches(k, m.Strip.Left):
		m.action = (m.action + n - 1) % n
	case key.Matches(k, m.Strip.Right):
		m.action = (m.action + 1) % n
	case key.Matches(k, m.Strip.Close):
		m.open(onBench)
	case key.Matches(k, m.Strip.Do):
		m.open(onBench)
		return m.pressBench(keyOf(m.actions()[m.action]))
	default:
		m.open(onBench)
		return m.pressBench(k)
	}
	return nil
}

// keyOf returns the key press that a binding answers to first.
func keyOf(b key.Binding) tea.KeyMsg {
	return tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune(b.Keys()[0])}
}

func (m *Model) pressFinder(k tea.KeyMsg) tea.Cmd {
	switch {
	case key.Matches(k, m.finder.Keys.Leave):
		m.open(m.behind)
	case key.Matches(k, m.finder.Keys.Show):
		form := m.finder.Selected()
		if form == "" {
			return nil
		}
		e := m.docket.Find(form)
		if e == nil {
			m.open(m.behind)
			m.warn(fmt.Sprintf("the manuscript has no %s that could be ruled on", m.visible(form)))
			return nil
		}
		return m.move(e)
	default:
		var cmd tea.Cmd
		m.finder, cmd = m.finder.Update(k)
		return cmd
	}
	return nil
}

func (m *Model) pressCorrection(k tea.KeyMsg) tea.Cmd {
	value := m.correction.Value()
	switch {
	case key.Matches(k, m.correction.Keys.Leave):
		m.open(onBench)
		m.layRows(0)
		m.showRelated()
	case key.Matches(k, m.correction.Keys.Accept), key.Matches(k, m.correction.Keys.Query):
		switch {
		case value == "":
			m.warn("type what should stand there, or esc to go back")
		case value == m.entry.Form:
			m.warn("that is the form as it stands: esc, then d, lets it stand")
		case key.Matches(k, m.correction.Keys.Query):
			m.typed = value
			m.openQuery(ledger.Accept)
		default:
			return m.accept(value)
		}
	default:
		m.say("")
		m.correction = m.correction.Update(k)
		m.layRows(0)
		m.showRelated()
	}
	return nil
}

func (m *Model) pressAddition(k tea.KeyMsg) tea.Cmd {
	switch {
	case key.Matches(k, m.addition.Keys.Leave):
		m.open(onBench)
	case key.Matches(k, m.addition.Keys.Query):
		m.openQuery(ledger.Add)
	case m.addition.Takes(k):
		return m.add()
	default:
		m.addition = m.addition.Update(k)
	}
	return nil
}

func (m *Model) pressQuery(k tea.KeyMsg) tea.Cmd {
	switch {
	case key.Matches(k, m.query.Keys.Leave):
		m.open(m.asking)
	case key.Matches(k, m.query.Keys.Ask):
		if m.query.Value() == "" {
			m.warn("type the question, or esc to go back")
			return nil
		}
		return m.ask()
	default:
		m.query = m.query.Update(k)
	}
	return nil
}

func (m *Model) pressFailure(k tea.KeyMsg) tea.Cmd {
	switch {
	case key.Matches(k, m.Failure.Quit):
		return tea.Quit
	case key.Matches(k, m.Failure.Retry):
		return m.send(m.batch.again())
	case key.Matches(k, m.Failure.Drop):
		m.batch = nil
		m.goTo(m.entry)
		m.say("nothing was ruled; the entry is as it was")
	}
	return nil
}
