package docket

import (
	"fmt"
	"math/rand/v2"
	"slices"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"

	"emendary/internal/ledger"
)

// snapshot says what is on the docket and what is in force on it, whatever the order.
func snapshot(s *Session) []string {
	var out []string
	for _, e := range s.Docket.Entries {
		if e.Kind == WordInContext && len(e.rulings) == 0 {
			continue // somebody looked at it
		}
		line := fmt.Sprintf("%s %q open %d later %t:", e.Kind, e.Form, e.open, e.putOff)
		for _, o := range e.Occurrences {
			line += fmt.Sprintf(" %d/%d+%d", o.Paragraph, o.Word, o.Words)
			if o.Ruling != nil {
				line += " " + saying(o.Ruling)
			}
		}
		out = append(out, line)
	}
	for _, u := range s.Docket.Unplaced {
		out = append(out, "unplaced "+u.Ruling.Form)
	}
	slices.Sort(out)
	return out
}

// However passages are unfolded, let stand and undone, in whatever order with rulings
// on their words: the docket is what a restart makes of the same ledger, and no entry
// stands on it twice.
func TestUnfoldingInASessionIsWhatARestartMakesOfIt(t *testing.T) {
	r := rand.New(rand.NewPCG(17, 19))
	text := "The clerk saw a harber.\n\n“" + declaration["Welsh"] + "” he said, and gilydd again.\n\nA harber.\n\n“" +
		declaration["Norwegian"] + "” The mennesker came, with a harber.\n\n“" + declaration["Welsh"] + "”\n\n“" +
		declaration["Spanish"] + "”\n"
	for range 6 {
		s := desk(t, text)
		require.NotEmpty(t, passages(s))
		for range 12 {
			found := passages(s)
			e := found[r.IntN(len(found))]
			switch r.IntN(6) {
			case 0, 1:
				write(t, s, s.Docket.Ruling(e, ledger.Unfold, nil, nil))
			case 2:
				write(t, s, s.Docket.Ruling(e, ledger.Reject, nil, nil))
			case 3:
				e := s.Docket.Entries[r.IntN(len(s.Docket.Entries))]
				if e.Kind != Passage {
					rule(t, s, e.Form, ledger.Accept, strings.ToUpper(e.Form))
				}
			case 4:
				write(t, s, s.Docket.Ruling(e, ledger.Later, nil, nil))
			case 5:
				if last, _ := s.Docket.Last(); last != nil {
					undo(t, s, *last)
				}
			}
			got := snapshot(s)
			require.Equal(t, got, slices.Compact(slices.Clone(got)))
			emended(t, s)
			s.Docket.Reorder(Orders()[r.IntN(len(Orders()))], nil)
			s = reopen(t, s)
			require.Equal(t, snapshot(s), got)
		}
	}
}
