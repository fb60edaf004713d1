package manuscript

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

// Word is one word of a paragraph.
type Word struct {
	Start, End int    // bytes of Paragraph.Text
	Text       string // NFC, as it reads: soft hyphens gone, a line-end break as its hyphen alone ("har-bour")
	Setting    Setting
	Traits     Trait
	Fault      Fault
	Instead    string // with a Fault: what should stand there (2nd, 1914, ’tis)
}

// Trait is a property of a word that the splitter sees; a word may have several.
type Trait uint32

const (
	SentenceStart Trait = 1 << iota // first word of a sentence, of a heading or of speech
	AllCapitals                     // two letters or more, all capitals; a possessive ending does not count
	Number                          // digits, with their separators and signs
	Ordinal                         // 1st, 22nd, 1920s
	Roman                           // XIV, as a numeral
	Initial                         // J. in J. Smith; U.S.
	Elision                         // apostrophe at the start or end is part of the word: ’tis, nothin’
	Hyphenated                      // members joined by hyphens
	Suspended                       // hyphen at the end or start is part of it: two- and three-masted
	Broken                          // broken by a hyphen at a line end
	HeadingWord                     // stands in a heading
)

// Fault is something wrong that the splitter itself can tell.
type Fault string

const (
	NoFault          Fault = ""
	WrongOrdinal     Fault = "wrong ordinal"      // 2th
	LetterForDigit   Fault = "letter for a digit" // l9l4, 1O
	DigitForLetter   Fault = "digit for a letter" // hel1o
	TurnedApostrophe Fault = "turned apostrophe"  // ‘tis
)

// splitter splits paragraphs into words. It keeps its memory between them; its
// zero value is ready for use.
type splitter struct {
	tokens []token
	ahead  []following
	open   []quotation // while speech is marked
	words  []Word      // of the paragraph, at the start of store
	store  []Word      // where the next paragraphs' words go
}

// wordsPerStore is how many words are allocated at once.
const wordsPerStore = 4096

// split returns the words of a paragraph's text, and what it passed over.
//
// Words are the segments of UAX #29 that hold a letter or a digit, tailored for
// prose as stated at cut (what is cut), assignRoles (apostrophes), extend
// (hyphens and line ends) and sentence (where sentences start).
//
// It takes O(n) time.
func (s *splitter) split(text string, base Setting, italics, skips []extent) ([]Word, []reasoned) {
	skipped := addresses(text, skips)
	s.tokens = s.tokens[:0]
	s.tokenise(text, withAddresses(text, skips, skipped))
	if s.count() {
		s.assignRoles(text)
		s.markSpeech(text)
	}
	sentence := sentence{text: text, tokens: s.tokens, starts: true, heading: base == Heading}
	for i := 0; i < len(s.tokens); i++ {
		t := s.tokens[i]
		if t.kind != wordToken {
			sentence.pass(i)
			continue
		}
		last := i
		s.words = append(s.words, Word{})
		w := &s.words[len(s.words)-1]
		if t.plain && s.standsAlone(i) {
			w.Start, w.End = int(t.start), int(t.end)
			w.Text = text[w.Start:w.End]
			classifyPlain(w)
		} else {
			s.words = s.words[:len(s.words)-1]
			first := 0
			first, last = s.extend(text, i)
			s.words = append(s.words, s.word(text, first, last))
		}
		for len(italics) > 0 && italics[0].end <= int(t.start) {
			italics = italics[1:]
		}
		w.Setting = setting(base, t.speech, len(italics) > 0 && italics[0].start <= int(t.start))
		if base == Heading {
			w.Traits |= HeadingWord
		}
		if sentence.word(last, w) {
			w.Traits |= SentenceStart
		}
		i = last
	}
	return s.keep(), skipped
}

// count makes room for the words that the tokens may be, and reports whether there
// are quotes among the tokens.
func (s *splitter) count() (quotes bool) {
	words := 0
	for i := range s.tokens {
		switch s.tokens[i].kind {
		case wordToken:
			words++
		case single, double:
			quotes = true
		}
	}
	if words > len(s.store) {
		s.store = make([]Word, max(words, wordsPerStore))
	}
	s.words = s.store[:0:words]
	return quotes
}

