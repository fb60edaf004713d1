package ui

import (
	"context"
	"slices"
	"sync"

	tea "github.com/charmbracelet/bubbletea"

	"emendary/internal/docket"
	"emendary/internal/ledger"
)

// batch is rulings that are written together, and what follows once they are.
type batch struct {
	id      int
	rulings []ledger.Ruling
	said    func(*Model) string // the message that follows, once they are recorded
	then    *docket.Entry       // where to go; nil: to the next open entry
	write   func() error        // once: whoever calls it waits for the one outcome
}

// written says how the writing of batch id went.
type written struct {
	id  int
	err error
}

// again returns b ready to be written once more.
func (b *batch) again() *batch { return &batch{rulings: b.rulings, said: b.said, then: b.then} }

// send writes a batch beside the screen. Writing it again after a failure cannot
// double a ruling, since each has its ID already.
func (m *Model) send(b *batch) tea.Cmd {
	m.writes++
	b.id = m.writes
	ctx, write, rulings := context.WithoutCancel(m.ctx), m.opt.writer(m.session), b.rulings
	b.write = sync.OnceValue(func() error { return write(ctx, rulings...) })
	m.batch = b
	m.open(m.resting())
	id, run := b.id, b.write
	return func() tea.Msg { return written{id, run()} }
}

// settle records what is on disk and moves on, or says why nothing is.
func (m *Model) settle(w written) tea.Cmd {
	b := m.batch
	if b == nil || b.id != w.id {
		return nil
	}
	if w.err != nil {
		m.failure = w.err.Error() + m.dropHeld()
		m.open(onFailure)
		m.warn("not written, but kept: " + m.summary(b.rulings[0]))
		return nil
	}
	m.batch = nil
	grows := false
	for _, r := range b.rulings {
		grows = grows || r.Act == ledger.Add || r.Act == ledger.Undo
	}
	m.docket.Record(b.rulings...)
	m.forget()
	to := b.then
	if to == nil {
		to = m.openAfter(m.index())
	}
	if grows {
		m.grown()
	}
	m.goTo(to)
	m.say(b.said(m))
	if b.then == nil && to != nil && to.PutOff() {
		m.message += "; only entries put off are left"
	}
	return m.compute()
}

// dropHeld lets go of the keys typed after a ruling that could not be written:
// they were meant for other entries than the one on screen.
func (m *Model) dropHeld() string {
	n := len(m.held)
	m.held = nil
	if n == 0 {
		return ""
	}
	return " (" + count(n, "key") + " typed since not taken)"
}

// forget drops the checks of all entries, which rulings change; what has been
// seen stays seen.
func (m *Model) forget() {
	for _, w := range m.works {
		w.checked = nil
	}
}

// rule sends a ruling on the entry, with the same for the related forms that are
// checked. Where no citation is checked, accept has nothing to act on; what leaves
// the text as it is takes all open ones (Docket.Ruling). fill sets what the act
// needs; becomes is the word that takes the form's place, or the related form's.
func (m *Model) rule(act ledger.Act, fill func(r *ledger.Ruling, becomes string)) tea.Cmd {
	w := m.work(m.entry)
	lead := m.docket.Ruling(m.entry, act, w.checked, w.seen)
	if len(lead.Occurrences) == 0 {
		m.warn("no citation is checked: tab and space check some, d lets them stand")
		return nil
	}
	fill(&lead, m.typed)
	rulings := []ledger.Ruling{lead}
	if act == ledger.Accept || act == ledger.Reject || act == ledger.Add {
		for i, row := range m.related.Rows() {
			if r, ok := m.ruleRelated(m.kin[i], row.Checked, act, fill); ok {
				r.With = lead.ID
				r.Query, r.To = "", "" // it is asked once
				rulings = append(rulings, r)
			}
		}
	}
	return m.send(&batch{rulings: rulings, said: func(m *Model) string { return m.told(rulings) }})
}

