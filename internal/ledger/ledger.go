package ledger

import (
	"context"
	"database/sql"
	"errors"
	"fmt"
	"io/fs"
	"net/url"
	"os"
	"path/filepath"
	"strings"
	"sync"

	"modernc.org/sqlite"
	sqlite3 "modernc.org/sqlite/lib"
)

// busyMillis is how long a statement waits for another program's lock, in
// milliseconds. A commit or a reading takes a small part of it.
const busyMillis = "10000"

// marks asks an SQLite file what it is.
const marks = "SELECT application_id, user_version FROM pragma_application_id, pragma_user_version"

// Ledger is the durable record of all rulings on one manuscript. Open and
// OpenToRead return one; the zero value is an empty ledger that writes nothing.
// Its methods may be called from several goroutines.
type Ledger struct {
	path string // as it was asked for: the head of every error
	lock *lock  // nil where opened for reading

	mu     sync.Mutex // guards db and closed, and lets one call at a time use db
	db     *sql.DB    // nil where there is no file
	closed bool
}

// PathFor returns the path of the ledger that belongs to a manuscript.
func PathFor(manuscript string) string { return manuscript + ".ledger" }

// Open opens the ledger at path for writing, creating it (mode 0600) where there
// is none, and locks it until Close. Opening alone leaves an empty ledger behind:
// so it is certain from the start that rulings can be written. who is the name
// that others are told while the ledger is in use.
//
// It reads the whole file to see that it holds together. It returns an error that
// is *InUse where another session has the ledger, ErrCannotWrite where the folder
// or the file cannot be written, ErrNotLedger, ErrNewer or ErrDamaged where the
// file cannot be used. A file that is refused is left as it was.
func Open(path, who string) (*Ledger, error) {
	file, err := follow(path)
	if err != nil {
		return nil, fmt.Errorf("%s: %w", path, cause(err))
	}
	lock, err := take(file+".lock", who)
	if err != nil {
		var used *InUse
		if errors.As(err, &used) {
			used.Path = path
			return nil, used
		}
		return nil, cannotWrite(path, err)
	}
	db, err := openToWrite(path, file)
	if err != nil {
		return nil, errors.Join(err, lock.release())
	}
	return &Ledger{path: path, db: db, lock: lock}, nil
}

func openToWrite(path, file string) (*sql.DB, error) {
	size, err := fileSize(path, file)
	if err != nil {
		return nil, err
	}
	if size == 0 {
		if err := create(file); err != nil {
			return nil, cannotWrite(path, err)
		}
	} else if err := recognise(path, file); err != nil {
		return nil, err
	}
	db, err := openFile(file, url.Values{"mode": {"rw"}, "_journal_mode": {"DELETE"}, "_synchronous": {"EXTRA"}})
	if err != nil {
		return nil, explain(path, err)
	}
	if err := verify(path, db); err != nil {
		return nil, errors.Join(err, db.Close())
	}
	// SQLite opens a file that is write-protected without a word. This writes
	// nothing, but only gets through where writing is possible.
	if _, err := db.Exec("UPDATE settings SET value = value WHERE false"); err != nil {
		return nil, errors.Join(explain(path, err), db.Close())
	}
	return db, nil
}

// OpenToRead opens the ledger at path for reading, whether or not another session
// is writing to it. Where there is no file it returns an empty ledger. It creates
// nothing, takes no lock that others notice and changes no ruling; the one thing
// it may write is to finish what a killed session left: that session's last,
// incomplete ruling is rolled back, as the next Open would do.
//
// Its errors are those of Open but for *InUse and, unless there is something to
// finish on a disk that cannot be written, ErrCannotWrite.
func OpenToRead(path string) (*Ledger, error) {
	file, err := follow(path)
	if err != nil {
		return nil, fmt.Errorf("%s: %w", path, cause(err))
	}
	size, err := fileSize(path, file)
	if err != nil {
		return nil, err
	}
	if size == 0 {
		return &Ledger{path: path}, nil
	}
	if err := recognise(path, file); err != nil {
		return nil, err
	}
	// Read-write, for the sake of a journal that has to be rolled back. SQLite
	// falls back to reading alone by itself where it may do no more.
	db, err := openFile(file, url.Values{"mode": {"rw"}, "_query_only": {"1"}})
	if err != nil {
		return nil, explain(path, err)
	}
	if err := verify(path, db); err != nil {
		return nil, errors.Join(err, db.Close())
	}
	return &Ledger{path: path, db: db}, nil
}

// Close lets go of the ledger. There is nothing unsaved. Closing again does
// nothing.
func (l *Ledger) Close() error {
	l.mu.Lock()
	defer l.mu.Unlock()
	if l.closed {
		return nil
	}
	l.closed = true
	var errs []error
	if l.db != nil {
		errs = append(errs, l.db.Close())
	}
	if l.lock != nil {
		errs = append(errs, l.lock.release())
	}
	return explain(l.path, errors.Join(errs...))
}

