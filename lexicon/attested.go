package lexicon

import "iter"

// Attested returns the variety that a manuscript is written in, by its forms and
// how often each occurs, and for each variety the occurrences that speak for it.
//
// A form speaks for the varieties that have a base word covering it, as often as
// it occurs, where at least one variety has it and at least one lacks it: colour
// speaks for all but American, realize for American, British -ize and Canadian.
// Words of lists of variants speak for none. Of varieties for which equally many
// occurrences speak, the first in the order of [Varieties] is returned: a
// manuscript with colour and neither realise nor realize is British -ise. Where
// nothing speaks for any, as in a base of one variety, it is AnyVariety. The
// variety in use and the lists above the base make no difference.
func (x *Lexicon) Attested(counts iter.Seq2[string, int]) (Variety, map[Variety]int) {
	evidence := map[Variety]int{}
	if x == nil || x.layers[Base] == nil || counts == nil {
		return AnyVariety, evidence
	}
	for form, count := range counts {
		set := x.baseVarieties(form)
		if set == 0 || set == allVarieties || count <= 0 {
			continue
		}
		for _, v := range Varieties() {
			if set.has(v) {
				evidence[v] += count
			}
		}
	}
	best := AnyVariety
	for _, v := range Varieties() {
		if evidence[v] > evidence[best] {
			best = v
		}
	}
	return best, evidence
}

// baseVarieties returns the varieties that have a base word covering form.
func (x *Lexicon) baseVarieties(form string) varietySet {
	var set varietySet
	for _, s := range x.spell(form).withoutStops() {
		for _, w := range x.cover(nil, x.layers[Base], Base, s) {
			set |= sourceVarieties(w.Sources)
		}
	}
	return set
}
