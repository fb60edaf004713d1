package docket

import (
	"slices"
	"strings"
	"unicode"
	"unicode/utf8"

	"golang.org/x/text/unicode/norm"

	"emendary/internal/manuscript"
	"emendary/internal/rank"
	"emendary/lexicon"
)

// What no text can teach: entries that a rule or a list has already judged.
const (
	slipOfRule   = 0.99 // a fault that the splitter sees, a word that a list bars
	slipOfListed = 0.0  // a listed word, a passage: nothing but somebody's asking speaks against it
)

// Slip returns the provisional probability, 0 to 1, that e is a slip rather than
// a word of this book: by what the manuscript alone tells, without a search for
// candidates. The first call looks at all entries, some milliseconds for a novel,
// the others at nothing but e. It is safe for concurrent use and never changes.
func (d *Docket) Slip(e *Entry) float64 {
	if p, ok := e.Judged(); ok {
		return p
	}
	return rank.SlipWeights().Slip(d.Evidence(e))
}

// SlipGiven returns the probability, 0 to 1, that e is a slip, now that its
// candidates are known: at least the two best of them, best first; none where
// there are none. It is safe for concurrent use.
func (d *Docket) SlipGiven(e *Entry, found []Candidate) float64 {
	if p, ok := e.Judged(); ok {
		return p
	}
	return rank.SlipWeights().Slip(d.EvidenceGiven(e, found))
}

// Judged returns the probability that e is a slip where a rule or a list has said
// so and the model has no say in it; false for all other entries.
func (e *Entry) Judged() (float64, bool) {
	switch {
	case e.Kind == BarredWord, e.Kind == UnknownForm && e.Why != "":
		return slipOfRule, true
	case e.Kind == WordInContext, e.Kind == Passage:
		return slipOfListed, true
	}
	return 0, false
}

// Evidence returns what the manuscript alone tells of e.
func (d *Docket) Evidence(e *Entry) rank.Evidence {
	s := d.surveyed()
	if v, ok := s.evidence[e]; ok {
		return v
	}
	return d.evidence(e, s)
}

// EvidenceGiven returns what the manuscript and the best candidates tell of e.
func (d *Docket) EvidenceGiven(e *Entry, found []Candidate) rank.Evidence {
	v := d.Evidence(e)
	v.Searched = true
	if len(found) == 0 {
		return v
	}
	best := found[0]
	v.Found, v.Best, v.Distance = true, best.Text, best.Distance
	v.Cost = best.Cost
	if !d.InBits() {
		v.Cost *= rank.Default().Edit
	}
	v.Bits = v.Cost + best.Prior
	v.Share, v.Gap = best.Share, best.Share
	if len(found) > 1 {
		v.Gap -= found[1].Share
	}
	v.Level = 70
	if level, ok := best.Word.Level(d.base.Variety()); ok {
		v.Level = level
	}
	v.TwoWords = strings.Contains(best.Text, " ")
	for _, c := range found {
		if first, second, two := strings.Cut(c.Text, " "); two {
			v.Split = true
			v.Adjacent = max(v.Adjacent, d.adjacent(first, second))
			v.Little = max(v.Little, 1000*float64(max(d.use[Key(first)], d.use[Key(second)]))/float64(d.census.size))
		}
	}
	v.Use = d.useLike(v, best.Text)
	for _, c := range found {
		v.Accent = v.Accent || bare(Key(e.Form)) == bare(Key(c.Text))
	}
	v.Doubled = single(Key(e.Form)) == single(Key(best.Text))
	v.Vowels = consonants(Key(e.Form)) == consonants(Key(best.Text))
	v.Order = inOrder(Key(e.Form)) == inOrder(Key(best.Text))
	v.FirstKept, v.LastKept = sameEnds(Key(e.Form), Key(best.Text))
	return v
}

// useLike returns how often the manuscript uses a word with capitals like those
// of an entry: of several words, the rarest.
func (d *Docket) useLike(v rank.Evidence, text string) int {
	words := strings.Fields(Key(text))
	if len(words) > 1 {
		v.Capital = 0
	}
	least := 0
	for i, w := range words {
		if n := d.surveyed().uses[w].like(v); i == 0 || n < least {
			least = n
		}
	}
	return least
}

// adjacent returns how often two words stand side by side in the manuscript.
func (d *Docket) adjacent(first, second string) int {
	places, step, other := d.placesOf(first), int32(1), second
	if after := d.placesOf(second); len(after) < len(places) {
		places, step, other = after, -1, first
	}
	n := 0
	for _, p := range places {
		words := d.Document.Paragraphs[p.paragraph].Words
		if i := p.word + step; i >= 0 && int(i) < len(words) && strings.EqualFold(words[i].Text, other) {
			n++
		}
	}
	return n
}

// placesOf returns where a word stands, in lower case and with a first capital.
func (d *Docket) placesOf(text string) []place {
	var places []place
	small := strings.ToLower(text)
	for _, spelling := range []string{small, capitalise(small)} {
		if f := d.census.forms[spelling]; f != nil {
			places = append(places, f.places...)
		}
	}
	return places
}

