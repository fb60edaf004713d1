package lexicon

import (
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// gradedList returns a list of random short words of several levels and
// categories; some of them are written in two ways.
func gradedList(t *testing.T, random *rand.Rand) *List {
	categories := []string{"english", "american", "british_z", "variant_1"}
	var words []Word
	for _, labels := range randomWords(random, 80, 3, 6) {
		text := ""
		for _, l := range labels {
			text += string("abc"[l])
		}
		w := Word{Text: text, Barred: random.IntN(10) == 0, Kind: []string{"", "person", "term"}[random.IntN(3)]}
		for range random.IntN(3) {
			w.Sources = append(w.Sources, Source{categories[random.IntN(4)], "words", uint8(10 + 20*random.IntN(3))})
		}
		words = append(words, w)
		if random.IntN(4) == 0 {
			words = append(words, Word{Text: string(text[0]-'a'+'A') + text[1:], Kind: "place"})
		}
	}
	l, err := NewList("graded", words)
	require.NoError(t, err)
	return l
}

// spelt returns the labels of all words of a list, by their numbers.
func spelt(t *testing.T, l *List) [][]uint32 {
	x := New(l, AnyVariety)
	var words [][]uint32
	for w := range l.Words() {
		var labels []uint32
		for _, letter := range x.alphabet.AppendFolded(nil, w.Text) {
			label, ok := x.layers[Base].label(letter)
			require.True(t, ok)
			labels = append(labels, label)
		}
		if len(words) == 0 || !slices.Equal(words[len(words)-1], labels) {
			words = append(words, labels)
		}
	}
	return words
}

func TestFloorsAreTheLeastOfWhatIsBelow(t *testing.T) {
	random := rand.New(rand.NewPCG(11, 12))
	for range 50 {
		l := gradedList(t, random)
		require.NoError(t, l.check())
		weights := make([]int32, len(l.grades))
		for g := range weights {
			weights[g] = int32(random.IntN(1000))
		}
		floor := func(s uint16) int32 {
			least := int32(math.MaxInt32)
			for _, g := range l.set(s) {
				least = min(least, weights[g])
			}
			return least
		}
		assert.Equal(t, slices.Min(weights), floor(0))
		least := make([]int32, len(l.trie.skips)) // by the first arc of a node
		for i := range least {
			least[i] = math.MaxInt32
		}
		for n, labels := range spelt(t, l) {
			own := int32(math.MaxInt32)
			for a := range l.indexes(uint32(n)) {
				own = min(own, weights[l.gradeOf[a]])
			}
			require.Equal(t, own, floor(l.listed[n]))
			for node, i := l.trie.root, 0; i < len(labels); i++ {
				least[node] = min(least[node], own)
				arc, ok := l.trie.arc(node, labels[i])
				require.True(t, ok)
				node = l.trie.arcs[2*arc+1]
			}
		}
		for i, s := range l.below {
			require.Equal(t, least[l.trie.arcs[2*i+1]], floor(s))
		}
	}
}

// What a weight may look at is the same for every attribute of a grade.
func TestAttributesOfAGradeAreAlike(t *testing.T) {
	l := gradedList(t, rand.New(rand.NewPCG(13, 14)))
	require.Less(t, len(l.grades), len(l.attributes))
	for a := range l.attributes {
		own, graded := l.attributes[a].word("", Base), l.graded(int(l.gradeOf[a]), Base)
		for v := range varieties {
			level, ok := own.Level(Variety(v))
			same, has := graded.Level(Variety(v))
			assert.Equal(t, ok, has)
			assert.Equal(t, level, same)
		}
		assert.Equal(t, own.IsName(), graded.IsName())
		assert.Equal(t, own.Barred, graded.Barred)
		assert.Equal(t, own.abbreviation(), graded.abbreviation())
		assert.Equal(t, own.IsAbbreviation(), graded.IsAbbreviation())
	}
}

// Where there are more sets than numbers, those that are left over have the
// number of the set of all.
func TestSetsLeftOverHaveEveryGrade(t *testing.T) {
	m := marks{grades: make([]int, 17)}
	sets := newGradeSets(&m)
	for bits := range uint64(1 << 17) {
		n := sets.number([]uint64{bits})
		if bits < maxSets-1 {
			require.Equal(t, uint16(bits+1), n)
		} else {
			require.Equal(t, uint16(0), n)
		}
	}
	require.NoError(t, m.check())
	assert.Len(t, m.set(0), 17)
}

func TestASetThatDoesNotExistIsThatOfAll(t *testing.T) {
	m := marks{ends: []uint32{2, 3}, members: []uint16{7, 9, 9}}
	assert.Equal(t, []uint16{7, 9}, m.set(2))
	assert.Equal(t, []uint16{9}, m.set(1))
}

func TestReversedAutomatonHasTheWordsFromTheirEnds(t *testing.T) {
	random := rand.New(rand.NewPCG(15, 16))
	for range 100 {
		words := randomWords(random, 60, 4, 7)
		r := reverse(words, 4)
		require.NoError(t, r.check(4))
		require.Equal(t, words, wordsOf(&r))
	}
	r := reverse(nil, 0)
	assert.NoError(t, r.check(0))
	assert.Empty(t, wordsOf(&r))
}

func wordsOf(r *reversed) [][]uint32 {
	var words [][]uint32
	var walk func(node uint32, path []uint32)
	walk = func(node uint32, path []uint32) {
		for i := node; i != 0; i++ {
			head := r.arcs[i] & (1<<r.childBit - 1)
			path := append(slices.Clone(path), head>>labelBit)
			if head&endsWord != 0 {
				word := slices.Clone(path)
				slices.Reverse(word)
				words = append(words, word)
			}
			walk(r.arcs[i]>>r.childBit, path)
			if head&lastArc != 0 {
				break
			}
		}
	}
	walk(r.root, nil)
	slices.SortFunc(words, slices.Compare[[]uint32])
	return words
}

// Ten thousand letters leave 16 bits for where an arc leads.
func TestNoReversedAutomatonWhereArcsDoNotFit(t *testing.T) {
	var words [][]uint32
	for a := range uint32(300) {
		for b := range uint32(300) {
			words = append(words, []uint32{a*b + 300, a, b, 9999 - b})
		}
	}
	slices.SortFunc(words, slices.Compare[[]uint32])
	assert.Empty(t, reverse(words, 10_000).arcs)
	few := reverse(words[:100], 10_000)
	assert.NotEmpty(t, few.arcs)
	assert.NoError(t, few.check(10_000))
	none := reverse(words, 10_000)
	assert.NoError(t, none.check(10_000))
}
