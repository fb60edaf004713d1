package ledger

import (
	"encoding/binary"
	"math/rand/v2"
	"testing"

	"github.com/stretchr/testify/assert"
)

// number returns the ID that tests write as a number; 0 is none.
func number(n int) ID {
	var id ID
	binary.BigEndian.PutUint64(id[8:], uint64(n))
	return id
}

func rule(id, with int) Ruling { return Ruling{ID: number(id), With: number(with), Act: Reject} }
func undo(id, of int) Ruling   { return Ruling{ID: number(id), Undoes: number(of), Act: Undo} }
func numbers(rulings []Ruling) []int {
	out := []int{}
	for _, r := range rulings {
		out = append(out, int(binary.BigEndian.Uint64(r.ID[8:])))
	}
	return out
}

func TestEffective(t *testing.T) {
	undoWith := undo(4, 1)
	undoWith.With = number(2)
	tests := []struct {
		name    string
		rulings []Ruling
		want    []int
	}{
		{"none", nil, []int{}},
		{"all stand", []Ruling{rule(1, 0), rule(2, 0)}, []int{1, 2}},
		{"undone", []Ruling{rule(1, 0), rule(2, 0), undo(3, 1)}, []int{2}},
		{"redone, at its old place", []Ruling{rule(1, 0), rule(2, 0), undo(3, 1), undo(4, 3)}, []int{1, 2}},
		{"redo undone", []Ruling{rule(1, 0), undo(2, 1), undo(3, 2), undo(4, 3)}, []int{}},
		{"undone twice, redone once", []Ruling{rule(1, 0), undo(2, 1), undo(3, 1), undo(4, 2)}, []int{}},
		{"undone twice, redone twice", []Ruling{rule(1, 0), undo(2, 1), undo(3, 1), undo(4, 2), undo(5, 3)}, []int{1}},
		{"leader undone", []Ruling{rule(1, 0), rule(2, 1), rule(3, 1), undo(4, 1)}, []int{}},
		{"leader redone", []Ruling{rule(1, 0), rule(2, 1), undo(3, 1), undo(4, 3)}, []int{1, 2}},
		{"one of those led undone", []Ruling{rule(1, 0), rule(2, 1), rule(3, 1), undo(4, 2)}, []int{1, 3}},
		{"leader of a leader undone", []Ruling{rule(1, 0), rule(2, 1), rule(3, 2), undo(4, 1)}, []int{}},
		{"those led redone under an undone leader", []Ruling{rule(1, 0), rule(2, 1), undo(3, 2), undo(4, 1), undo(5, 3)}, []int{}},
		{"ruled anew", []Ruling{rule(1, 0), undo(2, 1), rule(3, 2)}, []int{3}},
		{"ruled anew and undone", []Ruling{rule(1, 0), undo(2, 1), rule(3, 2), undo(4, 2)}, []int{1}},
		{"with means nothing on an undo", []Ruling{rule(1, 0), rule(2, 0), undo(3, 2), undoWith}, []int{}},
		{"undo of a later ruling", []Ruling{undo(1, 2), rule(2, 0)}, []int{2}},
		{"undo of itself and of strangers", []Ruling{rule(1, 0), undo(2, 2), undo(3, 9), undo(4, 0)}, []int{1}},
		{"with itself, a later one, a stranger", []Ruling{rule(1, 1), rule(2, 3), rule(3, 9), undo(4, 3)}, []int{1, 2}},
		{"given twice", []Ruling{rule(1, 0), undo(2, 1), rule(1, 0), undo(3, 2), undo(2, 1)}, []int{1}},
		{"without ids", []Ruling{rule(0, 0), rule(0, 0), undo(0, 0)}, []int{0, 0}},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			assert.Equal(t, tt.want, numbers(Effective(tt.rulings)))
		})
	}
}

// naive is the rule of Effective's comment, word for word, by recursion.
func naive(rulings []Ruling) []int {
	place := func(id ID) int {
		for i, r := range rulings {
			if r.ID == id && !id.IsZero() {
				return i
			}
		}
		return len(rulings)
	}
	twice := func(i int) bool { return !rulings[i].ID.IsZero() && place(rulings[i].ID) < i }
	var stands func(i int) bool
	stands = func(i int) bool {
		if twice(i) {
			return false
		}
		for j := i + 1; j < len(rulings); j++ {
			if rulings[j].Act == Undo && place(rulings[j].Undoes) == i && stands(j) {
				return false
			}
		}
		leader := place(rulings[i].With)
		return rulings[i].Act == Undo || leader >= i || stands(leader)
	}
	out := []int{}
	for i := range rulings {
		if rulings[i].Act != Undo && stands(i) {
			out = append(out, numbers(rulings[i:i+1])...)
		}
	}
	return out
}

// decode makes a ruling of every three bytes: what it is and its ID, what it
// undoes, what it is with. It keeps to ten rulings: naive is exponential.
func decode(data []byte) []Ruling {
	var rulings []Ruling
	for i := 0; i+2 < len(data) && len(rulings) < 10; i += 3 {
		r := rule(int(data[i]>>1)%12, int(data[i+2])%12)
		if data[i]&1 == 1 {
			r.Act, r.Undoes = Undo, number(int(data[i+1])%12)
		}
		rulings = append(rulings, r)
	}
	return rulings
}

func FuzzEffective(f *testing.F) {
	f.Add([]byte{})
	f.Add([]byte{2, 0, 0, 5, 1, 0, 7, 2, 0})          // redone
	f.Add([]byte{2, 0, 0, 4, 0, 1, 7, 1, 0, 9, 3, 2}) // a leader redone
	f.Add([]byte{2, 0, 0, 2, 0, 0, 3, 1, 1})          // given twice
	f.Fuzz(func(t *testing.T, data []byte) {
		rulings := decode(data)
		assert.Equal(t, naive(rulings), numbers(Effective(rulings)))
	})
}

func TestEffectiveAgreesWithTheRule(t *testing.T) {
	rng := rand.New(rand.NewPCG(1, 2))
	data := make([]byte, 30)
	for range 20000 {
		for i := range data {
			data[i] = byte(rng.Uint32())
		}
		rulings := decode(data)
		if !assert.Equal(t, naive(rulings), numbers(Effective(rulings))) {
			return
		}
	}
}
