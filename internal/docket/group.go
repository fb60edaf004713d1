package docket

import (
	"cmp"
	"slices"
	"strings"
	"unicode"

	"emendary/internal/rank"
)

// Group is a kind of entry that is best ruled on together, in the order of review
// by slip.
type Group uint8

// The groups.
const (
	LikelySlips      Group = iota // one in five or more is a slip
	AnotherUsage                  // another variety's spellings, and barred words
	Doubtful                      // perhaps slips
	Dialect                       // dialect and elisions
	ForeignWords                  // words of other languages, and passages
	CompoundCoinages              // compounds, and coinages made of known parts
	Names
	Listed // listed words that somebody asked for
)

// String returns the group's name.
func (g Group) String() string {
	return [...]string{"likely slips", "other variety", "doubtful", "dialect", "foreign", "compounds and coinages", "names", "listed"}[g]
}

// From which probability of a slip on an entry is likely one, and doubtful: a slip
// that is passed over costs an editor far more than a look at a word.
const (
	likely   = 0.2
	doubtful = 0.05
)

// Group returns the group of e, by its kind, its probability of being a slip and
// what the manuscript tells of it.
func (d *Docket) Group(e *Entry) Group {
	switch p := d.Probability(e); {
	case e.Kind == WordInContext:
		return Listed
	case e.Kind == Passage:
		return ForeignWords
	case e.Kind == OtherVariety || e.Kind == BarredWord:
		return AnotherUsage
	case p >= likely:
		return LikelySlips
	case p >= doubtful:
		return Doubtful
	}
	return wordGroup(d.Evidence(e))
}

// strangers is how many unknown words around a form, of twelve, make it dialect or
// foreign by the company it keeps.
const strangers = 3

// wordGroup returns the group of what is held to be a word.
func wordGroup(v rank.Evidence) Group {
	name := v.Mixed || v.Capital+v.Start >= 0.5
	switch {
	case v.Hyphen && !(name && capitalMembers(v.Form)):
		return CompoundCoinages
	case v.Marked >= 0.5 && (v.Company >= 1 || !name):
		return ForeignWords
	case v.Elided >= 0.5:
		return Dialect
	case name:
		return Names
	case v.Company >= strangers && v.Speech >= 0.5:
		return Dialect
	case v.Company >= strangers:
		return ForeignWords
	}
	return CompoundCoinages
}

// capitalMembers reports whether every member of a compound has a capital: then
// it is a name.
func capitalMembers(form string) bool {
	return !slices.ContainsFunc(members(form), func(m string) bool {
		return !strings.ContainsFunc(m, unicode.IsUpper)
	})
}

// standing is what decides an entry's place in the order by slip.
type standing struct {
	group   Group
	slip    float64
	cluster *cluster // of names; nil for all else
	filed   string
}

// bySlip returns the order of entries by slip: by group; within a group the
// likelier slips first, dialect and foreign words by place, compounds by alphabet,
// and names by how likely the likeliest slip among the near forms of one name is,
// those near forms together, the most frequent first. Near forms of a doubtful name
// stand beside it.
func (d *Docket) bySlip(entries []*Entry) func(a, b *Entry) int {
	standings := make(map[*Entry]*standing, len(entries))
	var names []*Entry
	for _, e := range entries {
		s := &standing{group: d.Group(e), slip: d.Probability(e), filed: FiledUnder(e.Form)}
		standings[e] = s
		if v := d.Evidence(e); s.group == Names || s.group == Doubtful && wordGroup(v) == Names {
			names = append(names, e)
		}
	}
	for _, c := range clusters(names) {
		for _, e := range c.entries {
			s := standings[e]
			s.cluster = c
			c.group = min(c.group, s.group)
			c.slip = max(c.slip, s.slip)
			c.count += len(e.Occurrences)
		}
		for _, e := range c.entries {
			standings[e].group, standings[e].slip = c.group, c.slip
		}
	}
	return func(a, b *Entry) int {
		s, t := standings[a], standings[b]
		if c := cmp.Compare(s.group, t.group); c != 0 {
			return c
		}
		switch s.group {
		case Dialect, ForeignWords:
			return 0 // by place
		case CompoundCoinages:
			return cmp.Compare(s.filed, t.filed)
		}
		return cmp.Or(-cmp.Compare(s.slip, t.slip), compareClusters(s.cluster, t.cluster), byCount(a, b))
	}
}

// cluster is names each of which is one edit from another of them.
type cluster struct {
	entries []*Entry
	group   Group
	slip    float64 // of the likeliest
	count   int     // occurrences of all
	first   *Entry
}

func compareClusters(a, b *cluster) int {
	switch {
	case a == b:
		return 0
	case a == nil:
		return -1
	case b == nil:
		return 1
	}
	return cmp.Or(-cmp.Compare(a.count, b.count), byFirstPlace(a.first, b.first))
}

// clusters parts names into those near each other, by single linkage over one
// edit. O(names × letters) hashes, as neighbours.
func clusters(names []*Entry) []*cluster {
	root := make([]int, len(names))
	letters := make([][]rune, len(names))
	left := map[uint64][]int{}
	find := func(i int) int {
		for root[i] != i {
			root[i] = root[root[i]]
			i = root[i]
		}
		return i
	}
	var hashes []uint64
	for i, e := range names {
		root[i], letters[i] = i, []rune(Key(e.Form))
		hashes = leftovers(hashes[:0], letters[i])
		for _, h := range hashes {
			for _, j := range left[h] {
				near := slices.Equal(letters[i], letters[j]) ||
					min(len(letters[i]), len(letters[j])) >= leastStem && oneEdit(letters[i], letters[j])
				if near {
					root[find(i)] = find(j)
				}
			}
			left[h] = append(left[h], i)
		}
	}
	byRoot := map[int]*cluster{}
	var out []*cluster
	for i, e := range names {
		c := byRoot[find(i)]
		if c == nil {
			c = &cluster{group: Names, first: e}
			byRoot[find(i)] = c
			out = append(out, c)
		}
		c.entries = append(c.entries, e)
		if byFirstPlace(e, c.first) < 0 {
			c.first = e
		}
	}
	return out
}
