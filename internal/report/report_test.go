package report

import (
	"bytes"
	"context"
	"encoding/json"
	"errors"
	"flag"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/internal/docket"
	"emendary/internal/ledger"
	"emendary/lexicon"
)

var update = flag.Bool("update", false, "write the golden reports anew")

var noon = time.Date(2026, 12, 1, 12, 0, 0, 0, time.UTC)

// desk lays text out as a manuscript with a session on it.
func desk(t *testing.T, text string) *docket.Session {
	t.Helper()
	path := filepath.Join(t.TempDir(), "manuscript.md")
	require.NoError(t, os.WriteFile(path, []byte(text), 0o600))
	s, err := docket.Start(context.Background(), docket.Options{
		Manuscript: path, Who: "anna", Now: func() time.Time { return noon },
	})
	require.NoError(t, err)
	t.Cleanup(func() { s.Close() })
	return s
}

// rule rules on a form: on all its occurrences, the first of them on screen.
func rule(t *testing.T, s *docket.Session, form string, act ledger.Act, fill func(r *ledger.Ruling)) {
	t.Helper()
	e := s.Docket.Find(form)
	require.NotNil(t, e, form)
	checked, seen := make([]bool, len(e.Occurrences)), make([]bool, len(e.Occurrences))
	for i := range checked {
		checked[i] = true
	}
	seen[0] = true
	r := s.Docket.Ruling(e, act, checked, seen)
	if fill != nil {
		fill(&r)
	}
	require.NoError(t, s.Write(context.Background(), r))
	s.Docket.Record(r)
}

func to(word string) func(*ledger.Ruling) { return func(r *ledger.Ruling) { r.Word = word } }

// demo is the demo manuscript with a handful of rulings.
func demo(t *testing.T) *docket.Session {
	t.Helper()
	text, err := os.ReadFile("../../testdata/demo/manuscript.md")
	require.NoError(t, err)
	s := desk(t, string(text))
	rule(t, s, "harber", ledger.Accept, to("harbour"))
	rule(t, s, "color", ledger.Accept, func(r *ledger.Ruling) {
		r.Word, r.Query, r.To = "colour", "British spelling throughout; all right?", "author"
	})
	rule(t, s, "Thessally", ledger.Accept, func(r *ledger.Ruling) { r.Word, r.Note = "Thessaly", "the clerk" })
	rule(t, s, "Wensday", ledger.Accept, to("Wednesday"))
	rule(t, s, "Corrigale", ledger.Add, func(r *ledger.Ruling) { r.List, r.Kind, r.Note = "book", "vessel", "the pilot cutter" })
	rule(t, s, "’ee", ledger.Add, func(r *ledger.Ruling) { r.List, r.Kind = "book", "dialect" })
	rule(t, s, "drownded", ledger.Reject, func(r *ledger.Ruling) { r.Note = "Jory’s spelling" })
	rule(t, s, "brackle", ledger.Query, func(r *ledger.Ruling) { r.Query, r.To = "Your word, or a slip?", "author" })
	rule(t, s, "Oyl", ledger.Reject, func(r *ledger.Ruling) { r.Query, r.To = "Facsimile at hand?", "publisher" })
	rule(t, s, "tumed", ledger.Later, nil)
	return s
}

func written(t *testing.T, s *docket.Session, name, format string) string {
	t.Helper()
	var b bytes.Buffer
	require.NoError(t, Write(&b, s, name, format))
	return b.String()
}

func TestGoldenReports(t *testing.T) {
	s := demo(t)
	for _, g := range []struct{ name, format, file string }{
		{"style-sheet", "", "style-sheet.md"},
		{"style-sheet", TSV, "style-sheet.tsv"},
		{"emendations", "", "emendations.md"},
		{"queries", "", "queries.md"},
		{"rulings", "", "rulings.tsv"},
		{"rulings", Markdown, "rulings.md"},
		{"passed-over", "", "passed-over.md"},
		{"figures", "", "figures.md"},
	} {
		t.Run(g.file, func(t *testing.T) {
			path := filepath.Join("testdata", g.file)
			got := written(t, s, g.name, g.format)
			if *update {
				require.NoError(t, os.MkdirAll("testdata", 0o755))
				require.NoError(t, os.WriteFile(path, []byte(got), 0o644))
			}
			want, err := os.ReadFile(path)
			require.NoError(t, err)
			assert.Equal(t, string(want), got)
		})
	}
}

