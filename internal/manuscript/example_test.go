package manuscript_test

import (
	"fmt"
	"os"

	"emendary/internal/manuscript"
)

func ExampleRead() {
	source := "# A Lamp at Sallow Quay\n\n## The Mole\n\nThe *harb*er, “’tis l9l4,” said\nthe pilot. `mole 7`\n"
	d, err := manuscript.Read("lamp.md", []byte(source), manuscript.Options{})
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Println(d.Title, len(d.Parts), d.Parts[1].Title)
	for _, w := range d.Paragraphs[2].Words {
		fmt.Printf("%s: %s\n", w.Text, w.Setting)
		if w.Fault != manuscript.NoFault {
			fmt.Printf("  %s: %s\n", w.Fault, w.Instead)
		}
	}
	for _, p := range d.Passed {
		fmt.Println("passed over:", p.Reason, p.Text)
	}
	// Output:
	// A Lamp at Sallow Quay 2 The Mole
	// The: narration
	// harber: italics
	// ’tis: speech
	// l9l4: speech
	//   letter for a digit: 1914
	// said: narration
	// the: narration
	// pilot: narration
	// passed over: code mole 7
}

func ExampleOpen() {
	_, err := manuscript.Open("no-such-novel.md", manuscript.Options{})
	fmt.Println(err)
	// Output: no-such-novel.md: no such file or directory
}

func ExampleBase() {
	fmt.Println(manuscript.Base("harber’s"))
	fmt.Println(manuscript.Base("pilots’"))
	fmt.Println(manuscript.Base("nothin’"))
	// Output:
	// harber ’s
	// pilots ’
	// nothin’
}

func ExampleDocument_Letters() {
	d, err := manuscript.Read("lamp.md", []byte("> caf&eacute; har-\n> ber"), manuscript.Options{})
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, w := range d.Paragraphs[0].Words {
		fmt.Println(w.Text)
		for _, l := range d.Letters(0, w.Start, w.End) {
			fmt.Printf("  %q %d–%d %v\n", l.Text, l.Span.Start, l.Span.End, l.Mark)
		}
	}
	// Output:
	// café
	//   "c" 2–3 false
	//   "a" 3–4 false
	//   "f" 4–5 false
	//   "é" 5–13 false
	// har-ber
	//   "h" 14–15 false
	//   "a" 15–16 false
	//   "r" 16–17 false
	//   "-" 17–18 true
	//   "\n" 18–21 true
	//   "b" 21–22 false
	//   "e" 22–23 false
	//   "r" 23–24 false
}

func ExampleDocument_Position() {
	d, err := manuscript.Read("lamp.txt", []byte("It was late.\r\nThe café shut."), manuscript.Options{})
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Println(d.Position(24))
	// Output: 2 10
}

// The word is broken at a line end, in a quotation; the markers stay.
func ExampleDocument_Emend() {
	source := "> The har-\n> ber is *full*.\n"
	d, err := manuscript.Read("lamp.md", []byte(source), manuscript.Options{})
	if err != nil {
		fmt.Println(err)
		return
	}
	w := d.Paragraphs[0].Words[1]
	e := manuscript.Emendation{Paragraph: 0, Start: w.Start, End: w.End}
	for _, l := range d.Letters(0, w.Start, w.End) {
		if l.Text == "e" {
			l.Text = "ou"
		}
		e.Letters = append(e.Letters, l.Text)
	}
	emended, err := d.Emend([]manuscript.Emendation{e})
	if err != nil {
		fmt.Println(err)
		return
	}
	os.Stdout.Write(emended)
	// Output:
	// > The har-
	// > bour is *full*.
}
