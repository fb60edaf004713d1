package align_test

import (
	"fmt"
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/align"
)

// spell writes an alignment for people: agreeing letters as they are, else
// [from>to].
func spell(a align.Alignment) string {
	var b strings.Builder
	for _, e := range a.Edits {
		if e.Op == align.Agreement {
			b.WriteString(text(e.To))
		} else {
			fmt.Fprintf(&b, "[%s>%s]", text(e.From), text(e.To))
		}
	}
	return b.String()
}

func TestTiesAreBrokenByTheStatedRule(t *testing.T) {
	tests := []struct{ form, word, want string }{
		{"harber", "harbour", "harb[e>o][>u]r"},
		{"harbour", "harber", "harb[o>e][u>]r"},
		{"acomodate", "accommodate", "ac[>c]om[>m]odate"},
		{"neeed", "need", "nee[e>]d"},
		{"recieve", "receive", "rec[ie>ei]ve"},
		{"nite", "night", "ni[>g][>h]t[e>]"}, // keeps t, at no more cost
		{"aba", "bab", "[a>b][ba>ab]"},       // each way keeps two letters
		{"abx", "ba", "[ab>ba][x>]"},
		{"ab", "", "[a>][b>]"},
		{"", "ab", "[>a][>b]"},
		{"", "", ""},
	}
	for _, test := range tests {
		assert.Equal(t, test.want, spell(align.Align(letters(test.form), letters(test.word), align.Unit{})), "%s/%s", test.form, test.word)
	}
}

// check proves what holds for every alignment.
func check(t testing.TB, form, word []align.Letter, a align.Alignment) {
	t.Helper()
	got, err := a.Apply(form)
	require.NoError(t, err)
	require.Equal(t, text(word), text(got))
	joined := []align.Letter{}
	elements := a.Replacements(len(form))
	require.Len(t, elements, len(form))
	for _, e := range elements {
		joined = append(joined, e...)
	}
	if len(form) > 0 {
		require.Equal(t, text(word), text(joined))
	}
	sum := 0.0
	for _, e := range a.Edits {
		sum += e.Cost
	}
	require.Equal(t, sum, a.Cost)
}

func TestAlignmentsAreThoseOfTheEnumeration(t *testing.T) {
	compare := func(form, word []align.Letter, costs align.Costs) {
		t.Helper()
		want, least := cheapest(form, word, costs)
		a := align.Align(form, word, costs)
		all := align.All(form, word, costs, len(want)+1)
		require.Equal(t, uint64(len(want)), align.Count(form, word, costs))
		if len(want) == 0 {
			require.Equal(t, align.Alignment{Cost: math.Inf(1)}, a)
			require.Empty(t, all)
			return
		}
		require.InDelta(t, least, a.Cost, 1e-6)
		require.Equal(t, a, all[0])
		var got [][][2]int
		for _, one := range all {
			check(t, form, word, one)
			got = append(got, sizes(one))
		}
		require.ElementsMatch(t, want, got)
		require.Equal(t, all[:(len(all)+1)/2], align.All(form, word, costs, (len(all)+1)/2))
	}
	all := stringsOver(2, 4)
	for _, form := range all {
		for _, word := range all {
			compare(form, word, align.Unit{})
			if len(form)+len(word) < 7 {
				compare(form, word, bits{})
			}
		}
	}
	r := rand.New(rand.NewPCG(3, 4))
	for range 300 {
		compare(random(r, "abc", 5), random(r, "abc", 5), align.Unit{})
		compare(random(r, "abc", 4), random(r, "abc", 4), bits{})
	}
}

func TestUnitAlignmentCostsTheRestrictedDistanceBothWays(t *testing.T) {
	r := rand.New(rand.NewPCG(5, 6))
	for range 1000 {
		form, word := random(r, "abcdé漢", 15), random(r, "abcdé漢", 15)
		a := align.Align(form, word, align.Unit{})
		check(t, form, word, a)
		require.Equal(t, float64(align.Restricted(form, word)), a.Cost)
		require.Equal(t, a.Cost, align.Align(word, form, align.Unit{}).Cost)

		// The same edits backwards turn the word into the form.
		inverse := align.Alignment{Cost: a.Cost}
		for _, e := range a.Edits {
			e.I, e.J, e.From, e.To = e.J, e.I, e.To, e.From
			inverse.Edits = append(inverse.Edits, e)
		}
		check(t, word, form, inverse)
	}
}

// scores are similarity scores with the sign turned, so that the highest score is
// the least cost.
type scores struct{ match, mismatch, gap float64 }

func (scores) Span() (m, n int) { return 1, 1 }

func (s scores) Cost(form []align.Letter, i, m int, word []align.Letter, j, n int) float64 {
	switch {
	case m == 0 || n == 0:
		return -s.gap
	case form[i] == word[j]:
		return -s.match
	}
	return -s.mismatch
}

// Needleman & Wunsch 1970, the usual example.
func TestScoresAreCostsWithTheSignTurned(t *testing.T) {
	form, word := letters("GCATGCU"), letters("GATTACA")
	a := align.Align(form, word, scores{match: 1, mismatch: -1, gap: -1})
	check(t, form, word, a)
	assert.Equal(t, 0.0, a.Cost)
}

