package lexicon

import (
	"cmp"
	"iter"
	"slices"
	"strings"

	"emendary/align"
)

// own is the words that a manuscript uses, in a trie of their own. It is not a
// minimal one: each node is reached in one way, so that floors of prices below are
// exact.
type own struct {
	trie     trie // not minimal: a node for each beginning
	toLetter []align.Letter
	symbols  []uint8
	words    []ownWord // by their letters
	starts   []uint32  // by number in the trie: its first word; and where the last one's end
	ends     []uint32  // by arc: the number of the word that ends on it
	reversed reversed  // the same words from their ends, likewise
	back     trie      // that one before it is packed
	begins   []uint32  // by arc of that: the number of the word that begins on it
	numbers  map[ownKey]uint32
}

// ownWord is a written form that the manuscript uses.
type ownWord struct {
	word    Word
	letters []align.Letter
	use     int
}

// ownKey names a word of a layer.
type ownKey struct {
	which  Layer
	number uint32
}

// ownPrices are the prices of own words, and by arc of either trie the least of the
// words through it, two ways: above what a word of its length costs at least, and as
// it is. Arc 0 has the least of all.
type ownPrices struct {
	words             []int32
	forward, backward [2][]int32
}

// ownWords finds the known words among used, and makes a trie of them.
func (x *Lexicon) ownWords(used iter.Seq2[string, int]) *own {
	o := &own{numbers: map[ownKey]uint32{}}
	if used == nil {
		return o
	}
	var keys []ownKey
	for text, use := range used {
		if letters := x.alphabet.AppendFolded(nil, text); len(letters) > 0 {
			x.known(letters, func(e entry) {
				if e.text == text {
					o.words = append(o.words, ownWord{x.word(e), letters, use})
					keys = append(keys, ownKey{e.which, e.number})
				}
			})
		}
	}
	order := make([]int, len(o.words))
	for i := range order {
		order[i] = i
	}
	words := o.words
	slices.SortFunc(order, func(i, j int) int {
		return cmp.Or(slices.Compare(words[i].letters, words[j].letters), strings.Compare(words[i].word.Text, words[j].word.Text))
	})
	o.words = make([]ownWord, 0, len(words))
	for _, i := range order {
		n := len(o.words)
		if n > 0 && o.words[n-1].word.Text == words[i].word.Text {
			continue // given twice
		}
		if n == 0 || !slices.Equal(o.words[n-1].letters, words[i].letters) {
			o.starts = append(o.starts, uint32(n))
		}
		o.words = append(o.words, words[i])
		o.numbers[keys[i]] = uint32(len(o.starts) - 1)
	}
	o.starts = append(o.starts, uint32(len(o.words)))
	o.grow()
	return o
}

// entry is a written form as a layer has it.
type entry struct {
	which     Layer
	number    uint32 // of the word in the layer's list
	attribute int
	text      string
}

// known yields the known words with these folded letters from every layer; of
// those that have the same text the one in the highest.
func (x *Lexicon) known(letters []align.Letter, yield func(entry)) {
	covered := false
	for which := layers - 1; which >= 0; which-- {
		y := x.layers[which]
		if y == nil {
			continue
		}
		number, ok := y.lookup(letters)
		hidden := ok && covered && x.above(Layer(which), letters)
		covered = true
		if !ok {
			continue
		}
		x.knownForms(Layer(which), number, hidden, yield)
	}
}

// knownForms yields the known written forms of a word of a layer. hidden says that
// a higher layer may have a say in it.
func (x *Lexicon) knownForms(which Layer, number uint32, hidden bool, yield func(entry)) {
	y := x.layers[which]
	r := y.record(number)
	for range r.number() {
		e := entry{which, number, r.number(), r.text()}
		if r.short || e.attribute >= len(y.attributes) {
			return
		}
		a := &y.attributes[e.attribute]
		if !a.barred && a.varieties.has(x.variety) && (!hidden || x.stands(e.text, which)) {
			yield(e)
		}
	}
}

// word returns the word of an entry.
func (x *Lexicon) word(e entry) Word {
	return x.layers[e.which].attributes[e.attribute].word(e.text, e.which)
}

