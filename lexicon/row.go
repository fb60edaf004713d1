package lexicon

// row is a row of the table of restricted alignments, in reduced prices, as far as
// it is of use: cells[i] is the least price of what is read of a word and the first
// i letters of the form, or all but those where words are read from their ends. It
// has cells in [from, to) alone.
type row struct {
	cells    []int32
	from, to int
	half     uint32 // the symbols of letters with which an edit of several begins here
}

// at returns the price of cell i.
func (r *row) at(i int) int32 {
	if i < r.from || i >= r.to {
		return never
	}
	return r.cells[i]
}

// lower takes a way to cell i in.
func (r *row) lower(i int, price int32) {
	if r.from >= r.to {
		r.from, r.to = i, i
	}
	for ; r.from > i; r.from-- {
		r.cells[r.from-1] = never
	}
	for ; r.to <= i; r.to++ {
		r.cells[r.to] = never
	}
	r.cells[i] = min(r.cells[i], price)
}

// cuts are what cells may cost at most: those in the part of the form that is read
// first less than those in the other.
type cuts struct {
	first, last int32
}

const (
	// The first part of the form is this part of it, in hundredths.
	middlePart = 40
	// Edits in the first part may take this part of what edits may cost, in 64ths;
	// those in the second the rest.
	firstShare = 46
	// So much they may take in a narrow search, which misses words.
	narrowFirst, narrowSecond = 14, 5
)

// forwardCuts returns the cuts of a search from the start where edits may cost room.
//
// A word within room has edits for at most the first share in the first part, or for
// at most the other share in the second: one of the two searches finds it, and few
// ways lead far that cost little at first (Mihov and Schulz, “Fast Approximate Search
// in Large Dictionaries”, Computational Linguistics 30(4), 2004, on backward
// dictionaries, for unit costs). An edit across the middle counts as in the second.
// Both shares grow with room, so that floors of priors may stand for the priors.
func (b *best) forwardCuts(room int32) cuts {
	if b.narrow {
		return cuts{share(room, narrowFirst), room}
	}
	return cuts{share(room, firstShare), room}
}

// backwardCuts returns those of a search from the end.
func (b *best) backwardCuts(room int32) cuts {
	if b.narrow {
		return cuts{share(room, narrowSecond), room}
	}
	return cuts{room - share(room, firstShare), room}
}

// share returns so many 64ths of room, rounded down.
func share(room int32, part int64) int32 { return int32(int64(room) * part >> 6) }
