package lexicon

import (
	"slices"
	"testing"
	"unsafe"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// flatSample has every kind of attribute and letter.
func flatSample(t testing.TB) *List {
	l, err := NewList("sample", []Word{
		{Text: "rose", Sources: []Source{{"english", "words", 20}}},
		{Text: "Rose", Sources: []Source{{"english", "proper-names", 50}}},
		{Text: "café", Sources: []Source{{"english", "words", 20}, {"variant_1", "words", 35}}},
		{Text: "ẍylo", Kind: "term", Note: "two code points in one letter"},
		{Text: "okay", Barred: true, Instead: "OK"},
		{Text: "o'clock"},
	})
	require.NoError(t, err)
	return l
}

func flatOf(t testing.TB, l *List) string {
	b, err := l.AppendBinary(nil)
	require.NoError(t, err)
	return string(b)
}

func TestFlatFormComesBackInPlaceAndDecoded(t *testing.T) {
	l := flatSample(t)
	flat := flatOf(t, l)
	for _, inPlace := range []bool{littleEndian() && aligned(flat), false} {
		again, err := open("sample", flat, inPlace)
		require.NoError(t, err)
		assert.Equal(t, slices.Collect(l.Words()), slices.Collect(again.Words()))
		assert.Equal(t, l.Len(), again.Len())
		assert.Equal(t, flat, flatOf(t, again))
		assert.Len(t, New(again, AnyVariety).Find("ROSE").Words, 2)
	}
}

func TestOpenDecodesWhatIsNotAligned(t *testing.T) {
	flat := flatOf(t, flatSample(t))
	for shift := range 4 {
		shifted := ("...." + flat)[4-shift:][shift:]
		room := make([]byte, len(flat)+8)
		start := shift + int(-uintptr(unsafe.Pointer(&room[0]))%4)
		copy(room[start:], shifted)
		data := unsafe.String(&room[start], len(flat))
		assert.Equal(t, shift == 0, aligned(data))
		l, err := Open("sample", data)
		require.NoError(t, err)
		assert.Equal(t, Known, New(l, AnyVariety).Find("café").Status)
	}
}

func TestOpenRefusesDamage(t *testing.T) {
	flat := flatOf(t, flatSample(t))
	for n := range len(flat) {
		_, err := Open("sample", flat[:n])
		require.ErrorContains(t, err, "sample: not the flat form of a list")
	}
	_, err := Open("sample", flat+"x")
	require.Error(t, err)
}

func TestViewIsOpenWithoutTheChecks(t *testing.T) {
	flat := flatOf(t, flatSample(t))
	opened, err := Open("sample", flat)
	require.NoError(t, err)
	viewed, err := View("sample", flat)
	require.NoError(t, err)
	assert.Equal(t, opened, viewed)
	_, err = View("sample", flat[1:])
	assert.EqualError(t, err, "sample: not the flat form of a list: other first bytes than expected; generate it anew")
}

func TestListWithoutWordsHasNoFlatForm(t *testing.T) {
	for _, l := range []*List{nil, {}} {
		_, err := l.AppendBinary(nil)
		assert.EqualError(t, err, "a list without words has no flat form")
	}
}

// Whatever the bytes, Open either refuses them or gives a list whose use comes to
// an end without a panic.
func FuzzOpen(f *testing.F) {
	flat := []byte(flatOf(f, flatSample(f)))
	f.Add(flat)
	for i := headerSize; i < len(flat); i += 7 {
		damaged := slices.Clone(flat)
		damaged[i] ^= 0x15
		f.Add(damaged)
	}
	f.Fuzz(func(t *testing.T, data []byte) {
		l, err := Open("fuzz", string(data))
		if err != nil {
			return
		}
		x := New(l, American)
		count := 0
		for w := range l.Words() {
			x.Find(w.Text)
			if count++; count > 20 {
				break
			}
		}
		x.Find("rose")
		x.Within("rsoe", 2)
	})
}
