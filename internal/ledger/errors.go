package ledger

import (
	"context"
	"errors"
	"fmt"
	"io/fs"
	"syscall"

	"modernc.org/sqlite"
	sqlite3 "modernc.org/sqlite/lib"
)

// Errors that callers tell apart with errors.Is.
var (
	// ErrNotLedger: the file is something else, and was left as it was.
	ErrNotLedger = errors.New("is not a ledger")
	// ErrNewer: the ledger was written by a later version of the program.
	ErrNewer = errors.New("was written by a newer version")
	// ErrDamaged: the file is a ledger but does not hold together.
	ErrDamaged = errors.New("is damaged")
	// ErrCannotWrite: the file or its folder cannot be written.
	ErrCannotWrite = errors.New("cannot be written")
	// ErrReadOnly: the ledger was opened with OpenToRead.
	ErrReadOnly = errors.New("was opened for reading only")
	// ErrClosed: the ledger has been closed.
	ErrClosed = errors.New("is closed")
	// ErrTwice: a ruling with this ID is in the ledger already.
	ErrTwice = errors.New("is in the ledger already")
)

// cannotWrite explains why the ledger at path cannot be created or changed.
func cannotWrite(path string, why error) error {
	var p *fs.PathError
	if errors.As(why, &p) {
		why = p.Err // the path stands at the head of the line
	}
	return fmt.Errorf("%s: %w here (%w); name another place with --ledger FILE", path, ErrCannotWrite, why)
}

// explain turns an error of SQLite or of the system into a line that says what to
// do. It keeps the cause for errors.Is and errors.As.
func explain(path string, err error) error {
	if err == nil {
		return nil
	}
	if errors.Is(err, context.Canceled) || errors.Is(err, context.DeadlineExceeded) {
		return fmt.Errorf("%s: interrupted: %w", path, err)
	}
	if errors.Is(err, syscall.EROFS) || errors.Is(err, fs.ErrPermission) {
		return cannotWrite(path, err)
	}
	var s *sqlite.Error
	if !errors.As(err, &s) {
		return fmt.Errorf("%s: %w", path, err)
	}
	switch s.Code() & 0xff { // the low byte is the kind, the rest its detail
	case sqlite3.SQLITE_BUSY, sqlite3.SQLITE_LOCKED:
		return fmt.Errorf("%s: another program keeps it locked; close that program and try again: %w", path, err)
	case sqlite3.SQLITE_READONLY, sqlite3.SQLITE_CANTOPEN, sqlite3.SQLITE_PERM:
		return cannotWrite(path, err)
	case sqlite3.SQLITE_FULL:
		return fmt.Errorf("%s: the disk is full, nothing was written; free some space and try again: %w", path, err)
	case sqlite3.SQLITE_CORRUPT, sqlite3.SQLITE_NOTADB:
		return damaged(path, err)
	}
	return fmt.Errorf("%s: %w", path, err)
}

func damaged(path string, why error) error {
	return fmt.Errorf("%s: %w (%w); bring back a backup copy, or move the file away to start a new ledger",
		path, ErrDamaged, why)
}
