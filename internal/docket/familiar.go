package docket

import (
	"fmt"

	"emendary/align"
	"emendary/lexicon"
)

// familiar is a form that no list knows but the manuscript has often: a name, a
// coinage. What is like it and rarer may be a slip for it.
type familiar struct {
	form    string
	letters []align.Letter // folded
	count   int
}

// How often a form must stand in the manuscript to be familiar, and how many times as
// often as another that may be a slip for it.
const (
	leastFamiliar = 3
	timesFamiliar = 3
)

// familiars returns the familiar forms, as they were when first asked for.
func (d *Docket) familiars() []familiar {
	d.knowing.Do(func() {
		alphabet := d.base.Alphabet()
		for _, e := range d.laid {
			if n := len(e.Occurrences); n >= leastFamiliar && e.Kind == UnknownForm && e.Why == "" {
				d.known = append(d.known, familiar{e.Form, alphabet.AppendFolded(nil, e.Form), n})
			}
		}
	})
	return d.known
}

// likeFamiliar adds the familiar forms within two edits of e's form, one for a short
// one, to its candidates.
func (d *Docket) likeFamiliar(s *Search, e *Entry, add func(weighed)) {
	if e.Kind != UnknownForm || e.Why != "" {
		return
	}
	letters := s.lex.Alphabet().AppendFolded(nil, e.Form)
	if len(letters) < leastStem || len(letters) > lexicon.MaxLetters {
		return
	}
	most := farthest
	if len(letters) < 6 {
		most = 1
	}
	for _, f := range d.familiars() {
		if f.count < timesFamiliar*len(e.Occurrences) || abs(len(f.letters)-len(letters)) > most {
			continue
		}
		if k := align.Restricted(letters, f.letters); k == 0 || k > most || builtOn(Key(e.Form), Key(f.form)) {
			continue // the Roylotts are no slip for Roylott
		}
		bits, distance := s.edits(e.Form, f.form)
		prior := s.model.Familiar + s.model.Seen(f.count, s.size)
		add(weighed{Candidate{
			Text: like(e.Form, f.form), Distance: distance, Cost: s.cost(bits, distance), Prior: prior,
			Remark: fmt.Sprintf("×%d here", f.count),
		}, bits + prior})
	}
}
