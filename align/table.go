package align

import (
	"cmp"
	"math"
	"slices"
)

// table holds, for each place (i, j), how to get from there to the end: what it
// costs to turn form[i:] into word[j:]. An alignment is a path of steps from
// (0, 0) to (len(form), len(word)).
type table struct {
	form, word []Letter
	costs      Costs
	steps      []step // the steps there are, by size, in the order of preference
	cells      []cell // by rows, one more in either direction than there are letters
	scratch    []step // what cheapest returns
}

// cell is what the table knows of a place.
type cell struct {
	cost float64 // of the cheapest path to the end, or +Inf
	kept int32   // the most letters that a path of that cost keeps
}

// step is an edit without its place: it turns m letters into n.
type step struct {
	m, n int
	cost float64
	kept int32 // letters kept from this step to the end
}

// newTable fills the table from the end of both strings to their start.
func newTable(form, word []Letter, costs Costs) *table {
	m, n := costs.Span()
	t := &table{
		form:  slices.Clone(form),
		word:  slices.Clone(word),
		costs: costs,
		steps: sizes(min(m, len(form)), min(n, len(word))),
		cells: make([]cell, (len(form)+1)*(len(word)+1)),
	}
	t.scratch = make([]step, 0, len(t.steps))
	for i := len(form); i >= 0; i-- {
		for j := len(word); j >= 0; j-- {
			t.fill(i, j)
		}
	}
	return t
}

// sizes returns the steps of up to m letters for up to n, best first (see Align).
func sizes(m, n int) []step {
	var steps []step
	for a := 0; a <= m; a++ {
		for b := 0; b <= n; b++ {
			if a > 0 || b > 0 {
				steps = append(steps, step{m: a, n: b})
			}
		}
	}
	slices.SortFunc(steps, func(x, y step) int {
		return cmp.Or(cmp.Compare(x.rank(), y.rank()), cmp.Compare(x.m, y.m), cmp.Compare(x.n, y.n))
	})
	return steps
}

// rank returns the place of a step of this size in the order of preference.
func (s step) rank() int {
	switch {
	case s.m == 1 && s.n == 1:
		return 0
	case s.m == 2 && s.n == 2:
		return 1
	case s.m > 0 && s.n > 0:
		return 2
	case s.m > 0:
		return 3
	default:
		return 4
	}
}

func (t *table) at(i, j int) int { return i*(len(t.word)+1) + j }

// reaches reports whether there is a path from (i, j) to the end.
func (t *table) reaches(i, j int) bool { return t.cells[t.at(i, j)].cost < math.Inf(1) }

// fill computes cell (i, j); all cells to its right and below it are filled.
func (t *table) fill(i, j int) {
	c := &t.cells[t.at(i, j)]
	if i == len(t.form) && j == len(t.word) {
		return // nothing is left to do, at no cost
	}
	c.cost = math.Inf(1)
	for _, s := range t.possible(i, j) {
		c.cost = min(c.cost, s.cost+t.cells[t.at(i+s.m, j+s.n)].cost)
	}
	for _, s := range t.tied(i, j) {
		c.kept = max(c.kept, s.kept)
	}
}

// possible returns the steps from (i, j) that lead to the end, best size first.
// It holds until the next call of possible or cheapest.
func (t *table) possible(i, j int) []step {
	t.scratch = t.scratch[:0]
	for _, s := range t.steps {
		if s.m > len(t.form)-i || s.n > len(t.word)-j || !t.reaches(i+s.m, j+s.n) {
			continue
		}
		s.cost = t.costs.Cost(t.form, i, s.m, t.word, j, s.n)
		if math.IsInf(s.cost, 0) || math.IsNaN(s.cost) {
			continue
		}
		s.kept = t.cells[t.at(i+s.m, j+s.n)].kept
		if from, to := t.form[i:i+s.m], t.word[j:j+s.n]; s.m == s.n {
			if op := operation(from, to); op == Agreement || op == Transposition {
				s.kept += int32(s.m)
			}
		}
		t.scratch = append(t.scratch, s)
	}
	return t.scratch
}

// tied drops those steps from the last call of possible that do not lie on a
// cheapest path.
func (t *table) tied(i, j int) []step {
	least := t.cells[t.at(i, j)].cost
	most := least + tolerance*max(1, math.Abs(least))
	t.scratch = slices.DeleteFunc(t.scratch, func(s step) bool {
		return s.cost+t.cells[t.at(i+s.m, j+s.n)].cost > most
	})
	return t.scratch
}

// tolerance is how far costs that count as equal may be apart; see Align.
const tolerance = 1e-9

// cheapest returns the first steps of the cheapest paths from (i, j) to the end,
// best first by the rule of Align. It holds until the next call.
func (t *table) cheapest(i, j int) []step {
	t.possible(i, j)
	steps := t.tied(i, j)
	slices.SortStableFunc(steps, func(x, y step) int { return cmp.Compare(y.kept, x.kept) })
	return steps
}

// path appends to path, which leads to (i, j), the best steps from there on.
func (t *table) path(path []step, i, j int) []step {
	for i < len(t.form) || j < len(t.word) {
		s := t.cheapest(i, j)[0]
		path = append(path, s)
		i, j = i+s.m, j+s.n
	}
	return path
}

// following returns, in the memory of path, the path that comes after it: it
// departs from it at the last place where there is another step to take. It
// returns nil after the last path.
func (t *table) following(path []step) []step {
	i, j := len(t.form), len(t.word)
	for k := len(path) - 1; k >= 0; k-- {
		i, j = i-path[k].m, j-path[k].n
		steps := t.cheapest(i, j)
		this := slices.IndexFunc(steps, func(s step) bool { return s.m == path[k].m && s.n == path[k].n })
		if next := this + 1; next < len(steps) {
			s := steps[next]
			return t.path(append(path[:k], s), i+s.m, j+s.n)
		}
	}
	return nil
}

// alignment spells path out.
func (t *table) alignment(path []step) Alignment {
	a := Alignment{Edits: make([]Edit, 0, len(path))}
	i, j := 0, 0
	for _, s := range path {
		from, to := t.form[i:i+s.m:i+s.m], t.word[j:j+s.n:j+s.n]
		a.Edits = append(a.Edits, Edit{Op: operation(from, to), I: i, J: j, From: from, To: to, Cost: s.cost})
		a.Cost += s.cost
		i, j = i+s.m, j+s.n
	}
	return a
}
