package docket

import (
	"fmt"
	"math"
	"strings"

	"emendary/align"
	"emendary/internal/ledger"
	"emendary/lexicon"
)

// Adapt prices edits for this author from here on: by the costs of all writers and
// the accepts in force, one count a form, whatever their order (see
// [align.Fitted.Adapt]). It returns how many corrections it took up; none under unit
// costs. Which spelling a word has in which English, what a list bars and what a
// rule says (a letter for a digit) is no slip that comes again in other words, and
// not taken up.
func (d *Docket) Adapt() int {
	if d.fitted == nil {
		return 0
	}
	pairs := d.accepted()
	costs := d.fitted.Adapt(pairs)
	d.searching.Lock()
	d.costs = costs
	d.searching.Unlock()
	return len(pairs)
}

// accepted returns the forms that accepts in force correct, with the words; the words
// of one form share its count.
func (d *Docket) accepted() []align.Pair {
	words := map[string]map[string]bool{} // by key of the form
	for _, r := range ledger.Effective(d.log) {
		kind := Kind(r.EntryKind)
		if r.Act != ledger.Accept || kind == OtherVariety || kind == BarredWord {
			continue
		}
		form, word := Key(r.Form), Key(r.Word)
		if e := d.byForm[r.Form]; e != nil && len(e.Instead) > 0 {
			continue
		}
		if form == word || max(len(form), len(word)) > lexicon.MaxLetters {
			continue
		}
		if words[form] == nil {
			words[form] = map[string]bool{}
		}
		words[form][word] = true
	}
	alphabet := d.base.Alphabet()
	var pairs []align.Pair
	for form, of := range words {
		for word := range of {
			pairs = append(pairs, align.Pair{
				Form: alphabet.AppendFolded(nil, form), Word: alphabet.AppendFolded(nil, word),
				Weight: 1 / float64(len(of)),
			})
		}
	}
	return pairs
}

// Why says which edits between form and text have become likelier by what was
// accepted in this manuscript, and by how much; "" for none.
func (d *Docket) Why(form, text string) string {
	costs, ok := d.prices().(*align.Fitted)
	if !ok {
		return ""
	}
	alphabet := d.base.Alphabet()
	from, to := alphabet.AppendFolded(nil, form), alphabet.AppendFolded(nil, text)
	if cells(from, to) > fittedCells {
		return ""
	}
	var reasons []string
	saved := 0.0
	for _, l := range costs.Learnt(from, to) {
		saved += l.Saved
		reasons = append(reasons, fmt.Sprintf("%s ×%d", slipOf(alphabet, l.Edit), l.Seen))
	}
	if saved < 0.05 {
		return ""
	}
	return fmt.Sprintf("this author: %s, %.1f bits likelier", strings.Join(reasons, ", "), math.Round(10*saved)/10)
}

// slipOf says in a word or two what the author wrote for what.
func slipOf(alphabet *align.Alphabet, e align.Edit) string {
	from, to := alphabet.Text(e.From...), alphabet.Text(e.To...)
	switch {
	case from == "":
		return "no " + to
	case to == "":
		return from + " too many"
	}
	return from + " for " + to
}
