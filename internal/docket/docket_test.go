package docket

import (
	"context"
	"os"
	"path/filepath"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/internal/ledger"
)

func TestWhatGoesOnTheDocket(t *testing.T) {
	tests := []struct {
		name, text string
		want       []string
		kind       Kind // of the first entry
	}{
		{"a known word does not", "The harbour was quiet.", []string{}, ""},
		{"an unknown form does", "The harber was quiet.", []string{"harber"}, UnknownForm},
		{"a possessive folds", "The harber’s mouth, the harber's end, the harber.", []string{"harber"}, UnknownForm},
		{"a clitic folds", "The harber’ll freeze.", []string{"harber"}, UnknownForm},
		{"a clitic on a known word is known", "The harbour’ll freeze and the pilot’d know.", []string{}, ""},
		{"a sentence start folds", "Harber and sky. The harber froze.", []string{"harber"}, UnknownForm},
		{"a capital within a sentence stands alone", "The harber lay still and Old Harber knew.", []string{"harber", "Harber"}, UnknownForm},
		{"capitals throughout fold", "THE HARBER. The harber froze.", []string{"harber"}, UnknownForm},
		{"mixed capitals stand alone", "So McTurrn and Mcturrn met.", []string{"McTurrn", "Mcturrn"}, UnknownForm},
		{"another variety does", "The harbour had a colour, and honour. The color faded.", []string{"color"}, OtherVariety},
		{"a wrong ordinal does", "On the 2th of May.", []string{"2th"}, UnknownForm},
		{"a letter for a digit does", "In l894 it froze.", []string{"l894"}, UnknownForm},
		{"a turned apostrophe does", "And ‘tis cold.", []string{"‘tis"}, UnknownForm},
		{"an elision curled shut does", "Tell ’en so, o’ course.", []string{"'en", "o'"}, UnknownForm},
		{"numbers, numerals and initials do not", "In 1894 the 2nd lamp of J. R. Smith, no. XIV, cost £1,200 at B12.", []string{}, ""},
		{"a compound of known members does not", "The harbour-master and the non-pilot.", []string{}, ""},
		{"a compound with an unknown member does", "The harber-master slept.", []string{"harber-master"}, UnknownForm},
		{"a suspended hyphen does not", "Two- and three-masted ships.", []string{}, ""},
		{"a word that a line end broke is read whole", "The har-\nbour froze.", []string{}, ""},
		{"a broken compound keeps its hyphen", "The ever-\nquiet quay.", []string{}, ""},
		{"two halves of a word join", "They came to gether at last.", []string{"to gether"}, Join},
		{"halves do not join where one stands alone too", "They came to gether, but gether froze.", []string{"gether"}, UnknownForm},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			s := desk(t, tt.text)
			assert.Equal(t, tt.want, forms(s))
			if len(s.Docket.Entries) > 0 {
				assert.Equal(t, tt.kind, s.Docket.Entries[0].Kind)
			}
		})
	}
}

func TestAcceptCarriesCapitalsApostrophesAndEndings(t *testing.T) {
	tests := []struct{ name, text, form, word, want string }{
		{"lower case", "the harber froze", "harber", "harbour", "the harbour froze"},
		{"sentence start", "The harber. Harber ice.", "harber", "harbour", "The harbour. Harbour ice."},
		{"capitals throughout, possessive", "Old harber. THE HARBER’S EDGE", "harber", "harbour", "Old harbour. THE HARBOUR’S EDGE"},
		{"a name keeps its capital", "then thessally wept", "thessally", "Thessaly", "then Thessaly wept"},
		{"straight possessive", "the harber's edge", "harber", "harbour", "the harbour's edge"},
		{"curly apostrophe for a straight one", "it’s odd, he dosnt say", "dosnt", "doesn't", "it’s odd, he doesn’t say"},
		{"straight where the manuscript is straight", "it's odd, he dosnt say", "dosnt", "doesn't", "it's odd, he doesn't say"},
		{"split", "there was alot of it", "alot", "a lot", "there was a lot of it"},
		{"join", "they came to gether", "to gether", "together", "they came together"},
		{"letters inserted at the start", "the arbour-watr froze; the watr too", "watr", "water", "the arbour-watr froze; the water too"},
		{"first letter missing", "an arbourmaster, no ovember", "ovember", "november", "an arbourmaster, no november"},
		{"marks inside the word", "the har*b*er froze", "harber", "harbour", "the har*b*our froze"},
		{"soft hyphen", "the har\u00adber froze", "harber", "harbour", "the har\u00adbour froze"},
		{"line-end hyphen", "the har-\nber froze", "harber", "harbour", "the har-\nbour froze"},
		{"decomposed letter stays", "the cafe\u0301harber froze", "caféharber", "caféharbour", "the cafe\u0301harbour froze"},
		{"character reference stays", "the caf&eacute;harber froze", "caféharber", "caféharbour", "the caf&eacute;harbour froze"},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			s := desk(t, tt.text)
			rule(t, s, tt.form, ledger.Accept, tt.word)
			assert.Equal(t, tt.want, emended(t, s))
		})
	}
}

