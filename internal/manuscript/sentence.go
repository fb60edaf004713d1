package manuscript

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

// sentence follows a paragraph and tells where sentences start:
//
//   - at its first word;
//   - after . ! ? or … and space, brackets and closing quotes between them
//     allowed; after ! ? … or a closing quote only where the word does not begin
//     with a small letter (“Where?” he said);
//   - after a.m. and the like where a word follows that does not begin with a
//     small letter;
//   - not after the point of a title or other abbreviation that goes before a
//     name or number (Mr. St. No.), nor after an initial's;
//   - at the first word of speech: after a quote that opens at the start of the
//     paragraph, or after punctuation, where the word does not begin with a
//     small letter.
//
// In a heading only the first word starts one.
type sentence struct {
	text    string
	tokens  []token
	heading bool
	starts  bool // the next word starts a sentence
	strict  bool // but only if it does not begin with a small letter
	point   bool // the last token that counts was . ! ? or …
	pause   bool // it was another punctuation mark
}

// pass takes in token i, which belongs to no word.
func (s *sentence) pass(i int) {
	t := s.tokens[i]
	switch t.kind {
	case end:
		if s.heading {
			return
		}
		if text := s.text[t.start:t.end]; s.point || text != "." {
			s.strict = true // also a row of points
		}
		s.point, s.pause = true, true
	case space, lineBreak:
		s.starts = s.starts || s.point
	case double, single:
		switch {
		case t.role != opening:
			s.strict = s.strict || s.point
		case s.pause && !s.starts && !s.heading:
			s.starts, s.strict = true, true
		}
	case skip:
		*s = sentence{text: s.text, tokens: s.tokens, heading: s.heading}
	default:
		s.pause = true
		if !s.starts && strings.IndexByte(")]", s.text[t.start]) < 0 {
			s.point = false
		}
	}
}

// word takes in a word that ends at token last, and reports whether it starts a
// sentence.
func (s *sentence) word(last int, w *Word) bool {
	r := rune(w.Text[0])
	if r < 'A' || r > 'z' {
		r, _ = utf8.DecodeRuneInString(strings.TrimLeft(w.Text, "'’‘-"))
	}
	starts := s.starts && !(s.strict && unicode.IsLower(r))
	s.starts, s.strict, s.point, s.pause = false, false, false, false
	if w.Traits&Initial != 0 && strings.HasSuffix(w.Text, ".") && unicode.IsLower(r) && !isAbbreviation(strings.ReplaceAll(w.Text, ".", ""), "") {
		s.starts, s.strict = true, true
	}
	if after := s.text[w.End:]; strings.HasPrefix(after, ".") && isAbbreviation(w.Text, after) {
		s.tokens[last+1].kind = other // its point ends no sentence
	}
	return starts
}

// isAbbreviation tells words whose point is followed by a name or a number.
func isAbbreviation(word, after string) bool {
	switch strings.ToLower(word) {
	case "mr", "mrs", "ms", "dr", "st", "messrs", "mme", "mlle", "mm", "rev", "revd", "hon", "capt", "col", "gen",
		"lt", "maj", "sgt", "cpl", "pte", "cmdr", "adm", "prof", "fr", "sr", "mt", "ft", "gov", "sen", "rep", "pres",
		"supt", "insp", "viz", "cf", "vs", "v", "al", "ca", "c", "eg", "ie":
		return true
	case "no", "nos", "vol", "vols", "ch", "chap", "p", "pp", "fig", "figs", "art", "sec", "para", "l", "ll", "bk", "pt":
		digits := strings.TrimLeft(after, ". ")
		return isDigitAt(digits, 0) || isRoman(firstField(digits))
	}
	return false
}

func firstField(s string) string {
	if i := strings.IndexFunc(s, func(r rune) bool { return !unicode.IsLetter(r) }); i >= 0 {
		return s[:i]
	}
	return s
}
