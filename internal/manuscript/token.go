package manuscript

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

// kind is what a token is to the splitter.
type kind uint8

const (
	other     kind = iota
	wordToken      // holds a letter or a digit
	hyphen         // one hyphen
	single         // ' ’ ‘
	double         // " “ ” „ « »
	space
	lineBreak
	sign // a currency sign, or a plus or minus
	end  // . ! ? …
	skip // a stretch without words
)

// token is one segment of UAX #29, cut further where prose asks for it.
type token struct {
	start, end int32
	kind       kind
	role       role // of a single quote
	speech     bool // stands in speech
	plain      bool // a wordToken that isPlain
}

// tokenise appends the tokens of text to s.tokens.
func (s *splitter) tokenise(text string, skips []extent) {
	at := 0
	for _, cut := range skips {
		if cut.start > at {
			s.tokeniseRun(text, at, cut.start)
		}
		if cut.end > max(at, cut.start) {
			s.add(max(at, cut.start), cut.end, skip)
			at = cut.end
		}
	}
	if at < len(text) {
		s.tokeniseRun(text, at, len(text))
	}
}

func (s *splitter) add(start, end int, k kind) {
	s.tokens = append(s.tokens, token{start: int32(start), end: int32(end), kind: k})
}

func (s *splitter) tokeniseRun(text string, start, end int) {
	segments(text[:end], start, func(g segment) {
		switch {
		case g.kind == wordToken && g.whole:
			s.tokens = append(s.tokens, token{start: int32(g.start), end: int32(g.end), kind: wordToken, plain: g.plain})
		case g.kind == wordToken:
			s.cut(text[g.start:g.end], g.start)
		default:
			s.add(g.start, g.end, g.kind)
		}
	})
}

func kindOf(segment string) kind {
	r, n := utf8.DecodeRuneInString(segment)
	switch {
	case unicode.IsLetter(r) || unicode.IsNumber(r):
		return wordToken
	case strings.IndexFunc(segment, isWordRune) >= 0:
		return wordToken
	case r == '\n':
		return lineBreak
	case unicode.IsSpace(r):
		return space
	case n < len(segment) && r != '\u00AD':
		return other
	case isHyphen(r):
		return hyphen
	case r == '\'' || r == '’' || r == '‘':
		return single
	case strings.ContainsRune("\"“”„«»", r):
		return double
	case r == '.' || r == '!' || r == '?' || r == '…':
		return end
	case unicode.Is(unicode.Sc, r) || r == '+' || r == '\u2212':
		return sign
	}
	return other
}

// cut adds a segment that is a word by UAX #29, in parts where the standard
// joins what prose does not:
//
//   - at a colon between letters (section 4.1 has it for Swedish);
//   - at a semicolon between digits, which the standard has for lists;
//   - at an underscore;
//   - at a point between letters, unless they are an abbreviation: each member
//     one letter, the first one or two (U.S, a.m, Ph.D);
//   - at ‘ between letters, unless it stands for an apostrophe: after o, d or l,
//     or before an ending such as s, t or ll.
func (s *splitter) cut(segment string, start int) {
	if isWhole(segment) {
		s.add(start, start+len(segment), wordToken)
		return
	}
	points := isPointed(segment)
	from := 0
	for i, r := range segment {
		n := utf8.RuneLen(r)
		joined := true
		switch r {
		case ':', ';', '_', '\uFE55', '\uFF1A':
			joined = false
		case '.':
			joined = points || isDigitAt(segment, i-1) && isDigitAt(segment, i+1)
		case '‘':
			joined = i > 0 && i+n < len(segment) && isInnerApostrophe(segment[:i], segment[i+n:])
		}
		if joined {
			continue
		}
		if i > from {
			s.add(start+from, start+i, wordToken)
		}
		s.add(start+i, start+i+n, kindOf(segment[i:i+n]))
		from = i + n
	}
	if from < len(segment) {
		s.add(start+from, start+len(segment), kindOf(segment[from:]))
	}
}

// isWhole reports whether nothing is to be cut in a segment.
func isWhole(segment string) bool {
	for i := range len(segment) {
		switch c := segment[i]; {
		case c >= utf8.RuneSelf:
			return !strings.ContainsAny(segment, ":;_.‘\uFE55\uFF1A")
		case c == ':' || c == ';' || c == '_' || c == '.':
			return false
		}
	}
	return true
}

func isDigitAt(s string, i int) bool {
	return i >= 0 && i < len(s) && '0' <= s[i] && s[i] <= '9'
}

// isPointed reports whether a segment with points is an abbreviation.
func isPointed(segment string) bool {
	members := strings.Split(segment, ".")
	for i, m := range members {
		n := utf8.RuneCountInString(m)
		r, _ := utf8.DecodeRuneInString(m)
		if !unicode.IsLetter(r) || n > 2 || n == 2 && (i > 0 || !unicode.IsUpper(r) || isUpperAll(m)) {
			return false
		}
	}
	last, _ := utf8.DecodeLastRuneInString(segment)
	first, _ := utf8.DecodeRuneInString(segment)
	return len(members) > 1 && unicode.IsUpper(first) == unicode.IsUpper(last)
}

func isUpperAll(s string) bool { return strings.ToUpper(s) == s }

// isInnerApostrophe reports whether a mark between two runs of letters may be
// an apostrophe, from what is usual around it in English.
func isInnerApostrophe(before, after string) bool {
	switch strings.ToLower(before) {
	case "o", "d", "l", "th", "y":
		return true
	}
	switch strings.ToLower(after) {
	case "s", "t", "d", "m", "ll", "re", "ve", "em", "n", "er", "all", "clock":
		return true
	}
	return false
}
