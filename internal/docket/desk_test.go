package docket

import (
	"context"
	"os"
	"path/filepath"
	"testing"
	"time"

	"github.com/stretchr/testify/require"

	"emendary/internal/ledger"
)

// noon is when all rulings of these tests are made.
var noon = time.Date(2026, 12, 1, 12, 0, 0, 0, time.UTC)

// desk lays text out as a manuscript with a session on it.
func desk(t *testing.T, text string, change ...func(*Options)) *Session {
	t.Helper()
	path := filepath.Join(t.TempDir(), "novel.md")
	require.NoError(t, os.WriteFile(path, []byte(text), 0o600))
	return start(t, path, change...)
}

func start(t *testing.T, path string, change ...func(*Options)) *Session {
	t.Helper()
	opt := Options{Manuscript: path, Who: "anna", Now: func() time.Time { return noon }}
	for _, c := range change {
		c(&opt)
	}
	s, err := Start(context.Background(), opt)
	require.NoError(t, err)
	t.Cleanup(func() { s.Close() })
	return s
}

// rule writes and records one ruling on a form: on all its occurrences, or on
// those whose index is given.
func rule(t *testing.T, s *Session, form string, act ledger.Act, word string, only ...int) ledger.Ruling {
	t.Helper()
	e := s.Docket.Find(form)
	require.NotNil(t, e, form)
	checked := make([]bool, len(e.Occurrences))
	for i := range checked {
		checked[i] = len(only) == 0
	}
	for _, i := range only {
		checked[i] = true
	}
	r := s.Docket.Ruling(e, act, checked, nil)
	r.Word = word
	if act == ledger.Add {
		r.List = "book"
	}
	write(t, s, r)
	return r
}

func write(t *testing.T, s *Session, rulings ...ledger.Ruling) {
	t.Helper()
	require.NoError(t, s.Write(context.Background(), rulings...))
	s.Docket.Record(rulings...)
}

func undo(t *testing.T, s *Session, r ledger.Ruling) ledger.Ruling {
	t.Helper()
	u := s.Docket.Undo(r)
	write(t, s, u)
	return u
}

// emended is the manuscript with the rulings in force carried out.
func emended(t *testing.T, s *Session) string {
	t.Helper()
	out, err := s.Docket.Document.Emend(s.Docket.Emendations())
	require.NoError(t, err)
	return string(out)
}

// reopen closes the session and starts another on the same manuscript.
func reopen(t *testing.T, s *Session, change ...func(*Options)) *Session {
	t.Helper()
	require.NoError(t, s.Close())
	return start(t, s.Options.Manuscript, change...)
}

func forms(s *Session) []string {
	out := []string{}
	for _, e := range s.Docket.Entries {
		out = append(out, e.Form)
	}
	return out
}
