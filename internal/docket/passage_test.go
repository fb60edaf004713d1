package docket

import (
	"context"
	"math/rand/v2"
	"os"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/internal/ledger"
)

// Article 1 of the Universal Declaration of Human Rights (United Nations, 1948).
var declaration = map[string]string{
	"French":     "Tous les êtres humains naissent libres et égaux en dignité et en droits. Ils sont doués de raison et de conscience et doivent agir les uns envers les autres dans un esprit de fraternité.",
	"German":     "Alle Menschen sind frei und gleich an Würde und Rechten geboren. Sie sind mit Vernunft und Gewissen begabt und sollen einander im Geist der Brüderlichkeit begegnen.",
	"Spanish":    "Todos los seres humanos nacen libres e iguales en dignidad y derechos y, dotados como están de razón y conciencia, deben comportarse fraternalmente los unos con los otros.",
	"Italian":    "Tutti gli esseri umani nascono liberi ed eguali in dignità e diritti. Essi sono dotati di ragione e di coscienza e devono agire gli uni verso gli altri in spirito di fratellanza.",
	"Norwegian":  "Alle mennesker er født frie og med samme menneskeverd og menneskerettigheter. De er utstyrt med fornuft og samvittighet og bør handle mot hverandre i brorskapets ånd.",
	"Latin":      "Omnes homines liberi aequique dignitate atque iuribus nascuntur.",
	"Welsh":      "Genir pawb yn rhydd ac yn gydradd â’i gilydd mewn urddas a hawliau.",
	"Portuguese": "Todos os seres humanos nascem livres e iguais em dignidade e em direitos. Dotados de razão e de consciência, devem agir uns para com os outros em espírito de fraternidade.",
}

func passages(s *Session) (out []*Entry) {
	for _, e := range s.Docket.Entries {
		if e.Kind == Passage {
			out = append(out, e)
		}
	}
	return out
}

func TestASentenceInAnotherLanguageIsOnePassage(t *testing.T) {
	for language, text := range declaration {
		t.Run(language, func(t *testing.T) {
			s := desk(t, "The clerk took his hat and said, “"+text+"” Nobody answered him for a while; the pilot looked out of the window at the harbour.\n")
			found := passages(s)
			require.Len(t, found, 1)
			assert.LessOrEqual(t, len(s.Docket.Entries), 3, "%q", forms(s))
			e := found[0]
			assert.Contains(t, plainApostrophe(text), strings.Trim(e.Form, ".”"))
			assert.Equal(t, ForeignWords, s.Docket.Group(e))
			assert.Empty(t, s.Docket.Near(e))
			assert.Empty(t, s.Docket.Related(e, ""))
			candidates, err := s.Docket.Candidates(context.Background(), e, 5)
			require.NoError(t, err)
			assert.Empty(t, candidates)
		})
	}
}

func TestASlipBesideAPassageIsAskedAbout(t *testing.T) {
	for _, text := range []string{
		"“" + declaration["Welsh"] + "” sed the clrek, and “" + declaration["Latin"] + "” ansered the pilto.",
		"He brot out *" + declaration["Welsh"] + "* verry quickly and wnet.",
	} {
		s := desk(t, text)
		assert.NotEmpty(t, passages(s))
		for _, e := range passages(s) {
			for _, slip := range []string{"sed", "clrek", "ansered", "brot", "verry"} {
				assert.NotContains(t, " "+e.Form+" ", " "+slip+" ")
			}
		}
	}
}

func TestNamesAndSpeechAreNoPassage(t *testing.T) {
	for name, text := range map[string]string{
		"a list of names": "So Marrack, Penhallick, Tressick, Gannick, Quelhas, Ebbin and Skaife met Hobbley, Bruvoll, Corvin and Pryle.",
		"in dialect":      "“I doan’ k’yer what de widder say, he warn’t no wise man nuther. He had some er de dad-fetchedes’ ways I ever see.”",
		"a short phrase":  "“Takk for lyset!” he cried, and then: “Minha senhora, já chegou?”",
		"compounds":       "A harber-kwench, a lamp-skerrel, a tide-wrangl, a moor-wexing, a quay-snorl and a gull-trapsel.",
	} {
		t.Run(name, func(t *testing.T) { assert.Empty(t, passages(desk(t, text))) })
	}
}

