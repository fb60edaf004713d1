package report

import (
	"cmp"
	"slices"

	"emendary/internal/docket"
)

// passed is what was passed over as no prose of the manuscript.
type passed struct {
	manuscript string
	reasons    []reason
	stretches  []stretch
}

type reason struct {
	name  string
	count int
}

type stretch struct {
	reason, text string
	line, column int
	start, end   int // bytes of the file
}

func gatherPassed(s *docket.Session) (content, error) {
	doc := s.Docket.Document
	out := &passed{manuscript: doc.Title}
	counts := map[string]int{}
	for _, p := range doc.Passed {
		line, column := doc.Position(p.Span.Start)
		out.stretches = append(out.stretches, stretch{p.Reason, p.Text, line, column, p.Span.Start, p.Span.End})
		counts[p.Reason]++
	}
	for name, n := range counts {
		out.reasons = append(out.reasons, reason{name, n})
	}
	slices.SortFunc(out.reasons, func(a, b reason) int {
		return cmp.Or(cmp.Compare(b.count, a.count), cmp.Compare(a.name, b.name))
	})
	return out, nil
}

func (q *passed) markdown(p *page) {
	p.title("Passed over", q.manuscript)
	p.say("%s.", number(len(q.stretches), "stretch"))
	for _, r := range q.reasons {
		p.heading(r.name + " · " + number(r.count, "time"))
		for _, s := range q.stretches {
			if s.reason == r.name {
				p.item(place{line: s.line, column: s.column}.String() + ": " + escape(shorten(oneLine(s.text), 60)))
			}
		}
	}
}

func (q *passed) tsv(t *table) {
	t.row("reason", "line", "column", "start", "end", "text")
	for _, s := range q.stretches {
		t.row(s.reason, s.line, s.column, s.start, s.end, s.text)
	}
}

func (q *passed) jsonl(l *lines) {
	for _, s := range q.stretches {
		l.add(struct {
			Reason string `json:"reason"`
			Line   int    `json:"line"`
			Column int    `json:"column"`
			Span   [2]int `json:"span"`
			Text   string `json:"text"`
		}{s.reason, s.line, s.column, [2]int{s.start, s.end}, s.text})
	}
}
