package docket

import (
	"slices"
	"strings"
	"unicode/utf8"

	"emendary/internal/ledger"
	"emendary/internal/manuscript"
	"emendary/lexicon"
)

// A passage is a run of words within one paragraph that is in another language or
// in dialect through and through. Its words are one entry, ruled on at once.
//
// Each word weighs, in bits, how much oftener it stands in such a run than in
// English of which one word in four is misspelt: a known word speaks against it,
// since only few words of another language are also English; an unknown one that
// is one edit from a common word speaks for it a little, since slips are so too; an
// unknown one that is near nothing speaks for it most. Names, compounds and numbers
// say nothing. A quotation mark, and a change from or to italics, speaks against
// the run's going on beyond it, so that a slip beside a passage is no part of it.
//
// A run begins with an unknown word, ends where its sum is greatest, and is given up
// where the sum falls passageDrop below that (the X-drop of Altschul, Gish, Miller,
// Myers and Lipman, “Basic local alignment search tool”, Journal of Molecular
// Biology 215, 1990). It is a passage if it has passageBits, at least five words,
// and more than half of them unknown. It then takes in the unknown words of its
// sentence that stand within five words of it, up to a quotation mark or such.
//
// The figures are set by hand, on the Universal Declaration of Human Rights in eight
// languages and on 350,000 words of two novels and a newspaper. These have no
// passage as they are, nor with one word in four misspelt by one edit or, one time
// in five, by two, in seven trials. What is missed are sentences of some ten short
// words, and verse in a dialect whose words are mostly English or one edit from it.
const (
	bitsKnown = -0.8
	bitsNear  = 0.7
	bitsFar   = 3.3
	bitsEdge  = -3

	passageBits  = 14
	passageDrop  = 6
	passageWords = 5
	passageReach = 5   // words beyond its ends
	longest      = 400 // words; a longer run is several passages

	rarestNear = 50 // size level up to which a listed word is one that slips are made of
)

// weights are what the words of a paragraph say.
type weights struct {
	bits    []float64
	strange []bool    // unknown
	edge    []float64 // between a word and the one before it
	start   []bool    // of a sentence
}

// run is neighbouring words of a paragraph.
type run struct{ paragraph, first, words int }

// passages returns the runs that are passages, in order: first those that rulings
// were made on, then whatever else reads like one. unknown has the unknown form that
// stands at each place.
func (d *Docket) passages(unknown map[place]string) []run {
	near := map[string]bool{} // by form
	out := d.ruledPassages()
	ruled := map[place]bool{}
	for _, r := range out {
		for p := range r.places() {
			ruled[p] = true
		}
	}
	strange := make([]int, len(d.Document.Paragraphs)) // unknown words
	for p := range unknown {
		strange[p.paragraph]++
	}
	for i := range d.Document.Paragraphs {
		if bitsFar*float64(strange[i]) < passageBits {
			continue // nothing else speaks for a passage
		}
		if len(d.weighWords(i, unknown, ruled, func(string) bool { return false }).runs(i)) == 0 {
			continue // not even if no word is near a listed one
		}
		w := d.weighWords(i, unknown, ruled, func(form string) bool {
			n, ok := near[form]
			if !ok {
				n = d.nearCommon(form)
				near[form] = n
			}
			return n
		})
		out = append(out, w.runs(i)...)
	}
	return out
}

// nearCommon reports whether a common word is one edit from form.
func (d *Docket) nearCommon(form string) bool {
	return slices.ContainsFunc(d.base.Within(form, 1), func(n lexicon.Near) bool {
		level, ok := n.Word.Level(d.base.Variety())
		return ok && level <= rarestNear
	})
}

// weighWords weighs the words of a paragraph.
func (d *Docket) weighWords(paragraph int, unknown map[place]string, ruled map[place]bool, near func(string) bool) weights {
	words, text := d.Document.Paragraphs[paragraph].Words, d.Document.Paragraphs[paragraph].Text
	out := weights{make([]float64, len(words)), make([]bool, len(words)), make([]float64, len(words)), make([]bool, len(words))}
	bits, strange := out.bits, out.strange
	for j := range words {
		out.start[j] = words[j].Traits&manuscript.SentenceStart != 0
		if j > 0 && (words[j].Setting != words[j-1].Setting || strings.ContainsAny(text[words[j-1].End:words[j].Start], `“”‘"«»()[]`)) {
			out.edge[j] = bitsEdge
		}
		w := &words[j]
		p := place{int32(paragraph), int32(j)}
		form, ok := unknown[p]
		c := capitalsOf(w.Text)
		plain := c == lower || c == initial && w.Traits&manuscript.SentenceStart != 0
		strange[j] = ok
		switch {
		case ruled[p]:
			bits[j] = -passageBits // it belongs to another passage
		case !asked(*w), ok && (!plain || strings.ContainsFunc(form, isHyphen)):
		case !ok:
			bits[j] = bitsKnown
		case near(form):
			bits[j] = bitsNear
		default:
			bits[j] = bitsFar
		}
	}
	return out
}