// misspell makes about one word in n misspelt: by one edit, or, one time in five, by two.
func misspell(r *rand.Rand, text string, n int) string {
	edit := func(w []rune) []rune {
		i, letter := r.IntN(len(w)), rune('a'+r.IntN(26))
		switch r.IntN(4) {
		case 0:
			return append(w[:i:i], w[i+1:]...)
		case 1:
			return append(append(w[:i:i], letter), w[i:]...)
		case 2:
			w[i] = letter
		case 3:
			if i+1 < len(w) {
				w[i], w[i+1] = w[i+1], w[i]
			}
		}
		return w
	}
	words := strings.Split(text, " ")
	for i, w := range words {
		if letters := []rune(w); len(letters) > 2 && r.IntN(n) == 0 {
			letters = edit(letters)
			if len(letters) > 3 && r.IntN(5) == 0 {
				letters = edit(letters)
			}
			words[i] = string(letters)
		}
	}
	return strings.Join(words, " ")
}

// However many slips stand in English prose, they are asked about one by one.
func TestMisspeltEnglishIsNoPassage(t *testing.T) {
	text, err := os.ReadFile("../../testdata/demo/emended.md")
	require.NoError(t, err)
	r := rand.New(rand.NewPCG(11, 13))
	for n := 2; n <= 8; n++ {
		slips := misspell(r, string(text), n)
		if found := passages(desk(t, slips)); n > 2 {
			require.Empty(t, found, "one word in %d", n)
		} else {
			require.LessOrEqual(t, len(found), 2, "one word in %d", n)
		}
	}
}

const genir = "Genir pawb yn rhydd ac yn gydradd a'i gilydd mewn urddas a hawliau"

const letter = `# One

The clerk read it out: “Genir pawb yn rhydd ac yn gydradd â’i gilydd mewn urddas
a hawliau.” Nobody answered him, and the pilot said the word gilydd once more.

# Two

The harber was dark.
`

func TestAWordOfAPassageIsAnEntryWhereItStandsElsewhere(t *testing.T) {
	s := desk(t, letter)
	assert.Len(t, passages(s), 1)
	e := s.Docket.Find("gilydd")
	require.NotNil(t, e)
	assert.Equal(t, UnknownForm, e.Kind)
	assert.Len(t, e.Occurrences, 1)
	assert.Equal(t, Tally{Open: 3}, s.Docket.Tally())
}

func TestAPassageStandsInItsLanguageAndIsFoundAgain(t *testing.T) {
	s := desk(t, letter)
	e := passages(s)[0]
	assert.NotContains(t, e.Form, "\n")
	r := s.Docket.Ruling(e, ledger.Reject, s.Docket.Checked(e), nil)
	r.Kind = "Welsh"
	write(t, s, r)
	assert.False(t, e.Open())
	assert.Equal(t, Tally{Open: 2, Ruled: 1}, s.Docket.Tally())

	moved := strings.Replace(letter, "# One\n", "# One\n\nA new paragraph stands before it.\n", 1)
	require.NoError(t, os.WriteFile(s.Options.Manuscript, []byte(moved), 0o600))
	s = reopen(t, s)
	assert.Empty(t, s.Docket.Unplaced)
	assert.Equal(t, Tally{Open: 2, Ruled: 1}, s.Docket.Tally())

	// Its words are known by now: the ruling keeps the passage all the same.
	list := s.Options.Manuscript + ".words"
	require.NoError(t, os.WriteFile(list, []byte(strings.ReplaceAll(genir, " ", "\n")+"\nâ'i\n"), 0o600))
	s = reopen(t, s, func(o *Options) { o.With = []Language{{"Welsh", list}} })
	assert.Empty(t, s.Docket.Unplaced)
	require.Len(t, passages(s), 1)
	assert.Equal(t, Tally{Open: 1, Ruled: 1}, s.Docket.Tally())

	changed := strings.Replace(moved, "rhydd", "caeth", 1)
	require.NoError(t, os.WriteFile(s.Options.Manuscript, []byte(changed), 0o600))
	s = reopen(t, s)
	require.Len(t, s.Docket.Unplaced, 1, "of another text it says nothing: it is listed")
	assert.Equal(t, "Welsh", s.Docket.Unplaced[0].Ruling.Kind)
}

