package ui

import (
	"fmt"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"emendary/internal/docket"
	"emendary/ui/finder"
	"emendary/ui/line"
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
	case onActions:
		return m.pressActions(k)
	default:
		return m.pressBench(k)
	}
	return nil
}

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
	case m.screen == onFinished:
	case key.Matches(k, m.Keys.Accept):
		return m.accept("")
	case key.Matches(k, m.Keys.Stand):
		return m.stand()
	case key.Matches(k, m.Keys.Add):
		m.openAddition()
	case key.Matches(k, m.Keys.Query):
		m.openQuery(0)
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
		}
	case onRelated:
		m.related, _ = m.related.Update(k)
		for i, r := range m.related.Rows() {
			m.work(m.entry).kin[m.kin[i].Entry] = r.Checked
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
	n := len(m.Keys.actions())
	switch {
	case key.Matches(k, m.Strip.Left):
		m.action = (m.action + n - 1) % n
	case key.Matches(k, m.Strip.Right):
		m.action = (m.action + 1) % n
	case key.Matches(k, m.Strip.Close):
		m.open(onBench)
	case key.Matches(k, m.Strip.Do):
		m.open(onBench)
		return m.pressBench(keyOf(m.Keys.actions()[m.action]))
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
			m.openQuery(1)
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
		m.openQuery(-1)
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
		m.open(m.resting())
		m.say("nothing was ruled; the entry is as it was")
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

// open changes what takes the keys, and makes room for it.
func (m *Model) open(s screen) {
	m.screen = s
	m.layout()
}

// resting is the screen to return to where nothing else is going on.
func (m *Model) resting() screen {
	if m.entry == nil {
		return onFinished
	}
	return onBench
}

func (m *Model) openFinder() {
	m.behind = m.screen
	states := make(map[string]string, len(m.docket.Entries))
	for _, e := range m.docket.Entries {
		states[e.Form] = m.state(e)
	}
	var items []finder.Item
	for _, f := range m.docket.Forms() {
		items = append(items, finder.Item{Form: f.Form, Count: f.Count, State: states[f.Form]})
	}
	m.finder = finder.New(m.sheet, items)
	m.open(onFinder)
}

func (m *Model) openCorrection() {
	row, _ := m.alignment.Selected()
	m.correction = line.NewCorrection(m.sheet, m.entry.Form, row.Text)
	m.open(onCorrection)
}

func (m *Model) openAddition() {
	lists := []string{"book"}
	if m.session.Options.Series != "" {
		lists = append(lists, "series")
	}
	if m.session.Options.House != "" {
		lists = append(lists, "house")
	}
	m.addition = line.NewAddition(m.sheet, lists, m.lastList, m.kindFor)
	m.open(onAddition)
}

// kindFor returns the kind that was last put on a list; where there is none, a
// capital suggests a person.
func (m *Model) kindFor(list string) string {
	if kind, ok := m.lastKind[m.kindKey(list)]; ok {
		return kind
	}
	if capital(m.entry.Form) {
		return "person"
	}
	return "term"
}

func (m *Model) kindKey(list string) string {
	return fmt.Sprintf("%s %t", list, capital(m.entry.Form))
}

// openQuery opens the line for a query. with is what it goes with: 0 nothing, 1
// the typed correction, -1 the addition as it is set.
func (m *Model) openQuery(with int) {
	m.say("")
	m.asking = m.screen
	options := []string{"alone"}
	at := 0
	row, ok := m.alignment.Selected()
	switch {
	case with == 1:
		options = append(options, "with accept "+m.typed)
		at = 1
	case ok:
		m.typed = row.Text
		options = append(options, "with accept "+row.Text)
	default:
		m.typed = ""
	}
	options = append(options, "with let stand")
	if with == -1 {
		at = len(options)
		options = append(options, "with add to the "+m.addition.List.Chosen()+" list")
	}
	m.query = line.NewQuery(m.sheet, m.lastWhom, options, at)
	m.open(onQuery)
}

func (m *Model) openParagraph() {
	m.behind = m.screen
	m.open(onParagraph)
	m.showParagraph()
}

// showParagraph puts the whole paragraph on the page, the form in sight.
func (m *Model) showParagraph() {
	p := m.passage
	p.SetSize(m.width, m.height)
	m.page.Show(p.Render(0, p.Lines()), p.FormLine())
}
