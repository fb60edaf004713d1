// Package ledger keeps the durable record of all rulings: one file beside the
// manuscript, to which rulings are appended and in which none is ever rewritten.
//
// Read Ruling first, then Ledger with its methods Append and Rulings, then
// Effective, which says what the rulings come to once undos are accounted for.
// PathFor names the ledger of a manuscript.
//
// The file is an SQLite database in rollback-journal mode with synchronous=EXTRA:
// a ruling is on disk when Append returns, and a session killed in the middle of
// a write leaves a journal that the next session rolls back. Between writes the
// one file is all there is, so that it can be copied like any other. A file
// beside it, named path+".lock", is there and locked while a session has the
// ledger open for writing; see InUse.
//
// Rulings have random IDs and refer to each other by ID alone, and their places
// carry what finds them again, so that two ledgers can be merged by union.
//
// The package knows nothing of dockets and manuscripts: it stores what it is
// given, byte for byte. It does not merge ledgers, does not look for places and
// does not judge whether rulings contradict each other.
package ledger
