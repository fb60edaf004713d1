package main

import (
	"os"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"
)

func TestManuscriptsGrowAlikeEachTime(t *testing.T) {
	base, err := os.ReadFile("../../../testdata/demo/manuscript.md")
	require.NoError(t, err)
	forms := func(text []byte) int {
		seen := map[string]bool{}
		for _, w := range strings.Fields(string(text)) {
			seen[w] = true
		}
		return len(seen)
	}
	small, large := grow(base, 20_000), grow(base, 80_000)
	require.Equal(t, small, grow(base, 20_000))
	require.GreaterOrEqual(t, len(strings.Fields(string(small))), 20_000)
	require.Less(t, len(strings.Fields(string(small))), 20_000+len(strings.Fields(string(base))))
	require.Greater(t, forms(large), forms(small), "new forms come in")
	require.Less(t, forms(large), 4*forms(small), "but fewer for each page")
}
