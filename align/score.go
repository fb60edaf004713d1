package align

// Scorer finds what the cheapest alignment of one form and many words costs. It
// keeps its space from word to word, and serves one goroutine at a time; the zero
// value is ready for use.
type Scorer struct {
	rows [4][]int32 // the last four letters of the word, a row each, used in turn
}

// Score returns the cost in grains of the cheapest restricted alignment of the
// sheet's form and word, what [Align] finds under the same costs, in
// O(|form|·|word|) time and without an allocation in steady state. ok is false
// where there is no way from the one to the other for less than limit.
func (s *Scorer) Score(sheet *Sheet, word []Letter, limit int32) (grains int32, ok bool) {
	n := len(sheet.form)
	for r := range s.rows {
		if cap(s.rows[r]) <= n {
			s.rows[r] = make([]int32, n+1)
		}
		s.rows[r] = s.rows[r][:n+1]
	}
	sheet.First(s.rows[0])
	for j := 1; j <= len(word); j++ {
		next := s.rows[j%4]
		least := sheet.Step(next, [3][]int32{s.rows[(j-1)%4], s.rows[(j+2)%4], s.rows[(j+1)%4]}, word[:j])
		// An edit of three letters may pass over this row and the next.
		if j > 2 && least >= limit && minimum(s.rows[(j-1)%4]) >= limit && minimum(s.rows[(j+2)%4]) >= limit {
			return 0, false
		}
	}
	grains = s.rows[len(word)%4][n]
	return grains, grains < limit
}

func minimum(row []int32) int32 {
	least := row[0]
	for _, v := range row[1:] {
		least = min(least, v)
	}
	return least
}

// First works out the row for no letter of the word: row[i] is the price of
// deleting the first i letters of the form.
func (s *Sheet) First(row []int32) {
	row[0] = 0
	for i := range s.form {
		row[i+1] = row[i] + s.deleted(edge, i)
	}
}

// Step works out the row of the dynamic programme that comes with one more letter
// of the word: row[i] is the least price of turning the first i letters of the
// form into path, of which the last letter is new. before are the rows for one,
// two and three letters less, as far as path has them. It returns the least price
// in the row.
func (s *Sheet) Step(row []int32, before [3][]int32, path []Letter) (least int32) {
	n, j := len(s.form), len(path)
	letter := path[j-1]
	left, first := Letter(0), j == 1
	if !first {
		left = path[j-2]
	}
	at := s.Spot(left, first, letter)
	last := before[0]
	for i := range row {
		v := last[i] + s.Insert(at, i)
		if i > 0 {
			v = min(v, last[i-1]+s.One(at, i-1))
		}
		row[i] = v
	}
	if j >= 2 {
		two := before[1]
		for i := 2; i <= n; i++ {
			if s.form[i-2] == letter && s.form[i-1] == left && left != letter {
				row[i] = min(row[i], two[i-2]+s.Swap(i-2))
			}
		}
	}
	for _, e := range s.Ending(at) {
		if e.Yields(path) {
			row[e.I+e.M] = min(row[e.I+e.M], before[e.N-1][e.I]+e.Price)
		}
	}
	least = row[0]
	for i := 1; i <= n; i++ {
		row[i] = min(row[i], row[i-1]+s.Delete(at, i-1))
		least = min(least, row[i])
	}
	return least
}
