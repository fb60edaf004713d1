package report

import (
	"strings"
	"unicode"

	"golang.org/x/text/unicode/norm"
)

// groups is the letter groups of a style sheet, in order, by their first letters.
func groups() []string { return []string{"A–D", "E–H", "I–L", "M–P", "Q–T", "U–Z", other} }

// other is the group of what begins with no Latin letter.
const other = "Other"

// groupOf returns the letter group of a word: by its first letter, whatever
// apostrophes and accents stand at it (’tis under T, Évora under E).
func groupOf(word string) string {
	key := sortKey(word)
	if key == "" || key[0] < 'a' || key[0] > 'z' {
		return other
	}
	switch c := key[0]; {
	case c <= 'd':
		return "A–D"
	case c <= 'h':
		return "E–H"
	case c <= 'l':
		return "I–L"
	case c <= 'p':
		return "M–P"
	case c <= 't':
		return "Q–T"
	}
	return "U–Z"
}

// sortKey is what a word is filed under: its letters and digits in lower case,
// without accents, letter by letter as indexes file them (spaces, hyphens and
// apostrophes do not count).
func sortKey(word string) string {
	var b strings.Builder
	for _, r := range norm.NFKD.String(word) {
		r = unicode.ToLower(r)
		if plain, ok := undecomposed(r); ok {
			b.WriteString(plain)
		} else if unicode.IsLetter(r) || unicode.IsNumber(r) {
			b.WriteRune(r)
		}
	}
	return b.String()
}

// undecomposed gives the letters that Unicode does not decompose as libraries file
// them.
func undecomposed(r rune) (string, bool) {
	switch r {
	case 'æ':
		return "ae", true
	case 'œ':
		return "oe", true
	case 'ø':
		return "o", true
	case 'ß':
		return "ss", true
	case 'ð', 'đ':
		return "d", true
	case 'þ':
		return "th", true
	case 'ł':
		return "l", true
	case 'ħ':
		return "h", true
	case 'ı':
		return "i", true
	}
	return "", false
}
