package ui

import (
	"context"
	"errors"
	"strings"
	"testing"

	tea "github.com/charmbracelet/bubbletea"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/internal/docket"
	"emendary/internal/ledger"
)

func isWritten(msg tea.Msg) bool  { _, ok := msg.(written); return ok }
func isComputed(msg tea.Msg) bool { _, ok := msg.(computed); return ok }

func TestTheFirstScreenShowsTheFormAndItsCandidates(t *testing.T) {
	h := ready(t, storm)
	view := h.screen()
	assert.Equal(t, "harbor", h.form())
	assert.Contains(t, view, "[harbor]")
	assert.Contains(t, view, "▸ harbour")
	assert.Contains(t, view, "insert u after o")
	assert.Contains(t, view, "4 open · 0 ruled · 0 queries")
}

func TestAcceptIsOneKeyAndMovesOn(t *testing.T) {
	h := ready(t, storm)
	h.press("f")
	rulings := h.rulings("harbor")
	require.Len(t, rulings, 1)
	assert.Equal(t, ledger.Accept, rulings[0].Act)
	assert.Equal(t, "harbour", rulings[0].Word)
	assert.Equal(t, "quai", h.form())
	assert.Contains(t, h.m.message, "accepted harbour for harbor, 2 citations")
}

// The citation in speech starts unchecked, since the form stands in narration too.
func TestAcceptLeavesUncheckedCitationsAlone(t *testing.T) {
	h := ready(t, storm)
	h.press("f")
	e := h.m.docket.Find("harbor")
	require.Len(t, e.Occurrences, 3)
	assert.NotNil(t, e.Occurrences[0].Ruling)
	assert.NotNil(t, e.Occurrences[1].Ruling)
	assert.Nil(t, e.Occurrences[2].Ruling)
}

func TestRelatedFormsAreRuledOnWithTheFormAndUndoneWithIt(t *testing.T) {
	h := ready(t, storm)
	assert.Contains(t, h.screen(), "related forms · 1 of 1 checked")
	h.press("f")
	with := h.rulings("harbors")
	require.Len(t, with, 1)
	assert.Equal(t, "harbours", with[0].Word)
	assert.Equal(t, h.rulings("harbor")[0].ID, with[0].With)
	assert.Contains(t, h.m.message, "with it harbors (1)")
	h.press("u")
	assert.Empty(t, h.rulings("harbor"))
	assert.Empty(t, h.rulings("harbors"))
	assert.Equal(t, "harbor", h.form())
	h.press("r")
	assert.Len(t, h.rulings("harbor"), 1)
	assert.Len(t, h.rulings("harbors"), 1)
}

func TestAnUncheckedRelatedFormStaysOpen(t *testing.T) {
	h := ready(t, storm)
	h.press("tab", "tab", " ", "f")
	assert.Len(t, h.rulings("harbor"), 1)
	assert.Empty(t, h.rulings("harbors"))
}

