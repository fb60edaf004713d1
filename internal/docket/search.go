package docket

import (
	"cmp"
	"context"
	"iter"
	"math"
	"runtime"
	"slices"
	"strings"
	"sync"

	"emendary/align"
	"emendary/internal/rank"
	"emendary/lexicon"
)

// Search finds the words that a form may stand for: those of a lexicon for which
// the edits under fitted costs and the prior together come to the fewest bits. It
// is immutable and may be used by several goroutines at once.
type Search struct {
	usage
	lex   *lexicon.Lexicon
	costs *align.Fitted // nil for unit costs
	model rank.Model

	small, capital func() *lexicon.Ranking // for forms without capitals, and with one
	queries        chan *query             // not in use; a pool would lose the prices that they know
}

// NewSearch returns a search of lex under costs, for forms that stand in no
// manuscript; with nil, an edit costs one unit.
func NewSearch(lex *lexicon.Lexicon, costs *align.Fitted) *Search {
	return newSearch(lex, costs, usage{})
}

// usage is how a manuscript uses words; the zero value is that of no manuscript.
type usage struct {
	size   int                            // in running words
	use    map[string]int                 // count of each form by key
	forms  iter.Seq[string]               // the spellings it has
	beside func(first, second string) int // how often two words stand side by side
}

func newSearch(lex *lexicon.Lexicon, costs *align.Fitted, of usage) *Search {
	s := &Search{usage: of, lex: lex, costs: costs, model: rank.Default()}
	s.queries = make(chan *query, runtime.GOMAXPROCS(0))
	s.small = sync.OnceValue(func() *lexicon.Ranking {
		return lex.Ranking(s.prior(false), s.used())
	})
	s.capital = sync.OnceValue(func() *lexicon.Ranking { return s.small().WithPrior(s.prior(true)) })
	return s
}

// prior prices words for forms with a capital, or without.
func (s *Search) prior(capital bool) lexicon.Prior {
	v := s.lex.Variety()
	return func(w lexicon.Word, letters, use int) (int32, bool) {
		return grains(s.model.Prior(w, v, letters, capital, use, s.size)), true
	}
}

func grains(bits float64) int32 { return int32(math.Round(bits / align.Grain)) }

// used yields the spellings of the manuscript, each as it stands and in lower
// case, with the number of times it uses the word.
func (s *Search) used() iter.Seq2[string, int] {
	if s.forms == nil {
		return nil
	}
	return func(yield func(string, int) bool) {
		for text := range s.forms {
			k := Key(text)
			n := s.use[k]
			if !yield(k, n) || k != text && !yield(text, n) {
				return
			}
		}
	}
}

// query is the scratch space of one query.
type query struct {
	sheet   align.Sheet
	scorer  align.Scorer
	form    []align.Letter
	word    []align.Letter
	matches []lexicon.Match
}

// query returns scratch space that is not in use.
func (s *Search) query() *query {
	select {
	case d := <-s.queries:
		return d
	default:
		return new(query)
	}
}

// done gives scratch space back.
func (s *Search) done(d *query) {
	select {
	case s.queries <- d:
	default: // enough are kept
	}
}

// margin is how many bits a word may be behind the likeliest one and still be a
// candidate: one of a thousand times less probability is of no help.
const margin = 10

// A candidate comes to at most so many bits and one more for each letter of the
// form: it is near, as 99 of 100 misspelt words of the open list are to what was
// meant (testdata/README.md); or far, where nothing is near and the form is neither
// a name, by its capital, nor a compound, whose members are looked for one by one.
// Only so many letters count: of longer words there are few, and none is near what
// has so little in common.
const (
	nearby   = 30
	farAway  = 44
	nearName = 28 // for a form with a capital, which most often is one
	counted  = 24
)

// spare is how many words more than candidates are asked for, since words that
// differ in capitals alone make one candidate.
const spare = 4

// words adds the words near form to the candidates.
func (s *Search) words(ctx context.Context, form string, kind Kind, n int, add func(weighed)) error {
	if err := ctx.Err(); err != nil {
		return err
	}
	d := s.query()
	defer s.done(d)
	d.form = s.lex.Alphabet().AppendFolded(d.form[:0], form)
	for _, m := range s.near(d, form, n) {
		distance := align.Restricted(d.form, m.Letters)
		if distance >= len(d.form) || 2*distance > len(d.form)+1 {
			continue // more of the form's letters are changed than left
		}
		add(s.weigh(form, kind, m, distance))
	}
	return nil
}

// near returns the best words for the form of a query.
func (s *Search) near(d *query, form string, n int) []lexicon.Match {
	if s.costs == nil {
		return s.within(d, form)
	}
	ranking, capital := s.small(), capitalsOf(form) != lower
	if capital {
		ranking = s.capital()
	}
	d.sheet.Reset(s.costs, d.form)
	limit, closed := nearby, capital || strings.ContainsFunc(form, isHyphen)
	if capital {
		limit = nearName
	}
	for {
		most := grains(float64(limit + min(len(d.form), counted)))
		if s.lex.Find(form).Status == lexicon.Known {
			// The form itself is the likeliest word: no margin is to be counted from it.
			d.matches = ranking.Best(d.matches[:0], &d.sheet, n+spare, most)
		} else {
			d.matches = ranking.Near(d.matches[:0], &d.sheet, n+spare, most, grains(margin))
		}
		if limit == farAway || closed || len(d.matches) > 0 {
			return d.matches
		}
		limit = farAway
	}
}

// within returns the words near the form of a query under unit costs: two edits
// away at most, further only where no word is so near and the form is long enough
// to bear more slips.
func (s *Search) within(d *query, form string) []lexicon.Match {
	near := s.lex.Within(form, 2)
	for k := 3; k <= 4 && len(near) == 0 && len(d.form) >= 2*k; k++ {
		near = s.lex.Within(form, k)
	}
	price := s.prior(capitalsOf(form) != lower)
	d.matches = d.matches[:0]
	for _, w := range near {
		letters := s.lex.Alphabet().AppendFolded(nil, w.Word.Text)
		prior, _ := price(w.Word, len(letters), s.use[Key(w.Word.Text)])
		edits := grains(s.model.Edit * float64(w.Distance))
		d.matches = append(d.matches, lexicon.Match{Word: w.Word, Letters: letters, Edits: edits, Prior: prior})
	}
	return d.matches
}

// edits returns what turning form into text comes to in bits, and how many unit
// edits that takes.
func (s *Search) edits(form, text string) (bits float64, distance int) {
	d := s.query()
	defer s.done(d)
	d.form = s.lex.Alphabet().AppendFolded(d.form[:0], form)
	d.word = s.lex.Alphabet().AppendFolded(d.word[:0], text)
	distance = align.Restricted(d.form, d.word)
	if s.costs == nil || len(d.form) > lexicon.MaxLetters || len(d.word) > lexicon.MaxLetters {
		return s.model.Edit * float64(distance), distance
	}
	d.sheet.Reset(s.costs, d.form)
	n, _ := d.scorer.Score(&d.sheet, d.word, math.MaxInt32)
	return float64(n) * align.Grain, distance
}

// best sorts candidates by their bits and returns the n first, with their shares
// among all.
func best(all []weighed, n int) []Candidate {
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
	return out
}
