package manuscript

import (
	"sort"
	"strings"

	"github.com/yuin/goldmark/ast"
	"github.com/yuin/goldmark/parser"
	"github.com/yuin/goldmark/text"
)

// targetAttribute is the name under which linkParser leaves a link's target on
// its node, as an extent of the source.
const targetAttribute = "target"

// linkParser is the library's parser of links; it also notes where the target
// stands, which the library forgets.
type linkParser struct{ parser.InlineParser }

func (p linkParser) Parse(parent ast.Node, block text.Reader, pc parser.Context) ast.Node {
	_, before := block.Position()
	n := p.InlineParser.Parse(parent, block, pc)
	if n != nil && (n.Kind() == ast.KindLink || n.Kind() == ast.KindImage) {
		_, after := block.Position()
		n.SetAttributeString(targetAttribute, extent{before.Start + 1, after.Start})
	}
	return n
}

// CloseBlock makes text of the brackets that came to nothing.
func (p linkParser) CloseBlock(parent ast.Node, block text.Reader, pc parser.Context) {
	if closer, ok := p.InlineParser.(parser.CloseBlocker); ok {
		closer.CloseBlock(parent, block, pc)
	}
}

// inlineReader collects the text of one block.
type inlineReader struct {
	*markdownReader
	b      *block
	lines  *text.Segments
	italic bool // inside emphasis already
}

// walk adds the text of the inline nodes below n.
func (r *inlineReader) walk(n ast.Node) {
	for c := n.FirstChild(); c != nil; c = c.NextSibling() {
		switch node := c.(type) {
		case *ast.Text:
			last := lastOfRun(node)
			r.text(node.Segment.Start, last.Segment.Stop)
			if last.SoftLineBreak() || last.HardLineBreak() {
				r.lineBreak(last.Segment.Stop)
			}
			c = last
		case *ast.Emphasis:
			r.emphasis(node)
		case *ast.CodeSpan:
			r.code(node)
		case *ast.AutoLink:
			r.autoLink(node)
		case *ast.RawHTML:
			r.tag(node)
		default:
			r.walk(node)
			if target, ok := node.AttributeString(targetAttribute); ok {
				if t := target.(extent); t.start < t.end {
					r.passed = append(r.passed, passage{PassedLinkTarget, t.start, t.end})
				}
			}
		}
	}
}

// emphasis adds emphasised text; strong emphasis is no italics, nor is there
// any within italics.
func (r *inlineReader) emphasis(n *ast.Emphasis) {
	if r.italic || n.Level != 1 {
		r.walk(n)
		return
	}
	start := r.b.len()
	r.italic = true
	r.walk(n)
	r.italic = false
	r.b.italics = append(r.b.italics, extent{start, r.b.len()})
}

// lastOfRun returns the last of the text nodes that follow one another without
// a gap in the source. The parser cuts text wherever markup might have begun,
// so an escape or a reference may lie across the cut.
func lastOfRun(n *ast.Text) *ast.Text {
	for !n.SoftLineBreak() && !n.HardLineBreak() {
		next, ok := n.NextSibling().(*ast.Text)
		if !ok || next.Segment.Start != n.Segment.Stop || next.IsRaw() != n.IsRaw() {
			break
		}
		n = next
	}
	return n
}

// text adds bytes [start,end) of the source with escapes (CommonMark 0.31,
// section 2.4) and character references (section 2.5) decoded.
func (r *inlineReader) text(start, end int) {
	done := start
	for i := start; i < end; {
		c := r.source[i]
		if c != '\\' && c != '&' {
			i++
			continue
		}
		decoded, n := decodeMarkup(r.source[i:end])
		if n == 0 {
			i++
			continue
		}
		r.b.copy(r.source, done, i)
		r.b.put(decoded, i, i+n)
		i += n
		done = i
	}
	r.b.copy(r.source, done, end)
}

// lineBreak adds the line break that follows byte stop of the source: up to
// where the next line of the block starts, past the markers of the blocks
// around it.
func (r *inlineReader) lineBreak(stop int) {
	i := sort.Search(r.lines.Len(), func(i int) bool { return r.lines.At(i).Start > stop })
	if i < r.lines.Len() {
		r.b.line(r.source, stop, r.lines.At(i).Start)
	}
}

// code adds a code span as text without words.
func (r *inlineReader) code(n *ast.CodeSpan) {
	start := r.b.len()
	var passed passage
	for c := n.FirstChild(); c != nil; c = c.NextSibling() {
		t, ok := c.(*ast.Text)
		if !ok {
			continue
		}
		from := t.Segment.Start
		to := from + len(strings.TrimRight(r.source[from:t.Segment.Stop], "\r\n"))
		if passed.reason == "" {
			passed = passage{PassedCode, from, to}
		}
		passed.end = to
		r.b.copy(r.source, from, to)
		if to < t.Segment.Stop {
			r.lineBreak(to)
		}
	}
	if passed.reason != "" {
		r.passed = append(r.passed, passed)
	}
	r.b.skips = append(r.b.skips, extent{start, r.b.len()})
}

// autoLink adds an address in angle brackets as text without words.
func (r *inlineReader) autoLink(n *ast.AutoLink) {
	reason := PassedURL
	if n.AutoLinkType == ast.AutoLinkEmail {
		reason = PassedEmail
	}
	from := n.Pos() + 1
	to := min(from+len(n.Label(r.bytes)), len(r.source))
	start := r.b.len()
	r.b.copy(r.source, from, to)
	r.b.skips = append(r.b.skips, extent{start, r.b.len()})
	r.passed = append(r.passed, passage{reason, from, to})
}

// tag passes over a tag; one that breaks the line does so in the text too, or
// the words beside it would run together.
func (r *inlineReader) tag(n *ast.RawHTML) {
	if n.Segments.Len() == 0 {
		return
	}
	from, to := n.Segments.At(0).Start, n.Segments.At(n.Segments.Len()-1).Stop
	if strings.HasPrefix(strings.ToLower(r.source[from:to]), "<br") {
		r.b.put("\n", from, to)
	}
	r.passed = append(r.passed, passage{PassedHTML, from, to})
}