// grow makes the trie of o.words.
func (o *own) grow() {
	labels := map[align.Letter]uint32{}
	for i := range o.words {
		for _, letter := range o.words[i].letters {
			if _, ok := labels[letter]; !ok {
				labels[letter] = 0
				o.toLetter = append(o.toLetter, letter)
			}
		}
	}
	slices.Sort(o.toLetter)
	o.symbols = symbolsOf(o.toLetter)
	for label, letter := range o.toLetter {
		labels[letter] = uint32(label)
	}
	paths := make([]ownPath, len(o.starts)-1)
	for n := range paths {
		paths[n].number = uint32(n)
		for _, letter := range o.words[o.starts[n]].letters {
			paths[n].labels = append(paths[n].labels, labels[letter])
		}
	}
	o.trie, o.ends = growPaths(paths)
	for i := range paths {
		slices.Reverse(paths[i].labels)
	}
	slices.SortFunc(paths, func(x, y ownPath) int { return slices.Compare(x.labels, y.labels) })
	back, begins := growPaths(paths)
	o.reversed, o.begins = packed(back, len(o.toLetter)), begins
	o.back = back
}

// ownPath is the path of an own word in a trie.
type ownPath struct {
	labels []uint32
	number uint32
}

// growPaths returns the trie of paths, ascending, with a node for each beginning,
// and by arc the number of the word that ends on it.
func growPaths(paths []ownPath) (trie, []uint32) {
	t, ends := trie{arcs: []uint32{lastArc, 0}, skips: []uint32{0}}, []uint32{0}
	var node func(paths []ownPath, depth int) uint32
	node = func(paths []ownPath, depth int) uint32 {
		if len(paths) == 0 {
			return 0
		}
		type arc struct{ head, child, skip, end uint32 }
		var arcs []arc
		for n := 0; n < len(paths); {
			label := paths[n].labels[depth]
			a := arc{head: label << labelBit, skip: uint32(n)}
			if len(paths[n].labels) == depth+1 {
				a.head |= endsWord
				a.end = paths[n].number
				n++
			}
			from := n
			for n < len(paths) && paths[n].labels[depth] == label {
				n++
			}
			a.child = node(paths[from:n], depth+1)
			arcs = append(arcs, a)
		}
		arcs[len(arcs)-1].head |= lastArc
		first := uint32(len(ends))
		for _, a := range arcs {
			t.arcs = append(t.arcs, a.head, a.child)
			t.skips = append(t.skips, a.skip)
			ends = append(ends, a.end)
		}
		return first
	}
	t.root = node(paths, 0)
	return t, ends
}

// price asks a prior for the prices of all own words; lengths are what words of lists
// cost at least.
func (o *own) price(p Prior, lengths []int32) ownPrices {
	prices := ownPrices{words: make([]int32, len(o.words))}
	for i := range o.words {
		w := &o.words[i]
		prices.words[i] = p.ask(w.word, len(w.letters), w.use)
	}
	for way := range 2 {
		floors := make([]int32, max(len(o.starts), 1)-1) // by number
		for n := range floors {
			of := o.starts[n]
			floors[n] = slices.Min(prices.words[of:o.starts[n+1]])
			if way == 0 {
				floors[n] -= lengths[len(o.words[of].letters)]
			}
		}
		prices.forward[way] = floorsThrough(&o.trie, o.ends, floors)
		prices.backward[way] = floorsThrough(&o.back, o.begins, floors)
	}
	return prices
}

// floorsThrough returns by arc of a trie the least floor of the words through it; ends
// has the numbers of the words that end on arcs.
func floorsThrough(t *trie, ends []uint32, floors []int32) []int32 {
	through := slices.Repeat([]int32{never}, len(ends))
	nodes := slices.Repeat([]int32{never}, len(ends)) // by first arc
	first := 1
	for arc := 1; arc < len(ends); arc++ { // nodes stand after those they lead to
		head := t.arcs[2*arc]
		if child := t.arcs[2*arc+1]; child != 0 {
			through[arc] = nodes[child]
		}
		if head&endsWord != 0 {
			through[arc] = min(through[arc], floors[ends[arc]])
		}
		nodes[first] = min(nodes[first], through[arc])
		if head&lastArc != 0 {
			first = arc + 1
		}
	}
	if len(through) > 0 {
		through[0] = slices.Min(through)
	}
	return through
}

// of returns the own price of an entry; false where the manuscript does not use
// it.
func (o *own) of(prices *ownPrices, e entry) (int32, bool) {
	n, ok := o.numbers[ownKey{e.which, e.number}]
	if !ok {
		return 0, false
	}
	for i := o.starts[n]; i < o.starts[n+1]; i++ {
		if o.words[i].word.Text == e.text && o.words[i].word.Layer == e.which {
			return prices.words[i], true
		}
	}
	return 0, false
}
