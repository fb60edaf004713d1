package docket

import (
	"cmp"
	"context"
	"slices"
	"strings"
	"unicode/utf8"

	"emendary/align"
	"emendary/internal/rank"
	"emendary/lexicon"
)

// Candidate is a word (or pair of words) that the form of an entry may stand for.
type Candidate struct {
	Text     string       // with the form's capitals: what would stand there
	Word     lexicon.Word // the word as the lexicon has it; of a pair, the second
	Distance int          // restricted Damerau–Levenshtein distance, case folded
	Cost     float64      // of the edits: unit costs, so the distance
	Share    float64      // posterior among the candidates of the form, 0 to 1
	Remark   string       // a word or two for the row's end: "American", "name", "two words", or ""
}

// Candidates returns the n best candidates of e, best first: those that a rule or
// a list names, then by edits, commonness and the manuscript's own use of them.
// It is safe for concurrent use and stops when ctx ends, with ctx's error. One
// form costs a search of the lexicon within two edits, of three or four where
// nothing is so near. A passage has none.
func (d *Docket) Candidates(ctx context.Context, e *Entry, n int) ([]Candidate, error) {
	if e.Kind == Passage {
		return nil, ctx.Err()
	}
	s := search{lex: d.Lexicon(), model: d.model, use: d.use, size: d.census.size}
	return s.candidates(ctx, e.Form, e.Kind, e.Instead, n)
}

// CandidatesFor returns the n best candidates of a form that stands in no manuscript.
func CandidatesFor(ctx context.Context, lex *lexicon.Lexicon, form string, n int) ([]Candidate, error) {
	s := search{lex: lex, model: rank.Default()}
	kind := UnknownForm
	if lex.Find(form).Status == lexicon.OtherVariety {
		kind = OtherVariety
	}
	return s.candidates(ctx, plainApostrophe(form), kind, nil, n)
}

// search is what the candidates of one form are looked for in.
type search struct {
	lex   *lexicon.Lexicon
	model rank.Model
	use   map[string]int
	size  int
}

// weighed is a candidate with all its bits, edits and prior.
type weighed struct {
	Candidate
	bits float64
}

func (s search) candidates(ctx context.Context, form string, kind Kind, instead []string, n int) ([]Candidate, error) {
	// Of words that differ in capitals or apostrophes alone, the likeliest is enough.
	found := map[string]weighed{}
	add := func(w weighed) {
		k := Key(w.Text)
		if old, ok := found[k]; w.Text != form && (!ok || w.bits < old.bits) {
			found[k] = w
		}
	}
	steps := []func(string, Kind, func(weighed)){s.words, s.compounds, s.splits}
	if kind == UnknownForm && len(instead) > 0 {
		steps = nil // a rule has said it all
	}
	for _, step := range steps {
		step(form, kind, add)
		if err := ctx.Err(); err != nil {
			return nil, err
		}
	}
	s.named(form, instead, found)
	all := make([]weighed, 0, len(found))
	for _, w := range found {
		all = append(all, w)
	}
	slices.SortFunc(all, func(a, b weighed) int {
		return cmp.Or(cmp.Compare(a.bits, b.bits), cmp.Compare(a.Text, b.Text))
	})
	bits := make([]float64, len(all))
	for i, w := range all {
		bits[i] = w.bits
	}
	shares := rank.Shares(bits)
	out := make([]Candidate, min(n, len(all)))
	for i := range out {
		out[i] = all[i].Candidate
		out[i].Share = shares[i]
	}
	return out, nil
}

// within returns the words near form: two edits away at most, further only where
// no word is so near and the form is long enough to bear more slips.
func (s search) within(form string) []lexicon.Near {
	near := s.lex.Within(form, 2)
	letters := len(s.lex.Alphabet().Letters(form))
	for k := 3; k <= 4 && len(near) == 0 && letters >= 2*k; k++ {
		near = s.lex.Within(form, k)
	}
	return near
}

