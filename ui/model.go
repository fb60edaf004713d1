// Package ui is the review bench: the screen on which an editor rules on the
// entries of a docket.
//
// Run runs it in a terminal. Model is the root that routes keys to the parts of
// the screen, each a package of its own: passage (the paragraph), alignment (the
// centre), concordance, related, finder, line (what is typed) and page (help, a
// paragraph in full). Packages style and text draw, ground keeps the start from
// waiting on the terminal.
//
// Keys never wait for work. Candidates are computed, forms searched and rulings
// written by commands beside the screen; a key that needs their outcome is held,
// with all keys after it, until the outcome is on screen. A ruling is recorded in
// the docket, and the screen moves on, only once it is on disk.
package ui

import (
	"context"
	"slices"

	tea "github.com/charmbracelet/bubbletea"

	"emendary/internal/docket"
	"emendary/internal/ledger"
	"emendary/ui/alignment"
	"emendary/ui/concordance"
	"emendary/ui/finder"
	"emendary/ui/line"
	"emendary/ui/page"
	"emendary/ui/passage"
	"emendary/ui/related"
	"emendary/ui/style"
)

// Below this size the bench says so and shows nothing else.
const (
	leastWidth  = 60
	leastHeight = 18
)

// screen is what takes the keys.
type screen uint8

const (
	onBench      screen = iota
	onFinished          // nothing is open, or there is no entry at all
	onHelp              // a page
	onParagraph         // a page
	onFinder            //
	onCorrection        // a line below the alignment
	onAddition          //
	onQuery             //
	onLanguage          // of a passage
	onActions           // the strip of actions
	onFailure           // a ruling could not be written
)

// focus is which part of the bench the keys of a part go to.
type focus uint8

const (
	onAlignment focus = iota
	onConcordance
	onRelated
)

// Model is the bench. It is a Bubble Tea model: commands never change it.
type Model struct {
	Keys    KeyMap
	Strip   StripKeyMap
	Failure FailureKeyMap

	ctx     context.Context
	session *docket.Session
	docket  *docket.Docket
	opt     Options
	sheet   style.Sheet

	width, height int
	screen        screen
	behind        screen // where a page returns to
	asking        screen // where the line for a query returns to
	focus         focus
	entry         *docket.Entry           // the one on screen; nil on onFinished
	works         map[*docket.Entry]*work // what is known and checked, entry by entry
	running       int                     // computations under way
	weighing      weighing
	searching     context.Context    // of the computations under way
	stop          context.CancelFunc // ends them
	lexicon       int                // how often the lexicon has grown: older answers are stale
	lastKind      map[string]string  // the kind last added, by list and capital
	lastList      string
	lastWhom      string
	lastLanguage  string // of a passage

	begun   bool         // the first entry has been chosen
	held    []tea.KeyMsg // keys that wait their turn
	pumping bool         // a nextKey is on its way
	batch   *batch       // the rulings being written
	writes  int          // the number of the latest batch

	failure string // why the batch could not be written
	message string
	alarm   bool

	passage     passage.Model
	alignment   alignment.Model
	concordance concordance.Model
	related     related.Model
	kin         []docket.Related // of related's rows
	page        page.Model
	finder      finder.Model
	correction  line.Correction
	addition    line.Addition
	query       line.Query
	language    line.Language
	companions  []ledger.Act // what the query may go with, option by option
	typed       string       // the word that an accept is for
	action      int          // on the strip
}

// New returns the bench for a session. It does no work yet; Init starts that.
func New(ctx context.Context, session *docket.Session, opt Options) Model {
	sheet := style.Make(opt.ability())
	m := Model{
		Keys: Keys(), Strip: StripKeys(), Failure: FailureKeys(),
		ctx: ctx, session: session, docket: session.Docket, opt: opt, sheet: sheet,
		works:    make(map[*docket.Entry]*work),
		lastKind: make(map[string]string), lastList: "book", lastWhom: "author",
		passage: passage.New(sheet), alignment: alignment.New(sheet), concordance: concordance.New(sheet),
		related: related.New(sheet), page: page.New(sheet),
	}
	if m.docket.InBits() {
		m.alignment.InBits()
	}
	m.searching, m.stop = context.WithCancel(ctx)
	return m
}

// begin is the message that starts the work once the program runs.
type begin struct{}

// Init starts the work: the first message chooses the entry and asks for its
// candidates.
func (m Model) Init() tea.Cmd { return func() tea.Msg { return begin{} } }

// start goes to the first open entry, in the order by slip of all, else after the
// place of the last ruling that was made on a bench, and says what was done before.
func (m *Model) start() tea.Cmd {
	m.begun = true
	last, _ := m.docket.Last()
	from := -1
	rulings := m.docket.Rulings()
	for i := len(rulings) - 1; i >= 0 && m.docket.Order() != docket.BySlip; i-- {
		// Rulings taken from a file come in the order of the file, on no screen.
		if r := rulings[i]; slices.ContainsFunc(r.Occurrences, func(o ledger.Occurrence) bool { return o.Seen }) {
			from = slices.Index(m.docket.Entries, m.entryOf(r))
			break
		}
	}
	m.goTo(m.openAfter(from))
	m.say(m.welcome(last))
	return m.compute()
}

// entryOf returns the entry that a ruling was made on; nil where the manuscript
// has it no more.
func (m *Model) entryOf(r ledger.Ruling) *docket.Entry {
	for _, e := range m.docket.Entries {
		if e.Form == r.Form && string(e.Kind) == r.EntryKind {
			return e
		}
	}
	return m.docket.Find(r.Form)
}

// openAfter returns the next open entry after index i, around the end; entries
// put off come back only when no other is open. nil where nothing is open.
func (m *Model) openAfter(i int) *docket.Entry {
	var later *docket.Entry
	n := len(m.docket.Entries)
	for k := 1; k <= n; k++ {
		e := m.docket.Entries[(i+k+n)%n]
		switch {
		case !e.Open():
		case !e.PutOff():
			return e
		case later == nil:
			later = e
		}
	}
	return later
}

// index returns the place of the entry on screen in the docket, -1 for none.
func (m *Model) index() int { return slices.Index(m.docket.Entries, m.entry) }

// step returns the entry n places from the one on screen, ruled on or open; the
// same where there is none further.
func (m *Model) step(n int) *docket.Entry {
	if len(m.docket.Entries) == 0 {
		return nil
	}
	i := m.index()
	if m.entry == nil {
		i = len(m.docket.Entries)
	}
	return m.docket.Entries[max(0, min(i+n, len(m.docket.Entries)-1))]
}

// goTo puts an entry on screen; nil means that nothing is open.
func (m *Model) goTo(e *docket.Entry) {
	m.entry = e
	m.setFocus(onAlignment)
	if e == nil {
		m.screen = onFinished
		return
	}
	m.screen = onBench
	m.show()
}

// say puts a message on the message line.
func (m *Model) say(s string) { m.message, m.alarm = s, false }

// warn puts a message on the message line that asks for attention.
func (m *Model) warn(s string) { m.message, m.alarm = s, true }