// standsAlone reports whether token i, a plain word, is surely a word by itself: by
// the rules at extend, nothing that stands beside it could be joined to it.
func (s *splitter) standsAlone(i int) bool {
	switch s.kindAt(i - 1) {
	case single, hyphen:
		return false
	}
	switch s.kindAt(i + 1) {
	case single, hyphen:
		return false
	case end:
		return s.tokens[i].end-s.tokens[i].start > 1
	}
	return true
}

// keep returns the paragraph's words, and leaves the rest of the store for others.
func (s *splitter) keep() []Word {
	n := len(s.words)
	if n == 0 {
		return nil
	}
	s.store = s.store[n:]
	return s.words[:n:n]
}

// setting applies the precedence stated at Setting.
func setting(base Setting, speech, italics bool) Setting {
	switch {
	case base != Narration:
		return base
	case speech:
		return Speech
	case italics:
		return Italics
	}
	return Narration
}

// extend returns the first and last token of the word around token i.
//
// Joined to a word are
//   - an apostrophe before or after it, by the rule at assignRoles, and the s of
//     1920’s;
//   - after a number, a fraction (1½);
//   - before a number, a currency sign, and a sign where no word stands before;
//   - a hyphen and the word after it; not two hyphens, and no dash;
//   - a hyphen (or soft hyphen) at the end of a line and the word that opens the
//     next one, where letters stand on both sides: a broken word;
//   - a hyphen before a space and one of and, or, nor, to, but, or before a
//     comma; and one after a space and one of these, or after an opening
//     bracket or quote: a suspended hyphen;
//   - the point of an initial (one capital, not I) before a space and a capital,
//     or another initial, and that of an abbreviation with points.
func (s *splitter) extend(text string, i int) (first, last int) {
	first, last = i, i
	switch s.kindAt(i - 1) {
	case single:
		if s.tokens[i-1].role == apostrophe && s.free(i-1) {
			first = i - 1
		}
	case sign, hyphen:
		if s.signs(text, i) || s.kindAt(i-1) == hyphen && s.suspendedBefore(text, i) {
			first = i - 1
		}
	}
	for {
		next := s.join(text, last)
		if next == last {
			break
		}
		last = next
	}
	return first, last
}

// free reports that no word before took token i in.
func (s *splitter) free(i int) bool {
	return len(s.words) == 0 || s.words[len(s.words)-1].End <= int(s.tokens[i].start)
}

// join returns the last token of a word that so far ends at token i, or i.
func (s *splitter) join(text string, i int) int {
	switch s.kindAt(i + 1) {
	case wordToken:
		r, _ := utf8.DecodeRuneInString(text[s.tokens[i+1].start:])
		if isDigitAt(text, int(s.tokens[i].end)-1) && unicode.Is(unicode.No, r) {
			return i + 1
		}
	case single:
		if s.tokens[i+1].role != apostrophe || s.tokens[i].kind == single {
			return i
		}
		if s.kindAt(i+2) == wordToken && (s.kindAt(i) == wordToken || s.wordAt(text, i+2) == "s") {
			return i + 2
		}
		return i + 1
	case hyphen:
		switch s.kindAt(i + 2) {
		case wordToken:
			return i + 2
		case single:
			if s.tokens[i+2].role == apostrophe && s.kindAt(i+3) == wordToken {
				return i + 3
			}
		case lineBreak:
			if s.kindAt(i+3) == wordToken && s.breaks(text, i, i+3) {
				return i + 3
			}
		}
		if s.suspendedAfter(text, i+1) {
			return i + 1
		}
	case lineBreak:
		if s.tokens[i].kind == wordToken && strings.HasSuffix(text[:s.tokens[i].end], "\u00AD") &&
			s.kindAt(i+2) == wordToken && startsWithLetter(text[s.tokens[i+2].start:]) {
			return i + 2
		}
	case end:
		if s.pointed(text, i) {
			return i + 1
		}
	}
	return i
}

// breaks reports whether a line-end hyphen breaks a word between the tokens.
func (s *splitter) breaks(text string, before, after int) bool {
	r, _ := utf8.DecodeLastRuneInString(text[:s.tokens[before].end])
	return (unicode.IsLetter(r) || unicode.IsMark(r)) && startsWithLetter(text[s.tokens[after].start:]) &&
		!isLinking(s.wordAt(text, after))
}

