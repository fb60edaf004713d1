package ui

import (
	"context"
	"maps"
	"runtime"

	tea "github.com/charmbracelet/bubbletea"

	"emendary/internal/docket"
)

// together is how many entries one command weighs: few enough that what comes on
// screen meanwhile waits for no more than a blink.
const together = 16

// weighing is the work towards the exact order by slip: the probability of each
// open entry, once its candidates are known. It goes on beside the screen while
// there is nothing more urgent.
type weighing struct {
	begun bool
	left  []*docket.Entry // still to be weighed
	out   int             // commands under way
	slips map[*docket.Entry]float64
}

// weighed brings the probabilities of some entries.
type weighed struct {
	slips map[*docket.Entry]float64
	err   error
}

// weigh asks for the next entries to be weighed, as far as processors are free.
func (m *Model) weigh() []tea.Cmd {
	w := &m.weighing
	if !w.begun {
		w.begun, w.slips, w.left = true, make(map[*docket.Entry]float64), m.docket.Due()
	}
	var cmds []tea.Cmd
	for len(w.left) > 0 && m.running < runtime.GOMAXPROCS(0) {
		n := min(together, len(w.left))
		cmds = append(cmds, m.weighEntries(w.left[:n]))
		w.left = w.left[n:]
		w.out++
		m.running++
	}
	return cmds
}

func (m *Model) weighEntries(entries []*docket.Entry) tea.Cmd {
	ctx, d := m.ctx, m.docket
	return func() tea.Msg {
		slips, err := slipsOf(ctx, d, entries)
		return weighed{slips, err}
	}
}

func slipsOf(ctx context.Context, d *docket.Docket, entries []*docket.Entry) (map[*docket.Entry]float64, error) {
	slips := make(map[*docket.Entry]float64, len(entries))
	for _, e := range entries {
		found, err := d.Candidates(ctx, e, 2)
		if err != nil {
			return nil, err
		}
		slips[e] = d.SlipGiven(e, found)
	}
	return slips, nil
}

// takeWeighed keeps probabilities; with the last of them, what has not been shown
// yet is put in the exact order.
func (m *Model) takeWeighed(msg weighed) {
	w := &m.weighing
	m.running--
	w.out--
	maps.Copy(w.slips, msg.slips) // none where the bench is being left
	if w.out > 0 || len(w.left) > 0 {
		return
	}
	m.docket.TakeSlips(w.slips)
	w.slips = nil
	if m.docket.Order() == docket.BySlip {
		m.docket.Reorder(docket.BySlip, m.passed)
	}
}

// passed reports whether e has been on screen, or is ruled on: its place is behind
// the entry on screen.
func (m *Model) passed(e *docket.Entry) bool {
	w := m.works[e]
	return !e.Open() || w != nil && w.shown
}

// adapt prices edits by what was accepted so far. The entry on screen keeps its rows;
// candidates from the next entry on, and the order of what has not been shown,
// follow the new costs.
func (m *Model) adapt() tea.Cmd {
	if !m.docket.InBits() {
		m.warn("under unit costs every edit costs one: there is nothing to take up")
		return nil
	}
	taken := m.docket.Adapt()
	m.say(count(taken, "correction") + " taken up: edits are priced by what was accepted from here on")
	m.grown()
	if w := &m.weighing; w.begun && w.out == 0 && len(w.left) == 0 {
		m.weighing = weighing{}
	}
	return m.compute()
}

// turnOrder puts what lies ahead in the next order of review.
func (m *Model) turnOrder() tea.Cmd {
	o := m.docket.Order().Next()
	m.docket.Reorder(o, m.passed)
	m.say("in order of " + string(o) + " from here on")
	return m.compute()
}
