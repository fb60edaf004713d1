package lexicon

import "emendary/align"

// branch takes in all words that are among the best, by branch and bound: it
// walks the tries row by row of the table of restricted alignments, and leaves a
// branch where no word below it can cost as little as the last of the best.
func (b *best) branch() {
	n := len(b.form)
	if len(b.fronts) == 0 {
		b.fronts = make([]front, MaxLetters+1)
		for d := range b.fronts {
			b.fronts[d].cells = make([]int32, maxBest+1)
		}
		b.path = make([]align.Letter, MaxLetters)
	}
	b.fronts[0].from, b.fronts[0].to = 0, n+1
	b.sheet.First(b.fronts[0].cells[:n+1])
	w := walk{best: b, trie: &b.own.trie, toLetter: b.own.toLetter, symbol: b.own.symbols, aheads: b.own.ahead}
	w.start()
	for which, y := range b.lexicon.layers {
		if y != nil {
			w = walk{
				best: b, trie: &y.trie, toLetter: y.toLetter, symbol: y.symbols, aheads: b.ahead[which],
				layer: y, weights: b.weights[which],
			}
			w.start()
		}
	}
}

// walk is on its way over one trie: that of a layer, or that of the own words.
type walk struct {
	*best
	trie     *trie
	toLetter []align.Letter // by label
	symbol   []uint8        // by label
	aheads   []ahead        // by node
	layer    *layer         // nil for own words
	weights  *weights
	same     [PriorLetters + 1]int32 // room for floors that do not differ
}

func (w *walk) start() {
	if w.trie.root != 0 {
		r := reach{limit: w.bound(), floors: w.same[:], lost: w.losses.none[:], letters: len(w.form)}
		w.node(w.trie.root, 0, 0, w.chances(0, &r))
	}
}

// node walks the arcs of a node at a depth; number is that of its first word.
func (w *walk) node(node uint32, depth int, number uint32, c chances) {
	if depth == MaxLetters {
		return
	}
	for arc := node; ; arc++ {
		head := w.trie.arcs[2*arc]
		if w.allow(&c, w.symbol[head>>labelBit], depth) {
			w.follow(arc, depth+1, number+w.trie.skips[arc])
		}
		if head&lastArc != 0 {
			return
		}
	}
}

// follow follows an arc to a depth; number is that of the first word there.
func (w *walk) follow(arc uint32, depth int, number uint32) {
	n := len(w.form)
	head, child := w.trie.arcs[2*arc], w.trie.arcs[2*arc+1]
	label := head >> labelBit
	w.path[depth-1], w.symbols[depth] = w.toLetter[label], w.symbol[label]
	from := n // the first cell that an edit may lead to
	for d := max(depth-3, 0); d < depth; d++ {
		from = min(from, w.fronts[d].from)
	}
	r := reach{
		limit: w.bound(), floors: w.floors(arc), lost: w.losses.of(&w.aheads[child], n, from), ending: never, letters: n + depth,
	}
	if head&endsWord != 0 {
		r.ending = w.listed(number, depth)
	}
	w.step(depth, &r)
	if head&endsWord != 0 {
		if edits := w.fronts[depth].at(n); edits+r.ending <= r.limit {
			w.take(w.path[:depth], edits)
		}
		number++
	}
	if child == 0 {
		return
	}
	c := w.chances(depth, &r)
	if c.next != 0 || c.insert > -perLetter || c.one > 0 {
		c.next |= w.aheads[child].all // what is still to be paid counts these in
		w.node(child, depth, number, c)
	}
}

// listed returns the least price of word number, of so many letters.
func (w *walk) listed(number uint32, letters int) int32 {
	if w.layer == nil {
		return w.prices.least(w.own, number)
	}
	if int(number) >= len(w.layer.listed) {
		return 0 // damaged data
	}
	return w.weights.least(w.layer.listed[number], letters)
}

// floors returns the floors of the words below an arc by their letters.
func (w *walk) floors(arc uint32) []int32 {
	var least int32
	if w.layer != nil {
		floors := w.weights.floorsOf(w.layer.below[arc])
		if w.least.Shift >= perLetter {
			return floors
		}
		least = never // some edits cost less than floors take them to
		for _, floor := range floors {
			least = min(least, floor)
		}
	} else {
		least = w.prices.below[arc]
	}
	for i := range w.same {
		w.same[i] = least
	}
	return w.same[:]
}
