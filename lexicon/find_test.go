package lexicon_test

import (
	"strings"
	"sync"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/lexicon"
	"emendary/lexicon/english"
)

func words(f lexicon.Finding) string {
	var all []string
	for _, w := range f.Words {
		all = append(all, w.Text)
	}
	return strings.Join(all, " ")
}

// The rules are those of the package comment.
func TestEntriesCoverFormsByCase(t *testing.T) {
	x := lexicon.New(load(t, strings.Join([]string{
		"harbour", "McKay", "Thames", "iPad", "OK", "rose", "Rose", "o'clock", "don't", "'tis", "O’Shea",
		"harbour-master", "éclair", "Ärger", "ẍylo", "straße", "3d", "a", "I", "ʻokina", "ǆep",
	}, "\n")), lexicon.AnyVariety)
	for form, want := range map[string]string{
		"harbour": "harbour", "Harbour": "harbour", "HARBOUR": "harbour", "HarBour": "", "hARBOUR": "", "HARBOUr": "",
		"McKay": "McKay", "MCKAY": "McKay", "Mckay": "", "mckay": "", "McKAY": "",
		"Thames": "Thames", "THAMES": "Thames", "thames": "",
		"iPad": "iPad", "IPAD": "iPad", "IPad": "", "ipad": "", "Ipad": "",
		"OK": "OK", "ok": "", "Ok": "",
		"rose": "rose", "Rose": "Rose rose", "ROSE": "Rose rose",
		"o'clock": "o'clock", "o’clock": "o'clock", "O’clock": "o'clock", "O’CLOCK": "o'clock", "O’Clock": "",
		"don’t": "don't", "Don't": "don't", "DON’T": "don't",
		"’tis": "'tis", "’Tis": "'tis", "'TIS": "'tis",
		"O’Shea": "O’Shea", "O'Shea": "O’Shea", "O'SHEA": "O’Shea", "o'shea": "",
		"harbour-master": "harbour-master", "Harbour\u2010master": "harbour-master", "HARBOUR\u2011MASTER": "harbour-master", "Harbour-Master": "",
		"Éclair": "éclair", "ÉCLAIR": "éclair", "e\u0301clair": "éclair", "eclair": "",
		"Ärger": "Ärger", "ärger": "", "ÄRGER": "Ärger",
		"Ẍylo": "ẍylo", "ẌYLO": "ẍylo", "x\u0308ylo": "ẍylo",
		"Straße": "straße", "STRAẞE": "straße", "STRASSE": "",
		"3d": "3d", "3D": "3d",
		"A": "a", "I": "I", "i": "", "": "", "'": "",
		"ʻOkina": "ʻokina", "ǅep": "ǆep", "ǄEP": "ǆep",
	} {
		got := x.Find(form)
		assert.Equal(t, want, words(got), "%q", form)
		assert.Equal(t, want != "", got.Status == lexicon.Known, "%q", form)
	}
}

func TestFullStops(t *testing.T) {
	source := func(class string) []lexicon.Source {
		return []lexicon.Source{{Category: "english", Class: class, Level: 35}}
	}
	l, err := lexicon.NewList("stops", []lexicon.Word{
		{Text: "Mr", Sources: source("abbreviations")}, {Text: "US", Sources: source("abbreviations")},
		{Text: "US", Sources: source("abbreviations")}, {Text: "us", Sources: source("words")},
		{Text: "e.g.", Sources: source("abbreviations")}, {Text: "Dr."}, {Text: "at", Sources: source("words")},
	})
	require.NoError(t, err)
	x := lexicon.New(l, lexicon.AnyVariety)
	for form, want := range map[string]string{
		"Mr": "Mr", "Mr.": "Mr", "MR.": "Mr", "mr": "",
		"Dr": "Dr.", "Dr.": "Dr.", "DR": "Dr.",
		"e.g": "e.g.", "e.g.": "e.g.", "E.g.": "e.g.", "eg": "",
		"U.S.": "US", "U.S": "US", "u.s.": "", "U..S": "", ".U.S": "", "U.": "",
		"a.t.": "", "at.": "at", ".": "", "..": "", "...": "",
	} {
		assert.Equal(t, want, words(x.Find(form)), "%q", form)
	}
}

