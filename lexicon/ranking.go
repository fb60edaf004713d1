package lexicon

import (
	"iter"
	"math/bits"
	"slices"
	"sync"

	"emendary/align"
)

// Prior prices a word before any form is seen, in grains ([align.Grain] bits).
// ok is false where the word is no candidate at all.
//
// It is asked for words without a text, and may look at their layer, level,
// varieties, and whether they are names, abbreviations or barred, no further;
// for words that the manuscript uses it is asked with all that is known of them.
// letters is the word's length, [PriorLetters] for all that are longer; use is what
// [Lexicon.Ranking] was given for the word, 0 for words that it was not given.
type Prior func(w Word, letters, use int) (grains int32, ok bool)

// PriorLetters is the length from which on a [Prior] tells words apart by their
// length no more.
const PriorLetters = 24

// never is the price of what is no candidate, and the greatest price there is:
// four of them can be added up.
const never = int32(1) << 28

// Match is a word with its price for a form, in grains ([align.Grain] bits).
type Match struct {
	Word    Word
	Letters []align.Letter // the word's letters, folded, of [Lexicon.Alphabet]
	Edits   int32          // the cheapest restricted alignment of form and word
	Prior   int32
}

// Total returns what edits and prior come to.
func (m *Match) Total() int32 { return m.Edits + m.Prior }

// Ranking is a lexicon made ready for the search for the best words of a form,
// under one prior. It is immutable and may be used by several goroutines at once;
// [Ranking.WithPrior] returns another one that shares all but the prices.
type Ranking struct {
	lexicon *Lexicon
	weights [layers]*weights // nil where there is no list
	own     *own
	lengths []int32 // what words of lists cost at least by their letters: see lengthsOf
	ownPrices
	scratch *sync.Pool // of *best
}

// Ranking returns x made ready for the search for best words under prior p. used
// gives words that the manuscript uses, by their texts as a list writes them, and
// any number above 0 that p is to see for each; texts that are no known word are
// passed over. It may be nil.
//
// It takes a millisecond, and another two for every thousand words used.
func (x *Lexicon) Ranking(p Prior, used iter.Seq2[string, int]) *Ranking {
	c := x.clone()
	r := &Ranking{
		lexicon: c,
		own:     c.ownWords(used),
		scratch: &sync.Pool{New: func() any { return new(best) }},
	}
	return r.WithPrior(p)
}

// WithPrior returns r under another prior.
func (r *Ranking) WithPrior(p Prior) *Ranking {
	c := *r
	for which, y := range c.lexicon.layers {
		if y != nil {
			c.weights[which] = c.lexicon.weigh(y, Layer(which), p)
		}
	}
	c.lengths = lengthsOf(c.weights[:])
	for _, w := range c.weights {
		if w != nil {
			w.floor(c.lengths)
		}
	}
	c.ownPrices = c.own.price(p, c.lengths)
	return &c
}

// ask asks a prior for a price between 0 and never.
func (p Prior) ask(w Word, letters, use int) int32 {
	grains, ok := p(w, min(letters, PriorLetters), use)
	if !ok {
		return never
	}
	return min(max(grains, 0), never)
}

// weights are the prices of the words of a layer by grade, and floors below which
// none is at a place in its trie.
type weights struct {
	prices []int32  // by grade and letters
	kinds  []uint16 // by set of grades: sets of the same prices have the same kind
	leasts []int32  // by kind and letters
	sets   *marks

	// By set of grades, the least price above what a word of its length costs at
	// least; and the least price.
	floors [2][]int32
}

// maxKinds is how many grades with different prices are told apart; the rest
// share floors.
const maxKinds = 64

func (x *Lexicon) weigh(y *layer, which Layer, p Prior) *weights {
	w := &weights{sets: &y.marks, prices: make([]int32, len(y.grades)*PriorLetters)}
	type row [PriorLetters]int32 // prices by letters
	var rows []row               // that differ
	numbers := map[row]int{}
	kindOf := make([]uint64, len(y.grades)) // a bit each
	for g := range y.grades {
		own := (*row)(w.prices[g*PriorLetters:])
		word := y.graded(g, which)
		known := !word.Barred && y.attributes[y.grades[g]].varieties.has(x.variety)
		for i := range own {
			own[i] = never
			if known {
				own[i] = p.ask(word, i+1, 0)
			}
		}
		n, ok := numbers[*own]
		switch {
		case !ok && len(rows) < maxKinds:
			n = len(rows)
			rows = append(rows, *own)
			numbers[*own] = n
		case !ok:
			n = maxKinds - 1
			for i := range own {
				rows[n][i] = min(rows[n][i], own[i])
			}
		}
		kindOf[g] = 1 << n
	}
	w.kinds = make([]uint16, len(y.ends))
	kinds := map[uint64]uint16{}
	var members []uint64
	for s := range y.ends {
		var set uint64
		for _, g := range y.set(uint16(s)) {
			set |= kindOf[g]
		}
		kind, ok := kinds[set]
		if !ok {
			kind = uint16(len(members))
			kinds[set] = kind
			members = append(members, set)
		}
		w.kinds[s] = kind
	}
	w.leasts = make([]int32, len(members)*PriorLetters)
	for kind, set := range members {
		least := (*row)(w.leasts[kind*PriorLetters:])
		for i := range least {
			least[i] = never
		}
		for rest := set; rest != 0; rest &= rest - 1 {
			of := &rows[bits.TrailingZeros64(rest)]
			for i := range least {
				least[i] = min(least[i], of[i])
			}
		}
	}
	return w
}

// lengthsOf returns what words cost at least by their letters, as far as that neither
// rises nor falls too steeply for reduced prices.
func lengthsOf(all []*weights) []int32 {
	lengths := slices.Repeat([]int32{never}, maxLengths)
	for _, w := range all {
		if w == nil {
			continue
		}
		for kind := range len(w.leasts) / PriorLetters {
			for i, least := range w.leasts[kind*PriorLetters:][:PriorLetters] {
				lengths[i+1] = min(lengths[i+1], least)
			}
		}
	}
	for i := 1; i <= PriorLetters; i++ {
		lengths[i] = min(lengths[i], lengths[i-1]+steepestRise)
	}
	for i := PriorLetters + 1; i < maxLengths; i++ {
		lengths[i] = lengths[PriorLetters]
	}
	for i := PriorLetters - 1; i >= 0; i-- {
		lengths[i] = min(lengths[i], lengths[i+1]+steepestFall)
	}
	return lengths
}

// floor works out the floors of w.
func (w *weights) floor(lengths []int32) {
	var ofKinds [2][]int32
	for n := 0; n < len(w.leasts); n += PriorLetters {
		above, least := never, never
		for i, price := range w.leasts[n:][:PriorLetters] {
			above, least = min(above, price-lengths[i+1]), min(least, price)
		}
		ofKinds[0], ofKinds[1] = append(ofKinds[0], above), append(ofKinds[1], least)
	}
	for way, floors := range ofKinds {
		w.floors[way] = make([]int32, len(w.kinds))
		for set, kind := range w.kinds {
			w.floors[way][set] = floors[kind]
		}
	}
}

// price returns the price of a word of grade g with so many letters.
func (w *weights) price(g uint16, letters int) int32 {
	return w.prices[int(g)*PriorLetters+min(letters, PriorLetters)-1]
}

// least returns the least price of the words of so many letters in a set of
// grades.
func (w *weights) least(set uint16, letters int) int32 {
	least := never
	for _, g := range w.sets.set(set) {
		least = min(least, w.price(g, letters))
	}
	return least
}
