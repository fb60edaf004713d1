package main

import (
	"context"
	"errors"
	"fmt"
	"path/filepath"
	"time"

	"github.com/spf13/cobra"

	"emendary/internal/docket"
	"emendary/ui"
	"emendary/ui/ground"
)

// newReview returns the command that opens the bench.
func newReview(p *program) *cobra.Command {
	var (
		d          desk
		ascii      bool
		background = choice{"", []string{string(ground.Dark), string(ground.Light)}}
		order      = choice{string(docket.BySlip), orders()}
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

` + orderHelp + `
t turns to the next order. The first order by slip goes by the manuscript alone;
once all candidates are there, what has not been shown yet is put right by them.

NO_COLOR in the environment turns colours off.`,
		Example: `  emendary review manuscript.md
  emendary review manuscript.md --variety british-ise --ascii`,
		Args: oneManuscript,
		RunE: func(cmd *cobra.Command, args []string) error {
			return p.review(cmd.Context(), &d, args[0], docket.Order(order.value), ui.Options{ASCII: ascii, Background: background.value, Version: version()})
		},
	}
	d.flags(cmd)
	d.signed(cmd)
	orderFlag(cmd, &order)
	cmd.Flags().BoolVar(&ascii, "ascii", false, "signs and marks in ASCII")
	cmd.Flags().Var(&background, "background", "`GROUND` of the terminal, dark or light, where COLORFGBG does not say")
	_ = cmd.RegisterFlagCompletionFunc("background", cobra.FixedCompletions(background.allowed, cobra.ShellCompDirectiveNoFileComp))
	return cmd
}

// atOnce is how long a docket may take to lay out before the bench is shown
// without it. What is wrong with a manuscript mostly shows sooner, and is then
// said without a screen.
const atOnce = 100 * time.Millisecond

func (p *program) review(ctx context.Context, d *desk, manuscript string, order docket.Order, opt ui.Options) error {
	if !p.outIsTerminal || !p.inIsTerminal {
		return fmt.Errorf("review needs a terminal; without one, %s docket lists the entries and %s rule takes rulings", name, name)
	}
	ctx, cancel := context.WithCancel(ctx)
	defer cancel()
	var (
		s      *docket.Session
		failed error
		laid   = make(chan struct{})
	)
	go func() {
		defer close(laid)
		if s, failed = docket.Start(ctx, d.options(manuscript, false, nil)); failed == nil {
			s.Docket.Reorder(order, nil)
		}
	}()
	await := func() (*docket.Session, error) {
		<-laid
		return s, failed
	}
	select {
	case <-laid:
		if failed != nil {
			return failed
		}
	case <-time.After(atOnce):
	}
	p.release() // the bench heeds the signals itself
	err := ui.Run(ctx, filepath.Base(manuscript), await, opt)
	cancel()
	if _, none := await(); none != nil {
		return err // left before there was a docket; err is why there is none
	}
	t := s.Docket.Tally()
	if err := errors.Join(err, s.Close()); err != nil {
		return err
	}
	p.sayf("%s: %d open, %d ruled, %s", shown(manuscript), t.Open, t.Ruled, counted(t.Queries, "query", "queries"))
	return nil
}
