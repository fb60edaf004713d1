package manuscript

import (
	"fmt"
	"strings"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// texts reads Markdown and returns the text of its paragraphs, each after a
// letter for the setting of its first word: heading, quotation, t for a note,
// n for the others.
func texts(t *testing.T, source string) []string {
	t.Helper()
	d, err := Read("m.md", []byte(source), Options{Format: "markdown"})
	require.NoError(t, err)
	out := []string{}
	for _, p := range d.Paragraphs {
		setting := "-"
		if len(p.Words) > 0 {
			setting = map[Setting]string{Note: "t", Heading: "h", Quotation: "q"}[p.Words[0].Setting]
			if setting == "" {
				setting = "n"
			}
		}
		out = append(out, setting+" "+p.Text)
	}
	return out
}

// Source: the CommonMark specification 0.31.2, section named beside each; the
// extensions by common practice. Settings are ours.
func TestMarkdownProse(t *testing.T) {
	for _, test := range []struct{ section, source, want string }{
		{"2.1 line endings", "a\rb\r\nc\nd", "n a\nb\nc\nd"},
		{"2.4 backslash escapes", `\*not emphasised\* \é \\`, `n *not emphasised* \é \`},
		{"2.5 character references", "caf&eacute; caf&#233; caf&#xe9; &nosuch; &amp", "n café café café &nosuch; &amp"},
		{"2.5 references are no markup", "&#42;a&#42;", "n *a*"},
		{"2.5 invalid code points", "a&#0;b", "n a\uFFFDb"},
		{"4.1 thematic breaks", "a\n\n***\n\nb", "n a|n b"},
		{"4.2 ATX headings", "## The *Mole* ##\n", "h The Mole"},
		{"4.3 setext headings", "The\nMole\n===\n\nb\n---", "h The\nMole|h b"},
		{"4.4 indented code", "a\n\n    code\n\nb", "n a|n b"},
		{"4.5 fenced code", "a\n```go\ncode\n```\nb", "n a|n b"},
		{"4.6 HTML blocks", "<div>\nraw\n</div>\n\na", "n a"},
		{"4.7 link reference definitions", "[mole]: /url \"a title\"\n\n[mole]", "n mole"},
		{"4.8 paragraphs", "  a\n    b\n\n\nc", "n a\nb|n c"},
		{"5.1 block quotes", "> a\n> b\n\nc", "q a\nb|n c"},
		{"5.1 laziness", "> a\nb", "q a\nb"},
		{"5.1 nested", "> > a\n> b", "q a\nb"},
		{"5.2 list items", "- a\n- b\n\n  c\n1. d", "n a|n b|n c|n d"},
		{"6.1 code spans", "a `co de` b", "n a co de b"},
		{"6.2 emphasis inside a word", "har*b*our *harb*our", "n harbour harbour"},
		{"6.2 strong emphasis", "**a** b", "n a b"},
		{"6.3 links", "[the *mole*](http://a.b \"c\") [x][y]\n\n[y]: z", "n the mole x"},
		{"6.4 images", "![the mole](mole.png)", "n the mole"},
		{"6.5 autolinks", "<https://a.example/b> <a@b.example>", "- https://a.example/b a@b.example"},
		{"6.6 raw HTML", "har<b>b</b>our a<br>b", "n harbour a\nb"},
		{"6.7 hard line breaks", "a  \nb\\\nc", "n a\nb\nc"},
		{"6.8 soft line breaks", "a \n b", "n a\nb"},
		{"tables", "| a | b |\n|---|---|\n| *c* | d\\|e |\n", "n a|n b|n c|n d|e"},
		{"strikethrough", "~~a~~ b", "n a b"},
		{"footnotes stay in their place", "a[^1] b[^2]\n\n[^2]: two\n\n    more\n\nc\n\n[^1]: one\n[^9]: nobody’s\n", "n a b|t two|t more|n c|t one|t nobody’s"},
		{"definition lists", "Mole\n: a wall in the sea", "n Mole|n a wall in the sea"},
	} {
		assert.Equal(t, test.want, strings.Join(texts(t, test.source), "|"), test.section)
	}
}

func TestMarkdownPassesOver(t *testing.T) {
	source := "---\ntitle: A Lamp\n---\n\n[mole]: /url \"t\"\n\na `x` [b](c \"d\") ![e](f) <https://g.example> <h@i.example> <b>j</b> [mole][mole]\n\n```\nk\n```\n\n    l\n\n<div>\nm\n</div>\n\nhttps://n.example `o`s\n"
	d, err := Read("m.md", []byte(source), Options{})
	require.NoError(t, err)
	var got []string
	for _, p := range d.Passed {
		got = append(got, p.Reason+" "+p.Text)
		assert.Equal(t, p.Text, source[p.Span.Start:p.Span.End])
	}
	assert.Equal(t, []string{
		"front matter ---\ntitle: A Lamp\n---", "link target [mole]: /url \"t\"", "code x", "link target (c \"d\")", "link target (f)",
		"URL https://g.example", "e-mail address h@i.example", "HTML <b>", "HTML </b>", "link target [mole]", "code k", "code l",
		"HTML <div>\nm\n</div>", "URL https://n.example", "code o",
	}, got)
	var words []string
	for _, p := range d.Paragraphs {
		for _, w := range p.Words {
			words = append(words, w.Text)
		}
	}
	assert.Equal(t, "a b e j mole", strings.Join(words, " "))
}

// The rule is ours, stated at markdownFormat and Document.Title.
func TestMarkdownPartsAndTitle(t *testing.T) {
	for _, test := range []struct{ rule, source, title, parts string }{
		{"one heading of level 1 before others is the title", "# A Lamp\n\nBy Pell\n\n## One\n\na\n\n## Two\n\n### Three\n\nb", "A Lamp", "=0 One=2 Two=4"},
		{"several headings of level 1 open parts", "# One\n\na\n\n## x\n\n# Two\n\nb", "One", "One=0 Two=3"},
		{"one heading of level 1 alone opens a part", "# One\n\na", "One", "One=0"},
		{"text before the first heading is a part without title", "a\n\n## One\n\nb", "m", "=0 One=1"},
		{"no heading", "a\n\nb", "m", "=0"},
		{"front matter gives the title", "---\ntitle: \"The Mole\"\n---\n# One\n\na\n\n# Two", "The Mole", "One=0 Two=2"},
		{"front matter of the other kind", "+++\ntitle = 'The Mole'\n[params]\n+++\n\na", "The Mole", "=0"},
		{"a thematic break is no front matter", "---\nIt was late.\n---\n\na", "m", "It was late.=0"},
		{"a heading in a quotation opens nothing", "> # One\n\na\n\n## Two", "m", "=0 Two=2"},
		{"emphasis and line breaks in a title", "The *long*\nmole\n===\n\na\n\n# b", "The long mole", "The long mole=0 b=2"},
	} {
		d, err := Read("dir/m.md", []byte(test.source), Options{Format: "markdown"})
		require.NoError(t, err)
		var parts []string
		for _, p := range d.Parts {
			parts = append(parts, fmt.Sprintf("%s=%d", p.Title, p.First))
		}
		assert.Equal(t, test.title, d.Title, test.rule)
		assert.Equal(t, test.parts, strings.Join(parts, " "), test.rule)
		for i, p := range d.Paragraphs {
			assert.True(t, d.Parts[p.Part].First <= i && (p.Part+1 == len(d.Parts) || i < d.Parts[p.Part+1].First), test.rule)
		}
	}
}

func TestMarkdownSettings(t *testing.T) {
	d, err := Read("m.md", []byte("# *One*\n\n*a* **b** “*c*” *d *e* f*\n\n> *g* “h”\n>\n> # i\n\n[^1]: “j”\n\n    > k\n"), Options{})
	require.NoError(t, err)
	got := map[string]Setting{}
	for _, p := range d.Paragraphs {
		for _, w := range p.Words {
			got[w.Text] = w.Setting
		}
	}
	assert.Equal(t, map[string]Setting{"One": Heading, "a": Italics, "b": Narration, "c": Speech, "d": Italics, "e": Italics, "f": Italics,
		"g": Quotation, "h": Quotation, "i": Heading, "j": Note, "k": Note}, got)
}

// Text that makes naive parsers slow or deep is read in moderate time or refused
// with a line.
func TestMarkdownDoesNotHang(t *testing.T) {
	nested := ""
	for i := range 400 {
		nested += strings.Repeat("  ", i) + "- a\n"
	}
	for _, test := range []struct{ name, source, refused string }{
		{"quotation marks", strings.Repeat(">", 100_000), "m.md: line 1: blocks nested more than 100 deep"},
		{"list markers", strings.Repeat("- ", 100_000), "m.md: line 1: blocks nested more than 100 deep"},
		{"nested lists", nested, "m.md: line 101: blocks nested more than 100 deep"},
		{"brackets", strings.Repeat("[", 100_000), "m.md: line 1: more than 10000 marks"},
		{"links", "a\n\n" + strings.Repeat("[a](", 100_000), "m.md: line 3: more than 10000 marks"},
		{"emphasis", strings.Repeat("*a_ ", 100_000), "m.md: line 1: more than 10000 marks"},
		{"cells", strings.Repeat("a|", 5000) + "\n" + strings.Repeat("-|", 5000) + strings.Repeat("\n|a", 5000), "m.md: line 200: a table of more than 1000000 cells"},
		{"notes", strings.Repeat("[^a]: b\n\n", 10_001), "m.md: line 20001: more than 10000 footnotes"},
		{"most brackets", strings.Repeat("[a](", 3333), ""},
		{"most emphasis", strings.Repeat("*a_ ", 5000), ""},
		{"most nesting", strings.Repeat("> ", 100) + "a", ""},
		{"many italics", strings.Repeat("*a* ", 5000), ""},
		{"many lines", strings.Repeat("a\n", 20_000), ""},
	} {
		start := time.Now()
		_, err := Read("m.md", []byte(test.source), Options{})
		if test.refused == "" {
			assert.NoError(t, err, test.name)
		} else if assert.Error(t, err, test.name) {
			assert.Contains(t, err.Error(), test.refused, test.name)
		}
		assert.Less(t, time.Since(start), 30*time.Second, test.name)
	}
}