// signs reports whether the token before number i is its sign.
func (s *splitter) signs(text string, i int) bool {
	if r, _ := utf8.DecodeRuneInString(text[s.tokens[i].start:]); !unicode.IsNumber(r) || !s.free(i-1) {
		return false
	}
	before := s.kindAt(i - 2)
	sign, _ := utf8.DecodeRuneInString(text[s.tokens[i-1].start:])
	return unicode.Is(unicode.Sc, sign) && before != wordToken || opens(before)
}

func (s *splitter) suspendedAfter(text string, i int) bool {
	switch s.kindAt(i + 1) {
	case space, lineBreak:
		return s.kindAt(i+2) == wordToken && isLinking(s.wordAt(text, i+2))
	case other:
		return text[s.tokens[i+1].start] == ','
	}
	return false
}

func (s *splitter) suspendedBefore(text string, i int) bool {
	if !s.free(i-1) || !startsWithLetter(text[s.tokens[i].start:]) {
		return false
	}
	switch s.kindAt(i - 2) {
	case space, lineBreak:
		return s.kindAt(i-3) == wordToken && isLinking(s.wordAt(text, i-3))
	case double:
		return true
	case single:
		return s.tokens[i-2].role == opening
	case other:
		return strings.IndexByte("([/", text[s.tokens[i-2].start]) >= 0
	}
	return false
}

// isLinking tells the words between members of a suspended compound.
func isLinking(word string) bool {
	switch word {
	case "and", "or", "nor", "to", "but":
		return true
	}
	return false
}

// pointed reports whether the point after word token i belongs to it.
func (s *splitter) pointed(text string, i int) bool {
	t := s.tokens[i]
	if text[s.tokens[i+1].start] != '.' || s.kindAt(i+2) == end || s.kindAt(i-1) == hyphen {
		return false
	}
	word := text[t.start:t.end]
	if strings.Contains(word, ".") {
		return isPointed(word)
	}
	if !isInitial(word) {
		return false
	}
	next := i + 2
	if k := s.kindAt(next); k == space || k == lineBreak {
		next++
	}
	if s.kindAt(next) != wordToken {
		return false
	}
	if word == "I" {
		// “So did I. He left” is likelier than an initial, unless one stands beside it.
		after := text[s.tokens[next].start:s.tokens[next].end]
		return isInitial(after) && s.kindAt(next+1) == end || len(s.words) > 0 && s.words[len(s.words)-1].Traits&Initial != 0
	}
	r, _ := utf8.DecodeRuneInString(text[s.tokens[next].start:])
	return unicode.IsUpper(r)
}

// isInitial tells a single capital.
func isInitial(word string) bool {
	r, n := utf8.DecodeRuneInString(word)
	return n > 0 && unicode.IsUpper(r) && (n == len(word) || letterLength(word) == len(word))
}

// word makes the word of tokens first to last.
func (s *splitter) word(text string, first, last int) Word {
	w := Word{Start: int(s.tokens[first].start), End: int(s.tokens[last].end)}
	raw := text[w.Start:w.End]
	if strings.Contains(raw, "\n") {
		w.Traits |= Broken
	}
	w.Text = reads(raw)
	if first == last && isPlain(w.Text) {
		classify(&w)
		return w
	}
	for i := first; i <= last; i++ {
		switch s.tokens[i].kind {
		case hyphen:
			switch {
			case i == first && s.startsWithDigit(text, i+1):
			case i == first || i == last:
				w.Traits |= Suspended
			case s.tokens[i+1].kind == lineBreak: // the break's own
			default:
				w.Traits |= Hyphenated
			}
		case single:
			if i == first || i == last && isClippedAt(s, text, i) {
				w.Traits |= Elision
			}
		}
	}
	classify(&w)
	if w.Fault == WrongOrdinal && w.Start > 0 && text[w.Start-1] == '/' {
		w.Fault, w.Instead = NoFault, "" // the denominator of a fraction: the 1/2th part
	}
	return w
}

func (s *splitter) startsWithDigit(text string, i int) bool {
	return s.kindAt(i) == wordToken && isDigitAt(text, int(s.tokens[i].start))
}

// isClippedAt reports whether the apostrophe at token i stands for lost letters
// and not for a possessive.
func isClippedAt(s *splitter, text string, i int) bool {
	if s.kindAt(i-1) != wordToken {
		return false
	}
	word := s.wordAt(text, i-1)
	return isClipped(word) || word == "n" && i >= 2 && s.tokens[i-2].kind == single
}
