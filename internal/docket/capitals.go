package docket

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

// capitals is the way a form uses capitals.
type capitals uint8

const (
	lower   capitals = iota // no capital at all
	initial                 // the first letter alone
	all                     // every letter, of two or more
	mixed                   // McKay, iPad
)

// capitalsOf returns how s uses capitals. Letters without case count for nothing.
func capitalsOf(s string) capitals {
	var upper, cased int
	first := false
	for _, r := range s {
		switch {
		case unicode.IsUpper(r) || unicode.IsTitle(r):
			if cased == 0 {
				first = true
			}
			upper++
			cased++
		case unicode.IsLower(r):
			cased++
		}
	}
	switch {
	case upper == 0:
		return lower
	case upper == cased && cased > 1:
		return all
	case upper == 1 && first:
		return initial
	}
	return mixed
}

// capitalise gives s a capital first letter; leading apostrophes and hyphens are
// passed over (’tis, ’Tis).
func capitalise(s string) string {
	for i, r := range s {
		if unicode.IsLetter(r) {
			return s[:i] + string(unicode.ToTitle(r)) + s[i+utf8.RuneLen(r):]
		}
	}
	return s
}

// carry returns word, which was chosen for form, with the capitals that it needs
// where the form stands as occurrence: HARBER for harber makes HARBOUR of harbour.
// A capital that word has of its own is kept unless plain says that the word is
// also one without it.
func carry(form, occurrence, word string, plain func(string) bool) string {
	have, want := capitalsOf(form), capitalsOf(occurrence)
	if have == want || form == occurrence {
		return word
	}
	switch want {
	case all:
		return strings.ToUpper(word)
	case initial:
		if have == all {
			word = settle(word, plain)
		}
		return capitalise(word)
	case lower:
		return settle(word, plain)
	}
	return word
}

// settle returns word without capitals where plain knows it so, else with its
// first letter's capital alone, unless it mixes capitals itself.
func settle(word string, plain func(string) bool) string {
	if small := strings.ToLower(word); plain(small) {
		return small
	}
	if capitalsOf(word) == all {
		return capitalise(strings.ToLower(word))
	}
	return word
}

// Apostrophes as they are typed and as they are set.
const (
	straight = "'"
	curly    = "’"
)

// Key is what two spellings of one form have in common: apostrophes and case
// apart, they are the same.
func Key(form string) string { return strings.ToLower(plainApostrophe(form)) }

func plainApostrophe(s string) string { return strings.ReplaceAll(s, curly, straight) }

// likeApostrophe gives word the apostrophes of the style asked for.
func likeApostrophe(word string, curled bool) string {
	if curled {
		return strings.ReplaceAll(word, straight, curly)
	}
	return plainApostrophe(word)
}
