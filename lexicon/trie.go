package lexicon

import "encoding/binary"

// trie is a minimal acyclic automaton over labels, with its words numbered from
// 0 in the order of their labels. The zero value has no words.
//
// Arc i is arcs[2i] and arcs[2i+1]. The first holds the label from bit 2 up, bit
// 1 where the arc is the last of its node, bit 0 where a word ends on it. The
// second is the first arc of the node it leads to, 0 for none: arc 0 is a filler.
// A node is the run of arcs from its first to its last, in ascending order of
// labels; it stands after every node it leads to, so there can be no cycle.
//
// skips[i] is how many words go through the arcs of its node that stand before
// arc i. Along the path of a word, the skips and one for every word that ends
// earlier on the path add up to its number.
type trie struct {
	root  uint32
	arcs  []uint32
	skips []uint32
}

const (
	endsWord = 1 << 0
	lastArc  = 1 << 1
	labelBit = 2
)

// number returns the number of the word that labels spell. It scans the arcs of
// one node for each label: O(labels × alphabet), and allocates nothing.
func (t *trie) number(labels []uint32) (uint32, bool) {
	var n uint32
	next := t.root
	for i, label := range labels {
		arc, ok := t.arc(next, label)
		if !ok {
			return 0, false
		}
		n += t.skips[arc]
		head := t.arcs[2*arc]
		if i == len(labels)-1 {
			return n, head&endsWord != 0
		}
		n += head & endsWord
		next = t.arcs[2*arc+1]
	}
	return 0, false
}

// arc returns the arc with a label of the node whose first arc is given.
func (t *trie) arc(arc, label uint32) (uint32, bool) {
	if arc == 0 {
		return 0, false
	}
	for t.arcs[2*arc]>>labelBit < label && t.arcs[2*arc]&lastArc == 0 {
		arc++
	}
	return arc, t.arcs[2*arc]>>labelBit == label
}

// draft is an arc of a node that is still open to more words.
type draft struct {
	label uint32
	ends  bool
	child uint32
}

// trieBuilder makes a trie of words added in ascending order.
type trieBuilder struct {
	trie
	open     [][]draft         // nodes on the path of the last word
	last     []uint32          // the last word
	register map[string]uint32 // closed nodes by their arcs
	counts   map[uint32]uint32 // words below a closed node
	key      []byte
}

func newTrieBuilder() *trieBuilder {
	return &trieBuilder{
		trie:     trie{arcs: []uint32{lastArc, 0}, skips: []uint32{0}},
		open:     make([][]draft, 1),
		register: map[string]uint32{},
		counts:   map[uint32]uint32{},
	}
}

// add adds a word that is greater than all before it and not empty.
func (b *trieBuilder) add(labels []uint32) {
	common := 0
	for common < len(b.last) && common < len(labels) && b.last[common] == labels[common] {
		common++
	}
	b.close(common)
	for i := common; i < len(labels); i++ {
		b.open[i] = append(b.open[i], draft{label: labels[i], ends: i == len(labels)-1})
		b.open = append(b.open, nil)
	}
	b.last = append(b.last[:0], labels...)
}

// close replaces the open nodes deeper than depth by equal closed ones, or
// closes them: replace_or_register of Daciuk et al. 2000, section 3.
func (b *trieBuilder) close(depth int) {
	for d := len(b.open) - 1; d > depth; d-- {
		parent := b.open[d-1]
		parent[len(parent)-1].child = b.node(b.open[d])
		b.open = b.open[:d]
	}
}

// node returns the closed node with the given arcs.
func (b *trieBuilder) node(drafts []draft) uint32 {
	if len(drafts) == 0 {
		return 0
	}
	b.key = b.key[:0]
	for _, a := range drafts {
		head := a.label << labelBit
		if a.ends {
			head |= endsWord
		}
		b.key = binary.LittleEndian.AppendUint32(b.key, head)
		b.key = binary.LittleEndian.AppendUint32(b.key, a.child)
	}
	if n, ok := b.register[string(b.key)]; ok {
		return n
	}
	first := uint32(len(b.skips))
	var count uint32
	for i, a := range drafts {
		head := a.label << labelBit
		if i == len(drafts)-1 {
			head |= lastArc
		}
		b.skips = append(b.skips, count)
		if a.ends {
			head |= endsWord
			count++
		}
		count += b.counts[a.child]
		b.arcs = append(b.arcs, head, a.child)
	}
	b.register[string(b.key)] = first
	b.counts[first] = count
	return first
}

// finish returns the trie. The builder is of no further use.
func (b *trieBuilder) finish() trie {
	b.close(0)
	b.root = b.node(b.open[0])
	return b.trie
}
