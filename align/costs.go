package align

import "math"

// Costs prices edits. Implementations must answer the same question the same way
// each time.
type Costs interface {
	// Cost returns the cost of turning form[i:i+m] into word[j:j+n], which is
	// +Inf where there is no such edit. Costs add up along an alignment and
	// are compared with each other, no more: they may be counts, bits, or
	// scores with the sign turned; they may be negative. NaN and -Inf count
	// as +Inf.
	//
	// Cost may look at all of form, but at no more of word than word[:j+n]:
	// a search asks before it knows how the word goes on.
	Cost(form []Letter, i, m int, word []Letter, j, n int) float64

	// Span returns the most letters that an edit has on the side of the form
	// and on the side of the word. The work of an alignment grows with their
	// product.
	Span() (m, n int)
}

// Unit is the costs under which every insertion, deletion, substitution and
// transposition of one letter (two for the transposition) costs 1, a letter that
// agrees costs 0, and there is no other edit.
type Unit struct{}

// Cost implements [Costs].
func (Unit) Cost(form []Letter, i, m int, word []Letter, j, n int) float64 {
	if i < 0 || m < 0 || i > len(form)-m || j < 0 || n < 0 || j > len(word)-n {
		return math.Inf(1)
	}
	switch {
	case m == 1 && n == 1:
		if form[i] == word[j] {
			return 0
		}
		return 1
	case m == 1 && n == 0, m == 0 && n == 1:
		return 1
	case m == 2 && n == 2 && swapped(form[i:i+2], word[j:j+2]):
		return 1
	}
	return math.Inf(1)
}

// Span implements [Costs]: two letters, for the transposition.
func (Unit) Span() (m, n int) { return 2, 2 }

// swapped reports whether to is from, two different letters, the other way round.
func swapped(from, to []Letter) bool {
	return from[0] != from[1] && from[0] == to[1] && from[1] == to[0]
}
