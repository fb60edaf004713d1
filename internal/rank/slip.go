package rank

import (
	_ "embed"
	"fmt"
	"math"
	"strconv"
	"strings"
	"sync"
	"unicode/utf8"
)

// Evidence is what speaks for and against an entry's being a slip. Shares are
// from 0 to 1 and of the entry's occurrences.
type Evidence struct {
	// From the manuscript alone.
	Form     string
	Count    int     // occurrences
	Parts    int     // parts it stands in
	Capital  float64 // share with a capital where lower case would have none
	Start    float64 // share with a capital that the start of a sentence or a heading explains
	Mixed    bool    // mixes capitals (McKay), or has no other letters (NATO)
	Titled   float64 // share with a capital beside another, or an initial: Captain Brannock
	Elided   float64 // share that an apostrophe cuts short or that has one inside
	Hyphen   bool    // a compound
	Speech   float64 // share in speech
	Marked   float64 // share in italics, quotations and notes
	Company  float64 // mean of other unknown or elided words among the twelve around
	Dialect  float64 // log₂ of how many times denser unknown words without capitals are in speech than elsewhere in the manuscript, −3 to 3
	Coined   bool    // a known word with a prefix or ending that makes words freely: un-, -less
	Derived  bool    // a known word with any other prefix or ending
	NearUse  int     // uses of the commonest listed form one edit away
	NearOwn  int     // uses of the commonest other entry one edit away
	Joins    bool    // two neighbours that together are a listed word
	Variety  bool    // another variety has it
	Searched bool    // what follows is filled in

	// From the best candidates.
	Found     bool    // there is a candidate
	Distance  int     // of the best, restricted Damerau–Levenshtein
	Best      string  // its text
	Cost      float64 // of its edits, in bits
	Bits      float64 // of edits and prior together
	Share     float64 // its share
	Gap       float64 // by how much its share exceeds the second's
	Level     int     // its size level: 10 commonest, 70 rarest; 0 of a list
	Use       int     // how often the manuscript uses it with capitals like the form's; of two words, the rarer
	Split     bool    // some candidate is two words
	Adjacent  int     // how often two words that are a candidate stand side by side in the manuscript
	Little    float64 // how often in a thousand words the manuscript uses the commoner of two such words
	TwoWords  bool    // it is two words
	FirstKept bool    // it begins with the form's first letter
	LastKept  bool    // it ends with the form's last letter
	Accent    bool    // a candidate and the form differ in diacritics alone
	Doubled   bool    // the two differ in doubled letters alone
	Vowels    bool    // the two differ in vowels and doubled letters alone
	Order     bool    // the two differ in the order of letters alone
}

// inner reports whether the best candidate is one word with the form's first and
// last letters, which writers seldom get wrong.
func (e *Evidence) inner() bool { return e.Found && !e.TwoWords && e.FirstKept && e.LastKept }

// missing reports whether the form is one word short of one letter.
func (e *Evidence) missing(l Letters) bool {
	return e.Found && !e.TwoWords && e.Distance == 1 && utf8.RuneCountInString(e.Best) > l.Length
}

// surplus reports whether the form is one word with a letter too many.
func (e *Evidence) surplus(l Letters) bool {
	return e.Found && !e.TwoWords && e.Distance == 1 && utf8.RuneCountInString(e.Best) < l.Length
}

// feature is one number of the log-linear model: what it is called in the file of
// weights, and how it comes from the evidence. All are of the order of 1.
type feature struct {
	name  string
	exact bool // wants the candidates
	value func(e *Evidence, l Letters) float64
}

func is(b bool) float64 {
	if b {
		return 1
	}
	return 0
}

// doublings is how often 1 must be doubled to reach 1+n.
func doublings(n int) float64 { return math.Log2(1 + float64(n)) }

