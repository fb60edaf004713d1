package ledger

import (
	"bufio"
	"context"
	"database/sql"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"net/url"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"sync"
	"syscall"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// childEnv makes the test program hold or write the ledger it names instead of
// testing: "hold:PATH" or "append:PATH".
const childEnv = "LEDGER_TEST_CHILD"

func TestMain(m *testing.M) {
	if job, path, ok := strings.Cut(os.Getenv(childEnv), ":"); ok {
		if err := child(job, path); err != nil {
			fmt.Fprintln(os.Stderr, err)
			os.Exit(1)
		}
		os.Exit(0)
	}
	os.Exit(m.Run())
}

// child prints a line when the ledger is open, and one more for each ruling that
// Append has said to be on disk. It ends with its standard input.
func child(job, path string) error {
	l, err := Open(path, "anna\x1b[31m\nfrom the quay")
	if err != nil {
		return err
	}
	fmt.Println("open")
	for job == "append" {
		r := sample("harber")
		if err := l.Append(context.Background(), r); err != nil {
			return err
		}
		fmt.Println(r.ID)
	}
	if _, err := io.Copy(io.Discard, os.Stdin); err != nil {
		return err
	}
	return l.Close()
}

func start(t *testing.T, job, path string) (*exec.Cmd, *bufio.Scanner, io.Closer) {
	t.Helper()
	cmd := exec.Command(os.Args[0])
	cmd.Env = append(os.Environ(), childEnv+"="+job+":"+path)
	cmd.Stderr = os.Stderr
	in, err := cmd.StdinPipe()
	require.NoError(t, err)
	out, err := cmd.StdoutPipe()
	require.NoError(t, err)
	require.NoError(t, cmd.Start())
	lines := bufio.NewScanner(out)
	require.True(t, lines.Scan())
	require.Equal(t, "open", lines.Text())
	return cmd, lines, in
}

func TestOpenSaysWhoHasTheLedger(t *testing.T) {
	path := filepath.Join(t.TempDir(), "novel.md.ledger")
	cmd, _, in := start(t, "hold", path)
	_, err := Open(path, "ben")
	var used *InUse
	require.ErrorAs(t, err, &used)
	host, _ := os.Hostname()
	assert.Equal(t, "anna [31m from the quay", used.Who)
	assert.Equal(t, host, used.Host)
	assert.Equal(t, cmd.Process.Pid, used.PID)
	assert.Equal(t, path+": in use by anna [31m from the quay on "+host+" since "+
		used.Since.Local().Format("2006-01-02 15:04")+"; close that review and try again", err.Error())
	assert.Empty(t, read(t, path), "reading needs no lock")
	require.NoError(t, in.Close())
	require.NoError(t, cmd.Wait())
	assert.Equal(t, []string{"novel.md.ledger"}, names(t, path))
	open(t, path)
}

func TestInUseTellsWhatItKnows(t *testing.T) {
	at := time.Date(2026, 12, 1, 9, 14, 0, 0, time.Local)
	assert.Equal(t, "novel.md.ledger: in use by anna on quay since 2026-12-01 09:14; close that review and try again",
		(&InUse{Path: "novel.md.ledger", Who: "anna", Host: "quay", Since: at}).Error())
	assert.Equal(t, "l: in use by another session; close that review and try again", (&InUse{Path: "l"}).Error())
}

func TestEveryNameOfALedgerHasTheSameLock(t *testing.T) {
	dir := t.TempDir()
	path, link := filepath.Join(dir, "l"), filepath.Join(dir, "link")
	open(t, path)
	require.NoError(t, os.Symlink("l", link))
	_, err := Open(link, "ben")
	var used *InUse
	require.ErrorAs(t, err, &used)
	assert.Equal(t, link, used.Path)
}

func TestOneOfManyHasTheLock(t *testing.T) {
	path := filepath.Join(t.TempDir(), "l")
	var held sync.Mutex
	var wg sync.WaitGroup
	for range 8 {
		wg.Go(func() {
			for range 20 {
				l, err := take(path+".lock", "anna")
				if err != nil {
					var used *InUse
					assert.ErrorAs(t, err, &used)
					continue
				}
				if assert.True(t, held.TryLock(), "two hold the lock") {
					held.Unlock()
				}
				assert.NoError(t, l.release())
			}
		})
	}
	wg.Wait()
	assert.Empty(t, names(t, path))
}

func TestKilledSessionLosesNothingItReported(t *testing.T) {
	path := filepath.Join(t.TempDir(), "l")
	var written []string
	for range 3 {
		cmd, lines, _ := start(t, "append", path)
		for range 7 {
			require.True(t, lines.Scan())
			written = append(written, lines.Text())
		}
		require.NoError(t, cmd.Process.Kill())
		for lines.Scan() { // what it had reported by then
			written = append(written, lines.Text())
		}
		require.Error(t, cmd.Wait())
	}
	l := open(t, path)
	rulings, err := l.Rulings(t.Context())
	require.NoError(t, err)
	got := map[string]bool{}
	for _, r := range rulings {
		got[r.ID.String()] = true
		assert.Len(t, r.Occurrences, 2)
	}
	for _, id := range written {
		assert.True(t, got[id], id)
	}
}

// halfWritten returns a ledger as a kill in the middle of a commit leaves it: one
// ruling, and a second transaction half in the file with its journal beside it.
func halfWritten(t *testing.T) (path string, whole []Ruling) {
	t.Helper()
	from := filepath.Join(t.TempDir(), "l")
	l := open(t, from)
	whole = []Ruling{sample("harber")}
	require.NoError(t, l.Append(t.Context(), whole...))
	require.NoError(t, l.Close())
	db, err := openFile(from, url.Values{"mode": {"rw"}, "_pragma": {"cache_size(1)"}})
	require.NoError(t, err)
	tx, err := db.Begin()
	require.NoError(t, err)
	var many []Ruling
	for range 300 { // more than the cache holds, so that pages go to the file
		many = append(many, sample(strings.Repeat("harber", 50)))
	}
	require.NoError(t, insert(t.Context(), tx, many))
	path = filepath.Join(t.TempDir(), "l")
	for _, ext := range []string{"", "-journal"} {
		text, err := os.ReadFile(from + ext)
		require.NoError(t, err)
		require.Greater(t, len(text), 10000)
		require.NoError(t, os.WriteFile(path+ext, text, 0o600))
	}
	require.NoError(t, tx.Rollback())
	require.NoError(t, db.Close())
	return path, whole
}

func TestHalfWrittenRulingIsRolledBack(t *testing.T) {
	path, whole := halfWritten(t)
	assert.Equal(t, whole, read(t, path), "by a reader")
	assert.Equal(t, []string{"l"}, names(t, path))
	path, whole = halfWritten(t)
	got, err := open(t, path).Rulings(t.Context())
	require.NoError(t, err)
	assert.Equal(t, whole, got, "by a writer")
}

func TestWhatIsNoLedgerIsLeftAlone(t *testing.T) {
	foreign := filepath.Join(t.TempDir(), "foreign")
	db, err := openFile(foreign, url.Values{})
	require.NoError(t, err)
	_, err = db.Exec("CREATE TABLE rulings (x)")
	require.NoError(t, err)
	require.NoError(t, db.Close())
	database, err := os.ReadFile(foreign)
	require.NoError(t, err)
	tests := []struct {
		name string
		text []byte
	}{
		{"text", []byte("A Lamp at Sallow Quay\n")},
		{"long text", []byte(strings.Repeat("A Lamp at Sallow Quay\n", 1000))},
		{"another database", database},
		{"head alone", []byte("SQLite format 3\x00")},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			path := filepath.Join(t.TempDir(), "l")
			require.NoError(t, os.WriteFile(path, tt.text, 0o644))
			_, err := Open(path, "anna")
			require.ErrorIs(t, err, ErrNotLedger)
			assert.NotContains(t, err.Error(), "\n")
			_, err = OpenToRead(path)
			require.ErrorIs(t, err, ErrNotLedger)
			after, err := os.ReadFile(path)
			require.NoError(t, err)
			assert.Equal(t, tt.text, after)
			assert.Equal(t, []string{"l"}, names(t, path))
		})
	}
	_, err = OpenToRead(t.TempDir())
	require.ErrorIs(t, err, ErrNotLedger, "a folder")
}

