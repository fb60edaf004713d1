package manuscript

import (
	"fmt"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// The rules are ours, stated at textFormat and isTextHeading.
func TestPlainTextParagraphs(t *testing.T) {
	long := strings.Repeat("The gun spoke. ", 20)
	for _, test := range []struct{ rule, source, want string }{
		{"blank lines part", "a\nb\n\n \t \nc\n", "a\nb|c"},
		{"CR LF and CR end lines", "a\r\nb\r\n\r\nc\rd\r\re", "a\nb|c\nd|e"},
		{"an indented line after one without indent parts", "a\nb\n  c\nd\n\te", "a\nb|c\nd|e"},
		{"but not within a word", "a har-\n  bour", "a har-\nbour"},
		{"space at the ends of a line is no text", "  a  \n b", "a\nb"},
		{"unwrapped lines are paragraphs", long + "\n“Yes.”\n" + long, strings.TrimSpace(long) + "|“Yes.”|" + strings.TrimSpace(long)},
		{"rows of signs are dropped", "a\n\n* * *\n\n---\n\nb", "a|b"},
		{"marks of italics are no text", "a _b c_ *d*, e_f **g** _h", "a b c d, e_f **g** _h"},
		{"marks of italics across lines", "a _b\nc_ d", "a b\nc d"},
		{"no mark closes after a space", "a * b * c", "a * b * c"},
		{"nothing but signs", "* * *", ""},
	} {
		d, err := Read("m.txt", []byte(test.source), Options{Format: "text"})
		require.NoError(t, err)
		var got []string
		for _, p := range d.Paragraphs {
			got = append(got, p.Text)
		}
		assert.Equal(t, test.want, strings.Join(got, "|"), test.rule)
	}
}

func TestPlainTextHeadings(t *testing.T) {
	headings := []string{"Chapter 3", "CHAPTER ONE", "Chapter One.", "PART TWO", "Part the Third", "Book iv: The Mole", "Chapter 1 The Gun", "Prologue",
		"Epilogue – The Mole Again", "XIV", "XIV.", "7", "7.", "Act II, The Quay", "Section 12 – Water"}
	others := []string{"Part two of the cargo was lost", "Chapter of accidents", "I went.", "1914", "He left.", "Introduction to the trade of the quay",
		"Chapter 3 was never found, and nobody looked for it.", "chapter 3", "Letter from home", strings.Repeat("Chapter 3 ", 10)}
	for _, line := range headings {
		assert.True(t, isTextHeading(line, 1), line)
		assert.False(t, isTextHeading(line, 0), line)
	}
	for _, line := range others {
		assert.False(t, isTextHeading(line, 2), line)
	}
	assert.True(t, isTextHeading("THE MOLE", 2))
	assert.False(t, isTextHeading("THE MOLE", 1), "a sign within a scene")
	assert.False(t, isTextHeading("NO LANDING!", 2), "ends like a sentence")
}

func TestPlainTextPartsAndSettings(t *testing.T) {
	source := "A Lamp\n\nChapter One\n\nIt was late.\n\n    Dear Pell,\n    come at once.\n\nChapter Two\n\nb\n"
	d, err := Read("dir/a lamp.txt", []byte(source), Options{})
	require.NoError(t, err)
	assert.Equal(t, "a lamp", d.Title)
	assert.Equal(t, []Part{{"", 0}, {"Chapter One", 1}, {"Chapter Two", 4}}, d.Parts)
	var got []string
	for _, p := range d.Paragraphs {
		got = append(got, fmt.Sprint(p.Part, " ", p.Words[0].Setting, " ", p.Words[0].Traits&HeadingWord != 0))
	}
	assert.Equal(t, []string{"0 narration false", "1 heading true", "1 narration false", "1 quotation false", "2 heading true", "2 narration false"}, got)
}

func TestFormatGoesByContentAndName(t *testing.T) {
	for _, test := range []struct{ path, source, want string }{
		{"m.md", "plain words", "markdown"},
		{"m.txt", "plain words", "text"},
		{"m.txt", "# not a heading", "text"},
		{"m.txt", "# One\n\n## Two\n\nsee [this](that) and **that**\n", "markdown"},
		{"m", "plain words", "text"},
		{"m", "# One\n\na", "markdown"},
		{"m", "---\ntitle: x\n---\na", "markdown"},
		{"m.draft", "a ```b", "text"},
	} {
		d, err := Read(test.path, []byte(test.source), Options{})
		require.NoError(t, err)
		assert.Equal(t, test.want, d.Format, "%s %q", test.path, test.source)
	}
}
