package docket

import "slices"

// several reports whether an entry is of several words.
func (e *Entry) several() bool { return e.Kind == Join || e.Kind == Passage }

// name is what tells entries apart.
type name struct {
	kind Kind
	form string
}

// layAgain lays the entries out anew, now that other passages are unfolded. An
// entry whose places are the same stays the one it was; the others keep the place
// of their form in the order of review, and what was not there before follows the
// passage it stands in. Entries of listed words are made again when asked for.
func (d *Docket) layAgain() {
	before := map[name]*Entry{}
	for _, e := range *d.current.Load() {
		before[name{e.Kind, e.Form}] = e
	}
	laid := d.entries()
	fresh := make(map[name]*Entry, len(laid))
	for i, e := range laid {
		n := name{e.Kind, e.Form}
		if old := before[n]; old != nil && samePlaces(old, e) {
			laid[i] = old
		}
		fresh[n] = laid[i]
	}
	d.current.Store(&laid)
	var order []*Entry
	for _, e := range d.Entries {
		kept := fresh[name{e.Kind, e.Form}]
		if e.Kind == WordInContext || kept == nil {
			continue
		}
		order = append(order, kept)
		if e.Kind == Passage {
			order = append(order, newWithin(kept, laid, before)...)
		}
	}
	d.Entries = nil
	clear(d.byForm)
	clear(d.byKey)
	listed := map[*Entry]bool{}
	for _, e := range append(order, laid...) {
		if !listed[e] {
			listed[e] = true
			d.list(e)
		}
	}
}

// newWithin returns the entries that stand first within a passage and were not
// there before.
func newWithin(passage *Entry, laid []*Entry, before map[name]*Entry) []*Entry {
	var out []*Entry
	for _, e := range laid {
		if before[name{e.Kind, e.Form}] != nil {
			continue
		}
		for _, o := range passage.Occurrences {
			at := e.Occurrences[0]
			if at.Paragraph == o.Paragraph && at.Word >= o.Word && at.Word < o.Word+o.Words {
				out = append(out, e)
			}
		}
	}
	return out
}

func samePlaces(a, b *Entry) bool {
	return slices.EqualFunc(a.Occurrences, b.Occurrences, func(x, y Occurrence) bool {
		return byPlace(x, y) == 0 && x.Words == y.Words
	})
}
