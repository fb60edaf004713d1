package english_test

import (
	"bytes"
	"os"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/align"
	"emendary/lexicon/english"
)

// What is embedded says what the text says: the same price for every edit.
func TestEmbeddedCostsAreThoseOfTheText(t *testing.T) {
	text, err := os.ReadFile("english.costs")
	require.NoError(t, err)
	read, err := align.ReadCosts(bytes.NewReader(text), "english.costs")
	require.NoError(t, err)
	require.Equal(t, read, english.Costs(), "every count that a price comes from, and every price kept")

	compiled, err := read.AppendBinary(nil)
	require.NoError(t, err)
	data, err := os.ReadFile("costs.compiled")
	require.NoError(t, err)
	assert.True(t, bytes.Equal(compiled, data), "costs.compiled is not english.costs; go generate -run compile ./lexicon/english")
	var again bytes.Buffer
	_, err = english.Costs().WriteTo(&again)
	require.NoError(t, err)
	assert.True(t, bytes.Equal(text, again.Bytes()), "english.costs is not what the embedded costs write")
}

// BenchmarkOpenCosts tells what a program's start pays for the costs,
// BenchmarkReadCosts what it would pay for the text.
func BenchmarkOpenCosts(b *testing.B) {
	data, err := os.ReadFile("costs.compiled")
	require.NoError(b, err)
	flat := string(data)
	b.ReportAllocs()
	for b.Loop() {
		_, err := align.OpenCosts("English", flat)
		require.NoError(b, err)
	}
}

func BenchmarkReadCosts(b *testing.B) {
	text, err := os.ReadFile("english.costs")
	require.NoError(b, err)
	b.ReportAllocs()
	for b.Loop() {
		_, err := align.ReadCosts(bytes.NewReader(text), "english.costs")
		require.NoError(b, err)
	}
}
