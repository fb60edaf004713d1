package lexicon

import (
	"math/bits"

	"emendary/align"
)

// ahead is what is known of the letters of the words below a node, as sets of
// symbols ([align.Symbol]), a bit each: those that some word has there, and those
// that all have; and how many letters the shortest and the longest has there.
type ahead struct {
	some, all         uint32
	shortest, longest uint8
}

// lookAhead returns what is ahead at each node of a trie, by its first arc, over
// labels with these symbols. It takes O(arcs).
func lookAhead(t *trie, symbols []uint8) []ahead {
	nodes := make([]ahead, len(t.skips))
	first := uint32(1)
	for arc := uint32(1); int(arc) < len(nodes); arc++ {
		head, child := t.arcs[2*arc], &nodes[t.arcs[2*arc+1]] // nodes stand after those they lead to
		own := uint32(1) << (symbols[head>>labelBit] & 31)
		all, shortest := own, uint8(1)
		if head&endsWord == 0 {
			all |= child.all
			shortest += child.shortest
		}
		node := &nodes[first]
		if arc == first {
			node.all, node.shortest = all, shortest
		}
		node.all &= all
		node.some |= own | child.some
		node.shortest = min(node.shortest, shortest)
		node.longest = max(node.longest, 1+child.longest)
		if head&lastArc != 0 {
			first = arc + 1
		}
	}
	return nodes
}

// losses bounds what is still to be paid where what is ahead does not fit what is
// left of the form: a letter of the form that no word has ahead is deleted or
// replaced, a letter that all words have and the form lacks is inserted or
// written for another. One edit may do both, so that a letter is also given a part
// of what its loss costs at least, which with any letter's coming in is no more than
// what writing the one for the other costs. What floors have in them for the length
// of a word is taken off (see reach).
type losses struct {
	lose    [maxBest]int32 // by letter of the form: what its loss costs at least
	part    [maxBest]int32 // the part of it that any gain leaves
	symbols [maxBest]uint8 // of the form
	form    uint32         // the same as a set

	// By symbol of a letter of the word, the least price:
	gain   [32]int32 // of its coming in
	insert [32]int32 // of inserting it after another letter, less perLetter
	twice  [32]int32 // likewise after the same letter
	one    [32]int32 // of writing it for another letter

	leastInsert, leastDelete int32 // of all, less perLetter

	none, room [maxBest + 1]int32 // zeros, and room for what of returns
}

func (l *losses) reset(sheet *align.Sheet, least *align.Least) {
	form := sheet.Form()
	l.form = 0
	for c := range l.gain {
		l.insert[c], l.twice[c], l.one[c] = never, never, never
	}
	for i, letter := range form {
		own := align.Symbol(letter)
		l.symbols[i] = uint8(own)
		l.form |= 1 << own
		l.lose[i] = least.Delete[i] - perLetter
		for c := 1; c < len(l.gain); c++ {
			if c != own {
				l.lose[i] = min(l.lose[i], least.One[c][i])
				l.one[c] = min(l.one[c], least.One[c][i])
			}
		}
	}
	for c := 1; c < len(l.gain); c++ {
		for i := range len(form) + 1 {
			l.insert[c] = min(l.insert[c], least.Insert[c][i])
			l.twice[c] = min(l.twice[c], least.Twice[c][i])
		}
		l.insert[c] -= perLetter
		l.twice[c] -= perLetter
		l.gain[c] = max(0, min(l.insert[c], l.twice[c], l.one[c]))
	}
	for _, e := range sheet.Long() {
		price := max(0, e.Price-int32(e.Shift())*perLetter)
		for i := e.I; i < e.I+e.M; i++ {
			l.lose[i] = min(l.lose[i], price/int32(e.M))
		}
		for _, c := range e.Symbols() {
			l.gain[c] = min(l.gain[c], price/int32(2*e.N))
		}
	}
	l.leastInsert, l.leastDelete = never, never
	for c := 1; c < len(l.gain); c++ {
		l.leastInsert = max(0, min(l.leastInsert, l.insert[c], l.twice[c]))
	}
	for i := range form {
		l.leastDelete = max(0, min(l.leastDelete, least.Delete[i]-perLetter))
	}
	for _, e := range sheet.Long() {
		switch {
		case e.M > e.N:
			l.leastDelete = max(0, min(l.leastDelete, e.Price/int32(e.M-e.N)-perLetter))
		case e.M < e.N:
			l.leastInsert = max(0, min(l.leastInsert, e.Price/int32(e.N-e.M)-perLetter))
		}
	}
	for i := range form {
		l.part[i] = max(0, least.Delete[i]-perLetter)
		l.lose[i] = max(0, l.lose[i])
		for c := 1; c < len(l.gain); c++ {
			if uint8(c) != l.symbols[i] {
				l.part[i] = min(l.part[i], max(0, least.One[c][i]-l.gain[c]))
			}
		}
	}
	for _, e := range sheet.Long() {
		price := max(0, e.Price-int32(e.Shift())*perLetter)
		for i := e.I; i < e.I+e.M; i++ {
			l.part[i] = min(l.part[i], price/int32(2*e.M))
		}
	}
}

// of returns by cell what is still to be paid at least for words with that ahead,
// for a form of n letters, from cell from on.
func (l *losses) of(a *ahead, n, from int) []int32 {
	missing, wanted := l.form&^a.some, a.all
	var lost, parts, gained int32
	for rest := wanted; rest != 0; rest &= rest - 1 {
		gained += l.gain[bits.TrailingZeros32(rest)]
	}
	l.room[n] = max(gained, int32(a.shortest)*l.leastInsert)
	for i := n - 1; i >= from; i-- {
		c := l.symbols[i] & 31
		if missing>>c&1 != 0 {
			lost += l.lose[i]
			parts += l.part[i]
		}
		if wanted>>c&1 != 0 {
			wanted &^= 1 << c
			gained -= l.gain[c]
		}
		more := max(int32(n-i-int(a.longest))*l.leastDelete, int32(int(a.shortest)-n+i)*l.leastInsert)
		l.room[i] = max(lost, parts+gained, more)
	}
	return l.room[:n+1]
}
