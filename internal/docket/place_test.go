package docket

import (
	"math/rand/v2"
	"os"
	"slices"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/internal/ledger"
)

// paragraphs of our own making, with the forms harber and lantrn in some of them,
// and a passage in one or none.
func invented(r *rand.Rand) []string {
	words := strings.Fields("the pilot saw a quay at dawn and nobody spoke of ice or rope until noon came with rain over every roof")
	out := make([]string, 12)
	for i := range out {
		var b []string
		for range 6 + r.IntN(14) {
			b = append(b, words[r.IntN(len(words))])
		}
		if r.IntN(3) > 0 {
			b = slices.Insert(b, r.IntN(len(b)), []string{"harber", "lantrn"}[r.IntN(2)])
		}
		out[i] = strings.Join(b, " ") + "."
	}
	if r.IntN(3) > 0 {
		out[r.IntN(len(out))] = "A voice sang: “" + declaration["Welsh"] + "” and the rain came."
	}
	return out
}

// changed is the manuscript after an author was at it: paragraphs moved, taken out,
// put in, words changed.
func changed(r *rand.Rand, paragraphs []string) []string {
	out := slices.Clone(paragraphs)
	for range 1 + r.IntN(4) {
		i := r.IntN(len(out))
		switch r.IntN(4) {
		case 0:
			out = slices.Insert(out, i, "Something new stands here about a harber.")
		case 1:
			out = slices.Delete(out, i, i+1)
		case 2:
			j := r.IntN(len(out))
			out[i], out[j] = out[j], out[i]
		case 3:
			out[i] = "And then, " + out[i]
		}
	}
	return out
}

// Whatever happens to the manuscript, each place of a ruling is found again on its
// own form, once, or listed: none is dropped, none lands on another word.
func TestEveryPlaceIsFoundAgainOrListed(t *testing.T) {
	r := rand.New(rand.NewPCG(7, 11))
	found, listed, songs := 0, 0, 0
	for range 40 {
		before := invented(r)
		s := desk(t, strings.Join(before, "\n\n")+"\n")
		places := map[string]int{}
		for _, form := range []string{"harber", "lantrn"} {
			e := s.Docket.Find(form)
			if e == nil || len(e.Occurrences) < 2 {
				continue
			}
			rule(t, s, form, ledger.Accept, "X"+form, 0)
			places[form] = 1
		}
		for _, e := range passages(s) {
			stand := s.Docket.Ruling(e, ledger.Reject, nil, nil)
			stand.Kind = "Welsh"
			write(t, s, stand)
			places[e.Form] = 1
			songs++
		}
		after := strings.Join(changed(r, before), "\n\n") + "\n"
		require.NoError(t, os.WriteFile(s.Options.Manuscript, []byte(after), 0o600))
		s = reopen(t, s)
		for form, want := range places {
			ruled, unplaced := 0, 0
			if e := s.Docket.Find(form); e != nil {
				for _, o := range e.Occurrences {
					if o.Ruling != nil {
						ruled++
						assert.Equal(t, form, o.Ruling.Form)
						assert.Equal(t, form, plainApostrophe(o.Text))
					}
				}
			}
			for _, u := range s.Docket.Unplaced {
				if u.Ruling.Form == form {
					unplaced++
				}
			}
			assert.Equal(t, want, ruled+unplaced, "%s in\n%s", form, after)
			found, listed = found+ruled, listed+unplaced
		}
	}
	assert.Greater(t, songs, 10)
	assert.Greater(t, found, 5*listed, "most places are found: %d found, %d listed", found, listed)
	t.Logf("%d places found again, %d listed", found, listed)
}
