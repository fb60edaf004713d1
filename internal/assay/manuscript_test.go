package assay

import (
	"context"
	"encoding/json"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/internal/docket"
)

func TestTruthIsRead(t *testing.T) {
	tests := []struct {
		name, text string
		want       Truth
	}{
		{"a head", "form\tintended\nteh\tthe\n", Truth{"teh": {"the"}}},
		{"no head, a mark of the byte order", "\ufeffteh\tthe\r\n", Truth{"teh": {"the"}}},
		{"several words, several lines", "wether\tweather, whether\nwether\twhether,wither\n", Truth{"wether": {"weather", "whether", "wither"}}},
		{"capitals and apostrophes fold", "Dosn’t\tDoesn’t\n", Truth{"dosn't": {"doesn't"}}},
		{"a third column, remarks, empty lines", "# ours\n\nalot\ta lot\tsplit\n", Truth{"alot": {"a lot"}}},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			got, err := ReadTruth(strings.NewReader(tt.text), "truth.tsv")
			require.NoError(t, err)
			assert.Equal(t, tt.want, got)
		})
	}
}

func TestTruthThatCannotBeReadSaysWhere(t *testing.T) {
	tests := []struct{ name, text, want string }{
		{"no tab", "form\tintended\nteh the\n", "truth.tsv: line 2: want form, tab, intended word"},
		{"no word", "teh\t\n", "truth.tsv: line 1: want form, tab, intended word"},
		{"nothing", "form\tintended\n", "truth.tsv: no lines"},
		{"a line without end", "a\t" + strings.Repeat("b", 1<<17), "truth.tsv: line 1"},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			_, err := ReadTruth(strings.NewReader(tt.text), "truth.tsv")
			assert.ErrorContains(t, err, tt.want)
		})
	}
}

func TestFormsToSetAside(t *testing.T) {
	got, err := ReadForms(strings.NewReader("# of the source\nMuncipal\nseverly\tseverely\n"), "aside")
	require.NoError(t, err)
	assert.Equal(t, map[string]bool{"muncipal": true, "severly": true}, got)
}

// The example of Manning, Raghavan and Schütze, section 8.4, recomputed: relevant
// at ranks 1, 3 and 6 gives (1/1 + 2/3 + 3/6) / 3.
func TestAveragePrecision(t *testing.T) {
	tests := []struct {
		name   string
		ranks  string // x relevant, . not
		missed int
		want   float64
	}{
		{"first of all", "xxx...", 0, 1},
		{"last of all", "...x", 0, 0.25},
		{"mixed", "x.x..x", 0, (1 + 2.0/3 + 0.5) / 3},
		{"one missed", "x.x..x", 1, (1 + 2.0/3 + 0.5) / 4},
		{"nothing relevant", "....", 0, 1},
		{"all missed", "..", 2, 0},
		{"empty", "", 0, 1},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			relevant := make([]bool, len(tt.ranks))
			for i := range tt.ranks {
				relevant[i] = tt.ranks[i] == 'x'
			}
			assert.InDelta(t, tt.want, AveragePrecision(relevant, tt.missed), 1e-12)
		})
	}
}

const story = `# One

The harbuor was quiet when Brannock went to gether his nets. The pilot of the harbour knew Brannock.
He had alot of rope, and a half-whte sail; then came Brannock’s brother and the recieved wisdom of the harbour.
Snargle the flumbwick, said the severly tired pilot.
`

func assayed(t *testing.T, truth Truth, aside map[string]bool) Manuscript {
	t.Helper()
	path := filepath.Join(t.TempDir(), "novel.md")
	require.NoError(t, os.WriteFile(path, []byte(story), 0o600))
	s, err := docket.Start(context.Background(), docket.Options{Manuscript: path, ToRead: true})
	require.NoError(t, err)
	defer s.Close()
	m, err := AssayManuscript(context.Background(), s.Docket, truth, aside, nil)
	require.NoError(t, err)
	return m
}

