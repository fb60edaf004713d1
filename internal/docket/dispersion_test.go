package docket

import (
	"testing"

	"github.com/stretchr/testify/assert"
)

func TestDispersion(t *testing.T) {
	for _, c := range []struct {
		name        string
		hits, words []int
		want        Dispersion
	}{
		// Gries's worked example (2008), recomputed.
		{"five parts of unequal size", []int{1, 2, 3, 4, 5}, []int{9, 10, 10, 10, 11}, Dispersion{0.18, 0.2195, 0.7851}},
		// The following are computed from the definitions.
		{"as even as can be", []int{1, 2, 3}, []int{10, 20, 30}, Dispersion{0, 0, 1}},
		{"all in the smallest part", []int{5, 0}, []int{10, 30}, Dispersion{0.75, 1, 0}},
		{"all in one of equal parts", []int{0, 3, 0, 0}, []int{7, 7, 7, 7}, Dispersion{0.75, 1, 0}},
		{"parts without words count for nothing", []int{0, 1, 2, 3, 0, 4, 5}, []int{0, 9, 10, 10, 0, 10, 11}, Dispersion{0.18, 0.2195, 0.7851}},
		{"one part", []int{4}, []int{100}, Dispersion{0, 0, 1}},
		{"no hits", []int{0, 0}, []int{5, 5}, Dispersion{0, 0, 1}},
		{"no parts", nil, nil, Dispersion{0, 0, 1}},
	} {
		t.Run(c.name, func(t *testing.T) {
			got := DispersionOf(c.hits, c.words)
			assert.InDelta(t, c.want.DP, got.DP, 1e-4)
			assert.InDelta(t, c.want.DPnorm, got.DPnorm, 1e-4)
			assert.InDelta(t, c.want.D, got.D, 1e-4)
		})
	}
}

func TestDispersionOfAnEntry(t *testing.T) {
	s := desk(t, "# One\n\nA harber here.\n\n# Two\n\nNo lamp there at all, none.\n\n# Three\n\nA harber, a harber.\n")
	e := s.Docket.Find("harber")
	parts := s.Docket.Parts(e)
	assert.Equal(t, []int{1, 0, 2}, parts)
	assert.Equal(t, DispersionOf(parts, []int{4, 7, 5}), s.Docket.Dispersion(e))
}
