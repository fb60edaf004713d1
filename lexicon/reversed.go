package lexicon

import (
	"errors"
	"fmt"
	"math/bits"
	"slices"
)

// reversed is a minimal acyclic automaton of the words of a list read from their
// ends, without numbers. Where it has no arcs, there was no room for it (see
// reverse), and the list is searched in rows.
//
// An arc is one number: from childBit up the first arc of the node it leads to, 0
// for none; below that the label from bit 2 up, and the two bits of a trie's arc.
// Nodes stand as in a trie, and arc 0 is a filler too.
type reversed struct {
	root     uint32
	arcs     []uint32
	childBit int
}

// childBit returns the bit from which an arc of a reversed automaton over so many
// letters holds its child.
func childBit(letters int) int {
	return labelBit + bits.Len(uint(max(letters-1, 0)))
}

// reverse returns the reversed automaton of words, given by their labels, over so
// many letters. There is none where an arc's child and label do not fit in 32
// bits: for 46 letters that is beyond 16 million arcs, for 10,000 beyond 65,536.
//
// It takes O(n log n) comparisons for n words.
func reverse(words [][]uint32, letters int) reversed {
	turned := make([][]uint32, len(words))
	for i, w := range words {
		turned[i] = slices.Clone(w)
		slices.Reverse(turned[i])
	}
	slices.SortFunc(turned, slices.Compare[[]uint32])
	b := newTrieBuilder()
	for _, w := range turned {
		b.add(w)
	}
	return packed(b.finish(), letters)
}

// packed returns a trie over so many letters in the form of a reversed automaton.
func packed(t trie, letters int) reversed {
	r := reversed{root: t.root, childBit: childBit(letters)}
	if len(t.skips) > 1<<max(32-r.childBit, 0) {
		return reversed{childBit: r.childBit}
	}
	r.arcs = make([]uint32, len(t.skips))
	for i := range r.arcs {
		r.arcs[i] = t.arcs[2*i+1]<<r.childBit | t.arcs[2*i]
	}
	return r
}

// check makes sure that every walk stays within the arcs and comes to an end.
func (r *reversed) check(letters int) error {
	if len(r.arcs) == 0 && r.root == 0 {
		return nil
	}
	if int(r.root) >= len(r.arcs) || r.arcs[len(r.arcs)-1]&lastArc == 0 {
		return errors.New("its reversed root or last node is missing")
	}
	node := uint32(1) // first arc of the node
	bit := r.childBit & 31
	low := uint32(1)<<bit - 1
	for i, arc := range r.arcs[1:] {
		if arc>>bit >= node {
			return fmt.Errorf("reversed arc %d leads to a node that is not before its own", i+1)
		}
		if int(arc&low>>labelBit) >= letters {
			return fmt.Errorf("reversed arc %d has a letter that does not exist", i+1)
		}
		last := -(arc & lastArc / lastArc) // all bits or none: where nodes end can't be foretold
		node ^= (node ^ (uint32(i) + 2)) & last
	}
	return nil
}
