package align

import (
	"context"
	"errors"
	"math"
	"slices"
)

// Pair is a form with the word that its writer meant, both folded.
type Pair struct {
	Form, Word []Letter
	Weight     float64 // how many pairs it counts for; 1 for one
}

// The course of a fitting, and how far estimates lean on coarser ones. The figures
// were chosen by how often the first candidate was right on pairs held out.
const (
	roundsOfLetters = 3 // of expectation–maximisation before edits of several letters
	roundsOfLong    = 3 // and with them
	leastWords      = 3 // words that an edit of several letters must be seen in
)

var smooth = smoothing{
	wrong:   [3]float64{100, 50, 50},
	written: [3]float64{20, 20, 20},
	swap:    200,
	long:    20,
}

// Fit estimates costs from labelled pairs by expectation–maximisation: under the
// costs so far each pair's edits count by their probability in all its alignments
// together (forward and backward sums, Ristad and Yianilos 1998, section 2), and
// the counts give the next costs. Edits of several letters come in after the
// third round: those that two or more slips side by side make up in at least three
// words.
//
// The same pairs in the same order give the same costs. None at all is an error.
// progress, where it is not nil, hears of each round. It takes O(|form|·|word|) time
// a pair and round: some seconds for 4,000 pairs.
func Fit(ctx context.Context, pairs []Pair, origin Origin, progress func(done, total int)) (*Fitted, error) {
	if len(pairs) == 0 {
		return nil, errors.New("no pairs to fit costs to; give misspelling and intended word, a pair a line")
	}
	f, t := Unfitted(), guess()
	total := roundsOfLetters + roundsOfLong
	for round := range total {
		if round == roundsOfLetters {
			t.long = harvest(f, pairs)
			f = newFitted(t.rest(), f.keys, smooth)
		}
		t = newTally()
		for _, p := range pairs {
			if err := ctx.Err(); err != nil {
				return nil, err
			}
			f.expect(p, t)
			t.spaces[0].met += p.Weight
			t.spaces[1].met += p.Weight
		}
		f = newFitted(t.prune().rest(), f.keys, smooth)
		if progress != nil {
			progress(round+1, total)
		}
	}
	f.Origin = origin
	f.Origin.Pairs = len(pairs)
	return f, nil
}

// Unfitted returns the costs that a fitting begins with, before any pair is seen.
func Unfitted() *Fitted { return newFitted(guess().rest(), newKeyboard(qwerty), smooth) }

// Bits returns how many bits a pair takes in the mean: −log₂ of the probability that
// who means the word writes the form, by all their alignments together. That is what
// a fitting makes less. Without pairs it returns 0.
func (f *Fitted) Bits(pairs []Pair) float64 {
	sum, weight := 0.0, 0.0
	for _, p := range pairs {
		sum += p.Weight * f.sums(p).bits
		weight += p.Weight
	}
	if weight == 0 {
		return 0
	}
	return sum / weight
}

// guess is what is believed before any pair is seen: an error in some twenty
// letters, mostly an omission or a wrong vowel (from memory of such lists).
func guess() *tally {
	t := newTally()
	for p := range positions {
		for look := range looks {
			t.looks[0][p][look] = ratio{1000, 50}
			t.looks[1][p][look] = ratio{1000, 30}
		}
		t.kinds[0][p] = [kinds]float64{omitted: 20, omittedDouble: 15, markLost: 5, vowel: 20, neighbourKey: 5, otherLetter: 10}
		t.kinds[1][p] = [kinds]float64{extra: 15, extraDouble: 20, extraKey: 5}
		t.swaps[p] = ratio{1000, 10}
	}
	return t
}

// way is an edit on some path from the start to the end of a pair.
type way struct {
	i, m, j, n int
	p          float64
}

// ways lists all edits that costs know between form and word, those that start
// further left first. Each is made likelier by 2^lift a letter of either: all paths
// from start to end alike.
func (f *Fitted) ways(form, word []Letter, lift float64) []way {
	var out []way
	symbols := spell(form)
	for i := 0; i <= len(form); i++ {
		for j := 0; j <= len(word); j++ {
			try := func(m, n int) {
				if c := f.Cost(form, i, m, word, j, n); !math.IsInf(c, 1) {
					out = append(out, way{i, m, j, n, math.Exp2(lift*float64(m+n) - c)})
				}
			}
			for m := 0; m <= 1 && i+m <= len(form); m++ {
				for n := 0; n <= 1 && j+n <= len(word); n++ {
					if m+n > 0 {
						try(m, n)
					}
				}
			}
			if i+2 <= len(form) && j+2 <= len(word) && swapped(form[i:i+2], word[j:j+2]) {
				try(2, 2)
			}
			for m := 1; m <= 3 && i+m <= len(form); m++ {
				for _, e := range f.longFrom(stretchOf(symbols[i : i+m])) {
					if n := e.to.size(); j+n <= len(word) && stretchIn(word[j:j+n]) == e.to {
						try(m, n)
					}
				}
			}
		}
	}
	return out
}

