package main

import (
	"context"
	"strings"

	"github.com/spf13/cobra"

	"emendary/internal/docket"
)

// newDocket returns the command that lists the open entries.
func newDocket(p *program) *cobra.Command {
	var (
		d      desk
		format = choice{"table", formats}
		order  = choice{string(docket.BySlip), orders()}
		most   int
	)
	cmd := &cobra.Command{
		Use:   "docket MANUSCRIPT",
		Short: "list the entries still to be ruled on",
		Long: `List the entries of a manuscript still to be ruled on, in the order of review,
each with its candidates, best first. Nothing is changed.

Formats: a table to read; tsv with the columns form, kind, count, slip,
candidates and places (line:column); jsonl with one JSON object a line,

  {"form","kind","count","slip","candidates":[{"word","cost","share"}…],
   "places":[{"part","line","column","span":[start,end]}…]}

where slip is the probability that the form is a slip and no word of this book,
part, line and column count from 1, the column in letters, and span is bytes of
the file.

` + orderHelp + `

In the order by slip nothing is listed until all candidates are there; the other
orders list each entry as soon as it is.`,
		Example: `  emendary docket manuscript.md
  emendary docket manuscript.md --format jsonl -n 1`,
		Args: oneManuscript,
		RunE: func(cmd *cobra.Command, args []string) error {
			return p.docket(cmd.Context(), &d, args[0], format.value, docket.Order(order.value), most)
		},
	}
	d.flags(cmd)
	listingFlags(cmd, &format, &most)
	orderFlag(cmd, &order)
	return cmd
}

// orderHelp says what the orders are, for the commands that have the flag.
const orderHelp = `Orders: slip puts the likeliest slips first, then other varieties, doubtful
forms, dialect, foreign words, compounds and, last, names, near forms of one
name together; place goes by where a form first stands, alphabet as indexes
file, count from the most frequent form, dispersion from the most evenly spread.`

// orderFlag is the flag of the commands that go through entries.
func orderFlag(cmd *cobra.Command, order *choice) {
	cmd.Flags().Var(order, "order", "`ORDER` of review: "+strings.Join(order.allowed, ", "))
	_ = cmd.RegisterFlagCompletionFunc("order", cobra.FixedCompletions(order.allowed, cobra.ShellCompDirectiveNoFileComp))
}

func orders() []string {
	var names []string
	for _, o := range docket.Orders() {
		names = append(names, string(o))
	}
	return names
}

// listingFlags are the flags of the commands that list candidates.
func listingFlags(cmd *cobra.Command, format *choice, most *int) {
	cmd.Flags().Var(format, "format", "`FORMAT`: table, tsv or jsonl")
	cmd.Flags().IntVarP(most, "number", "n", 5, "at most `N` candidates each")
	_ = cmd.RegisterFlagCompletionFunc("format", cobra.FixedCompletions(formats, cobra.ShellCompDirectiveNoFileComp))
}

func (p *program) docket(ctx context.Context, d *desk, manuscript, format string, order docket.Order, most int) error {
	if err := notNegative("-n", most); err != nil {
		return err
	}
	s, err := p.open(ctx, d, manuscript, true)
	if err != nil {
		return err
	}
	defer s.Close()
	if order != docket.BySlip {
		s.Docket.Reorder(order, nil)
	}
	open := s.Docket.Due()
	if len(open) == 0 {
		p.notef("%s: nothing is open", manuscript)
	}
	m := &meter{} // none on a terminal that shows the list itself
	if !p.outIsTerminal || order == docket.BySlip {
		m = p.meter("looking for candidates")
	}
	defer m.clear()
	lister := newEntryLister(p.out, format, open)
	find := func(ctx context.Context, e *docket.Entry) (weighedEntry, error) {
		found, err := s.Docket.Candidates(ctx, e, max(most, 2)) // the probability wants two
		w := weighedEntry{entry: e, slip: s.Docket.SlipGiven(e, found), candidates: listCandidates(found[:min(most, len(found))])}
		return w, err
	}
	done := 0
	list := func(w weighedEntry) error {
		if err := lister.write(w.listed(s.Docket)); err != nil {
			return err
		}
		return p.flush()
	}
	if order != docket.BySlip {
		return inOrder(ctx, withoutError(open), find, func(w weighedEntry) error {
			done++
			m.step(done, len(open))
			return list(w)
		})
	}
	all := make(map[*docket.Entry]weighedEntry, len(open))
	slips := make(map[*docket.Entry]float64, len(open))
	err = inOrder(ctx, withoutError(open), find, func(w weighedEntry) error {
		done++
		m.step(done, len(open))
		all[w.entry], slips[w.entry] = w, w.slip
		return nil
	})
	if err != nil {
		return err
	}
	m.clear()
	s.Docket.TakeSlips(slips)
	s.Docket.Reorder(order, nil)
	for _, e := range s.Docket.Due() {
		if err := list(all[e]); err != nil {
			return err
		}
	}
	return ctx.Err()
}

// weighedEntry is an entry with its candidates and what they make of it.
type weighedEntry struct {
	entry      *docket.Entry
	slip       float64
	candidates []listedCandidate
}

func (w weighedEntry) listed(d *docket.Docket) listed {
	return listed{
		Form: w.entry.Form, Kind: w.entry.Kind, Slip: rounded(w.slip),
		Candidates: w.candidates, Places: listPlaces(d, w.entry),
	}
}
