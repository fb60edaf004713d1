package manuscript

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

// maxHeading is the length in letters of the longest line taken for a heading.
const maxHeading = 70

// isTextHeading reports whether a line of plain text with blank lines before it
// and one after it (the file's ends count as such) is a heading:
//
//   - a division and its number, with or without a title: Chapter 3, PART TWO,
//     Book iv: The Mole;
//   - a division that needs no number, alone or before a point, colon or dash:
//     Prologue, Epilogue – The Mole Again;
//   - a number alone, in digits (at most three) or Roman capitals, with or
//     without a point: 7, XIV.
//   - all in capitals, four letters or more, after two blank lines at least.
//
// A line that ends like a sentence, or in a comma, is no heading unless it is
// one of the first three kinds without a title.
func isTextHeading(line string, blank int) bool {
	if blank < 1 || utf8.RuneCountInString(line) > maxHeading {
		return false
	}
	line = strings.Trim(line, "_* ")
	bare := strings.TrimRight(line, ".:")
	if isHeadingNumber(bare) {
		return true
	}
	first, rest, _ := strings.Cut(bare, " ")
	division := strings.ToLower(strings.TrimRight(first, ".:"))
	if bare == "" || endsSentence(line) && rest != "" && !isNumberName(rest) && !isHeadingNumber(rest) {
		return false
	}
	r, _ := utf8.DecodeRuneInString(line)
	if !unicode.IsUpper(r) {
		return false
	}
	if isNumberedDivision(division) {
		if numbered(rest) {
			return true
		}
	} else if isPlainDivision(division) {
		return rest == "" || strings.TrimRight(first, ".:") != first || strings.HasPrefix(rest, "–") || strings.HasPrefix(rest, "—") || strings.HasPrefix(rest, "- ")
	}
	return blank >= 2 && isShouted(line) && !endsSentence(line)
}

// numbered reports whether a heading goes on with a number after its division:
// Chapter 3; Part Two: The Mole; Part the Third.
func numbered(rest string) bool {
	if cut, ok := strings.CutPrefix(strings.ToLower(rest), "the "); ok {
		rest = rest[len(rest)-len(cut):]
	}
	number, title, _ := strings.Cut(rest, " ")
	bare := strings.TrimRight(number, ".:,—–")
	if !isHeadingNumber(strings.ToUpper(bare)) && !isNumberName(bare) {
		return false
	}
	// “Part two of the cargo was lost” is a sentence, not a heading.
	if title == "" || bare != number {
		return true
	}
	r, _ := utf8.DecodeRuneInString(title)
	return !unicode.IsLower(r)
}

func isNumberedDivision(word string) bool {
	switch word {
	case "chapter", "part", "book", "volume", "canto", "act", "scene", "letter", "section", "episode":
		return true
	}
	return false
}

func isPlainDivision(word string) bool {
	switch word {
	case "prologue", "epilogue", "preface", "foreword", "introduction", "afterword", "interlude",
		"appendix", "acknowledgements", "acknowledgments", "contents", "dedication", "coda":
		return true
	}
	return false
}

// isHeadingNumber tells numbers of up to three digits and Roman numerals.
func isHeadingNumber(s string) bool {
	if s == "" {
		return false
	}
	if len(s) <= 3 && strings.Trim(s, "0123456789") == "" {
		return true
	}
	return isRoman(s)
}

// isNumberName tells the names of the numbers up to a hundred, as far as their
// first member tells: One, Twenty-first.
func isNumberName(s string) bool {
	head, _, _ := strings.Cut(strings.ToLower(s), "-")
	switch head {
	case "one", "two", "three", "four", "five", "six", "seven", "eight", "nine", "ten",
		"eleven", "twelve", "thirteen", "fourteen", "fifteen", "sixteen", "seventeen", "eighteen", "nineteen",
		"twenty", "thirty", "forty", "fifty", "sixty", "seventy", "eighty", "ninety", "hundred",
		"first", "second", "third", "fourth", "fifth", "sixth", "seventh", "eighth", "ninth", "tenth",
		"eleventh", "twelfth", "last":
		return true
	}
	return false
}

func endsSentence(line string) bool {
	r, _ := utf8.DecodeLastRuneInString(line)
	return strings.ContainsRune(".!?,;…”’\"'", r)
}

// isShouted reports whether a line holds four letters or more, all capitals.
func isShouted(line string) bool {
	n := 0
	for _, r := range line {
		switch {
		case unicode.IsLower(r):
			return false
		case unicode.IsUpper(r):
			n++
		}
	}
	return n >= 4
}
