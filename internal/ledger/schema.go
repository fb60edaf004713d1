package ledger

const (
	// applicationID marks an SQLite file as a ledger ("EMLG" in ASCII).
	applicationID = 0x454d4c47
	// version is the schema's, kept as the file's user_version. A change to the
	// schema raises it.
	version = 1
)

// schema makes an empty ledger.
//
// Tables refer to rulings by ID, never by seq, so that a union of two ledgers
// needs no renumbering; seq is only the order in which this file got them. The
// occurrences of a ruling are written before it, and no more can be added once it
// is there: that seals a ruling with all that belongs to it. The triggers on
// INSERT are there because INSERT OR REPLACE would get round those on DELETE.
const schema = `
CREATE TABLE rulings (
	seq        INTEGER PRIMARY KEY,
	id         BLOB NOT NULL UNIQUE CHECK (length(id) = 16),
	made_with  BLOB REFERENCES rulings (id),
	undoes     BLOB REFERENCES rulings (id),
	entry_kind TEXT NOT NULL,
	form       TEXT NOT NULL,
	act        TEXT NOT NULL,
	word       TEXT NOT NULL,
	list       TEXT NOT NULL,
	kind       TEXT NOT NULL,
	note       TEXT NOT NULL,
	query      TEXT NOT NULL,
	asks       TEXT NOT NULL,
	scope      TEXT NOT NULL,
	who        TEXT NOT NULL,
	at         TEXT NOT NULL,  -- UTC, RFC 3339 with nine decimals
	manuscript BLOB NOT NULL CHECK (length(manuscript) = 32),
	CHECK ((act = 'undo') = (undoes IS NOT NULL))
);
CREATE TABLE occurrences (
	ruling     BLOB NOT NULL REFERENCES rulings (id) DEFERRABLE INITIALLY DEFERRED,
	n          INTEGER NOT NULL,
	part       TEXT NOT NULL,
	part_index INTEGER NOT NULL,
	paragraph  INTEGER NOT NULL,
	first_byte INTEGER NOT NULL,
	past_byte  INTEGER NOT NULL,
	line       INTEGER NOT NULL,
	col        INTEGER NOT NULL,
	text       TEXT NOT NULL,
	before     TEXT NOT NULL,
	after      TEXT NOT NULL,
	seen       INTEGER NOT NULL,
	PRIMARY KEY (ruling, n)
) WITHOUT ROWID;
CREATE TABLE settings (
	name  TEXT PRIMARY KEY,
	value TEXT NOT NULL
) WITHOUT ROWID;

CREATE TRIGGER rulings_stay_as_they_are BEFORE UPDATE ON rulings
	BEGIN SELECT RAISE(ABORT, 'a ruling is never rewritten'); END;
CREATE TRIGGER rulings_stay BEFORE DELETE ON rulings
	BEGIN SELECT RAISE(ABORT, 'a ruling is never removed'); END;
CREATE TRIGGER rulings_are_not_replaced BEFORE INSERT ON rulings
	WHEN EXISTS (SELECT 1 FROM rulings WHERE id = NEW.id OR seq = NEW.seq)
	BEGIN SELECT RAISE(ABORT, 'a ruling is never replaced'); END;
CREATE TRIGGER occurrences_stay_as_they_are BEFORE UPDATE ON occurrences
	BEGIN SELECT RAISE(ABORT, 'an occurrence is never rewritten'); END;
CREATE TRIGGER occurrences_stay BEFORE DELETE ON occurrences
	BEGIN SELECT RAISE(ABORT, 'an occurrence is never removed'); END;
CREATE TRIGGER occurrences_come_before_their_ruling BEFORE INSERT ON occurrences
	WHEN EXISTS (SELECT 1 FROM rulings WHERE id = NEW.ruling)
		OR EXISTS (SELECT 1 FROM occurrences WHERE ruling = NEW.ruling AND n = NEW.n)
	BEGIN SELECT RAISE(ABORT, 'an occurrence is never added to a ruling'); END;
`