func (s search) words(form string, kind Kind, add func(weighed)) {
	letters := len(s.lex.Alphabet().Letters(form))
	for _, near := range s.within(form) {
		if near.Distance < letters { // else no letter of the form is left
			add(s.weigh(form, near.Word, near.Distance, kind, like(form, near.Word.Text)))
		}
	}
}

// weigh prices word as a candidate that stands as text.
func (s search) weigh(form string, word lexicon.Word, distance int, kind Kind, text string) weighed {
	v := s.lex.Variety()
	bits := s.model.Edit*float64(distance) + s.model.Prior(word, v, s.use[Key(word.Text)], s.size)
	bits += s.model.Letter*float64(unshared(form, word.Text)) + s.first(form, word.Text)
	if capitalsOf(form) == lower && capitalsOf(word.Text) != lower {
		bits += s.model.Capital
	}
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
	c := Candidate{Text: text, Word: word, Distance: distance, Cost: float64(distance), Remark: remark}
	return weighed{c, bits}
}

// first is what a first letter that differs costs.
func (s search) first(form, word string) float64 {
	a, _ := utf8.DecodeRuneInString(Key(form))
	b, _ := utf8.DecodeRuneInString(Key(word))
	if a == b {
		return 0
	}
	return s.model.First
}

// unshared counts the letters that one of two words has and the other lacks.
func unshared(a, b string) int {
	left := map[rune]int{}
	for _, r := range Key(a) {
		left[r]++
	}
	for _, r := range Key(b) {
		left[r]--
	}
	n := 0
	for _, c := range left {
		n += abs(c)
	}
	return n
}

// varietyOf names the varieties of a word that some varieties lack.
func varietyOf(w lexicon.Word) string {
	if len(w.Sources) == 0 || len(w.Varieties()) == len(lexicon.Varieties()) {
		return ""
	}
	return varieties([]lexicon.Word{w})
}

// compounds corrects one unknown member of a hyphenated compound.
func (s search) compounds(form string, kind Kind, add func(weighed)) {
	parts := members(form)
	if len(parts) < 2 {
		return
	}
	bad := -1
	for i, member := range parts {
		if !known(s.lex, member) && !prefixes[Key(member)] {
			if bad >= 0 {
				return
			}
			bad = i
		}
	}
	if bad < 0 {
		return
	}
	for _, near := range s.within(parts[bad]) {
		text := strings.Replace(form, parts[bad], like(parts[bad], near.Word.Text), 1)
		add(s.weigh(parts[bad], near.Word, near.Distance, kind, text))
	}
}

// splits finds the places where a space makes two known words of the form.
func (s search) splits(form string, kind Kind, add func(weighed)) {
	if kind == OtherVariety || kind == WordInContext || strings.ContainsFunc(form, isHyphen) {
		return
	}
	letters := s.lex.Alphabet().Letters(form)
	if len(letters) > 2*lexicon.MaxLetters {
		return // no two words are as long
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
		w := s.weigh(form, second.Words[0], 1, kind, left+" "+right)
		w.bits += s.model.Prior(first.Words[0], s.lex.Variety(), s.use[Key(left)], s.size)
		w.Remark = "two words"
		add(w)
	}
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
func (s search) named(form string, instead []string, found map[string]weighed) {
	best := s.model.Edit + lead
	for _, w := range found {
		best = min(best, w.bits)
	}
	for _, text := range instead {
		letters := s.lex.Alphabet()
		distance := align.Restricted(letters.Fold(letters.Letters(form)), letters.Fold(letters.Letters(text)))
		c := Candidate{Text: like(form, text), Distance: distance, Cost: float64(distance), Remark: "by rule"}
		if f := s.lex.Find(text); len(f.Words) > 0 {
			c.Word = f.Words[0]
		}
		found[Key(c.Text)] = weighed{c, best - lead}
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
