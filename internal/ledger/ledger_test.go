package ledger

import (
	"context"
	"crypto/sha256"
	"os"
	"path/filepath"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// sample returns a ruling with every field set.
func sample(form string) Ruling {
	return Ruling{
		ID: NewID(), EntryKind: "unknown form", Form: form, Act: Accept, Word: "harbour",
		List: "series", Kind: "place", Note: "as in the first book", Query: "all right?", To: "author",
		Scope: Checked, Who: "anna",
		When:       time.Date(2026, 12, 1, 9, 14, 5, 123456789, time.UTC),
		Manuscript: sha256.Sum256([]byte("A Lamp at Sallow Quay")),
		Occurrences: []Occurrence{
			{Part: "Two", PartIndex: 2, Paragraph: 14, Start: 4081, End: 4087, Line: 77, Column: 12,
				Text: form, Before: "the whole of the ", After: " had turned out", Seen: true},
			{Part: "Three", PartIndex: 3, Paragraph: 0, Start: 9000, End: 9006, Line: 140, Column: 1,
				Text: form, Before: "“Call it a ", After: " if you like,”"},
		},
	}
}

func open(t *testing.T, path string) *Ledger {
	t.Helper()
	l, err := Open(path, "anna")
	require.NoError(t, err)
	t.Cleanup(func() { assert.NoError(t, l.Close()) })
	return l
}

func read(t *testing.T, path string) []Ruling {
	t.Helper()
	l, err := OpenToRead(path)
	require.NoError(t, err)
	rulings, err := l.Rulings(t.Context())
	require.NoError(t, err)
	require.NoError(t, l.Close())
	return rulings
}

// names returns what stands in the folder of path.
func names(t *testing.T, path string) []string {
	t.Helper()
	entries, err := os.ReadDir(filepath.Dir(path))
	require.NoError(t, err)
	var out []string
	for _, e := range entries {
		out = append(out, e.Name())
	}
	return out
}

func TestRulingsComeBackAsTheyWereWritten(t *testing.T) {
	path := filepath.Join(t.TempDir(), "a novel #1?%20.md.ledger") // what a URI would trip over
	first, second := sample("harber"), sample("harbers")
	second.With = first.ID
	undo := Ruling{ID: NewID(), Act: Undo, Undoes: first.ID, Who: "anna", When: time.Unix(0, 1).UTC()}
	odd := Ruling{ID: NewID(), Act: Add, Form: "a\x00b\xff\n\t‸", Note: "\x1b[31m"}

	l := open(t, path)
	require.NoError(t, l.Append(t.Context(), first, second))
	require.NoError(t, l.Append(t.Context(), undo))
	require.NoError(t, l.Append(t.Context()))
	require.NoError(t, l.Close())
	l = open(t, path)
	require.NoError(t, l.Append(t.Context(), odd))
	got, err := l.Rulings(t.Context())
	require.NoError(t, err)

	assert.Equal(t, []Ruling{first, second, undo, odd}, got)
	assert.Equal(t, got, read(t, path), "a reader sees the same while the ledger is open for writing")
}

func TestTimesAreKeptInUTC(t *testing.T) {
	path := filepath.Join(t.TempDir(), "l")
	r := sample("harber")
	r.When = time.Date(2026, 12, 1, 10, 0, 0, 1, time.FixedZone("quay", 3600))
	require.NoError(t, open(t, path).Append(t.Context(), r))
	got := read(t, path)[0].When
	assert.True(t, r.When.Equal(got))
	assert.Equal(t, "2026-12-01T09:00:00.000000001Z", got.Format(timeLayout))
}

func TestOneFileIsLeft(t *testing.T) {
	path := filepath.Join(t.TempDir(), "novel.md.ledger")
	l := open(t, path)
	assert.Equal(t, []string{"novel.md.ledger", "novel.md.ledger.lock"}, names(t, path))
	require.NoError(t, l.Append(t.Context(), sample("harber")))
	require.NoError(t, l.Close())
	require.NoError(t, l.Close(), "closing again does nothing")
	assert.Equal(t, []string{"novel.md.ledger"}, names(t, path))
	info, err := os.Stat(path)
	require.NoError(t, err)
	assert.Equal(t, os.FileMode(0o600), info.Mode())
}

func TestAppendWritesAllOrNone(t *testing.T) {
	path := filepath.Join(t.TempDir(), "l")
	l := open(t, path)
	good := sample("harber")
	require.NoError(t, l.Append(t.Context(), good))
	with := func(change func(*Ruling)) Ruling {
		r := sample("harbers")
		change(&r)
		return r
	}
	later := sample("later")
	tests := []struct {
		name string
		bad  []Ruling
		want string
	}{
		{"no id", []Ruling{with(func(r *Ruling) { r.ID = ID{} })}, "it has no id"},
		{"unknown act", []Ruling{with(func(r *Ruling) { r.Act = "shrug" })}, `its act is "shrug"`},
		{"no act", []Ruling{with(func(r *Ruling) { r.Act = "" })}, `its act is ""`},
		{"unknown scope", []Ruling{with(func(r *Ruling) { r.Scope = "some" })}, `its scope is "some"`},
		{"undo of nothing", []Ruling{with(func(r *Ruling) { r.Act = Undo })}, "does not say of which ruling"},
		{"undoes, but is none", []Ruling{with(func(r *Ruling) { r.Undoes = good.ID })}, "only an undo may"},
		{"with itself", []Ruling{with(func(r *Ruling) { r.With = r.ID })}, "refers to itself"},
		{"undo of itself", []Ruling{with(func(r *Ruling) { r.Act, r.Undoes = Undo, r.ID })}, "refers to itself"},
		{"undo of a stranger", []Ruling{with(func(r *Ruling) { r.Act, r.Undoes = Undo, NewID() })}, "not in the ledger"},
		{"with a later one", []Ruling{with(func(r *Ruling) { r.With = later.ID }), later}, "not in the ledger"},
		{"twice", []Ruling{good}, "is in the ledger already"},
		{"twice in one call", []Ruling{later, later}, "is in the ledger already"},
		{"far future", []Ruling{with(func(r *Ruling) { r.When = time.Date(10000, 1, 1, 0, 0, 0, 0, time.UTC) })}, "its year is 10000"},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			batch := append([]Ruling{sample("fine")}, tt.bad...)
			err := l.Append(t.Context(), batch...)
			require.ErrorContains(t, err, tt.want)
			assert.NotContains(t, err.Error(), "\n")
			got, err := l.Rulings(t.Context())
			require.NoError(t, err)
			assert.Equal(t, []Ruling{good}, got)
		})
	}
	require.ErrorIs(t, l.Append(t.Context(), good), ErrTwice)
}

