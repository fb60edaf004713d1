package main

import (
	"context"
	"fmt"
	"os"
	"path/filepath"
	"strings"

	"github.com/spf13/cobra"
)

// newApply returns the command that writes the emended copy.
func newApply(p *program) *cobra.Command {
	var (
		d     desk
		out   string
		force bool
	)
	cmd := &cobra.Command{
		Use:   "apply MANUSCRIPT",
		Short: "write the emended copy beside the manuscript",
		Long: `Write a copy of the manuscript with all accepts carried out: novel.emended.md
for novel.md, or what -o names. Every byte that no emendation is on stays as it
is. The manuscript is never written over, whatever -o names.`,
		Example: `  emendary apply manuscript.md
  emendary apply manuscript.md -o copy.md --force`,
		Args: takes(1, "manuscript"),
		RunE: func(cmd *cobra.Command, args []string) error {
			if out == "" {
				out = emendedName(args[0])
			}
			return p.apply(cmd.Context(), &d, args[0], out, force)
		},
	}
	d.flags(cmd)
	cmd.Flags().StringVarP(&out, "output", "o", "", "write the copy to `OUT`, not beside the manuscript")
	cmd.Flags().BoolVar(&force, "force", false, "replace a copy that is there")
	return cmd
}

// emendedName returns the path of the copy beside a manuscript.
func emendedName(manuscript string) string {
	ext := filepath.Ext(manuscript)
	if ext == filepath.Base(manuscript) { // .notes has no extension
		ext = ""
	}
	return strings.TrimSuffix(manuscript, ext) + ".emended" + ext
}

func (p *program) apply(ctx context.Context, d *desk, manuscript, out string, force bool) error {
	s, err := p.open(ctx, d, manuscript, true)
	if err != nil {
		return err
	}
	defer s.Close()
	target, err := placeForCopy(out, force, manuscript, s.Options.Ledger)
	if err != nil {
		return err
	}
	emendations := s.Docket.Emendations()
	data, err := s.Docket.Document.Emend(emendations)
	if err != nil {
		return err
	}
	if err := ctx.Err(); err != nil {
		return err
	}
	info, err := os.Stat(manuscript)
	if err != nil {
		return fileError(manuscript, err)
	}
	if err := writeCopy(target, data, info.Mode().Perm()); err != nil {
		return fmt.Errorf("%s: %w; name another place with -o OUT", out, cause(err))
	}
	p.sayf("%s: %s, %s still open", shown(out), counted(len(emendations), "emendation", "emendations"),
		counted(s.Docket.Tally().Open, "entry", "entries"))
	if n := len(s.Docket.Unplaced); n > 0 {
		p.notef("%s: %s of earlier rulings not found again; review the manuscript once more", manuscript, counted(n, "place", "places"))
	}
	return nil
}
