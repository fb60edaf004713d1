package main

import (
	"cmp"
	"context"
	"errors"
	"fmt"
	"io"
	"os"

	"github.com/spf13/cobra"

	"emendary/internal/assay"
	"emendary/internal/docket"
)

// measured is what the flags of assay ask for.
type measured struct {
	desk
	in, truth, aside string
	folds            int
	format           choice
	misses           bool
}

// newAssay returns the command that measures on labelled data.
func newAssay(p *program) *cobra.Command {
	a := measured{format: choice{"table", []string{"table", "json"}}}
	cmd := &cobra.Command{
		Use:   "assay PAIRS",
		Short: "measure how often the first candidates are right",
		Long: `Measure how often the candidates are right, on labelled pairs or on a
manuscript in which errors were planted.

  emendary assay PAIRS                            pairs
  emendary assay --in MANUSCRIPT --truth TRUTH    a manuscript

PAIRS and TRUTH hold a misspelling a line, a tab, and the words that its writer
may have meant, with commas between them; the first line may be a head. A
candidate is right if it is one of them, capitals and the style of apostrophes
apart. Counted is how often the first candidate is right, or one of the first
3, 5 and 10, and the mean reciprocal rank: the mean of 1/rank of the first that
is right, of 0 where none of the ten is.

Pairs are left out, and the number given for each reason, if a side is empty;
if the misspelling differs from a word meant in capitals or apostrophes alone;
if the misspelling is a listed word; or if no word meant is listed. Two words
are listed if both are, compounds if their members are.

Costs flatter on the list that they were fitted to. --folds K deals the pairs
to K parts, all pairs of one word to the same part, and measures each part
under costs fitted to the others.

In a manuscript, what is counted is planted forms: how many have an entry, how
right the candidates of the worst of their entries are, how far forward they
stand in the order by slip (average precision), and how many entries for 1,000
running words are no planted form. --aside FORMS names a file of forms, one a
line, that count neither way: the book's own slips.

JSON is one object. Its n, left_out, top1, top3, top5, top10 and mrr are
numbers, all but the first two fractions; reasons says why what is left out is.`,
		Example: `  emendary assay pairs.tsv --folds 10
  emendary assay pairs.tsv --misses
  emendary assay --in manuscript.md --truth planted.tsv --format json`,
		Args: func(cmd *cobra.Command, args []string) error { return a.check(cmd, args) },
		RunE: func(cmd *cobra.Command, args []string) error {
			if a.in != "" {
				return p.assayManuscript(cmd.Context(), &a)
			}
			return p.assayPairs(cmd.Context(), &a, args[0])
		},
	}
	f := cmd.Flags()
	f.StringVar(&a.in, "in", "", "measure in `MANUSCRIPT`")
	f.StringVar(&a.truth, "truth", "", "what was planted in it is in `TRUTH`, as pairs are")
	f.StringVar(&a.aside, "aside", "", "forms that count neither way are in `FORMS`, one a line")
	f.IntVar(&a.folds, "folds", 0, "fit costs anew for each of `K` parts of the pairs, to the other parts")
	f.BoolVar(&a.misses, "misses", false, "list what the first candidate is wrong for")
	f.Var(&a.format, "format", "`FORMAT`: table or json")
	_ = cmd.RegisterFlagCompletionFunc("format", cobra.FixedCompletions(a.format.allowed, cobra.ShellCompDirectiveNoFileComp))
	a.flags(cmd)
	return cmd
}