func TestAPassageIsUnfoldedAndFoldedAgain(t *testing.T) {
	s := desk(t, letter)
	s.Docket.Reorder(BySlip, nil)
	e, harber := passages(s)[0], s.Docket.Find("harber")
	folded := forms(s)
	unfold := s.Docket.Ruling(e, ledger.Unfold, nil, nil)
	write(t, s, unfold)
	assert.False(t, e.Open(), "the passage is ruled on")
	assert.Same(t, harber, s.Docket.Find("harber"), "other entries are what they were")
	assert.Len(t, s.Docket.Find("gilydd").Occurrences, 2, "the form has both its places")
	for _, form := range []string{"rhydd", "gydradd", "mewn", "hawliau"} {
		require.NotNil(t, s.Docket.Find(form), form)
		assert.Equal(t, UnknownForm, s.Docket.Find(form).Kind, form)
	}
	unfolded := forms(s)
	assert.Equal(t, s.Docket.Entries[indexOf(s, e)+1].Occurrences[0].Paragraph, e.Occurrences[0].Paragraph, "its words follow it")
	rule(t, s, "rhydd", ledger.Accept, "rhyddid")

	s = reopen(t, s)
	assert.ElementsMatch(t, unfolded, forms(s), "it is unfolded after a restart")
	assert.Equal(t, "rhyddid", s.Docket.Find("rhydd").Occurrences[0].Ruling.Word)
	assert.Contains(t, emended(t, s), "yn rhyddid ac")

	write(t, s, s.Docket.Undo(unfold))
	assert.Len(t, passages(s), 1)
	assert.True(t, passages(s)[0].Open(), "the undo folds it again")
	assert.ElementsMatch(t, append(folded, "rhydd"), forms(s), "a word ruled on keeps its ruling")
	assert.Contains(t, emended(t, s), "yn rhyddid ac")

	stand := s.Docket.Ruling(passages(s)[0], ledger.Reject, nil, nil)
	write(t, s, stand)
	again := s.Docket.Ruling(passages(s)[0], ledger.Unfold, []bool{true}, nil)
	write(t, s, again)
	assert.ElementsMatch(t, unfolded, forms(s), "the latest ruling counts")
	write(t, s, s.Docket.Undo(again))
	assert.False(t, passages(s)[0].Open(), "let stand once more")
	assert.ElementsMatch(t, append(folded, "rhydd"), forms(s))
}

func indexOf(s *Session, e *Entry) int {
	for i, other := range s.Docket.Entries {
		if other == e {
			return i
		}
	}
	return -1
}

func TestRulingsOnPassagesGoOutAndComeBackAsLines(t *testing.T) {
	s := desk(t, letter+"\nThen: “"+declaration["Norwegian"]+"”\n")
	found := passages(s)
	require.Len(t, found, 2)
	stand := s.Docket.Ruling(found[0], ledger.Reject, nil, nil)
	stand.Kind = "Welsh"
	write(t, s, stand, s.Docket.Ruling(found[1], ledger.Unfold, nil, nil))
	rule(t, s, "mennesker", ledger.Reject, "")
	var lines strings.Builder
	require.NoError(t, s.Docket.WriteLines(&lines))
	want := s.Docket.Tally()

	other := desk(t, letter+"\nThen: “"+declaration["Norwegian"]+"”\n")
	assert.Empty(t, take(t, other, lines.String()))
	assert.Equal(t, want, other.Docket.Tally())
	assert.Empty(t, take(t, other, lines.String()), "and say nothing new a second time")

	disputes := take(t, desk(t, letter), "form\truling\tword\n"+found[0].Form+"\taccept\tno\nharber\tunfold\t\n")
	require.Len(t, disputes, 2)
	assert.Contains(t, disputes[0], "a passage; reject lets it stand")
	assert.Contains(t, disputes[1], "only a passage can be unfolded")
}
