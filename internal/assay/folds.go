package assay

import (
	"fmt"
	"hash/fnv"
)

// Folds deals pairs to k folds, at least 2 and no more than there are pairs, and returns the fold of each, from 0 to
// k−1. Pairs that intend the same word, capitals and the style of apostrophes
// apart, are in one fold, and so are those that are linked by others between them,
// which intend several words. The fold hangs on those words alone, by a hash
// (FNV-1a) of the first of them in the alphabet: neither the order of the pairs nor
// the forms of any make a difference. Folds are near equal in size where there are
// many words for each; some may be empty where there are few.
func Folds(pairs []Pair, k int) ([]int, error) {
	if k < 2 {
		return nil, fmt.Errorf("%d folds; 2 are the least", k)
	}
	if k > len(pairs) {
		return nil, fmt.Errorf("%d folds of %d pairs; take fewer", k, len(pairs))
	}
	first := map[string]string{} // a word of the same group that is before it, or itself
	find := func(word string) string {
		for first[word] != word {
			first[word] = first[first[word]]
			word = first[word]
		}
		return word
	}
	add := func(word string) string {
		if _, ok := first[word]; !ok {
			first[word] = word
		}
		return find(word)
	}
	for _, p := range pairs {
		for _, word := range p.Intended {
			a, b := add(key(p.Intended[0])), add(key(word))
			first[max(a, b)] = min(a, b)
		}
	}
	folds := make([]int, len(pairs))
	for i, p := range pairs {
		word := ""
		if len(p.Intended) > 0 {
			word = find(key(p.Intended[0]))
		}
		h := fnv.New64a()
		h.Write([]byte(word))
		folds[i] = int(h.Sum64() % uint64(k))
	}
	return folds, nil
}
