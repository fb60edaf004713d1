package main

import (
	"bytes"
	"fmt"
	"math/rand/v2"
	"strings"
	"unicode"
)

// newForms is how many new unknown forms come with each further copy of the text:
// a longer book has more names and slips, though fewer for each page.
const newForms = 40

// grow returns a manuscript of that many words at least: base again and again, in each
// copy some words with a letter changed. The same base gives the same manuscript.
func grow(base []byte, words int) []byte {
	var out bytes.Buffer
	random := rand.New(rand.NewPCG(1, 2))
	for n, copies := 0, 0; n < words; copies++ {
		text := string(base)
		if copies > 0 {
			text = vary(text, random)
		}
		n += len(strings.Fields(text))
		out.WriteString(text + "\n\n")
	}
	return out.Bytes()
}

// vary changes a letter in some long words of a text.
func vary(text string, random *rand.Rand) string {
	fields := strings.SplitAfter(text, " ")
	var long []int
	for i, f := range fields {
		if w := strings.TrimSuffix(f, " "); len(w) > 6 && !strings.ContainsFunc(w, func(r rune) bool { return !unicode.IsLower(r) || r > unicode.MaxASCII }) {
			long = append(long, i)
		}
	}
	for range min(newForms, len(long)) {
		i := long[random.IntN(len(long))]
		at := 1 + random.IntN(4)
		fields[i] = fmt.Sprintf("%s%c%s", fields[i][:at], 'a'+rune(random.IntN(26)), fields[i][at+1:])
	}
	return strings.Join(fields, "")
}
