package lexicon_test

import (
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/lexicon"
)

func TestParseVarietyIsTheInverseOfFlag(t *testing.T) {
	for flag, want := range map[string]lexicon.Variety{
		"any": lexicon.AnyVariety, "american": lexicon.American, "british-ise": lexicon.BritishIse,
		"british-ize": lexicon.BritishIze, "canadian": lexicon.Canadian, "australian": lexicon.Australian,
	} {
		v, err := lexicon.ParseVariety(flag)
		require.NoError(t, err)
		assert.Equal(t, want, v)
		assert.Equal(t, flag, v.Flag())
	}
	_, err := lexicon.ParseVariety("British")
	assert.EqualError(t, err, `no variety is called "British"; choose one of any, american, british-ise, british-ize, canadian, australian`)
}

func TestNames(t *testing.T) {
	assert.Equal(t, "British -ise", lexicon.BritishIse.String())
	assert.Equal(t, "variety 99", lexicon.Variety(99).String())
	assert.Equal(t, "variety-99", lexicon.Variety(99).Flag())
	assert.Equal(t, "series", lexicon.Series.String())
	assert.Equal(t, "layer 9", lexicon.Layer(9).String())
	assert.Equal(t, "other variety", lexicon.OtherVariety.String())
	assert.Equal(t, "unknown", lexicon.Status(99).String())
}

func TestWordLevelIsThatOfTheVariety(t *testing.T) {
	grey := lexicon.Word{Text: "grey", Sources: []lexicon.Source{
		{Category: "british", Class: "words", Level: 10},
		{Category: "american", Class: "words", Level: 55},
		{Category: "american", Class: "upper", Level: 50},
		{Category: "variant_2", Class: "words", Level: 10},
	}}
	for _, c := range []struct {
		v     lexicon.Variety
		level int
		ok    bool
	}{
		{lexicon.BritishIse, 10, true}, {lexicon.American, 50, true}, {lexicon.AnyVariety, 10, true},
		{lexicon.BritishIze, 0, false}, {lexicon.Variety(99), 0, false},
	} {
		level, ok := grey.Level(c.v)
		assert.Equal(t, c.ok, ok, c.v)
		assert.Equal(t, c.level, level, c.v)
	}
	assert.Equal(t, []lexicon.Variety{lexicon.American, lexicon.BritishIse}, grey.Varieties())
	variant := lexicon.Word{Sources: []lexicon.Source{{Category: "british_variant_1", Class: "words", Level: 20}}}
	assert.Empty(t, variant.Varieties())
	_, ok := variant.Level(lexicon.AnyVariety)
	assert.False(t, ok)
}

func TestWordsWithoutSourcesAreOfEveryVariety(t *testing.T) {
	for layer, want := range map[lexicon.Layer]int{lexicon.Base: 50, lexicon.House: 0, lexicon.Book: 0} {
		level, ok := lexicon.Word{Layer: layer}.Level(lexicon.Canadian)
		assert.True(t, ok)
		assert.Equal(t, want, level)
	}
	assert.Equal(t, lexicon.Varieties(), lexicon.Word{}.Varieties())
}

func TestIsName(t *testing.T) {
	class := func(classes ...string) lexicon.Word {
		var w lexicon.Word
		for _, c := range classes {
			w.Sources = append(w.Sources, lexicon.Source{Category: "english", Class: c, Level: 35})
		}
		return w
	}
	for _, c := range []struct {
		word lexicon.Word
		want bool
	}{
		{lexicon.Word{}, false},
		{lexicon.Word{Kind: "person"}, true},
		{lexicon.Word{Kind: "place"}, true},
		{lexicon.Word{Kind: "vessel"}, true},
		{lexicon.Word{Kind: "name"}, true},
		{lexicon.Word{Kind: "term"}, false},
		{class("upper"), true},
		{class("proper-names", "upper"), true},
		{class("words"), false},
		{class("abbreviations"), false},
		{class("upper", "words"), false},
	} {
		assert.Equal(t, c.want, c.word.IsName(), c.word)
	}
}
