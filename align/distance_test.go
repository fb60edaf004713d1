package align_test

import (
	"math/rand/v2"
	"strings"
	"testing"

	"github.com/agnivade/levenshtein"
	"github.com/hbollon/go-edlib"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/align"
)

func TestDistancesOfPublishedPairs(t *testing.T) {
	tests := []struct {
		a, b                              string
		levenshtein, restricted, distance int
		source                            string
	}{
		{"kitten", "sitting", 3, 3, 3, "common textbook example"},
		{"saturday", "sunday", 3, 3, 3, "common textbook example"},
		{"CA", "ABC", 3, 3, 2, "Lowrance & Wagner 1975; Boytsov 2011"},
		{"CA", "AC", 2, 1, 1, "Boytsov 2011: the triangle inequality"},
		{"AC", "ABC", 1, 1, 1, "Boytsov 2011: the triangle inequality"},
		{"a cat", "an abct", 4, 4, 3, "computed from the definitions"},
		{"recieve", "receive", 2, 1, 1, "computed from the definitions"},
		{"industry", "interest", 6, 6, 6, "string-comparison literature, recomputed"},
		{"annual", "annealing", 4, 4, 4, "string-comparison literature, recomputed"},
		{"physical", "fisikle", 6, 6, 6, "string-comparison literature, recomputed"},
		{"", "", 0, 0, 0, "the definitions"},
		{"", "abc", 3, 3, 3, "the definitions"},
		{"cafe\u0301", "caf\u00e9", 0, 0, 0, "equal in NFC"},
		{"n\u0308on", "on\u0308n", 2, 1, 1, "computed from the definitions"},
	}
	for _, test := range tests {
		t.Run(test.a+"/"+test.b, func(t *testing.T) {
			var alphabet align.Alphabet
			a, b := alphabet.Letters(test.a), alphabet.Letters(test.b)
			for range 2 {
				assert.Equal(t, test.levenshtein, align.Levenshtein(a, b), test.source)
				assert.Equal(t, test.restricted, align.Restricted(a, b), test.source)
				assert.Equal(t, test.distance, align.Distance(a, b), test.source)
				a, b = b, a
			}
		})
	}
}

// Recomputed by enumeration for DESIGN.md's table.
func TestSixShortPairsDifferBetweenRestrictedAndUnrestricted(t *testing.T) {
	all := stringsOver(3, 3)
	require.Len(t, all, 1+3+9+27)
	pairs := 0
	for i, a := range all {
		for _, b := range all[:i] {
			if r, d := align.Restricted(a, b), align.Distance(a, b); r != d {
				pairs++
				assert.Equal(t, [2]int{3, 2}, [2]int{r, d}, "%s/%s", text(a), text(b))
			}
		}
	}
	assert.Equal(t, 6, pairs)
}

func TestDistanceIsTheFewestStepsFromStringToString(t *testing.T) {
	universe := make(map[string]bool)
	for _, s := range stringsOver(3, 5) {
		universe[text(s)] = true
	}
	short := stringsOver(3, 4)
	for _, a := range short {
		truth := steps(text(a), universe)
		for _, b := range short {
			if want := truth[text(b)]; align.Distance(a, b) != want {
				t.Fatalf("%s/%s: %d, want %d", text(a), text(b), align.Distance(a, b), want)
			}
		}
	}
}

func TestLevenshteinAndDistanceAreMetrics(t *testing.T) {
	all := stringsOver(3, 3)
	for name, d := range map[string]func(a, b []align.Letter) int{"Levenshtein": align.Levenshtein, "Distance": align.Distance} {
		for i, a := range all {
			for j, b := range all {
				ab := d(a, b)
				if (ab == 0) != (i == j) || ab != d(b, a) {
					t.Fatalf("%s: %s/%s is %d, the other way %d", name, text(a), text(b), ab, d(b, a))
				}
				for _, c := range all {
					if ab > d(a, c)+d(c, b) {
						t.Fatalf("%s: %s/%s is shorter by %s", name, text(a), text(b), text(c))
					}
				}
			}
		}
	}
}