// features of the model, in the order of the file of weights.
var features = []feature{
	{"constant", false, func(*Evidence, Letters) float64 { return 1 }},
	{"count", false, func(e *Evidence, _ Letters) float64 { return doublings(e.Count) - 1 }},
	{"once", false, func(e *Evidence, _ Letters) float64 { return is(e.Count == 1) }},
	{"parts", false, func(e *Evidence, _ Letters) float64 { return doublings(e.Parts) - 1 }},
	{"capital", false, func(e *Evidence, _ Letters) float64 { return e.Capital }},
	{"capital at start", false, func(e *Evidence, _ Letters) float64 { return e.Start }},
	{"titled", false, func(e *Evidence, _ Letters) float64 { return e.Titled }},
	{"mixed capitals", false, func(e *Evidence, _ Letters) float64 { return is(e.Mixed) }},
	{"elided", false, func(e *Evidence, _ Letters) float64 { return e.Elided }},
	{"hyphen", false, func(e *Evidence, _ Letters) float64 { return is(e.Hyphen) }},
	{"speech", false, func(e *Evidence, _ Letters) float64 { return e.Speech }},
	{"marked", false, func(e *Evidence, _ Letters) float64 { return e.Marked }},
	{"dialect", false, func(e *Evidence, _ Letters) float64 { return e.Speech * e.Dialect }},
	{"company", false, func(e *Evidence, _ Letters) float64 { return min(e.Company, 1) }},
	{"much company", false, func(e *Evidence, _ Letters) float64 { return math.Log2(max(e.Company, 1)) }},
	{"coined", false, func(e *Evidence, _ Letters) float64 { return is(e.Coined) }},
	{"derived", false, func(e *Evidence, _ Letters) float64 { return is(e.Derived) }},
	{"joins", false, func(e *Evidence, _ Letters) float64 { return is(e.Joins) }},
	{"other variety", false, func(e *Evidence, _ Letters) float64 { return is(e.Variety) }},
	{"letters, mean", false, func(_ *Evidence, l Letters) float64 { return l.Mean - 3 }},
	{"letters, worst", false, func(_ *Evidence, l Letters) float64 { return l.Worst/4 - 2 }},
	{"length", false, func(_ *Evidence, l Letters) float64 { return math.Log2(float64(1+l.Length)) - 3 }},
	{"no vowel", false, func(e *Evidence, _ Letters) float64 { return is(!strings.ContainsAny(e.Form, "aeiouyAEIOUY")) }},
	{"letters of names, capital", false, func(e *Evidence, l Letters) float64 { return e.Capital * (l.Mean - NameLettersOf(e.Form).Mean) }},
	{"near listed", false, func(e *Evidence, _ Letters) float64 { return doublings(e.NearUse) }},
	{"near listed, any", false, func(e *Evidence, _ Letters) float64 { return is(e.NearUse > 0) }},
	{"near own", false, func(e *Evidence, _ Letters) float64 {
		return math.Max(0, doublings(e.NearOwn)-doublings(e.Count))
	}},
	{"letters, mean, capital", false, func(e *Evidence, l Letters) float64 { return e.Capital * (l.Mean - 3) }},

	{"none found", true, func(e *Evidence, _ Letters) float64 { return is(!e.Found) }},
	{"distance 2", true, func(e *Evidence, _ Letters) float64 { return is(e.Distance == 2) }},
	{"distance 3", true, func(e *Evidence, _ Letters) float64 { return is(e.Distance >= 3) }},
	{"cost", true, func(e *Evidence, _ Letters) float64 { return e.Cost / 8 }},
	{"slip over coinage", true, func(e *Evidence, l Letters) float64 {
		if !e.Found {
			return 0
		}
		return min(max((l.Bits-e.Bits)/8, -3), 3)
	}},
	{"share", true, func(e *Evidence, _ Letters) float64 { return e.Share }},
	{"gap", true, func(e *Evidence, _ Letters) float64 { return e.Gap }},
	{"level", true, func(e *Evidence, _ Letters) float64 { return float64(e.Level) / 35 }},
	{"use", true, func(e *Evidence, _ Letters) float64 { return doublings(e.Use) }},
	{"used", true, func(e *Evidence, _ Letters) float64 { return is(e.Use > 0) }},
	{"two words", true, func(e *Evidence, _ Letters) float64 { return is(e.TwoWords) }},
	{"split", true, func(e *Evidence, _ Letters) float64 { return is(e.Split) }},
	{"split, little word", true, func(e *Evidence, _ Letters) float64 { return math.Log2(1 + e.Little) }},
	{"two words, adjacent", true, func(e *Evidence, _ Letters) float64 { return doublings(e.Adjacent) }},
	{"first letter", true, func(e *Evidence, _ Letters) float64 { return is(e.FirstKept) }},
	{"accent", true, func(e *Evidence, _ Letters) float64 { return is(e.Accent) }},
	{"letters, worse", true, func(e *Evidence, l Letters) float64 {
		if !e.Found || e.TwoWords {
			return 0
		}
		return min(max((l.Bits-LettersOf(e.Best).Bits)/8, -1), 3)
	}},
	{"doubled", true, func(e *Evidence, _ Letters) float64 { return is(e.Found && e.Doubled) }},
	{"vowels", true, func(e *Evidence, _ Letters) float64 { return is(e.Found && e.Vowels) }},
	{"order", true, func(e *Evidence, _ Letters) float64 { return is(e.Found && e.Order) }},
	{"letter missing", true, func(e *Evidence, l Letters) float64 { return is(e.missing(l)) }},
	{"letter too many", true, func(e *Evidence, l Letters) float64 { return is(e.surplus(l)) }},
	{"last letter", true, func(e *Evidence, _ Letters) float64 { return is(e.LastKept) }},
	{"inner, distance 1", true, func(e *Evidence, _ Letters) float64 { return is(e.inner() && e.Distance == 1) }},
	{"inner, distance 2", true, func(e *Evidence, _ Letters) float64 { return is(e.inner() && e.Distance == 2) }},
	{"inner, elided", true, func(e *Evidence, _ Letters) float64 { return is(e.inner()) * e.Elided }},
	{"use over count", true, func(e *Evidence, _ Letters) float64 {
		return math.Max(0, doublings(e.Use)-doublings(e.Count))
	}},
	{"long, distance 1", true, func(e *Evidence, l Letters) float64 {
		return is(e.Distance == 1) * (math.Log2(float64(1+l.Length)) - 3)
	}},
	{"distance 2, capital", true, func(e *Evidence, _ Letters) float64 { return e.Capital * is(e.Distance == 2) }},
	{"vowels, speech", true, func(e *Evidence, _ Letters) float64 { return e.Speech * is(e.Found && e.Vowels) }},
	{"last letter missing", true, func(e *Evidence, l Letters) float64 { return is(!e.LastKept && e.missing(l)) }},
	{"use, capital", true, func(e *Evidence, _ Letters) float64 { return e.Capital * doublings(e.Use) }},
}

