package align_test

import (
	"math"
	"math/rand/v2"

	"emendary/align"
)

// The truth that the tests compare with: the definitions, carried out without
// any dynamic programming.

func letters(s string) []align.Letter {
	var a align.Alphabet
	return a.Letters(s)
}

// stringsOver returns every string over the first k letters of up to n letters.
func stringsOver(k, n int) [][]align.Letter {
	all := [][]align.Letter{{}}
	for from, length := 0, 1; length <= n; length++ {
		until := len(all)
		for _, s := range all[from:until] {
			for l := range k {
				all = append(all, append(append([]align.Letter{}, s...), align.Letter('a'+l)))
			}
		}
		from = until
	}
	return all
}

func random(r *rand.Rand, from string, most int) []align.Letter {
	pool := []rune(from)
	s := make([]align.Letter, r.IntN(most+1))
	for i := range s {
		s[i] = align.Letter(pool[r.IntN(len(pool))])
	}
	return s
}

// enumerate returns every list of edits from form to word that costs allow, by
// the sizes of the edits.
func enumerate(form, word []align.Letter, costs align.Costs) (lists [][][2]int, sums []float64) {
	m, n := costs.Span()
	var walk func(i, j int, list [][2]int, sum float64)
	walk = func(i, j int, list [][2]int, sum float64) {
		if i == len(form) && j == len(word) {
			lists = append(lists, append([][2]int{}, list...))
			sums = append(sums, sum)
			return
		}
		for p := 0; p <= min(m, len(form)-i); p++ {
			for q := 0; q <= min(n, len(word)-j); q++ {
				if p == 0 && q == 0 {
					continue
				}
				if c := costs.Cost(form, i, p, word, j, q); !math.IsInf(c, 1) {
					walk(i+p, j+q, append(list, [2]int{p, q}), sum+c)
				}
			}
		}
	}
	walk(0, 0, nil, 0)
	return lists, sums
}

// cheapest returns those of enumerate's lists that cost the least.
func cheapest(form, word []align.Letter, costs align.Costs) (lists [][][2]int, least float64) {
	all, sums := enumerate(form, word, costs)
	least = math.Inf(1)
	for _, s := range sums {
		least = min(least, s)
	}
	for i, s := range sums {
		if s-least < 1e-6 {
			lists = append(lists, all[i])
		}
	}
	return lists, least
}

func sizes(a align.Alignment) [][2]int {
	list := [][2]int{}
	for _, e := range a.Edits {
		list = append(list, [2]int{len(e.From), len(e.To)})
	}
	return list
}

// bits are costs such as fitted ones will be: edits of up to three letters a
// side, each at -log2 of some probability that depends on the letters and on the
// neighbour to the left. Few probabilities, so that there are ties.
type bits struct{}

func (bits) Span() (m, n int) { return 3, 3 }

func (bits) Cost(form []align.Letter, i, m int, word []align.Letter, j, n int) float64 {
	if m == 1 && n == 1 && form[i] == word[j] {
		return -math.Log2(0.9)
	}
	h := uint32(m*5 + n*3)
	for _, l := range form[i : i+m] {
		h = h*31 + uint32(l)
	}
	for _, l := range word[j : j+n] {
		h = h*37 + uint32(l)
	}
	if i > 0 {
		h += uint32(form[i-1])
	}
	if h%5 == 0 {
		return math.Inf(1)
	}
	return -math.Log2(0.1 * float64(1+h%3))
}

// steps returns the least number of edits from a to every string of the universe,
// by walking from string to string, one edit at a time: the definition of the
// unrestricted distance.
func steps(a string, universe map[string]bool) map[string]int {
	found := map[string]int{a: 0}
	queue := []string{a}
	for len(queue) > 0 {
		s := queue[0]
		queue = queue[1:]
		visit := func(next string) {
			if _, ok := found[next]; !ok && universe[next] {
				found[next] = found[s] + 1
				queue = append(queue, next)
			}
		}
		for i := range len(s) + 1 {
			for _, l := range []string{"a", "b", "c"} {
				visit(s[:i] + l + s[i:])
				if i < len(s) {
					visit(s[:i] + l + s[i+1:])
				}
			}
			if i < len(s) {
				visit(s[:i] + s[i+1:])
			}
			if i+1 < len(s) {
				visit(s[:i] + s[i+1:i+2] + s[i:i+1] + s[i+2:])
			}
		}
	}
	return found
}

func text(s []align.Letter) string {
	var a align.Alphabet
	return a.Text(s...)
}