func TestTheHighestLayerDecides(t *testing.T) {
	x := lexicon.New(load(t, "okay\nOK\npolish\nPolish\nharbour"), lexicon.AnyVariety)
	house := x.With(lexicon.House, load(t, "okay → OK\nalright → all right\nPolish → Pole"))
	book := house.With(lexicon.Book, load(t, "okay\nAlright\tperson"))
	for _, c := range []struct {
		name    string
		x       *lexicon.Lexicon
		form    string
		status  lexicon.Status
		first   string
		instead string
		layer   lexicon.Layer
	}{
		{"listed in the base", x, "okay", lexicon.Known, "okay", "", lexicon.Base},
		{"barred by the house", house, "okay", lexicon.Barred, "okay", "OK", lexicon.House},
		{"barred with a capital", house, "Okay", lexicon.Barred, "okay", "OK", lexicon.House},
		{"barred in capitals", house, "OKAY", lexicon.Barred, "okay", "OK", lexicon.House},
		{"barred though in no list", house, "alright", lexicon.Barred, "alright", "all right", lexicon.House},
		{"what stands instead", house, "OK", lexicon.Known, "OK", "", lexicon.Base},
		{"a bar on a name leaves the word alone", house, "polish", lexicon.Known, "polish", "", lexicon.Base},
		{"but not the name", house, "Polish", lexicon.Barred, "Polish", "Pole", lexicon.House},
		{"un-barred by the book", book, "okay", lexicon.Known, "okay", "", lexicon.Book},
		{"a name does not un-bar the word", book, "alright", lexicon.Barred, "alright", "all right", lexicon.House},
		{"the name is known", book, "Alright", lexicon.Known, "Alright", "", lexicon.Book},
		{"other words are as they were", book, "harbour", lexicon.Known, "harbour", "", lexicon.Base},
	} {
		f := c.x.Find(c.form)
		assert.Equal(t, c.status, f.Status, c.name)
		require.NotEmpty(t, f.Words, c.name)
		assert.Equal(t, c.first, f.Words[0].Text, c.name)
		assert.Equal(t, c.instead, f.Words[0].Instead, c.name)
		assert.Equal(t, c.layer, f.Words[0].Layer, c.name)
	}
	assert.Equal(t, lexicon.Known, x.Find("okay").Status, "With changed the lexicon it was called on")
	assert.Equal(t, lexicon.Known, book.With(lexicon.House, nil).With(lexicon.Book, nil).Find("okay").Status)
}

func TestWithinOneListTheFormsOwnCapitalsDecide(t *testing.T) {
	x := lexicon.New(nil, lexicon.AnyVariety).With(lexicon.House, load(t, "polish\nPolish → Pole\nmoor → heath\nMoor"))
	for form, want := range map[string]lexicon.Status{
		"polish": lexicon.Known, "Polish": lexicon.Barred, "POLISH": lexicon.Known,
		"moor": lexicon.Barred, "Moor": lexicon.Known, "MOOR": lexicon.Known,
	} {
		assert.Equal(t, want, x.Find(form).Status, form)
	}
}

// Each row's varieties are those whose lists in the package scowl 2020.12.07 have
// the word; the others have it as a variant, or not at all.
func TestVarietiesKnowTheirOwnSpellings(t *testing.T) {
	x := lexicon.New(english.Base(), lexicon.AnyVariety)
	for form, want := range map[string]string{
		"harbour":  "british-ise british-ize canadian australian",
		"harbor":   "american",
		"realise":  "british-ise australian",
		"realize":  "american british-ize canadian",
		"analyse":  "british-ise british-ize australian",
		"analyze":  "american canadian",
		"traveler": "american",
		"judgment": "american canadian",
		"tyre":     "british-ise british-ize australian",
		"learnt":   "british-ise british-ize australian",
		"gaol":     "",
		"water":    "american british-ise british-ize canadian australian",
	} {
		var knowing []string
		for _, v := range lexicon.Varieties() {
			switch status := x.WithVariety(v).Find(form).Status; status {
			case lexicon.Known:
				knowing = append(knowing, v.Flag())
			default:
				assert.Equal(t, lexicon.OtherVariety, status, "%s, %s", form, v)
			}
		}
		assert.Equal(t, want, strings.Join(knowing, " "), form)
		assert.Equal(t, want != "", x.Find(form).Status == lexicon.Known, form)
	}
	british := x.WithVariety(lexicon.BritishIse)
	assert.Equal(t, lexicon.BritishIse, british.Variety())
	assert.Equal(t, lexicon.Known, british.With(lexicon.Book, load(t, "harbor")).Find("Harbor").Status)
}

func TestZeroLexiconKnowsNothing(t *testing.T) {
	var none *lexicon.Lexicon
	for _, x := range []*lexicon.Lexicon{none, {}, lexicon.New(nil, lexicon.American)} {
		assert.Equal(t, lexicon.Finding{}, x.Find("harbour"))
		assert.Equal(t, lexicon.Unknown, x.Find("ẍylo").Status)
		assert.Empty(t, x.Within("harbour", 2))
		assert.NotNil(t, x.Alphabet())
		v, evidence := x.Attested(counts("harbour"))
		assert.Equal(t, lexicon.AnyVariety, v)
		assert.Empty(t, evidence)
		full := x.With(lexicon.Layer(77), load(t, "harbour")).With(lexicon.Book, load(t, "harbour"))
		assert.Equal(t, lexicon.Known, full.WithVariety(lexicon.Canadian).Find("harbour").Status)
	}
}

func TestLexiconServesSeveralGoroutines(t *testing.T) {
	x := lexicon.New(english.Base(), lexicon.American).With(lexicon.Book, load(t, "Merrin\nẍylo\nokay → OK"))
	want := x.Within("harber", 2)
	var all sync.WaitGroup
	for range 4 {
		all.Go(func() {
			for range 5 {
				assert.Equal(t, want, x.Within("harber", 2))
				assert.Equal(t, lexicon.Barred, x.WithVariety(lexicon.Canadian).Find("Okay").Status)
				assert.Equal(t, lexicon.Known, x.Find("Ẍylo").Status)
			}
		})
	}
	all.Wait()
}
