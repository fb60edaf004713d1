package main

import (
	"context"
	"errors"
	"fmt"
	"slices"

	"github.com/spf13/cobra"

	"emendary/internal/docket"
	"emendary/internal/ledger"
)

// newRule returns the command that takes rulings made elsewhere.
func newRule(p *program) *cobra.Command {
	var d desk
	cmd := &cobra.Command{
		Use:   "rule MANUSCRIPT",
		Short: "take rulings that were made elsewhere",
		Long: `Take rulings from standard input into the ledger of a manuscript: tab-separated
lines under a header with the columns form, ruling and word, and where needed
list, scope, place, kind, note, query, to, who and time. A ruling is accept,
reject, add, query, later or, of a passage, unfold. "report rulings" writes the
same lines.

A line is in dispute where a ruling in force, or an earlier line, says otherwise
of its form: it is named on standard error and not taken, and the exit status is
1. Where a line cannot be read, none is taken, and the exit status is 2.`,
		Example: `  printf 'form\truling\tword\nharber\taccept\tharbour\n' | emendary rule manuscript.md
  emendary report rulings manuscript.md | emendary rule manuscript.md`,
		Args: takes(1, "manuscript"),
		RunE: func(cmd *cobra.Command, args []string) error {
			return p.rule(cmd.Context(), &d, args[0])
		},
	}
	d.flags(cmd)
	d.signed(cmd)
	return cmd
}

func (p *program) rule(ctx context.Context, d *desk, manuscript string) (err error) {
	if p.inIsTerminal {
		p.notef("reading rulings from the terminal; a header line first, ctrl-d at the end")
	}
	lines, err := docket.ReadLines(p.in, "standard input")
	if err != nil {
		return err
	}
	s, err := p.open(ctx, d, manuscript, false)
	if err != nil {
		return err
	}
	defer func() { err = errors.Join(err, s.Close()) }()
	for _, l := range lines {
		if l.List != "" && !slices.Contains(s.Lists(), l.List) {
			return fmt.Errorf("standard input: line %d: there is no %s list here; name one with --%s LIST", l.Number, l.List, l.List)
		}
	}
	rulings, disputes := s.Docket.RulingsFrom(lines)
	if err := s.Write(ctx, rulings...); err != nil {
		return err
	}
	s.Docket.Record(rulings...)
	for _, x := range disputes {
		p.notef("standard input: line %d: %s: %s", x.Line.Number, x.Line.Form, x.Reason)
	}
	p.sayf("%s: %s taken, %d already in force, %d in dispute; %s still open", shown(manuscript),
		counted(len(rulings), "ruling", "rulings"), inForce(s.Docket, lines, rulings, disputes), len(disputes),
		counted(s.Docket.Tally().Open, "entry", "entries"))
	if len(disputes) > 0 {
		return errDisputes
	}
	return nil
}

// inForce returns how many lines gave nothing because what they say is in force.
func inForce(d *docket.Docket, lines []docket.Line, rulings []ledger.Ruling, disputes []docket.Dispute) int {
	gave := map[string]bool{}
	for _, r := range rulings {
		gave[r.Form] = true
	}
	disputed := map[int]bool{}
	for _, x := range disputes {
		disputed[x.Line.Number] = true
	}
	n := 0
	for _, l := range lines {
		if e := d.Find(l.Form); e != nil && !gave[e.Form] && !disputed[l.Number] {
			n++
		}
	}
	return n
}
