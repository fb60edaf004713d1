package lexicon

import (
	"cmp"
	"slices"
	"strings"

	"emendary/align"
)

// maxBest is the most letters a form may have to be searched for its best words.
const maxBest = MaxLetters + 20

// Best appends to dst the best n words for the sheet's form: those for which edits
// and prior together cost least, none of them more than limit grains, by what they
// cost, then by text. The form's letters are those of [Lexicon.Alphabet], folded.
//
// Candidates are the words that [Lexicon.Within] would find at any distance, every
// written form of its own with the price of its own; but those with the same
// folded letters count as one of the n, which costs what its cheapest written
// form costs, and all of them that cost no more than limit are appended. The
// answer is exact: that of pricing the whole lexicon. A form of more than 120
// letters has none.
//
// Like [Lexicon.AppendWithin], Best uses again what stands in dst beyond its length.
//
// It takes some three milliseconds on 130,000 words for the best ten, which may lie
// twenty bits apart, and far more where they lie further; [Ranking.Near] is faster.
func (r *Ranking) Best(dst []Match, sheet *align.Sheet, n int, limit int32) []Match {
	return r.best(dst, sheet, n, limit, never)
}

// Near is Best for those words alone that cost at most margin grains more than the
// best one as well. A margin of ten bits leaves out what is less likely by a factor
// of a thousand; then it takes half a millisecond.
func (r *Ranking) Near(dst []Match, sheet *align.Sheet, n int, limit, margin int32) []Match {
	return r.best(dst, sheet, n, limit, min(max(margin, 0), never))
}

func (r *Ranking) best(dst []Match, sheet *align.Sheet, n int, limit, margin int32) []Match {
	b := r.scratch.Get().(*best)
	defer r.scratch.Put(b)
	return b.appendBest(dst, r, sheet, n, limit, margin)
}

func (b *best) appendBest(dst []Match, r *Ranking, sheet *align.Sheet, n int, limit, margin int32) []Match {
	form := sheet.Form()
	if n <= 0 || len(form) > maxBest {
		return dst
	}
	b.Ranking, b.sheet, b.form, b.n = r, sheet, form, n
	b.list, b.limit, b.margin = b.list[:0], min(limit, never-1), margin
	b.sheet.Least(&b.least)
	b.prices.reset(sheet, &b.least, r.lengths)
	for k := 2; k <= quickEdits && len(b.list) < n; k++ {
		b.quick(k)
	}
	b.complete()
	b.limit = b.utmost()
	return b.appendTo(dst)
}

// best is the scratch space of one search for best words.
type best struct {
	*Ranking
	sheet  *align.Sheet
	form   []align.Letter
	n      int
	limit  int32
	margin int32
	narrow bool   // let only few ways lead on
	list   []held // the best so far, in order

	search  search // for the quick set
	scorer  align.Scorer
	letters []align.Letter // of a word

	least   align.Least
	prices  reduced
	rows    []row                 // by depth
	path    []align.Letter        // read so far
	symbols [MaxLetters + 2]uint8 // of path, after an edge
}

// held is a word among the best so far.
type held struct {
	letters      []align.Letter
	edits, prior int32
	text         string // of the written form that costs least
}

func (h *held) total() int32 { return h.edits + h.prior }

// bound returns what a word may cost at most to be among the best.
func (b *best) bound() int32 {
	if len(b.list) < b.n {
		return b.utmost()
	}
	return min(b.list[b.n-1].total(), b.utmost())
}

// utmost returns what a word may cost at most whatever others cost but the best.
func (b *best) utmost() int32 {
	if len(b.list) == 0 {
		return b.limit
	}
	return min(b.limit, b.list[0].total()+b.margin)
}

// take takes a word, whose cheapest alignment costs edits, into the list if it is
// among the best so far.
func (b *best) take(letters []align.Letter, edits int32) {
	for i := range b.list {
		if b.list[i].edits == edits && slices.Equal(b.list[i].letters, letters) {
			return
		}
	}
	h := held{edits: edits, prior: never}
	b.lexicon.known(letters, func(e entry) {
		if price := b.price(e, len(letters)); price < h.prior || price == h.prior && e.text < h.text {
			h.prior, h.text = price, e.text
		}
	})
	if h.prior == never || h.total() > b.bound() {
		return
	}
	i, _ := slices.BinarySearchFunc(b.list, h, func(x, y held) int {
		return cmp.Or(cmp.Compare(x.total(), y.total()), strings.Compare(x.text, y.text))
	})
	if i == b.n {
		return
	}
	if len(b.list) == b.n {
		h.letters = b.list[b.n-1].letters[:0]
		b.list = b.list[:b.n-1]
	} else if n := len(b.list); n < cap(b.list) {
		h.letters = b.list[:n+1][n].letters[:0]
	}
	h.letters = append(h.letters, letters...)
	b.list = slices.Insert(b.list, i, h)
}

// price returns the price of an entry of so many letters, never where it is no
// candidate.
func (r *Ranking) price(e entry, letters int) int32 {
	if price, ok := r.own.of(&r.ownPrices, e); ok {
		return price
	}
	return r.weights[e.which].price(r.lexicon.layers[e.which].gradeOf[e.attribute], letters)
}