func TestTheOtherRulings(t *testing.T) {
	for _, c := range []struct {
		name string
		keys []string
		want ledger.Ruling
	}{
		{"let stand", []string{"d"}, ledger.Ruling{Act: ledger.Reject}},
		{"add with the defaults", []string{"s", "s"}, ledger.Ruling{Act: ledger.Add, List: "book", Kind: "term"}},
		{"add of another kind", []string{"s", "l", "l", "enter"}, ledger.Ruling{Act: ledger.Add, List: "book", Kind: "dialect"}},
		{"add with a note", []string{"s", "j", "so said", "enter"}, ledger.Ruling{Act: ledger.Add, List: "book", Kind: "term", Note: "so said"}},
		{"query alone", []string{"a", "Which?", "enter"}, ledger.Ruling{Act: ledger.Query, Query: "Which?", To: "author"}},
		{"query to the publisher", []string{"a", "tab", "Which?", "enter"}, ledger.Ruling{Act: ledger.Query, Query: "Which?", To: "publisher"}},
		{"accept with a query", []string{"a", "All right?", "down", "enter"}, ledger.Ruling{Act: ledger.Accept, Word: "harbour", Query: "All right?", To: "author"}},
		{"let stand with a query", []string{"a", "Yours?", "down", "down", "enter"}, ledger.Ruling{Act: ledger.Reject, Query: "Yours?", To: "author"}},
		{"add with a query", []string{"s", "tab", "A place?", "enter"}, ledger.Ruling{Act: ledger.Add, List: "book", Kind: "term", Query: "A place?", To: "author"}},
		{"later", []string{"g"}, ledger.Ruling{Act: ledger.Later}},
		{"correct", []string{";", "quay", "enter"}, ledger.Ruling{Act: ledger.Accept, Word: "quay"}},
		{"correct in two words", []string{";", "a lot", "enter"}, ledger.Ruling{Act: ledger.Accept, Word: "a lot"}},
		{"correct with a query", []string{";", "quay", "tab", "Here?", "enter"}, ledger.Ruling{Act: ledger.Accept, Word: "quay", Query: "Here?", To: "author"}},
		{"the second candidate", []string{"j", "f"}, ledger.Ruling{Act: ledger.Accept, Word: "harbours"}},
		{"by the arrows alone", []string{"down", "enter"}, ledger.Ruling{Act: ledger.Accept, Word: "harbours"}},
		{"let stand by the arrows alone", []string{" ", "right", "enter"}, ledger.Ruling{Act: ledger.Reject}},
	} {
		t.Run(c.name, func(t *testing.T) {
			h := ready(t, storm)
			h.press(c.keys...)
			rulings := h.rulings("harbor")
			require.NotEmpty(t, rulings)
			r := rulings[len(rulings)-1]
			assert.Equal(t, c.want, ledger.Ruling{Act: r.Act, Word: r.Word, List: r.List, Kind: r.Kind, Note: r.Note, Query: r.Query, To: r.To})
			assert.NotEqual(t, "harbor", h.form(), "the bench moves on")
		})
	}
}

func TestTheAlignmentFollowsWhatIsTyped(t *testing.T) {
	h := ready(t, storm)
	h.press(";", "harb")
	assert.Contains(t, h.screen(), "delete o, delete the second r")
	h.press("e")
	assert.Contains(t, h.screen(), "substitute e for o, delete the second r")
	h.press("esc")
	assert.NotContains(t, h.screen(), "typed")
	assert.Equal(t, "harbor", h.form())
}

func TestTheFormItselfIsNoCorrection(t *testing.T) {
	h := ready(t, storm)
	h.press(";", "up", "enter")
	assert.Empty(t, h.rulings("harbor"))
	assert.Contains(t, h.m.message, "as it stands")
}

func TestTheKindLastAddedIsOffered(t *testing.T) {
	h := ready(t, storm)
	h.press("s", "l", "enter", "s", "s")
	assert.Equal(t, "coinage", h.rulings("quai")[0].Kind)
}

func TestChecksDecideWhatARulingAppliesTo(t *testing.T) {
	h := ready(t, storm)
	h.press("tab", " ", "f")
	r := h.rulings("harbor")[0]
	assert.Len(t, r.Occurrences, 1)
	assert.Equal(t, ledger.Checked, r.Scope)
}

func TestOneKeyChecksAWholeSetting(t *testing.T) {
	h := ready(t, storm)
	h.press("tab", "v")
	assert.Equal(t, 0, h.m.concordance.Checked())
	h.press("j", "j", "v")
	assert.Equal(t, 1, h.m.concordance.Checked())
}

func TestNothingCheckedIsNoRuling(t *testing.T) {
	h := ready(t, storm)
	h.press("tab", "v", "f")
	assert.Empty(t, h.rulings("harbor"))
	assert.Contains(t, h.m.message, "no citation is checked")
}

func TestEntriesPutOffComeBackAtTheEnd(t *testing.T) {
	h := ready(t, "The harbor, the quai and the stromm.\n")
	h.press("g")
	assert.Equal(t, "quai", h.form())
	h.press("d")
	h.press("d")
	assert.Equal(t, "harbor", h.form())
	h.press("d")
	assert.Equal(t, "", h.form())
	assert.Contains(t, h.screen(), "Nothing is open")
	assert.Contains(t, h.screen(), "emendary apply")
	h.press("u")
	assert.Equal(t, "harbor", h.form())
}

func TestAManuscriptWithoutQuestionsHasAScreen(t *testing.T) {
	h := ready(t, "The pilot came.\n")
	assert.Contains(t, h.screen(), "The docket is empty.")
	h.press("f", "d", "j", "u", "tab", "h", "l", "n", "?", "esc", "/", "pilot", "enter")
	assert.Equal(t, "pilot", h.form())
}

