package assay

import (
	"encoding/json"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// The mean reciprocal rank as Voorhees defines it (The TREC-8 Question Answering
// Track Report, 1999, section 3): "the reciprocal of the rank at which the first
// correct answer was found, or 0 if no correct answer was found", averaged. The
// figures are worked out from that.
func TestAccuracy(t *testing.T) {
	tests := []struct {
		name                          string
		ranks                         []int
		top1, top3, top5, top10, mean float64
	}{
		{"all first", []int{1, 1}, 1, 1, 1, 1, 1},
		{"none found", []int{0, 0, 0}, 0, 0, 0, 0, 0},
		{"first, third and none", []int{1, 3, 0}, 1.0 / 3, 2.0 / 3, 2.0 / 3, 2.0 / 3, (1 + 1.0/3) / 3},
		{"both sides of each bound", []int{1, 2, 3, 4, 5, 6, 10, 0}, 1.0 / 8, 3.0 / 8, 5.0 / 8, 7.0 / 8, (1 + 1.0/2 + 1.0/3 + 1.0/4 + 1.0/5 + 1.0/6 + 1.0/10) / 8},
		{"nothing counts", nil, 0, 0, 0, 0, 0},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			a := accuracy(tt.ranks, map[Reason]int{NoForm: 2, Unlisted: 3})
			assert.Equal(t, len(tt.ranks), a.N)
			assert.Equal(t, 5, a.LeftOut)
			assert.InDelta(t, tt.top1, a.Top1, 1e-12)
			assert.InDelta(t, tt.top3, a.Top3, 1e-12)
			assert.InDelta(t, tt.top5, a.Top5, 1e-12)
			assert.InDelta(t, tt.top10, a.Top10, 1e-12)
			assert.InDelta(t, tt.mean, a.MRR, 1e-12)
		})
	}
}

func TestAccuracyInJSON(t *testing.T) {
	a := accuracy([]int{1, 2}, map[Reason]int{FormListed: 1})
	data, err := json.Marshal(a)
	require.NoError(t, err)
	assert.JSONEq(t, `{"n":2,"left_out":1,"top1":0.5,"top3":1,"top5":1,"top10":1,"mrr":0.75,
		"reasons":{"misspelling is a listed word":1}}`, string(data))
	a.Misses = []Miss{{"harbr", []string{"harbour"}, 2, []string{"harbor", "harbour"}}}
	data, err = json.Marshal(a)
	require.NoError(t, err)
	assert.Contains(t, string(data), `"misses":[{"form":"harbr","intended":["harbour"],"rank":2,"candidates":["harbor","harbour"]}]`)
}
