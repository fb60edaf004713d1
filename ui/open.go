package ui

import (
	"fmt"
	"slices"

	"emendary/internal/ledger"
	"emendary/ui/finder"
	"emendary/ui/line"
)

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

// openQuery opens the line for a query: alone, or with one of the rulings that
// can be made on the entry as things stand. with is the one it starts with.
func (m *Model) openQuery(with ledger.Act) {
	m.say("")
	m.asking = m.screen
	if m.screen != onCorrection {
		row, _ := m.alignment.Selected()
		m.typed = row.Text
	}
	m.companions = []ledger.Act{ledger.Query}
	options := []string{"alone"}
	offer := func(act ledger.Act, label string) {
		m.companions = append(m.companions, act)
		options = append(options, label)
	}
	if m.typed != "" {
		offer(ledger.Accept, "with accept "+m.typed)
	}
	offer(ledger.Reject, "with let stand")
	if m.screen == onAddition {
		offer(ledger.Add, "with add to the "+m.addition.List.Chosen()+" list")
	}
	m.query = line.NewQuery(m.sheet, m.lastWhom, options, max(0, slices.Index(m.companions, with)))
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