// check refuses arguments and flags that do not go together.
func (a *measured) check(cmd *cobra.Command, args []string) error {
	given := cmd.Flags().Changed
	if !given("in") {
		for _, flag := range []string{"truth", "aside", "ledger", "encoding"} {
			if given(flag) {
				return fmt.Errorf("flag --%s: is for a manuscript; name it with --in MANUSCRIPT", flag)
			}
		}
		if given("folds") && a.folds < 2 {
			return fmt.Errorf("flag --folds: %d is below 2", a.folds)
		}
		if given("folds") && given("costs") {
			return errors.New("assay: --folds fits costs of its own; leave --costs out")
		}
		if len(args) == 0 {
			return fmt.Errorf("assay: nothing to measure given; type %[1]s, or %[2]s --in MANUSCRIPT --truth TRUTH", cmd.UseLine(), cmd.CommandPath())
		}
		return takes(1, "pairs")(cmd, args)
	}
	switch {
	case len(args) > 0:
		return fmt.Errorf("assay: %s and --in; measure on pairs or in a manuscript, not both at once", args[0])
	case given("folds"):
		return errors.New("flag --folds: is for pairs; leave it out with --in")
	case a.in == "":
		return errors.New("flag --in: names no manuscript")
	case a.truth == "":
		return errors.New("assay: --in alone does not tell what was planted; add --truth TRUTH")
	}
	return nil
}

func (p *program) assayPairs(ctx context.Context, a *measured, file string) error {
	pairs, err := readLines(file, assay.ReadPairs)
	if err != nil {
		return err
	}
	lex, err := a.load()
	if err != nil {
		return err
	}
	costs, err := docket.Costs(a.costs)
	if err != nil {
		return err
	}
	m := p.meter("measuring")
	defer m.clear()
	head := fmt.Sprintf("%s: %s, costs %s", file, counted(len(pairs), "pair", "pairs"), cmp.Or(a.costs, docket.DefaultCosts))
	var result assay.Accuracy
	if a.folds > 0 {
		head = fmt.Sprintf("%s: %s in %d folds, each under costs fitted to the others", file, counted(len(pairs), "pair", "pairs"), a.folds)
		result, err = assay.AssayFolds(ctx, pairs, lex, a.folds, m.step)
	} else {
		result, err = assay.AssayPairs(ctx, pairs, lex, costs, m.step)
	}
	if err != nil {
		return inFile(ctx, file, err)
	}
	m.clear()
	if !a.misses {
		result.Misses = nil
	}
	if a.format.value == "json" {
		return writeJSON(p.out, result)
	}
	figures{p.out}.pairs(head, result)
	return nil
}

func (p *program) assayManuscript(ctx context.Context, a *measured) error {
	truth, err := readLines(a.truth, assay.ReadTruth)
	if err != nil {
		return err
	}
	var aside map[string]bool
	if a.aside != "" {
		if aside, err = readLines(a.aside, assay.ReadForms); err != nil {
			return err
		}
	}
	s, err := p.open(ctx, &a.desk, a.in, true)
	if err != nil {
		return err
	}
	defer s.Close()
	if rulings, err := s.Ledger.Rulings(ctx); err != nil {
		return err
	} else if len(rulings) > 0 {
		return fmt.Errorf("%s: holds rulings, and what is ruled on is off the docket; name a ledger yet to be with --ledger FILE", s.Options.Ledger)
	}
	m := p.meter("measuring")
	defer m.clear()
	result, err := assay.AssayManuscript(ctx, s.Docket, truth, aside, m.step)
	if err != nil {
		return err
	}
	m.clear()
	if !a.misses {
		result.Misses, result.Missed = nil, nil
	}
	if a.format.value == "json" {
		return writeJSON(p.out, result)
	}
	figures{p.out}.manuscript(a.in, result)
	return nil
}

// inFile names the file that an error is about, unless it is that ctx has ended.
func inFile(ctx context.Context, file string, err error) error {
	if ctx.Err() != nil {
		return err
	}
	return fmt.Errorf("%s: %w", file, err)
}

// readLines reads a file of lines. Errors name it.
func readLines[T any](path string, read func(r io.Reader, name string) (T, error)) (none T, err error) {
	f, err := os.Open(path)
	if err != nil {
		return none, fileError(path, err)
	}
	defer f.Close()
	if info, err := f.Stat(); err == nil && info.IsDir() {
		return none, fmt.Errorf("%s: a directory; name a file", path)
	}
	return read(f, path)
}
