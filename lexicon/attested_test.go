package lexicon_test

import (
	"iter"
	"testing"

	"github.com/stretchr/testify/assert"

	"emendary/lexicon"
	"emendary/lexicon/english"
)

// counts gives each form a count of one more for each time it is named.
func counts(forms ...string) iter.Seq2[string, int] {
	return func(yield func(string, int) bool) {
		for _, form := range forms {
			if !yield(form, 1) {
				return
			}
		}
	}
}

func TestAttested(t *testing.T) {
	x := lexicon.New(english.Base(), lexicon.Canadian).With(lexicon.House, load(t, "colour → color"))
	for _, c := range []struct {
		name  string
		forms []string
		want  lexicon.Variety
	}{
		{"nothing", nil, lexicon.AnyVariety},
		{"what all share", []string{"water", "Thames", "xyzzy"}, lexicon.AnyVariety},
		{"variants only", []string{"gaol"}, lexicon.AnyVariety},
		{"American", []string{"harbor", "water"}, lexicon.American},
		{"-ise", []string{"Harbour", "realise"}, lexicon.BritishIse},
		{"-ize", []string{"HARBOUR", "realize"}, lexicon.BritishIze},
		{"no -ise or -ize to tell by", []string{"colour", "water"}, lexicon.BritishIse},
		{"-ize alone", []string{"realize"}, lexicon.American},
		{"Canadian", []string{"colour", "realize", "analyze"}, lexicon.Canadian},
		{"Australian", []string{"colour", "realise", "arvo", "Redback"}, lexicon.Australian},
		{"a slip does not turn it", []string{"color", "harbor", "neighbor", "colour"}, lexicon.American},
	} {
		got, _ := x.Attested(counts(c.forms...))
		assert.Equal(t, c.want, got, c.name)
	}
	_, evidence := x.Attested(func(yield func(string, int) bool) {
		_ = yield("colour", 5) && yield("realize", 2) && yield("color", 1) && yield("harbor", -3)
	})
	assert.Equal(t, map[lexicon.Variety]int{
		lexicon.American: 3, lexicon.BritishIse: 5, lexicon.BritishIze: 7, lexicon.Canadian: 7, lexicon.Australian: 5,
	}, evidence)
	v, _ := x.Attested(nil)
	assert.Equal(t, lexicon.AnyVariety, v)
}
