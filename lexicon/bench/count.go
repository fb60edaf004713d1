package bench

import (
	"errors"
	"fmt"
	"os"
	"strings"
	"unicode"

	"github.com/rivo/uniseg"

	"emendary/internal/manuscript"
)

// Counting is one way to split a text into words and to count how often each
// stands in it. A word is a segment of UAX #29 that holds a letter or a digit.
type Counting struct {
	Name string
	// Count returns how many different words there are, and calls found, unless it
	// is nil, with each of them and its count.
	Count func(text string, found func(word string, count int)) int
}

// Countings returns our way and the peer's: the segments of
// github.com/rivo/uniseg and a Go map.
//
// Both cut as the standard does, so that the counts can be compared. What the
// program makes of the segments beyond that, tailored to prose, the peer has no
// counterpart of: Reading measures it.
func Countings() []Counting {
	return []Counting{
		{"manuscript.CountSegments", func(text string, found func(string, int)) int {
			counts := manuscript.CountSegments(text)
			if found != nil {
				for word, n := range counts.All {
					found(word, n)
				}
			}
			return counts.Len()
		}},
		{"rivo/uniseg and a Go map", func(text string, found func(string, int)) int {
			counts := map[string]int{}
			for state := -1; text != ""; {
				var word string
				word, text, state = uniseg.FirstWordInString(text, state)
				if strings.IndexFunc(word, isWordRune) >= 0 {
					counts[word]++
				}
			}
			if found != nil {
				for word, n := range counts {
					found(word, n)
				}
			}
			return len(counts)
		}},
	}
}

func isWordRune(r rune) bool { return unicode.IsLetter(r) || unicode.IsNumber(r) }

// Reading is all that the program does to the bytes of a manuscript in plain text
// before it counts, and the counting: decoding, paragraphs, marks of italics,
// addresses, apostrophes told from quotes, speech, hyphens and line ends, sentence
// starts, traits and faults. Its words are fewer than the segments, since hyphens
// join them (harbour-master), or more, since points and underscores may part them.
func Reading(text []byte) (words, different int, err error) {
	doc, err := manuscript.Read("text", text, manuscript.Options{Format: "text"})
	if err != nil {
		return 0, 0, err
	}
	var counts manuscript.Table[int]
	for i := range doc.Paragraphs {
		for j := range doc.Paragraphs[i].Words {
			*counts.At(doc.Paragraphs[i].Words[j].Text)++
			words++
		}
	}
	return words, counts.Len(), nil
}

// Prose returns the text of a file, over and over until it has so many words
// parted by space.
func Prose(path string, words int) (string, error) {
	data, err := os.ReadFile(path)
	if err != nil {
		return "", fmt.Errorf("%w; name a text to count", err)
	}
	n := len(strings.Fields(string(data)))
	if n == 0 {
		return "", errors.New(path + ": no words; name a text to count")
	}
	return strings.Repeat(string(data)+"\n\n", (words+n-1)/n), nil
}

// SameCounts reports, by an error, where two ways do not count the same.
func SameCounts(text string, a, b Counting) error {
	counts := map[string]int{}
	a.Count(text, func(word string, n int) { counts[word] = n })
	var differ error
	different := b.Count(text, func(word string, n int) {
		if counts[word] != n {
			differ = fmt.Errorf("%q: %s counts %d, %s %d", word, a.Name, counts[word], b.Name, n)
		}
	})
	if differ == nil && different != len(counts) {
		differ = fmt.Errorf("%s finds %d words, %s %d", a.Name, len(counts), b.Name, different)
	}
	return differ
}
