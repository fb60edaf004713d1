package ui

import (
	"context"
	"runtime"

	tea "github.com/charmbracelet/bubbletea"

	"emendary/internal/docket"
	"emendary/internal/ledger"
	"emendary/internal/manuscript"
	"emendary/ui/alignment"
	"emendary/ui/concordance"
	"emendary/ui/related"
	"emendary/ui/text"
)

// candidates is how many an entry gets, ahead how many entries are computed
// before they come on screen.
const (
	candidates = 10
	ahead      = 20
)

// work is what the bench knows of an entry and what the editor has set on it.
type work struct {
	asked   int // the lexicon's growth when the facts were asked for, from 1; 0 never
	facts   *facts
	shown   bool // it has been on screen
	checked []bool
	seen    []bool                 // citations that have been on screen
	kin     map[*docket.Entry]bool // checks of related forms that the editor has changed
}

// facts are what is computed about an entry, the searches beside the screen.
type facts struct {
	candidates []docket.Candidate
	parts      []int
	near       []docket.NearForm
	slip       float64
	err        error
}

// computed brings the facts of an entry, as the lexicon was at growth id.
type computed struct {
	id    int
	entry *docket.Entry
	facts facts
}

func (m *Model) work(e *docket.Entry) *work {
	w := m.works[e]
	if w == nil {
		w = &work{seen: make([]bool, len(e.Occurrences)), kin: make(map[*docket.Entry]bool)}
		m.works[e] = w
	}
	if w.checked == nil {
		w.checked = m.checks(e)
	}
	return w
}

// checks returns which occurrences start checked. On an entry that is ruled on
// as a whole they are those of its latest ruling, so that ruling again replaces it.
func (m *Model) checks(e *docket.Entry) []bool {
	checked := m.docket.Checked(e)
	rulings := e.Rulings()
	if e.Open() || len(rulings) == 0 {
		return checked
	}
	last := rulings[len(rulings)-1].ID
	for i, o := range e.Occurrences {
		checked[i] = o.Ruling != nil && o.Ruling.ID == last
	}
	return checked
}

// compute asks for the facts of the entry on screen, at once, and of the open ones
// that come after it, as many at a time as there are processors; then for what puts
// the rest in order.
func (m *Model) compute() tea.Cmd {
	var cmds []tea.Cmd
	ask := func(e *docket.Entry) bool {
		w := m.work(e)
		if w.facts != nil || w.asked == m.lexicon+1 {
			return true
		}
		if m.running >= runtime.GOMAXPROCS(0) && e != m.entry {
			return false
		}
		w.asked = m.lexicon + 1
		m.running++
		cmds = append(cmds, m.computeFacts(e))
		return true
	}
	more := true
	if m.entry != nil {
		more = ask(m.entry)
	}
	i := m.index()
	for n := 0; more && n < ahead; {
		if i++; i >= len(m.docket.Entries) {
			break
		}
		if e := m.docket.Entries[i]; e.Open() {
			n++
			more = ask(e)
		}
	}
	if more {
		cmds = append(cmds, m.weigh()...)
	}
	return tea.Batch(cmds...)
}

func (m *Model) computeFacts(e *docket.Entry) tea.Cmd {
	ctx, d, id := m.searching, m.docket, m.lexicon
	return func() tea.Msg {
		var f facts
		f.candidates, f.err = d.Candidates(ctx, e, candidates)
		f.near = d.Near(e)
		f.slip = d.SlipGiven(e, f.candidates)
		return computed{id, e, f}
	}
}

// take keeps the facts that a command brings, unless the lexicon has grown since
// they were asked for.
func (m *Model) take(c computed) {
	m.running--
	if c.id != m.lexicon {
		return
	}
	c.facts.parts = m.docket.Parts(c.entry)
	m.work(c.entry).facts = &c.facts
	if c.entry == m.entry {
		m.layRows(0)
		m.showRelated()
	}
}

// grown drops all facts: a word was added, or edits have other costs, so that other
// words are candidates now.
// Those of the entry on screen stay, lest rows change under the cursor. Searches
// under way end, so that they keep no processor from those that count.
func (m *Model) grown() {
	m.lexicon++
	m.stop()
	m.searching, m.stop = context.WithCancel(m.ctx)
	for e, w := range m.works {
		if e != m.entry {
			w.facts = nil
		}
	}
}

// ready reports whether the candidates of the entry are on screen.
func (m *Model) ready() bool { return m.entry == nil || m.work(m.entry).facts != nil }

