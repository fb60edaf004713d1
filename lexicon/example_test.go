package lexicon_test

import (
	"context"
	"fmt"
	"log"
	"maps"
	"strings"

	"emendary/align"
	"emendary/lexicon"
	"emendary/lexicon/english"
)

func ExampleLexicon_Find() {
	house, err := lexicon.Load(strings.NewReader("okay → OK\n"), "house.txt")
	if err != nil {
		log.Fatal(err)
	}
	x := lexicon.New(english.Base(), lexicon.BritishIse).With(lexicon.House, house)
	for _, form := range []string{"Harbour", "harbor", "harber", "thames", "THAMES", "Okay"} {
		found := x.Find(form)
		fmt.Printf("%s: %s", form, found.Status)
		if found.Status == lexicon.Barred {
			fmt.Printf(", %s instead", found.Words[0].Instead)
		}
		fmt.Println()
	}
	// Output:
	// Harbour: known
	// harbor: other variety
	// harber: unknown
	// thames: unknown
	// THAMES: known
	// Okay: barred, OK instead
}

func ExampleLexicon_Within() {
	x := lexicon.New(english.Base(), lexicon.BritishIse)
	for _, near := range x.Within("recieve", 1) {
		level, _ := near.Word.Level(x.Variety())
		fmt.Println(near.Word.Text, near.Distance, "level", level)
	}
	// Output:
	// receive 1 level 10
	// relieve 1 level 20
}

func ExampleLexicon_Attested() {
	x := lexicon.New(english.Base(), lexicon.AnyVariety)
	forms := map[string]int{"harbour": 214, "colour": 31, "realize": 12, "color": 1, "ship": 80}
	v, evidence := x.Attested(maps.All(forms))
	fmt.Println(v, evidence[v])
	fmt.Println(lexicon.BritishIse, evidence[lexicon.BritishIse])
	// Output:
	// British -ize 257
	// British -ise 245
}

func ExampleLoad() {
	list, err := lexicon.Load(strings.NewReader(`# the book's own words
Merrin	person	the pilot, never Merin
quayfolk
alright → all right
`), "book.txt")
	if err != nil {
		log.Fatal(err)
	}
	for w := range list.Words() {
		fmt.Printf("%s kind=%q note=%q barred=%t instead=%q\n", w.Text, w.Kind, w.Note, w.Barred, w.Instead)
	}
	_, err = lexicon.Load(strings.NewReader("harbour\nSallow Quay\n"), "house.txt")
	fmt.Println(err)
	// Output:
	// alright kind="" note="" barred=true instead="all right"
	// Merrin kind="person" note="the pilot, never Merin" barred=false instead=""
	// quayfolk kind="" note="" barred=false instead=""
	// house.txt: line 2: more than one word; give each word a line of its own
}

func ExampleList_AppendBinary() {
	list, err := lexicon.NewList("quay", []lexicon.Word{{Text: "harbour"}, {Text: "mole"}})
	if err != nil {
		log.Fatal(err)
	}
	flat, err := list.AppendBinary(nil)
	if err != nil {
		log.Fatal(err)
	}
	again, err := lexicon.Open("quay", string(flat))
	if err != nil {
		log.Fatal(err)
	}
	fmt.Println(lexicon.New(again, lexicon.AnyVariety).Find("Harbour").Status)
	// Output: known
}

func ExampleRanking_Best() {
	list, _ := lexicon.Load(strings.NewReader("harbour\nharbours\nharder\nlantern\n"), "words")
	x := lexicon.New(list, lexicon.AnyVariety)
	var pairs []align.Pair
	for _, p := range [][2]string{{"clamer", "clamour"}, {"labors", "labours"}, {"adn", "and"}} {
		pairs = append(pairs, align.Pair{Form: x.Alphabet().Letters(p[0]), Word: x.Alphabet().Letters(p[1]), Weight: 1})
	}
	costs, _ := align.Fit(context.Background(), pairs, align.Origin{}, nil)

	tenBits := func(lexicon.Word, int, int) (int32, bool) { return 10 << 10, true }
	r := x.Ranking(tenBits, nil)
	for _, m := range r.Best(nil, costs.Sheet(x.Alphabet().Letters("harber")), 2, 1<<20) {
		fmt.Println(m.Word.Text)
	}
	// Output:
	// harbour
	// harder
}
