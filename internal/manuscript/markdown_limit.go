package manuscript

import (
	"fmt"
	"strings"
)

// What a Markdown file may hold at most. The parser takes time quadratic in the
// marks of a paragraph and in the notes of a file, and recurses once a level of
// nesting; these keep it to seconds, and no manuscript comes near them.
const (
	maxNesting = 100       // blocks within blocks
	maxMarks   = 10_000    // brackets, emphasis marks and the like in one paragraph
	maxCells   = 1_000_000 // of one table
	maxNotes   = 10_000
)

// checkMarkup names the first line at which the file goes beyond a limit. A
// paragraph here is what stands between lines that are blank or hold quotation
// markers only, so it may be more than one for the parser, never less.
func checkMarkup(source string) error {
	marks, bars, rows, notes := 0, 0, 0, 0
	for i, n := 0, 0; i < len(source); n++ {
		l := lineAt(source, i)
		line := source[l.start:l.end]
		indent := l.start - i
		i = l.next
		if strings.Trim(line, "> \t") == "" {
			marks, bars, rows = 0, 0, 0
		}
		if nesting(line, indent) > maxNesting {
			return fmt.Errorf("line %d: blocks nested more than %d deep; take out some of the markers at its start", n+1, maxNesting)
		}
		lineBars := 0
		for j := range len(line) {
			switch line[j] {
			case '[', ']', '*', '_', '`', '<', '~':
				marks++
			case '|':
				lineBars++
			}
		}
		bars = max(bars, lineBars)
		rows++
		if strings.Contains(line, "[^") && strings.Contains(line, "]:") {
			notes++
		}
		switch {
		case marks > maxMarks:
			return fmt.Errorf("line %d: more than %d marks of markup in one paragraph; part it with a blank line, or read the file with --format text", n+1, maxMarks)
		case bars > 1 && (bars+1)*rows > maxCells:
			return fmt.Errorf("line %d: a table of more than %d cells; part it with a blank line", n+1, maxCells)
		case notes > maxNotes:
			return fmt.Errorf("line %d: more than %d footnotes; split the manuscript into volumes", n+1, maxNotes)
		}
	}
	return nil
}

// nesting returns how many blocks a line opens or stands in at most: one for
// each marker at its start, and one for every two columns before the first.
func nesting(line string, indent int) int {
	depth := 0
	for depth <= maxNesting {
		number := strings.TrimLeft(line, "0123456789")
		switch {
		case strings.HasPrefix(line, ">"):
			line = line[1:]
		case strings.HasPrefix(line, "- "), strings.HasPrefix(line, "* "), strings.HasPrefix(line, "+ "):
			line = line[2:]
		case len(number) < len(line) && (strings.HasPrefix(number, ". ") || strings.HasPrefix(number, ") ")):
			line = number[2:]
		default:
			if depth > 0 {
				depth += indent / 2
			}
			return depth
		}
		line = strings.TrimLeft(line, " \t")
		depth++
	}
	return depth
}