func TestEndedContextWritesNothing(t *testing.T) {
	l := open(t, filepath.Join(t.TempDir(), "l"))
	ctx, cancel := context.WithCancel(t.Context())
	cancel()
	require.ErrorIs(t, l.Append(ctx, sample("harber")), context.Canceled)
	require.ErrorIs(t, l.SetSetting(ctx, "house", "quay"), context.Canceled)
	_, err := l.Rulings(ctx)
	require.ErrorIs(t, err, context.Canceled)
	got, err := l.Rulings(t.Context())
	require.NoError(t, err)
	assert.Empty(t, got)
}

func TestSettingsAreRemembered(t *testing.T) {
	path := filepath.Join(t.TempDir(), "l")
	l := open(t, path)
	get := func(l *Ledger) string {
		v, err := l.Setting(t.Context(), "house")
		require.NoError(t, err)
		return v
	}
	assert.Equal(t, "", get(l))
	require.NoError(t, l.SetSetting(t.Context(), "house", "quay"))
	require.NoError(t, l.SetSetting(t.Context(), "house", "Sallow Quay"))
	require.NoError(t, l.Close())
	assert.Equal(t, "Sallow Quay", get(open(t, path)))
}

func TestReadingCreatesNothing(t *testing.T) {
	path := filepath.Join(t.TempDir(), "l")
	l, err := OpenToRead(path)
	require.NoError(t, err)
	got, err := l.Rulings(t.Context())
	require.NoError(t, err)
	assert.Empty(t, got)
	v, err := l.Setting(t.Context(), "house")
	require.NoError(t, err)
	assert.Empty(t, v)
	require.ErrorIs(t, l.Append(t.Context(), sample("harber")), ErrReadOnly)
	require.ErrorIs(t, l.SetSetting(t.Context(), "house", "quay"), ErrReadOnly)
	require.NoError(t, l.Close())
	assert.Empty(t, names(t, path))

	require.NoError(t, open(t, path).Append(t.Context(), sample("harber")))
	l, err = OpenToRead(path)
	require.NoError(t, err)
	require.ErrorIs(t, l.Append(t.Context(), sample("harber")), ErrReadOnly)
	require.NoError(t, l.Close())
	_, err = l.Rulings(t.Context())
	require.ErrorIs(t, err, ErrClosed)
}

func TestZeroLedgerIsEmpty(t *testing.T) {
	var l Ledger
	got, err := l.Rulings(t.Context())
	require.NoError(t, err)
	assert.Empty(t, got)
	require.ErrorIs(t, l.Append(t.Context(), sample("harber")), ErrReadOnly)
	require.NoError(t, l.Close())
}

func TestIDs(t *testing.T) {
	id := NewID()
	assert.NotEqual(t, id, NewID())
	assert.Len(t, id.String(), 32)
	assert.False(t, id.IsZero())
	back, err := ParseID(id.String())
	require.NoError(t, err)
	assert.Equal(t, id, back)
	for _, bad := range []string{"", "00", id.String() + "00", "x" + id.String()[1:], id.String()[:31] + "\n"} {
		_, err := ParseID(bad)
		assert.ErrorContains(t, err, "is no ruling id", "%q", bad)
	}
}

func TestPathFor(t *testing.T) {
	assert.Equal(t, "books/novel.md.ledger", PathFor("books/novel.md"))
}
