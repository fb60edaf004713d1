package lexicon

import (
	"slices"

	"emendary/align"
)

// search is the scratch space of one search at a time. Nothing in it is allocated
// anew once it was used for forms as long and with as many words near them.
type search struct {
	form  []align.Letter // folded
	codes []uint8        // of its letters: from 1, the same letters the same one
	k     int

	ahead, back band   // of the form, and of the form from its end
	certain     uint64 // states of words that the walk forward finds for certain
	rows        rows

	// For the layer that is searched:
	trie     *trie
	reversed *reversed
	code     []uint8 // by label, 0 where the form lacks it; all 0 between searches
	followed [2][MaxLetters + 2*maxBand + 32]uint64
	many     uint64 // with more than 64 letters, a bit that is always wanted
	none     uint64 // what is left of wanted letters where none are

	hits    []hit
	merged  []hit          // room for them
	order   []uint64       // of those found backward: number<<32 | index
	labels  []uint32       // of the hits
	letters []align.Letter // of one hit
}

// hit is a word that a search found in a list.
type hit struct {
	number   uint32
	start    uint32 // of its labels
	length   uint8
	distance uint16
}

// prepare readies s for the words within k of s.form, for which within then
// searches layers.
//
// A word within k has at most ⌊k/2⌋ edits in the first half of the form, or fewer
// than the rest in the second: the first are found forward, the others backward,
// and few ways lead far that are right at first (Mihov and Schulz 2004).
func (s *search) prepare(k int) {
	s.k = k
	if k > maxBand {
		return
	}
	codes := s.encode()
	few := k / 2
	half := len(s.form) / 2
	if k%2 == 0 {
		half = (len(s.form) + 1) / 2 // the half with the more edits is the shorter one backward
	}
	s.ahead.within(s.codes, codes, k, few, half, s.followed[0][:])
	slices.Reverse(s.codes)
	s.back.within(s.codes, codes, k, k-few-1, len(s.form)-half, s.followed[1][:])
	slices.Reverse(s.codes)
	s.certain = 1<<((few+1)*rowBits) - 1
}

// encode gives the letters of the form their codes and returns how many there
// are, with 0, which no letter of the form has.
func (s *search) encode() int {
	s.codes = s.codes[:0]
	codes := uint8(1)
	for i, letter := range s.form {
		code := codes
		if j := slices.Index(s.form[:i], letter); j >= 0 {
			code = s.codes[j]
		} else {
			codes++
		}
		s.codes = append(s.codes, code)
	}
	return int(codes)
}

// within returns the words of a layer within k of the form, by their numbers. They
// stand until the next search with the same scratch space.
func (s *search) within(y *layer) []hit {
	s.hits, s.labels = s.hits[:0], s.labels[:0]
	s.trie, s.reversed = &y.trie, &y.reversed
	switch {
	case y.trie.root == 0:
		return nil
	case s.k > maxBand, s.k > 0 && y.reversed.root == 0:
		s.inRows(y, s.k)
		return s.hits
	}
	s.spell(y)
	s.forward(y.trie.root, &s.ahead.levels[0], 0, s.ahead.begin(s.k), 0)
	if known := len(s.hits); s.k > 0 {
		s.backward(y.reversed.root, &s.back.levels[0], s.back.begin(s.k), 0)
		s.merge(known)
	}
	for _, letter := range s.form {
		if label, ok := y.label(letter); ok {
			s.code[label] = 0
		}
	}
	return s.hits
}

// spell puts the form in terms of the labels of a layer.
func (s *search) spell(y *layer) {
	if len(s.code) < len(y.letters) {
		s.code = make([]uint8, len(y.letters))
	}
	s.many, s.none = 0, 1
	if len(y.letters) > 64 {
		s.many, s.none = 1<<63, 0
	}
	clear(s.followed[0][:])
	clear(s.followed[1][:])
	for i, letter := range s.form {
		if label, ok := y.label(letter); ok {
			s.code[label] = s.codes[i]
			s.followed[0][i+s.k+1] = 1 << (label & 63)
			s.followed[1][len(s.form)-i+s.k] = 1 << (label & 63)
		}
	}
}

// found records word number, whose labels are those of the path forward.
func (s *search) found(number uint32, length, distance int) {
	s.hits = append(s.hits, hit{number, uint32(len(s.labels)), uint8(length), uint16(distance)})
	for t := range length {
		s.labels = append(s.labels, s.ahead.levels[t].label)
	}
}

// foundBackward records the word whose labels from its end are those of the path
// backward.
func (s *search) foundBackward(length, distance int) {
	start := len(s.labels)
	for t := length - 1; t >= 0; t-- {
		s.labels = append(s.labels, s.back.levels[t].label)
	}
	if number, ok := s.trie.number(s.labels[start:]); ok {
		s.hits = append(s.hits, hit{number, uint32(start), uint8(length), uint16(distance)})
	}
}

// merge puts in order the hits of which so many were found forward, in order. A word
// that was found both ways stays with its lesser distance.
func (s *search) merge(forward int) {
	if forward == len(s.hits) {
		return
	}
	s.order = s.order[:0]
	for i := forward; i < len(s.hits); i++ {
		s.order = append(s.order, uint64(s.hits[i].number)<<32|uint64(i))
	}
	slices.Sort(s.order)
	s.merged = s.merged[:0]
	i := 0
	for _, o := range s.order {
		h := s.hits[uint32(o)]
		for ; i < forward && s.hits[i].number < h.number; i++ {
			s.merged = append(s.merged, s.hits[i])
		}
		if i < forward && s.hits[i].number == h.number {
			s.hits[i].distance = min(s.hits[i].distance, h.distance)
			continue
		}
		s.merged = append(s.merged, h)
	}
	s.merged = append(s.merged, s.hits[i:forward]...)
	s.hits, s.merged = s.merged, s.hits
}

// zeros returns n zeros, in the space of b where there is enough.
func zeros(b []uint64, n int) []uint64 {
	if cap(b) < n {
		return make([]uint64, n)
	}
	b = b[:n]
	clear(b)
	return b
}
