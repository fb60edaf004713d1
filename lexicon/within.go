package lexicon

import (
	"cmp"
	"slices"
	"strings"

	"emendary/align"
)

// Near is a word within a distance of a form.
type Near struct {
	Word     Word
	Letters  []align.Letter // the word's letters, folded, of [Lexicon.Alphabet]
	Distance int            // restricted Damerau, on folded letters
}

// maxForm is the most letters a form may have to be searched for: it bounds the
// space a search takes, also where k is far beyond use.
const maxForm = 10 * MaxLetters

// Within returns all known words within restricted distance k of form
// ([align.Restricted] on folded letters), by distance, then by text: every
// written form of its own, from every layer, with its highest layer where several
// have the same text. Words that [Lexicon.Find] would not find known are left
// out: those of other varieties only, and barred ones. The answer is exact for
// forms of up to 1,000 letters; no word is near a longer one.
//
// [Lexicon.AppendWithin] does the work, without the order by text.
func (x *Lexicon) Within(form string, k int) []Near {
	near := x.AppendWithin(nil, form, k)
	slices.SortFunc(near, func(a, b Near) int {
		return cmp.Or(cmp.Compare(a.Distance, b.Distance), strings.Compare(a.Word.Text, b.Word.Text))
	})
	return near
}

// AppendWithin appends the words that [Lexicon.Within] returns to near, by layer,
// the highest first, in each by distance, and at the same distance in the order of
// [List.Words].
//
// It overwrites what stands in near beyond its length, and the letters that are
// there too: a caller who passes a slice cut to length 0 and used before hands its
// space back, and must keep nothing of it. Then nothing is allocated for forms in
// ASCII, once the slice has held as many words as long.
//
// The search walks each layer's words from their starts and from their ends and
// leaves every branch on which no word can come within k. For k = 2 it takes some
// 0.02 ms on 130,000 words (lexicon/bench), for k = 4 some 0.5 ms, and far longer
// beyond that.
func (x *Lexicon) AppendWithin(near []Near, form string, k int) []Near {
	if x == nil || x.alphabet == nil || k < 0 {
		return near
	}
	s := x.searches.Get().(*search)
	defer x.searches.Put(s)
	return x.appendWithin(near, s, form, k)
}

func (x *Lexicon) appendWithin(near []Near, s *search, form string, k int) []Near {
	s.form = x.alphabet.AppendFolded(s.form[:0], form)
	if n := len(s.form); n > maxForm || n-k > MaxLetters {
		return near
	}
	s.prepare(min(k, max(len(s.form), MaxLetters))) // no distance is greater
	for which := layers - 1; which >= 0; which-- {
		if y := x.layers[which]; y != nil {
			near = x.gather(near, s, y, Layer(which))
		}
	}
	return near
}

// gather appends the known words within s.k of the form in a layer.
func (x *Lexicon) gather(near []Near, s *search, y *layer, which Layer) []Near {
	hits := s.within(y)
	near = slices.Grow(near, len(hits))
	room := rooms{chunk: len(hits)}
	covered := slices.ContainsFunc(x.layers[which+1:], func(y *layer) bool { return y != nil })
	for d := range s.k + 1 {
		for _, h := range hits {
			if int(h.distance) != d {
				continue
			}
			s.letters = s.letters[:0]
			for _, label := range s.labels[h.start:][:h.length] {
				s.letters = append(s.letters, y.toLetter[label])
			}
			hidden := covered && x.above(which, s.letters)
			x.knownForms(which, h.number, hidden, func(e entry) {
				n := len(near)
				near = slices.Grow(near, 1)[:n+1]
				letters := append(room.of(near[n].Letters, len(s.letters)), s.letters...)
				near[n] = Near{Word: x.word(e), Letters: letters, Distance: d}
			})
		}
	}
	return near
}

// rooms gives words room for their letters, many at once.
type rooms struct {
	chunk int // of how many words room is made at once
	left  []align.Letter
}

// of returns an empty slice with room for n letters: that of old where it has it.
func (r *rooms) of(old []align.Letter, n int) []align.Letter {
	if cap(old) >= n {
		return old[:0]
	}
	const usual = 16 // so that a longer word fits next time
	size := max(n, usual)
	if len(r.left) < size {
		r.left = make([]align.Letter, max(size, usual*r.chunk))
	}
	room := r.left[:0:size]
	r.left = r.left[size:]
	return room
}

// above reports whether a layer above which has entries that may cover a word
// with these folded letters.
func (x *Lexicon) above(which Layer, letters []align.Letter) bool {
	for _, y := range x.layers[which+1:] {
		if y != nil && y.mayCover(letters) {
			return true
		}
	}
	return false
}

// mayCover reports whether y has a word with one of the spellings that
// withoutStops gives of folded letters.
func (y *layer) mayCover(letters []align.Letter) bool {
	bare := letters
	if n := len(letters); n > 0 && letters[n-1] == fullStop {
		bare = letters[:n-1]
	}
	if p, ok := y.follow(bare); ok {
		if p.ends {
			return true
		}
		if label, ok := y.label(fullStop); ok {
			if arc, ok := y.trie.arc(p.node, label); ok && y.trie.arcs[2*arc]&endsWord != 0 {
				return true
			}
		}
	}
	if !slices.Contains(letters, fullStop) {
		return false
	}
	for _, s := range (spelling{letters: letters, folded: letters}).appendUnstopped(nil) {
		if _, ok := y.lookup(s.folded); ok {
			return true
		}
	}
	return false
}

// stands reports whether text, a listed word of a layer, is known, and no higher
// layer has the same text.
func (x *Lexicon) stands(text string, which Layer) bool {
	f := x.Find(text)
	if f.Status != Known {
		return false
	}
	return !slices.ContainsFunc(f.Words, func(w Word) bool { return w.Text == text && w.Layer > which })
}
