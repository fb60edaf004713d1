package docket

import (
	"strings"

	"emendary/align"
	"emendary/internal/ledger"
	"emendary/internal/manuscript"
)

// Result returns what stands at occurrence i of e once text is accepted: its own
// capitals, apostrophes and ending carried over.
func (d *Docket) Result(e *Entry, i int, text string) string {
	o := e.Occurrences[i]
	return o.Lead + d.corrected(e.Form, o, text) + o.Tail
}

// corrected is the Result without lead and tail.
func (d *Docket) corrected(form string, o Occurrence, text string) string {
	lex := d.Lexicon()
	word := carry(form, plainApostrophe(o.Text), text, func(small string) bool { return known(lex, small) })
	if !strings.ContainsAny(word, straight+curly) {
		return word
	}
	own := o.Text + o.Tail
	if strings.ContainsAny(own, straight+curly) {
		return likeApostrophe(word, strings.Contains(own, curly))
	}
	return likeApostrophe(word, d.curled(o.Paragraph))
}

// curled reports whether a paragraph sets its apostrophes and quotation marks
// curly; one without any goes by the word as it was chosen.
func (d *Docket) curled(paragraph int) bool {
	text := d.Document.Paragraphs[paragraph].Text
	return strings.ContainsAny(text, "’‘“”") || !strings.ContainsAny(text, `'"`)
}

// Emendations returns what the accepts in force do to the manuscript, in order.
func (d *Docket) Emendations() []manuscript.Emendation {
	var out []manuscript.Emendation
	for _, e := range d.Entries {
		for i := range e.Occurrences {
			if r := e.Occurrences[i].Ruling; r != nil && r.Act == ledger.Accept {
				out = append(out, d.emendation(e, i, r.Word))
			}
		}
	}
	return out
}

// emendation is occurrence i of e with text in its place, spelt letter by letter
// over the letters that are there.
func (d *Docket) emendation(e *Entry, i int, text string) manuscript.Emendation {
	o := e.Occurrences[i]
	start, end := d.extent(o)
	there := d.Document.Letters(o.Paragraph, start, end)
	out := manuscript.Emendation{Paragraph: o.Paragraph, Start: start, End: end, Letters: make([]string, len(there))}
	for k, l := range there {
		out.Letters[k] = l.Text
	}
	alphabet := d.base.Alphabet()
	old, corrected := alphabet.Letters(o.Text), alphabet.Letters(d.corrected(e.Form, o, text))
	// at[k] is where the k-th letter of the form stands among the letters there.
	at := locate(there, texts(alphabet, alphabet.Letters(o.Lead)), texts(alphabet, old))
	if len(at) != len(old) {
		// The word's clusters are not the paragraph's: write the word as a whole.
		clear(out.Letters)
		out.Letters[0] = d.Result(e, i, text)
		return out
	}
	prefix := ""
	a := alignment(alphabet.Fold(old), alphabet.Fold(corrected), align.Unit{})
	for _, edit := range a.Edits {
		to := corrected[edit.J : edit.J+len(edit.To)]
		switch {
		case len(edit.From) == len(edit.To):
			for k, l := range to {
				out.Letters[at[edit.I+k]] = alphabet.Text(l)
			}
		case len(edit.From) == 0 && edit.I == 0:
			prefix += alphabet.Text(to...) // no letter before it to join
		case len(edit.From) == 0:
			out.Letters[at[edit.I-1]] += alphabet.Text(to...)
		default:
			for k := range edit.From {
				out.Letters[at[edit.I+k]] = ""
			}
			out.Letters[at[edit.I]] = alphabet.Text(to...)
		}
	}
	if prefix != "" {
		out.Letters[at[0]] = prefix + out.Letters[at[0]]
	}
	return out
}

func texts(alphabet *align.Alphabet, letters []align.Letter) []string {
	out := make([]string, len(letters))
	for i, l := range letters {
		out[i] = alphabet.Text(l)
	}
	return out
}

// locate finds the letters of form among those that stand there, after lead:
// marks are passed over, but for a hyphen at a line end that the form keeps.
func locate(there []manuscript.Letter, lead, form []string) []int {
	at := make([]int, 0, len(form))
	skip := len(lead)
	for k, l := range there {
		switch {
		case len(at) == len(form):
			return at
		case l.Mark && (skip > 0 || l.Text != form[len(at)]):
		case skip > 0:
			skip--
		default:
			at = append(at, k)
		}
	}
	return at
}