// edit runs SQL on the ledger at path, as another program might.
func edit(t *testing.T, path, statement string) error {
	t.Helper()
	db, err := sql.Open("sqlite", path)
	require.NoError(t, err)
	_, err = db.Exec(statement)
	require.NoError(t, db.Close())
	return err
}

func TestNewerLedgerIsRefused(t *testing.T) {
	path := filepath.Join(t.TempDir(), "l")
	require.NoError(t, open(t, path).Close())
	require.NoError(t, edit(t, path, "PRAGMA user_version = 2"))
	_, err := Open(path, "anna")
	require.ErrorIs(t, err, ErrNewer)
	assert.Equal(t, path+": was written by a newer version (ledger version 2, this one reads up to 1); install the newer version", err.Error())
	_, err = OpenToRead(path)
	require.ErrorIs(t, err, ErrNewer)
}

func TestDamageIsReported(t *testing.T) {
	path := filepath.Join(t.TempDir(), "l")
	l := open(t, path)
	require.NoError(t, l.Append(t.Context(), sample("harber")))
	require.NoError(t, l.Close())
	text, err := os.ReadFile(path)
	require.NoError(t, err)
	for i := 4096; i < len(text); i++ { // all but the first page
		text[i] = 0xa5
	}
	require.NoError(t, os.WriteFile(path, text, 0o600))
	_, err = Open(path, "anna")
	require.ErrorIs(t, err, ErrDamaged)
	assert.NotContains(t, err.Error(), "\n")
}