func TestReportsAreDeterministicAndWellFormed(t *testing.T) {
	s, again := demo(t), demo(t)
	for _, name := range Names() {
		for _, format := range Formats() {
			got := written(t, s, name, format)
			assert.Equal(t, got, written(t, again, name, format), "%s %s", name, format)
			assert.True(t, strings.HasSuffix(got, "\n"))
			rows := strings.Split(strings.TrimSuffix(got, "\n"), "\n")
			for _, row := range rows {
				switch {
				case format == JSONL:
					var object map[string]any
					require.NoError(t, json.Unmarshal([]byte(row), &object), row)
				case format == TSV && name != "style-sheet":
					assert.Equal(t, strings.Count(rows[0], "\t"), strings.Count(row, "\t"), row)
				}
			}
		}
	}
}

func TestEveryEmendationIsListed(t *testing.T) {
	s := demo(t)
	rows := strings.Count(written(t, s, "emendations", TSV), "\n") - 1
	assert.Len(t, s.Docket.Emendations(), rows)
	assert.Equal(t, 4+3+2+1, rows) // counts of truth.tsv
}

func TestStyleSheetLoadsAsSeriesList(t *testing.T) {
	s := demo(t)
	list, err := lexicon.Load(strings.NewReader(written(t, s, "style-sheet", TSV)), "style sheet")
	require.NoError(t, err)
	words := map[string]lexicon.Word{}
	for w := range list.Words() {
		words[w.Text] = w
	}
	assert.Len(t, words, 3)
	assert.Equal(t, lexicon.Word{Text: "Corrigale", Kind: "vessel", Note: "the pilot cutter"}, words["Corrigale"])
	assert.Equal(t, "colour", words["color"].Instead)
	assert.True(t, words["color"].Barred)
}

func TestStyleSheetListHoldsHardNotesAndLeavesNoFormula(t *testing.T) {
	s := desk(t, "The gurt lampwright spoke of thicky tidewife things.\n")
	rule(t, s, "gurt", ledger.Add, func(r *ledger.Ruling) { r.Kind, r.Note = "dia#lect", "=1+1\tand\nmore\x1b # kept" })
	rule(t, s, "thicky", ledger.Add, func(r *ledger.Ruling) { r.Kind, r.Note = "@sum", "" })
	got := written(t, s, "style-sheet", TSV)
	assert.Contains(t, got, "\t'=1+1 and more␛ # kept\n")
	assert.Contains(t, got, "\t'@sum\n")
	list, err := lexicon.Load(strings.NewReader(got), "style sheet")
	require.NoError(t, err)
	assert.Equal(t, 2, list.Len())
}

func TestWordsNoListCanHoldAreComments(t *testing.T) {
	for _, word := range []string{"-er", "=x", "two words", "’", "a\tb", "#tag", "a → b"} {
		assert.False(t, loads(listLine(word, "", ""), word), word)
	}
	for _, word := range []string{"’tis", "Merrin", "Tomé", "o’clock", "wi’"} {
		assert.True(t, loads(listLine(word, "term", "note"), word), word)
	}
}

func TestRulingsRoundTrip(t *testing.T) {
	s := demo(t)
	read, err := docket.ReadLines(strings.NewReader(written(t, s, "rulings", "")), "rulings")
	require.NoError(t, err)
	text, err := os.ReadFile(s.Options.Manuscript)
	require.NoError(t, err)
	other := desk(t, string(text))
	made, disputes := other.Docket.RulingsFrom(read)
	require.Empty(t, disputes)
	require.NoError(t, other.Write(context.Background(), made...))
	other.Docket.Record(made...)
	assert.Equal(t, written(t, s, "rulings", ""), written(t, other, "rulings", ""))
}

func TestSlipsAreNotOnTheStyleSheet(t *testing.T) {
	got := written(t, demo(t), "style-sheet", "")
	for _, slip := range []string{"Wednesday", "harber"} {
		assert.NotContains(t, got, slip)
	}
	assert.Contains(t, got, "**Thessaly** (not Thessally)")
}

