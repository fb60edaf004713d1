package align

// A writer who means a word writes it down letter by letter, and at each step may
// go wrong: leave the letter out, write another, write one too many before it, or
// swap it with the next. tally counts how often what was met and what was written,
// which is all that fitted costs know.
//
// A spot is where a writer may go wrong: one letter of the word (or the gap before
// it) with the letter of the word before it and the letter of the form after it.
// Those are the neighbours that a search knows when it has read the word up to
// there and no further.
type spot struct {
	gap                 bool // the gap before a letter: letter is the edge
	left, letter, right symbol
}

// index numbers spots densely.
func (s spot) index() int {
	i := int(s.left)<<10 | int(s.letter)<<5 | int(s.right)
	if s.gap {
		i |= 1 << 15
	}
	return i
}

func spotAt(i int) spot {
	return spot{i>>15 == 1, symbol(i >> 10 & 31), symbol(i >> 5 & 31), symbol(i & 31)}
}

// side is 1 for gaps and 0 for letters: an index.
func (s spot) side() int {
	if s.gap {
		return 1
	}
	return 0
}

// look is what a spot has in common with all others that look like it: whether
// its letter is doubled, and vowel or consonant.
func (s spot) look() int {
	look := 0
	set := func(bit int, b bool) {
		if b {
			look |= bit
		}
	}
	if s.gap {
		set(1, s.left.isVowel())
		set(2, s.right.isVowel())
		return look
	}
	set(1, s.left == s.letter)
	set(2, s.right == s.letter)
	set(4, s.letter.isVowel())
	return look
}

const (
	looks = 8
	sides = 2
)

// kind is a kind of slip at a spot, from which letters that were never seen there
// get their probability.
type kind uint8

const (
	omitted       kind = iota // the letter left out
	omittedDouble             // one of two equal letters left out
	extra                     // a letter too many
	extraDouble               // a letter doubled
	extraKey                  // a letter too many from a key beside a neighbour's
	markLost                  // the letter with other marks: e for é
	vowel                     // another vowel for a vowel
	neighbourKey              // a letter from a key beside it
	otherLetter               // any other letter
	kinds         = 9
)

// kindNames are the kinds as a file of costs names them.
var kindNames = [kinds]string{"omitted", "omitted-double", "extra", "extra-double", "extra-key", "mark", "vowel", "key", "other"}

// kindOf returns the kind of writing the given letter (the edge for none) at s,
// and how likely that letter is among all of its kind.
func (k *keyboard) kindOf(s spot, written symbol) (kind, float64) {
	if s.gap {
		switch {
		case written == s.left || written == s.right:
			return extraDouble, 1. / 2
		case k.near[written][s.left] || k.near[written][s.right]:
			return extraKey, 1. / 8
		}
		return extra, 1. / 26
	}
	switch {
	case written == edge:
		if s.left == s.letter || s.right == s.letter {
			return omittedDouble, 1
		}
		return omitted, 1
	case written == s.letter && written != other:
		return markLost, 1
	case written.isVowel() && s.letter.isVowel():
		return vowel, 1. / 5
	case k.near[written][s.letter]:
		return neighbourKey, 1. / 5
	}
	return otherLetter, 1. / 20
}

// stretch is two or three letters in a row; shorter ones end in edges.
type stretch [3]symbol

func stretchOf(s []symbol) stretch {
	var t stretch
	copy(t[:], s)
	return t
}

// longEdit is an edit that has more than one letter on a side.
type longEdit struct{ from, to stretch }

// ratio is how often something went wrong of the times it was met.
type ratio struct{ met, wrong float64 }

// general is what is counted apart from letters.
type general struct {
	looks  [sides][positions][looks]ratio
	kinds  [sides][positions][kinds]float64
	swaps  [positions]ratio // of all stretches of two
	spaces [sides]ratio     // words met: a space left out, or one too many
}

// tally is what is being counted. Counts need not be whole: an edit counts by its
// probability.
type tally struct {
	general
	spots   map[int]ratio            // by index
	slips   map[int][symbols]float64 // what was written at a spot that went wrong, by index
	met     map[stretch]float64      // how often a stretch of the word was met
	swapped map[stretch]float64      // how often it came out the other way round
	long    map[longEdit]float64     // edits of several letters
}

// spaceOf returns whether writing the given letter at s leaves a space out (side
// 0) or puts one in (side 1).
func (s spot) spaceOf(written symbol) (side int, ok bool) {
	switch {
	case s.letter == blank && written == edge:
		return 0, true
	case s.gap && written == blank:
		return 1, true
	}
	return 0, false
}

func newTally() *tally {
	return &tally{
		spots: map[int]ratio{}, slips: map[int][symbols]float64{},
		met: map[stretch]float64{}, swapped: map[stretch]float64{}, long: map[longEdit]float64{},
	}
}

// spot counts one meeting with s; written is the letter that stands there
// instead (the edge for none) where it went wrong.
func (t *tally) spot(s spot, p position, weight float64, wrong bool, written symbol, k *keyboard) {
	if side, ok := s.spaceOf(written); ok && wrong {
		t.spaces[side].wrong += weight
		return
	}
	look, r := &t.looks[s.side()][p][s.look()], t.spots[s.index()]
	look.met += weight
	r.met += weight
	if wrong {
		look.wrong += weight
		r.wrong += weight
		kind, _ := k.kindOf(s, written)
		t.kinds[s.side()][p][kind] += weight
		slips := t.slips[s.index()]
		slips[written] += weight
		t.slips[s.index()] = slips
	}
	t.spots[s.index()] = r
}

// edit counts one edit of an alignment of form and word: it turns form[i:i+m]
// into word[j:j+n]. same says that the letters agree to the last mark.
func (t *tally) edit(form []symbol, i, m int, word []symbol, j, n int, same bool, weight float64, k *keyboard) {
	p := positionOf(i, len(form))
	switch {
	case m == 1 && n == 1 && same:
		s := spot{left: at(word, j-1), letter: word[j], right: at(form, i+1)}
		t.spot(s, p, weight, false, edge, k)
		gap := spot{gap: true, left: at(word, j-1), right: at(form, i)}
		t.spot(gap, p, weight, false, edge, k)
		for n := 2; n <= 3 && j+n <= len(word); n++ {
			t.met[stretchOf(word[j:j+n])] += weight
			if n == 2 {
				t.swaps[p].met += weight
			}
		}
	case m <= 1 && n == 1:
		written := edge
		if m == 1 {
			written = form[i]
		}
		t.spot(spot{left: at(word, j-1), letter: word[j], right: at(form, i+m)}, p, weight, true, written, k)
	case m == 1 && n == 0:
		t.spot(spot{gap: true, left: at(word, j-1), right: at(form, i+1)}, p, weight, true, form[i], k)
	default:
		to := stretchOf(word[j : j+n])
		t.met[to] += weight
		if m == 2 && n == 2 && form[i] == word[j+1] && form[i+1] == word[j] {
			t.swaps[p].met += weight
			t.swaps[p].wrong += weight
			t.swapped[to] += weight
			return
		}
		t.long[longEdit{stretchOf(form[i : i+m]), to}] += weight
	}
}