func TestCountSaturates(t *testing.T) {
	// From n times a to 2n times a there are C(2n, n) ways to insert.
	long := letters(strings.Repeat("a", 80))
	assert.Equal(t, uint64(math.MaxUint64), align.Count(long[:40], long, align.Unit{}))
	assert.Equal(t, uint64(184756), align.Count(long[:10], long[:20], align.Unit{}))
	assert.Len(t, align.All(long[:40], long, align.Unit{}, 50), 50)
	assert.Empty(t, align.All(long, long, align.Unit{}, 0))
}

// odd are costs that no one should write.
type odd struct{ cost float64 }

func (odd) Span() (m, n int) { return -1, math.MaxInt }

func (o odd) Cost([]align.Letter, int, int, []align.Letter, int, int) float64 { return o.cost }

func TestCostsThatKnowNoWayGiveNoAlignment(t *testing.T) {
	for _, cost := range []float64{math.NaN(), math.Inf(1), math.Inf(-1), 0} {
		a := align.Align(letters("ab"), letters("ab"), odd{cost})
		assert.Equal(t, align.Alignment{Cost: math.Inf(1)}, a)
		assert.Zero(t, align.Count(letters("ab"), letters("ab"), odd{cost}))
		assert.Empty(t, align.All(letters("ab"), letters("ab"), odd{cost}, 9))
	}
	assert.Equal(t, math.Inf(1), align.Unit{}.Cost(letters("ab"), 1, 2, nil, 0, 0))
}

func TestApplyRefusesWhatDoesNotFit(t *testing.T) {
	a := align.Align(letters("harber"), letters("harbour"), align.Unit{})
	_, err := a.Apply(letters("hamper"))
	assert.EqualError(t, err, "edit 3 (agreement) does not fit the form at letter 3; apply the alignment to the form it was made from")
	_, err = a.Apply(letters("harbers"))
	assert.ErrorContains(t, err, "the edits end after letter 6 of a form of 7")
	a.Edits = a.Edits[1:]
	_, err = a.Apply(letters("harber"))
	assert.ErrorContains(t, err, "edit 1 (agreement) is at letter 2")
}

func TestReplacements(t *testing.T) {
	tests := []struct {
		form, word string
		want       []string
	}{
		{"harber", "harbour", []string{"h", "a", "r", "b", "ou", "r"}},
		{"arbour", "harbour", []string{"ha", "r", "b", "o", "u", "r"}},
		{"teh", "the", []string{"t", "h", "e"}},
		{"neeed", "need", []string{"n", "e", "e", "", "d"}},
		{"", "a", []string{}},
	}
	for _, test := range tests {
		got := []string{}
		for _, e := range align.Align(letters(test.form), letters(test.word), align.Unit{}).Replacements(len(test.form)) {
			got = append(got, text(e))
		}
		assert.Equal(t, test.want, got)
	}
}

func TestStarReadsBack(t *testing.T) {
	r := rand.New(rand.NewPCG(7, 8))
	for n := range 400 {
		form := random(r, "abc", 6)
		var costs align.Costs = align.Unit{}
		if n%2 == 1 {
			costs = bits{}
		}
		var words []string
		var alignments []align.Alignment
		for range 4 {
			word := random(r, "abc", 6)
			if a := align.Align(form, word, costs); !math.IsInf(a.Cost, 1) {
				words, alignments = append(words, text(word)), append(alignments, a)
			}
		}
		grid := align.Star(form, alignments)
		next := 0
		for _, c := range grid.Columns {
			if c.Form >= 0 {
				require.Equal(t, next, c.Form)
				next++
			}
		}
		require.Equal(t, len(form), next)
		require.Len(t, grid.Rows, len(words))
		for i, row := range grid.Rows {
			require.Len(t, row, len(grid.Columns))
			word, covered := "", 0
			for _, cell := range row {
				word += text(cell.To)
				require.Equal(t, covered > 0, cell.Span == 0)
				covered = max(covered, cell.Span) - 1
				if covered < 0 {
					covered = 0
				}
			}
			require.Zero(t, covered)
			require.Equal(t, words[i], word)
		}
	}
}

func FuzzAlignApply(f *testing.F) {
	for _, p := range [][2]string{{"harber", "harbour"}, {"", "a"}, {"CA", "ABC"}, {"cafe\u0301", "café"}, {"\xff", "é"}, {"aba", "bab"}} {
		f.Add(p[0], p[1])
	}
	f.Fuzz(func(t *testing.T, s, u string) {
		var a align.Alphabet
		form, word := a.Letters(s), a.Letters(u)
		form, word = form[:min(len(form), 60)], word[:min(len(word), 60)]
		one := align.Align(form, word, align.Unit{})
		check(t, form, word, one)
		require.Equal(t, float64(align.Restricted(form, word)), one.Cost)
		check(t, form, word, align.Align(form, word, scores{1, -1, -1}))
		align.Star(word, []align.Alignment{one}) // of another form: nonsense, but no panic
	})
}