// runs returns the passages of a paragraph.
func (w weights) runs(paragraph int) []run {
	bits, strange := w.bits, w.strange
	var out []run
	done := 0 // where the latest ends
	for at := 0; at < len(bits); {
		sum, best, end := 0.0, 0.0, at
		for k := at; k < min(len(bits), at+longest) && bits[at] > 0; k++ {
			if sum += bits[k]; k > at {
				sum += w.edge[k]
			}
			if sum > best {
				best, end = sum, k+1
			}
			if sum <= 0 || sum < best-passageDrop {
				break
			}
		}
		unknown := 0
		for _, s := range strange[at:end] {
			if s {
				unknown++
			}
		}
		if n := end - at; best >= passageBits && n >= passageWords && 2*unknown > n {
			at, end = w.reach(at, end, done)
			out = append(out, run{paragraph, at, end - at})
			at, done = end, end
			continue
		}
		at++
	}
	return out
}

// reach widens a passage [at,end) to the unknown words near it that are in its
// sentence; those before done are another's.
func (w weights) reach(at, end, done int) (from, to int) {
	from, to = at, end
	for k := end; k < min(end+passageReach, len(w.bits)) && !w.start[k] && w.edge[k] == 0; k++ {
		if w.bits[k] > 0 {
			to = k + 1
		}
	}
	for k := at - 1; k >= max(at-passageReach, done) && !w.start[k+1] && w.edge[k+1] == 0; k-- {
		if w.bits[k] > 0 {
			from = k
		}
	}
	return from, to
}

// places yields the places of a run's words.
func (r run) places() func(yield func(place) bool) {
	return func(yield func(place) bool) {
		for j := range r.words {
			if !yield(place{int32(r.paragraph), int32(r.first + j)}) {
				return
			}
		}
	}
}

// passageEntry makes the entry of a passage. Its form is its text, in one line.
func (d *Docket) passageEntry(r run) *Entry {
	text := d.textOf(r)
	o := Occurrence{Paragraph: r.paragraph, Word: r.first, Words: r.words, Text: text}
	return &Entry{Kind: Passage, Form: plainApostrophe(text), Occurrences: []Occurrence{o}, open: 1}
}

func (d *Docket) textOf(r run) string {
	p := &d.Document.Paragraphs[r.paragraph]
	return plainSpace(p.Text[p.Words[r.first].Start:p.Words[r.first+r.words-1].End])
}

// takePassageRulings notes what the rulings in force say of passages, and reports
// whether other ones are unfolded than before.
func (d *Docket) takePassageRulings(inForce []ledger.Ruling) bool {
	ruled, unfolded := map[string]bool{}, map[string]bool{}
	for _, r := range inForce {
		if r.EntryKind != string(Passage) {
			continue
		}
		ruled[r.Form] = true
		if r.Act != ledger.Query && r.Act != ledger.Later {
			unfolded[r.Form] = r.Act == ledger.Unfold
		}
	}
	changed := false
	for form := range ruled {
		changed = changed || unfolded[form] != d.unfolded[form]
	}
	for form := range d.unfolded {
		changed = changed || d.unfolded[form] && !unfolded[form]
	}
	d.ruled, d.unfolded = ruled, unfolded
	return changed
}

// ruledPassages finds the passages that rulings in force are on: they are passages
// whatever the lexicon makes of their words by now.
func (d *Docket) ruledPassages() []run {
	if len(d.ruled) == 0 {
		return nil
	}
	byFirst := map[string][]string{} // forms by their first letters
	first := func(s string) string {
		_, n := utf8.DecodeRuneInString(s)
		return s[:n]
	}
	for form := range d.ruled {
		byFirst[first(form)] = append(byFirst[first(form)], form)
	}
	var out []run
	for i := range d.Document.Paragraphs {
		p := &d.Document.Paragraphs[i]
		for j := 0; j < len(p.Words); j++ {
			forms := byFirst[first(plainApostrophe(p.Text[p.Words[j].Start:p.Words[j].End]))]
			slices.SortFunc(forms, func(a, b string) int { return len(b) - len(a) })
			for _, form := range forms {
				if n := d.wordsSpelling(form, i, j); n > 0 {
					out = append(out, run{i, j, n})
					j += n - 1
					break
				}
			}
		}
	}
	return out
}

// wordsSpelling returns how many words of a paragraph, from the first on, spell
// form; 0 where they don't.
func (d *Docket) wordsSpelling(form string, paragraph, first int) int {
	p := &d.Document.Paragraphs[paragraph]
	from := p.Words[first].Start
	for n := 1; first+n <= len(p.Words); n++ {
		text := p.Text[from:p.Words[first+n-1].End]
		if len(text) < len(form) {
			continue
		}
		spelt := plainApostrophe(plainSpace(text))
		if spelt == form {
			return n
		}
		if len(spelt) > len(form) {
			return 0
		}
	}
	return 0
}

// unknownForms returns the unknown form that stands at each place of one, faults
// apart.
func (d *Docket) unknownForms(verdicts map[*form]verdict) map[place]string {
	out := map[place]string{}
	for f, v := range verdicts {
		if v.kind != UnknownForm || f.fault != manuscript.NoFault {
			continue
		}
		for _, p := range f.places {
			if asked(d.word(p)) {
				out[p] = f.text
			}
		}
	}
	return out
}

// verdicts judges all forms; those that need no entry are not in it.
func (d *Docket) verdicts() map[*form]verdict {
	out := map[*form]verdict{}
	for _, f := range d.census.forms {
		if v := judge(d.base, f, d.ours); v.kind != "" {
			out[f] = v
		}
	}
	return out
}
