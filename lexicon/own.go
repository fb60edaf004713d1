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
	trie     trie
	toLetter []align.Letter
	words    []ownWord // by their letters
	starts   []uint32  // by number in the trie: its first word; and where the last one's end
	ends     []uint32  // by arc: the number of the word that ends on it
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

// ownPrices are the prices of own words, and the least below each arc of their
// trie.
type ownPrices struct {
	words, below []int32
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
		r := y.record(number)
		for range r.number() {
			e := entry{Layer(which), number, r.number(), r.text()}
			if r.short || e.attribute >= len(y.attributes) {
				break
			}
			a := &y.attributes[e.attribute]
			if !a.barred && a.varieties.has(x.variety) && (!hidden || x.stands(e.text, e.which)) {
				yield(e)
			}
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
	for label, letter := range o.toLetter {
		labels[letter] = uint32(label)
	}
	o.trie = trie{arcs: []uint32{lastArc, 0}, skips: []uint32{0}}
	o.ends = []uint32{0}
	o.trie.root = o.node(0, uint32(len(o.starts)-1), 0, labels)
}

// node adds the node for the words numbered from first up to last, which have
// their first depth letters in common and more after them, and returns it.
func (o *own) node(first, last uint32, depth int, labels map[align.Letter]uint32) uint32 {
	if first == last {
		return 0
	}
	letters := func(n uint32) []align.Letter { return o.words[o.starts[n]].letters }
	type arc struct{ head, child, skip, end uint32 }
	var arcs []arc
	for n := first; n < last; {
		letter := letters(n)[depth]
		a := arc{head: labels[letter] << labelBit, skip: n - first}
		if len(letters(n)) == depth+1 {
			a.head |= endsWord
			a.end = n
			n++
		}
		from := n
		for n < last && letters(n)[depth] == letter {
			n++
		}
		a.child = o.node(from, n, depth+1, labels)
		arcs = append(arcs, a)
	}
	arcs[len(arcs)-1].head |= lastArc
	node := uint32(len(o.ends))
	for _, a := range arcs {
		o.trie.arcs = append(o.trie.arcs, a.head, a.child)
		o.trie.skips = append(o.trie.skips, a.skip)
		o.ends = append(o.ends, a.end)
	}
	return node
}

// price asks a prior for the prices of all own words.
func (o *own) price(p Prior) ownPrices {
	prices := ownPrices{words: make([]int32, len(o.words)), below: make([]int32, len(o.ends))}
	for i := range o.words {
		w := &o.words[i]
		prices.words[i] = p.ask(w.word, len(w.letters), w.use)
	}
	for arc := range prices.below {
		least := never
		if child := o.trie.arcs[2*arc+1]; child != 0 {
			for a := child; ; a++ {
				least = min(least, prices.below[a]) // nodes stand after those they lead to
				head := o.trie.arcs[2*a]
				if head&endsWord != 0 {
					least = min(least, prices.least(o, o.ends[a]))
				}
				if head&lastArc != 0 {
					break
				}
			}
		}
		prices.below[arc] = least
	}
	return prices
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

// least returns the least price of the written forms of own word number.
func (p *ownPrices) least(o *own, number uint32) int32 {
	return slices.Min(p.words[o.starts[number]:o.starts[number+1]])
}
