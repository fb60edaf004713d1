package align_test

import (
	"fmt"

	"emendary/align"
)

func ExampleAlphabet() {
	var a align.Alphabet
	composed, decomposed := a.Letters("Caf\u00e9"), a.Letters("Cafe\u0301")
	fmt.Println(len(composed), len(decomposed), align.Distance(composed, decomposed))
	fmt.Println(a.Text(a.Fold(composed)...))
	// Output:
	// 4 4 0
	// café
}

func ExampleDistance() {
	var a align.Alphabet
	x, y := a.Letters("CA"), a.Letters("ABC")
	fmt.Println(align.Levenshtein(x, y), align.Restricted(x, y), align.Distance(x, y))
	// Output: 3 3 2
}

func ExampleAlign() {
	var a align.Alphabet
	alignment := align.Align(a.Letters("harber"), a.Letters("harbour"), align.Unit{})
	for _, e := range alignment.Edits {
		if e.Op != align.Agreement {
			fmt.Printf("%s at %d: %q → %q\n", e.Op, e.I, a.Text(e.From...), a.Text(e.To...))
		}
	}
	fmt.Println(alignment.Cost)
	// Output:
	// substitution at 4: "e" → "o"
	// insertion at 5: "" → "u"
	// 2
}

func ExampleAll() {
	var a align.Alphabet
	form, word := a.Letters("harber"), a.Letters("harbour")
	fmt.Println(align.Count(form, word, align.Unit{}))
	for _, alignment := range align.All(form, word, align.Unit{}, 10) {
		for _, r := range alignment.Replacements(len(form)) {
			fmt.Printf("%s|", a.Text(r...))
		}
		fmt.Println()
	}
	// Output:
	// 2
	// h|a|r|b|ou|r|
	// h|a|r|bo|u|r|
}

func ExampleStar() {
	var a align.Alphabet
	form := a.Letters("harber")
	var alignments []align.Alignment
	for _, word := range []string{"harbour", "barber", "harbre"} {
		alignments = append(alignments, align.Align(form, a.Letters(word), align.Unit{}))
	}
	grid := align.Star(form, alignments)
	for _, c := range grid.Columns {
		if c.Form < 0 {
			fmt.Print("‸ ")
		} else {
			fmt.Print(a.Text(form[c.Form]), " ")
		}
	}
	fmt.Println("|")
	for _, row := range grid.Rows {
		for _, cell := range row {
			switch {
			case cell.Span == 0: // covered from the left
			case cell.Op == align.Agreement && len(cell.To) > 0:
				fmt.Print("· ")
			default:
				fmt.Printf("%-*s", 2*cell.Span, a.Text(cell.To...))
			}
		}
		fmt.Println("|")
	}
	// Output:
	// h a r b e ‸ r |
	// · · · · o u · |
	// b · · · ·   · |
	// · · · · re    |
}
