package ledger

import (
	"crypto/rand"
	"encoding/hex"
	"fmt"
	"time"
)

// ID is a random 128-bit number that names a ruling in every ledger it is ever
// copied to. The zero ID names nothing.
type ID [16]byte

// NewID returns an ID from the system's source of randomness.
func NewID() ID {
	var id ID
	rand.Read(id[:]) // never fails: it ends the program where the system has no randomness
	return id
}

// ParseID reads what String writes, in either case of letters.
func ParseID(s string) (ID, error) {
	var id ID
	b, err := hex.DecodeString(s)
	if err != nil || len(b) != len(id) {
		return ID{}, fmt.Errorf("%.40q is no ruling id; it needs 32 hexadecimal digits", s)
	}
	copy(id[:], b)
	return id, nil
}

// String returns the 32 hexadecimal digits of id, in lower case.
func (id ID) String() string { return hex.EncodeToString(id[:]) }

// IsZero reports whether id names nothing.
func (id ID) IsZero() bool { return id == ID{} }

// Act is what a ruling does.
type Act string

// The acts. Any of them but Undo may carry a query; Unfold is for passages alone.
const (
	Accept Act = "accept" // emend the form to Word
	Reject Act = "reject" // let the form stand
	Add    Act = "add"    // put the form on List
	Query  Act = "query"  // ask, and nothing else
	Later  Act = "later"  // put the entry off
	Unfold Act = "unfold" // rule on the words of a passage one by one
	Undo   Act = "undo"   // take back the ruling that Undoes names; of an undo: redo
)

// Scope is to which occurrences of its form a ruling applies.
type Scope string

// The scopes. An undo has none.
const (
	Every   Scope = "every"   // all of them, also those still to come
	Checked Scope = "checked" // those listed in Occurrences
)

// Occurrence is one place that a ruling applies to, with what finds the place
// again once the manuscript has changed.
type Occurrence struct {
	Part       string // title of the part
	PartIndex  int    // number of the part, from 1
	Paragraph  int    // index of the paragraph in the manuscript, from 0
	Start, End int    // the bytes [Start, End) of the file
	Line       int    // line of the file, from 1
	Column     int    // letter of the line, from 1
	Text       string // the form as it stands there
	Before     string // up to forty letters before it
	After      string // up to forty letters after it
	Seen       bool   // the citation was on screen when the ruling was made
}

// Ruling is the decision on an entry. Once in a ledger it is never rewritten; an
// undo is a ruling of its own.
type Ruling struct {
	ID          ID           // from NewID
	With        ID           // the leader: an earlier ruling that it was made together with, or zero
	Undoes      ID           // of an undo: the earlier ruling that it takes back
	EntryKind   string       // the docket's name for the kind of entry
	Form        string       // the form ruled on
	Act         Act          // what the ruling does
	Word        string       // of an accept: what takes the form's place
	List        string       // of an add: book, series or house
	Kind        string       // of an add: person, place, term, …; of a reject: a passage's language
	Note        string       // the editor's own words about it
	Query       string       // the question, if there is one
	To          string       // whom it asks: author, publisher, self
	Scope       Scope        // to which occurrences it applies
	Who         string       // who ruled
	When        time.Time    // when; a ledger keeps it to the nanosecond and gives it back in UTC
	Manuscript  [32]byte     // SHA-256 of the manuscript's bytes
	Occurrences []Occurrence // the places it was made for
}

// check reports what keeps r out of a ledger, whatever that ledger holds.
func (r *Ruling) check() error {
	switch r.Act {
	case Accept, Reject, Add, Query, Later, Unfold:
		if !r.Undoes.IsZero() {
			return fmt.Errorf("it is %q and names a ruling to undo; only an undo may", r.Act)
		}
	case Undo:
		if r.Undoes.IsZero() {
			return fmt.Errorf("it is an undo and does not say of which ruling; set Undoes")
		}
	default:
		return fmt.Errorf("its act is %.40q; it must be accept, reject, add, query, later, unfold or undo", r.Act)
	}
	switch r.Scope {
	case Every, Checked, "":
	default:
		return fmt.Errorf("its scope is %.40q; it must be every or checked", r.Scope)
	}
	switch y := r.When.UTC().Year(); {
	case r.ID.IsZero():
		return fmt.Errorf("it has no id; give it one from NewID")
	case r.Undoes == r.ID || r.With == r.ID:
		return fmt.Errorf("it refers to itself; it may only refer to an earlier ruling")
	case y < 0 || y > 9999:
		return fmt.Errorf("its year is %d; it must be between 0 and 9999", y)
	}
	return nil
}
