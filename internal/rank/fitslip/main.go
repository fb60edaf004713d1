// Command fitslip fits the weights of the slip model that package rank embeds, from
// errors planted in texts.
//
//	fitslip fit [flags] TEXT|MANUSCRIPT:TRUTH.tsv …
//	fitslip plant [flags] TEXT PAIRS.tsv OUT OUT-TRUTH.tsv
//
// fit takes manuscripts with errors and their truth, and clean texts, in which it
// plants errors itself, in two copies: misspellings of the pairs (misspelling,
// tab, intended word), slips of the hand and of the space bar. Manuscripts whose
// file names agree up to the first hyphen or full stop are one text. It leaves
// each text out once, to measure the order on what it was not fitted on, and
// then fits on all. With -o ../slip.weights, run in this folder, it writes the
// weights that the next build embeds; they have to be fitted anew when the
// features or the candidates' costs change. Refresh the golden files that show
// probabilities afterwards.
package main

import (
	"context"
	"errors"
	"flag"
	"fmt"
	"os"
)

func main() {
	if err := run(context.Background(), os.Args[1:]); err != nil {
		fmt.Fprintln(os.Stderr, "fitslip:", err)
		os.Exit(1)
	}
}

func run(ctx context.Context, args []string) error {
	usage := errors.New("want plant or fit, and its files; see the head of main.go")
	if len(args) == 0 {
		return usage
	}
	flags := flag.NewFlagSet(args[0], flag.ContinueOnError)
	var (
		n    = flags.Int("n", 600, "plant: how many errors")
		own  = flags.Int("own", 25, "plant: how many of them in names and coinages of the text's own")
		seed = flags.Uint64("seed", 1, "plant: the seed of chance")
		f    fitting
	)
	flags.StringVar(&f.pairs, "pairs", "", "fit: file of misspellings to plant in texts")
	flags.StringVar(&f.aside, "aside", "", "fit: file of the texts' own slips, one a line")
	flags.Float64Var(&f.rate, "rate", 0.1, "fit: which part of the entries are slips in practice")
	flags.IntVar(&f.list, "list", 0, "fit: list so many of the entries that stand highest and are no slips, and of the slips that stand lowest")
	flags.StringVar(&f.note, "note", "", "fit: what the texts are, for the head of the weights")
	flags.StringVar(&f.out, "o", "", "fit: where to write the weights")
	if err := flags.Parse(args[1:]); err != nil {
		return err
	}
	files := flags.Args()
	switch {
	case args[0] == "plant" && len(files) == 4:
		return plant(ctx, files[0], files[1], files[2], files[3], *n, *own, *seed)
	case args[0] == "fit" && len(files) > 0:
		return f.fit(ctx, files)
	}
	return usage
}
