package manuscript

import (
	"unicode"
	"unicode/utf8"
)

// markSpeech tells which tokens stand in speech, and gives double quotes their
// roles.
//
// Speech is what stands between double quotes; and what stands between single
// ones that open at the start of the paragraph, after punctuation, or before a
// capital – others quote a word or phrase. “ „ open and ” closes; " and the
// guillemets open after a space, an opening bracket, a dash or another opening
// quote, and close else, but " after a digit with nothing open is a mark of
// inches. Quotes nest: speech ends with the outermost. A quote that closes also
// closes those opened after its own.
//
// Speech that never closes runs to the end of the paragraph, as it does where
// the next paragraph opens with a quote again; that one is speech by its own
// quote, so nothing is carried over.
func (s *splitter) markSpeech(text string) {
	s.open = s.open[:0]
	for i := range s.tokens {
		t := &s.tokens[i]
		switch t.kind {
		case double:
			t.role = s.doubleRole(text, i, len(s.open) > 0)
		case single:
		default:
			t.speech = len(s.open) > 0 && s.open[len(s.open)-1].speech
			continue
		}
		switch t.role {
		case opening:
			inSpeech := len(s.open) > 0 && s.open[len(s.open)-1].speech
			s.open = append(s.open, quotation{t.kind, inSpeech || t.kind == double || s.opensSpeech(text, i)})
		case closing:
			s.close(t.kind)
		}
	}
}

// quotation is one that is open.
type quotation struct {
	kind   kind // of its quotes
	speech bool // what stands in it is speech
}

// close closes the innermost quotation in quotes of a kind, and with it those
// inside that never closed.
func (s *splitter) close(k kind) {
	for i := len(s.open) - 1; i >= 0; i-- {
		if s.open[i].kind == k {
			s.open = s.open[:i]
			return
		}
	}
}

func (s *splitter) doubleRole(text string, i int, open bool) role {
	mark, _ := utf8.DecodeRuneInString(text[s.tokens[i].start:])
	switch mark {
	case '“', '„':
		return opening
	case '”':
		return closing
	}
	switch before := s.kindAt(i - 1); {
	case before == wordToken && !open && isDigitAt(text, int(s.tokens[i].start)-1):
		return noRole
	case opens(before):
		if opens(s.kindAt(i+1)) && open {
			return closing
		}
		return opening
	case before == single || before == double:
		if s.tokens[i-1].role == opening {
			return opening
		}
		return closing
	case before == hyphen || before == other:
		r, _ := utf8.DecodeLastRuneInString(text[:s.tokens[i].start])
		if r == '—' || r == '–' || r == '-' {
			if open {
				return closing
			}
			return opening
		}
		if unicode.Is(unicode.Ps, r) {
			return opening
		}
	}
	return closing
}

// opensSpeech reports whether the single quote at token i opens speech.
func (s *splitter) opensSpeech(text string, i int) bool {
	if s.kindAt(i+1) == wordToken {
		if r, _ := utf8.DecodeRuneInString(text[s.tokens[i+1].start:]); unicode.IsUpper(r) {
			return true
		}
	}
	j := i - 1
	for s.kindAt(j) == space || s.kindAt(j) == lineBreak {
		j--
	}
	return s.kindAt(j) != wordToken
}
