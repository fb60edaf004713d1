package assay

// Depth is how many candidates of a form are looked at: what is not among them
// counts as not found.
const Depth = 10

// Accuracy is how often what was intended is among the first candidates. All
// fractions are of N, and 0 where N is.
type Accuracy struct {
	N       int     `json:"n"`        // misspellings that count
	LeftOut int     `json:"left_out"` // those that do not: Reasons says why
	Top1    float64 `json:"top1"`
	Top3    float64 `json:"top3"`
	Top5    float64 `json:"top5"`
	Top10   float64 `json:"top10"`
	// MRR is the mean of 1/rank of the first candidate that is right, where 0 stands
	// for none among the first ten (mean reciprocal rank; Voorhees, The TREC-8
	// Question Answering Track Report, 1999, section 3, where the first five count).
	MRR float64 `json:"mrr"`

	Reasons map[Reason]int `json:"reasons"`         // how many were left out, and why
	Misses  []Miss         `json:"misses,omitzero"` // in the order of what was measured, not nil
}

// Reason says why a misspelling does not count.
type Reason string

// The reasons, in the order in which they are asked: the first that holds counts.
const (
	NoForm     Reason = "no misspelling"
	NoIntended Reason = "no intended word"
	SameWord   Reason = "differs in capitals or apostrophes alone"
	FormListed Reason = "misspelling is a listed word"
	Unlisted   Reason = "no intended word is listed"
	SetAside   Reason = "set aside"
)

// Reasons returns all reasons, in that order.
func Reasons() []Reason {
	return []Reason{NoForm, NoIntended, SameWord, FormListed, Unlisted, SetAside}
}

// Miss is a misspelling whose first candidate is not what was intended.
type Miss struct {
	Form       string   `json:"form"`
	Intended   []string `json:"intended"`
	Rank       int      `json:"rank"`       // of the first candidate that is right, from 1; 0 for none
	Candidates []string `json:"candidates"` // the first of them, best first
}

// worse reports whether m's rank is worse than that of o: none is the worst.
func (m Miss) worse(o Miss) bool { return o.Rank != 0 && (m.Rank == 0 || m.Rank > o.Rank) }

// accuracy returns the accuracy of ranks: for each misspelling that counts, that of
// the first right candidate, 0 for none.
func accuracy(ranks []int, reasons map[Reason]int) Accuracy {
	a := Accuracy{N: len(ranks), Reasons: reasons}
	for _, n := range reasons {
		a.LeftOut += n
	}
	if a.N == 0 {
		return a
	}
	counts := [Depth + 1]int{}
	for _, r := range ranks {
		counts[r]++
	}
	within, sum := [Depth + 1]int{}, 0.0
	for r := 1; r <= Depth; r++ {
		within[r] = within[r-1] + counts[r]
		sum += float64(counts[r]) / float64(r)
	}
	n := float64(a.N)
	a.Top1, a.Top3, a.Top5, a.Top10 = float64(within[1])/n, float64(within[3])/n, float64(within[5])/n, float64(within[Depth])/n
	a.MRR = sum / n
	return a
}
