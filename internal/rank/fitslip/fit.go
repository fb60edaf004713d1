package main

import (
	"cmp"
	"context"
	"fmt"
	"iter"
	"math"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"time"

	"emendary/internal/assay"
	"emendary/internal/docket"
	"emendary/internal/rank"
)

// example is an entry as the model sees it.
type example struct {
	text, file  string // which text it is of, and which manuscript
	form        string
	slip        bool
	weight      float64
	provisional []float64
	exact       []float64
}

// text is the name under which manuscripts count as one text.
func text(path string) string {
	base := filepath.Base(path)
	if i := strings.IndexAny(base, "-."); i > 0 {
		return base[:i]
	}
	return base
}

// fitting is how the weights are fitted.
type fitting struct {
	pairs, aside, note, out string
	rate                    float64
	list                    int
}

// fit reads manuscripts with their truths, measures with each text left out, fits
// on all and writes the weights.
func (f fitting) fit(ctx context.Context, files []string) error {
	aside := map[string]bool{}
	if f.aside != "" {
		file, err := os.Open(f.aside)
		if err != nil {
			return err
		}
		defer file.Close()
		if aside, err = assay.ReadForms(file, f.aside); err != nil {
			return err
		}
	}
	folder, err := os.MkdirTemp("", "fitslip")
	if err != nil {
		return err
	}
	defer os.RemoveAll(folder)
	var all []example
	for _, file := range files {
		planted, err := f.planted(ctx, file, folder)
		if err != nil {
			return err
		}
		for _, p := range planted {
			read, err := examples(ctx, p[0], p[1], aside)
			if err != nil {
				return err
			}
			all = append(all, read...)
		}
	}
	return f.weigh(all)
}

// planted returns the manuscripts and truths of an argument: its own, or two
// copies of a text with errors planted in them.
func (f fitting) planted(ctx context.Context, file, folder string) ([][2]string, error) {
	if manuscript, truth, ok := strings.Cut(file, ":"); ok {
		return [][2]string{{manuscript, truth}}, nil
	}
	if f.pairs == "" {
		return nil, fmt.Errorf("%s: no truth; give MANUSCRIPT:TRUTH.tsv, or -pairs PAIRS.tsv to have errors planted", file)
	}
	var out [][2]string
	for seed := range uint64(2) {
		name := filepath.Join(folder, fmt.Sprintf("%s-%d", text(file), seed+1))
		copied := [2]string{name + filepath.Ext(file), name + ".tsv"}
		if err := plant(ctx, file, f.pairs, copied[0], copied[1], planted, plantedOwn, seed+1); err != nil {
			return nil, err
		}
		out = append(out, copied)
	}
	return out, nil
}

// How many errors are planted in a copy, and how many of them in the text's own
// names and coinages.
const planted, plantedOwn = 300, 15

// weigh measures with each text left out, fits on all and writes the weights.
func (f fitting) weigh(all []example) error {
	var texts []string
	for _, x := range all {
		if !slices.Contains(texts, x.text) {
			texts = append(texts, x.text)
		}
	}
	fmt.Println("average precision of the order, each text left out of the fit in turn:")
	fmt.Println("manuscript\tentries\tslips\tprovisional\texact\tfitted on all, provisional\texact")
	weights := weigh(all, f.rate)
	var head []string
	for _, name := range texts {
		var rest, held []example
		for _, x := range all {
			if x.text == name {
				held = append(held, x)
			} else {
				rest = append(rest, x)
			}
		}
		w := weigh(rest, f.rate)
		for file, held := range byFile(held) {
			slips := 0
			for _, x := range held {
				if x.slip {
					slips++
				}
			}
			line := fmt.Sprintf("%s\t%d\t%d\t%.4f\t%.4f", file, len(held), slips, precision(w, held, false), precision(w, held, true))
			fmt.Printf("%s\t%.4f\t%.4f\n", line, precision(weights, held, false), precision(weights, held, true))
			head = append(head, strings.ReplaceAll(line, "\t", ", "))
			show(w, held, f.list)
		}
	}
	if f.out == "" {
		return nil
	}
	lines := []string{
		fmt.Sprintf("Weights of the slip model, fitted by fitslip on %s, rate %g,", time.Now().Format(time.DateOnly), f.rate),
		fmt.Sprintf("from errors planted in %d texts: %s.", len(texts), strings.Join(texts, ", ")),
	}
	if f.note != "" {
		lines = append(lines, f.note)
	}
	lines = append(lines, "Average precision with each text left out: entries, slips, provisional, exact.")
	return os.WriteFile(f.out, []byte(weights.Text(append(lines, head...))), 0o644)
}

// byFile yields the examples of each manuscript, in the order of the first ones.
func byFile(all []example) iter.Seq2[string, []example] {
	return func(yield func(string, []example) bool) {
		for start := 0; start < len(all); {
			end := start
			for end < len(all) && all[end].file == all[start].file {
				end++
			}
			if !yield(all[start].file, all[start:end]) {
				return
			}
			start = end
		}
	}
}

// show lists the n entries that stand highest without being slips, and the n slips
// that stand lowest, in the order by the exact weights.
func show(w rank.Weights, held []example, n int) {
	sorted := slices.Clone(held)
	slices.SortStableFunc(sorted, func(a, b example) int { return -cmp.Compare(dot(w.Exact, a.exact), dot(w.Exact, b.exact)) })
	var words, slips []string
	for i, x := range sorted {
		line := fmt.Sprintf("  %d\t%s\t%.2f", i+1, x.form, dot(w.Exact, x.exact))
		if x.slip {
			slips = append(slips, line)
		} else {
			words = append(words, line)
		}
	}
	if n > 0 {
		fmt.Println("  no slips, highest first:\n" + strings.Join(words[:min(n, len(words))], "\n"))
		fmt.Println("  slips, lowest last:\n" + strings.Join(slips[max(0, len(slips)-n):], "\n"))
	}
}

