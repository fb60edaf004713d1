package docket

import (
	"cmp"
	"slices"
	"strings"

	"emendary/align"
)

// Related is another open entry whose form is built on this one: harbers,
// harber-master on harber. Text is what it becomes when text is accepted for it.
type Related struct {
	Entry *Entry
	Text  string
	Known bool // the lexicon knows Text: checked to begin with
}

// endings are what an inflection or a near derivation adds.
var endings = []string{"s", "es", "d", "ed", "ing", "er", "ers", "ly", "less", "like", "ness", "y"}

// leastStem is how many letters a form needs for others to be built on it.
const leastStem = 4

// Related returns the open entries built on e's form, with what each becomes
// were text accepted for e; text may be empty. O(entries).
func (d *Docket) Related(e *Entry, text string) []Related {
	stem := Key(e.Form)
	if len(stem) < leastStem || e.several() {
		return nil
	}
	lex := d.Lexicon()
	var out []Related
	for _, other := range d.Entries {
		if other == e || !other.Open() || other.several() || !builtOn(Key(other.Form), stem) {
			continue
		}
		r := Related{Entry: other}
		if text != "" {
			r.Text = like(other.Form, strings.Replace(Key(other.Form), stem, text, 1))
			r.Known = known(lex, r.Text) || allKnown(r.Text, func(m string) bool { return known(lex, m) })
		}
		out = append(out, r)
	}
	return out
}

// builtOn reports whether form is stem with an ending, or a compound of it.
func builtOn(form, stem string) bool {
	for _, member := range members(form) {
		if member == stem && member != form {
			return true
		}
		if rest, ok := strings.CutPrefix(member, stem); ok && slices.Contains(endings, rest) {
			return true
		}
	}
	return false
}

func allKnown(text string, known func(string) bool) bool {
	parts := members(text)
	for _, m := range parts {
		if !known(m) {
			return false
		}
	}
	return len(parts) > 1
}

// NearForm is a form of the manuscript near another.
type NearForm struct {
	Form     string
	Count    int
	Distance int // restricted Damerau–Levenshtein, case folded
}

// farthest is how many edits away a form of the manuscript may be to be near.
const farthest = 2

// Near returns the forms of other entries within two edits of e's form, nearest
// first: a name that drifts, a slip made two ways. O(entries).
func (d *Docket) Near(e *Entry) []NearForm {
	alphabet := d.base.Alphabet()
	form := alphabet.Fold(alphabet.Letters(e.Form))
	if len(form) < leastStem || e.Kind == Passage {
		return nil
	}
	var out []NearForm
	for _, other := range *d.current.Load() {
		if other == e || abs(len(other.Form)-len(e.Form)) > 4*farthest {
			continue
		}
		letters := alphabet.Fold(alphabet.Letters(other.Form))
		if abs(len(letters)-len(form)) > farthest {
			continue
		}
		if n := align.Restricted(form, letters); n > 0 && n <= farthest {
			out = append(out, NearForm{other.Form, len(other.Occurrences), n})
		}
	}
	slices.SortFunc(out, func(a, b NearForm) int {
		return cmp.Or(cmp.Compare(a.Distance, b.Distance), -cmp.Compare(a.Count, b.Count), cmp.Compare(a.Form, b.Form))
	})
	return out
}

func abs(n int) int { return max(n, -n) }
