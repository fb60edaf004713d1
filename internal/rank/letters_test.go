package rank

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
)

func TestLettersTellWordsFromNoise(t *testing.T) {
	tests := []struct{ name, plausible, other string }{
		{"letters changed round", "harbour", "hrabour"},
		{"a run of consonants", "morning", "rnxrning"},
		{"an ending", "nothing", "nothign"},
		{"a letter too many", "cannot", "cannnot"},
		{"noise", "lighthouse", "xqzkvwjpqf"},
		{"letters of elsewhere", "window", "wíndow"},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			assert.Less(t, LettersOf(tt.plausible).Mean, LettersOf(tt.other).Mean)
			assert.Less(t, LettersOf(tt.plausible).Worst, LettersOf(tt.other).Worst)
		})
	}
}

func TestLettersIgnoreCase(t *testing.T) {
	assert.Equal(t, LettersOf("harbour"), LettersOf("HarbouR"))
}

func TestLettersOfNothing(t *testing.T) {
	l := LettersOf("")
	assert.Zero(t, l.Length)
	assert.Equal(t, l.Bits, l.Mean)
}

// After every context the probabilities of all symbols add up to 1, as far as
// sixteenths of a bit and the ceiling of a byte allow.
func TestLettersAreDistributions(t *testing.T) {
	for context := range LetterContexts {
		row := int(letterTable[2*context]) | int(letterTable[2*context+1])<<8
		sum := 0.0
		for s := range LetterSymbols {
			sum += math.Exp2(-float64(letterTable[2*LetterContexts+row*LetterSymbols+s]) / LetterUnits)
		}
		if !assert.InDelta(t, 1, sum, 0.03, "context %d", context) {
			return
		}
	}
}

func BenchmarkLettersOf(b *testing.B) {
	for b.Loop() {
		if LettersOf("harbourmaster").Length != 13 {
			b.Fatal("wrong length")
		}
	}
}