// examples reads the entries of a manuscript that the model has a say in.
func examples(ctx context.Context, path, truthFile string, aside map[string]bool) ([]example, error) {
	s, err := docket.Start(ctx, docket.Options{Manuscript: path, ToRead: true})
	if err != nil {
		return nil, err
	}
	defer s.Close()
	f, err := os.Open(truthFile)
	if err != nil {
		return nil, err
	}
	defer f.Close()
	truth, err := assay.ReadTruth(f, truthFile)
	if err != nil {
		return nil, err
	}
	judged, _, err := assay.Judge(ctx, s.Docket, truth, aside, nil)
	if err != nil {
		return nil, err
	}
	var out []example
	for _, j := range judged {
		if _, ok := j.Entry.Judged(); ok {
			continue
		}
		out = append(out, example{
			text: text(path), file: filepath.Base(path), form: j.Entry.Form, slip: j.Planted != "",
			provisional: rank.SlipValues(s.Docket.Evidence(j.Entry)),
			exact:       rank.SlipValues(s.Docket.EvidenceGiven(j.Entry, j.Candidates)),
		})
	}
	return out, nil
}

// balance is the part of the examples that slips count for in the fit.
const balance = 0.3

// weigh fits both sets of weights on examples. Each text counts the same. The
// constants are set for manuscripts in which slips are the given part of the
// entries (prior correction; King and Zeng, “Logistic Regression in Rare Events
// Data”, Political Analysis 9(2), 2001, section 4.1).
func weigh(all []example, rate float64) rank.Weights {
	type class struct {
		text string
		slip bool
	}
	size := map[class]float64{}
	texts := map[string]bool{}
	for _, x := range all {
		size[class{x.text, x.slip}]++
		texts[x.text] = true
	}
	for i := range all {
		x := &all[i]
		part := 1 - balance
		if x.slip {
			part = balance
		}
		x.weight = part * float64(len(all)) / float64(len(texts)) / size[class{x.text, x.slip}]
	}
	w := rank.Weights{
		Provisional: regress(all, func(x *example) []float64 { return x.provisional }),
		Exact:       regress(all, func(x *example) []float64 { return x.exact }),
	}
	w.Provisional[0] += logit(rate) - logit(balance)
	w.Exact[0] += logit(rate) - logit(balance)
	return w
}

func logit(p float64) float64 { return math.Log(p / (1 - p)) }

func precision(w rank.Weights, held []example, exact bool) float64 {
	score := func(x example) float64 { return dot(w.Provisional, x.provisional) }
	if exact {
		score = func(x example) float64 { return dot(w.Exact, x.exact) }
	}
	sorted := slices.Clone(held)
	slices.SortStableFunc(sorted, func(a, b example) int { return -cmp.Compare(score(a), score(b)) })
	relevant := make([]bool, len(sorted))
	for i, x := range sorted {
		relevant[i] = x.slip
	}
	return assay.AveragePrecision(relevant, 0)
}

func dot(a, b []float64) float64 {
	var sum float64
	for i := range a {
		sum += a[i] * b[i]
	}
	return sum
}

// ridge is the weight of the penalty on squared weights: all but the constant are
// drawn to nought as by so many examples.
const ridge = 3

// regress fits a logistic regression with a ridge penalty by Newton's method
// (iteratively reweighted least squares; Hastie, Tibshirani and Friedman, The
// Elements of Statistical Learning, 2nd edition, section 4.4.1).
func regress(all []example, values func(*example) []float64) []float64 {
	n := len(values(&all[0]))
	w := make([]float64, n)
	for range 50 {
		gradient := make([]float64, n)
		hessian := make([][]float64, n)
		for i := range hessian {
			hessian[i] = make([]float64, n)
			if i > 0 {
				hessian[i][i] = ridge
				gradient[i] = -ridge * w[i]
			} else {
				hessian[i][i] = 1e-9
			}
		}
		for i := range all {
			x := &all[i]
			v := values(x)
			p := 1 / (1 + math.Exp(-dot(w, v)))
			y := 0.0
			if x.slip {
				y = 1
			}
			curve := x.weight * max(p*(1-p), 1e-9)
			for j := range v {
				gradient[j] += x.weight * (y - p) * v[j]
				if v[j] != 0 {
					for k := range j + 1 {
						hessian[j][k] += curve * v[j] * v[k]
					}
				}
			}
		}
		step := solve(hessian, gradient)
		size := 0.0
		for i := range w {
			w[i] += step[i]
			size = max(size, math.Abs(step[i]))
		}
		if size < 1e-8 {
			break
		}
	}
	return w
}

// solve solves a symmetric positive definite system, given by its lower triangle,
// by Cholesky's decomposition, in place. O(n³).
func solve(a [][]float64, b []float64) []float64 {
	n := len(b)
	for i := range n {
		for j := range i + 1 {
			sum := a[i][j]
			for k := range j {
				sum -= a[i][k] * a[j][k]
			}
			if i == j {
				a[i][i] = math.Sqrt(max(sum, 1e-12))
			} else {
				a[i][j] = sum / a[j][j]
			}
		}
	}
	x := slices.Clone(b)
	for i := range n {
		for k := range i {
			x[i] -= a[i][k] * x[k]
		}
		x[i] /= a[i][i]
	}
	for i := n - 1; i >= 0; i-- {
		for k := i + 1; k < n; k++ {
			x[i] -= a[k][i] * x[k]
		}
		x[i] /= a[i][i]
	}
	return x
}
