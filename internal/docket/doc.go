// Package docket lays out what an editor has to rule on in a manuscript: its
// entries, each a question about the occurrences of one form, with the
// candidates it may stand for, its citations, and the rulings made on it.
//
// Read Entry and Occurrence first, then Docket, whose state changes by Record
// alone; Session puts a docket together with its ledger and lists, and is what
// the review bench and the commands open. ReadLines and RulingsFrom take
// rulings that were made elsewhere.
//
// What goes on the docket: words that no layer of the lexicon knows, words that
// only another variety has, words that a list bars, faults the splitter sees
// (2th, l9l4, ‘tis), two neighbours that are one listed word (to gether), and
// passages in other languages, whose words are no entries until it is unfolded.
// How forms fold into one entry is written at fold, what a passage is at passages.
//
// What does not: numbers, ordinals, Roman numerals, initials, words with digits
// in them; hyphenated compounds whose members are all known; known words with a
// possessive or a clitic (’ll, ’d, ’ve, ’re, ’m) after them.
package docket

import (
	"emendary/internal/ledger"
	"emendary/internal/manuscript"
)

// Kind is the kind of question an entry asks.
type Kind string

// The kinds of entry.
const (
	UnknownForm   Kind = "unknown form"
	OtherVariety  Kind = "other variety"
	BarredWord    Kind = "barred word"
	Join          Kind = "join"
	Passage       Kind = "passage"
	WordInContext Kind = "word in context" // a listed word, or one within a passage, that somebody ruled on or asked for
)

// Entry is one question about the occurrences of one form.
type Entry struct {
	Kind        Kind
	Form        string   // folded over sentence starts, capitals and endings: see fold
	Why         string   // what is the matter, where that can be said: "wrong ordinal", "barred; use OK"
	Instead     []string // candidates that a rule or a list names; they come first
	Occurrences []Occurrence

	rulings []*ledger.Ruling // in force, oldest first
	open    int              // occurrences without a ruling
	putOff  bool             // the newest ruling is a later
}

// Occurrence is one place where the form of an entry stands.
type Occurrence struct {
	Paragraph int            // index into Document.Paragraphs
	Word      int            // index of its first word there
	Words     int            // how many words it spans: 1, for a join 2, for a passage all of them
	Text      string         // as it stands, without Lead, Tail and marks
	Lead      string         // what stands before it in its word: a suspended hyphen, an apostrophe
	Tail      string         // what stands after it: a possessive, a clitic, a suspended hyphen
	Ruling    *ledger.Ruling // the ruling in force on it; nil while it is open
}

// Open reports whether any occurrence is still to be ruled on. O(1).
func (e *Entry) Open() bool { return e.open > 0 }

// PutOff reports whether the entry is open and a later was the last said of it.
func (e *Entry) PutOff() bool { return e.open > 0 && e.putOff }

// Rulings returns the rulings in force on the entry, oldest first.
func (e *Entry) Rulings() []ledger.Ruling {
	out := make([]ledger.Ruling, len(e.rulings))
	for i, r := range e.rulings {
		out[i] = *r
	}
	return out
}

// place is one word of the manuscript.
type place struct{ paragraph, word int32 }

// form is what is known of one distinct spelling before entries are made.
type form struct {
	text    string
	places  []place
	fault   manuscript.Fault
	instead string
}