// The functions of hbollon/go-edlib were read against the papers, and are checked
// here as much as they check ours; both libraries compare code points.
func TestDistancesAgreeWithGeneralLibraries(t *testing.T) {
	r := rand.New(rand.NewPCG(1, 2))
	agree := func(a, b []align.Letter) {
		s, u := text(a), text(b)
		l, o, d := align.Levenshtein(a, b), align.Restricted(a, b), align.Distance(a, b)
		if l != levenshtein.ComputeDistance(s, u) || l != edlib.LevenshteinDistance(s, u) ||
			o != edlib.OSADamerauLevenshteinDistance(s, u) || d != edlib.DamerauLevenshteinDistance(s, u) {
			t.Fatalf("%q/%q: %d, %d, %d", s, u, l, o, d)
		}
		if d > o || o > l || o != align.Restricted(b, a) {
			t.Fatalf("%q/%q: unrestricted %d, restricted %d, Levenshtein %d", s, u, d, o, l)
		}
	}
	for _, pool := range []string{"ab", "abcd", "harbourmste", "añéßσςжя漢字한글𝔞😀'’-"} {
		for range 3000 {
			agree(random(r, pool, 12), random(r, pool, 12))
		}
	}
	for _, n := range []int{1, 31, 32, 33, 63, 64, 65, 127, 128, 129} {
		for _, m := range []int{n - 1, n, n + 1} {
			a, b := random(r, "abcd", 0), random(r, "abcd", 0)
			for len(a) < n {
				a = append(a, random(r, "abcd", 1)...)
			}
			for len(b) < m {
				b = append(b, random(r, "abcd", 1)...)
			}
			agree(a, b)
			agree(a, a[:n-1])
		}
	}
}

func TestDistancesOfDecomposedTextAreThoseOfComposedText(t *testing.T) {
	var a align.Alphabet
	assert.Equal(t, 1, align.Levenshtein(a.Letters("Göteborg"), a.Letters("Go\u0308tebarg")))
	assert.Equal(t, 1, align.Distance(a.Letters("🇳🇴🇸🇪"), a.Letters("🇸🇪🇳🇴")), "two flags change places")
}

var pair = [2]string{"acomodationally", "accommodatoinaly"}

func BenchmarkRestricted(b *testing.B) {
	form, word := letters(pair[0]), letters(pair[1])
	b.Run("ours", func(b *testing.B) {
		for b.Loop() {
			require.Equal(b, 4, align.Restricted(form, word))
		}
	})
	b.Run("go-edlib", func(b *testing.B) {
		for b.Loop() {
			require.Equal(b, 4, edlib.OSADamerauLevenshteinDistance(pair[0], pair[1]))
		}
	})
}

func BenchmarkLevenshtein(b *testing.B) {
	form, word := letters(pair[0]), letters(pair[1])
	b.Run("ours", func(b *testing.B) {
		for b.Loop() {
			require.Equal(b, 5, align.Levenshtein(form, word))
		}
	})
	b.Run("agnivade", func(b *testing.B) {
		for b.Loop() {
			require.Equal(b, 5, levenshtein.ComputeDistance(pair[0], pair[1]))
		}
	})
}

func BenchmarkDistance(b *testing.B) {
	form, word := letters(pair[0]), letters(pair[1])
	b.Run("ours", func(b *testing.B) {
		for b.Loop() {
			require.Equal(b, 4, align.Distance(form, word))
		}
	})
	b.Run("go-edlib", func(b *testing.B) {
		for b.Loop() {
			require.Equal(b, 4, edlib.DamerauLevenshteinDistance(pair[0], pair[1]))
		}
	})
}

func BenchmarkAlign(b *testing.B) {
	form, word := letters(pair[0]), letters(pair[1])
	for b.Loop() {
		require.Equal(b, 4.0, align.Align(form, word, align.Unit{}).Cost)
	}
}

func TestDistanceOfLongStrings(t *testing.T) {
	a, b := letters(strings.Repeat("ab", 1000)), letters(strings.Repeat("ba", 1000))
	assert.Equal(t, 2, align.Levenshtein(a, b))
	assert.Equal(t, 2, align.Restricted(a, b))
	assert.Equal(t, 2, align.Distance(a, b))
}
