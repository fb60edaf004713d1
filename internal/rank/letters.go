package rank

import (
	_ "embed"
	"math"
)

//go:generate go run ./letters

// The letter models of words and of names, made by the program in the folder
// letters: for each context of three symbols the number of its row, two bytes,
// little-endian; then the rows, for each next symbol a byte, its bits in
// sixteenths. A context that no word has shares the row of its last two symbols.
var (
	//go:embed letters.table
	letterTable string
	//go:embed names.table
	nameTable string
)

// LetterSymbols is how many symbols the letter model tells apart: the edge of a
// word (0), a to z (1 to 26), and all other letters and marks together (27).
const LetterSymbols = 28

// LetterUnits is how many units of the table make a bit.
const LetterUnits = 16

// LetterContexts is how many contexts of three symbols there are.
const LetterContexts = LetterSymbols * LetterSymbols * LetterSymbols

// LetterSymbol returns the symbol of the letter model that r counts as.
func LetterSymbol(r rune) int {
	if r >= 'A' && r <= 'Z' {
		r += 'a' - 'A'
	}
	if r >= 'a' && r <= 'z' {
		return int(r-'a') + 1
	}
	return LetterSymbols - 1
}

// Letters is how well a form's letters follow one another as those of English
// words do.
type Letters struct {
	Bits   float64 // −log₂ of the probability of the whole form, its end included
	Mean   float64 // bits per letter, the end counted as one
	Worst  float64 // the most bits that a single letter takes, given the three before it
	Length int     // symbols, without the end
}

// LettersOf returns the plausibility of form as an English word: the bits that a
// model of each symbol given the three before it takes to spell it (a 4-gram model
// with interpolated Witten–Bell smoothing: Chen and Goodman, “An Empirical Study of
// Smoothing Techniques for Language Modeling”, Computer Speech and Language 13,
// 1999, section 2.5), fitted on the words of the base lexicon that are no names.
// Case counts for nothing. Most words take 2 to 3.5 bits a letter, a run of
// random letters 6 and more. It takes O(n) time and allocates nothing.
func LettersOf(form string) Letters { return lettersBy(letterTable, form) }

// NameLettersOf returns the plausibility of form as a name: as [LettersOf], by the
// names of the base lexicon.
func NameLettersOf(form string) Letters { return lettersBy(nameTable, form) }

func lettersBy(table, form string) Letters {
	var l Letters
	context := 0
	step := func(symbol int) {
		row := int(table[2*context]) | int(table[2*context+1])<<8
		bits := float64(table[2*LetterContexts+row*LetterSymbols+symbol]) / LetterUnits
		l.Bits += bits
		l.Worst = math.Max(l.Worst, bits)
		context = (context*LetterSymbols + symbol) % LetterContexts
	}
	for _, r := range form {
		step(LetterSymbol(r))
		l.Length++
	}
	step(0)
	l.Mean = l.Bits / float64(l.Length+1)
	return l
}
