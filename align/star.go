package align

// Grid is a star alignment: several alignments of one form, one in each row, laid
// over common columns.
type Grid struct {
	Columns []Column
	Rows    [][]Cell // one for each alignment, each with one Cell for each column
}

// Column is the place of a letter of the form, or one opened by an insertion.
type Column struct {
	Form int // the index of the letter in the form; below 0 if the column was opened
}

// Cell is what a row has in a column. The To parts of a row joined are its word.
//
//   - Agreement, substitution and deletion are in the column of their letter.
//   - An inserted letter has an opened column to itself; those of one gap fill
//     its columns from the left. An opened column that the row does not use holds
//     an Agreement with To empty.
//   - A transposition, and a replacement of several letters, is one cell that
//     covers the columns of its letters and any column opened between them.
type Cell struct {
	Op   Op
	To   []Letter
	Span int // how many columns the cell covers; 0 if one to the left covers this one
}

// Star lays alignments of form over common columns: those of the letters of form
// and, before, between and after them, as many opened ones as the row with the
// most letters inserted there needs. Agreements, insertions and deletions of
// several letters are taken letter by letter.
//
// All alignments must be of form; where edits are missing, or outside form, the
// row holds agreements with To empty.
//
// It takes O(columns) time and space for each alignment.
func Star(form []Letter, alignments []Alignment) Grid {
	widths := gaps(len(form), alignments)
	places := make([]int, len(form)) // the column of each letter
	var columns []Column
	for i, width := range widths {
		for range width {
			columns = append(columns, Column{Form: -1})
		}
		if i < len(form) {
			places[i] = len(columns)
			columns = append(columns, Column{Form: i})
		}
	}
	rows := make([][]Cell, len(alignments))
	for r, a := range alignments {
		rows[r] = make([]Cell, len(columns))
		for c := range rows[r] {
			rows[r][c].Span = 1
		}
		for _, e := range a.Edits {
			if fits(e, len(form)) {
				place(rows[r], places, widths, e)
			}
		}
	}
	return Grid{Columns: columns, Rows: rows}
}

// gaps returns the most letters that any alignment inserts before each of n
// letters of a form, and after the last.
func gaps(n int, alignments []Alignment) []int {
	widths := make([]int, n+1)
	for _, a := range alignments {
		width := make(map[int]int)
		for _, e := range a.Edits {
			if e.Op == Insertion && fits(e, n) {
				width[e.I] += len(e.To)
				widths[e.I] = max(widths[e.I], width[e.I])
			}
		}
	}
	return widths
}

// fits reports whether e is an edit of a form of n letters.
func fits(e Edit, n int) bool {
	if e.Op == Insertion {
		return e.I >= 0 && e.I <= n && len(e.From) == 0
	}
	return e.I >= 0 && len(e.From) > 0 && len(e.From) <= n-e.I
}

// place sets the cells of one edit. The edits to its left are placed already.
func place(row []Cell, places, widths []int, e Edit) {
	switch e.Op {
	case Insertion:
		c := len(row) // the end of the gap
		if e.I < len(places) {
			c = places[e.I]
		}
		c -= widths[e.I]
		for c < len(row) && row[c].Op == Insertion {
			c++ // taken by an insertion before this one
		}
		for k := range e.To {
			row[c+k] = Cell{Op: Insertion, To: e.To[k : k+1], Span: 1}
		}
	case Agreement:
		for k := range min(len(e.From), len(e.To)) {
			row[places[e.I+k]] = Cell{Op: Agreement, To: e.To[k : k+1], Span: 1}
		}
	case Deletion:
		for k := range e.From {
			row[places[e.I+k]] = Cell{Op: Deletion, Span: 1}
		}
	default:
		first, last := places[e.I], places[e.I+len(e.From)-1]
		clear(row[first : last+1])
		row[first] = Cell{Op: e.Op, To: e.To, Span: last - first + 1}
	}
}
