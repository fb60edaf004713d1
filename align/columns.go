package align

// columnBits is the most letters of the shorter string that byColumns takes.
const columnBits = 64

// byColumns returns the Levenshtein distance of a and b, or with transpositions
// the restricted one; b has at most columnBits letters.
//
// It keeps a column of the matrix in bits, as the differences of neighbouring
// cells, which are -1, 0 or 1, and makes each from the one before in some fifteen
// instructions (Myers, “A Fast Bit-Vector Algorithm for Approximate String Matching
// Based on Dynamic Programming”, Journal of the ACM 46(3), 1999, in the form of
// Hyyrö, “A Bit-Vector Algorithm for Computing Levenshtein and Damerau Edit
// Distances”, Nordic Journal of Computing 10(1), 2003, which adds transpositions).
func byColumns(a, b []Letter, transpositions bool) int {
	if len(b) == 0 {
		return len(a)
	}
	// equal has, by the last five bits of a letter, where in b it stands. That tells
	// letters apart where all lie between ` and DEL, as a to z do.
	var equal [32]uint64
	small := true
	for _, x := range a {
		small = small && x>>5 == '`'>>5
	}
	for i, y := range b {
		small = small && y>>5 == '`'>>5
		equal[y&31] |= 1 << i
	}
	var (
		up      = ^uint64(0)        // bit i: cell i+1 is one more than the cell above it
		down    uint64              // one less
		same    uint64              // one to the left and above, it is the same: the diagonal costs nothing
		before  uint64              // match of the letter before
		swaps   uint64              // all bits where transpositions count
		last    = (len(b) - 1) & 63 // bit of the last cell
		distant = len(b)
	)
	if transpositions {
		swaps = ^uint64(0)
	}
	for _, x := range a {
		var match uint64
		if small {
			match = equal[x&31]
		} else {
			for i, y := range b {
				if x == y {
					match |= 1 << i
				}
			}
		}
		swapped := ^same & match << 1 & before & swaps
		same = (match&up + up) ^ up | match | down | swapped
		right := down | ^(same | up) // the cell is one more than that to its left
		left := same & up            // one less
		distant += int(right>>last&1) - int(left>>last&1)
		right = right<<1 | 1 // the cells above all grow by 1 to the right
		up = left<<1 | ^(same | right)
		down = right & same
		before = match
	}
	return distant
}
