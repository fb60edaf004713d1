package docket

import (
	"cmp"
	"maps"
	"slices"
)

// Order is an order of review.
type Order string

// The orders. Equal entries come by place; a listed word that somebody asked for
// comes last in all of them.
const (
	BySlip       Order = "slip"       // the likeliest slips first, names last: see Group
	ByPlace      Order = "place"      // as the forms first stand in the manuscript
	ByAlphabet   Order = "alphabet"   // as indexes file them
	ByCount      Order = "count"      // the most frequent first
	ByDispersion Order = "dispersion" // the most evenly spread first (DPnorm), then by count
)

// Orders returns the orders, the usual one first.
func Orders() []Order { return []Order{BySlip, ByPlace, ByAlphabet, ByCount, ByDispersion} }

// Order returns the order that the entries were last put in.
func (d *Docket) Order() Order { return d.order }

// Next returns the order after o, around the end.
func (o Order) Next() Order {
	all := Orders()
	return all[(slices.Index(all, o)+1)%len(all)]
}

// TakeSlips takes exact probabilities of entries (SlipGiven) in place of the
// provisional ones (Slip). It moves no entry: Reorder does.
func (d *Docket) TakeSlips(slips map[*Entry]float64) { maps.Copy(d.exact, slips) }

// Probability returns the probability that e is a slip: the exact one where
// TakeSlips brought it, else the provisional one.
func (d *Docket) Probability(e *Entry) float64 {
	if p, ok := d.exact[e]; ok {
		return p
	}
	return d.Slip(e)
}

// Reorder puts the entries in order o. Those that have been passed come first and
// stay as they are among themselves: only the others move. passed may be nil, for
// none. Entries, probabilities and o alone decide; no entry is lost or doubled.
// O(n log n).
func (d *Docket) Reorder(o Order, passed func(*Entry) bool) {
	kept := make([]*Entry, 0, len(d.Entries))
	var ahead []*Entry
	for _, e := range d.Entries {
		if passed != nil && passed(e) {
			kept = append(kept, e)
		} else {
			ahead = append(ahead, e)
		}
	}
	d.order = o
	d.Entries = append(kept, d.sorted(o, ahead)...)
}

// sorted returns entries in order o.
func (d *Docket) sorted(o Order, entries []*Entry) []*Entry {
	compare := func(a, b *Entry) int { return 0 }
	switch o {
	case BySlip:
		compare = d.bySlip(entries)
	case ByAlphabet:
		filed := make(map[*Entry]string, len(entries))
		for _, e := range entries {
			filed[e] = FiledUnder(e.Form)
		}
		compare = func(a, b *Entry) int { return cmp.Compare(filed[a], filed[b]) }
	case ByCount:
		compare = byCount
	case ByDispersion:
		spread := make(map[*Entry]float64, len(entries))
		for _, e := range entries {
			spread[e] = d.Dispersion(e).DPnorm
		}
		compare = func(a, b *Entry) int { return cmp.Or(cmp.Compare(spread[a], spread[b]), byCount(a, b)) }
	}
	slices.SortFunc(entries, func(a, b *Entry) int {
		return cmp.Or(listedLast(a, b), compare(a, b), byFirstPlace(a, b))
	})
	return entries
}

func listedLast(a, b *Entry) int {
	listed := func(e *Entry) int {
		if e.Kind == WordInContext {
			return 1
		}
		return 0
	}
	return listed(a) - listed(b)
}

func byCount(a, b *Entry) int { return cmp.Compare(len(b.Occurrences), len(a.Occurrences)) }

// byFirstPlace orders entries as they first stand in the manuscript; two of one
// place are told apart by their forms and kinds.
func byFirstPlace(a, b *Entry) int {
	return cmp.Or(byPlace(a.Occurrences[0], b.Occurrences[0]), cmp.Compare(a.Form, b.Form), cmp.Compare(a.Kind, b.Kind))
}
