package align

import (
	"fmt"
	"slices"
)

// Op is the kind of an edit, named as one who corrects the form would name it.
type Op uint8

// The kinds of edits.
const (
	Agreement     Op = iota // nothing changes
	Substitution            // one letter for another
	Insertion               // adds letters to the form
	Deletion                // takes letters from the form
	Transposition           // two neighbours that differ change places
	Replacement             // any other: several letters for one, one for several, several for several
)

// String returns the name of op in lower case.
func (op Op) String() string {
	switch op {
	case Agreement:
		return "agreement"
	case Substitution:
		return "substitution"
	case Insertion:
		return "insertion"
	case Deletion:
		return "deletion"
	case Transposition:
		return "transposition"
	case Replacement:
		return "replacement"
	}
	return fmt.Sprintf("op %d", uint8(op))
}

// Edit turns From, which stands at form[I:I+len(From)], into To, which stands at
// word[J:J+len(To)]. Costs that know longer edits may yield agreements,
// insertions and deletions of several letters.
type Edit struct {
	Op       Op
	I, J     int
	From, To []Letter
	Cost     float64
}

// operation returns the kind of the edit that turns from into to.
func operation(from, to []Letter) Op {
	switch {
	case slices.Equal(from, to):
		return Agreement
	case len(from) == 0:
		return Insertion
	case len(to) == 0:
		return Deletion
	case len(from) == 1 && len(to) == 1:
		return Substitution
	case len(from) == 2 && len(to) == 2 && swapped(from, to):
		return Transposition
	}
	return Replacement
}

// Alignment is the edits that turn a form into a word, from left to right,
// agreements included: their From parts joined are the form, their To parts
// joined are the word. Cost is the sum of theirs. The zero value aligns nothing
// with nothing.
type Alignment struct {
	Edits []Edit
	Cost  float64
}

// Apply carries out the edits on form and returns the word, in memory of its
// own. It returns an error, which names the edit and the place in letters from 1,
// where the edits do not fit the form, leave some of it out, or do not join up.
func (a Alignment) Apply(form []Letter) ([]Letter, error) {
	var word []Letter
	i := 0 // letters of form done
	for k, e := range a.Edits {
		if e.I != i || e.J != len(word) {
			return nil, fmt.Errorf("edit %d (%s) is at letter %d of the form and %d of the word, but the edits before it end at %d and %d; apply the edits in order, with none left out",
				k+1, e.Op, e.I+1, e.J+1, i, len(word))
		}
		if rest := form[i:]; len(rest) < len(e.From) || !slices.Equal(rest[:len(e.From)], e.From) {
			return nil, fmt.Errorf("edit %d (%s) does not fit the form at letter %d; apply the alignment to the form it was made from",
				k+1, e.Op, i+1)
		}
		i += len(e.From)
		word = append(word, e.To...)
	}
	if i < len(form) {
		return nil, fmt.Errorf("the edits end after letter %d of a form of %d; apply the alignment to the form it was made from",
			i, len(form))
	}
	return word, nil
}

// Replacements spells the alignment out by the letters of a form of n letters:
// element i is what takes the place of form[i], and is empty where that letter is
// deleted. An inserted letter joins the letter before it, or, at the very start,
// the one after it. Of an edit of several letters, each letter of the form takes
// one of the word's, and the last takes what is left. So the elements joined are
// the word, but for a form of no letters, which has no element to hold it.
func (a Alignment) Replacements(n int) [][]Letter {
	elements := make([][]Letter, max(n, 0))
	join := func(i int, letters ...Letter) {
		if i < len(elements) {
			elements[i] = append(elements[i], letters...)
		}
	}
	for _, e := range a.Edits {
		i, to := max(e.I, 0), e.To
		if len(e.From) == 0 {
			join(max(i-1, 0), to...)
			continue
		}
		for last := i + len(e.From) - 1; i < last && len(to) > 0; i++ {
			join(i, to[0])
			to = to[1:]
		}
		join(i, to...)
	}
	return elements
}
