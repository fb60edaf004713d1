// Command fitslip fits the weights of the slip model that package rank embeds, and
// plants errors in texts to fit them on.
//
//	fitslip plant [-n N] [-own N] [-seed N] TEXT PAIRS.tsv OUT OUT-TRUTH.tsv
//	fitslip fit [-aside FILE] [-rate R] [-list N] [-note TEXT] [-o slip.weights] MANUSCRIPT TRUTH.tsv …
//
// Manuscripts whose file names agree up to the first hyphen or full stop are one
// text: fit leaves each text out once, to measure the order on what it was not
// fitted on, and then fits on all. With
// -o ../slip.weights it writes the weights that the next build embeds.
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
		n     = flags.Int("n", 600, "plant: how many errors")
		own   = flags.Int("own", 25, "plant: how many of them in names and coinages of the text's own")
		seed  = flags.Uint64("seed", 1, "plant: the seed of chance")
		aside = flags.String("aside", "", "fit: file of the texts' own slips, one a line")
		rate  = flags.Float64("rate", 0.1, "fit: which part of the entries are slips in practice")
		list  = flags.Int("list", 0, "fit: list so many of the entries that stand highest and are no slips, and of the slips that stand lowest")
		note  = flags.String("note", "", "fit: what the texts are, for the head of the weights")
		out   = flags.String("o", "", "fit: where to write the weights")
	)
	if err := flags.Parse(args[1:]); err != nil {
		return err
	}
	files := flags.Args()
	switch {
	case args[0] == "plant" && len(files) == 4:
		return plant(ctx, files[0], files[1], files[2], files[3], *n, *own, *seed)
	case args[0] == "fit" && len(files) > 0 && len(files)%2 == 0:
		return fit(ctx, files, *aside, *rate, *note, *out, *list)
	}
	return usage
}
