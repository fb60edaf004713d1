package lexicon

import (
	"fmt"
	"slices"
)

// Layer is where a word comes from; a higher layer outranks a lower one.
type Layer uint8

const (
	Base    Layer = iota // the base lexicon: the words of a language
	Foreign              // words of other languages, the language as their kind
	House                // the house list: a publisher's practice
	Series               // the series list
	Book                 // the book list: this manuscript alone
)

// layers is how many layers there are.
const layers = int(Book) + 1

// String returns the layer's name: base, foreign, house, series or book.
func (l Layer) String() string {
	switch l {
	case Base:
		return "base"
	case Foreign:
		return "foreign"
	case House:
		return "house"
	case Series:
		return "series"
	case Book:
		return "book"
	}
	return fmt.Sprintf("layer %d", uint8(l))
}

// Source says where in the base lexicon a word stands.
type Source struct {
	Category string // spelling category: english, american, british_z, british_variant_1, …
	Class    string // words, upper, proper-names, contractions or abbreviations
	Level    uint8  // commonness, from 10, the commonest, to 70, the rarest shipped
}

// plainLevel is the level of base words whose list gives none: a plain word list
// in place of the embedded base lexicon. It is the middle one.
const plainLevel = 50

// foreignLevel is the level of words of other languages: they are rarest here.
const foreignLevel = 70

// Word is a lexicon word as a layer has it.
type Word struct {
	Text    string // as written in its list
	Layer   Layer  // set by a [Lexicon]; a [List] does not know its layer
	Kind    string // from a list's second column: person, place, term, …
	Note    string // from its third
	Barred  bool   // the list bars the word …
	Instead string // … and names this instead; may be empty, may be several words

	// Sources is where the base lexicon has the word; none for words of other
	// lists, which belong to every variety. Words share it: do not change it.
	Sources []Source
}

// Level returns the commonest size level at which variety v has the word: 0 for
// words of the house, series and book lists, 50 for words of a base without
// levels, 70 for words of other languages. ok is false where only another variety
// or a list of variants has it.
func (w Word) Level(v Variety) (level int, ok bool) {
	if len(w.Sources) == 0 {
		switch w.Layer {
		case Base:
			return plainLevel, true
		case Foreign:
			return foreignLevel, true
		}
		return 0, true
	}
	for _, s := range w.Sources {
		if varietiesOf(s.Category).has(v) && (!ok || int(s.Level) < level) {
			level, ok = int(s.Level), true
		}
	}
	return level, ok
}

// Varieties returns the varieties that have the word, in the order of
// [Varieties]; none where only lists of variants have it.
func (w Word) Varieties() []Variety {
	set := sourceVarieties(w.Sources)
	return slices.DeleteFunc(Varieties(), func(v Variety) bool { return !set.has(v) })
}

// IsName reports a proper name: by its kind (person, place, vessel, name), or by
// its class. A word is a name by class only where no source has it as anything
// but a name; class upper holds names and what derives from them (Thames,
// Londoner), class proper-names the other names.
func (w Word) IsName() bool {
	switch w.Kind {
	case "person", "place", "vessel", "name":
		return true
	}
	for _, s := range w.Sources {
		if s.Class != "upper" && s.Class != "proper-names" {
			return false
		}
	}
	return len(w.Sources) > 0
}

// IsAbbreviation reports a word that every source has as an abbreviation.
func (w Word) IsAbbreviation() bool {
	for _, s := range w.Sources {
		if s.Class != "abbreviations" {
			return false
		}
	}
	return len(w.Sources) > 0
}

// sourceVarieties returns the varieties that have a word with such sources.
func sourceVarieties(sources []Source) varietySet {
	if len(sources) == 0 {
		return allVarieties
	}
	var set varietySet
	for _, s := range sources {
		set |= varietiesOf(s.Category)
	}
	return set
}

// attribute is all that a list says of a written form beside its spelling. Forms
// with equal attributes share one.
type attribute struct {
	kind, note, instead string
	barred              bool
	sources             []Source
	varieties           varietySet // of sources
}

func attributeOf(w Word) attribute {
	return attribute{w.Kind, w.Note, w.Instead, w.Barred, w.Sources, sourceVarieties(w.Sources)}
}

func (a *attribute) word(text string, layer Layer) Word {
	return Word{
		Text: text, Layer: layer, Kind: a.kind, Note: a.note,
		Barred: a.barred, Instead: a.instead, Sources: a.sources,
	}
}
