// Package assay measures how well errors are found and corrected, on labelled data.
package assay

import (
	"bufio"
	"cmp"
	"context"
	"fmt"
	"io"
	"runtime"
	"slices"
	"strings"
	"sync"

	"emendary/internal/docket"
)

// Truth says which words the planted forms of a manuscript stand for, by the
// form's key: case and the style of apostrophes apart.
type Truth map[string][]string

// ReadTruth reads lines form<TAB>intended[,intended…]; the first line may be that
// of the columns' names. Errors give name and the line.
func ReadTruth(r io.Reader, name string) (Truth, error) {
	truth := Truth{}
	err := eachLine(r, name, func(n int, line string) error {
		form, intended, ok := strings.Cut(line, "\t")
		intended, _, _ = strings.Cut(intended, "\t")
		if !ok || strings.TrimSpace(form) == "" || strings.TrimSpace(intended) == "" {
			return fmt.Errorf("%s: line %d: want form, tab, intended word", name, n)
		}
		if n == 1 && form == "form" {
			return nil
		}
		k := docket.Key(form)
		for _, word := range strings.Split(intended, ",") {
			if word = docket.Key(strings.TrimSpace(word)); word != "" && !slices.Contains(truth[k], word) {
				truth[k] = append(truth[k], word)
			}
		}
		return nil
	})
	if err == nil && len(truth) == 0 {
		err = fmt.Errorf("%s: no lines; want form, tab, intended word", name)
	}
	return truth, err
}

// ReadForms reads forms to set aside, one a line; what follows a tab is a note.
func ReadForms(r io.Reader, name string) (map[string]bool, error) {
	forms := map[string]bool{}
	err := eachLine(r, name, func(_ int, line string) error {
		form, _, _ := strings.Cut(line, "\t")
		forms[docket.Key(form)] = true
		return nil
	})
	return forms, err
}

// eachLine calls do with each line that is neither empty nor begins with #.
func eachLine(r io.Reader, name string, do func(n int, line string) error) error {
	lines := bufio.NewScanner(r)
	n := 0
	for lines.Scan() {
		n++
		line := strings.TrimRight(lines.Text(), "\r ")
		if n == 1 {
			line = strings.TrimPrefix(line, "\ufeff")
		}
		if line == "" || line[0] == '#' {
			continue
		}
		if err := do(n, line); err != nil {
			return err
		}
	}
	if err := lines.Err(); err != nil {
		return fmt.Errorf("%s: line %d: %w", name, n+1, err)
	}
	return nil
}

// Manuscript is how a docket deals with the errors planted in its manuscript.
type Manuscript struct {
	N                int     `json:"n"`                 // planted forms
	Words            int     `json:"words"`             // running words
	Entries          int     `json:"entries"`           // open entries, those set aside left out
	SetAside         int     `json:"set_aside"`         // entries left out as the book's own slips
	Found            float64 `json:"found"`             // fraction of planted forms that have an entry
	Top1             float64 `json:"top1"`              // fraction of planted forms whose first candidate is right
	AveragePrecision float64 `json:"average_precision"` // of the order by the probability of a slip
	Provisional      float64 `json:"average_precision_provisional"`

	// Entries that are no planted error, for 1,000 running words: all of them, and
	// those that are held to be slips with a probability of one half or more.
	FalseAlarms       float64 `json:"false_alarms_per_1000"`
	LikelyFalseAlarms float64 `json:"likely_false_alarms_per_1000"`

	Missed []string `json:"missed,omitempty"` // planted forms without an entry
	Wrong  []Wrong  `json:"wrong,omitempty"`  // planted forms whose first candidate is wrong
}

// Wrong is a planted form whose first candidate is not what was intended.
type Wrong struct {
	Form      string   `json:"form"`
	Candidate string   `json:"candidate"` // "" where there was none
	Intended  []string `json:"intended"`
}

// Judged is an open entry with what an assay needs of it.
type Judged struct {
	Entry      *docket.Entry
	Candidates []docket.Candidate // the best ten
	Planted    string             // key of the planted form, "" where none was planted
}

// Judge looks at all open entries of d on all cores, but for those of forms set
// aside: their candidates, and whether they were planted. They come in the order
// of review.
func Judge(ctx context.Context, d *docket.Docket, truth Truth, aside map[string]bool) (judged []Judged, left int, err error) {
	for _, e := range d.Due() {
		if aside[docket.Key(e.Form)] {
			left++
		} else {
			judged = append(judged, Judged{Entry: e, Planted: planted(e, truth)})
		}
	}
	workers := runtime.GOMAXPROCS(0)
	errs := make([]error, workers)
	var wait sync.WaitGroup
	for w := range workers {
		wait.Go(func() {
			for i := w; i < len(judged) && errs[w] == nil; i += workers {
				j := &judged[i]
				j.Candidates, errs[w] = d.Candidates(ctx, j.Entry, 10)
			}
		})
	}
	wait.Wait()
	for _, err := range errs {
		if err != nil {
			return nil, 0, err
		}
	}
	return judged, left, nil
}

