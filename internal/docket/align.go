package docket

import "emendary/align"

// Align aligns form with text, case folded, under the costs in use. The letters
// returned are as written. See alignment for words beyond all measure.
func (d *Docket) Align(form, text string) (formLetters, textLetters []align.Letter, a align.Alignment) {
	alphabet := d.base.Alphabet()
	formLetters, textLetters = alphabet.Letters(form), alphabet.Letters(text)
	return formLetters, textLetters, alignment(alphabet.Fold(formLetters), alphabet.Fold(textLetters), d.prices())
}

// InBits reports whether costs are in bits; else they count edits.
func (d *Docket) InBits() bool { return d.fitted != nil }

// prices returns the costs in use.
func (d *Docket) prices() align.Costs {
	d.searching.Lock()
	defer d.searching.Unlock()
	if d.costs == nil {
		return align.Unit{}
	}
	return d.costs
}

// fittedCells bounds the table that is filled under fitted costs, where a cell
// takes some hundred times as long.
const fittedCells = 1 << 13

// mostCells bounds the table that an alignment fills: two words of a thousand
// letters.
const mostCells = 1 << 20

// alignment is align.Align under costs where the table it fills is within bounds,
// under unit costs where it is larger. Of still longer words, what they begin and
// end with alike agrees, and what is between is aligned, or replaced as a whole where that is still too long.
func alignment(form, word []align.Letter, costs align.Costs) align.Alignment {
	if cells(form, word) > fittedCells {
		costs = align.Unit{}
	}
	if cells(form, word) <= mostCells {
		return align.Align(form, word, costs)
	}
	head := common(form, word)
	tail := 0
	for tail < min(len(form), len(word))-head && form[len(form)-1-tail] == word[len(word)-1-tail] {
		tail++
	}
	from, to := form[head:len(form)-tail], word[head:len(word)-tail]
	var middle align.Alignment
	if cells(from, to) <= mostCells {
		middle = align.Align(from, to, align.Unit{})
	} else {
		middle.Cost = float64(max(len(from), len(to)))
		middle.Edits = []align.Edit{{Op: align.Replacement, From: from, To: to, Cost: middle.Cost}}
	}
	out := align.Alignment{Cost: middle.Cost}
	agree := func(i, j int) {
		out.Edits = append(out.Edits, align.Edit{Op: align.Agreement, I: i, J: j, From: form[i : i+1], To: word[j : j+1]})
	}
	for i := range head {
		agree(i, i)
	}
	for _, e := range middle.Edits {
		e.I, e.J = e.I+head, e.J+head
		out.Edits = append(out.Edits, e)
	}
	for i := tail; i > 0; i-- {
		agree(len(form)-i, len(word)-i)
	}
	return out
}

func cells(a, b []align.Letter) int { return (len(a) + 1) * (len(b) + 1) }
