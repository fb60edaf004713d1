package report

import (
	"bytes"
	"fmt"

	"emendary/internal/docket"
	"emendary/internal/ledger"
)

// rulings is the rulings in force, as the rule command reads them.
type rulings struct {
	manuscript string
	text       []byte // the TSV
	lines      []docket.Line
}

// gatherRulings reads back what the docket writes, so that all formats say what
// the TSV says.
func gatherRulings(s *docket.Session) (content, error) {
	var b bytes.Buffer
	if err := s.Docket.WriteLines(&b); err != nil {
		return nil, err
	}
	read, err := docket.ReadLines(bytes.NewReader(b.Bytes()), "rulings")
	if err != nil {
		return nil, err
	}
	return &rulings{s.Docket.Document.Title, b.Bytes(), read}, nil
}

func (r *rulings) markdown(p *page) {
	p.title("Rulings", r.manuscript)
	p.say("%s in force.", number(len(r.lines), "ruling"))
	for _, act := range acts() {
		var of []docket.Line
		for _, l := range r.lines {
			if l.Act == act {
				of = append(of, l)
			}
		}
		if len(of) == 0 {
			continue
		}
		p.heading(fmt.Sprintf("%s · %d", act, len(of)))
		for _, l := range of {
			p.item(join(" → ", strong(l.Form), strong(l.Word)), escape(describe(l)))
		}
	}
}

// describe says in one line all of a ruling but form, act and word.
func describe(l docket.Line) string {
	scope := "every occurrence"
	if l.Scope == ledger.Checked {
		scope = join(" ", number(len(l.Places), "occurrence")+":", join(", ", l.Places...))
		if len(l.Places) == 0 {
			scope = "checked occurrences"
		}
	}
	list, query := "", ""
	if l.List != "" {
		list = l.List + " list"
	}
	if l.Query != "" {
		query = "query to " + addressee(l.To) + ": " + l.Query
	}
	return join(" · ", join(", ", list, l.Kind, scope), l.Note, query, join(", ", l.Who, day(l.When)))
}

// acts is the acts that can be in force, in the order of the reports.
func acts() []ledger.Act {
	return []ledger.Act{ledger.Accept, ledger.Reject, ledger.Add, ledger.Query, ledger.Later, ledger.Unfold}
}

func (r *rulings) tsv(t *table) { t.Write(r.text) }

func (r *rulings) jsonl(l *lines) {
	for _, x := range r.lines {
		l.add(struct {
			Form   string   `json:"form"`
			Ruling string   `json:"ruling"`
			Word   string   `json:"word,omitempty"`
			List   string   `json:"list,omitempty"`
			Scope  string   `json:"scope"`
			Places []string `json:"places,omitempty"`
			Kind   string   `json:"kind,omitempty"`
			Note   string   `json:"note,omitempty"`
			Query  string   `json:"query,omitempty"`
			To     string   `json:"to,omitempty"`
			Who    string   `json:"who,omitempty"`
			Time   string   `json:"time,omitempty"`
		}{x.Form, string(x.Act), x.Word, x.List, string(x.Scope), x.Places, x.Kind, x.Note, x.Query, x.To, x.Who, stamp(x.When)})
	}
}