func TestNoProgramCanRewriteARuling(t *testing.T) {
	path := filepath.Join(t.TempDir(), "l")
	want := []Ruling{sample("harber")}
	l := open(t, path)
	require.NoError(t, l.Append(t.Context(), want...))
	require.NoError(t, l.Close())
	for _, statement := range []string{
		"UPDATE rulings SET word = 'barber'",
		"DELETE FROM rulings",
		"INSERT OR REPLACE INTO rulings SELECT * FROM rulings",
		"INSERT OR REPLACE INTO rulings SELECT 1, zeroblob(16), NULL, NULL, '', '', 'later', '', '', '', '', '', '', '', '', '', zeroblob(32)",
		"UPDATE occurrences SET seen = 1",
		"DELETE FROM occurrences",
		"INSERT OR REPLACE INTO occurrences SELECT * FROM occurrences",
		"INSERT INTO occurrences SELECT ruling, n + 2, part, part_index, paragraph, first_byte, past_byte, line, col, text, before, after, seen FROM occurrences",
	} {
		assert.ErrorContains(t, edit(t, path, statement), "never", statement)
	}
	assert.Equal(t, want, read(t, path))
}

func TestWhereNothingCanBeWritten(t *testing.T) {
	file := filepath.Join(t.TempDir(), "file")
	require.NoError(t, os.WriteFile(file, []byte("x"), 0o600))
	for _, path := range []string{filepath.Join(file, "l"), filepath.Join(t.TempDir(), "none", "l")} {
		_, err := Open(path, "anna")
		require.ErrorIs(t, err, ErrCannotWrite)
		assert.True(t, strings.HasSuffix(err.Error(), "; name another place with --ledger FILE"), err)
	}
	// A disk mounted read-only needs privileges to set up; this is what it says.
	err := cannotWrite("l", &fs.PathError{Op: "open", Path: "/l.lock", Err: syscall.EROFS})
	assert.Equal(t, "l: cannot be written here (read-only file system); name another place with --ledger FILE", err.Error())
	assert.True(t, errors.Is(err, syscall.EROFS))
}

// long returns a ledger of n rulings with two occurrences each, as a TSV of
// rulings made elsewhere or years of work would fill it.
func long(tb testing.TB, n int) (*Ledger, []Ruling) {
	tb.Helper()
	l, err := Open(filepath.Join(tb.TempDir(), "l"), "anna")
	require.NoError(tb, err)
	tb.Cleanup(func() { assert.NoError(tb, l.Close()) })
	many := make([]Ruling, n)
	for i := range many {
		many[i] = sample("harber")
	}
	require.NoError(tb, l.Append(context.Background(), many...))
	return l, many
}

func TestALongReviewComesBackWhole(t *testing.T) {
	l, many := long(t, 2*lookEvery+1)
	got, err := l.Rulings(t.Context())
	require.NoError(t, err)
	assert.Equal(t, many, got)
}

func BenchmarkRulings(b *testing.B) {
	l, many := long(b, 50000)
	for b.Loop() {
		got, err := l.Rulings(b.Context())
		require.NoError(b, err)
		require.Len(b, got, len(many))
	}
}
