package manuscript

import (
	"path/filepath"
	"slices"
	"strings"

	"github.com/yuin/goldmark/ast"
	"github.com/yuin/goldmark/extension"
	extast "github.com/yuin/goldmark/extension/ast"
	"github.com/yuin/goldmark/parser"
	"github.com/yuin/goldmark/text"
	"github.com/yuin/goldmark/util"
)

// markdownFormat reads CommonMark with tables, strikethrough, footnotes and
// definition lists.
//
// Parts: let L be the highest level among the headings that stand in no other
// block. If the only heading of level L comes before all others, and there are
// others, it is the manuscript's title, and the parts begin at the headings of
// the highest level below it; else they begin at those of level L.
//
// Prose is the text of headings, paragraphs, list items, table cells,
// definitions, notes, links and the alternative text of images. Passed over are
// code, raw HTML, automatic links, the targets of links, and front matter.
// Code and automatic links inside a paragraph stay in its text, without words;
// tags do not, except that <br> reads as a line break.
type markdownFormat struct{}

func (markdownFormat) name() string { return "markdown" }

func (markdownFormat) recognise(path, text string) int {
	sure := 0
	switch strings.ToLower(filepath.Ext(path)) {
	case ".md", ".markdown", ".mdown", ".mkd":
		sure = 50
	}
	if end, _ := frontMatter(text); end > 0 {
		sure += 20
	}
	for _, sign := range []struct {
		text string
		sure int
	}{{"\n# ", 20}, {"\n## ", 20}, {"\n```", 20}, {"\n====", 15}, {"](", 15}, {"\n[^", 15}, {"\n> ", 5}, {"**", 5}} {
		if strings.Contains(text, sign.text) {
			sure += sign.sure
		}
	}
	if strings.HasPrefix(text, "# ") {
		sure += 20
	}
	return sure
}

func (markdownFormat) read(source string) (reading, error) {
	if err := checkMarkup(source); err != nil {
		return reading{}, err
	}
	front, title := frontMatter(source)
	r := markdownReader{source: source, bytes: parsable(source, front)}
	r.title = title
	if front > 0 {
		r.passed = append(r.passed, passage{PassedFrontMatter, 0, len(strings.TrimRight(source[:front], "\r\n"))})
	}
	r.walk(newMarkdownParser().Parse(text.NewReader(r.bytes)), Narration)
	// Footnotes are gathered by the parser where the first one stands.
	slices.SortStableFunc(r.found, func(a, b foundBlock) int { return a.start - b.start })
	r.openParts()
	for i := range r.found {
		r.blocks = append(r.blocks, *r.found[i].block)
	}
	return r.reading, nil
}

// newMarkdownParser returns a parser without the library's automatic links,
// which this package finds itself in every format, and without its reordering
// of footnotes.
func newMarkdownParser() parser.Parser {
	return parser.NewParser(
		parser.WithBlockParsers(append(parser.DefaultBlockParsers(),
			util.Prioritized(extension.NewDefinitionListParser(), 101),
			util.Prioritized(extension.NewDefinitionDescriptionParser(), 102),
			util.Prioritized(extension.NewFootnoteBlockParser(), 999),
		)...),
		parser.WithInlineParsers(
			util.Prioritized(parser.NewCodeSpanParser(), 100),
			util.Prioritized(extension.NewFootnoteParser(), 101),
			util.Prioritized(linkParser{parser.NewLinkParser()}, 200),
			util.Prioritized(parser.NewAutoLinkParser(), 300),
			util.Prioritized(parser.NewRawHTMLParser(), 400),
			util.Prioritized(parser.NewEmphasisParser(), 500),
			util.Prioritized(extension.NewStrikethroughParser(), 500),
		),
		parser.WithParagraphTransformers(append(parser.DefaultParagraphTransformers(),
			util.Prioritized(extension.NewTableParagraphTransformer(), 200),
		)...),
		parser.WithASTTransformers(util.Prioritized(extension.NewTableASTTransformer(), 0)),
	)
}

// parsable returns the source as the parser takes it, every byte in its place:
// front matter blank, and a lone CR, which ends a line in CommonMark (section
// 2.1) but not for the parser, as LF.
func parsable(source string, front int) []byte {
	out := []byte(source)
	for i, c := range out {
		switch {
		case c == '\r' && (i+1 == len(out) || out[i+1] != '\n'):
			out[i] = '\n'
		case i < front && c != '\n':
			out[i] = ' '
		}
	}
	return out
}

// foundBlock is a block with what the choice of parts needs to know.
type foundBlock struct {
	*block
	start int // where its text starts in the source
	level int // of a heading that stands in no other block, else 0
}

type markdownReader struct {
	reading
	source string
	bytes  []byte // the source as it was parsed
	found  []foundBlock
}

// walk collects the blocks below n, which stand in the given setting.
func (r *markdownReader) walk(n ast.Node, setting Setting) {
	for c := n.FirstChild(); c != nil; c = c.NextSibling() {
		switch c := c.(type) {
		case *ast.Heading:
			level := 0
			if n.Kind() == ast.KindDocument {
				level = c.Level
			}
			r.block(c, Heading, level)
		case *ast.Paragraph, *ast.TextBlock, *extast.TableCell, *extast.DefinitionTerm:
			r.block(c, setting, 0)
		case *ast.CodeBlock, *ast.FencedCodeBlock:
			r.pass(PassedCode, c.Lines(), -1)
		case *ast.HTMLBlock:
			r.pass(PassedHTML, c.Lines(), c.ClosureLine.Stop)
		case *ast.LinkReferenceDefinition:
			r.pass(PassedLinkTarget, c.Lines(), -1)
		case *ast.Blockquote:
			if setting == Note {
				r.walk(c, Note)
			} else {
				r.walk(c, Quotation)
			}
		case *extast.Footnote:
			r.walk(c, Note)
		default:
			r.walk(c, setting)
		}
	}
}

// pass records a block that is passed over: its lines, and what follows them
// up to stop.
func (r *markdownReader) pass(reason string, lines *text.Segments, stop int) {
	if lines.Len() == 0 {
		return
	}
	start := lines.At(0).Start
	stop = max(stop, lines.At(lines.Len()-1).Stop)
	stop = start + len(strings.TrimRight(r.source[start:stop], "\r\n"))
	r.passed = append(r.passed, passage{reason, start, stop})
}

// block collects one block of prose; one without text is left out.
func (r *markdownReader) block(n ast.Node, setting Setting, level int) {
	b := &block{setting: setting}
	inline := inlineReader{markdownReader: r, b: b, lines: n.Lines()}
	inline.walk(n)
	if b.len() > 0 {
		r.found = append(r.found, foundBlock{b, int(b.pieces[0].start), level})
	}
}

// openParts applies the rule for parts, and takes the title from the first
// heading of level 1 where front matter gives none.
func (r *markdownReader) openParts() {
	var count, first [7]int
	order := 0
	for i, f := range r.found {
		if f.level == 0 {
			continue
		}
		if count[f.level]++; count[f.level] == 1 {
			order++
			first[f.level] = order
		}
		if f.level == 1 && r.title == "" {
			r.title = strings.Join(strings.Fields(r.found[i].string()), " ")
		}
	}
	var levels []int
	for level := 1; level <= 6; level++ {
		if count[level] > 0 {
			levels = append(levels, level)
		}
	}
	if len(levels) == 0 {
		return
	}
	opening := levels[0]
	if len(levels) > 1 && count[opening] == 1 && first[opening] == 1 {
		opening = levels[1]
	}
	for _, f := range r.found {
		f.opensPart = f.level == opening
	}
}
