package main

import (
	"os"
	"path/filepath"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

func TestEmbeddedTableIsWhatTheGeneratorMakes(t *testing.T) {
	dir := t.TempDir()
	require.NoError(t, generate(dir))
	for _, name := range []string{"letters.table", "names.table", "letters_source.go"} {
		made, err := os.ReadFile(filepath.Join(dir, name))
		require.NoError(t, err)
		committed, err := os.ReadFile(filepath.Join("..", name))
		require.NoError(t, err)
		assert.True(t, string(made) == string(committed), "%s: run go generate in internal/rank", name)
	}
}

func TestSmoothingSharesWithTheShorterContext(t *testing.T) {
	var uniform distribution
	for s := range uniform {
		uniform[s] = 1.0 / symbols
	}
	var counts [symbols]float64
	assert.Same(t, &uniform, smooth(&counts, &uniform), "nothing seen")
	counts[1], counts[2] = 6, 2
	p := smooth(&counts, &uniform)
	// 8 seen of 2 kinds: (6 + 2/28)/10, (2 + 2/28)/10 and (0 + 2/28)/10.
	assert.InDelta(t, (6+2.0/28)/10, p[1], 1e-12)
	assert.InDelta(t, (2+2.0/28)/10, p[2], 1e-12)
	assert.InDelta(t, 2.0/280, p[3], 1e-12)
}
