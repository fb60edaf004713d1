package main

import (
	"context"

	"github.com/spf13/cobra"

	"emendary/internal/docket"
)

// newDocket returns the command that lists the open entries.
func newDocket(p *program) *cobra.Command {
	var (
		d      desk
		format = choice{"table", formats}
		most   int
	)
	cmd := &cobra.Command{
		Use:   "docket MANUSCRIPT",
		Short: "list the entries still to be ruled on",
		Long: `List the entries of a manuscript still to be ruled on, in the order of review,
each with its candidates, best first. Nothing is changed.

Formats: a table to read; tsv with the columns form, kind, count, candidates and
places (line:column); jsonl with one JSON object a line,

  {"form","kind","count","candidates":[{"word","cost","share"}…],
   "places":[{"part","line","column","span":[start,end]}…]}

where part, line and column count from 1, the column in letters, and span is
bytes of the file.`,
		Example: `  emendary docket manuscript.md
  emendary docket manuscript.md --format jsonl -n 1`,
		Args: oneManuscript,
		RunE: func(cmd *cobra.Command, args []string) error {
			return p.docket(cmd.Context(), &d, args[0], format.value, most)
		},
	}
	d.flags(cmd)
	listingFlags(cmd, &format, &most)
	return cmd
}

// listingFlags are the flags of the commands that list candidates.
func listingFlags(cmd *cobra.Command, format *choice, most *int) {
	cmd.Flags().Var(format, "format", "`FORMAT`: table, tsv or jsonl")
	cmd.Flags().IntVarP(most, "number", "n", 5, "at most `N` candidates each")
	_ = cmd.RegisterFlagCompletionFunc("format", cobra.FixedCompletions(formats, cobra.ShellCompDirectiveNoFileComp))
}

func (p *program) docket(ctx context.Context, d *desk, manuscript, format string, most int) error {
	if err := notNegative("-n", most); err != nil {
		return err
	}
	s, err := p.open(ctx, d, manuscript, true)
	if err != nil {
		return err
	}
	defer s.Close()
	var open []*docket.Entry
	for _, e := range s.Docket.Entries {
		if e.Open() && e.Kind != docket.WordInContext {
			open = append(open, e)
		}
	}
	if len(open) == 0 {
		p.notef("%s: nothing is open", manuscript)
	}
	m := &meter{} // none on a terminal that shows the list itself
	if !p.outIsTerminal {
		m = p.meter("looking for candidates")
	}
	defer m.clear()
	lister := newEntryLister(p.out, format, open)
	done := 0
	return inOrder(ctx, withoutError(open), func(ctx context.Context, e *docket.Entry) (listed, error) {
		l := listed{Form: e.Form, Kind: e.Kind, Candidates: []listedCandidate{}, Places: listPlaces(s.Docket, e)}
		if most == 0 {
			return l, nil
		}
		found, err := s.Docket.Candidates(ctx, e, most)
		l.Candidates = listCandidates(found)
		return l, err
	}, func(l listed) error {
		done++
		m.step(done, len(open))
		if err := lister.write(l); err != nil {
			return err
		}
		return p.flush()
	})
}
