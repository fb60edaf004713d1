package align_test

import (
	"bufio"
	"bytes"
	"context"
	"math"
	"os"
	"strings"
	"sync"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/align"
)

// listed are the pairs of the open list of misspellings that testdata/README.md
// names, those of several words aside.
var listed = sync.OnceValues(func() ([]align.Pair, error) {
	f, err := os.Open("../testdata/wikipedia-misspellings.tsv")
	if err != nil {
		return nil, err
	}
	defer f.Close()
	var a align.Alphabet
	fold := func(s string) []align.Letter { return a.Fold(a.Letters(s)) }
	var pairs []align.Pair
	lines := bufio.NewScanner(f)
	for lines.Scan() {
		form, words, _ := strings.Cut(lines.Text(), "\t")
		all := strings.Split(words, ",")
		for _, word := range all {
			if form != "misspelling" && !strings.Contains(word, " ") && !strings.EqualFold(form, word) {
				pairs = append(pairs, align.Pair{Form: fold(form), Word: fold(word), Weight: 1 / float64(len(all))})
			}
		}
	}
	return pairs, lines.Err()
})

func fittedPairs(t testing.TB) []align.Pair {
	pairs, err := listed()
	require.NoError(t, err)
	require.Greater(t, len(pairs), 4000)
	return pairs
}

// some are costs fitted to every fourth pair.
var some = sync.OnceValues(func() (*align.Fitted, error) {
	pairs, err := listed()
	if err != nil {
		return nil, err
	}
	var quarter []align.Pair
	for i := 0; i < len(pairs); i += 4 {
		quarter = append(quarter, pairs[i])
	}
	return align.Fit(context.Background(), quarter, align.Origin{Source: "a list", Licence: "free", Date: "2026-12-01"}, nil)
})

func someCosts(t testing.TB) *align.Fitted {
	costs, err := some()
	require.NoError(t, err)
	return costs
}

// What the costs were not fitted to (three pairs in four) they still price as one
// who knows such slips would: the order is what is tested, no figure.
func TestFittedCostsOrderSlipsAsTheyAreCommon(t *testing.T) {
	costs := someCosts(t)
	cost := func(form, word string) float64 {
		return align.Align(letters(form), letters(word), costs).Cost
	}
	tests := []struct{ name, form, likely, unlikely string }{
		{"a vowel rather than a consonant", "seperate", "separate", "seberate"},
		{"a transposition rather than two substitutions", "recieve", "receive", "relapve"},
		{"a doubled letter rather than another", "harrassment", "harassment", "arrassment"},
		{"an undoubled letter rather than another", "acomodate", "accommodate", "acomodatexx"},
		{"a neighbouring key rather than a far one", "wirld", "world", "wprld"},
		{"letters that look like one", "modem", "modern", "moderx"},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			assert.Less(t, cost(tt.form, tt.likely), cost(tt.form, tt.unlikely))
		})
	}
}

// A search knows no more of a word than it has read.
func TestFittedCostsLookAtNoMoreOfTheWordThanTheEdit(t *testing.T) {
	costs := someCosts(t)
	for _, p := range fittedPairs(t)[:300] {
		other := append(append([]align.Letter{}, p.Word...), letters("zq")...)
		for i := range p.Form {
			for j := range p.Word {
				for m := 0; m <= min(3, len(p.Form)-i); m++ {
					for n := 0; n <= min(3, len(p.Word)-j); n++ {
						want := costs.Cost(p.Form, i, m, p.Word[:j+n], j, n)
						require.Equal(t, want, costs.Cost(p.Form, i, m, other, j, n))
						require.True(t, math.IsInf(want, 1) || want > 0 && want == math.Trunc(want/align.Grain)*align.Grain)
					}
				}
			}
		}
	}
}

func TestScorerFindsTheCostOfTheCheapestAlignment(t *testing.T) {
	costs := someCosts(t)
	pairs := fittedPairs(t)
	sheet := costs.Sheet(nil)
	var scorer align.Scorer
	for i := 0; i < len(pairs); i += 5 {
		form := pairs[i].Form
		for _, word := range [][]align.Letter{pairs[i].Word, pairs[(i*7+3)%len(pairs)].Word, letters("naïve"), nil} {
			want := align.Align(form, word, costs).Cost
			sheet.Reset(costs, form)
			got, ok := scorer.Score(sheet, word, math.MaxInt32/4)
			require.True(t, ok)
			require.Equal(t, want, float64(got)*align.Grain)
			_, ok = scorer.Score(sheet, word, got)
			require.False(t, ok, "nothing is below the least")
		}
	}
}

func TestCostsComeBackFromAFile(t *testing.T) {
	costs := someCosts(t)
	var file bytes.Buffer
	n, err := costs.WriteTo(&file)
	require.NoError(t, err)
	assert.EqualValues(t, file.Len(), n)
	again, err := align.ReadCosts(bytes.NewReader(file.Bytes()), "some.costs")
	require.NoError(t, err)
	assert.Equal(t, costs.Origin, again.Origin)
	for _, p := range fittedPairs(t)[:500] {
		want := align.Align(p.Form, p.Word, costs).Cost
		assert.InDelta(t, want, align.Align(p.Form, p.Word, again).Cost, 0.02*want+0.2)
	}
	var second bytes.Buffer
	_, err = again.WriteTo(&second)
	require.NoError(t, err)
	assert.Equal(t, file.String(), second.String(), "a file read and written is the same file")
}

