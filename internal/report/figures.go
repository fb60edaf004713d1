package report

import (
	"strconv"

	"emendary/internal/docket"
	"emendary/internal/ledger"
	"emendary/lexicon"
)

// figures is counts, in groups, in the order in which they are read.
type figures struct {
	manuscript string
	rows       []figure
}

type figure struct {
	group, name string
	value       int
}

func (f *figures) add(group, name string, value int) {
	f.rows = append(f.rows, figure{group, name, value})
}

func gatherFigures(s *docket.Session) (content, error) {
	d := s.Docket
	f := &figures{manuscript: d.Document.Title}
	f.add("manuscript", "words", d.Size())
	f.add("manuscript", "distinct forms", len(d.Forms()))
	f.add("manuscript", "parts", len(d.Document.Parts))
	f.add("manuscript", "paragraphs", len(d.Document.Paragraphs))
	f.add("manuscript", "passed over", len(d.Document.Passed))
	f.entries(d)
	tally := d.Tally()
	f.add("docket", "open", tally.Open)
	f.add("docket", "put off", tally.PutOff)
	f.add("docket", "ruled", tally.Ruled)
	f.rulings(d)
	f.parts(d)
	for _, v := range lexicon.Varieties() {
		f.add("variety attested", v.String(), s.Attested[v])
	}
	return f, nil
}

func (f *figures) entries(d *docket.Docket) {
	kinds := []docket.Kind{docket.UnknownForm, docket.OtherVariety, docket.BarredWord, docket.Join, docket.Passage, docket.WordInContext}
	counts := map[docket.Kind]int{}
	for _, e := range d.Entries {
		if e.Kind != docket.WordInContext || len(e.Rulings()) > 0 {
			counts[e.Kind]++
		}
	}
	for _, k := range kinds {
		f.add("entries", string(k), counts[k])
	}
}

func (f *figures) rulings(d *docket.Docket) {
	counts := map[ledger.Act]int{}
	queries := map[string]int{}
	asked := 0
	for _, r := range d.Rulings() {
		counts[r.Act]++
		if r.Query != "" {
			queries[addressee(r.To)]++
			asked++
		}
	}
	for _, a := range acts() {
		f.add("rulings", string(a), counts[a])
	}
	f.add("rulings", "places not found again", len(d.Unplaced))
	f.add("queries", "all", asked)
	for _, to := range []string{"author", "publisher", "self"} {
		f.add("queries", to, queries[to])
	}
}

// parts counts words, places on the docket still open and emendations of each part.
func (f *figures) parts(d *docket.Docket) {
	type counts struct{ words, open, emended int }
	parts := make([]counts, len(d.Document.Parts))
	for _, p := range d.Document.Paragraphs {
		parts[p.Part].words += len(p.Words)
	}
	all := 0
	for _, e := range d.Entries {
		for _, o := range e.Occurrences {
			c := &parts[d.Document.Paragraphs[o.Paragraph].Part]
			switch {
			case o.Ruling == nil && e.Kind != docket.WordInContext:
				c.open++
			case o.Ruling != nil && o.Ruling.Act == ledger.Accept:
				c.emended++
				all++
			}
		}
	}
	f.add("emendations", "all", all)
	for i, c := range parts {
		name := partName(i+1, d.Document.Parts[i].Title)
		f.add(name, "words", c.words)
		f.add(name, "open places", c.open)
		f.add(name, "emendations", c.emended)
	}
}

func (f *figures) markdown(p *page) {
	p.title("Figures", f.manuscript)
	group := ""
	for i, r := range f.rows {
		if i == 0 || r.group != group {
			group = r.group
			p.heading(group)
		}
		p.item(escape(r.name) + ": " + strconv.Itoa(r.value))
	}
}

func (f *figures) tsv(t *table) {
	t.row("group", "figure", "value")
	for _, r := range f.rows {
		t.row(r.group, r.name, r.value)
	}
}

func (f *figures) jsonl(l *lines) {
	for _, r := range f.rows {
		l.add(struct {
			Group  string `json:"group"`
			Figure string `json:"figure"`
			Value  int    `json:"value"`
		}{r.group, r.name, r.value})
	}
}
