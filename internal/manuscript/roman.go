package manuscript

import "strings"

// isRoman tells canonical Roman numerals in capitals, I to MMMCMXCIX, and the
// additive IIII, VIIII of old clocks and chapters.
func isRoman(s string) bool {
	if s == "" {
		return false
	}
	rest := strings.TrimLeft(s, "M")
	if len(s)-len(rest) > 3 {
		return false
	}
	for _, place := range []struct{ one, five, ten string }{{"C", "D", "M"}, {"X", "L", "C"}, {"I", "V", "X"}} {
		if cut, ok := strings.CutPrefix(rest, place.one+place.ten); ok {
			rest = cut
			continue
		}
		if cut, ok := strings.CutPrefix(rest, place.one+place.five); ok {
			rest = cut
			continue
		}
		rest = strings.TrimPrefix(rest, place.five)
		cut := strings.TrimLeft(rest, place.one)
		if len(rest)-len(cut) > 4 {
			return false
		}
		rest = cut
	}
	return rest == ""
}

// isRomanWord tells the words that read as numerals by themselves: two letters
// or more, all capitals or all small, and no word or abbreviation of their own.
// Small ones hold i, v, x and l only, as page numbers do, so that neither mix
// nor civil nor did is one. A single letter never is, least of all I.
func isRomanWord(s string) bool {
	if len(s) < 2 {
		return false
	}
	small := strings.Trim(s, "ivxl") == ""
	if !small && strings.Trim(s, "IVXLCDM") != "" {
		return false
	}
	switch s {
	case "MIX", "DIX", "MI", "DI", "LI", "MD", "DC", "CD", "CV", "MM", "CC", "CM", "MC", "ML", "CL", "DL", "LIV", "CIV", "DIV", "li", "liv":
		return false
	}
	return isRoman(strings.ToUpper(s))
}
