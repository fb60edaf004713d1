package lexicon

import (
	"slices"
	"sync"

	"emendary/align"
)

// Lexicon is the words known: layers looked up as one, in one variety. It is
// immutable and may be used by several goroutines at once; [Lexicon.With] and
// [Lexicon.WithVariety] return a changed copy that shares all but what changed.
// The zero value, and a nil Lexicon, knows no words.
type Lexicon struct {
	variety  Variety
	layers   [layers]*layer // nil where there is no list
	alphabet *align.Alphabet
	searches *sync.Pool // of *search
}

// layer is a list in terms of the lexicon's alphabet.
type layer struct {
	*List
	toLetter []align.Letter          // by label
	symbols  []uint8                 // by label: as prices tell letters apart
	toLabel  map[align.Letter]uint32 // the inverse
	ascii    [128]uint32             // the inverse for ASCII, and one more; 0 where there is none
}

// New returns a lexicon of the base list alone, in variety v.
func New(base *List, v Variety) *Lexicon {
	return (&Lexicon{variety: v}).With(Base, base)
}

// With returns the lexicon with l in the given layer in place of what was there;
// with l nil, without that layer.
func (x *Lexicon) With(which Layer, l *List) *Lexicon {
	c := x.clone()
	if int(which) >= layers {
		return c
	}
	c.layers[which] = nil
	if l.Len() > 0 {
		c.layers[which] = newLayer(l, c.alphabet)
	}
	return c
}

// WithVariety returns the lexicon in variety v.
func (x *Lexicon) WithVariety(v Variety) *Lexicon {
	c := x.clone()
	c.variety = v
	return c
}

func (x *Lexicon) clone() *Lexicon {
	c := Lexicon{}
	if x != nil {
		c = *x
	}
	if c.alphabet == nil {
		c.alphabet = new(align.Alphabet)
	}
	if c.searches == nil {
		c.searches = &sync.Pool{New: func() any { return new(search) }}
	}
	return &c
}

func newLayer(l *List, a *align.Alphabet) *layer {
	y := &layer{List: l, toLetter: make([]align.Letter, len(l.letters)), toLabel: make(map[align.Letter]uint32, len(l.letters))}
	for label, text := range l.letters {
		// A letter of a list stands in NFC, is one cluster and folded, so it
		// comes back as one letter.
		if letters := a.Fold(a.Letters(text)); len(letters) == 1 {
			y.toLetter[label] = letters[0]
			y.toLabel[letters[0]] = uint32(label)
			if letters[0] < align.Letter(len(y.ascii)) {
				y.ascii[letters[0]] = uint32(label) + 1
			}
		}
	}
	y.symbols = symbolsOf(y.toLetter)
	return y
}

func symbolsOf(letters []align.Letter) []uint8 {
	symbols := make([]uint8, len(letters))
	for i, l := range letters {
		symbols[i] = uint8(align.Symbol(l))
	}
	return symbols
}

// Variety returns the variety in use.
func (x *Lexicon) Variety() Variety {
	if x == nil {
		return AnyVariety
	}
	return x.variety
}

// Alphabet returns the alphabet whose letters [Near] holds. Lexicons made from
// one another share it.
func (x *Lexicon) Alphabet() *align.Alphabet {
	if x == nil || x.alphabet == nil {
		return new(align.Alphabet)
	}
	return x.alphabet
}

// label returns the label of a folded letter; false where y has none.
func (y *layer) label(letter align.Letter) (uint32, bool) {
	if 0 <= letter && letter < align.Letter(len(y.ascii)) {
		label := y.ascii[letter]
		return label - 1, label != 0
	}
	label, ok := y.toLabel[letter]
	return label, ok
}

// lookup returns the number of the word that folded letters spell. It allocates
// nothing.
func (y *layer) lookup(letters []align.Letter) (uint32, bool) {
	p, ok := y.follow(letters)
	return p.number, ok && p.ends
}

// place is where letters lead to in the trie of a layer.
type place struct {
	node   uint32 // what follows, 0 where nothing does
	number uint32 // of the word they are, or of the first that begins with them
	ends   bool   // they are a word
}