func TestReadCostsRefusesWhatIsNone(t *testing.T) {
	tests := []struct{ name, file, want string }{
		{"nothing", "", "x: it has no costs; fit some"},
		{"another file", "form\tword\n", `x: no file of costs: it begins with "form\tword", not with "emendary costs 1"; fit one anew`},
		{"no costs", "emendary costs 1\nsource\ta list\n", "x: it has no costs; fit some"},
		{"an unknown line", "emendary costs 1\nweather\tfine\n", `x: line 2: "weather" says nothing known; fit the costs anew`},
		{"a field too few", "emendary costs 1\nkeys\t0\n", "x: line 2: keys has 1 fields, not 2; fit the costs anew"},
		{"no number", "emendary costs 1\nletter\ta\tb\tc\tmany\n", `x: line 2: "many" is no count; fit the costs anew`},
		{"below nothing", "emendary costs 1\nlong\tab\tc\t-1\n", `x: line 2: "-1" is no count; fit the costs anew`},
		{"no letter", "emendary costs 1\ngap\ta\té\t1\n", `x: line 2: "é" is no letter; letters are written as one of #abcdefghijklmnopqrstuvwxyz'-_.*; fit the costs anew`},
		{"the edge as a letter", "emendary costs 1\nlong\ta\t#a\t1\n", `x: line 2: "#a" is not one to three letters; fit the costs anew`},
		{"too many letters", "emendary costs 1\nstretch\tabcd\t1\t0\n", `x: line 2: "abcd" is not one to three letters; fit the costs anew`},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			_, err := align.ReadCosts(strings.NewReader(tt.file), "x")
			assert.EqualError(t, err, tt.want)
		})
	}
}

func TestFitStopsWhenAskedAndWantsPairs(t *testing.T) {
	_, err := align.Fit(context.Background(), nil, align.Origin{}, nil)
	assert.Error(t, err)
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	_, err = align.Fit(ctx, fittedPairs(t), align.Origin{}, nil)
	assert.ErrorIs(t, err, context.Canceled)
}

// Also of pairs so long and unlike that their probability is no number above 0.
func TestBitsAreThoseOfAllAlignmentsTogether(t *testing.T) {
	costs := someCosts(t)
	tests := []struct{ name, form, word string }{
		{"one letter", "a", "e"},
		{"one slip", "recieve", "receive"},
		{"many slips", "fisikle", "physical"},
		{"unlike and long", strings.Repeat("q", 200), strings.Repeat("z", 190)},
		{"half unlike", strings.Repeat("q", 120) + strings.Repeat("e", 130), strings.Repeat("z", 120) + strings.Repeat("e", 130)},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			got := costs.Bits([]align.Pair{{Form: letters(tt.form), Word: letters(tt.word), Weight: 2}})
			cheapest := align.Align(letters(tt.form), letters(tt.word), costs).Cost
			assert.LessOrEqual(t, got, cheapest, "one alignment is as likely as all at the most")
			assert.Greater(t, got, cheapest/2-8)
		})
	}
	assert.Zero(t, costs.Bits(nil))
}

func TestFitMakesPairsLikelier(t *testing.T) {
	pairs := fittedPairs(t)[:400]
	costs, err := align.Fit(context.Background(), pairs, align.Origin{}, nil)
	require.NoError(t, err)
	assert.Less(t, costs.Bits(pairs), align.Unfitted().Bits(pairs))
	again, err := align.Fit(context.Background(), pairs, align.Origin{}, nil)
	require.NoError(t, err)
	var file, second bytes.Buffer
	_, err = costs.WriteTo(&file)
	require.NoError(t, err)
	_, err = again.WriteTo(&second)
	require.NoError(t, err)
	assert.Equal(t, file.String(), second.String(), "the same pairs give the same costs")
}

// Compiled costs are those of the file, to the last bit.
func TestCompiledCostsAreThoseOfTheFile(t *testing.T) {
	var file bytes.Buffer
	_, err := someCosts(t).WriteTo(&file)
	require.NoError(t, err)
	read, err := align.ReadCosts(&file, "some.costs")
	require.NoError(t, err)
	compiled, err := read.AppendBinary(nil)
	require.NoError(t, err)
	opened, err := align.OpenCosts("some", string(compiled))
	require.NoError(t, err)
	require.Equal(t, read, opened)
}

func TestOpenCostsRefusesWhatIsNone(t *testing.T) {
	compiled, err := someCosts(t).AppendBinary(nil)
	require.NoError(t, err)
	whole := string(compiled)
	for n := range len(whole) {
		_, err := align.OpenCosts("x", whole[:n])
		require.ErrorContains(t, err, "x: no compiled costs: ", "the first %d bytes", n)
	}
	_, err = align.OpenCosts("x", whole+"a")
	assert.EqualError(t, err, "x: no compiled costs: it ends too soon or too late; compile them anew")
	_, err = align.OpenCosts("x", "emendary costs 1\n")
	assert.EqualError(t, err, "x: no compiled costs: other first bytes than expected; compile them anew")
}

// Damaged costs are refused or priced; nothing else happens to them.
func FuzzOpenCosts(f *testing.F) {
	costs, err := align.Fit(context.Background(), []align.Pair{{Form: letters("teh"), Word: letters("the"), Weight: 1}}, align.Origin{Source: "a list"}, nil)
	require.NoError(f, err)
	compiled, err := costs.AppendBinary(nil)
	require.NoError(f, err)
	f.Add(string(compiled))
	f.Add(string(compiled[:len(compiled)/2]))
	f.Add("costs\x01\xff\xff")
	f.Fuzz(func(t *testing.T, data string) {
		costs, err := align.OpenCosts("x", data)
		if err != nil {
			assert.ErrorContains(t, err, "compile them anew")
			return
		}
		align.Align(letters("cleer"), letters("clear"), costs)
		costs.Sheet(letters("modem"))
	})
}
