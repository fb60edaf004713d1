package align

// Levenshtein returns the least number of insertions, deletions and
// substitutions that turn a into b. It is a metric.
//
// Where one of a and b has up to 64 letters, without their common start and end,
// it takes O(|a|+|b|) time for letters a to z, a few instructions for each two of
// other letters, and allocates nothing (Myers 1999; Hyyrö 2003). Otherwise it takes
// O(|a|·|b|) time and O(min(|a|, |b|)) space (Wagner and Fischer 1974, with one row
// of their matrix kept).
func Levenshtein(a, b []Letter) int {
	a, b = differing(a, b)
	if len(b) <= columnBits {
		return byColumns(a, b, false)
	}
	return levenshteinByRows(a, b)
}

func levenshteinByRows(a, b []Letter) int {
	row := firstRow(len(b))
	for i, x := range a {
		diagonal := row[0] // row i, one to the left
		row[0] = i + 1
		for j, y := range b {
			d := diagonal
			if x != y {
				d = 1 + min(diagonal, row[j], row[j+1])
			}
			diagonal, row[j+1] = row[j+1], d
		}
	}
	return row[len(b)]
}

// Restricted returns the restricted Damerau–Levenshtein distance of a and b, or
// optimal string alignment: the least number of insertions, deletions,
// substitutions and transpositions of neighbours that turn a into b where no
// letter takes part in two edits. It is what an alignment under [Unit] costs. It
// isn't a metric: CA to AC is 1 and AC to ABC is 1, but CA to ABC is 3 (Boytsov
// 2011, 2.2).
//
// It takes the time and space of [Levenshtein].
func Restricted(a, b []Letter) int {
	a, b = differing(a, b)
	if len(b) <= columnBits {
		return byColumns(a, b, true)
	}
	return restrictedByRows(a, b)
}

func restrictedByRows(a, b []Letter) int {
	row := firstRow(len(b))         // row i
	before := make([]int, len(row)) // row i-1
	next := make([]int, len(row))   // row i+1
	for i, x := range a {
		next[0] = i + 1
		for j, y := range b {
			d := row[j]
			if x != y {
				d = 1 + min(row[j], row[j+1], next[j])
				if i > 0 && j > 0 && x == b[j-1] && a[i-1] == y {
					d = min(d, 1+before[j-1])
				}
			}
			next[j+1] = d
		}
		before, row, next = row, next, before
	}
	return row[len(b)]
}

// Distance returns the unrestricted Damerau–Levenshtein distance of a and b: the
// least number of insertions, deletions, substitutions and transpositions of
// neighbours that turn a into b, where letters may be edited again after a
// transposition. It is a metric, and never more than Restricted.
//
// It takes O(|a|·|b|) time and O(|a| + |b|) space. The recurrence is that of
// Lowrance and Wagner 1975, algorithm S; of the cells it looks back to, only
// those are kept that can matter (Zhao and Sahni 2019, String correction using
// the Damerau–Levenshtein distance).
func Distance(a, b []Letter) int {
	a, b = differing(a, b)
	// Algorithm S: a transposition that ends in cell (i, j) joins a[k] to b[j]
	// and a[i] to b[l], where k < i is the last row whose letter is b[j], and
	// l < j the last column whose letter is a[i]. It costs H(k-1, l-1), and
	// i-k-1 deletions, the transposition, and j-l-1 insertions. If there are
	// both deletions and insertions, substitutions do as well: so k = i-1 or
	// l = j-1, and only two cells must be remembered. Letters count from 1.
	var (
		row     = firstRow(len(b))         // H(i-1, ·)
		next    = make([]int, len(row))    // H(i-2, ·), then H(i, ·)
		anchor  = make([]int, len(row))    // [j]: H(k-1, j-2) for the k of b[j]
		lastRow = make(map[Letter]int, 32) // the k of each letter of a
	)
	for i := 1; i <= len(a); i++ {
		lastColumn := 0      // l
		beforeColumn := 0    // H(i-2, l-1)
		twoUpLeft := next[0] // H(i-2, j-1)
		next[0] = i          // H(i, 0)
		for j := 1; j <= len(b); j++ {
			twoUp := next[j]
			if a[i-1] == b[j-1] {
				next[j] = row[j-1]
				lastColumn, beforeColumn = j, twoUpLeft
				if j > 1 {
					anchor[j] = row[j-2]
				}
			} else {
				next[j] = 1 + min(row[j-1], row[j], next[j-1])
				if k, l := lastRow[b[j-1]], lastColumn; k > 0 && l > 0 {
					if l == j-1 {
						next[j] = min(next[j], anchor[j]+i-k)
					} else if k == i-1 {
						next[j] = min(next[j], beforeColumn+j-l)
					}
				}
			}
			twoUpLeft = twoUp
		}
		lastRow[a[i-1]] = i
		row, next = next, row
	}
	return row[len(b)]
}

// differing returns a and b without their common start and end, which cost
// nothing under any of the distances, the longer one first.
func differing(a, b []Letter) (longer, shorter []Letter) {
	for len(a) > 0 && len(b) > 0 && a[0] == b[0] {
		a, b = a[1:], b[1:]
	}
	for len(a) > 0 && len(b) > 0 && a[len(a)-1] == b[len(b)-1] {
		a, b = a[:len(a)-1], b[:len(b)-1]
	}
	if len(a) < len(b) {
		return b, a
	}
	return a, b
}

// firstRow returns the distances of the empty string to the first 0 to n letters
// of another.
func firstRow(n int) []int {
	row := make([]int, n+1)
	for j := range row {
		row[j] = j
	}
	return row
}
