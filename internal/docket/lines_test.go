package docket

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/internal/ledger"
)

func TestReadLinesNamesWhatIsWrong(t *testing.T) {
	tests := []struct{ name, text, want string }{
		{"nothing", "", `r.tsv: no header line; begin with the columns form, ruling and word, parted by tabs`},
		{"no header", "harber\taccept\tharbour\n", `r.tsv: line 1: no column "form" in the header; begin with the columns form, ruling and word, parted by tabs`},
		{"another ruling", "form\truling\tword\nharber\tkeep\t\n", `r.tsv: line 2: ruling "keep" is not one of accept, reject, add, query, later, unfold`},
		{"no word", "form\truling\tword\nharber\taccept\t\n", `r.tsv: line 2: accept without a word; give the word that takes the place of harber`},
		{"no form", "form\truling\tword\n\treject\t\n", `r.tsv: line 2: no form; give the form that the ruling is on`},
		{"no question", "form\truling\tword\nharber\tquery\t\n", `r.tsv: line 2: query without a question; add a column query that asks it`},
		{"no places", "form\truling\tword\tscope\nharber\treject\t\tchecked\n", `r.tsv: line 2: scope checked without places; give them as line:column in a column place`},
		{"too many cells", "form\truling\tword\nharber\treject\t\tx\n", `r.tsv: line 2: 4 cells under 3 columns; take the extra tabs out`},
		{"bad time", "form\truling\tword\ttime\nharber\treject\t\tnoon\n", `r.tsv: line 2: parsing time "noon" as "2006-01-02T15:04:05.999999999Z07:00": cannot parse "noon" as "2006"`},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			_, err := ReadLines(strings.NewReader(tt.text), "r.tsv")
			assert.EqualError(t, err, tt.want)
		})
	}
}

// take reads TSV rulings onto the desk and returns the disputes as text.
func take(t *testing.T, s *Session, tsv string) []string {
	t.Helper()
	lines, err := ReadLines(strings.NewReader(tsv), "r.tsv")
	require.NoError(t, err)
	rulings, disputes := s.Docket.RulingsFrom(lines)
	write(t, s, rulings...)
	out := []string{}
	for _, d := range disputes {
		out = append(out, d.Line.Form+": "+d.Reason)
	}
	return out
}

func TestExactCapitalsOutrankFoldedOnes(t *testing.T) {
	s := desk(t, "A harber and Old Harber. HARBER!")
	disputes := take(t, s, "form\truling\tword\nHarber\taccept\tHarbour\nharber\taccept\tharper\n")
	assert.Empty(t, disputes)
	assert.Equal(t, "A harper and Old Harbour. HARPER!", emended(t, s))
}

func TestOneLineServesAllCapitals(t *testing.T) {
	s := desk(t, "Althought it froze, and althought it thawed, old Althought.")
	assert.Empty(t, take(t, s, "form\truling\tword\nAlthought\taccept\tAlthough\n"))
	assert.Equal(t, "Although it froze, and although it thawed, old Although.", emended(t, s))
}

func TestALineMayGiveTheFormWithItsEnding(t *testing.T) {
	s := desk(t, "The harber’s edge, the lantrns' light.")
	assert.Empty(t, take(t, s, "form\truling\tword\nharber's\taccept\tharbour’s\nlantrns'\taccept\tlanterns'\n"))
	assert.Equal(t, "The harbour’s edge, the lanterns' light.", emended(t, s))
}

func TestContradictionsAreReportedAndNothingIsOverridden(t *testing.T) {
	s := desk(t, "A harber, a lantrn.")
	rule(t, s, "harber", ledger.Reject, "")
	disputes := take(t, s, "form\truling\tword\nharber\taccept\tharbour\nlantrn\taccept\tlantern\nlantrn\treject\t\nquai\treject\t\n")
	assert.ElementsMatch(t, []string{
		"harber: ruled reject by anna on 2026-12-01",
		"lantrn: line 3 rules it otherwise",
		"quai: not in the manuscript",
	}, disputes)
	assert.Equal(t, "A harber, a lantern.", emended(t, s))
}

