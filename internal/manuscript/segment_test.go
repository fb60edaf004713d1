package manuscript

import (
	"os"
	"strconv"
	"strings"
	"testing"

	"github.com/rivo/uniseg"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// breakTest reads a file of break tests in the format of the Unicode Character
// Database: ÷ 0061 × 0308 ÷, # comment.
func breakTest(t *testing.T, path, version string) [][]string {
	data, err := os.ReadFile(path)
	require.NoError(t, err)
	require.Contains(t, string(data), version, "the library's own Unicode version")
	var tests [][]string
	for _, line := range strings.Split(string(data), "\n") {
		line, _, _ = strings.Cut(line, "#")
		if line = strings.TrimSpace(line); line == "" {
			continue
		}
		var segments []string
		for _, field := range strings.Split(strings.Trim(line, "÷ "), "÷") {
			var b strings.Builder
			for _, code := range strings.Fields(strings.ReplaceAll(field, "×", " ")) {
				r, err := strconv.ParseUint(code, 16, 32)
				require.NoError(t, err)
				b.WriteRune(rune(r))
			}
			segments = append(segments, b.String())
		}
		tests = append(tests, segments)
	}
	return tests
}

func collect(text string) []string {
	var got []string
	segments(text, 0, func(g segment) { got = append(got, text[g.start:g.end]) })
	return got
}

// Source: WordBreakTest-15.0.0.txt of the Unicode Character Database.
func TestSegmentsPassUnicodeWordBreakTest(t *testing.T) {
	tests := breakTest(t, "testdata/WordBreakTest.txt", "WordBreakTest-15.0.0.txt")
	require.Greater(t, len(tests), 1800)
	for _, want := range tests {
		assert.Equal(t, want, collect(strings.Join(want, "")))
	}
}

// Source: GraphemeBreakTest-15.0.0.txt of the Unicode Character Database.
func TestLettersPassUnicodeGraphemeBreakTest(t *testing.T) {
	tests := breakTest(t, "../../align/testdata/GraphemeBreakTest.txt", "GraphemeBreakTest-15.0.0.txt")
	require.Greater(t, len(tests), 600)
	for _, want := range tests {
		var got []string
		for rest := strings.Join(want, ""); rest != ""; {
			n := letterLength(rest)
			got = append(got, rest[:n])
			rest = rest[n:]
		}
		assert.Equal(t, want, got)
	}
}

// The quick path for ASCII agrees with the library over every string of up to
// five characters of an alphabet with one of each kind that matters.
func TestPlainRunsAgreeWithTheLibrary(t *testing.T) {
	alphabet := []string{"a", "1", "_", "'", ".", ",", ":", " ", "-", "\"", "\n", "\u00AD", "é", "’", "A", ";", "\r", "—", "\u0301", "×", "\u05D0"}
	var walk func(text string, left int)
	walk = func(text string, left int) {
		var want []string
		for rest, state := text, -1; rest != ""; {
			var segment string
			segment, rest, state = uniseg.FirstWordInString(rest, state)
			want = append(want, segment)
		}
		if got := collect(text); strings.Join(got, "|") != strings.Join(want, "|") {
			assert.Equal(t, want, got, "%q", text)
		}
		if left == 0 || t.Failed() {
			return
		}
		for _, c := range alphabet {
			walk(text+c, left-1)
		}
	}
	walk("", 4)
}