func TestCitationsNeverOnScreenAreFlagged(t *testing.T) {
	got := written(t, demo(t), "emendations", "")
	// Of the ten emendations the first citation of each form was on screen.
	assert.Equal(t, 6, strings.Count(got, "· never on screen"))
	assert.Contains(t, got, "10 emendations; 6 citations never on screen.")
}

func TestUnknownNamesAndFormatsSayWhatThereIs(t *testing.T) {
	var b bytes.Buffer
	s := desk(t, "Nothing.\n")
	assert.EqualError(t, Write(&b, s, "stylesheet", ""),
		`there is no report "stylesheet"; there are style-sheet, emendations, queries, rulings, passed-over, figures`)
	assert.EqualError(t, Write(&b, s, "figures", "html"),
		`there is no format "html"; there are markdown, tsv, jsonl`)
	assert.Zero(t, b.Len())
}

type full struct{}

var errFull = errors.New("disk full")

func (full) Write([]byte) (int, error) { return 0, errFull }

func TestFailedWritesAreReported(t *testing.T) {
	assert.ErrorIs(t, Write(full{}, desk(t, "Nothing.\n"), "figures", ""), errFull)
}

func TestReportsOfAnEmptyReview(t *testing.T) {
	s := desk(t, "Nothing.\n")
	for _, name := range Names() {
		for _, format := range Formats() {
			var b bytes.Buffer
			assert.NoError(t, Write(&b, s, name, format), "%s %s", name, format)
		}
	}
}

func TestManuscriptTextCannotBreakAReport(t *testing.T) {
	s := desk(t, "# A \\*Lamp\\* | `of` \\# &lt;b>\n\n\\- A | \\*harber\\* \\`x\\` \\[y](z) &lt;script> \x1b[31m harber.\n")
	rule(t, s, "harber", ledger.Accept, func(r *ledger.Ruling) {
		r.Word, r.Query = "harbour", "*all* | right? <b>\n# heading"
	})
	for _, name := range []string{"emendations", "queries"} {
		got := written(t, s, name, "")
		seen := shown(t, got)
		assert.NotContains(t, got, "\x1b")
		assert.Contains(t, seen, "A *Lamp* | of # <b>", name)
		assert.Contains(t, seen, "- A | *harber* `x` [y](z) <script> ␛[31m harber.", name)
	}
	assert.Contains(t, shown(t, written(t, s, "queries", "")), "harber: *all* | right? <b> # heading")
}

func TestQuestionsAndFlagsOutliveAChangeOfTheManuscript(t *testing.T) {
	s := desk(t, "The old harber lay still.\n\nA gurt brackle rose.\n")
	rule(t, s, "harber", ledger.Accept, to("harbour"))
	rule(t, s, "brackle", ledger.Query, func(r *ledger.Ruling) { r.Query = "Right?" })
	rule(t, s, "gurt", ledger.Add, nil)
	require.NoError(t, s.Close())
	require.NoError(t, os.WriteFile(s.Options.Manuscript, []byte("New.\n\nThe old harber lay still.\n\nThe new harber too.\n"), 0o600))
	s, err := docket.Start(context.Background(), s.Options)
	require.NoError(t, err)
	defer s.Close()
	assert.Contains(t, written(t, s, "emendations", ""), "2 emendations; 1 citation never on screen.")
	assert.Contains(t, written(t, s, "queries", ""), "not in the manuscript as it is now: The old harber lay still. A gurt **brackle** rose.")
	assert.Contains(t, written(t, s, "style-sheet", ""), "**gurt** · not in the manuscript as it is now")
}

func TestStyleSheetKeepsWhatAQueryIsLaidOver(t *testing.T) {
	s := desk(t, "A gurt brackle rose at Wrackhaven, not at Wreckhaven.\n")
	rule(t, s, "gurt", ledger.Add, nil)
	rule(t, s, "gurt", ledger.Query, func(r *ledger.Ruling) { r.Query = "Right?" })
	rule(t, s, "brackle", ledger.Add, nil)
	rule(t, s, "brackle", ledger.Accept, to("bracken"))
	rule(t, s, "Wreckhaven", ledger.Accept, to("Wrackhaven"))
	got := written(t, s, "style-sheet", "")
	assert.Contains(t, got, "**gurt**")
	assert.NotContains(t, got, "brack")
	assert.Contains(t, got, "**Wrackhaven** (not Wreckhaven) · 2 times, first at 1:24 in part 1")
}