// follow returns the absolute path of the file that path leads to through
// symbolic links, so that every name of a ledger has the same lock and a new
// ledger does not take the place of a link.
func follow(path string) (string, error) {
	abs, err := filepath.Abs(path)
	if err != nil {
		return "", err
	}
	if info, err := os.Lstat(abs); err != nil || info.Mode()&fs.ModeSymlink == 0 {
		return abs, nil // what is wrong with it shows when it is opened
	}
	return filepath.EvalSymlinks(abs)
}

// fileSize returns the size of file in bytes, 0 where there is none: an empty
// file is as good as none.
func fileSize(path, file string) (int64, error) {
	info, err := os.Stat(file)
	switch {
	case errors.Is(err, fs.ErrNotExist):
		return 0, nil
	case err != nil:
		return 0, fmt.Errorf("%s: %w", path, cause(err))
	case !info.Mode().IsRegular():
		return 0, fmt.Errorf("%s: %w: it is no plain file; name another with --ledger FILE", path, ErrNotLedger)
	}
	return info.Size(), nil
}

// cause strips the path from a system error: it stands at the head of the line.
func cause(err error) error {
	var p *fs.PathError
	if errors.As(err, &p) {
		return p.Err
	}
	return err
}

// create makes an empty ledger at file under another name and moves it into
// place, so that a ledger is there whole or not at all. The caller holds the lock.
func create(file string) error {
	fresh := file + ".new"
	// What a killed session left. A journal at file would be that of a ledger now
	// gone, and SQLite would roll it back into the new one.
	for _, old := range []string{fresh, fresh + "-journal", file + "-journal"} {
		if err := os.Remove(old); err != nil && !errors.Is(err, fs.ErrNotExist) {
			return err
		}
	}
	f, err := os.OpenFile(fresh, os.O_CREATE|os.O_EXCL|os.O_RDWR, 0o600)
	if err != nil {
		return err
	}
	if err := f.Close(); err != nil {
		return err
	}
	if err := fill(fresh); err != nil {
		return errors.Join(err, os.Remove(fresh))
	}
	// The folder needs no syncing: the first commit does it (synchronous=EXTRA).
	return os.Rename(fresh, file)
}

func fill(file string) error {
	db, err := openFile(file, url.Values{"mode": {"rw"}, "_synchronous": {"EXTRA"}})
	if err != nil {
		return err
	}
	_, err = db.Exec(fmt.Sprintf("BEGIN; %s PRAGMA application_id = %d; PRAGMA user_version = %d; COMMIT;",
		schema, applicationID, version))
	return errors.Join(err, db.Close())
}

// recognise reports whether file is a ledger that this version can use, without
// locking it, recovering it or writing to it.
func recognise(path, file string) error {
	var app, have int64
	db, err := openFile(file, url.Values{"mode": {"ro"}, "immutable": {"1"}})
	if err == nil {
		err = db.QueryRow(marks).Scan(&app, &have)
		_ = db.Close()
	}
	if err != nil {
		if info, e := os.Stat(file + "-journal"); e == nil && info.Size() > 0 {
			return nil // written half; it is whole again once the journal is rolled back
		}
		var s *sqlite.Error
		if errors.As(err, &s) && s.Code() == sqlite3.SQLITE_NOTADB {
			return notLedger(path)
		}
		return explain(path, err)
	}
	return accept(path, app, have)
}

func accept(path string, app, have int64) error {
	switch {
	case app != applicationID:
		return notLedger(path)
	case have > version:
		return fmt.Errorf("%s: %w (ledger version %d, this one reads up to %d); install the newer version",
			path, ErrNewer, have, version)
	case have < 1:
		return damaged(path, fmt.Errorf("its version is %d", have))
	}
	return nil
}

func notLedger(path string) error {
	return fmt.Errorf("%s: %w and was left as it is; name another with --ledger FILE", path, ErrNotLedger)
}

// verify reads the whole file and reports what does not hold together. It first
// rolls back what a killed session left, and so asks again what the file is.
func verify(path string, db *sql.DB) error {
	var app, have int64
	var check string
	err := db.QueryRow(marks).Scan(&app, &have)
	if err == nil {
		if err := accept(path, app, have); err != nil {
			return err
		}
		err = db.QueryRow("PRAGMA quick_check(1)").Scan(&check)
	}
	if err != nil {
		return explain(path, err)
	}
	if check != "ok" {
		return damaged(path, errors.New(oneLine(check)))
	}
	return nil
}

// openFile opens file, an absolute path, with SQLite. One connection is enough:
// a ledger has one writer, and calls wait for each other.
func openFile(file string, query url.Values) (*sql.DB, error) {
	query.Set("_busy_timeout", busyMillis)
	query.Set("_foreign_keys", "1")
	query.Set("_dqs", "0")
	slashed := filepath.ToSlash(file)
	if !strings.HasPrefix(slashed, "/") {
		slashed = "/" + slashed // a drive letter
	}
	name := url.URL{Scheme: "file", Path: slashed, RawQuery: query.Encode()}
	c, err := sqlite.NewConnector(name.String())
	if err != nil {
		return nil, err
	}
	db := sql.OpenDB(c)
	db.SetMaxOpenConns(1)
	if err := db.PingContext(context.Background()); err != nil {
		return nil, errors.Join(err, db.Close())
	}
	return db, nil
}
