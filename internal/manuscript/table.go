package manuscript

import "math/bits"

// Table keeps a value for each of many words. It is a map for short keys that are
// looked up over and over: a word of eight bytes or fewer is told from others by one
// integer. Its zero value is ready for use. It keeps the strings it is given.
type Table[V any] struct {
	slots   []int32 // a power of two of them: 1 + index in entries, 0 for none; under 3/4 full
	entries []tableEntry[V]
}

type tableEntry[V any] struct {
	head  uint64 // see headOf
	word  string
	value V
}

// Len returns how many words the table has.
func (t *Table[V]) Len() int { return len(t.entries) }

// At returns where the value of a word is kept, a zero value where the word is new.
// The pointer holds until the next new word. O(1) in the mean.
func (t *Table[V]) At(word string) *V {
	if 4*len(t.entries) >= 3*len(t.slots) {
		t.grow()
	}
	head := headOf(word)
	mask := uint64(len(t.slots) - 1)
	for i := hash(head, word); ; i++ {
		slot := &t.slots[i&mask]
		if *slot == 0 {
			t.entries = append(t.entries, tableEntry[V]{head: head, word: word})
			*slot = int32(len(t.entries))
			return &t.entries[len(t.entries)-1].value
		}
		e := &t.entries[*slot-1]
		if e.head == head && len(e.word) == len(word) && (len(word) <= 8 || e.word == word) {
			return &e.value
		}
	}
}

// All yields the words with their values, in the order in which they came.
func (t *Table[V]) All(yield func(word string, value V) bool) {
	for i := range t.entries {
		if !yield(t.entries[i].word, t.entries[i].value) {
			return
		}
	}
}

// grow doubles the slots.
func (t *Table[V]) grow() {
	t.slots = make([]int32, max(2*len(t.slots), 1024))
	mask := uint64(len(t.slots) - 1)
	for n := range t.entries {
		i := hash(t.entries[n].head, t.entries[n].word)
		for t.slots[i&mask] != 0 {
			i++
		}
		t.slots[i&mask] = int32(n + 1)
	}
}

// headOf returns the first eight bytes of a word as an integer, zeros after a
// shorter one: with its length that is all of it.
func headOf(word string) uint64 {
	switch n := len(word); {
	case n >= 8:
		return eightBytes(word)
	case n >= 4:
		return uint64(fourBytes(word)) | uint64(fourBytes(word[n-4:]))<<(8*(n-4))
	case n > 0:
		// The middle byte is the first or the last one of a word of one or two.
		return uint64(word[0]) | uint64(word[n/2])<<(8*(n/2)) | uint64(word[n-1])<<(8*(n-1))
	}
	return 0
}

func eightBytes(s string) uint64 {
	return uint64(fourBytes(s)) | uint64(fourBytes(s[4:8]))<<32
}

func fourBytes(s string) uint32 {
	_ = s[3]
	return uint32(s[0]) | uint32(s[1])<<8 | uint32(s[2])<<16 | uint32(s[3])<<24
}

// hash mixes a word, eight bytes at a time, by the two halves of a product.
func hash(head uint64, word string) uint64 {
	const odd, other = 0x9E3779B97F4A7C15, 0xD6E8FEB86659FD93
	h := head ^ uint64(len(word))*other
	for n := len(word); n > 8; n -= 8 {
		high, low := bits.Mul64(h, odd)
		h = high ^ low ^ eightBytes(word[n-8:])
	}
	high, low := bits.Mul64(h^other, odd)
	return high ^ low
}

// CountSegments counts the words of a text by UAX #29 alone, without what split
// makes of them: its segments that hold a letter or a digit, underscores and all.
// O(n) time; it keeps text.
func CountSegments(text string) *Table[int] {
	var counts Table[int]
	segments(text, 0, func(g segment) {
		if g.kind == wordToken {
			*counts.At(text[g.start:g.end])++
		}
	})
	return &counts
}
