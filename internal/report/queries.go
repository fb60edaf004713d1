package report

import (
	"cmp"
	"slices"

	"emendary/internal/docket"
	"emendary/internal/ledger"
)

// queries is the questions in force, by addressee, then by first place.
type queries struct {
	manuscript string
	asked      []query
}

type query struct {
	ruling  ledger.Ruling
	places  []place
	present bool // the manuscript as it is now has the places
}

// addressee is whom a query asks; one that names nobody asks the author.
func addressee(to string) string { return cmp.Or(to, "author") }

// rankOf orders addressees: author, publisher, self, then any other.
func rankOf(to string) int {
	if i := slices.Index([]string{"author", "publisher", "self"}, addressee(to)); i >= 0 {
		return i
	}
	return 3
}

func gatherQueries(s *docket.Session) (content, error) {
	out := &queries{manuscript: s.Docket.Document.Title}
	on := ruled(s)
	for _, r := range s.Docket.Rulings() {
		if r.Query == "" {
			continue
		}
		q := query{ruling: r, places: on[r.ID], present: true}
		if len(q.places) == 0 {
			// A later ruling covers it, or the manuscript changed: the question
			// stands nevertheless.
			q.places = recorded(r)
			q.present = r.Manuscript == s.Docket.Document.SHA256
		}
		out.asked = append(out.asked, q)
	}
	slices.SortStableFunc(out.asked, func(a, b query) int {
		return cmp.Or(cmp.Compare(rankOf(a.ruling.To), rankOf(b.ruling.To)),
			cmp.Compare(addressee(a.ruling.To), addressee(b.ruling.To)), byPlace(a.first(), b.first()))
	})
	return out, nil
}

func (q query) first() place {
	if len(q.places) == 0 {
		return place{}
	}
	return q.places[0]
}

// rides is what the query goes with.
func (q query) rides() string {
	r := q.ruling
	switch r.Act {
	case ledger.Accept:
		return "emended to " + r.Word
	case ledger.Reject:
		return "let stand"
	case ledger.Add:
		return "added to the " + cmp.Or(r.List, "book") + " list"
	case ledger.Later:
		return "put off"
	}
	return "asked alone"
}

func (q *queries) markdown(p *page) {
	p.title("Queries", q.manuscript)
	p.say("%s.", number(len(q.asked), "query"))
	group := ""
	for i, a := range q.asked {
		if to := addressee(a.ruling.To); i == 0 || to != group {
			group = to
			p.heading("to " + to)
		}
		more := []string{}
		for _, at := range a.places {
			name := join(", ", partName(at.part, at.title), at.String())
			if !a.present {
				name += ", not in the manuscript as it is now"
			}
			more = append(more, escape(name)+": "+at.quote())
		}
		more = append(more, escape(join(" · ", a.rides(), join(", ", a.ruling.Who, day(a.ruling.When)))))
		p.item(strong(a.ruling.Form)+": "+escape(a.ruling.Query), more...)
	}
}

func (q *queries) tsv(t *table) {
	t.row("to", "part", "title", "line", "column", "form", "left", "text", "right", "query", "ruling", "word", "who", "time")
	q.each(func(a query, at place) {
		r := a.ruling
		left, right := beside(at)
		t.row(addressee(r.To), at.part, at.title, at.line, at.column, r.Form, left, at.form, right,
			r.Query, r.Act, r.Word, r.Who, stamp(r.When))
	})
}

// each calls f for every place of every query; one without places has an empty one.
func (q *queries) each(f func(query, place)) {
	for _, a := range q.asked {
		if len(a.places) == 0 {
			f(a, place{})
		}
		for _, at := range a.places {
			f(a, at)
		}
	}
}

func (q *queries) jsonl(l *lines) {
	type spot struct {
		Part   int    `json:"part"`
		Title  string `json:"title"`
		Line   int    `json:"line"`
		Column int    `json:"column"`
		Left   string `json:"left"`
		Text   string `json:"text"`
		Right  string `json:"right"`
	}
	for _, a := range q.asked {
		spots := []spot{}
		for _, at := range a.places {
			left, right := beside(at)
			spots = append(spots, spot{at.part, at.title, at.line, at.column, left, at.form, right})
		}
		r := a.ruling
		l.add(struct {
			To     string `json:"to"`
			Form   string `json:"form"`
			Query  string `json:"query"`
			Ruling string `json:"ruling"`
			Word   string `json:"word,omitempty"`
			Places []spot `json:"places"`
			Found  bool   `json:"found"`
			Who    string `json:"who"`
			Time   string `json:"time"`
		}{addressee(r.To), r.Form, r.Query, string(r.Act), r.Word, spots, a.present, r.Who, stamp(r.When)})
	}
}