func TestARulingInForceIsNotTakenTwice(t *testing.T) {
	s := desk(t, "A harber.")
	tsv := "form\truling\tword\nharber\taccept\tharbour\n"
	assert.Empty(t, take(t, s, tsv))
	before := len(s.Docket.Rulings())
	assert.Empty(t, take(t, s, tsv))
	assert.Len(t, s.Docket.Rulings(), before)
}

func TestAListedWordCanBeRuledOnInItsPlaces(t *testing.T) {
	s := desk(t, "A letter form the harbour.\n\nThe form was signed.\n")
	assert.Empty(t, take(t, s, "form\truling\tword\tscope\tplace\nform\taccept\tfrom\tchecked\t1:10\n"))
	assert.Equal(t, "A letter from the harbour.\n\nThe form was signed.\n", emended(t, s))
	assert.Equal(t, WordInContext, s.Docket.Find("form").Kind)
	assert.Equal(t, Tally{}, s.Docket.Tally(), "what nobody asked about is not open")
}

func TestRulingsRoundTrip(t *testing.T) {
	text := "The harber froze.\n\n“A harber,” she said, “and a lantrn.” The lantrn of Pellimoor, the pilto.\n"
	s := desk(t, text)
	rule(t, s, "harber", ledger.Accept, "harbour")
	rule(t, s, "harber", ledger.Reject, "", 1)
	rule(t, s, "lantrn", ledger.Accept, "lantern", 1)
	e := s.Docket.Find("Pellimoor")
	add := s.Docket.Ruling(e, ledger.Add, []bool{true}, nil)
	add.List, add.Kind, add.Note = "book", "place", "the\tmoor"
	q := s.Docket.Ruling(s.Docket.Find("pilto"), ledger.Query, []bool{true}, nil)
	q.Query, q.To = "a name?", "author"
	late := s.Docket.Ruling(s.Docket.Find("lantrn"), ledger.Query, []bool{false, true}, nil)
	late.Query, late.To = "lantern, or lanthorn?", "author"
	write(t, s, add, q, late)
	var first strings.Builder
	require.NoError(t, s.Docket.WriteLines(&first))

	other := desk(t, text)
	assert.Empty(t, take(t, other, first.String()))
	var second strings.Builder
	require.NoError(t, other.Docket.WriteLines(&second))
	assert.Equal(t, first.String(), second.String())
	assert.Equal(t, emended(t, s), emended(t, other))
	assert.Equal(t, s.Docket.Tally(), other.Docket.Tally())
}

func TestAQueryTakesNothingBack(t *testing.T) {
	s := desk(t, "A harber.")
	rule(t, s, "harber", ledger.Accept, "harbour")
	assert.Empty(t, take(t, s, "form\truling\tword\tquery\tto\nharber\tquery\t\tthe American spelling?\tauthor\n"))
	assert.Equal(t, "A harbour.", emended(t, s))
	assert.Equal(t, Tally{Ruled: 1, Queries: 1}, s.Docket.Tally())
	assert.Empty(t, take(t, s, "form\truling\tword\tquery\tto\nharber\tquery\t\tthe American spelling?\tauthor\n"))
	assert.Equal(t, 1, s.Docket.Tally().Queries, "the same question is not asked twice")
}

func FuzzReadLines(f *testing.F) {
	f.Add("form\truling\tword\nharber\taccept\tharbour\n")
	f.Add("word\truling\tform\tscope\tplace\tlist\ttime\nx\taccept\ty\tchecked\t1:2 3:4\tbook\t2026-12-01T12:00:00Z\n")
	f.Add("\ufeff# note\r\nform\truling\tword\r\nharber\tlater\r\n")
	f.Fuzz(func(t *testing.T, text string) {
		lines, err := ReadLines(strings.NewReader(text), "r.tsv")
		if err != nil {
			require.NotContains(t, err.Error(), "\n")
			return
		}
		for _, l := range lines {
			require.NotEmpty(t, l.Form)
			require.True(t, l.Act != ledger.Accept || l.Word != "")
		}
	})
}
