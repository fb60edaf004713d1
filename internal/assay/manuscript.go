// Package assay measures how well errors are found and corrected, on labelled data.
package assay

import (
	"bufio"
	"cmp"
	"context"
	"fmt"
	"io"
	"maps"
	"slices"
	"strings"

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

// Manuscript is how a docket deals with the errors planted in its manuscript. What
// it counts of candidates is of planted forms, in place: a form is as right as the
// worst of its entries, and one without an entry has no candidates.
type Manuscript struct {
	Accuracy
	Words            int     `json:"words"`             // running words
	Entries          int     `json:"entries"`           // open entries, those set aside left out
	SetAside         int     `json:"set_aside"`         // entries left out as the book's own slips
	Found            float64 `json:"found"`             // fraction of planted forms that have an entry
	AveragePrecision float64 `json:"average_precision"` // of the order by the probability of a slip
	Provisional      float64 `json:"average_precision_provisional"`

	// Entries that are no planted error, for 1,000 running words: all of them, and
	// those that are held to be slips with a probability of one half or more.
	FalseAlarms       float64 `json:"false_alarms_per_1000"`
	LikelyFalseAlarms float64 `json:"likely_false_alarms_per_1000"`

	Missed []Miss `json:"missed,omitzero"` // planted forms without an entry, by alphabet; not nil
}

// Judged is an open entry with what an assay needs of it.
type Judged struct {
	Entry      *docket.Entry
	Candidates []docket.Candidate // the best ten
	Planted    string             // key of the planted form, "" where none was planted
}

// Judge looks at all open entries of d on all cores, but for those of forms set
// aside: their candidates, and whether they were planted. They come in the order
// of review. progress, where it is not nil, hears of each.
func Judge(ctx context.Context, d *docket.Docket, truth Truth, aside map[string]bool, progress func(done, total int)) (judged []Judged, left int, err error) {
	for _, e := range d.Due() {
		if aside[docket.Key(e.Form)] {
			left++
		} else {
			judged = append(judged, Judged{Entry: e, Planted: planted(e, truth)})
		}
	}
	err = onAllCores(ctx, len(judged), course{progress, 0, len(judged)}.at, func(ctx context.Context, i int) (err error) {
		judged[i].Candidates, err = d.Candidates(ctx, judged[i].Entry, Depth)
		return err
	})
	return judged, left, err
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
// way, and planted forms among them are left out. The order is by the probability
// of a slip, equal ones by place. progress, where it is not nil, hears of each entry.
func AssayManuscript(ctx context.Context, d *docket.Docket, truth Truth, aside map[string]bool, progress func(done, total int)) (Manuscript, error) {
	reasons := map[Reason]int{SetAside: 0}
	counts := Truth{}
	for k, intended := range truth {
		if aside[k] {
			reasons[SetAside]++
		} else {
			counts[k] = intended
		}
	}
	judged, left, err := Judge(ctx, d, counts, aside, progress)
	if err != nil {
		return Manuscript{}, err
	}
	m := Manuscript{Words: d.Size(), Entries: len(judged), SetAside: left}
	exact, provisional := make([]float64, len(judged)), make([]float64, len(judged))
	worst := map[string]Miss{} // of the entries of a planted form
	for i, j := range judged {
		exact[i], provisional[i] = d.SlipGiven(j.Entry, j.Candidates), d.Slip(j.Entry)
		if j.Planted == "" {
			m.FalseAlarms++
			if exact[i] >= 0.5 {
				m.LikelyFalseAlarms++
			}
			continue
		}
		intended := counts[j.Planted]
		now := Miss{j.Entry.Form, intended, rank(j.Candidates, j.right(intended)), texts(j.Candidates)}
		if w, seen := worst[j.Planted]; !seen || now.worse(w) {
			worst[j.Planted] = now
		}
	}
	var ranks []int
	misses := []Miss{}
	m.Missed = []Miss{}
	for _, k := range slices.Sorted(maps.Keys(counts)) {
		w, found := worst[k]
		ranks = append(ranks, w.Rank)
		switch {
		case !found:
			m.Missed = append(m.Missed, Miss{k, counts[k], 0, []string{}})
		case w.Rank != 1:
			misses = append(misses, w)
		}
	}
	m.Accuracy = accuracy(ranks, reasons)
	m.Misses = misses
	m.Found = float64(len(worst)) / float64(max(len(counts), 1))
	thousands := float64(max(m.Words, 1)) / 1000
	m.FalseAlarms /= thousands
	m.LikelyFalseAlarms /= thousands
	m.AveragePrecision = inOrder(judged, exact, len(m.Missed))
	m.Provisional = inOrder(judged, provisional, len(m.Missed))
	return m, nil
}

// right returns the words that are right in place of j's form: the intended ones,
// or, for a compound of which the planted form is a member, the compound with one of
// them in it.
func (j Judged) right(intended []string) []string {
	words := slices.Clone(intended)
	for _, word := range intended {
		words = append(words, strings.Replace(docket.Key(j.Entry.Form), j.Planted, word, 1))
	}
	return words
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