func TestRulingsSurviveAndAreUndone(t *testing.T) {
	s := desk(t, "The harber froze. A lantrn shone on the harber.")
	first := rule(t, s, "harber", ledger.Accept, "harbour")
	rule(t, s, "lantrn", ledger.Reject, "")
	assert.Equal(t, Tally{Ruled: 2}, s.Docket.Tally())

	s = reopen(t, s)
	assert.Equal(t, Tally{Ruled: 2}, s.Docket.Tally(), "rulings are there after a restart")
	undone := undo(t, s, first)
	assert.Equal(t, Tally{Open: 1, Ruled: 1}, s.Docket.Tally())
	_, last := s.Docket.Last()
	require.NotNil(t, last, "an undo can be redone")
	assert.Equal(t, undone.ID, last.ID)

	s = reopen(t, s)
	_, last = s.Docket.Last()
	require.NotNil(t, last, "also after a restart")
	undo(t, s, *last)
	assert.Equal(t, Tally{Ruled: 2}, s.Docket.Tally())
	_, last = s.Docket.Last()
	assert.Nil(t, last, "and only once")
	assert.Equal(t, "The harbour froze. A lantrn shone on the harbour.", emended(t, s))
}

func TestUndosAndRedosOfAnyDepthGoBackAndForth(t *testing.T) {
	s := desk(t, "A harber, a lantrn, a pilto.")
	for _, form := range []string{"harber", "lantrn", "pilto"} {
		rule(t, s, form, ledger.Reject, "")
	}
	for ruled := 2; ruled >= 0; ruled-- {
		last, _ := s.Docket.Last()
		require.NotNil(t, last)
		undo(t, s, *last)
		assert.Equal(t, ruled, s.Docket.Tally().Ruled)
	}
	for ruled := 1; ruled <= 3; ruled++ {
		_, last := s.Docket.Last()
		require.NotNil(t, last, "redo %d", ruled)
		undo(t, s, *last)
		assert.Equal(t, ruled, s.Docket.Tally().Ruled)
	}
	_, last := s.Docket.Last()
	assert.Nil(t, last)
}

func TestCheckedRulingLeavesTheRestOpen(t *testing.T) {
	s := desk(t, "The harber froze.\n\n“A harber,” she said.\n\n> The harber of old.\n")
	e := s.Docket.Find("harber")
	assert.Equal(t, []bool{true, false, false}, s.Docket.Checked(e), "speech beside narration, and quotations, start unchecked")
	rule(t, s, "harber", ledger.Accept, "harbour", 0)
	assert.True(t, e.Open())
	rule(t, s, "harber", ledger.Reject, "", 1, 2)
	assert.False(t, e.Open())
	assert.Equal(t, "The harbour froze.\n\n“A harber,” she said.\n\n> The harber of old.\n", emended(t, s))
}

func TestLetStandAndAddReachWhatStartsUnchecked(t *testing.T) {
	text := "The harber froze.\n\n“A harber,” she said.\n\n> The harber of old.\n"
	for _, act := range []ledger.Act{ledger.Reject, ledger.Add} {
		s := desk(t, text)
		e := s.Docket.Find("harber")
		r := s.Docket.Ruling(e, act, s.Docket.Checked(e), nil)
		assert.Equal(t, ledger.Every, r.Scope, "%s: as it is everywhere", act)
		r = s.Docket.Ruling(e, act, []bool{true, true, false}, nil)
		assert.Len(t, r.Occurrences, 2, "%s: the editor has chosen", act)
	}
	s := desk(t, text)
	e := s.Docket.Find("harber")
	assert.Len(t, s.Docket.Ruling(e, ledger.Accept, s.Docket.Checked(e), nil).Occurrences, 1)
	assert.Empty(t, take(t, s, "form\truling\tword\tscope\tplace\nharber\treject\t\tchecked\t1:5\n"))
	assert.True(t, e.Open(), "a line for places is for those places")
}

func TestLaterComesBack(t *testing.T) {
	s := desk(t, "The harber froze.")
	rule(t, s, "harber", ledger.Later, "")
	assert.Equal(t, Tally{Open: 1, PutOff: 1}, s.Docket.Tally())
	s = reopen(t, s)
	assert.Equal(t, Tally{Open: 1, PutOff: 1}, s.Docket.Tally())
	rule(t, s, "harber", ledger.Accept, "harbour")
	assert.Equal(t, Tally{Ruled: 1}, s.Docket.Tally())
}

