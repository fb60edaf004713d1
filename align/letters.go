package align

import (
	"strings"
	"sync"
	"unicode"
	"unicode/utf8"

	"github.com/rivo/uniseg"
	"golang.org/x/text/unicode/norm"
)

// Letter is a user-perceived character as a number: its code point where, in
// NFC, it is a single one, else a number above unicode.MaxRune that an Alphabet
// gave out. The functions of this package compare letters and nothing else, so
// any other numbered symbols will do.
type Letter int32

// firstNumber is the first letter that isn't a code point.
const firstNumber = Letter(unicode.MaxRune + 1)

// Alphabet numbers the letters that take more than one code point, such as n
// with a combining diaeresis, a flag, or CR LF. Numbers are given out in the
// order in which letters are first seen: they mean nothing to another Alphabet,
// and are not to be stored.
//
// The zero value is ready for use, by several goroutines at once; letters of one
// code point take no lock. An Alphabet keeps each letter it has numbered for as
// long as it lives. It must not be copied after first use.
type Alphabet struct {
	mu      sync.RWMutex
	numbers map[string]Letter // clusters[n-firstNumber] → n
	texts   []string          // in the order of their numbers
}

// Letters returns the letters of s: its extended grapheme clusters after NFC.
// Both are those of Unicode 15.0 or later, UAX #29 and UAX #15; NFC is that of
// golang.org/x/text, which also breaks runs of more than 30 combining marks by
// U+034F. A byte that is not UTF-8 counts as a letter (or a part of one) that is
// equal to that byte only.
//
// It takes O(|s|) time and space; s that is all ASCII is not looked up anywhere.
func (a *Alphabet) Letters(s string) []Letter {
	letters := make([]Letter, 0, len(s))
	if isPlain(s) {
		for i := range len(s) {
			letters = append(letters, Letter(s[i]))
		}
		return letters
	}
	for cluster := range clusters(norm.NFC.String(s)) {
		letters = append(letters, a.letter(cluster))
	}
	return letters
}

// Text returns the letters as a string, so that Text(Letters(s)...) is s in NFC.
// A number that a did not give out, and a code point that isn't a character, is
// written as U+FFFD.
func (a *Alphabet) Text(letters ...Letter) string {
	var b strings.Builder
	b.Grow(len(letters))
	for _, l := range letters {
		if l < firstNumber {
			b.WriteRune(rune(l))
		} else {
			b.WriteString(a.text(l))
		}
	}
	return b.String()
}

// letter returns the letter of one cluster in NFC.
func (a *Alphabet) letter(cluster string) Letter {
	r, size := utf8.DecodeRuneInString(cluster)
	if size == len(cluster) && (r != utf8.RuneError || size > 1) {
		return Letter(r)
	}
	a.mu.RLock()
	l, ok := a.numbers[cluster]
	a.mu.RUnlock()
	if ok {
		return l
	}
	a.mu.Lock()
	defer a.mu.Unlock()
	if l, ok := a.numbers[cluster]; ok {
		return l // another goroutine came first
	}
	if a.numbers == nil {
		a.numbers = make(map[string]Letter)
	}
	cluster = strings.Clone(cluster) // or it would keep the whole text alive
	l = firstNumber + Letter(len(a.texts))
	a.numbers[cluster] = l
	a.texts = append(a.texts, cluster)
	return l
}

// text returns the cluster that l, which isn't a code point, is the number of.
func (a *Alphabet) text(l Letter) string {
	a.mu.RLock()
	defer a.mu.RUnlock()
	if i := int(l - firstNumber); i < len(a.texts) {
		return a.texts[i]
	}
	return string(utf8.RuneError)
}

// isPlain reports whether each byte of s is a letter of its own: in ASCII, which
// is always in NFC, the only cluster of two code points is CR LF (UAX #29, GB3).
func isPlain(s string) bool {
	for i := range len(s) {
		if s[i] >= utf8.RuneSelf || s[i] == '\r' {
			return false
		}
	}
	return true
}

// clusters yields the extended grapheme clusters of s as it stands.
func clusters(s string) func(yield func(string) bool) {
	return func(yield func(string) bool) {
		state := -1
		for s != "" {
			var cluster string
			cluster, s, _, state = uniseg.FirstGraphemeClusterInString(s, state)
			if !yield(cluster) {
				return
			}
		}
	}
}
