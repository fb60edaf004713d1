package docket

import "math"

// Dispersion is how evenly a form is spread over the parts of a manuscript.
type Dispersion struct {
	// DP is Gries's deviation of proportions: half the sum, over the parts, of how
	// far the share of the form's occurrences that a part has is from the part's
	// share of all words. 0 is as even as can be, towards 1 all in one small part
	// (Gries, “Dispersions and adjusted frequencies in corpora”, International
	// Journal of Corpus Linguistics 13(4), 2008).
	DP float64
	// DPnorm is DP over the greatest value that it can have with these parts, one
	// less the share of the smallest (Lijffijt and Gries, “Correction to
	// ‘Dispersions and adjusted frequencies in corpora’”, the same journal 17(1),
	// 2012). A manuscript of one part has none: 0.
	DPnorm float64
	// D is Juilland's: one less the coefficient of variation of the form's rate in
	// the parts, over the root of one less than their number. 1 is as even as can
	// be, 0 all in one part (Juilland, Brodin and Davidovitch 1970, as Gries 2008
	// gives it for parts of unequal size). One part gives 1.
	D float64
}

// DispersionOf returns the dispersion of a form with so many hits in each part
// over parts of so many words. Parts without words count for nothing. O(parts).
func DispersionOf(hits, words []int) Dispersion {
	var all, found, parts float64
	least := math.Inf(1)
	for i, n := range words {
		if n == 0 {
			continue
		}
		parts++
		all += float64(n)
		found += float64(hits[i])
		least = min(least, float64(n))
	}
	if parts < 2 || found == 0 {
		return Dispersion{D: 1}
	}
	var apart, sum, squares float64
	for i, n := range words {
		if n == 0 {
			continue
		}
		apart += math.Abs(float64(hits[i])/found - float64(n)/all)
		rate := float64(hits[i]) / float64(n)
		sum += rate
		squares += rate * rate
	}
	mean := sum / parts
	variation := math.Sqrt(max(0, squares/parts-mean*mean)) / mean
	return Dispersion{
		DP:     apart / 2,
		DPnorm: apart / 2 / (1 - least/all),
		D:      1 - variation/math.Sqrt(parts-1),
	}
}

// Dispersion returns how evenly the form of e is spread over the parts of the
// manuscript. O(occurrences + parts).
func (d *Docket) Dispersion(e *Entry) Dispersion {
	return DispersionOf(d.Parts(e), d.words)
}

// partWords counts the words of each part.
func (d *Docket) partWords() []int {
	words := make([]int, len(d.Document.Parts))
	for i := range d.Document.Paragraphs {
		p := &d.Document.Paragraphs[i]
		words[p.Part] += len(p.Words)
	}
	return words
}
