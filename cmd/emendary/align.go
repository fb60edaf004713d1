package main

import (
	"errors"
	"fmt"
	"math"
	"os"
	"strconv"
	"strings"

	"github.com/muesli/termenv"
	"github.com/spf13/cobra"
	"golang.org/x/term"

	"emendary/align"
	"emendary/internal/docket"
	"emendary/ui/alignment"
	"emendary/ui/style"
)

// newAlign returns the command that aligns two words.
func newAlign(p *program) *cobra.Command {
	var (
		all, ascii bool
		costs      string
	)
	cmd := &cobra.Command{
		Use:   "align FORM WORD",
		Short: "lay a form against a word, letter by letter",
		Long: `Lay a form against a word, letter by letter: the letters of the form as column
heads, under them a dot where the word agrees and the letter where it differs;
then the edits as proof-correction marks and in words, and their cost. Every
edit costs 1: an insertion, deletion or substitution of a letter, or a
transposition of two neighbours. Capitals cost nothing. With --costs english, or
a file that fit wrote, edits cost bits: the fewer, the likelier the slip; and
edits of several letters count as one where that is cheaper.

Often several alignments cost the same; --all shows them, at most 100, and says
how many there are.`,
		Example: `  emendary align harber harbour
  emendary align nieghbour neighbour --ascii
  emendary align goverment government --all
  emendary align fisikle physical --costs english`,
		Args: takes(2, "form"),
		RunE: func(_ *cobra.Command, args []string) error {
			return p.align(args[0], args[1], costs, all, ascii)
		},
	}
	cmd.Flags().StringVar(&costs, "costs", docket.UnitCosts, "price edits as in `COSTS`: unit, english, or a file that fit wrote")
	cmd.Flags().BoolVar(&all, "all", false, "all alignments of the same cost, at most 100")
	cmd.Flags().BoolVar(&ascii, "ascii", false, "marks in ASCII")
	return cmd
}

// mostLetters bounds what is aligned: the work grows with the square.
const mostLetters = 500

// mostAlignments is how many alignments --all shows.
const mostAlignments = 100

func (p *program) align(form, word, costs string, all, ascii bool) error {
	var alphabet align.Alphabet
	formLetters, wordLetters := alphabet.Letters(form), alphabet.Letters(word)
	if len(formLetters) == 0 || len(wordLetters) == 0 {
		return errors.New("align: an empty word; give a form and a word")
	}
	if longest := max(len(formLetters), len(wordLetters)); longest > mostLetters {
		return fmt.Errorf("align: a word of %d letters; %d are the most", longest, mostLetters)
	}
	from, to := alphabet.Fold(formLetters), alphabet.Fold(wordLetters)
	priced, inBits, err := pricesOf(costs)
	if err != nil {
		return err
	}
	found := []align.Alignment{align.Align(from, to, priced)}
	if all {
		found = align.All(from, to, priced, mostAlignments)
	}
	letters := spelt(&alphabet, formLetters)
	rows := make([]alignment.Row, len(found))
	for i, a := range found {
		rows[i] = alignment.Row{Text: word, Letters: spelt(&alphabet, wordLetters), Alignment: a}
	}
	ability := style.FromEnvironment(os.Getenv)
	ability.ASCII = ability.ASCII || ascii
	if !p.outIsTerminal {
		ability.Plain, ability.Profile = true, termenv.Ascii
	}
	grid := alignment.New(style.Make(ability))
	cost := number(found[0].Cost)
	if inBits {
		grid.InBits()
		cost = strconv.FormatFloat(found[0].Cost, 'f', 1, 64) + " bits"
	}
	grid.SetSize(p.columns(), len(rows)+4)
	grid.Lay(letters, rows)
	for line := range strings.SplitSeq(grid.View(), "\n") {
		p.sayf("%s", strings.TrimRight(line, " "))
	}
	p.sayf("   cost %s", cost)
	if all {
		p.sayAll(letters, rows, align.Count(from, to, priced))
	}
	return nil
}

// pricesOf returns the costs of that name or file, and whether they are in bits.
func pricesOf(name string) (costs align.Costs, inBits bool, err error) {
	fitted, err := docket.Costs(name)
	if err != nil || fitted == nil {
		return align.Unit{}, false, err
	}
	return fitted, true, nil
}

// sayAll says what each alignment does, and how many there are.
func (p *program) sayAll(letters []string, rows []alignment.Row, count uint64) {
	if count == 1 {
		p.sayf("   no other alignment costs the same")
		return
	}
	total := fmt.Sprint(count)
	if count == math.MaxUint64 {
		total += " or more"
	}
	first := ""
	if count > uint64(len(rows)) {
		first = fmt.Sprintf("; the first %d", len(rows))
	}
	p.sayf("\n   %s alignments cost the same%s:", total, first)
	for i, r := range rows {
		p.sayf("%6d  %s", i+1, alignment.Sentence(letters, r))
	}
}

// spelt returns letters as they are written.
func spelt(alphabet *align.Alphabet, letters []align.Letter) []string {
	out := make([]string, len(letters))
	for i, l := range letters {
		out[i] = alphabet.Text(l)
	}
	return out
}

// unbounded is the width of what is no terminal: nothing is cut for it.
const unbounded = 1 << 12

// columns returns how wide standard output is.
func (p *program) columns() int {
	if p.outIsTerminal {
		if width, _, err := term.GetSize(int(os.Stdout.Fd())); err == nil && width > 0 {
			return width
		}
	}
	return unbounded
}
