package main

import (
	"bytes"
	"cmp"
	"context"
	"errors"
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"time"
	"unicode"
	"unicode/utf8"

	"github.com/spf13/cobra"

	"emendary/align"
	"emendary/internal/assay"
)

// newFit returns the command that fits costs to labelled pairs.
func newFit(p *program) *cobra.Command {
	var (
		origin align.Origin
		out    string
		force  bool
	)
	cmd := &cobra.Command{
		Use:   "fit PAIRS",
		Short: "fit the costs of edits to labelled misspellings",
		Long: `Estimate the costs of edits from labelled pairs, by expectation–maximisation,
and write them as text: pairs.costs for pairs.tsv, or what -o names. Other
commands price edits by it with --costs FILE.

PAIRS holds a misspelling a line, a tab, and the words that its writer may have
meant, with commas between them; the first line may be a head. Words that share
a misspelling share its weight. The file says what it was fitted to: --source,
--licence and --date; the same pairs and words give the same file.

Pairs are left out, and the number given for each reason, if a side is empty or
if the two differ in capitals or apostrophes alone. Bits a pair are −log₂ of the
probability of its misspelling given its word, in the mean: before the first
pair was seen, and after all were. They flatter, as they are of the same pairs:
how well costs do on others, assay --folds measures.`,
		Example: `  emendary fit pairs.tsv
  emendary fit pairs.tsv -o house.costs --source "our proofs of 2026" --licence "ours alone"`,
		Args: takes(1, "pairs"),
		RunE: func(cmd *cobra.Command, args []string) error {
			if cmd.Flags().Changed("output") && out == "" {
				return errors.New("flag --output: names no file")
			}
			if _, err := time.Parse(time.DateOnly, origin.Date); err != nil {
				return fmt.Errorf("flag --date: %q is no date; write it as 2006-01-02", origin.Date)
			}
			if err := cmp.Or(oneLine("--source", origin.Source), oneLine("--licence", origin.Licence)); err != nil {
				return err
			}
			origin.Source = cmp.Or(origin.Source, filepath.Base(args[0]))
			return p.fit(cmd.Context(), args[0], cmp.Or(out, costsName(args[0])), origin, force)
		},
	}
	f := cmd.Flags()
	f.StringVarP(&out, "output", "o", "", "write the costs to `OUT`, not beside the pairs")
	f.BoolVar(&force, "force", false, "replace a file that is there")
	f.StringVar(&origin.Source, "source", "", "who made the pairs and where they are from, `TEXT`; the file's name where not given")
	f.StringVar(&origin.Licence, "licence", "", "`TEXT`: under which terms the pairs are")
	f.StringVar(&origin.Date, "date", time.Now().Format(time.DateOnly), "of the fitting, `DATE` as 2006-01-02")
	return cmd
}

// costsName returns the path of the costs beside a file of pairs.
func costsName(pairs string) string {
	return strings.TrimSuffix(pairs, filepath.Ext(filepath.Base(pairs))) + ".costs"
}

// oneLine refuses a text that a field of a file of costs cannot hold.
func oneLine(flag, text string) error {
	if !utf8.ValidString(text) || strings.ContainsFunc(text, unicode.IsControl) {
		return fmt.Errorf("flag %s: %q is not one line of UTF-8 without tabs", flag, text)
	}
	return nil
}

func (p *program) fit(ctx context.Context, file, out string, origin align.Origin, force bool) error {
	pairs, err := readLines(file, assay.ReadPairs)
	if err != nil {
		return err
	}
	info, err := os.Stat(file)
	if err != nil {
		return fileError(file, err)
	}
	target, err := placeForCopy(out, force, file)
	if err != nil {
		return err
	}
	fit, leftOut := assay.ToFit(pairs)
	if len(fit) == 0 {
		return fmt.Errorf("%s: no pairs to fit to: all %d have an empty side, or differ in capitals or apostrophes alone", file, len(pairs))
	}
	m := p.meter("fitting")
	defer m.clear()
	costs, err := align.Fit(ctx, fit, origin, m.step)
	if err != nil {
		return inFile(ctx, file, err)
	}
	var text bytes.Buffer
	if _, err := costs.WriteTo(&text); err != nil {
		return err
	}
	before, after := align.Unfitted().Bits(fit), costs.Bits(fit)
	if err := ctx.Err(); err != nil {
		return err
	}
	if err := writeCopy(target, text.Bytes(), info.Mode().Perm()); err != nil {
		return fmt.Errorf("%s: %w; name another place with -o OUT", out, cause(err))
	}
	m.clear()
	figures{p.out}.fitting(fmt.Sprintf("%s: costs fitted to %s", out, file), len(pairs), leftOut, before, after)
	return nil
}
