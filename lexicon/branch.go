package lexicon

import "emendary/align"

// branch takes in all words that are among the best, by branch and bound: it
// walks the tries row by row of the table of restricted alignments, and leaves a
// branch where no word below it can cost as little as the last of the best.
func (b *best) branch() {
	for len(b.rows) <= MaxLetters {
		b.rows = append(b.rows, nil)
	}
	for d := range b.rows {
		if cap(b.rows[d]) <= len(b.form) {
			b.rows[d] = make([]int32, maxBest+1)
		}
		b.rows[d] = b.rows[d][:len(b.form)+1]
	}
	b.sheet.First(b.rows[0])
	w := walk{best: b, trie: &b.own.trie, toLetter: b.own.toLetter}
	w.node(w.trie.root, 0, 0, [3]int32{0, never, never})
	for which, y := range b.lexicon.layers {
		if y != nil {
			w := walk{best: b, trie: &y.trie, toLetter: y.toLetter, layer: y, weights: b.weights[which]}
			w.node(w.trie.root, 0, 0, [3]int32{0, never, never})
		}
	}
}

// walk goes over one trie: that of a layer, or that of the own words.
type walk struct {
	*best
	trie     *trie
	toLetter []align.Letter
	layer    *layer // nil for own words
	weights  *weights
}

// node walks the arcs of a node at a depth; number is that of its first word, and
// least has the least of the last three rows.
func (w *walk) node(node uint32, depth int, number uint32, least [3]int32) {
	if node == 0 {
		return
	}
	depth++
	for arc := node; ; arc++ {
		head, child := w.trie.arcs[2*arc], w.trie.arcs[2*arc+1]
		w.path = append(w.path[:depth-1], w.toLetter[head>>labelBit])
		var before [3][]int32
		for i := range min(3, depth) {
			before[i] = w.rows[depth-1-i]
		}
		row := w.rows[depth]
		next := [3]int32{w.sheet.Step(row, before, w.path), least[0], least[1]}
		n := number + w.trie.skips[arc]
		if head&endsWord != 0 {
			if edits := row[len(w.form)]; edits+w.listed(n, depth) <= w.bound() {
				w.take(w.path, edits)
			}
			n++
		}
		if child != 0 && min(next[0], next[1], next[2])+w.floor(arc, depth) <= w.bound() {
			w.node(child, depth, n, next)
		}
		if head&lastArc != 0 {
			return
		}
	}
}

// listed returns the least price of word number, of so many letters.
func (w *walk) listed(number uint32, letters int) int32 {
	if w.layer == nil {
		return w.prices.least(w.own, number)
	}
	return w.weights.least(w.layer.listed[number], letters)
}

// floor returns the least price of the words below an arc that leads to a depth.
func (w *walk) floor(arc uint32, depth int) int32 {
	if w.layer == nil {
		return w.prices.below[arc]
	}
	return w.weights.floor(w.layer.below[arc], depth)
}