// size returns how many letters t has.
func (t stretch) size() int {
	n := slices.Index(t[:], edge)
	if n < 0 {
		return len(t)
	}
	return n
}

// sums are the probabilities of all ways to a place of a pair, and from it to the
// end, by letter of the form and letter of the word.
type sums struct {
	ways              []way
	forward, backward []float64
	width             int // places in a row
	all               float64
	bits              float64 // of the pair
}

// mostLift is what pairs are lifted by at the most, until their probability is a
// number above 0. Only long ones that have little in common are lifted at all.
const mostLift = 8

func (f *Fitted) sums(p Pair) sums {
	var s sums
	for lift := 0.0; lift <= mostLift && !(s.all > 0 && s.all < math.Inf(1)); lift++ {
		s = sums{ways: f.ways(p.Form, p.Word, lift), width: len(p.Word) + 1}
		s.forward = make([]float64, (len(p.Form)+1)*s.width)
		s.forward[0] = 1
		for _, w := range s.ways {
			s.forward[(w.i+w.m)*s.width+w.j+w.n] += s.forward[w.i*s.width+w.j] * w.p
		}
		s.all = s.forward[len(s.forward)-1]
		s.bits = lift*float64(len(p.Form)+len(p.Word)) - math.Log2(s.all)
	}
	s.backward = make([]float64, len(s.forward))
	s.backward[len(s.backward)-1] = 1
	for _, w := range slices.Backward(s.ways) {
		s.backward[w.i*s.width+w.j] += w.p * s.backward[(w.i+w.m)*s.width+w.j+w.n]
	}
	return s
}

// expect adds the edits of a pair to t, each by its probability.
func (f *Fitted) expect(p Pair, t *tally) {
	s := f.sums(p)
	form, word := spell(p.Form), spell(p.Word)
	for _, w := range s.ways {
		share := s.forward[w.i*s.width+w.j] * w.p / s.all * s.backward[(w.i+w.m)*s.width+w.j+w.n]
		if share < 1e-4 {
			continue
		}
		same := w.m == 1 && w.n == 1 && p.Form[w.i] == p.Word[w.j]
		t.edit(form, w.i, w.m, word, w.j, w.n, same, share*p.Weight, &f.keys)
	}
}

// harvest returns the edits of two or three letters on a side that two or more
// slips side by side make up, with how often; only those seen in several words.
func harvest(f *Fitted, pairs []Pair) map[longEdit]float64 {
	words := map[longEdit]map[string]bool{}
	counts := map[longEdit]float64{}
	for _, p := range pairs {
		form, word := spell(p.Form), spell(p.Word)
		edits := Align(p.Form, p.Word, f).Edits
		for first := range edits {
			slips := 0
			for last := first; last < len(edits); last++ {
				if edits[last].Op != Agreement {
					slips++
				}
				i, j := edits[first].I, edits[first].J
				m, n := edits[last].I+len(edits[last].From)-i, edits[last].J+len(edits[last].To)-j
				if m > 3 || n > 3 {
					break
				}
				if last == first || slips < 2 || m == 0 || n == 0 || slices.Contains(form[i:i+m], other) || slices.Contains(word[j:j+n], other) {
					continue
				}
				e := longEdit{stretchOf(form[i : i+m]), stretchOf(word[j : j+n])}
				if words[e] == nil {
					words[e] = map[string]bool{}
				}
				words[e][letterKey(p.Word)] = true
				counts[e] += p.Weight
			}
		}
	}
	for e := range counts {
		if len(words[e]) < leastWords {
			delete(counts, e)
		}
	}
	return counts
}

func letterKey(letters []Letter) string {
	b := make([]rune, len(letters))
	for i, l := range letters {
		b[i] = rune(l)
	}
	return string(b)
}

// misread are letters that print and handwriting make look like others (from
// memory of proofs and scanned pages). Pairs of one writer's slips may lack them.
var misread = [][2]string{{"rn", "m"}, {"m", "rn"}, {"nn", "m"}, {"cl", "d"}, {"d", "cl"}, {"vv", "w"}, {"ii", "u"}, {"li", "h"}}

// misreadCount is how often each of them is taken to have been seen.
const misreadCount = 0.3

// prune drops edits of several letters that the others explain better, but keeps
// some for the misread ones; and the counts of stretches that no price needs.
func (t *tally) prune() *tally {
	for e, n := range t.long {
		if n < 1 {
			delete(t.long, e)
		}
	}
	for _, m := range misread {
		t.long[longEdit{stretchOf(spellText(m[0])), stretchOf(spellText(m[1]))}] += misreadCount
	}
	needed := map[stretch]bool{}
	for e := range t.long {
		needed[e.to] = true
	}
	for s := range t.met {
		if s.size() > 2 && !needed[s] {
			delete(t.met, s)
		}
	}
	return t
}

func spellText(s string) []symbol {
	var letters []Letter
	for _, r := range s {
		letters = append(letters, Letter(r))
	}
	return spell(letters)
}
