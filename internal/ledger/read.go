package ledger

import (
	"context"
	"database/sql"
	"errors"
	"fmt"
)

// lookEvery is after how many rows a reading looks whether its context has ended.
// The driver would look at every row, with a goroutine each time, which takes
// longer than reading the row.
const lookEvery = 1000

const selectRulings = `SELECT id, made_with, undoes, entry_kind, form, act, word, list, kind, note, query, asks,
	scope, who, at, manuscript FROM rulings ORDER BY seq`

const selectOccurrences = `SELECT ruling, part, part_index, paragraph, first_byte, past_byte, line, col,
	text, before, after, seen FROM occurrences ORDER BY ruling, n`

// Rulings returns all rulings in the order in which they were written, undos
// among them. It sees one moment of the ledger, also while another session writes
// to it. It takes O(n) time and space for n rulings and occurrences.
func (l *Ledger) Rulings(ctx context.Context) ([]Ruling, error) {
	var rulings []Ruling
	err := l.read(ctx, func(tx *sql.Tx) (err error) {
		if rulings, err = readRulings(ctx, tx); err != nil {
			return err
		}
		return readOccurrences(ctx, tx, rulings)
	})
	if err != nil {
		return nil, err
	}
	return rulings, nil
}

// Setting returns what was remembered under name, or "" where nothing was. The
// names in use are "house", "series" and "variety".
func (l *Ledger) Setting(ctx context.Context, name string) (string, error) {
	var value string
	err := l.read(ctx, func(tx *sql.Tx) error {
		err := tx.QueryRowContext(ctx, "SELECT value FROM settings WHERE name = ?", name).Scan(&value)
		if errors.Is(err, sql.ErrNoRows) {
			return nil
		}
		return err
	})
	if err != nil {
		return "", err
	}
	return value, nil
}

// read runs do in a transaction that only reads, and so sees one moment. A ledger
// without a file has nothing to read.
func (l *Ledger) read(ctx context.Context, do func(*sql.Tx) error) error {
	l.mu.Lock()
	defer l.mu.Unlock()
	switch {
	case l.closed:
		return fmt.Errorf("%s: %w", l.path, ErrClosed)
	case l.db == nil:
		return ctx.Err()
	}
	tx, err := l.db.BeginTx(ctx, &sql.TxOptions{ReadOnly: true})
	if err != nil {
		return explain(l.path, err)
	}
	// The first statement waits for the lock, and stops waiting when ctx ends.
	if _, err = tx.ExecContext(ctx, "SELECT 1 FROM settings LIMIT 1"); err == nil {
		err = do(tx)
	}
	_ = tx.Rollback() // there is nothing to lose
	return explain(l.path, ended(ctx, err))
}

func readRulings(ctx context.Context, tx *sql.Tx) ([]Ruling, error) {
	rows, err := tx.QueryContext(context.WithoutCancel(ctx), selectRulings)
	if err != nil {
		return nil, err
	}
	defer rows.Close()
	var rulings []Ruling
	var id, with, undoes, manuscript sql.RawBytes
	var at string
	for rows.Next() {
		if len(rulings)%lookEvery == 0 && ctx.Err() != nil {
			return nil, ctx.Err()
		}
		var r Ruling
		if err := rows.Scan(&id, &with, &undoes, &r.EntryKind, &r.Form, &r.Act, &r.Word, &r.List, &r.Kind,
			&r.Note, &r.Query, &r.To, &r.Scope, &r.Who, &at, &manuscript); err != nil {
			return nil, err
		}
		copy(r.ID[:], id)
		copy(r.With[:], with)
		copy(r.Undoes[:], undoes)
		copy(r.Manuscript[:], manuscript)
		if r.When, err = parseTime(at); err != nil {
			return nil, fmt.Errorf("%w: ruling %s has no time that can be read: %w", ErrDamaged, r.ID, err)
		}
		rulings = append(rulings, r)
	}
	return rulings, rows.Err()
}

// readOccurrences adds the occurrences to rulings. They come ruling by ruling, so
// that a ruling is looked up once for all its occurrences.
func readOccurrences(ctx context.Context, tx *sql.Tx, rulings []Ruling) error {
	at := make(map[ID]int, len(rulings))
	for i := range rulings {
		at[rulings[i].ID] = i
	}
	rows, err := tx.QueryContext(context.WithoutCancel(ctx), selectOccurrences)
	if err != nil {
		return err
	}
	defer rows.Close()
	var raw sql.RawBytes
	var id ID
	var of *Ruling // the ruling that id names
	for n := 0; rows.Next(); n++ {
		if n%lookEvery == 0 && ctx.Err() != nil {
			return ctx.Err()
		}
		var o Occurrence
		if err := rows.Scan(&raw, &o.Part, &o.PartIndex, &o.Paragraph, &o.Start, &o.End, &o.Line, &o.Column,
			&o.Text, &o.Before, &o.After, &o.Seen); err != nil {
			return err
		}
		if of == nil || string(raw) != string(id[:]) {
			copy(id[:], raw)
			i, ok := at[id]
			if !ok {
				return fmt.Errorf("%w: an occurrence belongs to ruling %s, which is missing", ErrDamaged, id)
			}
			of = &rulings[i]
		}
		of.Occurrences = append(of.Occurrences, o)
	}
	return rows.Err()
}