func TestManuscriptIsMeasured(t *testing.T) {
	truth := Truth{
		"harbuor": {"harbour"}, "to gether": {"together"}, "whte": {"white"},
		"recieved": {"received"}, "quiet": {"quite"}, "flumbwick": {"candle"},
	}
	m := assayed(t, truth, map[string]bool{"severly": true})
	assert.Equal(t, 6, m.N)
	assert.Equal(t, 1, m.SetAside)
	assert.InDelta(t, 5.0/6, m.Found, 1e-12)
	assert.InDelta(t, 4.0/6, m.Top1, 1e-12)
	assert.InDelta(t, 4.0/6, m.Top10, 1e-12)
	assert.InDelta(t, 4.0/6, m.MRR, 1e-12)
	assert.Equal(t, []Miss{{"quiet", []string{"quite"}, 0, []string{}}}, m.Missed, "a listed word has no entry")
	require.Len(t, m.Misses, 1)
	assert.Equal(t, "flumbwick", m.Misses[0].Form)
	assert.Equal(t, []string{"candle"}, m.Misses[0].Intended)
	assert.Zero(t, m.Misses[0].Rank)
	// Of 8 entries, Brannock, Snargle and alot were not planted.
	assert.Equal(t, 8, m.Entries)
	assert.InDelta(t, 3*1000/float64(m.Words), m.FalseAlarms, 1e-9)
	assert.LessOrEqual(t, m.LikelyFalseAlarms, m.FalseAlarms)
	assert.LessOrEqual(t, m.AveragePrecision, 5.0/6+1e-12, "what was missed counts")
	assert.Greater(t, m.AveragePrecision, 0.5)
	assert.Greater(t, m.Provisional, 0.4)
}

func TestPlantedFormsSetAsideCountNeitherWay(t *testing.T) {
	truth := Truth{"harbuor": {"harbour"}, "severly": {"severely"}}
	m := assayed(t, truth, map[string]bool{"severly": true})
	assert.Equal(t, [3]int{1, 1, 1}, [3]int{m.N, m.LeftOut, m.SetAside})
	assert.Equal(t, map[Reason]int{SetAside: 1}, m.Reasons)
	assert.InDelta(t, 1, m.Found, 0)
	assert.Len(t, truth, 2, "the truth stays as it was")
}

// The member of a compound that was planted is right within the compound.
func TestWhatIsRightInPlace(t *testing.T) {
	compound := Judged{Entry: &docket.Entry{Form: "Half-whte"}, Planted: "whte"}
	assert.Equal(t, []string{"white", "half-white"}, compound.right([]string{"white"}))
	word := Judged{Entry: &docket.Entry{Form: "whte"}, Planted: "whte"}
	assert.Equal(t, []string{"white", "white"}, word.right([]string{"white"}))
}

// A planted form is as right as the worst of its entries.
func TestMissesTellWhichIsWorse(t *testing.T) {
	for _, tt := range []struct {
		rank, than int
		want       bool
	}{{1, 1, false}, {2, 1, true}, {1, 2, false}, {0, 10, true}, {10, 0, false}, {0, 0, false}} {
		assert.Equal(t, tt.want, Miss{Rank: tt.rank}.worse(Miss{Rank: tt.than}), "%d, %d", tt.rank, tt.than)
	}
}

func TestManuscriptInJSON(t *testing.T) {
	data, err := json.Marshal(assayed(t, Truth{"harbuor": {"harbour"}}, nil))
	require.NoError(t, err)
	var got map[string]any
	require.NoError(t, json.Unmarshal(data, &got))
	for _, name := range []string{"n", "left_out", "reasons", "found", "top1", "top3", "top5", "top10", "mrr", "average_precision", "false_alarms_per_1000"} {
		assert.Contains(t, got, name)
	}
	assert.InDelta(t, 1, got["found"], 0)
	assert.InDelta(t, 0, got["left_out"], 0)
}

func TestAssayStopsWithItsContext(t *testing.T) {
	path := filepath.Join(t.TempDir(), "novel.md")
	require.NoError(t, os.WriteFile(path, []byte(story), 0o600))
	s, err := docket.Start(context.Background(), docket.Options{Manuscript: path, ToRead: true})
	require.NoError(t, err)
	defer s.Close()
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	_, err = AssayManuscript(ctx, s.Docket, Truth{"harbuor": {"harbour"}}, nil, nil)
	assert.ErrorIs(t, err, context.Canceled)
}
