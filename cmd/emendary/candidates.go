package main

import (
	"bufio"
	"cmp"
	"context"
	"errors"
	"fmt"
	"io"
	"iter"
	"strings"
	"unicode/utf8"

	"github.com/spf13/cobra"

	"emendary/internal/docket"
	"emendary/lexicon"
)

// newCandidates returns the command that lists candidates of single words.
func newCandidates(p *program) *cobra.Command {
	var (
		w      words
		format = choice{"table", formats}
		most   int
		within int
	)
	cmd := &cobra.Command{
		Use:   "candidates [WORD…]",
		Short: "list the words that a form may stand for",
		Long: `List the words that each form may stand for, best first. Forms are given as
arguments, or one a line on standard input. Cost is that of the edits, in bits:
−log₂ of the probability that somebody who means the word writes the form. How
common the word is counts too, and both together give each word its share of the
belief.

With --within K, list every word within K edits instead, nearest first: cost is
then the number of edits, and there is no share. An edit inserts, deletes or
substitutes a letter, or transposes two neighbours.`,
		Example: `  emendary candidates harber
  echo lantrn | emendary candidates --format jsonl
  emendary candidates quay --within 1 --format tsv`,
		RunE: func(cmd *cobra.Command, args []string) error {
			if err := cmp.Or(notNegative("-n", most), notNegative("--within", within)); err != nil {
				return err
			}
			lex, err := w.load()
			if err != nil {
				return err
			}
			if !cmd.Flags().Changed("within") {
				find, err := ranked(lex, w.costs, most)
				if err != nil {
					return err
				}
				return p.candidates(cmd.Context(), lex, args, format.value, find)
			}
			limit := -1
			if cmd.Flags().Changed("number") {
				limit = most
			}
			return p.candidates(cmd.Context(), lex, args, format.value, nearby(lex, within, limit))
		},
	}
	w.flags(cmd)
	listingFlags(cmd, &format, &most)
	cmd.Flags().IntVar(&within, "within", 0, "every word within `K` edits")
	return cmd
}

// finder finds what is listed under a form.
type finder func(ctx context.Context, form string) ([]listedCandidate, error)

// ranked finds the most likely candidates.
func ranked(lex *lexicon.Lexicon, costs string, most int) (finder, error) {
	priced, err := docket.Costs(costs)
	if err != nil {
		return nil, err
	}
	search := docket.NewSearch(lex, priced)
	return func(ctx context.Context, form string) ([]listedCandidate, error) {
		found, err := search.Candidates(ctx, form, most)
		return listCandidates(found), err
	}, nil
}

// nearby finds all words within k edits; at most limit if that isn't below 0.
func nearby(lex *lexicon.Lexicon, k, limit int) finder {
	return func(_ context.Context, form string) ([]listedCandidate, error) {
		near := lex.Within(form, k)
		if limit >= 0 {
			near = near[:min(limit, len(near))]
		}
		out := make([]listedCandidate, len(near))
		for i, n := range near {
			out[i] = listedCandidate{Word: n.Word.Text, Cost: float64(n.Distance)}
		}
		return out, nil
	}
}

func (p *program) candidates(ctx context.Context, lex *lexicon.Lexicon, args []string, format string, find finder) error {
	forms := withoutError(args)
	if len(args) == 0 {
		if p.inIsTerminal {
			p.notef("reading forms from the terminal, one a line; ctrl-d at the end")
		}
		forms = lines(p.in, "standard input")
	}
	lister := &wordLister{w: p.out, format: format}
	return inOrder(ctx, forms, func(ctx context.Context, form string) (listed, error) {
		if len(form) > longestForm || !utf8.ValidString(form) {
			return listed{}, fmt.Errorf("candidates: %.40q is no word; give words in UTF-8, of %d bytes at most", form, longestForm)
		}
		found, err := find(ctx, form)
		return listed{Form: form, Status: lex.Find(form).Status.String(), Candidates: found}, err
	}, func(l listed) error {
		if err := lister.write(l); err != nil {
			return err
		}
		return p.flush()
	})
}

// longestForm bounds a form, in bytes: the work grows with its square.
const longestForm = 1 << 10

// lines yields the lines of r that are not blank, without white space around
// them. Errors name the line.
func lines(r io.Reader, name string) iter.Seq2[string, error] {
	return func(yield func(string, error) bool) {
		scanner := bufio.NewScanner(r)
		scanner.Buffer(nil, longestForm)
		n := 0
		for scanner.Scan() {
			n++
			line := strings.TrimSpace(scanner.Text())
			if !utf8.ValidString(line) {
				yield("", fmt.Errorf("%s: line %d: not valid UTF-8; convert it first", name, n))
				return
			}
			if line != "" && !yield(line, nil) {
				return
			}
		}
		switch err := scanner.Err(); {
		case errors.Is(err, bufio.ErrTooLong):
			yield("", fmt.Errorf("%s: line %d: longer than %d bytes; give one word a line", name, n+1, longestForm))
		case err != nil:
			yield("", fmt.Errorf("%s: %w", name, err))
		}
	}
}

// notNegative refuses a number below 0 as the value of a flag.
func notNegative(flag string, n int) error {
	if n < 0 {
		return fmt.Errorf("flag %s: %d is below 0", flag, n)
	}
	return nil
}
