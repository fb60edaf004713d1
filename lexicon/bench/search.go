package bench

import (
	"bytes"
	"errors"

	"github.com/blevesearch/vellum"
	"github.com/blevesearch/vellum/levenshtein"

	"emendary/lexicon"
)

// Search is one way to find all words within k edits, k being fixed.
type Search interface {
	// Within calls found with each word and its distance. The word stands until
	// found returns.
	Within(form string, found func(word []byte, distance int)) error
}

// Searches returns our search and the peer's of words, ascending, within k.
func Searches(words []string, k int) (ours, peer Search, err error) {
	if ours, err = NewOurs(words, k); err != nil {
		return nil, nil, err
	}
	if peer, err = NewVellum(words, k); err != nil {
		return nil, nil, err
	}
	return ours, peer, nil
}

// Ours is a search by package lexicon.
type Ours struct {
	lexicon *lexicon.Lexicon
	k       int
	near    []lexicon.Near
	word    []byte
}

// NewOurs returns a search of words, ascending, within k.
func NewOurs(words []string, k int) (*Ours, error) {
	listed := make([]lexicon.Word, len(words))
	for i, w := range words {
		listed[i].Text = w
	}
	list, err := lexicon.NewList("words", listed)
	if err != nil {
		return nil, err
	}
	return &Ours{lexicon: lexicon.New(list, lexicon.AnyVariety), k: k}, nil
}

// Within implements [Search].
func (o *Ours) Within(form string, found func(word []byte, distance int)) error {
	o.near = o.lexicon.AppendWithin(o.near[:0], form, o.k)
	for i := range o.near {
		o.word = append(o.word[:0], o.near[i].Word.Text...)
		found(o.word, o.near[i].Distance)
	}
	return nil
}

// Vellum is a search by github.com/blevesearch/vellum with its own automaton of
// a form, transpositions included; the builder of automata is made once, and its
// iterator is used again.
type Vellum struct {
	fst     *vellum.FST
	builder *levenshtein.LevenshteinAutomatonBuilder
	it      vellum.FSTIterator
	k       uint8
}

// NewVellum returns a search of words, ascending, within k.
func NewVellum(words []string, k int) (*Vellum, error) {
	var b bytes.Buffer
	builder, err := vellum.New(&b, nil)
	if err != nil {
		return nil, err
	}
	for _, w := range words {
		if err := builder.Insert([]byte(w), 0); err != nil {
			return nil, err
		}
	}
	if err := builder.Close(); err != nil {
		return nil, err
	}
	fst, err := vellum.Load(b.Bytes())
	if err != nil {
		return nil, err
	}
	automata, err := levenshtein.NewLevenshteinAutomatonBuilder(uint8(k), true)
	if err != nil {
		return nil, err
	}
	return &Vellum{fst: fst, builder: automata, k: uint8(k)}, nil
}

// Within implements [Search].
func (v *Vellum) Within(form string, found func(word []byte, distance int)) error {
	dfa, err := v.builder.BuildDfa(form, v.k)
	if err != nil {
		return err
	}
	err = v.it.Reset(v.fst, nil, nil, dfa)
	for err == nil {
		word, _ := v.it.Current()
		found(word, int(v.it.EditDistance()))
		err = v.it.Next()
	}
	if errors.Is(err, vellum.ErrIteratorDone) {
		return nil
	}
	return err
}
