package docket

import (
	"strings"
	"unicode"

	"golang.org/x/text/unicode/norm"
)

// FiledUnder is what a word is filed under: its letters and digits in lower case,
// without accents, letter by letter as indexes file them (spaces, hyphens and
// apostrophes do not count).
func FiledUnder(word string) string {
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
