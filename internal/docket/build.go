package docket

import (
	"cmp"
	"context"
	"iter"
	"slices"

	"emendary/internal/manuscript"
	"emendary/lexicon"
)

// census is the forms of a manuscript with their places.
type census struct {
	forms map[string]*form
	size  int // running words
}

// count reads all words of doc into a census. O(words); it stops when ctx ends.
func count(ctx context.Context, doc *manuscript.Document, lex *lexicon.Lexicon, progress func(done, total int)) (*census, error) {
	c := &census{forms: map[string]*form{}}
	var seen manuscript.Table[*form] // by the word as it stands, to look each up once
	for i := range doc.Paragraphs {
		if i%512 == 0 {
			if err := ctx.Err(); err != nil {
				return nil, err
			}
			progress(i, len(doc.Paragraphs))
		}
		p := &doc.Paragraphs[i]
		for j := range p.Words {
			w := &p.Words[j]
			c.size++
			var f *form
			if w.Traits&(manuscript.Broken|manuscript.Elision) == 0 && w.Fault == manuscript.NoFault {
				kept := seen.At(w.Text)
				if *kept == nil {
					*kept = c.formOf(p, w, lex)
				}
				f = *kept
			} else {
				f = c.formOf(p, w, lex)
			}
			f.places = append(f.places, place{int32(i), int32(j)})
		}
	}
	progress(len(doc.Paragraphs), len(doc.Paragraphs))
	return c, nil
}

// formOf returns the form of a word, with the word's fault if it has one.
func (c *census) formOf(p *manuscript.Paragraph, w *manuscript.Word, lex *lexicon.Lexicon) *form {
	f := c.form(plainApostrophe(part(p, *w, lex).text))
	if w.Fault != manuscript.NoFault {
		f.fault, f.instead = w.Fault, w.Instead
	}
	return f
}

// form returns the form with that text, a new one where there is none.
func (c *census) form(text string) *form {
	f := c.forms[text]
	if f == nil {
		f = &form{text: text}
		c.forms[text] = f
	}
	return f
}

// counts yields every form with its count.
func (c *census) counts() iter.Seq2[string, int] {
	return func(yield func(string, int) bool) {
		for text, f := range c.forms {
			if !yield(text, len(f.places)) {
				return
			}
		}
	}
}

// entries makes the docket's entries, by first place. The words of a passage are
// in no other entry, unless it is unfolded.
func (d *Docket) entries() []*Entry {
	verdicts := d.verdicts()
	var out []*Entry
	folded := map[place]bool{}
	for _, r := range d.passages(d.unknownForms(verdicts)) {
		e := d.passageEntry(r)
		out = append(out, e)
		if !d.unfolded[e.Form] {
			for p := range r.places() {
				folded[p] = true
			}
		}
	}
	groups := map[string][]*pending{}
	for f, v := range verdicts {
		for _, p := range f.places {
			if w := d.word(p); asked(w) && !folded[p] {
				groups[Key(f.text)] = append(groups[Key(f.text)], &pending{d.occurrence(p), w.Traits, v})
			}
		}
	}
	for _, group := range groups {
		if joined := d.joins(group); joined != nil {
			out = append(out, fold(joined)...)
			continue
		}
		out = append(out, fold(group)...)
	}
	out = merge(out)
	slices.SortFunc(out, func(a, b *Entry) int {
		return cmp.Or(byPlace(a.Occurrences[0], b.Occurrences[0]), cmp.Compare(a.Form, b.Form))
	})
	return out
}

// merge puts entries of one form together: a join may come from both its halves.
func merge(entries []*Entry) []*Entry {
	seen := map[name]*Entry{}
	out := entries[:0]
	for _, e := range entries {
		n := name{e.Kind, e.Form}
		first := seen[n]
		if first == nil {
			seen[n] = e
			out = append(out, e)
			continue
		}
		first.Occurrences = append(first.Occurrences, e.Occurrences...)
		slices.SortFunc(first.Occurrences, byPlace)
		first.Occurrences = slices.CompactFunc(first.Occurrences, func(a, b Occurrence) bool { return byPlace(a, b) == 0 })
		first.open = len(first.Occurrences)
	}
	return out
}

func byPlace(a, b Occurrence) int {
	return cmp.Or(cmp.Compare(a.Paragraph, b.Paragraph), cmp.Compare(a.Word, b.Word))
}

func (d *Docket) word(p place) manuscript.Word {
	return d.Document.Paragraphs[p.paragraph].Words[p.word]
}

func (d *Docket) occurrence(p place) Occurrence {
	paragraph := &d.Document.Paragraphs[p.paragraph]
	parts := part(paragraph, paragraph.Words[p.word], d.base)
	return Occurrence{
		Paragraph: int(p.paragraph), Word: int(p.word), Words: 1,
		Text: parts.text, Lead: parts.lead, Tail: parts.tail,
	}
}

// joins returns the occurrences of a group as joins where each of them makes a
// common listed word with the word before or after it (to gether), else nil: a
// form that also stands alone is an entry of its own.
func (d *Docket) joins(group []*pending) []*pending {
	var out []*pending
	for _, p := range group {
		o := p.Occurrence
		if o.Lead != "" || o.Tail != "" || p.kind != UnknownForm || p.why != "" {
			return nil
		}
		joined, ok := d.join(o, o.Word-1)
		if !ok {
			joined, ok = d.join(o, o.Word)
		}
		if !ok {
			return nil
		}
		out = append(out, joined)
	}
	return out
}

// rarestJoin is the size level up to which two words are read as one: rarer
// words would join names and foreign words by chance.
const rarestJoin = 50

// join returns the words first and first+1 of o's paragraph as a join, if a
// single space parts them and together they are a listed word.
func (d *Docket) join(o Occurrence, first int) (*pending, bool) {
	p := &d.Document.Paragraphs[o.Paragraph]
	if first < 0 || first+1 >= len(p.Words) {
		return nil, false
	}
	a, b := p.Words[first], p.Words[first+1]
	if len(a.Text) < 2 || len(b.Text) < 2 || p.Text[a.End:b.Start] != " " {
		return nil, false
	}
	finding := d.base.Find(a.Text + b.Text)
	oneWord := capitalsOf(b.Text) == lower || capitalsOf(a.Text+b.Text) == all
	if finding.Status != lexicon.Known || !oneWord {
		return nil, false
	}
	if level, ok := finding.Words[0].Level(d.base.Variety()); !ok || level > rarestJoin {
		return nil, false
	}
	return &pending{
		Occurrence: Occurrence{Paragraph: o.Paragraph, Word: first, Words: 2, Text: a.Text + " " + b.Text},
		traits:     a.Traits,
		verdict:    verdict{kind: Join, instead: []string{a.Text + b.Text}},
	}, true
}