func TestAnyFormCanBeFoundAndRuledOnAgain(t *testing.T) {
	h := ready(t, storm)
	h.press("f", "/", "hrbor", "enter")
	assert.Equal(t, "harbor", h.form())
	h.press("/", "mole", "enter")
	assert.Equal(t, "mole", h.form())
}

func TestRulingAgainTakesThePlaceOfTheRuling(t *testing.T) {
	h := ready(t, "The harbor.\n\nThe quai.\n")
	h.press("f", "h")
	assert.Contains(t, h.screen(), "accepted harbour for harbor")
	h.press("d")
	e := h.m.docket.Find("harbor")
	require.NotNil(t, e.Occurrences[0].Ruling)
	assert.Equal(t, ledger.Reject, e.Occurrences[0].Ruling.Act)
}

func TestARejectedFormIsShownAsStet(t *testing.T) {
	h := ready(t, "The harbor.\n\nThe quai.\n")
	h.press("d", "h")
	assert.Contains(t, h.screen(), "stet: the form stands")
	h.press("f")
	assert.Equal(t, ledger.Accept, h.m.docket.Find("harbor").Occurrences[0].Ruling.Act)
}

func TestTheConcordanceTellsWhatAcceptKeeps(t *testing.T) {
	h := ready(t, "The harbor was old. The HARBOR’S mole.\n")
	h.press("tab", "j")
	assert.Contains(t, h.m.message, "accept makes it HARBOUR’S here")
}

func TestKeysOfOneBurstAllCount(t *testing.T) {
	s := start(t, "The harbor.\n\nThe quai.\n\nThe stromm and the pilott.\n")
	h := newHand(t, s, 80, 24)
	h.press("fdjkd" + "ssq")
	assert.Equal(t, ledger.Accept, h.rulings("harbor")[0].Act)
	assert.Equal(t, ledger.Reject, h.rulings("quai")[0].Act)
	assert.Equal(t, ledger.Reject, h.rulings("stromm")[0].Act)
	assert.Equal(t, ledger.Add, h.rulings("pilott")[0].Act)
	assert.True(t, h.quit)
}

func TestABurstMayRunThroughALine(t *testing.T) {
	h := ready(t, storm)
	h.send(keyMsg(";a lot"))
	h.send(keyMsg("enter"))
	h.send(keyMsg("d"))
	h.drain()
	assert.Equal(t, "a lot", h.rulings("harbor")[0].Word)
	assert.Equal(t, ledger.Reject, h.rulings("quai")[0].Act)
}

func TestAPasteIsNoBurst(t *testing.T) {
	h := ready(t, storm)
	h.send(tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune("ddd"), Paste: true})
	h.drain()
	assert.Empty(t, h.rulings("harbor"))
	assert.Contains(t, h.m.message, "pasted text")
	h.press(";")
	h.send(tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune("har\nbour\x1b"), Paste: true})
	h.press("enter")
	assert.Equal(t, "har bour", h.rulings("harbor")[0].Word)
}

func TestAcceptWaitsForCandidatesToBeDrawn(t *testing.T) {
	h := newHand(t, start(t, storm), 80, 24)
	h.run() // begin
	late := h.runTo(isComputed)
	h.send(keyMsg("f"))
	h.send(keyMsg("l"))
	assert.Len(t, h.m.held, 2)
	assert.Equal(t, "harbor", h.form(), "keys after it wait too")
	assert.Contains(t, h.screen(), "computing candidates")
	h.send(late)
	h.drain()
	assert.Equal(t, "harbour", h.rulings("harbor")[0].Word)
}

func TestWithoutCandidatesAcceptSaysSo(t *testing.T) {
	h := ready(t, "The zyxwvutsrqp.\n")
	h.press("f")
	assert.Contains(t, h.m.message, "no candidate to accept")
	assert.Contains(t, h.screen(), "no word is near this form")
}

