package docket

import (
	"context"
	"maps"
	"math"
	"slices"
	"strings"

	"emendary/align"
	"emendary/lexicon"
)

// Candidate is a word (or pair of words) that the form of an entry may stand for.
type Candidate struct {
	Text     string       // with the form's capitals: what would stand there
	Word     lexicon.Word // the word as the lexicon has it; of a pair, the second
	Distance int          // restricted Damerau–Levenshtein distance, case folded
	Cost     float64      // of the edits: in bits, or their number under unit costs
	Prior    float64      // in bits: of meeting the word there at all
	Share    float64      // posterior among the candidates of the form, 0 to 1
	Remark   string       // a word or two for the row's end: "American", "name", "two words", or ""
}

// Candidates returns the n best candidates of e, best first: those that a rule or
// a list names, then by the bits that edits and prior come to. It is safe for
// concurrent use and stops when ctx ends, with ctx's error. A passage has none.
func (d *Docket) Candidates(ctx context.Context, e *Entry, n int) ([]Candidate, error) {
	if e.Kind == Passage {
		return nil, ctx.Err()
	}
	s := d.search()
	return s.candidates(ctx, e.Form, e.Kind, e.Instead, n, func(add func(weighed)) { d.likeFamiliar(s, e, add) })
}

// search returns what candidates are looked for with: made when first asked for,
// and anew when the lexicon has grown or edits have other costs.
func (d *Docket) search() *Search {
	d.searching.Lock()
	defer d.searching.Unlock()
	lex, last := d.Lexicon(), d.searcher
	if last == nil || last.lex != lex || last.costs != d.costs {
		d.searcher = newSearch(lex, d.costs, usage{d.census.size, d.use, maps.Keys(d.census.forms), d.adjacent})
		if last != nil {
			d.searcher.queries = last.queries // which know prices
		}
	}
	return d.searcher
}

// Candidates returns the n best candidates of a form that stands in no manuscript.
func (s *Search) Candidates(ctx context.Context, form string, n int) ([]Candidate, error) {
	kind := UnknownForm
	if s.lex.Find(form).Status == lexicon.OtherVariety {
		kind = OtherVariety
	}
	return s.candidates(ctx, plainApostrophe(form), kind, nil, n, func(func(weighed)) {})
}

// weighed is a candidate with all its bits, edits and prior.
type weighed struct {
	Candidate
	bits float64
}

// candidates returns the n best candidates of a form; others adds those that are in
// no list.
func (s *Search) candidates(ctx context.Context, form string, kind Kind, instead []string, n int, others func(add func(weighed))) ([]Candidate, error) {
	// Of words that differ in capitals or apostrophes alone, the likeliest is enough.
	found := map[string]weighed{}
	add := func(w weighed) {
		k := Key(w.Text)
		if old, ok := found[k]; w.Text != form && (!ok || w.bits < old.bits) {
			found[k] = w
		}
	}
	if kind != UnknownForm || len(instead) == 0 { // else a rule has said it all
		if err := s.words(ctx, form, kind, n, add); err != nil {
			return nil, err
		}
		if err := s.compounds(ctx, form, kind, n, add); err != nil {
			return nil, err
		}
		s.splits(form, kind, add)
		s.possessives(form, kind, add)
		others(add)
	}
	s.named(form, instead, found)
	return best(slices.Collect(maps.Values(found)), n), nil
}

// weigh makes a candidate of a word that search found for form.
func (s *Search) weigh(form string, kind Kind, m lexicon.Match, distance int) weighed {
	word, v := m.Word, s.lex.Variety()
	bits := float64(m.Total()) * align.Grain
	own := varietyOf(word)
	if kind == OtherVariety && own != "" {
		bits -= s.model.SameWord
	}
	remark := ""
	switch {
	case word.Layer == lexicon.Foreign:
		remark = word.Kind
	case word.Layer > lexicon.Base:
		remark = strings.ToLower(word.Layer.String()) + " list"
	case word.IsName():
		remark = "name"
	case own != "" && v == lexicon.AnyVariety:
		remark = own
	}
	return weighed{Candidate{
		Text: like(form, word.Text), Word: word, Distance: distance,
		Cost: s.cost(float64(m.Edits)*align.Grain, distance), Prior: bits - float64(m.Edits)*align.Grain, Remark: remark,
	}, bits}
}

// cost returns what a candidate shows as the cost of its edits.
func (s *Search) cost(bits float64, distance int) float64 {
	if s.costs == nil {
		return float64(distance)
	}
	return bits
}

// varietyOf names the varieties of a word that some varieties lack.
func varietyOf(w lexicon.Word) string {
	if len(w.Sources) == 0 || len(w.Varieties()) == len(lexicon.Varieties()) {
		return ""
	}
	return varieties([]lexicon.Word{w})
}