// planted returns the key under which truth has e: its form, as it stands
// somewhere, or a member of a compound.
func planted(e *docket.Entry, truth Truth) string {
	if k := docket.Key(e.Form); truth[k] != nil {
		return k
	}
	for _, o := range e.Occurrences {
		for _, text := range []string{o.Text, o.Lead + o.Text + o.Tail} {
			if k := docket.Key(text); truth[k] != nil {
				return k
			}
		}
	}
	for _, member := range strings.Split(docket.Key(e.Form), "-") {
		if truth[member] != nil {
			return member
		}
	}
	return ""
}

// AssayManuscript measures a docket on the truth of what was planted in its
// manuscript. Entries of the forms set aside, the book's own slips, count neither
// way. The order is by the probability of a slip, equal ones by place.
func AssayManuscript(ctx context.Context, d *docket.Docket, truth Truth, aside map[string]bool) (Manuscript, error) {
	judged, left, err := Judge(ctx, d, truth, aside)
	if err != nil {
		return Manuscript{}, err
	}
	m := Manuscript{N: len(truth), Words: d.Size(), Entries: len(judged), SetAside: left}
	exact, provisional := make([]float64, len(judged)), make([]float64, len(judged))
	right := map[string]bool{} // by key of the planted forms found: all its entries come right
	for i, j := range judged {
		exact[i], provisional[i] = d.SlipGiven(j.Entry, j.Candidates), d.Slip(j.Entry)
		if j.Planted == "" {
			m.FalseAlarms++
			if exact[i] >= 0.5 {
				m.LikelyFalseAlarms++
			}
			continue
		}
		ok := firstIsRight(j, truth[j.Planted])
		was, seen := right[j.Planted]
		right[j.Planted] = ok && (was || !seen)
		if !ok {
			w := Wrong{Form: j.Entry.Form, Intended: truth[j.Planted]}
			if len(j.Candidates) > 0 {
				w.Candidate = j.Candidates[0].Text
			}
			m.Wrong = append(m.Wrong, w)
		}
	}
	for k := range truth {
		if _, found := right[k]; !found {
			m.Missed = append(m.Missed, k)
		}
		if right[k] {
			m.Top1++
		}
	}
	slices.Sort(m.Missed)
	n := float64(max(len(truth), 1))
	m.Found, m.Top1 = float64(len(right))/n, m.Top1/n
	thousands := float64(max(m.Words, 1)) / 1000
	m.FalseAlarms /= thousands
	m.LikelyFalseAlarms /= thousands
	m.AveragePrecision = inOrder(judged, exact, len(m.Missed))
	m.Provisional = inOrder(judged, provisional, len(m.Missed))
	return m, nil
}

// firstIsRight reports whether the first candidate is one of the intended words;
// in a compound, the compound with one of them in it.
func firstIsRight(j Judged, intended []string) bool {
	if len(j.Candidates) == 0 {
		return false
	}
	got := docket.Key(j.Candidates[0].Text)
	for _, word := range intended {
		if got == word || got == strings.Replace(docket.Key(j.Entry.Form), j.Planted, word, 1) {
			return true
		}
	}
	return false
}

// inOrder returns the average precision of the order by their probabilities of
// being a slip, most likely first.
func inOrder(judged []Judged, slips []float64, missed int) float64 {
	type ranked struct {
		slip    float64
		planted bool
	}
	order := make([]ranked, len(judged))
	for i, j := range judged {
		order[i] = ranked{slips[i], j.Planted != ""}
	}
	slices.SortStableFunc(order, func(a, b ranked) int { return -cmp.Compare(a.slip, b.slip) })
	relevant := make([]bool, len(order))
	for i, r := range order {
		relevant[i] = r.planted
	}
	return AveragePrecision(relevant, missed)
}

// AveragePrecision returns the mean, over all relevant items, of the precision of
// the ranking down to each of them; missed ones, that are not in the ranking, have
// a precision of 0 (uninterpolated; Manning, Raghavan and Schütze, Introduction to
// Information Retrieval, 2008, section 8.4). 1 where nothing is relevant.
func AveragePrecision(relevant []bool, missed int) float64 {
	var sum float64
	n := 0
	for i, r := range relevant {
		if r {
			n++
			sum += float64(n) / float64(i+1)
		}
	}
	if n+missed == 0 {
		return 1
	}
	return sum / float64(n+missed)
}