func TestTheScreenMovesOnOnlyOnceTheRulingIsWritten(t *testing.T) {
	h := ready(t, storm)
	h.send(keyMsg("f"))
	done := h.runTo(isWritten)
	h.send(keyMsg("d"))
	h.send(keyMsg("jj"))
	assert.Equal(t, "harbor", h.form())
	assert.Empty(t, h.rulings("harbor"), "recorded only when written")
	assert.Len(t, h.m.held, 3)
	h.send(done)
	assert.Equal(t, "quai", h.form())
	h.drain()
	assert.Equal(t, ledger.Reject, h.rulings("quai")[0].Act)
	assert.Empty(t, h.m.held)
}

func TestAFailedWriteKeepsTheRulingForAnotherTry(t *testing.T) {
	full := errors.New("the disk is full")
	var session *docket.Session
	fail := true
	h := ready(t, storm, func(o *Options) {
		o.Write = func(ctx context.Context, r ...ledger.Ruling) error {
			if fail {
				return full
			}
			return session.Write(ctx, r...)
		}
	})
	session = h.m.session
	h.send(keyMsg("f"))
	h.send(keyMsg("d"))
	h.drain()
	assert.Empty(t, h.rulings("harbor"))
	assert.Contains(t, h.screen(), "not written, but kept: accepted harbour for harbor")
	assert.Contains(t, h.screen(), "the disk is full (1 key typed since not taken)")
	h.press("x")
	assert.Equal(t, onFailure, h.m.screen)
	fail = false
	h.press("r")
	assert.Len(t, h.rulings("harbor"), 1)
	assert.Equal(t, "quai", h.form())

	fail = true
	h.press("d", "esc")
	assert.Empty(t, h.rulings("quai"))
	assert.Equal(t, onBench, h.m.screen)
	h.press("d", "q")
	assert.True(t, h.quit)
}

func TestASecondBreakLeavesWhileARulingIsWritten(t *testing.T) {
	h := ready(t, storm)
	h.send(keyMsg("f"))
	h.send(keyMsg("ctrl+c"))
	m, cmd := h.m.Update(keyMsg("ctrl+c"))
	assert.IsType(t, tea.QuitMsg{}, cmd())
	require.NoError(t, m.(Model).finish(), "the ruling is written all the same")
	s := h.m.session
	all, err := s.Ledger.Rulings(context.Background())
	require.NoError(t, err)
	assert.NotEmpty(t, all)
}

func TestStaleCandidatesAreDropped(t *testing.T) {
	h := newHand(t, start(t, storm), 80, 24)
	h.run() // begin
	stale := h.runTo(isComputed).(computed)
	h.send(keyMsg("g")) // does not need candidates
	h.m.grown()         // as an add would have it
	h.send(stale)
	assert.Nil(t, h.m.work(stale.entry).facts)
	h.drain()
}

func TestAnAddMakesTheOtherCandidatesAnew(t *testing.T) {
	h := ready(t, "The skerrin was by the skerrins. A skerrine.\n")
	h.press("s", "s")
	f := h.m.work(h.m.entry).facts
	require.NotNil(t, f)
	var texts []string
	for _, c := range f.candidates {
		texts = append(texts, c.Text)
	}
	assert.Contains(t, texts, "skerrin")
}

func TestARulingSaysHowManyCitationsWereNeverOnScreen(t *testing.T) {
	h := ready(t, strings.Repeat("The harbor.\n\n", 30))
	h.press("f")
	assert.Regexp(t, `accepted harbour for harbor, 30 citations \(2\d never on screen\)`, h.m.message)
	h = ready(t, strings.Repeat("The harbor.\n\n", 30))
	h.press("tab")
	for range 30 {
		h.press("j")
	}
	h.press("f")
	assert.Regexp(t, `30 citations$`, h.m.message)
}

func TestControlCharactersNeverReachTheTerminal(t *testing.T) {
	h := ready(t, "The pilot \x1b]0;owned\x07 and the harb\u202eor \u2066came\u009b.\n\nThe harbor\x01 \u200f.\n", func(o *Options) { o.Getenv = dumb })
	for _, keys := range [][]string{nil, {"tab", "o"}, {"esc", "/"}, {"esc", "f"}} {
		h.press(keys...)
		for _, r := range h.m.View() {
			if r == '\n' {
				continue
			}
			require.False(t, r < 0x20 || r >= 0x7f && r < 0xa0, "control character %U on screen", r)
			require.NotContains(t, "\u202e\u2066\u200f\u200e", string(r))
		}
	}
}
