package report

import "emendary/internal/docket"

// groups is the letter groups of a style sheet, in order, by their first letters.
func groups() []string { return []string{"A–D", "E–H", "I–L", "M–P", "Q–T", "U–Z", other} }

// other is the group of what begins with no Latin letter.
const other = "Other"

// groupOf returns the letter group of a word: by its first letter, whatever
// apostrophes and accents stand at it (’tis under T, Évora under E).
func groupOf(word string) string {
	key := docket.FiledUnder(word)
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
