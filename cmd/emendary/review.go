package main

import (
	"context"
	"errors"
	"fmt"

	"github.com/spf13/cobra"

	"emendary/ui"
	"emendary/ui/ground"
)

// newReview returns the command that opens the bench.
func newReview(p *program) *cobra.Command {
	var (
		d          desk
		ascii      bool
		background = choice{"", []string{string(ground.Dark), string(ground.Light)}}
	)
	cmd := &cobra.Command{
		Use:   "review MANUSCRIPT",
		Short: "rule on the entries of a manuscript, on the bench",
		Long: `Open the bench: every form that no word list knows, with its place, its
candidates laid against it letter by letter, and its concordance. ? shows the
keys, q leaves. Every ruling is on disk before the next entry is shown, so stop
at any moment and go on with the same command.

The rulings are kept in a ledger beside the manuscript, and so are the variety
and the lists that were chosen. The manuscript itself is never changed.

NO_COLOR in the environment turns colours off.`,
		Example: `  emendary review manuscript.md
  emendary review manuscript.md --variety british-ise --ascii`,
		Args: oneManuscript,
		RunE: func(cmd *cobra.Command, args []string) error {
			return p.review(cmd.Context(), &d, args[0], ui.Options{ASCII: ascii, Background: background.value, Version: version()})
		},
	}
	d.flags(cmd)
	d.signed(cmd)
	cmd.Flags().BoolVar(&ascii, "ascii", false, "signs and marks in ASCII")
	cmd.Flags().Var(&background, "background", "`GROUND` of the terminal, dark or light, where COLORFGBG does not say")
	_ = cmd.RegisterFlagCompletionFunc("background", cobra.FixedCompletions(background.allowed, cobra.ShellCompDirectiveNoFileComp))
	return cmd
}

func (p *program) review(ctx context.Context, d *desk, manuscript string, opt ui.Options) (err error) {
	if !p.outIsTerminal || !p.inIsTerminal {
		return fmt.Errorf("review needs a terminal; without one, %s docket lists the entries and %s rule takes rulings", name, name)
	}
	s, err := p.open(ctx, d, manuscript, false)
	if err != nil {
		return err
	}
	defer func() { err = errors.Join(err, s.Close()) }()
	p.release() // the bench heeds the signals itself
	if err := ui.Run(ctx, s, opt); err != nil {
		return err
	}
	t := s.Docket.Tally()
	p.sayf("%s: %d open, %d ruled, %s", shown(manuscript), t.Open, t.Ruled, counted(t.Queries, "query", "queries"))
	return nil
}
