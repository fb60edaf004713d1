package manuscript

import (
	"runtime"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// Paragraphs whose text is no one stretch of the file (line breaks of two bytes)
// are copied while they are collected; the collector must find all of them whole.
func TestALongTextOfManyPiecesSurvivesTheCollector(t *testing.T) {
	paragraph := "The pilot saw the\r\nharbour freeze at\r\ndawn."
	text := strings.Repeat(paragraph+"\r\n\r\n", 20_000)
	doc, err := Read("novel.txt", []byte(text), Options{})
	require.NoError(t, err)
	runtime.GC()
	require.Len(t, doc.Paragraphs, 20_000)
	for i := range doc.Paragraphs {
		if doc.Paragraphs[i].Text != "The pilot saw the\nharbour freeze at\ndawn." {
			assert.Fail(t, "paragraph changed", "%d: %q", i, doc.Paragraphs[i].Text)
		}
	}
}
