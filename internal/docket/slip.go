package docket

import (
	"strings"
	"unicode/utf8"

	"emendary/internal/manuscript"
	"emendary/internal/rank"
	"emendary/lexicon"
)

// What no text can teach: entries that a rule or a list has already judged.
const (
	slipOfRule   = 0.99 // a fault that the splitter sees, a word that a list bars
	slipOfListed = 0.0  // a listed word: nothing but somebody's asking speaks against it
)

// Slip returns the provisional probability, 0 to 1, that e is a slip rather than
// a word of this book: by what the manuscript alone tells, without a search for
// candidates. The first call looks at all entries, some milliseconds for a novel,
// the others at nothing but e. It is safe for concurrent use and never changes.
func (d *Docket) Slip(e *Entry) float64 {
	if p, ok := judged(e); ok {
		return p
	}
	return rank.SlipWeights().Slip(d.Evidence(e))
}

// SlipGiven returns the probability, 0 to 1, that e is a slip, now that its
// candidates are known: at least the two best of them, best first; none where
// there are none. It is safe for concurrent use.
func (d *Docket) SlipGiven(e *Entry, found []Candidate) float64 {
	if p, ok := judged(e); ok {
		return p
	}
	return rank.SlipWeights().Slip(d.EvidenceGiven(e, found))
}

// judged returns the probability of entries that the model has no say in.
func judged(e *Entry) (float64, bool) {
	switch {
	case e.Kind == BarredWord, e.Kind == UnknownForm && e.Why != "":
		return slipOfRule, true
	case e.Kind == WordInContext:
		return slipOfListed, true
	}
	return 0, false
}

// Evidence returns what the manuscript alone tells of e.
func (d *Docket) Evidence(e *Entry) rank.Evidence {
	d.surveying.Do(func() { d.survey = d.surveyed() })
	if i, ok := d.survey[e]; ok {
		return i
	}
	return d.evidence(e, crowd{})
}

// EvidenceGiven returns what the manuscript and the best candidates tell of e.
func (d *Docket) EvidenceGiven(e *Entry, found []Candidate) rank.Evidence {
	v := d.Evidence(e)
	v.Searched = true
	if len(found) == 0 {
		return v
	}
	best := found[0]
	v.Found, v.Distance, v.Cost = true, best.Distance, best.Cost
	v.Share, v.Gap = best.Share, best.Share
	if len(found) > 1 {
		v.Gap -= found[1].Share
	}
	v.Level = 70
	if level, ok := best.Word.Level(d.base.Variety()); ok {
		v.Level = level
	}
	v.TwoWords = strings.Contains(best.Text, " ")
	v.Name = best.Word.IsName() && !v.TwoWords
	v.Use = d.useOf(best.Text)
	a, _ := utf8.DecodeRuneInString(key(e.Form))
	b, _ := utf8.DecodeRuneInString(key(best.Text))
	v.FirstKept = a == b
	v.Ending = endingApart(key(e.Form), key(best.Text))
	return v
}

// useOf returns how often the manuscript uses a word, or the rarer of several.
func (d *Docket) useOf(text string) int {
	words := strings.Fields(key(text))
	least := 0
	for i, w := range words {
		if n := d.use[w]; i == 0 || n < least {
			least = n
		}
	}
	return least
}

// endingApart reports whether one of two forms is the other with an ending.
func endingApart(a, b string) bool {
	if len(a) < len(b) {
		a, b = b, a
	}
	rest, ok := strings.CutPrefix(a, b)
	if !ok {
		return false
	}
	for _, ending := range endings {
		if rest == ending {
			return true
		}
	}
	return false
}

// evidence gathers what is to be seen of e itself; around is its company.
func (d *Docket) evidence(e *Entry, around crowd) rank.Evidence {
	n := float64(len(e.Occurrences))
	v := rank.Evidence{
		Form: e.Form, Count: len(e.Occurrences),
		Hyphen:  strings.ContainsFunc(e.Form, isHyphen),
		Joins:   e.Kind == Join,
		Variety: e.Kind == OtherVariety,
	}
	parts := map[int]bool{}
	inside := strings.Contains(strings.Trim(e.Form, straight), straight)
	for i := range e.Occurrences {
		o := &e.Occurrences[i]
		p := &d.Document.Paragraphs[o.Paragraph]
		w := &p.Words[o.Word]
		parts[p.Part] = true
		switch capitalsOf(o.Text) {
		case initial:
			if w.Traits&(manuscript.SentenceStart|manuscript.HeadingWord) != 0 {
				v.Start += 1 / n
			} else {
				v.Capital += 1 / n
			}
		case mixed:
			v.Mixed = true
			v.Capital += 1 / n
		}
		if inside || w.Traits&manuscript.Elision != 0 {
			v.Elided += 1 / n
		}
		switch w.Setting {
		case manuscript.Speech:
			v.Speech += 1 / n
		case manuscript.Italics, manuscript.Quotation, manuscript.Note:
			v.Marked += 1 / n
		}
		v.Company += float64(around.beside(d.Document, o)) / n
	}
	v.Parts = len(parts)
	v.Mixed = v.Mixed || capitalsOf(e.Form) == all
	v.Derived = derived(d.base, key(e.Form))
	return v
}

// freeEndings and freePrefixes make words of words so freely that no list has
// them all.
var (
	freeEndings  = []string{"less", "like", "ness", "ish", "ly", "ful", "ism", "ist", "able", "er", "ers", "s", "es", "ed", "ing", "y"}
	freePrefixes = []string{"un", "re", "non", "over", "out", "under", "fore", "mis", "anti", "semi", "super", "be", "pre", "sub"}
)

// derived reports whether form is a known word of four letters or more with a
// prefix or an ending.
func derived(lex *lexicon.Lexicon, form string) bool {
	for _, ending := range freeEndings {
		stem, ok := strings.CutSuffix(form, ending)
		if ok && len(stem) >= leastStem && (known(lex, stem) || len(ending) > 1 && known(lex, stem+"e")) {
			return true
		}
	}
	for _, prefix := range freePrefixes {
		if stem, ok := strings.CutPrefix(form, prefix); ok && len(stem) >= leastStem && known(lex, stem) {
			return true
		}
	}
	return false
}
