package lexicon

import (
	"slices"
	"unicode"
	"unicode/utf8"

	"emendary/align"
)

// spelling is a form or an entry in letters.
type spelling struct {
	text              string
	letters, folded   []align.Letter
	onlyAbbreviations bool // full stops were taken out: only abbreviations cover it
}

const fullStop = align.Letter('.')

func (x *Lexicon) spell(text string) spelling {
	letters := x.alphabet.Letters(text)
	return spelling{text: text, letters: letters, folded: x.alphabet.Fold(letters)}
}

// withoutStops returns all spellings that entries which cover s may have: s, s
// with a final full stop more or less, and, where one follows every letter, s
// without any.
func (s spelling) withoutStops() []spelling {
	n := len(s.letters)
	if n == 0 {
		return nil
	}
	if s.letters[n-1] != fullStop {
		more := spelling{letters: append(slices.Clone(s.letters), fullStop), folded: append(slices.Clone(s.folded), fullStop)}
		all := []spelling{s, more}
		return s.appendUnstopped(all)
	}
	all := []spelling{s, s.withoutStop()}
	return s.appendUnstopped(all)
}

// withoutStop returns s without a final full stop.
func (s spelling) withoutStop() spelling {
	if n := len(s.letters); n > 0 && s.letters[n-1] == fullStop {
		return spelling{letters: s.letters[:n-1], folded: s.folded[:n-1]}
	}
	return s
}

// appendUnstopped appends s without its full stops where at least two letters
// have one after each of them, the last perhaps excepted.
func (s spelling) appendUnstopped(all []spelling) []spelling {
	if len(s.letters) < 3 {
		return all
	}
	bare := spelling{onlyAbbreviations: true}
	for i, letter := range s.letters {
		if (letter == fullStop) != (i%2 == 1) {
			return all
		}
		if letter != fullStop {
			bare.letters = append(bare.letters, letter)
			bare.folded = append(bare.folded, s.folded[i])
		}
	}
	return append(all, bare)
}

// coveredBy reports whether entry, which has the same folded letters, covers s.
func (s spelling) coveredBy(a *align.Alphabet, entry spelling) bool {
	if s.sameCapitals(a, entry) || s.allCapitals(a) {
		return true
	}
	return entry.capitals(a) == 0 && s.capitals(a) == 1 && s.beginsWithCapital(a)
}

// sameCapitals reports whether s and t, which have the same folded letters, have
// capitals in the same places.
func (s spelling) sameCapitals(a *align.Alphabet, t spelling) bool {
	for i := range s.letters {
		if s.letters[i] != t.letters[i] && caseOf(a, s.letters[i]) != caseOf(a, t.letters[i]) {
			return false
		}
	}
	return true
}

// allCapitals reports whether s has capitals and no letter that could be one and
// is not.
func (s spelling) allCapitals(a *align.Alphabet) bool {
	capitals := 0
	for _, letter := range s.letters {
		switch caseOf(a, letter) {
		case small:
			return false
		case capital:
			capitals++
		}
	}
	return capitals > 0
}

func (s spelling) capitals(a *align.Alphabet) int {
	n := 0
	for _, letter := range s.letters {
		if caseOf(a, letter) == capital {
			n++
		}
	}
	return n
}

// beginsWithCapital reports whether the first letter with case is a capital.
func (s spelling) beginsWithCapital(a *align.Alphabet) bool {
	for _, letter := range s.letters {
		if c := caseOf(a, letter); c != caseless {
			return c == capital
		}
	}
	return false
}

type letterCase uint8

const (
	caseless letterCase = iota
	small
	capital
)

// caseOf returns the case of a letter: that of its first code point. A small
// letter without a capital of its own (ĸ, ª) is caseless.
func caseOf(a *align.Alphabet, l align.Letter) letterCase {
	r := rune(l)
	if l > unicode.MaxRune {
		r, _ = utf8.DecodeRuneInString(a.Text(l))
	}
	switch {
	case 'a' <= r && r <= 'z':
		return small
	case 'A' <= r && r <= 'Z', unicode.IsUpper(r), unicode.IsTitle(r):
		return capital
	case unicode.IsLower(r) && unicode.ToUpper(r) != r:
		return small
	}
	return caseless
}
