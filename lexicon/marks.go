package lexicon

import (
	"encoding/binary"
	"errors"
	"fmt"
	"math"
	"math/bits"
)

// marks tell, without a look at the words themselves, what can be listed at and
// below a place in the trie, so that a search which weighs words can leave a
// branch early.
//
// A grade is all that a weight may look at of a word: its level in each variety,
// whether it is a name, an abbreviation or nothing but that, and whether it is
// barred. Attributes of the same grade differ in kind, note, what stands instead,
// or in the categories and classes that come to the same. Sets of grades are
// numbered: set s has the members from ends[s-1] (0 for the first) up to ends[s],
// in ascending order. Set 0 has all grades of the list.
//
// To use them, weigh each grade once (graded gives a word of it), work out the
// least weight of each set, and look it up by below or listed (see weights). The
// automaton is minimal whatever its words are like, so that below covers all words
// that share a node, whichever way leads there. The words below a node are also
// numbered in one run: what is the least in a run of listed is the least for one
// path alone.
type marks struct {
	gradeOf []uint16 // by attribute
	grades  []int    // by grade: its first attribute
	ends    []uint32 // by set
	members []uint16
	below   []uint16 // by arc: the set of the words below the node that it leads to
	listed  []uint16 // by word number: the set of its written forms
}

// maxSets is how many sets of grades, and how many grades, can be numbered.
const maxSets = math.MaxUint16 + 1

// graded returns a word of grade g, without a text, as a layer has it.
func (l *List) graded(g int, which Layer) Word { return l.attributes[l.grades[g]].word("", which) }

// grade is what attributes of one grade have in common.
type grade struct {
	levels             [len(varieties)]uint8 // by variety, 0 where it lacks the word
	sources            bool
	name, abbreviation bool
	only               bool // an abbreviation and nothing else
	barred             bool
}

func (a *attribute) grade() grade {
	w := a.word("", Base)
	g := grade{sources: len(w.Sources) > 0, name: w.IsName(), abbreviation: w.abbreviation(), only: w.IsAbbreviation(), barred: w.Barred}
	for v := range g.levels {
		if level, ok := w.Level(Variety(v)); ok {
			g.levels[v] = uint8(level)
		}
	}
	return g
}

// mark grades the attributes of a finished list and marks its trie; words are the
// labels of its words by their numbers.
func (l *List) mark(words [][]uint32) error {
	numbers := map[grade]uint16{}
	for i := range l.attributes {
		g := l.attributes[i].grade()
		n, ok := numbers[g]
		if !ok {
			if len(l.grades) == maxSets {
				return fmt.Errorf("%s: its words stand in more than %d combinations of levels; use fewer", l.name, maxSets)
			}
			n = uint16(len(l.grades))
			numbers[g] = n
			l.grades = append(l.grades, i)
		}
		l.gradeOf = append(l.gradeOf, n)
	}
	sets := newGradeSets(&l.marks)
	arcs := len(l.trie.skips)
	width := sets.width
	through := make([]uint64, arcs*width) // by the first arc of a node: grades of the words below
	l.listed = make([]uint16, len(words))
	for n, labels := range words {
		clear(sets.room)
		for a := range l.indexes(uint32(n)) {
			g := l.gradeOf[a]
			sets.room[g/64] |= 1 << (g % 64)
		}
		l.listed[n] = sets.number(sets.room)
		node := l.trie.root
		for _, label := range labels {
			unite(through[int(node)*width:][:width], sets.room)
			arc, _ := l.trie.arc(node, label)
			node = l.trie.arcs[2*arc+1]
		}
	}
	clear(through[:width]) // no node begins with arc 0, which stands for none
	l.below = make([]uint16, arcs)
	for i := range l.below {
		l.below[i] = sets.number(through[int(l.trie.arcs[2*i+1])*width:][:width])
	}
	return nil
}

func unite(into, set []uint64) {
	for i, word := range set {
		into[i] |= word
	}
}

// gradeSets numbers sets of grades, given as bits.
type gradeSets struct {
	*marks
	width   int      // machine words of a set
	room    []uint64 // for one set
	numbers map[string]uint16
	key     []byte
}

func newGradeSets(m *marks) *gradeSets {
	s := &gradeSets{marks: m, width: len(m.grades)/64 + 1, numbers: map[string]uint16{}}
	s.room = make([]uint64, s.width)
	for g := range m.grades {
		s.room[g/64] |= 1 << (g % 64)
	}
	s.number(s.room)
	return s
}

// number returns the number of a set, 0 where there are too many: that set has
// every grade, and so this one's.
func (s *gradeSets) number(set []uint64) uint16 {
	s.key = s.key[:0]
	for _, word := range set {
		s.key = binary.LittleEndian.AppendUint64(s.key, word)
	}
	if n, ok := s.numbers[string(s.key)]; ok {
		return n
	}
	if len(s.ends) == maxSets {
		return 0
	}
	for i, word := range set {
		for ; word != 0; word &= word - 1 {
			s.members = append(s.members, uint16(64*i+bits.TrailingZeros64(word)))
		}
	}
	n := uint16(len(s.ends))
	s.numbers[string(s.key)] = n
	s.ends = append(s.ends, uint32(len(s.members)))
	return n
}

// check makes sure that the sets have members that exist. That below and listed
// name sets that exist is for set to see.
func (m *marks) check() error {
	from := uint32(0)
	for _, end := range m.ends {
		if end < from || int(end) > len(m.members) {
			return errors.New("its sets of grades do not fill their place")
		}
		from = end
	}
	if int(from) != len(m.members) || len(m.ends) == 0 {
		return errors.New("its sets of grades do not fill their place")
	}
	for _, g := range m.members {
		if int(g) >= len(m.grades) {
			return fmt.Errorf("grade %d does not exist", g)
		}
	}
	return nil
}

// set returns the grades of set s. A set that does not exist, as in damaged data,
// has those of all words.
func (m *marks) set(s uint16) []uint16 {
	if int(s) >= len(m.ends) {
		s = 0
	}
	from := uint32(0)
	if s > 0 {
		from = m.ends[s-1]
	}
	return m.members[from:m.ends[s]]
}
