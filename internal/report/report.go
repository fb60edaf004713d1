// Package report writes what a review comes to, for people and for programs: the
// style sheet, the list of emendations, the author queries, the rulings, what was
// passed over, and figures.
//
// Names says which reports there are and Write writes one. Each is a content: the
// same facts in Markdown to read, as TSV for a spreadsheet or the next manuscript,
// and as JSON, one object a line. A report says the same, byte for byte, for the
// same manuscript, lists and ledger.
//
// What comes from the manuscript is data. In Markdown its marks are escaped; in
// Markdown and TSV its control characters are shown as symbols, in JSON they are
// escaped. No cell of the TSV begins a formula, but for the rulings, which are
// written as the rule command reads them.
//
// Reports change nothing but that naming a form may add its entry to the docket,
// so the docket's own goroutine writes them.
package report

import (
	"bytes"
	"fmt"
	"io"
	"strings"

	"emendary/internal/docket"
)

// The formats of every report.
const (
	Markdown = "markdown"
	TSV      = "tsv"
	JSONL    = "jsonl"
)

// content is one report, its facts gathered and in order.
type content interface {
	markdown(p *page)
	tsv(t *table)
	jsonl(l *lines)
}

// kind is a report that can be asked for.
type kind struct {
	name     string
	standard string // the format where none is asked for
	gather   func(s *docket.Session) (content, error)
}

func kinds() []kind {
	return []kind{
		{"style-sheet", Markdown, gatherStyleSheet},
		{"emendations", Markdown, gatherEmendations},
		{"queries", Markdown, gatherQueries},
		{"rulings", TSV, gatherRulings},
		{"passed-over", Markdown, gatherPassed},
		{"figures", Markdown, gatherFigures},
	}
}

// Names returns the names of the reports, in the order in which help lists them.
func Names() []string {
	var names []string
	for _, k := range kinds() {
		names = append(names, k.name)
	}
	return names
}

// Formats returns the formats that every report can be written in.
func Formats() []string { return []string{Markdown, TSV, JSONL} }

// Write writes the named report on s to w, in one call of its Write. Format ""
// means the report's own: TSV for rulings, Markdown for all others. An unknown
// name or format is an error that says which there are; nothing is written then.
//
// It takes time and space in proportion to the manuscript and its rulings.
func Write(w io.Writer, s *docket.Session, name, format string) error {
	for _, k := range kinds() {
		if k.name != name {
			continue
		}
		if format == "" {
			format = k.standard
		}
		return write(w, s, k, format)
	}
	return fmt.Errorf("there is no report %.40q; there are %s", name, strings.Join(Names(), ", "))
}

func write(w io.Writer, s *docket.Session, k kind, format string) error {
	var to func(content, *bytes.Buffer)
	switch format {
	case Markdown:
		to = func(c content, b *bytes.Buffer) { c.markdown(&page{b}) }
	case TSV:
		to = func(c content, b *bytes.Buffer) { c.tsv(&table{b}) }
	case JSONL:
		to = func(c content, b *bytes.Buffer) { c.jsonl(&lines{b}) }
	default:
		return fmt.Errorf("there is no format %.40q; there are %s", format, strings.Join(Formats(), ", "))
	}
	c, err := k.gather(s)
	if err != nil {
		return fmt.Errorf("report %s: %w", k.name, err)
	}
	var b bytes.Buffer
	to(c, &b)
	if _, err := w.Write(b.Bytes()); err != nil {
		return fmt.Errorf("report %s: %w", k.name, err)
	}
	return nil
}