// show lays the entry out over all parts of the bench.
func (m *Model) show() {
	e, w := m.entry, m.work(m.entry)
	w.shown = true
	settings := make([]string, len(e.Occurrences))
	first := -1
	for i, o := range e.Occurrences {
		settings[i] = string(m.setting(o))
		if w.checked[i] && first < 0 {
			first = i
		}
	}
	m.layout()
	m.concordance.Show(settings, func(i int) concordance.Row { return m.citation(e, i) }, w.checked, w.seen, max(0, first))
	m.showPassage()
	m.layRows(0)
	m.related.Top()
	m.showRelated()
}

// setting says where an occurrence stands, without building its citation.
func (m *Model) setting(o docket.Occurrence) manuscript.Setting {
	return m.docket.Document.Paragraphs[o.Paragraph].Words[o.Word].Setting
}

func (m *Model) citation(e *docket.Entry, i int) concordance.Row {
	c := m.docket.Citation(e, i)
	row := concordance.Row{Part: c.Part - m.firstChapter() + 1, Paragraph: c.Paragraph, Before: c.Before, Form: c.Form, After: c.After}
	if r := e.Occurrences[i].Ruling; r != nil {
		row.Ruled = m.ruled(*r)
	}
	return row
}

// showPassage shows the paragraph of the citation under the cursor.
func (m *Model) showPassage() {
	if len(m.entry.Occurrences) == 0 {
		m.passage.Show("", m.entry.Form, "")
		return
	}
	c := m.docket.Citation(m.entry, m.concordance.Cursor())
	m.passage.Show(c.Before, c.Form, c.After)
}

// layRows lays the candidates under the form, with a typed correction above
// them, and puts the cursor on row at.
func (m *Model) layRows(at int) {
	if m.onPassage() {
		m.notePassage()
		return
	}
	e, f := m.entry, m.work(m.entry).facts
	var form []string
	var rows []alignment.Row
	lay := func(word string) alignment.Row {
		letters, wordLetters, a := m.docket.Align(e.Form, word)
		alphabet := m.docket.Lexicon().Alphabet()
		row := alignment.Row{Text: word, Alignment: a}
		for _, l := range wordLetters {
			row.Letters = append(row.Letters, alphabet.Text(l))
		}
		if form == nil {
			for _, l := range letters {
				form = append(form, alphabet.Text(l))
			}
		}
		return row
	}
	if m.screen == onCorrection && m.correction.Value() != "" {
		row := lay(m.correction.Value())
		row.Remark = "typed"
		rows = append(rows, row)
	}
	if f != nil {
		for _, c := range f.candidates {
			row := lay(c.Text)
			row.Why = text.Visible(m.docket.Why(e.Form, c.Text), m.sheet.Signs.ASCII)
			row.Cost, row.Share, row.Priced, row.Remark = c.Cost, c.Share, true, text.Visible(c.Remark, m.sheet.Signs.ASCII)
			rows = append(rows, row)
		}
	}
	if len(rows) > 0 {
		m.alignment.Lay(form, rows)
		m.alignment.Move(at)
		if m.screen != onCorrection && m.stands(e) {
			m.alignment.Stet()
		}
		return
	}
	lay(e.Form)
	note := "computing candidates " + m.sheet.Signs.Ellipsis
	switch {
	case f != nil && f.err != nil:
		note = "the candidates could not be computed: " + text.Visible(f.err.Error(), m.sheet.Signs.ASCII)
	case f != nil:
		note = "no word is near this form: correct it yourself, let it stand, or add it"
	}
	m.alignment.Note(form, note)
}

// stands reports whether the latest ruling on e let its form stand.
func (m *Model) stands(e *docket.Entry) bool {
	rulings := e.Rulings()
	return len(rulings) > 0 && rulings[len(rulings)-1].Act == ledger.Reject
}

// showRelated shows the forms built on this one, with what they become once the
// row under the cursor is accepted.
func (m *Model) showRelated() {
	row, _ := m.alignment.Selected()
	m.kin = m.docket.Related(m.entry, row.Text)
	w := m.work(m.entry)
	rows := make([]related.Row, len(m.kin))
	for i, k := range m.kin {
		checked, set := w.kin[k.Entry]
		if !set {
			checked = k.Known
		}
		rows[i] = related.Row{Form: k.Entry.Form, Becomes: k.Text, Known: k.Known, Count: len(k.Entry.Occurrences), Checked: checked}
	}
	had := len(m.related.Rows()) > 0
	m.related.Show(rows)
	if m.focus == onRelated && len(rows) == 0 {
		m.setFocus(onAlignment)
	}
	if had != (len(rows) > 0) {
		m.layout()
	}
}

// setFocus sends the keys of the parts to f.
func (m *Model) setFocus(f focus) {
	m.focus = f
	m.concordance.Focus(f == onConcordance)
	m.related.Focus(f == onRelated)
	m.layout()
}
