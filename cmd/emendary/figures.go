package main

import (
	"fmt"
	"io"
	"math"
	"slices"
	"strconv"
	"strings"

	"emendary/internal/assay"
	"emendary/ui/text"
)

// figures writes what an assay measured, for reading.
type figures struct{ w io.Writer }

// pairs writes the accuracy on pairs.
func (f figures) pairs(head string, a assay.Accuracy) {
	fmt.Fprintf(f.w, "%s\n\n", shown(head))
	f.count("counted", a.N)
	f.count("left out", a.LeftOut)
	f.reasons(a.Reasons)
	fmt.Fprintln(f.w)
	f.accuracy(a)
	f.misses(a.Misses, nil)
}

// fitting writes what costs were fitted to: pairs read and left out; and how many
// bits a pair takes before and after.
func (f figures) fitting(head string, read int, leftOut map[assay.Reason]int, before, after float64) {
	fmt.Fprintf(f.w, "%s\n\n", shown(head))
	left := 0
	for _, n := range leftOut {
		left += n
	}
	f.count("pairs read", read)
	f.count("left out", left)
	f.reasons(leftOut)
	fmt.Fprintln(f.w)
	f.figure("bits a pair, before fitting", before, 2)
	f.figure("bits a pair, after", after, 2)
}

// manuscript writes how a manuscript was dealt with.
func (f figures) manuscript(name string, m assay.Manuscript) {
	fmt.Fprintf(f.w, "%s: %s, %s\n\n", shown(name), counted(m.Words, "word", "words"), counted(m.Entries, "entry", "entries"))
	f.count("planted forms", m.N)
	f.count("left out", m.LeftOut)
	f.reasons(m.Reasons)
	if m.SetAside > 0 {
		f.count("entries set aside", m.SetAside)
	}
	fmt.Fprintln(f.w)
	f.share("found", m.Found, m.N)
	f.accuracy(m.Accuracy)
	f.figure("average precision, by slip", m.AveragePrecision, 3)
	f.figure("  in the provisional order", m.Provisional, 3)
	f.figure("false alarms, 1,000 words", m.FalseAlarms, 2)
	f.figure("  of which likely slips", m.LikelyFalseAlarms, 2)
	f.misses(m.Misses, m.Missed)
}

// accuracy writes how often the first candidates are right.
func (f figures) accuracy(a assay.Accuracy) {
	f.share("first candidate right", a.Top1, a.N)
	f.share("one of the first 3", a.Top3, a.N)
	f.share("one of the first 5", a.Top5, a.N)
	f.share("one of the first 10", a.Top10, a.N)
	f.figure("mean reciprocal rank", a.MRR, 3)
}

// reasons writes why some were left out.
func (f figures) reasons(counts map[assay.Reason]int) {
	for _, why := range assay.Reasons() {
		if n := counts[why]; n > 0 {
			f.count("  "+string(why), n)
		}
	}
}

// widestLabel is the width of the column of labels.
const widestLabel = 42

func (f figures) row(label, value, more string) {
	fmt.Fprintln(f.w, strings.TrimRight(text.Pad(label, widestLabel)+text.PadLeft(value, 8)+text.PadLeft(more, 10), " "))
}

func (f figures) count(label string, n int) { f.row(label, strconv.Itoa(n), "") }

func (f figures) figure(label string, x float64, decimals int) {
	f.row(label, strconv.FormatFloat(x, 'f', decimals, 64), "")
}

// share writes a fraction of n, counted and in per cent.
func (f figures) share(label string, fraction float64, n int) {
	f.row(label, strconv.Itoa(int(math.Round(fraction*float64(n)))), strconv.FormatFloat(100*fraction, 'f', 2, 64)+" %")
}

// misses lists what the first candidate is wrong for, and what has no entry; both
// nil where that is not asked for.
func (f figures) misses(wrong, missed []assay.Miss) {
	if len(wrong)+len(missed) == 0 {
		return
	}
	rows := [][4]string{{"misspelling", "intended", "rank", "first candidates"}}
	for i, m := range slices.Concat(wrong, missed) {
		rank, candidates := "-", strings.Join(m.Candidates, ", ")
		switch {
		case m.Rank > 0:
			rank = strconv.Itoa(m.Rank)
		case i >= len(wrong):
			candidates = "(no entry)"
		}
		rows = append(rows, [4]string{shown(m.Form), shown(strings.Join(m.Intended, ", ")), rank, shown(candidates)})
	}
	widths := [2]int{}
	for _, r := range rows {
		for i := range widths {
			widths[i] = max(widths[i], min(text.Width(r[i]), widest))
		}
	}
	fmt.Fprintln(f.w)
	for _, r := range rows {
		fmt.Fprintln(f.w, strings.TrimRight(text.Pad(r[0], widths[0])+"  "+text.Pad(r[1], widths[1])+"  "+text.PadLeft(r[2], 4)+"  "+r[3], " "))
	}
}
