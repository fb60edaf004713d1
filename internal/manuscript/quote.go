package manuscript

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

// role is what a single quote or apostrophe does.
type role uint8

const (
	noRole     role = iota
	opening         // opens a quotation
	closing         // closes one
	apostrophe      // belongs to the word beside it
)

// What follows a single quote in its paragraph, up to the next that opens.
type following uint8

const (
	nothingCloses following = iota
	mayClose                // one after a letter, which may be an apostrophe too
	closes                  // one after punctuation
)

// assignRoles tells apostrophes from single quotes.
//
// Before a word (leading):
//   - certain words take one: the n of rock ’n’ roll, a word that is only ever
//     elided (’tis, ’em), a year (’90s). ’ and ' before them are apostrophes; ‘
//     is one, turned, where nothing after it closes a quotation right after
//     punctuation;
//   - before any other word ’ is an apostrophe, unless a quotation is open and
//     it stands right after punctuation;
//   - ' is one also before a word often elided (’round, ’cause) or one in small
//     letters that lost its h (’ouse), where a quotation is open already or
//     nothing after it closes one;
//   - else they open a quotation.
//
// After a word (trailing), ’ and ' are
//   - while no quotation is open, an apostrophe after s, x or z (pilots’) and
//     after a word usually clipped (nothin’, o’), else nothing;
//   - while one is open and another mark after may close it, an apostrophe
//     after a clipped word, and after s, x or z where a word in lower case
//     follows (the pilots’ house);
//   - else they close the quotation.
//
// A mark beside no word opens after a space and closes after anything else.
func (s *splitter) assignRoles(text string) {
	s.lookAhead(text)
	depth := 0
	for i := range s.tokens {
		t := &s.tokens[i]
		if t.kind != single {
			continue
		}
		mark, _ := utf8.DecodeRuneInString(text[t.start:])
		before, after := s.kindAt(i-1), s.kindAt(i+1)
		ahead := s.ahead[i]
		switch {
		case before == wordToken && after == wordToken:
			// UAX #29 joins letters itself, so digits are on one side: 1920’s.
			if next := s.tokens[i+1]; strings.EqualFold(text[next.start:next.end], "s") {
				t.role = apostrophe
			} else if mark == '’' && depth > 0 {
				t.role = closing
			}
		case after == wordToken:
			t.role = s.leadingRole(text, i, mark, depth > 0, ahead)
		case before == wordToken:
			t.role = s.trailingRole(text, i, mark, depth > 0, ahead)
		case mark == '‘' || mark == '\'' && (opens(before) && !opens(after) || before == double && after != space):
			t.role = opening
		case depth > 0 && before != space && before != other:
			t.role = closing
		case depth > 0 && after != end:
			t.role = closing
		}
		switch {
		case t.role == opening:
			depth++
		case t.role == closing && depth > 0:
			depth--
		}
	}
}

// opens tells the tokens after which a quotation may open.
func opens(k kind) bool { return k == space || k == lineBreak || k == noToken }

// noToken is the kind of what stands beyond the ends of a paragraph.
const noToken kind = 255

func (s *splitter) kindAt(i int) kind {
	if i < 0 || i >= len(s.tokens) {
		return noToken
	}
	return s.tokens[i].kind
}

// lookAhead fills s.ahead for the single quotes, in one pass from the end.
func (s *splitter) lookAhead(text string) {
	s.ahead = append(s.ahead[:0], make([]following, len(s.tokens))...)
	var state following
	for i := len(s.tokens) - 1; i >= 0; i-- {
		t := s.tokens[i]
		if t.kind != single {
			continue
		}
		s.ahead[i] = state
		mark, _ := utf8.DecodeRuneInString(text[t.start:])
		before, after := s.kindAt(i-1), s.kindAt(i+1)
		switch {
		case mark == '‘':
			if after != wordToken || before != wordToken {
				state = nothingCloses
			}
		case before == wordToken && after == wordToken:
		case after == wordToken && (mark == '’' || opens(before)):
			if mark == '\'' && !isElided(s.wordAt(text, i+1)) {
				state = nothingCloses
			}
		case before == wordToken:
			state = max(state, mayClose)
		case !opens(before):
			state = closes
		}
	}
}