// follow returns where folded letters lead to; false where no word begins so.
func (y *layer) follow(letters []align.Letter) (place, bool) {
	p := place{node: y.trie.root}
	for _, letter := range letters {
		label, ok := y.label(letter)
		if !ok {
			return place{}, false
		}
		arc, ok := y.trie.arc(p.node, label)
		if !ok {
			return place{}, false
		}
		if p.ends {
			p.number++
		}
		p.number += y.trie.skips[arc]
		p.ends = y.trie.arcs[2*arc]&endsWord != 0
		p.node = y.trie.arcs[2*arc+1]
	}
	return p, true
}

// Status is what the lexicon says of a form.
type Status uint8

const (
	Unknown      Status = iota // no layer has it
	Known                      // some layer has it, in the variety in use
	Barred                     // a list bars it
	OtherVariety               // only another variety or a list of variants has it
)

// String returns the status in words.
func (s Status) String() string {
	switch s {
	case Known:
		return "known"
	case Barred:
		return "barred"
	case OtherVariety:
		return "other variety"
	}
	return "unknown"
}

// Finding is the answer to a lookup: the words that cover the form, the highest
// layer first, and the word that decides first of all: where the status is Barred
// its Instead is what the list names.
type Finding struct {
	Status Status
	Words  []Word
}

// Find looks form up under the rules for case, apostrophes and full stops of the
// package comment.
//
// The highest layer with an entry that covers the form decides, so that a higher
// layer that lists a word un-bars it. In that layer an entry with the form's own
// capitals decides whether the form is barred; else it is if no entry lists it.
// It is known where an entry that covers it is of the variety in use.
//
// It takes O(letters × alphabet) time, a few microseconds.
func (x *Lexicon) Find(form string) Finding {
	if x == nil || x.alphabet == nil {
		return Finding{}
	}
	var f Finding
	decided := false
	written := x.spell(form)
	spellings := written.withoutStops()
	for which := layers - 1; which >= 0; which-- {
		y := x.layers[which]
		if y == nil {
			continue
		}
		start := len(f.Words)
		for _, s := range spellings {
			f.Words = x.cover(f.Words, y, Layer(which), s)
		}
		found := f.Words[start:]
		if len(found) == 0 {
			continue
		}
		slices.SortStableFunc(found, func(v, w Word) int { return x.rank(v, form) - x.rank(w, form) })
		if !decided {
			f.Status, decided = x.status(found[0]), true
		}
	}
	return f
}

// rank orders the words of a layer that cover a form by which of them decides.
func (x *Lexicon) rank(w Word, form string) int {
	exact := w.Text == form || x.sameCapitals(w.Text, form)
	switch status := x.status(w); {
	case status == Known && exact:
		return 0
	case status == Barred && exact:
		return 1
	case status == Known:
		return 2
	case status == Barred:
		return 3
	}
	return 4
}

// sameCapitals reports whether a and b are the same but for apostrophes, hyphens
// and full stops.
func (x *Lexicon) sameCapitals(a, b string) bool {
	v, w := x.spell(a).withoutStop(), x.spell(b).withoutStop()
	return slices.Equal(v.folded, w.folded) && v.sameCapitals(x.alphabet, w)
}

// status returns what w alone says of a form it covers.
func (x *Lexicon) status(w Word) Status {
	switch {
	case w.Barred:
		return Barred
	case sourceVarieties(w.Sources).has(x.variety):
		return Known
	}
	return OtherVariety
}

// cover appends the words of a layer that cover a spelling of a form.
func (x *Lexicon) cover(words []Word, y *layer, which Layer, s spelling) []Word {
	n, ok := y.lookup(s.folded)
	if !ok {
		return words
	}
	for text, a := range y.forms(n) {
		w := a.word(text, which)
		if s.onlyAbbreviations && !w.abbreviation() {
			continue
		}
		if text == s.text || s.coveredBy(x.alphabet, x.spell(text)) {
			words = append(words, w)
		}
	}
	return words
}

func (w Word) abbreviation() bool {
	return slices.ContainsFunc(w.Sources, func(s Source) bool { return s.Class == "abbreviations" })
}
