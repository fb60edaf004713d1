package docket

import (
	"math/rand/v2"
	"os"
	"path/filepath"
	"slices"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/internal/ledger"
)

// demoDesk is the demo on the desk.
func demoDesk(t *testing.T) *Session {
	t.Helper()
	text, err := os.ReadFile("../../testdata/demo/manuscript.md")
	require.NoError(t, err)
	path := filepath.Join(t.TempDir(), "demo.md")
	require.NoError(t, os.WriteFile(path, text, 0o600))
	return start(t, path)
}

// Whatever has been passed and whatever the probabilities: no entry is lost or
// doubled, what has been passed stays at the front as it was, and the rest comes
// in an order that does not depend on how it stood before.
func TestReorderMovesOnlyWhatLiesAhead(t *testing.T) {
	d := demoDesk(t).Docket
	d.Find("lamp") // a word in context
	r := rand.New(rand.NewPCG(3, 5))
	for range 60 {
		slips := map[*Entry]float64{}
		for _, e := range d.Entries {
			if r.IntN(2) == 0 {
				slips[e] = float64(r.IntN(20)) / 20
			}
		}
		d.TakeSlips(slips)
		r.Shuffle(len(d.Entries), func(i, j int) { d.Entries[i], d.Entries[j] = d.Entries[j], d.Entries[i] })
		before := slices.Clone(d.Entries)
		passed := map[*Entry]bool{}
		for _, e := range before {
			passed[e] = r.IntN(3) == 0
		}
		var kept []*Entry
		for _, e := range before {
			if passed[e] {
				kept = append(kept, e)
			}
		}
		order := Orders()[r.IntN(len(Orders()))]
		d.Reorder(order, func(e *Entry) bool { return passed[e] })
		assert.Equal(t, order, d.Order())
		require.ElementsMatch(t, before, d.Entries)
		require.Equal(t, kept, d.Entries[:len(kept)])
		after := slices.Clone(d.Entries)

		ahead := d.Entries[len(kept):]
		r.Shuffle(len(ahead), func(i, j int) { ahead[i], ahead[j] = ahead[j], ahead[i] })
		d.Reorder(order, func(e *Entry) bool { return passed[e] })
		require.Equal(t, after, d.Entries, "%s", order)
	}
}

func TestOrders(t *testing.T) {
	s := desk(t, "# One\n\nA quaie, never a harber, a quaie, a zephyrr.\n\n# Two\n\nA quaie and an Ångstrand, a harber-light.\n\n"+
		"# Three\n\nA zephyrr, here is more of the same, and a zephyrr.\n")
	for _, c := range []struct {
		order Order
		want  []string
	}{
		{ByPlace, []string{"quaie", "harber", "zephyrr", "Ångstrand", "harber-light"}},
		{ByAlphabet, []string{"Ångstrand", "harber", "harber-light", "quaie", "zephyrr"}},
		{ByCount, []string{"quaie", "zephyrr", "harber", "Ångstrand", "harber-light"}},
		{ByDispersion, []string{"zephyrr", "quaie", "harber", "Ångstrand", "harber-light"}},
	} {
		s.Docket.Reorder(c.order, nil)
		assert.Equal(t, c.want, forms(s), c.order)
	}
}

// The text has a slip, a spelling of another variety, an elision, foreign words, a
// compound and names, two of them near each other.
func TestTheOrderBySlipPutsGroupsTogether(t *testing.T) {
	s := desk(t, "The colour of honour. So Tressick and Marrack went, and Tressick, with Pryle and Tressikk to seperate.\n\n"+
		"Then Tressick, Marrack and Pryle lay under the kelp-skerrel’s *velamar* light of gray, pokin’ about the harberside.\n",
		func(o *Options) { o.Variety = "british-ise" })
	d := s.Docket
	d.Find("lay")
	slips := map[*Entry]float64{}
	for _, e := range d.Entries {
		slips[e] = 0.01
	}
	slips[d.Find("seperate")] = 0.9
	slips[d.Find("harberside")] = 0.15
	slips[d.Find("Tressikk")] = 0.04
	d.TakeSlips(slips)
	d.Reorder(BySlip, nil)
	groups := []Group{}
	for _, e := range d.Entries {
		groups = append(groups, d.Group(e))
	}
	assert.True(t, slices.IsSorted(groups), "%v of %v", groups, forms(s))
	assert.Equal(t, []string{
		"seperate", "gray", "harberside", "pokin'", "velamar", "kelp-skerrel", "Tressick", "Tressikk", "Marrack", "Pryle", "lay",
	}, forms(s))

	slips[d.Find("Tressikk")] = 0.1
	d.TakeSlips(slips)
	d.Reorder(BySlip, nil)
	assert.Equal(t, []string{"seperate", "gray", "harberside", "Tressick", "Tressikk"}, forms(s)[:5],
		"a doubtful name brings its near forms along")
}

func TestRulingsLeaveTheOrderAlone(t *testing.T) {
	s := desk(t, "A harber, a lantrn, a quai.")
	s.Docket.Reorder(ByAlphabet, nil)
	before := forms(s)
	r := rule(t, s, "lantrn", ledger.Reject, "")
	assert.Equal(t, before, forms(s))
	undo(t, s, r)
	assert.Equal(t, before, forms(s))
}

func TestNextTurnsThroughAllOrders(t *testing.T) {
	o, seen := BySlip, []Order{}
	for range Orders() {
		seen = append(seen, o)
		o = o.Next()
	}
	assert.Equal(t, BySlip, o)
	assert.ElementsMatch(t, Orders(), seen)
}