// compounds corrects one unknown member of a hyphenated compound.
func (s *Search) compounds(ctx context.Context, form string, kind Kind, n int, add func(weighed)) error {
	parts := members(form)
	if len(parts) < 2 {
		return nil
	}
	bad := -1
	for i, member := range parts {
		if !known(s.lex, member) && !prefixes[Key(member)] {
			if bad >= 0 {
				return nil
			}
			bad = i
		}
	}
	if bad < 0 {
		return nil
	}
	return s.words(ctx, parts[bad], kind, n, func(w weighed) {
		w.Text = strings.Replace(form, parts[bad], w.Text, 1)
		add(w)
	})
}

// splits finds the places where a space makes two known words of the form, or a
// hyphen a compound of the manuscript.
func (s *Search) splits(form string, kind Kind, add func(weighed)) {
	if kind == OtherVariety || kind == WordInContext || strings.ContainsFunc(form, isHyphen) {
		return
	}
	letters := s.lex.Alphabet().Letters(form)
	if len(letters) > 2*lexicon.MaxLetters {
		return // no two words are as long
	}
	meeting := func(w lexicon.Word, letters int, text string) float64 {
		return s.model.Meeting(w, s.lex.Variety(), letters, s.use[Key(text)], s.size)
	}
	for i := 1; i < len(letters); i++ {
		left, right := s.lex.Alphabet().Text(letters[:i]...), s.lex.Alphabet().Text(letters[i:]...)
		if !stands(left) || !stands(right) {
			continue
		}
		first, second := s.lex.Find(left), s.lex.Find(right)
		if first.Status != lexicon.Known || second.Status != lexicon.Known {
			continue
		}
		s.hyphened(form, left+"-"+right, add)
		text := left + " " + right
		together := 0
		if s.beside != nil {
			together = s.beside(left, right)
		}
		level := max(s.model.Level(first.Words[0], s.lex.Variety()), s.model.Level(second.Words[0], s.lex.Variety()))
		prior := s.model.TwoWords(
			meeting(first.Words[0], i, left), meeting(second.Words[0], len(letters)-i, right),
			level, capitalsOf(form) != lower, together, s.size)
		bits, distance := s.edits(form, text)
		add(weighed{Candidate{
			Text: text, Word: second.Words[0], Distance: distance,
			Cost: s.cost(bits, distance), Prior: prior, Remark: "two words",
		}, bits + prior})
	}
}

// hyphened adds the compound that the form is without its hyphen, where the
// manuscript has it.
func (s *Search) hyphened(form, text string, add func(weighed)) {
	n := s.use[Key(text)]
	if n == 0 {
		return
	}
	bits, distance := s.edits(form, text)
	prior := s.model.Seen(n, s.size)
	add(weighed{Candidate{
		Text: text, Distance: distance, Cost: s.cost(bits, distance), Prior: prior, Remark: "hyphened here",
	}, bits + prior})
}

// possessives adds the word that the form may be the possessive of, where the
// apostrophe is missing: charwomans.
func (s *Search) possessives(form string, kind Kind, add func(weighed)) {
	stem, ok := strings.CutSuffix(form, "s")
	if !ok || kind != UnknownForm || len(stem) < leastStem || strings.HasSuffix(stem, "s") {
		return
	}
	finding := s.lex.Find(stem)
	if finding.Status != lexicon.Known {
		return
	}
	word, text := finding.Words[0], stem+"'s"
	letters := len(s.lex.Alphabet().Letters(stem))
	prior := s.model.Possessive + s.model.Prior(word, s.lex.Variety(), letters, capitalsOf(form) != lower, s.use[Key(stem)], s.size)
	bits, distance := s.edits(form, text)
	add(weighed{Candidate{
		Text: text, Word: word, Distance: distance,
		Cost: s.cost(bits, distance), Prior: prior, Remark: "possessive",
	}, bits + prior})
}

// stands reports whether half of a split can stand alone: single letters that
// are words are few.
func stands(half string) bool {
	return len(half) > 1 || strings.Contains("aAI", half)
}

// lead is how many bits a candidate that a rule or a list names is ahead of the
// best that search found.
const lead = 6

// named puts the candidates that a rule or a list names ahead of all others.
func (s *Search) named(form string, instead []string, found map[string]weighed) {
	least := math.Inf(1)
	for _, w := range found {
		least = min(least, w.bits)
	}
	for _, text := range instead {
		bits, distance := s.edits(form, text)
		c := Candidate{Text: like(form, text), Distance: distance, Cost: s.cost(bits, distance), Remark: "by rule"}
		if f := s.lex.Find(text); len(f.Words) > 0 {
			c.Word = f.Words[0]
		}
		total := min(bits, least-lead)
		c.Prior = total - bits
		found[Key(c.Text)] = weighed{c, total}
	}
}

// like gives word the capitals of form.
func like(form, word string) string {
	switch capitalsOf(form) {
	case all:
		return strings.ToUpper(word)
	case initial:
		return capitalise(word)
	}
	return word
}
