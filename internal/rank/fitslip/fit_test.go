package main

import (
	"context"
	"math"
	"math/rand/v2"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/internal/assay"
	"emendary/internal/rank"
)

func TestRegressionFindsTheWeightsOfItsData(t *testing.T) {
	chance := rand.New(rand.NewPCG(1, 2))
	want := []float64{-1, 2, -0.5}
	all := make([]example, 40_000)
	for i := range all {
		v := []float64{1, chance.NormFloat64(), chance.NormFloat64()}
		all[i] = example{exact: v, weight: 1, slip: chance.Float64() < 1/(1+math.Exp(-dot(want, v)))}
	}
	got := regress(all, func(x *example) []float64 { return x.exact })
	for i := range want {
		assert.InDelta(t, want[i], got[i], 0.08)
	}
}

func TestSolveSolves(t *testing.T) {
	// 4x + 2y = 10, 2x + 3y = 9: x = 1.5, y = 2.
	x := solve([][]float64{{4, 0}, {2, 3}}, []float64{10, 9})
	assert.InDelta(t, 1.5, x[0], 1e-12)
	assert.InDelta(t, 2, x[1], 1e-12)
}

func TestTextsAreNamedByTheirFiles(t *testing.T) {
	for path, want := range map[string]string{"a/press.md": "press", "press-3.md": "press", "river": "river", ".hidden": ".hidden"} {
		assert.Equal(t, want, text(path), path)
	}
}

func TestKeysBesideOneAnother(t *testing.T) {
	for c, want := range map[byte]string{'q': "aw", 'g': "bfhtvy", 'm': "jkn", '1': ""} {
		assert.ElementsMatch(t, strings.Split(want, ""), strings.Split(beside(c), ""), string(c))
	}
}

const demo = "../../../testdata/demo/emended.md"

// plantedDemo plants errors in the demo manuscript.
func plantedDemo(t *testing.T, name, seed string) (manuscript, truth string) {
	dir := t.TempDir()
	pairs := filepath.Join(dir, "pairs.tsv")
	require.NoError(t, os.WriteFile(pairs, []byte("teh\tthe\nwihch\twhich\nbefroe\tbefore\n"), 0o600))
	manuscript, truth = filepath.Join(dir, name+".md"), filepath.Join(dir, name+".tsv")
	require.NoError(t, run(context.Background(), []string{"plant", "-n", "40", "-own", "4", "-seed", seed, demo, pairs, manuscript, truth}))
	return manuscript, truth
}

func TestPlantedErrorsAreOnTheDocket(t *testing.T) {
	manuscript, truthFile := plantedDemo(t, "demo", "1")
	f, err := os.Open(truthFile)
	require.NoError(t, err)
	defer f.Close()
	truth, err := assay.ReadTruth(f, truthFile)
	require.NoError(t, err)
	assert.Greater(t, len(truth), 20)
	read, err := examples(context.Background(), manuscript, truthFile, nil)
	require.NoError(t, err)
	found := map[string]bool{}
	for _, x := range read {
		if x.slip {
			found[strings.ToLower(x.form)] = true
		}
	}
	assert.Len(t, found, len(truth))
	again, _ := plantedDemo(t, "demo", "1")
	one, err := os.ReadFile(manuscript)
	require.NoError(t, err)
	two, err := os.ReadFile(again)
	require.NoError(t, err)
	assert.Equal(t, string(one), string(two), "the same seed plants the same")
}

func TestFitWritesWeightsThatReadBack(t *testing.T) {
	a, aTruth := plantedDemo(t, "one", "1")
	b, bTruth := plantedDemo(t, "two", "2")
	out := filepath.Join(t.TempDir(), "slip.weights")
	require.NoError(t, run(context.Background(), []string{"fit", "-o", out, "-note", "The demo.", a + ":" + aTruth, b + ":" + bTruth}))
	data, err := os.ReadFile(out)
	require.NoError(t, err)
	assert.Contains(t, string(data), "from errors planted in 2 texts: one, two.\n# The demo.\n")
	w, err := rank.ParseWeights(string(data))
	require.NoError(t, err)
	assert.NotZero(t, w.Exact[0])
}

func TestFitPlantsErrorsItself(t *testing.T) {
	folder := t.TempDir()
	pairs, out := filepath.Join(folder, "pairs.tsv"), filepath.Join(folder, "slip.weights")
	require.NoError(t, os.WriteFile(pairs, []byte("teh\tthe\n"), 0o600))
	a, aTruth := plantedDemo(t, "one", "1")
	require.NoError(t, run(context.Background(), []string{"fit", "-pairs", pairs, "-o", out, demo, a + ":" + aTruth}))
	data, err := os.ReadFile(out)
	require.NoError(t, err)
	assert.Contains(t, string(data), "from errors planted in 2 texts: emended, one.")
	assert.Contains(t, string(data), "\n# emended-2.md, ")
	assert.ErrorContains(t, run(context.Background(), []string{"fit", demo}), "emended.md: no truth; give MANUSCRIPT:TRUTH.tsv")
}

func TestUsage(t *testing.T) {
	for _, args := range [][]string{nil, {"fit"}, {"plant", "a"}, {"other"}} {
		assert.ErrorContains(t, run(context.Background(), args), "want plant or fit", args)
	}
}