func (s *splitter) wordAt(text string, i int) string {
	t := s.tokens[i]
	return strings.ToLower(text[t.start:t.end])
}

func (s *splitter) leadingRole(text string, i int, mark rune, open bool, ahead following) role {
	word := s.wordAt(text, i+1)
	certain := isElided(word) || isShortYear(word) || word == "n" && (s.kindAt(i+2) == single || s.kindAt(i+2) == hyphen)
	if mark == '’' {
		if !certain && open && closesBefore(text[:s.tokens[i].start]) {
			return closing
		}
		return apostrophe
	}
	if mark == '‘' {
		if certain && ahead != closes {
			return apostrophe
		}
		return opening
	}
	if certain {
		return apostrophe
	}
	if (open || ahead == nothingCloses) && (isOftenElided(word) || startsWithLostH(text[s.tokens[i+1].start:])) {
		return apostrophe
	}
	return opening
}

// closesBefore reports whether a text ends in punctuation after which a quote
// closes.
func closesBefore(text string) bool {
	r, _ := utf8.DecodeLastRuneInString(text)
	return strings.ContainsRune(".!?…,;:)]—–", r)
}

func (s *splitter) trailingRole(text string, i int, mark rune, open bool, ahead following) role {
	word := s.wordAt(text, i-1)
	clipped := isClipped(word) || word == "n" && i >= 2 && s.tokens[i-2].role == apostrophe
	if mark == '‘' {
		if clipped && ahead != closes {
			return apostrophe
		}
		return opening
	}
	plural := strings.ContainsRune("sxz", rune(word[len(word)-1]))
	switch {
	case !open && (clipped || plural):
		return apostrophe
	case !open:
		return noRole
	case ahead != nothingCloses && clipped:
		return apostrophe
	case ahead != nothingCloses && plural && s.kindAt(i+1) == space && s.kindAt(i+2) == wordToken:
		r, _ := utf8.DecodeRuneInString(text[s.tokens[i+2].start:])
		if unicode.IsLower(r) {
			return apostrophe
		}
	}
	return closing
}

// isElided tells words that stand only after an apostrophe.
func isElided(word string) bool {
	switch word {
	case "tis", "tisn't", "tisn’t", "twas", "twasn't", "twasn’t", "twere", "twill", "twould", "twixt",
		"em", "tween", "neath", "mongst", "gainst", "pon", "sblood", "struth", "strewth":
		return true
	}
	return false
}

// isOftenElided tells words that are elided in speech but words on their own too.
func isOftenElided(word string) bool {
	switch word {
	case "bout", "round", "cause", "cos", "coz", "cept", "til", "till", "fore", "cross", "fraid", "nother",
		"un", "ere", "less", "long", "nuff", "spect", "scuse", "stead", "tec", "gator", "possum", "member", "lo", "low", "kay":
		return true
	}
	return false
}

// isShortYear tells years without their century: 90s, 14.
func isShortYear(word string) bool {
	return (len(word) == 2 || len(word) == 3 && word[2] == 's') && isDigitAt(word, 0) && isDigitAt(word, 1)
}

// startsWithLostH reports whether text starts with a vowel in lower case, as a
// word that lost its h does.
func startsWithLostH(text string) bool {
	return text != "" && strings.IndexByte("aeiou", text[0]) >= 0
}

// isClipped tells words that usually lost their last letters: those in -in of
// four letters or more, and a list.
func isClipped(word string) bool {
	if len(word) >= 4 && strings.HasSuffix(word, "in") {
		return true
	}
	switch word {
	case "o", "th", "an", "wi", "ol", "t", "lil", "mo", "po", "fo", "yo", "ev", "gi", "ha", "roun", "aroun",
		"han", "lan", "ole", "lor", "mus", "jus", "bes", "las", "don", "tha", "ma", "wid", "fa":
		return true
	}
	return false
}