func TestRulingsFindTheirPlacesInAChangedManuscript(t *testing.T) {
	before := "# One\n\nThe pilot saw the harber freeze at dawn.\n\n# Two\n\nNobody else came near the harber that winter.\n"
	s := desk(t, before)
	rule(t, s, "harber", ledger.Accept, "harbour", 1)
	after := "# One\n\nA new line stands here first.\n\nThe pilot saw the harber freeze at dawn.\n\n# Two\n\nAnd then, nobody else came near the harber that winter.\n"
	require.NoError(t, os.WriteFile(s.Options.Manuscript, []byte(after), 0o600))
	s = reopen(t, s)
	assert.Empty(t, s.Docket.Unplaced)
	assert.Equal(t, []bool{true, false}, s.Docket.Checked(s.Docket.Find("harber")))

	gone := "# One\n\nThe pilot saw the harber freeze at dawn.\n"
	require.NoError(t, os.WriteFile(s.Options.Manuscript, []byte(gone), 0o600))
	s = reopen(t, s)
	require.Len(t, s.Docket.Unplaced, 1, "a ruling whose place is gone is listed")
	assert.Equal(t, "harbour", s.Docket.Unplaced[0].Ruling.Word)
	assert.True(t, s.Docket.Find("harber").Open(), "and lands nowhere else")
}

func TestAddedWordsBecomeCandidatesAndKeepTheirEntries(t *testing.T) {
	s := desk(t, "So Thessaly met Thessally and old Pellimoor.", func(o *Options) { o.Series = "quay" })
	t.Setenv("XDG_DATA_HOME", t.TempDir())
	s = reopen(t, s)
	e := s.Docket.Find("Pellimoor")
	r := s.Docket.Ruling(e, ledger.Add, []bool{true}, nil)
	r.List, r.Kind = "series", "place"
	write(t, s, r)
	near := s.Docket.Lexicon().Within("Pellimor", 1)
	require.Len(t, near, 1)
	assert.Equal(t, "Pellimoor", near[0].Word.Text)

	s = reopen(t, s)
	again := s.Docket.Find("Pellimoor")
	assert.Equal(t, UnknownForm, again.Kind, "a word that this book's ruling listed keeps its entry")
	assert.False(t, again.Open())
	undo(t, s, r)
	s = reopen(t, s)
	assert.True(t, s.Docket.Find("Pellimoor").Open(), "its undo takes it off the list again")
}

func TestRelatedFormsAreShownWithTheirResults(t *testing.T) {
	s := desk(t, "The harber, two harbers and a harber-master. The barber watched.")
	got := map[string]string{}
	for _, r := range s.Docket.Related(s.Docket.Find("harber"), "harbour") {
		got[r.Entry.Form] = r.Text
		assert.True(t, r.Known, r.Text)
	}
	assert.Equal(t, map[string]string{"harbers": "harbours", "harber-master": "harbour-master"}, got)
}

func TestCandidatesPutTheIntendedWordFirst(t *testing.T) {
	tests := []struct{ text, form, want string }{
		{"I recieve it.", "recieve", "receive"},
		{"The pilot, the lamp, the quay. Teh ice.", "Teh", "The"},
		{"A colour, an honour; the color.", "color", "colour"},
		{"On the 2th.", "2th", "2nd"},
		{"Came to gether.", "to gether", "together"},
		{"The THESSLY of Thessaly.", "THESSLY", "THESSALY"},
		{"A lantrn-keeper.", "lantrn-keeper", "lantern-keeper"},
	}
	for _, tt := range tests {
		t.Run(tt.form, func(t *testing.T) {
			s := desk(t, tt.text)
			cs, err := s.Docket.Candidates(context.Background(), s.Docket.Find(tt.form), 8)
			require.NoError(t, err)
			require.NotEmpty(t, cs)
			assert.Equal(t, tt.want, cs[0].Text)
			var sum float64
			for _, c := range cs {
				sum += c.Share
			}
			assert.LessOrEqual(t, sum, 1+1e-9)
		})
	}
}

func TestStartLeavesNoLedgerWhereAListIsWrong(t *testing.T) {
	path := filepath.Join(t.TempDir(), "novel.md")
	require.NoError(t, os.WriteFile(path, []byte("A harber.\n"), 0o600))
	_, err := Start(context.Background(), Options{Manuscript: path, Series: "./missing.txt"})
	require.Error(t, err)
	_, err = Start(context.Background(), Options{Manuscript: path, Lexicon: path})
	require.Error(t, err, "the manuscript is no word list")
	entries, err := os.ReadDir(filepath.Dir(path))
	require.NoError(t, err)
	assert.Len(t, entries, 1, "nothing but the manuscript is there")
}
