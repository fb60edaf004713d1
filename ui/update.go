package ui

import (
	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"emendary/internal/docket"
	"emendary/ui/finder"
)

// nextKey lets the next held key act, once the screen has been drawn.
type nextKey struct{}

// Update takes a message. Keys join the end of the queue and act one a time.
func (m Model) Update(msg tea.Msg) (tea.Model, tea.Cmd) {
	var cmd tea.Cmd
	switch msg := msg.(type) {
	case begin:
		cmd = m.start()
	case tea.WindowSizeMsg:
		m.resize(msg.Width, msg.Height)
	case tea.KeyMsg:
		if m.breaks(msg) {
			return m, tea.Quit
		}
		m.held = append(m.held, split(msg)...)
	case nextKey:
		m.pumping = false
	case computed:
		m.take(msg)
		cmd = m.compute()
	case weighed:
		m.takeWeighed(msg)
		cmd = m.compute()
	case finder.Found:
		m.finder, cmd = m.finder.Update(msg)
	case written:
		cmd = m.settle(msg)
	}
	return m, tea.Batch(cmd, m.pump())
}

// breaks reports a second ctrl+c while the first still waits for a ruling to be
// written: then the bench is left at once.
func (m *Model) breaks(k tea.KeyMsg) bool {
	if !key.Matches(k, m.Keys.Break) {
		return false
	}
	for _, h := range m.held {
		if key.Matches(h, m.Keys.Break) {
			return true
		}
	}
	return false
}

// split takes runes that arrived together apart into the keys they are. A paste
// stays whole. Enter, typed before the program had set the terminal up, comes as a
// line feed.
func split(k tea.KeyMsg) []tea.KeyMsg {
	if k.Type == tea.KeyCtrlJ {
		k.Type = tea.KeyEnter
	}
	if k.Type != tea.KeyRunes || k.Paste || k.Alt && len(k.Runes) == 1 {
		return []tea.KeyMsg{k}
	}
	keys := make([]tea.KeyMsg, 0, len(k.Runes))
	for _, r := range k.Runes {
		one := tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune{r}}
		if r == ' ' {
			one.Type = tea.KeySpace
		}
		keys = append(keys, one)
	}
	return keys
}

// pump lets the first held key act unless it must wait; the next one has its turn
// in an Update of its own, after a View.
func (m *Model) pump() tea.Cmd {
	if m.pumping || len(m.held) == 0 || m.waits(m.held[0]) {
		return nil
	}
	k := m.held[0]
	m.held = m.held[1:]
	cmd := m.press(k)
	if len(m.held) > 0 {
		m.pumping = true
		cmd = tea.Batch(cmd, func() tea.Msg { return nextKey{} })
	}
	return cmd
}

// waits reports whether k needs something that is not on screen yet: the first
// screen, a ruling on disk, candidates, what a search finds.
func (m *Model) waits(k tea.KeyMsg) bool {
	if !m.begun || m.width == 0 || m.batch != nil && m.screen != onFailure {
		return true
	}
	switch m.screen {
	case onBench, onActions:
		free := key.Matches(k, m.Keys.Next, m.Keys.Previous, m.Keys.NextOpen, m.Keys.Find, m.Keys.Undo,
			m.Keys.Redo, m.Keys.Help, m.Keys.Quit, m.Keys.Focus, m.Keys.Later)
		return !free && !m.ready()
	case onFinder:
		keys := m.finder.Keys
		return m.finder.Searching() && key.Matches(k, keys.Show, keys.Up, keys.Down)
	}
	return false
}

// press routes a key to what takes it.
func (m *Model) press(k tea.KeyMsg) tea.Cmd {
	if m.tooSmall() && !key.Matches(k, m.Keys.Quit) {
		return nil
	}
	if m.screen != onFailure && key.Matches(k, m.Keys.Break) {
		return tea.Quit
	}
	switch m.screen {
	case onFailure:
		return m.pressFailure(k)
	case onHelp, onParagraph:
		if key.Matches(k, m.page.Keys.Close) {
			m.screen = m.behind
			return nil
		}
		m.page, _ = m.page.Update(k)
	case onFinder:
		return m.pressFinder(k)
	case onCorrection:
		return m.pressCorrection(k)
	case onAddition:
		return m.pressAddition(k)
	case onQuery:
		return m.pressQuery(k)
	case onLanguage:
		return m.pressLanguage(k)
	case onActions:
		return m.pressActions(k)
	default:
		return m.pressBench(k)
	}
	return nil
}

// moveBy goes n entries on, or says that there is none further.
func (m *Model) moveBy(n int, end string) tea.Cmd {
	e := m.step(n)
	if e == m.entry && e != nil {
		m.say(end)
	}
	return m.move(e)
}

// move puts e on screen and asks for what is not known about it yet.
func (m *Model) move(e *docket.Entry) tea.Cmd {
	if e == m.entry && e != nil && m.screen == onBench {
		return nil
	}
	m.goTo(e)
	return m.compute()
}
