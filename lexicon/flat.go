package lexicon

import (
	"encoding/binary"
	"errors"
	"fmt"
	"math"
	"unsafe"
)

// The flat form of a list:
//
//	magic      8 bytes
//	header     ten 32-bit numbers: arcs, words, written forms, root, reversed
//	           arcs, reversed root, sets, members of all sets, bytes of records,
//	           bytes of the tail
//	arcs       two 32-bit numbers an arc
//	skips      a 32-bit number an arc
//	offsets    a 32-bit number a word
//	reversed   a 32-bit number an arc of the reversed trie
//	ends       a 32-bit number a set
//	members    a 16-bit number each
//	below      a 16-bit number an arc
//	listed     a 16-bit number a word
//	records    bytes
//	tail       letters, attributes and their grades: uvarints, and texts after
//	           their lengths
//
// All 32-bit numbers are little-endian, and stand at multiples of four bytes; so
// are the 16-bit ones, which stand at multiples of two.
const (
	magic      = "lexicon\x02"
	headerSize = len(magic) + 10*4
)

// AppendBinary appends the list in the flat form that [Open] views, without its
// name. The bytes depend on the words alone.
func (l *List) AppendBinary(b []byte) ([]byte, error) {
	if l == nil || len(l.offsets) == 0 {
		return b, errors.New("a list without words has no flat form")
	}
	tail := binary.AppendUvarint(nil, uint64(len(l.letters)))
	for _, letter := range l.letters {
		tail = appendText(tail, letter)
	}
	tail = binary.AppendUvarint(tail, uint64(len(l.attributes)))
	for i := range l.attributes {
		tail = l.attributes[i].append(tail)
	}
	for _, g := range l.gradeOf {
		tail = binary.AppendUvarint(tail, uint64(g))
	}
	if len(l.records) > math.MaxUint32 || len(tail) > math.MaxUint32 {
		return b, fmt.Errorf("%s: more than 4 GB of words; use a shorter list", l.name)
	}
	b = append(b, magic...)
	for _, n := range []int{
		len(l.trie.skips), len(l.offsets), l.written, int(l.trie.root), len(l.reversed.arcs), int(l.reversed.root),
		len(l.ends), len(l.members), len(l.records), len(tail),
	} {
		b = binary.LittleEndian.AppendUint32(b, uint32(n))
	}
	for _, numbers := range [][]uint32{l.trie.arcs, l.trie.skips, l.offsets, l.reversed.arcs, l.ends} {
		for _, n := range numbers {
			b = binary.LittleEndian.AppendUint32(b, n)
		}
	}
	for _, numbers := range [][]uint16{l.members, l.below, l.listed} {
		for _, n := range numbers {
			b = binary.LittleEndian.AppendUint16(b, n)
		}
	}
	b = append(b, l.records...)
	return append(b, tail...), nil
}

// Open returns the list whose flat form [List.AppendBinary] wrote. It views data
// in place where the machine is little-endian and data begins at a multiple of
// four bytes, and decodes the numbers into memory of their own elsewhere; in both
// it takes a fraction of a millisecond for 130,000 words. It refuses data on
// which a lookup could fail to come to an end, but can't tell whether the words
// are the right ones.
func Open(name, data string) (*List, error) {
	return open(name, data, littleEndian() && aligned(data))
}

// View is Open without the checks that take most of its time: for data that is
// part of the program and that its tests open. A lookup in other data than
// [List.AppendBinary] wrote may not come to an end.
func View(name, data string) (*List, error) {
	l, err := parse(data, littleEndian() && aligned(data))
	return named(name, l, err)
}

func open(name, data string, inPlace bool) (*List, error) {
	l, err := parse(data, inPlace)
	if err == nil {
		err = l.check()
	}
	return named(name, l, err)
}

func named(name string, l *List, err error) (*List, error) {
	if err != nil {
		return nil, fmt.Errorf("%s: not the flat form of a list: %w; generate it anew", name, err)
	}
	l.name = name
	return l, nil
}

func parse(data string, inPlace bool) (*List, error) {
	if len(data) < headerSize || data[:len(magic)] != magic {
		return nil, errors.New("other first bytes than expected")
	}
	var header [10]int
	for i := range header {
		n := littleEndianAt(data, len(magic)+4*i)
		if uint64(n) > uint64(len(data)) { // no sum of such numbers can overflow
			return nil, errors.New("its header promises more than there is")
		}
		header[i] = int(n)
	}
	arcs, words, root, reversed, reversedRoot := header[0], header[1], header[3], header[4], header[5]
	sets, members, records, tail := header[6], header[7], header[8], header[9]
	if want := headerSize + 4*(3*arcs+words+reversed+sets) + 2*(members+arcs+words) + records + tail; len(data) != want {
		return nil, fmt.Errorf("%d bytes where its header promises %d", len(data), want)
	}
	l := &List{written: header[2]}
	rest := data[headerSize:]
	l.trie.root = uint32(root)
	l.trie.arcs, rest = cutNumbers[uint32](rest, 2*arcs, inPlace)
	l.trie.skips, rest = cutNumbers[uint32](rest, arcs, inPlace)
	l.offsets, rest = cutNumbers[uint32](rest, words, inPlace)
	l.reversed.root = uint32(reversedRoot)
	l.reversed.arcs, rest = cutNumbers[uint32](rest, reversed, inPlace)
	l.ends, rest = cutNumbers[uint32](rest, sets, inPlace)
	l.members, rest = cutNumbers[uint16](rest, members, inPlace)
	l.below, rest = cutNumbers[uint16](rest, arcs, inPlace)
	l.listed, rest = cutNumbers[uint16](rest, words, inPlace)
	l.records = rest[:records]
	r := reader{rest: rest[records:]}
	l.letters = make([]string, r.count())
	for i := range l.letters {
		l.letters[i] = r.text()
	}
	l.reversed.childBit = childBit(len(l.letters))
	l.attributes = make([]attribute, r.count())
	for i := range l.attributes {
		l.attributes[i] = r.attribute()
	}
	l.gradeOf = make([]uint16, len(l.attributes))
	for i := range l.gradeOf {
		g := r.number()
		if g > len(l.grades) || g >= maxSets {
			return nil, fmt.Errorf("grade %d before %d", g, len(l.grades))
		}
		if g == len(l.grades) {
			l.grades = append(l.grades, i)
		}
		l.gradeOf[i] = uint16(g)
	}
	if r.short || r.rest != "" {
		return nil, errors.New("its letters and attributes do not fill their place")
	}
	return l, nil
}

