package ledger

import (
	"context"
	"database/sql"
	"errors"
	"fmt"
	"time"

	"modernc.org/sqlite"
	sqlite3 "modernc.org/sqlite/lib"
)

// timeLayout is RFC 3339 with all nine decimals, so that times sort as text.
const timeLayout = "2006-01-02T15:04:05.000000000Z07:00"

const insertRuling = `INSERT INTO rulings
	(id, made_with, undoes, entry_kind, form, act, word, list, kind, note, query, asks, scope, who, at, manuscript)
	VALUES (?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?)`

const insertOccurrence = `INSERT INTO occurrences
	(ruling, n, part, part_index, paragraph, first_byte, past_byte, line, col, text, before, after, seen)
	VALUES (?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?)`

// Append writes rulings in one durable transaction, in the order given: all of
// them or none. When it returns nil they are on disk. An undo and a ruling made
// with another must come after the ruling they refer to, in the ledger or among
// rulings; a ruling that is in the ledger already is refused with ErrTwice, so
// that a write whose outcome is unknown can be tried again.
//
// It takes O(n log N) time for n rulings and occurrences in a ledger of N, and
// one wait for the disk. Ending ctx before the commit leaves nothing written.
func (l *Ledger) Append(ctx context.Context, rulings ...Ruling) error {
	for i := range rulings {
		if err := rulings[i].check(); err != nil {
			return fmt.Errorf("%s: ruling on %.40q: %w", l.path, rulings[i].Form, err)
		}
	}
	return l.write(ctx, func(tx *sql.Tx) error { return insert(ctx, tx, rulings) })
}

// SetSetting remembers value under name, in place of what was remembered there.
// It is as durable as Append.
func (l *Ledger) SetSetting(ctx context.Context, name, value string) error {
	return l.write(ctx, func(tx *sql.Tx) error {
		_, err := tx.ExecContext(ctx, `INSERT INTO settings (name, value) VALUES (?, ?)
			ON CONFLICT (name) DO UPDATE SET value = excluded.value`, name, value)
		return err
	})
}

// write runs do in a transaction of its own and commits it.
func (l *Ledger) write(ctx context.Context, do func(*sql.Tx) error) error {
	l.mu.Lock()
	defer l.mu.Unlock()
	switch {
	case l.closed:
		return fmt.Errorf("%s: %w", l.path, ErrClosed)
	case l.lock == nil:
		return fmt.Errorf("%s: %w", l.path, ErrReadOnly)
	}
	tx, err := l.db.BeginTx(ctx, nil)
	if err != nil {
		return explain(l.path, err)
	}
	if err := do(tx); err != nil {
		_ = tx.Rollback() // the first error is the one to tell
		return explain(l.path, ended(ctx, err))
	}
	return explain(l.path, ended(ctx, tx.Commit()))
}

// ended returns the error of ctx for an err that came of its end: SQLite and
// database/sql each have their own words for that.
func ended(ctx context.Context, err error) error {
	if err != nil && ctx.Err() != nil {
		return ctx.Err()
	}
	return err
}

func insert(ctx context.Context, tx *sql.Tx, rulings []Ruling) error {
	ruling, err := tx.PrepareContext(ctx, insertRuling)
	if err != nil {
		return err
	}
	defer ruling.Close()
	occurrence, err := tx.PrepareContext(ctx, insertOccurrence)
	if err != nil {
		return err
	}
	defer occurrence.Close()
	for i := range rulings {
		r := &rulings[i]
		for n, o := range r.Occurrences {
			_, err := occurrence.ExecContext(ctx, r.ID[:], n, o.Part, o.PartIndex, o.Paragraph,
				o.Start, o.End, o.Line, o.Column, o.Text, o.Before, o.After, o.Seen)
			if err != nil {
				return refused(r, err)
			}
		}
		_, err := ruling.ExecContext(ctx, r.ID[:], reference(r.With), reference(r.Undoes), r.EntryKind, r.Form,
			string(r.Act), r.Word, r.List, r.Kind, r.Note, r.Query, r.To, string(r.Scope), r.Who,
			r.When.UTC().Format(timeLayout), r.Manuscript[:])
		if err != nil {
			return refused(r, err)
		}
	}
	return nil
}

// reference returns id as the database has it: none is NULL.
func reference(id ID) any {
	if id.IsZero() {
		return nil
	}
	return id[:]
}

// refused explains which rule of the schema kept r out.
func refused(r *Ruling, err error) error {
	var s *sqlite.Error
	if !errors.As(err, &s) {
		return err
	}
	switch s.Code() {
	case sqlite3.SQLITE_CONSTRAINT_TRIGGER:
		return fmt.Errorf("ruling %s on %.40q: %w", r.ID, r.Form, ErrTwice)
	case sqlite3.SQLITE_CONSTRAINT_FOREIGNKEY:
		return fmt.Errorf("ruling %s on %.40q refers to a ruling that is not in the ledger; write that one first",
			r.ID, r.Form)
	}
	return err
}

// parseTime is the inverse of Format with timeLayout.
func parseTime(s string) (time.Time, error) {
	t, err := time.Parse(time.RFC3339Nano, s)
	return t.UTC(), err
}