// ruleRelated rules on a related form if it is checked and has something to rule on.
func (m *Model) ruleRelated(k docket.Related, checked bool, act ledger.Act, fill func(*ledger.Ruling, string)) (ledger.Ruling, bool) {
	if !checked || act == ledger.Accept && k.Text == "" {
		return ledger.Ruling{}, false
	}
	checks := m.docket.Checked(k.Entry)
	if !slices.Contains(checks, true) {
		return ledger.Ruling{}, false
	}
	r := m.docket.Ruling(k.Entry, act, checks, m.work(k.Entry).seen)
	fill(&r, k.Text)
	return r, true
}

// accept emends the checked citations to word; "" means the candidate under the cursor.
func (m *Model) accept(word string) tea.Cmd { return m.acceptAsking(word, "", "") }

func (m *Model) acceptAsking(word, query, to string) tea.Cmd {
	if word == "" {
		row, ok := m.alignment.Selected()
		if !ok {
			m.warn("there is no candidate to accept: ; corrects, d lets the form stand")
			return nil
		}
		word = row.Text
	}
	m.typed = word
	return m.rule(ledger.Accept, func(r *ledger.Ruling, becomes string) {
		r.Word, r.Query, r.To = becomes, query, to
	})
}

func (m *Model) stand() tea.Cmd { return m.standAsking("", "") }

func (m *Model) standAsking(query, to string) tea.Cmd {
	return m.rule(ledger.Reject, func(r *ledger.Ruling, _ string) { r.Query, r.To = query, to })
}

func (m *Model) add() tea.Cmd { return m.addAsking("", "") }

func (m *Model) addAsking(query, to string) tea.Cmd {
	list, kind, note := m.addition.List.Chosen(), m.addition.Kind.Chosen(), m.addition.Note()
	m.lastList = list
	m.lastKind[m.kindKey(list)] = kind
	return m.rule(ledger.Add, func(r *ledger.Ruling, _ string) {
		r.List, r.Kind, r.Note, r.Query, r.To = list, kind, note, query, to
	})
}

// ask writes the query alone, or with the ruling it goes with.
func (m *Model) ask() tea.Cmd {
	question, to := m.query.Value(), m.query.Whom.Chosen()
	m.lastWhom = to
	switch m.companions[m.query.With.At] {
	case ledger.Accept:
		return m.acceptAsking(m.typed, question, to)
	case ledger.Reject:
		return m.standAsking(question, to)
	case ledger.Add:
		return m.addAsking(question, to)
	}
	return m.rule(ledger.Query, func(r *ledger.Ruling, _ string) { r.Query, r.To = question, to })
}

func (m *Model) later() tea.Cmd {
	if !m.entry.Open() {
		m.warn("this entry is ruled on: u undoes the latest ruling, another ruling takes its place")
		return nil
	}
	return m.rule(ledger.Later, func(*ledger.Ruling, string) {})
}

// undo takes back the newest ruling in force and all that were made with it.
func (m *Model) undo() tea.Cmd {
	last, _ := m.docket.Last()
	if last == nil {
		m.warn("there is no ruling to undo")
		return nil
	}
	return m.send(&batch{
		rulings: []ledger.Ruling{m.docket.Undo(*last)}, then: m.entryOf(*last),
		said: func(m *Model) string { return "undone: " + m.summary(*last) },
	})
}

// redo takes back the newest undo.
func (m *Model) redo() tea.Cmd {
	_, undo := m.docket.Last()
	if undo == nil {
		m.warn("there is nothing to redo")
		return nil
	}
	return m.send(&batch{
		rulings: []ledger.Ruling{m.docket.Undo(*undo)}, then: m.entryOf(*undo),
		said: func(m *Model) string {
			for _, r := range m.docket.Rulings() {
				if r.ID == undo.Undoes {
					return "redone: " + m.summary(r)
				}
			}
			return "redone"
		},
	})
}