// SlipFeatures returns the names of the features, those of the provisional set
// first; provisional is how many these are.
func SlipFeatures() (names []string, provisional int) {
	for _, f := range features {
		names = append(names, f.name)
		if !f.exact {
			provisional++
		}
	}
	return names, provisional
}

// SlipValues returns the value of each feature, in the order of [SlipFeatures];
// those of candidates are left out where none were searched for.
func SlipValues(e Evidence) []float64 {
	l := LettersOf(e.Form)
	values := make([]float64, 0, len(features))
	for _, f := range features {
		if !f.exact || e.Searched {
			values = append(values, f.value(&e, l))
		}
	}
	return values
}

// Weights are those of a log-linear model, by feature in the order of
// [SlipFeatures]: of the provisional set and of the exact one.
type Weights struct{ Provisional, Exact []float64 }

// Slip returns the probability that an entry is a slip rather than a word of this
// manuscript: the logistic function of the weighted sum of the features
// (log-linear model; Berger, Della Pietra and Della Pietra, “A Maximum Entropy
// Approach to Natural Language Processing”, Computational Linguistics 22(1),
// 1996). Evidence without candidates goes by the provisional weights.
func (w Weights) Slip(e Evidence) float64 {
	weights := w.Provisional
	if e.Searched {
		weights = w.Exact
	}
	var sum float64
	for i, value := range SlipValues(e) {
		sum += weights[i] * value
	}
	return 1 / (1 + math.Exp(-sum))
}

//go:embed slip.weights
var fitted string

// SlipWeights returns the weights in use, which the command fitslip wrote to the
// file slip.weights; its head says from what.
var SlipWeights = sync.OnceValue(func() Weights {
	w, err := ParseWeights(fitted)
	if err != nil {
		panic(err) // the build is broken: a test parses the same text
	}
	return w
})

// ParseWeights reads the text that [Weights.Text] wrote.
func ParseWeights(text string) (Weights, error) {
	names, provisional := SlipFeatures()
	w := Weights{make([]float64, provisional), make([]float64, len(names))}
	row := -1
	for i, line := range strings.Split(strings.TrimSpace(text), "\n") {
		if strings.HasPrefix(line, "#") {
			continue
		}
		if row++; row == 0 {
			continue // the columns' names
		}
		cells := strings.Split(line, "\t")
		if row > len(names) || len(cells) != 3 || cells[0] != names[row-1] {
			return Weights{}, fmt.Errorf("slip.weights: line %d: the features are not those of the program; fit the weights anew", i+1)
		}
		for j, weights := range [][]float64{w.Provisional, w.Exact} {
			if row > len(weights) {
				continue
			}
			x, err := strconv.ParseFloat(cells[j+1], 64)
			if err != nil {
				return Weights{}, fmt.Errorf("slip.weights: line %d: %q is no number; fit the weights anew", i+1, cells[j+1])
			}
			weights[row-1] = x
		}
	}
	if row != len(names) {
		return Weights{}, fmt.Errorf("slip.weights: %d weights for %d features; fit the weights anew", max(row, 0), len(names))
	}
	return w, nil
}

// Text returns the weights as a table, under a head of lines that begin with #.
func (w Weights) Text(head []string) string {
	var b strings.Builder
	for _, line := range head {
		fmt.Fprintf(&b, "# %s\n", line)
	}
	b.WriteString("feature\tprovisional\texact\n")
	names, provisional := SlipFeatures()
	for i, name := range names {
		if i < provisional {
			fmt.Fprintf(&b, "%s\t%.4f\t%.4f\n", name, w.Provisional[i], w.Exact[i])
		} else {
			fmt.Fprintf(&b, "%s\t-\t%.4f\n", name, w.Exact[i])
		}
	}
	return b.String()
}
