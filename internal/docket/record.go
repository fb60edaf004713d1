package docket

import (
	"slices"

	"emendary/internal/ledger"
	"emendary/lexicon"
)

// Ruling starts a ruling on e for the checked occurrences: scope Every when
// those are all there are. Two exceptions: where none is checked, every act but
// accept is for all open ones; and while the checks are those that Checked gave,
// let stand and add are for all open ones too, since what starts unchecked does so
// to stay as it is. seen says which citations have been on screen (nil: none). The
// caller fills in Word, List, Kind, Note, Query and To.
func (d *Docket) Ruling(e *Entry, act ledger.Act, checked, seen []bool) ledger.Ruling {
	stays := act == ledger.Reject || act == ledger.Add
	allOpen := act != ledger.Accept && !slices.Contains(checked, true) || stays && slices.Equal(checked, d.Checked(e))
	on := make([]bool, len(e.Occurrences))
	for i, o := range e.Occurrences {
		on[i] = i < len(checked) && checked[i] || allOpen && o.Ruling == nil
	}
	return d.ruling(e, act, on, seen)
}

// ruling starts a ruling on just those occurrences of e.
func (d *Docket) ruling(e *Entry, act ledger.Act, on, seen []bool) ledger.Ruling {
	r := ledger.Ruling{
		ID: ledger.NewID(), EntryKind: string(e.Kind), Form: e.Form, Act: act,
		Who: d.who, When: d.now(), Manuscript: d.Document.SHA256,
	}
	for i := range e.Occurrences {
		if on[i] {
			r.Occurrences = append(r.Occurrences, d.witness(e, i, i < len(seen) && seen[i]))
		}
	}
	r.Scope = ledger.Checked
	if len(r.Occurrences) == len(e.Occurrences) {
		r.Scope = ledger.Every
	}
	return r
}

// Undo starts a ruling that undoes r; of an undo, it is the redo.
func (d *Docket) Undo(r ledger.Ruling) ledger.Ruling {
	return ledger.Ruling{
		ID: ledger.NewID(), Undoes: r.ID, EntryKind: r.EntryKind, Form: r.Form, Act: ledger.Undo,
		Scope: ledger.Every, Who: d.who, When: d.now(), Manuscript: d.Document.SHA256,
	}
}

// Rulings returns the rulings in force, in the order in which they were made.
func (d *Docket) Rulings() []ledger.Ruling { return ledger.Effective(d.log) }

// Record takes rulings that the ledger holds into the docket's state. Without an
// undo among them it takes time in proportion to their occurrences; an undo, and
// a ruling on a passage, takes all rulings anew.
func (d *Docket) Record(rulings ...ledger.Ruling) {
	d.log = append(d.log, rulings...)
	added := false
	for i := range rulings {
		if rulings[i].Act == ledger.Undo || rulings[i].EntryKind == string(Passage) {
			d.restate()
			return
		}
		added = added || rulings[i].Act == ledger.Add
	}
	for i := range rulings {
		d.take(&rulings[i])
	}
	if added {
		d.learn(d.Rulings())
	}
}

// restate works out the state of all entries from the whole log.
func (d *Docket) restate() {
	inForce := d.Rulings()
	if d.takePassageRulings(inForce) {
		d.layAgain()
	}
	for _, e := range d.Entries {
		e.rulings, e.putOff, e.open = nil, false, len(e.Occurrences)
		for i := range e.Occurrences {
			e.Occurrences[i].Ruling = nil
		}
	}
	d.Unplaced = nil
	for i := range inForce {
		d.take(&inForce[i])
	}
	d.learn(inForce)
}

// take lays one ruling in force on the occurrences that it covers.
func (d *Docket) take(r *ledger.Ruling) {
	e := d.Find(r.Form)
	if e == nil {
		for _, o := range r.Occurrences {
			d.Unplaced = append(d.Unplaced, Unplaced{*r, o})
		}
		return
	}
	e.rulings = append(e.rulings, r)
	e.putOff = r.Act == ledger.Later
	if r.Act == ledger.Later {
		return
	}
	for _, i := range d.covered(e, r) {
		old := e.Occurrences[i].Ruling
		if old == nil {
			e.open--
		}
		// A query asks about whatever was ruled; it takes nothing back.
		if old == nil || r.Act != ledger.Query {
			e.Occurrences[i].Ruling = r
		}
	}
}

// learn makes the lexicon in use of the layers on file and of what the rulings
// in force added, whatever list it went to.
func (d *Docket) learn(inForce []ledger.Ruling) {
	var words []lexicon.Word
	for _, r := range inForce {
		if r.Act == ledger.Add {
			words = append(words, lexicon.Word{Text: r.Form, Kind: r.Kind, Note: r.Note})
		}
	}
	list, err := lexicon.NewList("book list", words)
	if err != nil {
		// A form that no list can hold (too long, say) cannot be a candidate either.
		return
	}
	d.lex.Store(d.base.With(lexicon.Book, list))
}

// Last returns the newest ruling in force, and the newest undo that can be
// undone in its turn: one that no other ruling came after. Either may be nil.
func (d *Docket) Last() (ruling, undo *ledger.Ruling) {
	if inForce := d.Rulings(); len(inForce) > 0 {
		for i := len(inForce) - 1; i >= 0 && ruling == nil; i-- {
			if inForce[i].With.IsZero() {
				ruling = &inForce[i]
			}
		}
	}
	taken := map[ledger.ID]bool{}
	for i := len(d.log) - 1; i >= 0; i-- {
		r := &d.log[i]
		if r.Act != ledger.Undo {
			break
		}
		if !taken[r.ID] {
			if !d.undid(r.Undoes) {
				return ruling, r
			}
			taken[r.Undoes] = true
		}
	}
	return ruling, nil
}

// undid reports whether the ruling with that ID is an undo: then what undoes it
// is a redo.
func (d *Docket) undid(id ledger.ID) bool {
	return slices.ContainsFunc(d.log, func(r ledger.Ruling) bool { return r.ID == id && r.Act == ledger.Undo })
}
