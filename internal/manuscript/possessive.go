package manuscript

import (
	"strings"
	"unicode/utf8"
)

// Base splits a possessive off: "harber’s" is "harber" and "’s", "pilots’" is
// "pilots" and "’". The apostrophe may be straight, curly or turned. A word
// that is no possessive is its own base; what ends in ’s for is or has (it’s)
// cannot be told from one.
func Base(text string) (base, possessive string) {
	stem := text
	if n := len(stem); n > 0 && (stem[n-1] == 's' || stem[n-1] == 'S') {
		stem = stem[:n-1]
	}
	r, n := utf8.DecodeLastRuneInString(stem)
	cut := stem[:len(stem)-n]
	if !strings.ContainsRune("'’‘ʼ", r) || strings.Trim(cut, "'’‘ʼ") == "" {
		return text, ""
	}
	if stem == text && strings.IndexByte("sSxXzZ", cut[len(cut)-1]) < 0 {
		return text, ""
	}
	return cut, text[len(cut):]
}
