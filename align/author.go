package align

import (
	"cmp"
	"math"
	"slices"
)

// author is how the slips of one writer differ from those of the many that costs
// were fitted to.
type author struct {
	kinds [slipKinds]int32   // by kind: what its slips cost more than those of all, in grains
	slips map[slip]int32     // within a kind
	seen  map[slip]float64   // how often, by expectation
	of    [slipKinds]float64 // likewise, by kind
}

// Besides the kinds of slips at a spot there are those of several letters.
const (
	swapKind  = kinds
	longKind  = kinds + 1
	slipKinds = kinds + 2
)

// slip is a slip whatever stands around it: a letter of the word (the edge for a
// gap) and what is written instead (the edge for nothing); or two letters swapped.
type slip struct {
	kind            uint8
	letter, written symbol
}

// Slips of the many that one author's count against, overall by kind and within a
// kind by letters: half of the belief is the author's after so many. Few rulings
// must not overturn the order, some dozens of a kind should (by judgement: there is
// no open collection of slips by author to fit them to).
const authorStrength = 20

// slipsOf adds up the slips of counts by letters and by kind, in one order, so that the
// same counts come to the same sums to the last bit.
func (f *Fitted) slipsOf(c *counts) (by map[slip]float64, of [slipKinds]float64) {
	by = map[slip]float64{}
	add := func(s slip, n float64) {
		by[s] += n
		of[s.kind] += n
	}
	from := int32(0)
	for _, s := range c.spots {
		for _, w := range c.slips[from:s.end] {
			add(f.slipAt(spotAt(int(s.at)), w.written), w.n)
		}
		from = s.end
	}
	for _, s := range c.stretches {
		if s.wrong > 0 {
			add(slip{swapKind, s.of[0], s.of[1]}, s.wrong)
		}
	}
	for _, e := range c.long {
		of[longKind] += e.n
	}
	return by, of
}

// slipAt returns the slip of writing a letter (the edge for none) at a spot.
func (f *Fitted) slipAt(s spot, written symbol) slip {
	kind, _ := f.keys.kindOf(s, written)
	return slip{uint8(kind), s.letter, written}
}

// Adapt returns costs for an author who is known to have made these slips: each kind
// of slip, and within a kind each slip, has the share that it has among the author's
// and those of all writers together, who count for twenty (Dirichlet smoothing: the
// posterior mean under a Dirichlet prior with the shares of all as its mean). How
// often anything goes wrong at all stays as it was. The pairs are aligned under f, in
// all ways, each by its probability, so that the outcome depends on the set of pairs
// alone; f itself is not changed. Without pairs it is f.
//
// It takes O(|form|·|word|) time a pair, some tenths of a millisecond.
func (f *Fitted) Adapt(pairs []Pair) *Fitted {
	pairs = slices.SortedFunc(slices.Values(pairs), func(p, q Pair) int {
		return cmp.Or(slices.Compare(p.Form, q.Form), slices.Compare(p.Word, q.Word))
	})
	t := newTally()
	for _, p := range pairs {
		f.expect(p, t)
	}
	a := &author{slips: map[slip]int32{}}
	a.seen, a.of = f.slipsOf(t.rest())
	mine := total(a.of)
	if mine == 0 {
		return f
	}
	all, of := f.slipsOf(f.counts)
	many := total(of)
	within := [slipKinds]float64{} // distinct slips of a kind
	for s := range all {
		within[s.kind]++
	}
	for k := range of {
		share := (of[k] + 1) / (many + slipKinds)
		a.kinds[k] = shift((a.of[k] + authorStrength*share) / ((mine + authorStrength) * share))
	}
	at := func(s slip) {
		share := (all[s] + 1) / (of[s.kind] + within[s.kind] + 1)
		a.slips[s] = shift((a.seen[s] + authorStrength*share) / ((a.of[s.kind] + authorStrength) * share))
	}
	for s := range all {
		at(s)
	}
	for s := range a.seen {
		at(s)
	}
	adapted := *f
	adapted.author = a
	adapted.long = make([]longPrice, len(f.long))
	for i, e := range f.long {
		adapted.long[i] = longPrice{e.longEdit, shifted(e.price, a.kinds[longKind])}
	}
	return &adapted
}

func total(of [slipKinds]float64) float64 {
	all := 0.0
	for _, n := range of {
		all += n
	}
	return all
}

// shift turns how many times likelier a slip is into grains.
func shift(times float64) int32 { return int32(math.Round(-math.Log2(times) / Grain)) }

// shifted adds a shift to a price, within the bounds of prices.
func shifted(price, by int32) int32 { return max(1, min(price+by, int32(64/Grain))) }

// price returns what a slip costs this author, given what it costs all.
func (a *author) price(grains int32, s slip) int32 {
	if a == nil {
		return grains
	}
	by, ok := a.slips[s]
	if !ok { // as rare as can be
		by = shift(authorStrength / (a.of[s.kind] + authorStrength))
	}
	return shifted(grains, a.kinds[s.kind]+by)
}

// Learnt is an edit that accepted corrections have made likelier.
type Learnt struct {
	Edit  Edit
	Seen  int     // accepted corrections that have it, about
	Saved float64 // bits that it costs less than before
}

// Learnt returns the edits of the cheapest alignment of form and word that cost less
// than they do for all writers, in order.
func (f *Fitted) Learnt(form, word []Letter) []Learnt {
	if f.author == nil {
		return nil
	}
	base := *f
	base.author = nil
	var out []Learnt
	for _, e := range Align(form, word, f).Edits {
		m, n := len(e.From), len(e.To)
		var seen float64
		switch {
		case e.Op == Agreement || m > 2 || n > 2:
			continue
		case m == 2 && n == 2 && swapped(e.From, e.To):
			to := stretchIn(e.To)
			seen = f.author.seen[slip{swapKind, to[0], to[1]}]
		case m <= 1 && n == 1:
			at := spot{left: symbolAt(word, e.J-1), letter: symbolOf(e.To[0]), right: symbolAt(form, e.I+m)}
			seen = f.author.seen[f.slipAt(at, symbolIn(form, e.I, m))]
		case m == 1 && n == 0:
			at := spot{gap: true, left: symbolAt(word, e.J-1), right: symbolAt(form, e.I+1)}
			seen = f.author.seen[f.slipAt(at, symbolOf(e.From[0]))]
		default:
			continue
		}
		saved := base.Cost(form, e.I, m, word, e.J, n) - e.Cost
		if seen >= 0.5 && saved > 0 {
			out = append(out, Learnt{e, int(math.Round(seen)), saved})
		}
	}
	return out
}
