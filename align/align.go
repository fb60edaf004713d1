package align

import "math"

// Align returns a cheapest restricted alignment of form and word under costs: the
// edits cover form and word once, side by side. Its edits share no memory with
// form and word.
//
// Of several that are cheapest, it is the one with the most letters kept, which
// are those that agree and those that are transposed. If there are still several,
// it is the one that, at the first place from the left where they part, takes
// one letter for one before two for two (a transposition), then other several
// letters for several, then a deletion, then an insertion, each with fewer
// letters (of the form first) before more. So edits that could stand at several
// places stand at the last: in harber/harbour o is substituted for e and u
// inserted after it; a doubled letter is inserted, or deleted, after the one that
// it doubles.
//
// Costs are taken to be equal if they differ by no more than one part in 10⁹, or
// by 10⁻⁹ where they are below 1: sums of the same parts in another order are.
//
// If costs know no way from form to word, the alignment has no edits and its cost
// is +Inf.
//
// With spans of m and n letters it asks for O(|form|·|word|·m·n) costs, and takes
// O(|form|·|word|) space: 16 bytes a cell (Wagner and Fischer 1974, algorithms X
// and Y, with edits of several letters as in Brill and Moore 2000, section 3, and
// read from the right end, so that the alignment can be read from the left).
func Align(form, word []Letter, costs Costs) Alignment {
	t := newTable(form, word, costs)
	if !t.reaches(0, 0) {
		return Alignment{Cost: math.Inf(1)}
	}
	return t.alignment(t.path(nil, 0, 0))
}

// Count returns how many alignments of form and word share the least cost (in the
// sense of [Align]), at most math.MaxUint64, which stands for that many or more;
// 0 if costs know no way from form to word. Two alignments differ if the edits
// do, as lists; insert and delete is not delete and insert.
//
// It costs twice what Align does, and 8 bytes a cell more.
func Count(form, word []Letter, costs Costs) uint64 {
	t := newTable(form, word, costs)
	counts := make([]uint64, len(t.cells)) // as t.cells
	counts[len(counts)-1] = 1
	for i := len(form); i >= 0; i-- {
		for j := len(word); j >= 0; j-- {
			for _, s := range t.cheapest(i, j) {
				count := &counts[t.at(i, j)]
				*count = sum(*count, counts[t.at(i+s.m, j+s.n)])
			}
		}
	}
	return counts[0]
}

// sum returns x+y, or math.MaxUint64 if that is too much.
func sum(x, y uint64) uint64 {
	if x > math.MaxUint64-y {
		return math.MaxUint64
	}
	return x + y
}

// All returns the alignments of form and word that share the least cost (in the
// sense of [Align]), each once, or the first limit of them. The first is Align's;
// each other one departs from the one before as late as possible, to the next
// best edit by Align's rule. There are none if costs know no way from form to
// word, or limit is below 1.
//
// It costs what Align does, and O((|form|+|word|)·m·n) for each alignment.
func All(form, word []Letter, costs Costs, limit int) []Alignment {
	if limit < 1 {
		return nil
	}
	t := newTable(form, word, costs)
	if !t.reaches(0, 0) {
		return nil
	}
	path := t.path(nil, 0, 0)
	all := []Alignment{t.alignment(path)}
	for len(all) < limit {
		if path = t.following(path); path == nil {
			break
		}
		all = append(all, t.alignment(path))
	}
	return all
}
