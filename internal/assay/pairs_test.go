package assay

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/align"
)

func TestPairsAreRead(t *testing.T) {
	tests := []struct {
		name, text string
		want       []Pair
	}{
		{"a head", "misspelling\tintended\nteh\tthe\n", []Pair{{"teh", []string{"the"}}}},
		{"a head of other names", "form\tintended\nteh\tthe\n", []Pair{{"teh", []string{"the"}}}},
		{"no head, a mark of the byte order", "\ufeffteh\tthe\r\n", []Pair{{"teh", []string{"the"}}}},
		{"what a head says, further down", "teh\tthe\nmisspelling\tspelling\n", []Pair{{"teh", []string{"the"}}, {"misspelling", []string{"spelling"}}}},
		{"several words, one of them twice", "wether\tweather, whether,weather,\n", []Pair{{"wether", []string{"weather", "whether"}}}},
		{"lines in their order, repeats too", "b\tc\na\tc\nb\tc\n", []Pair{{"b", []string{"c"}}, {"a", []string{"c"}}, {"b", []string{"c"}}}},
		{"two words, a third column", "alot\ta  lot\tsplit\n", []Pair{{"alot", []string{"a lot"}}}},
		{"capitals and apostrophes stay", " Dosn’t\tDoesn't\n", []Pair{{"Dosn’t", []string{"Doesn't"}}}},
		{"an empty side", "\tthe\nteh\t\n", []Pair{{"", []string{"the"}}, {"teh", nil}}},
		{"remarks, empty lines", "# ours\n\nteh\tthe\n", []Pair{{"teh", []string{"the"}}}},
		{"as long as a side may be", strings.Repeat("a", 256) + "\tb\n", []Pair{{strings.Repeat("a", 256), []string{"b"}}}},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			got, err := ReadPairs(strings.NewReader(tt.text), "pairs.tsv")
			require.NoError(t, err)
			assert.Equal(t, tt.want, got)
		})
	}
}

func TestPairsThatCannotBeReadSayWhere(t *testing.T) {
	tests := []struct{ name, text, want string }{
		{"no tab", "misspelling\tintended\nteh the\n", "pairs.tsv: line 2: no tab; want misspelling, tab, intended word"},
		{"not UTF-8", "teh\tthe\ngarda\xef\tgarda\n", "pairs.tsv: line 2: not valid UTF-8; convert it first"},
		{"a long form", strings.Repeat("a", 257) + "\tb\n", "pairs.tsv: line 1: a word of 257 bytes; 256 are the most"},
		{"a long word", "teh\tthe," + strings.Repeat("a", 300) + "\n", "pairs.tsv: line 1: a word of 300 bytes; 256 are the most"},
		{"a line without end", "a\t" + strings.Repeat("b", 1<<17), "pairs.tsv: line 1: "},
		{"nothing", "", "pairs.tsv: no pairs; want misspelling, tab, intended word, a pair a line"},
		{"a head alone", "misspelling\tintended\n", "pairs.tsv: no pairs"},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			_, err := ReadPairs(strings.NewReader(tt.text), "pairs.tsv")
			assert.ErrorContains(t, err, tt.want)
		})
	}
}

func FuzzPairsHoldWhatFittingTakes(f *testing.F) {
	for _, seed := range []string{
		"misspelling\tintended\nteh\tthe\n", "wether\tweather, whether\n", "alot\ta  lot\tsplit\n", "Dosn’t\tDoesn't\n",
		"\tthe\n", "teh\t\n", "# ours\n\nteh\tTHE,Teh\n", "\ufeffcre\u0300che\tcrèche,creche\n", "a\t,\xff", "teh the",
	} {
		f.Add(seed)
	}
	f.Fuzz(func(t *testing.T, text string) {
		pairs, err := ReadPairs(strings.NewReader(text), "pairs.tsv")
		if err != nil {
			assert.ErrorContains(t, err, "pairs.tsv: ")
			return
		}
		assert.NotEmpty(t, pairs)
		fit, leftOut := ToFit(pairs)
		assert.LessOrEqual(t, leftOut[NoForm]+leftOut[NoIntended]+leftOut[SameWord], len(pairs))
		for _, p := range fit {
			assert.NotEmpty(t, p.Form)
			assert.NotEmpty(t, p.Word)
			assert.NotEqual(t, p.Form, p.Word)
			assert.Greater(t, p.Weight, 0.0)
			assert.LessOrEqual(t, p.Weight, 1.0)
		}
	})
}

func TestPairsToFit(t *testing.T) {
	var a align.Alphabet
	pair := func(form, word string, weight float64) align.Pair {
		return align.Pair{Form: a.Letters(form), Word: a.Letters(word), Weight: weight}
	}
	tests := []struct {
		name string
		pair Pair
		want []align.Pair
		why  Reason
	}{
		{"one word", Pair{"Teh", []string{"The"}}, []align.Pair{pair("teh", "the", 1)}, ""},
		{"words share the weight", Pair{"wether", []string{"weather", "whether"}}, []align.Pair{pair("wether", "weather", 0.5), pair("wether", "whether", 0.5)}, ""},
		{"two words", Pair{"alot", []string{"a lot"}}, []align.Pair{pair("alot", "a lot", 1)}, ""},
		{"apostrophes", Pair{"dont", []string{"don’t"}}, []align.Pair{pair("dont", "don't", 1)}, ""},
		{"one of two words the same", Pair{"america", []string{"America", "Americas"}}, []align.Pair{pair("america", "americas", 0.5)}, ""},
		{"capitals alone", Pair{"america", []string{"America"}}, []align.Pair{}, SameWord},
		{"apostrophes alone", Pair{"don't", []string{"don’t"}}, []align.Pair{}, SameWord},
		{"accents encoded otherwise", Pair{"cre\u0300che", []string{"cr\u00e8che"}}, []align.Pair{}, SameWord},
		{"no form", Pair{"", []string{"the"}}, []align.Pair{}, NoForm},
		{"no word", Pair{"teh", nil}, []align.Pair{}, NoIntended},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			got, leftOut := ToFit([]Pair{tt.pair})
			assert.Equal(t, tt.want, got)
			want := map[Reason]int{}
			if tt.why != "" {
				want[tt.why] = 1
			}
			assert.Equal(t, want, leftOut)
		})
	}
}