// check makes sure that nothing leads out of the list.
func (l *List) check() error {
	if err := l.trie.check(len(l.letters)); err != nil {
		return err
	}
	if err := l.reversed.check(len(l.letters)); err != nil {
		return err
	}
	return l.marks.check()
}

// check makes sure that every walk stays within the arcs and comes to an end.
func (t *trie) check(letters int) error {
	if len(t.skips) == 0 || int(t.root) >= len(t.skips) || t.arcs[len(t.arcs)-2]&lastArc == 0 {
		return errors.New("its root or its last node is missing")
	}
	node := uint32(1) // first arc of the node
	for i := 1; i < len(t.skips); i++ {
		head := t.arcs[2*i]
		if t.arcs[2*i+1] >= node {
			return fmt.Errorf("arc %d leads to a node that is not before its own", i)
		}
		if int(head>>labelBit) >= letters {
			return fmt.Errorf("arc %d has a letter that does not exist", i)
		}
		last := -(head & lastArc / lastArc) // all bits or none: where nodes end can't be foretold
		node ^= (node ^ (uint32(i) + 1)) & last
	}
	return nil
}

// cutNumbers returns n numbers from the head of data, and what follows them.
func cutNumbers[T uint16 | uint32](data string, n int, inPlace bool) ([]T, string) {
	size := int(unsafe.Sizeof(T(0)))
	rest := data[size*n:]
	if n == 0 {
		return nil, rest
	}
	if inPlace {
		// Nothing writes to a list's numbers: the string stays as it is.
		return unsafe.Slice((*T)(unsafe.Pointer(unsafe.StringData(data))), n), rest
	}
	numbers := make([]T, n)
	for i := range numbers {
		for at := size - 1; at >= 0; at-- {
			numbers[i] = numbers[i]<<8 | T(data[size*i+at])
		}
	}
	return numbers, rest
}

func littleEndianAt(s string, i int) uint32 {
	return uint32(s[i]) | uint32(s[i+1])<<8 | uint32(s[i+2])<<16 | uint32(s[i+3])<<24
}

func littleEndian() bool {
	return binary.NativeEndian.Uint16([]byte{1, 0}) == 1
}

func aligned(data string) bool {
	return uintptr(unsafe.Pointer(unsafe.StringData(data)))%4 == 0
}

func (a *attribute) append(b []byte) []byte {
	b = appendText(b, a.kind)
	b = appendText(b, a.note)
	b = appendText(b, a.instead)
	barred := uint64(0)
	if a.barred {
		barred = 1
	}
	b = binary.AppendUvarint(b, barred)
	b = binary.AppendUvarint(b, uint64(len(a.sources)))
	for _, s := range a.sources {
		b = appendText(b, s.Category)
		b = appendText(b, s.Class)
		b = binary.AppendUvarint(b, uint64(s.Level))
	}
	return b
}

func (r *reader) attribute() attribute {
	a := attribute{kind: r.text(), note: r.text(), instead: r.text(), barred: r.number() != 0}
	if n := r.count(); n > 0 {
		a.sources = make([]Source, n)
	}
	for i := range a.sources {
		a.sources[i] = Source{Category: r.text(), Class: r.text(), Level: uint8(r.number())}
	}
	a.varieties = sourceVarieties(a.sources)
	return a
}

func appendText(b []byte, s string) []byte {
	b = binary.AppendUvarint(b, uint64(len(s)))
	return append(b, s...)
}

// reader reads uvarints and texts. Where what it reads is damaged it is short
// from then on, and gives zeros and empty texts.
type reader struct {
	rest  string
	short bool
}

func (r *reader) number() int {
	var n uint64
	for i := 0; i < len(r.rest) && i < 5; i++ {
		c := r.rest[i]
		n |= uint64(c&0x7f) << (7 * i)
		if c < 0x80 {
			r.rest = r.rest[i+1:]
			return int(n)
		}
	}
	r.rest, r.short = "", true
	return 0
}

// count reads the number of things that follow, each of which takes a byte.
func (r *reader) count() int {
	n := r.number()
	if n > len(r.rest) {
		r.rest, r.short = "", true
		return 0
	}
	return n
}

func (r *reader) text() string {
	n := r.count()
	s := r.rest[:n]
	r.rest = r.rest[n:]
	return s
}