// bare returns s without the marks on its letters.
func bare(s string) string {
	return strings.Map(func(r rune) rune {
		if unicode.Is(unicode.Mn, r) {
			return -1
		}
		return r
	}, norm.NFD.String(s))
}

// sameEnds reports whether a and b have the same first and the same last letter.
func sameEnds(a, b string) (first, last bool) {
	x, _ := utf8.DecodeRuneInString(a)
	y, _ := utf8.DecodeRuneInString(b)
	u, _ := utf8.DecodeLastRuneInString(a)
	v, _ := utf8.DecodeLastRuneInString(b)
	return x == y, u == v
}

// single returns s with one letter for each run of equal ones.
func single(s string) string {
	letters := []rune(s)
	return string(slices.Compact(letters))
}

// consonants returns s without vowels, one letter for each run of equal ones.
func consonants(s string) string {
	return single(strings.Map(func(r rune) rune {
		if strings.ContainsRune("aeiouy", r) {
			return -1
		}
		return r
	}, bare(s)))
}

// inOrder returns the letters of s in alphabetical order.
func inOrder(s string) string {
	letters := []rune(s)
	slices.Sort(letters)
	return string(letters)
}

// evidence gathers what is to be seen of e itself.
func (d *Docket) evidence(e *Entry, s *survey) rank.Evidence {
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
				if titled(p, o.Word) {
					v.Titled += 1 / n
				}
			}
		case mixed:
			v.Mixed = true
			v.Capital += 1 / n
		}
		if inside || w.Traits&manuscript.Elision != 0 || cutShort(o) {
			v.Elided += 1 / n
		}
		switch w.Setting {
		case manuscript.Speech:
			v.Speech += 1 / n
		case manuscript.Italics, manuscript.Quotation, manuscript.Note:
			v.Marked += 1 / n
		}
		v.Company += float64(s.crowd.beside(d.Document, o)) / n
	}
	v.Parts = len(parts)
	v.Mixed = v.Mixed || capitalsOf(e.Form) == all
	v.Dialect = s.crowd.dialect
	v.Coined = derived(d.base, Key(e.Form), freePrefixes, freeEndings)
	v.Derived = derived(d.base, Key(e.Form), nil, otherEndings)
	return v
}

// titled reports whether a word has another with a capital beside it: a first
// name, an initial, a title.
func titled(p *manuscript.Paragraph, at int) bool {
	if next := at + 1; next < len(p.Words) && p.Text[p.Words[at].End:p.Words[next].Start] == " " && capitalsOf(p.Words[next].Text) != lower {
		return true
	}
	if at == 0 {
		return false
	}
	between := p.Text[p.Words[at-1].End:p.Words[at].Start]
	return (between == " " || between == ". ") && capitalsOf(p.Words[at-1].Text) != lower
}

// cutShort reports whether an apostrophe stands before or after the word that is
// no possessive (perceiv’d): it may close a quotation as well.
func cutShort(o *Occurrence) bool {
	return strings.HasSuffix(o.Lead, straight) || strings.HasSuffix(o.Lead, curly) || o.Tail == straight || o.Tail == curly || Key(o.Tail) == "'d"
}

// freePrefixes and freeEndings make words of words so freely that no list has
// them all; otherEndings are also where slips are made.
var (
	freePrefixes = []string{"un", "re", "non", "over", "out", "under", "fore", "mis", "anti", "semi", "super", "be", "pre", "sub"}
	freeEndings  = []string{"less", "like", "ness", "ish", "able", "ism", "ist", "wards", "est", "ings"}
	otherEndings = []string{"ful", "ly", "er", "ers", "s", "es", "ed", "ing", "y"}
)

// derived reports whether form is a common word of four letters or more with one
// of the prefixes or endings.
func derived(lex *lexicon.Lexicon, form string, prefixes, endings []string) bool {
	for _, ending := range endings {
		stem, ok := strings.CutSuffix(form, ending)
		if ok && len(stem) >= leastStem && (usual(lex, stem) || len(ending) > 1 && usual(lex, stem+"e")) {
			return true
		}
	}
	for _, prefix := range prefixes {
		if stem, ok := strings.CutPrefix(form, prefix); ok && len(stem) >= leastStem && usual(lex, stem) {
			return true
		}
	}
	return false
}

// rarestStem is the size level up to which words are derived from freely.
const rarestStem = 50

// usual reports whether lex has a word that is neither rare nor an abbreviation.
func usual(lex *lexicon.Lexicon, text string) bool {
	finding := lex.Find(text)
	if finding.Status != lexicon.Known {
		return false
	}
	level, ok := finding.Words[0].Level(lex.Variety())
	return ok && level <= rarestStem && !slices.ContainsFunc(finding.Words[0].Sources, func(s lexicon.Source) bool { return s.Class == "abbreviations" })
}
