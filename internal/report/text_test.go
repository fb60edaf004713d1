package report

import (
	"bytes"
	"encoding/json"
	"html"
	"regexp"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"github.com/yuin/goldmark"
	"github.com/yuin/goldmark/extension"
)

var tag = regexp.MustCompile(`<[^>]*>`)

// shown is what a reader of the Markdown sees.
func shown(t testing.TB, markdown string) string {
	var b bytes.Buffer
	md := goldmark.New(goldmark.WithExtensions(extension.Strikethrough, extension.Table))
	require.NoError(t, md.Convert([]byte(markdown), &b))
	return strings.Join(strings.Fields(html.UnescapeString(tag.ReplaceAllString(b.String(), ""))), " ")
}

func FuzzEscapedTextReadsAsItIs(f *testing.F) {
	for _, s := range []string{
		"", "a|b", "*a* _b_ `c`", "<b>&amp;</b>", "[x](y)", "# x #", "- a", "1. a", "1) b", "+ c", "===", "~~x~~",
		`back\slash\`, "\x00\x1b[31m\x7f", "\u202egnol", "\xff", "a\n\nb", "![i](u)", "---", "‘tis", "***", "\u0085",
	} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, s string) {
		var b bytes.Buffer
		p := &page{&b}
		p.item("7:1: "+strong("x"), "", lineStart(escape(s)))
		want := strings.Join(strings.Fields("7:1: x "+oneLine(s)), " ")
		assert.Equal(t, want, shown(t, b.String()), b.String())
	})
}

func FuzzJSONKeepsEveryCharacterAndShowsNoControl(f *testing.F) {
	for _, s := range []string{"", "\x1b[2J", "\u202e", "\U000e0041", "a\"b\\", "\u2028", "é\u0085"} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, s string) {
		s = strings.ToValidUTF8(s, "?")
		var b bytes.Buffer
		(&lines{&b}).add(map[string]string{"text": s})
		var back map[string]string
		require.NoError(t, json.Unmarshal(b.Bytes(), &back))
		assert.Equal(t, s, back["text"])
		line := strings.TrimSuffix(b.String(), "\n")
		assert.Equal(t, strings.ReplaceAll(strings.ReplaceAll(line, "\u200c", ""), "\u200d", ""), visible(line))
	})
}

func TestCells(t *testing.T) {
	for _, c := range []struct{ text, want string }{
		{"plain", "plain"},
		{"a\tb\r\nc", "a b c"},
		{"=SUM(A1)", "'=SUM(A1)"},
		{"+1", "'+1"},
		{"-x", "'-x"},
		{"@x", "'@x"},
		{" =x", "'=x"},
		{"\x00\x1f\x7f", "␀␟␡"},
		{"\u0085\u009b", "\uFFFD"}, // U+0085 is white space to Unicode
		{"a=b", "a=b"},
	} {
		assert.Equal(t, c.want, cell(c.text), "%q", c.text)
	}
}

func TestLetterGroups(t *testing.T) {
	for _, c := range []struct{ word, group string }{
		{"Aldergast", "A–D"}, {"Évora", "E–H"}, {"’tis", "Q–T"}, {"Łódź", "I–L"}, {"Øster", "M–P"}, {"æther", "A–D"},
		{"þing", "Q–T"}, {"zebra", "U–Z"}, {"Москва", other}, {"1900s", other}, {"", other}, {"’", other}, {"ﬁre", "E–H"},
	} {
		assert.Equal(t, c.group, groupOf(c.word), c.word)
	}
}

func TestCitationsAreCutBetweenWords(t *testing.T) {
	p := place{before: "- " + strings.Repeat("word ", 12) + "“", form: "*harber*", after: ",” he said, " + strings.Repeat("and ", 12)}
	q := p.quote()
	assert.True(t, strings.HasPrefix(q, "… word "), q)
	assert.True(t, strings.HasSuffix(q, "and …"), q)
	assert.Contains(t, q, `“**\*harber\***,” he said`)
}

func TestPlacesKeepLittleOfALongParagraph(t *testing.T) {
	for _, unit := range []string{"a", "é", "字"} {
		text := strings.Repeat(unit, 3000)
		for _, end := range []bool{true, false} {
			got := near(text, end)
			assert.InDelta(t, nearby, len(got), 3, unit)
			assert.True(t, strings.HasPrefix(text, got) || strings.HasSuffix(text, got), unit)
		}
		assert.Equal(t, unit, near(unit, true))
	}
	assert.Len(t, near(strings.Repeat("é", 3000), true), nearby)
	assert.Len(t, near("a"+strings.Repeat("é", 3000), false), nearby+1)
}
