package main

import (
	"context"
	"strings"

	"github.com/spf13/cobra"

	"emendary/internal/report"
)

// newReport returns the command that writes reports.
func newReport(p *program) *cobra.Command {
	var (
		d      desk
		format = choice{"", report.Formats()}
	)
	cmd := &cobra.Command{
		Use:   "report NAME MANUSCRIPT",
		Short: "write the style sheet, the emendations, the queries, …",
		Long: `Write a report on a manuscript and its rulings. NAME is one of:

  ` + strings.Join(report.Names(), "\n  ") + `

Reports are in Markdown, the rulings in the tab-separated lines that "rule"
reads; --format asks for another form. The style sheet as tsv is a word list:
give it to the next book with --series.`,
		Example: `  emendary report style-sheet manuscript.md
  emendary report rulings manuscript.md > rulings.tsv
  emendary report figures manuscript.md`,
		ValidArgsFunction: func(_ *cobra.Command, args []string, _ string) ([]string, cobra.ShellCompDirective) {
			if len(args) == 0 {
				return report.Names(), cobra.ShellCompDirectiveNoFileComp
			}
			return nil, cobra.ShellCompDirectiveDefault
		},
		Args: func(cmd *cobra.Command, args []string) error {
			if err := takes(2, "report")(cmd, args); err != nil {
				return err
			}
			return oneOf("report", report.Names())(cmd, args[:1])
		},
		RunE: func(cmd *cobra.Command, args []string) error {
			return p.report(cmd.Context(), &d, args[0], args[1], format.value)
		},
	}
	d.flags(cmd)
	cmd.Flags().Var(&format, "format", "`FORMAT`: "+strings.Join(format.allowed, ", ")+"; that of the report where none is named")
	_ = cmd.RegisterFlagCompletionFunc("format", cobra.FixedCompletions(format.allowed, cobra.ShellCompDirectiveNoFileComp))
	return cmd
}

func (p *program) report(ctx context.Context, d *desk, which, manuscript, format string) error {
	s, err := p.open(ctx, d, manuscript, true)
	if err != nil {
		return err
	}
	defer s.Close()
	return report.Write(p.out, s, which, format)
}
