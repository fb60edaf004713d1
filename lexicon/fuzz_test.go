package lexicon_test

import (
	"slices"
	"strings"
	"testing"
	"unicode/utf8"

	"github.com/stretchr/testify/require"

	"emendary/align"
	"emendary/lexicon"
)

// Whatever the words of a list and the form, a search finds those that a
// comparison with each word finds.
func FuzzWithin(f *testing.F) {
	f.Add("abba baba abab aabb", "abab", uint8(2))
	f.Add("recieve receive receiver deceive", "recieve", uint8(1))
	f.Add("a b ab ba", "", uint8(2))
	f.Add("été ete Été", "tée", uint8(3))
	f.Add("o'clock o’clock oclock", "ocloc'k", uint8(4))
	f.Add(strings.Repeat("ab", 31)+"a "+strings.Repeat("ba", 32)+" "+strings.Repeat("ab", 32)+"b", strings.Repeat("ab", 32), uint8(4))
	f.Add("inserted in the middle", "inthe", uint8(5))
	f.Fuzz(func(t *testing.T, text, form string, k uint8) {
		if len(text) > 1000 || len(form) > 200 || !utf8.ValidString(form) {
			return
		}
		var words []lexicon.Word
		for _, w := range strings.Fields(text) {
			words = append(words, lexicon.Word{Text: w})
		}
		list, err := lexicon.NewList("fuzz", words)
		if err != nil || list.Len() == 0 {
			return // a word may have characters that none has
		}
		x := lexicon.New(list, lexicon.AnyVariety)
		edits := int(k % 7)
		fold := func(s string) []align.Letter { return x.Alphabet().Fold(x.Alphabet().Letters(s)) }
		letters := fold(form)
		var want []string
		for w := range list.Words() {
			if align.Restricted(letters, fold(w.Text)) <= edits {
				want = append(want, w.Text)
			}
		}
		var got []string
		for _, n := range x.Within(form, edits) {
			require.Equal(t, align.Restricted(letters, n.Letters), n.Distance)
			got = append(got, n.Word.Text)
		}
		slices.Sort(want)
		slices.Sort(got)
		require.Equal(t, want, got)
	})
}
