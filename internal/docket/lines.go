package docket

import (
	"bufio"
	"fmt"
	"io"
	"strings"
	"time"

	"emendary/internal/ledger"
)

// Line is one ruling made elsewhere: a row of the TSV that the rule command reads
// and the rulings report writes.
type Line struct {
	Number                      int // in its file, from 1
	Form, Word                  string
	Act                         ledger.Act
	List, Kind, Note, Query, To string
	Scope                       ledger.Scope
	Places                      []string // of scope checked: line:column of each occurrence
	Who                         string
	When                        time.Time // zero where the line gives none
}

// columns are those of the TSV, in the order in which they are written. The first
// three are needed, the rest may be left out or stand in any order.
var columns = []string{"form", "ruling", "word", "list", "scope", "place", "kind", "note", "query", "to", "who", "time"}

// longestLine bounds what one line of rulings may hold, in bytes.
const longestLine = 1 << 20

// ReadLines reads rulings from TSV with a header line; # starts a comment line.
// Columns of other names are the writer's own and are passed over. A line that it
// can't read is an error, which names file and line.
func ReadLines(r io.Reader, name string) ([]Line, error) {
	scanner := bufio.NewScanner(r)
	scanner.Buffer(nil, longestLine)
	var header []string
	var out []Line
	for n := 1; scanner.Scan(); n++ {
		text := strings.TrimRight(strings.TrimPrefix(scanner.Text(), "\ufeff"), "\r")
		if strings.TrimSpace(text) == "" || strings.HasPrefix(text, "#") {
			continue
		}
		cells := strings.Split(text, "\t")
		if header == nil {
			if err := checkHeader(cells); err != nil {
				return nil, fmt.Errorf("%s: line %d: %w", name, n, err)
			}
			header = cells
			continue
		}
		line, err := readLine(header, cells)
		if err != nil {
			return nil, fmt.Errorf("%s: line %d: %w", name, n, err)
		}
		line.Number = n
		out = append(out, line)
	}
	if err := scanner.Err(); err != nil {
		return nil, fmt.Errorf("%s: %w", name, err)
	}
	if header == nil {
		return nil, fmt.Errorf("%s: no header line; begin with the columns form, ruling and word, parted by tabs", name)
	}
	return out, nil
}

func checkHeader(cells []string) error {
	seen := map[string]bool{}
	for _, c := range cells {
		seen[c] = true
	}
	for _, c := range columns[:3] {
		if !seen[c] {
			return fmt.Errorf("no column %q in the header; begin with the columns form, ruling and word, parted by tabs", c)
		}
	}
	return nil
}

func readLine(header, cells []string) (Line, error) {
	line := Line{Scope: ledger.Every}
	if len(cells) > len(header) {
		return line, fmt.Errorf("%d cells under %d columns; take the extra tabs out", len(cells), len(header))
	}
	var err error
	for i, cell := range cells {
		cell = strings.TrimSpace(cell)
		switch header[i] {
		case "form":
			line.Form = plainApostrophe(cell)
		case "ruling":
			line.Act, err = readAct(cell)
		case "word":
			line.Word = cell
		case "list":
			line.List, err = oneOf("list", cell, "", "book", "series", "house")
		case "scope":
			var scope string
			scope, err = oneOf("scope", cell, "", string(ledger.Every), string(ledger.Checked))
			if scope != "" {
				line.Scope = ledger.Scope(scope)
			}
		case "place":
			line.Places = strings.Fields(cell)
		case "kind":
			line.Kind = cell
		case "note":
			line.Note = cell
		case "query":
			line.Query = cell
		case "to":
			line.To = cell
		case "who":
			line.Who = cell
		case "time":
			if cell != "" {
				line.When, err = time.Parse(time.RFC3339Nano, cell)
			}
		}
		if err != nil {
			return line, err
		}
	}
	return line, line.check()
}

func readAct(cell string) (ledger.Act, error) {
	act, err := oneOf("ruling", cell, string(ledger.Accept), string(ledger.Reject), string(ledger.Add),
		string(ledger.Query), string(ledger.Later), string(ledger.Unfold))
	return ledger.Act(act), err
}

func oneOf(column, cell string, allowed ...string) (string, error) {
	for _, a := range allowed {
		if cell == a {
			return cell, nil
		}
	}
	return "", fmt.Errorf("%s %q is not one of %s", column, cell, strings.TrimPrefix(strings.Join(allowed, ", "), ", "))
}

func (l Line) check() error {
	switch {
	case l.Form == "":
		return fmt.Errorf("no form; give the form that the ruling is on")
	case l.Act == ledger.Accept && l.Word == "":
		return fmt.Errorf("accept without a word; give the word that takes the place of %s", l.Form)
	case l.Act == ledger.Query && l.Query == "":
		return fmt.Errorf("query without a question; add a column query that asks it")
	case l.Scope == ledger.Checked && len(l.Places) == 0:
		return fmt.Errorf("scope checked without places; give them as line:column in a column place")
	}
	return nil
}

// WriteLines writes the rulings in force as the TSV that ReadLines reads: where
// a later ruling took over some places of an earlier one, each is written for
// the places it still rules, and places outrank scope every on the way back.
func (d *Docket) WriteLines(w io.Writer) error {
	b := bufio.NewWriter(w)
	fmt.Fprintln(b, strings.Join(columns, "\t"))
	for _, e := range d.Entries {
		for _, r := range e.rulings {
			places := d.ruledBy(e, r)
			if len(places) == 0 && (r.Act != ledger.Later || !e.PutOff()) {
				continue
			}
			at := ""
			if r.Scope == ledger.Checked {
				at = strings.Join(places, " ")
			}
			fmt.Fprintln(b, strings.Join([]string{
				Cell(r.Form), string(r.Act), Cell(r.Word), r.List, string(r.Scope), at,
				Cell(r.Kind), Cell(r.Note), Cell(r.Query), Cell(r.To), Cell(r.Who), r.When.UTC().Format(time.RFC3339Nano),
			}, "\t"))
		}
	}
	return b.Flush()
}

// ruledBy returns the places of e where r is in force, as line:column: for a
// query alone all that it asks about, whatever else was ruled there.
func (d *Docket) ruledBy(e *Entry, r *ledger.Ruling) (places []string) {
	if r.Act == ledger.Query {
		for _, i := range d.placed(e, r) {
			places = append(places, d.at(e, i))
		}
		return places
	}
	for i := range e.Occurrences {
		if now := e.Occurrences[i].Ruling; now != nil && now.ID == r.ID {
			places = append(places, d.at(e, i))
		}
	}
	return places
}

// at is occurrence i of e as line:column.
func (d *Docket) at(e *Entry, i int) string {
	line, column := d.Document.Position(d.Span(e, i).Start)
	return fmt.Sprintf("%d:%d", line, column)
}

// Cell is s as a cell of TSV: tabs and line ends are spaces.
func Cell(s string) string {
	return strings.NewReplacer("\t", " ", "\r\n", " ", "\n", " ", "\r", " ").Replace(s)
}