// found takes in a word that a walk came upon.
func (b *best) found(letters []align.Letter) {
	for i := range b.list {
		if slices.Equal(b.list[i].letters, letters) {
			return
		}
	}
	if edits, ok := b.scorer.Score(b.sheet, letters, b.bound()+1); ok {
		b.take(letters, edits)
	}
}

// complete takes in all words that are among the best, by branch and bound: it walks
// the tries row by row of the table of restricted alignments, from both ends, and
// leaves a branch where no word below it can cost as little as the last of the best.
//
// Where too few words are known for a bound, narrow walks look for some first, which
// let only few ways lead on, with a bound that is a little greater each time (as in
// iterative deepening: Korf, “Depth-First Iterative-Deepening”, Artificial
// Intelligence 27(1), 1985). They find most of the best words in little time.
func (b *best) complete() {
	if b.rows == nil {
		b.rows = make([]row, MaxLetters+2)
		for d := range b.rows {
			b.rows[d].cells = make([]int32, maxBest+2)
		}
		b.path = make([]align.Letter, MaxLetters+1)
	}
	limit := b.limit
	goal := b.prices.base + firstGoal
	if k := len(b.list); k > 0 {
		goal = max(b.list[k-1].total(), b.prices.base+goalOfSome)
	}
	for step := firstStep; ; step += step / 2 {
		b.narrow = goal < b.bound()
		if !b.narrow {
			b.walk(goal < never)
			return
		}
		b.limit = min(limit, goal)
		b.walk(true)
		b.limit = limit
		goal += step
		if step > lastStep {
			goal = never
		}
	}
}

// The first bounds tried, above base, and by how much the next one is greater, in
// grains. That no words are within three edits says that the best are far; that some
// are, but too few, says that the others are further yet.
const (
	firstGoal  = 24 << 10
	goalOfSome = 36 << 10
	firstStep  = int32(5 << 10)
	lastStep   = 24 << 10 // beyond it words are far from all, and no bound is tried
)

// walk walks all tries, from both ends or from the start alone, which takes less time
// where next to nothing is too far.
func (b *best) walk(both bool) {
	way := 0
	if b.prices.flat {
		way = 1
	}
	if o := b.own; o.trie.root != 0 {
		floors := &b.ownPrices
		f := forward{best: b, trie: &o.trie, toLetter: o.toLetter, symbol: o.symbols, floors: floors.forward[way], whole: !both || o.reversed.root == 0}
		f.start(floors.forward[way][0])
		if !f.whole {
			w := backward{best: b, reversed: &o.reversed, toLetter: o.toLetter, symbol: o.symbols, floors: floors.backward[way]}
			w.start()
		}
	}
	for which, y := range b.lexicon.layers {
		if y == nil || y.trie.root == 0 {
			continue
		}
		weights := b.weights[which]
		least := weights.floors[way][0]
		f := forward{
			best: b, trie: &y.trie, toLetter: y.toLetter, symbol: y.symbols,
			below: y.below, listed: y.listed, floors: weights.floors[way], whole: !both || y.reversed.root == 0,
		}
		f.start(least)
		if !f.whole {
			w := backward{best: b, reversed: &y.reversed, toLetter: y.toLetter, symbol: y.symbols, least: least}
			w.start()
		}
	}
}

// quick takes in the words within k unit edits, which gives a good bound.
func (b *best) quick(k int) {
	s := &b.search
	s.form = append(s.form[:0], b.form...)
	s.prepare(k)
	for which, y := range b.lexicon.layers {
		if y == nil {
			continue
		}
		w := b.weights[which]
		for _, h := range s.within(y) {
			letters := b.letters[:0]
			for _, label := range s.labels[h.start:][:h.length] {
				letters = append(letters, y.toLetter[label])
			}
			b.letters = letters
			limit := b.bound() - w.least(y.listed[h.number], int(h.length))
			if edits, ok := b.scorer.Score(b.sheet, letters, limit+1); ok {
				b.take(letters, edits)
			}
		}
	}
}

// quickEdits is how many unit edits the words taken in first may have: two, and one
// more where those are too few for a bound.
const quickEdits = 3

// appendTo appends the words of the list in all their written forms.
func (b *best) appendTo(dst []Match) []Match {
	start := len(dst)
	room := rooms{chunk: b.n}
	for i := range b.list {
		h := &b.list[i]
		if h.total() > b.limit {
			break
		}
		b.lexicon.known(h.letters, func(e entry) {
			price := b.price(e, len(h.letters))
			if h.edits+price > b.limit {
				return
			}
			n := len(dst)
			dst = slices.Grow(dst, 1)[:n+1]
			letters := append(room.of(dst[n].Letters, len(h.letters)), h.letters...)
			dst[n] = Match{Word: b.lexicon.word(e), Letters: letters, Edits: h.edits, Prior: price}
		})
	}
	slices.SortFunc(dst[start:], func(x, y Match) int {
		return cmp.Or(cmp.Compare(x.Total(), y.Total()), strings.Compare(x.Word.Text, y.Word.Text))
	})
	return dst
}
