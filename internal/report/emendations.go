package report

import (
	"fmt"
	"slices"

	"emendary/internal/docket"
	"emendary/internal/ledger"
)

// emendations is the list of emendations: every change, in manuscript order.
type emendations struct {
	manuscript string
	changes    []change
	unseen     int // citations that were never on screen
}

type change struct {
	place
	result string
	ruling *ledger.Ruling
	seen   bool
}

func gatherEmendations(s *docket.Session) (content, error) {
	out := &emendations{manuscript: s.Docket.Document.Title}
	for _, e := range s.Docket.Entries {
		for i, o := range e.Occurrences {
			if o.Ruling == nil || o.Ruling.Act != ledger.Accept {
				continue
			}
			c := change{place: placeOf(s, e, i), result: s.Docket.Result(e, i, o.Ruling.Word), ruling: o.Ruling}
			c.seen = seen(s, o.Ruling, c.place)
			if !c.seen {
				out.unseen++
			}
			out.changes = append(out.changes, c)
		}
	}
	slices.SortStableFunc(out.changes, func(a, b change) int { return byPlace(a.place, b.place) })
	return out, nil
}

func (e *emendations) markdown(p *page) {
	p.title("Emendations", e.manuscript)
	p.say("%s; %s never on screen.", number(len(e.changes), "emendation"), number(e.unseen, "citation"))
	part := 0
	for _, c := range e.changes {
		if c.part != part {
			part = c.part
			p.heading(partName(part, c.title))
		}
		r := c.ruling
		flag := ""
		if !c.seen {
			flag = "never on screen"
		}
		query := ""
		if r.Query != "" {
			query = "query to " + addressee(r.To)
		}
		p.item(fmt.Sprintf("%s: %s → %s", c.place, strong(c.form), strong(c.result)), c.quote(),
			join(" · ", escape(join(", ", string(r.Act), scope(r), r.EntryKind)), escape(query),
				escape(join(", ", r.Who, day(r.When))), flag))
	}
}

func (e *emendations) tsv(t *table) {
	t.row("part", "title", "line", "column", "before", "after", "left", "right", "setting",
		"form", "ruling", "word", "scope", "kind", "query", "who", "time", "seen")
	for _, c := range e.changes {
		r := c.ruling
		left, right := beside(c.place)
		t.row(c.part, c.title, c.line, c.column, c.form, c.result, left, right, c.setting,
			r.Form, r.Act, r.Word, r.Scope, r.EntryKind, r.Query, r.Who, stamp(r.When), yesNo(c.seen))
	}
}

func (e *emendations) jsonl(l *lines) {
	for _, c := range e.changes {
		r := c.ruling
		left, right := beside(c.place)
		l.add(struct {
			Part    int    `json:"part"`
			Title   string `json:"title"`
			Line    int    `json:"line"`
			Column  int    `json:"column"`
			Before  string `json:"before"`
			After   string `json:"after"`
			Left    string `json:"left"`
			Right   string `json:"right"`
			Setting string `json:"setting"`
			Form    string `json:"form"`
			Ruling  string `json:"ruling"`
			Word    string `json:"word"`
			Scope   string `json:"scope"`
			Kind    string `json:"kind"`
			Query   string `json:"query,omitempty"`
			Who     string `json:"who"`
			Time    string `json:"time"`
			Seen    bool   `json:"seen"`
		}{c.part, c.title, c.line, c.column, c.form, c.result, left, right, c.setting,
			r.Form, string(r.Act), r.Word, string(r.Scope), r.EntryKind, r.Query, r.Who, stamp(r.When), c.seen})
	}
}

// beside is up to forty code points on either side of a place.
func beside(p place) (left, right string) {
	before, after := []rune(p.before), []rune(p.after)
	return string(before[max(0, len(before)-40):]), string(after[:min(40, len(after))])
}

func partName(n int, title string) string {
	if title != "" {
		return title
	}
	return fmt.Sprintf("part %d", n)
}

func scope(r *ledger.Ruling) string {
	if r.Scope == ledger.Every {
		return "every occurrence"
	}
	return "checked occurrences"
}

func yesNo(b bool) string {
	if b {
		return "yes"
	}
	return "no"
}
