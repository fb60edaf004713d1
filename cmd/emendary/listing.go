package main

import (
	"encoding/json"
	"fmt"
	"io"
	"math"
	"strconv"
	"strings"

	"emendary/internal/docket"
	"emendary/internal/manuscript"
	"emendary/ui/text"
)

// formats are the forms in which entries and candidates are listed.
var formats = []string{"table", "tsv", "jsonl"}

// listed is an entry or a word with its candidates, as the listings give it.
type listed struct {
	Form       string
	Kind       docket.Kind // of an entry
	Status     string      // of a word
	Slip       float64     // of an entry: the probability that it is one
	Candidates []listedCandidate
	Places     []listedPlace
}

// listedCandidate is one candidate in a line of JSON.
type listedCandidate struct {
	Word   string   `json:"word"`
	Cost   float64  `json:"cost"`            // two decimals: a hundredth of a bit is nothing
	Share  *float64 `json:"share,omitempty"` // nil where words were not weighed
	remark string
}

// listedPlace is where an occurrence stands.
type listedPlace struct {
	Part   int    `json:"part"` // from 1
	Line   int    `json:"line"` // from 1
	Column int    `json:"column"`
	Span   [2]int `json:"span"` // bytes of the file, half open
}

func listCandidates(found []docket.Candidate) []listedCandidate {
	out := make([]listedCandidate, len(found))
	for i, c := range found {
		share := rounded(c.Share)
		out[i] = listedCandidate{Word: c.Text, Cost: math.Round(100*c.Cost) / 100, Share: &share, remark: c.Remark}
	}
	return out
}

// rounded keeps four decimals: more would be noise.
func rounded(x float64) float64 { return math.Round(x*1e4) / 1e4 }

// listPlaces returns the open occurrences of an entry.
func listPlaces(d *docket.Docket, e *docket.Entry) []listedPlace {
	out := make([]listedPlace, 0, len(e.Occurrences))
	for i, o := range e.Occurrences {
		if o.Ruling == nil {
			out = append(out, placeOf(d.Document, o.Paragraph, d.Span(e, i)))
		}
	}
	return out
}

func placeOf(doc *manuscript.Document, paragraph int, span manuscript.Span) listedPlace {
	line, column := doc.Position(span.Start)
	return listedPlace{doc.Paragraphs[paragraph].Part + 1, line, column, [2]int{span.Start, span.End}}
}

// writeJSON writes v as one line.
func writeJSON(w io.Writer, v any) error {
	e := json.NewEncoder(w)
	e.SetEscapeHTML(false)
	return e.Encode(v)
}

// entryLister writes entries of the docket in one of the formats.
type entryLister struct {
	w      io.Writer
	format string
	width  int // of the forms in a table
}

// widest bounds the column of forms; longer ones push their line to the right.
const widest = 32

// newEntryLister writes what stands above the entries.
func newEntryLister(w io.Writer, format string, entries []*docket.Entry) *entryLister {
	l := &entryLister{w, format, len("form")}
	for _, e := range entries {
		l.width = max(l.width, min(text.Width(shown(e.Form)), widest))
	}
	switch format {
	case "table":
		if len(entries) > 0 {
			l.row("form", "kind", "count", "slip", "first", "candidates")
		}
	case "tsv":
		fmt.Fprintln(w, "form\tkind\tcount\tslip\tcandidates\tplaces")
	}
	return l
}

func (l *entryLister) row(form, kind, count, slip, first, candidates string) {
	line := text.Pad(form, l.width) + "  " + text.Pad(kind, 15) + "  " + text.PadLeft(count, 5) + "  " +
		text.PadLeft(slip, 5) + "  " + text.Pad(first, 9) + "  " + candidates
	fmt.Fprintln(l.w, strings.TrimRight(line, " "))
}

// write writes one entry.
func (l *entryLister) write(e listed) error {
	switch l.format {
	case "jsonl":
		return writeJSON(l.w, struct {
			Form       string            `json:"form"`
			Kind       docket.Kind       `json:"kind"`
			Count      int               `json:"count"`
			Slip       float64           `json:"slip"`
			Candidates []listedCandidate `json:"candidates"`
			Places     []listedPlace     `json:"places"`
		}{e.Form, e.Kind, len(e.Places), e.Slip, e.Candidates, e.Places})
	case "tsv":
		var names, places []string
		for _, c := range e.Candidates {
			names = append(names, docket.Cell(c.Word))
		}
		for _, p := range e.Places {
			places = append(places, p.String())
		}
		_, err := fmt.Fprintf(l.w, "%s\t%s\t%d\t%s\t%s\t%s\n", docket.Cell(e.Form), e.Kind, len(e.Places), number(e.Slip), strings.Join(names, ", "), strings.Join(places, " "))
		return err
	}
	var candidates []string
	for _, c := range e.Candidates {
		candidates = append(candidates, shown(c.Word)+c.share(" %s"))
	}
	first := ""
	if len(e.Places) > 0 {
		first = e.Places[0].String()
	}
	form := shown(e.Form)
	if e.Kind == docket.Passage {
		form = text.Cut(form, l.width, "…")
	}
	l.row(form, string(e.Kind), strconv.Itoa(len(e.Places)), text.Percent(e.Slip), first, strings.Join(candidates, ", "))
	return nil
}

func (p listedPlace) String() string { return fmt.Sprintf("%d:%d", p.Line, p.Column) }

// share returns the share in per cent, laid out by format; "" where there is none.
func (c listedCandidate) share(format string) string {
	if c.Share == nil {
		return ""
	}
	return fmt.Sprintf(format, text.Percent(*c.Share))
}

// wordLister writes words with their candidates in one of the formats.
type wordLister struct {
	w       io.Writer
	format  string
	started bool
}

// write writes one word.
func (l *wordLister) write(e listed) error {
	first := !l.started
	l.started = true
	switch l.format {
	case "jsonl":
		return writeJSON(l.w, struct {
			Form       string            `json:"form"`
			Candidates []listedCandidate `json:"candidates"`
		}{e.Form, e.Candidates})
	case "tsv":
		if first {
			fmt.Fprintln(l.w, "form\tword\tcost\tshare")
		}
		for _, c := range e.Candidates {
			share := ""
			if c.Share != nil {
				share = number(*c.Share)
			}
			fmt.Fprintf(l.w, "%s\t%s\t%s\t%s\n", docket.Cell(e.Form), docket.Cell(c.Word), number(c.Cost), share)
		}
		return nil
	}
	if !first {
		fmt.Fprintln(l.w)
	}
	l.block(e)
	return nil
}

// block writes a word and its candidates under it, in columns.
func (l *wordLister) block(e listed) {
	head := shown(e.Form)
	if e.Status != "" {
		head += "  (" + e.Status + ")"
	}
	fmt.Fprintln(l.w, head)
	if len(e.Candidates) == 0 {
		fmt.Fprintln(l.w, "  no candidates")
	}
	width, decimals := 0, 0
	for _, c := range e.Candidates {
		if c.Cost != math.Trunc(c.Cost) {
			decimals = 1 // bits
		}
		width = max(width, text.Width(shown(c.Word)))
	}
	for _, c := range e.Candidates {
		line := "  " + text.Pad(shown(c.Word), width) + text.PadLeft(strconv.FormatFloat(c.Cost, 'f', decimals, 64), 6) + text.PadLeft(c.share("%s"), 8) + "  " + shown(c.remark)
		fmt.Fprintln(l.w, strings.TrimRight(line, " "))
	}
}

func number(x float64) string { return strconv.FormatFloat(x, 'f', -1, 64) }
