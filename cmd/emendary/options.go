package main

import (
	"context"
	"fmt"
	"os/user"
	"strings"

	"github.com/spf13/cobra"

	"emendary/internal/docket"
	"emendary/lexicon"
)

// words are the flags that say which words are known.
type words struct {
	lexicon, house, series string
	variety                choice
	with                   languages
	costs                  string
}

// languages is the flag that names word lists of other languages.
type languages []docket.Language

func (l *languages) String() string { return "" }
func (l *languages) Type() string   { return "string" }
func (l *languages) Set(s string) error {
	language, err := docket.ParseLanguage(s)
	if err == nil {
		*l = append(*l, language)
	}
	return err
}

func (w *words) flags(cmd *cobra.Command) {
	w.variety.allowed = []string{lexicon.AnyVariety.Flag()}
	for _, v := range lexicon.Varieties() {
		w.variety.allowed = append(w.variety.allowed, v.Flag())
	}
	f := cmd.Flags()
	f.StringVar(&w.lexicon, "lexicon", "", "take the words of `FILE`, one a line, in place of the English base lexicon")
	f.Var(&w.variety, "variety", "`VARIETY` of English: "+strings.Join(w.variety.allowed, ", "))
	f.StringVar(&w.house, "house", "", "the house's `LIST` of words, by name or file")
	f.StringVar(&w.series, "series", "", "the series' `LIST` of words, by name or file")
	f.Var(&w.with, "with", "know the words of another language too, `LANG=FILE`, one a line; may be repeated")
	f.StringVar(&w.costs, "costs", "", "price edits as in `COSTS`: english, unit, or a file that fit wrote")
	_ = cmd.RegisterFlagCompletionFunc("variety", cobra.FixedCompletions(w.variety.allowed, cobra.ShellCompDirectiveNoFileComp))
}

// load returns the lexicon that the flags ask for, where there is no manuscript
// that could attest its variety: any, unless one is chosen.
func (w *words) load() (*lexicon.Lexicon, error) {
	lex, _, _, err := docket.Words(w.lexicon, w.house, w.series, w.with)
	if err != nil || w.variety.value == "" {
		return lex, err
	}
	chosen, err := lexicon.ParseVariety(w.variety.value)
	if err != nil {
		return nil, err
	}
	return lex.WithVariety(chosen), nil
}

// desk is the flags of the commands that open a manuscript.
type desk struct {
	words
	ledger, encoding, as string
	noAdapt              bool
}

func (d *desk) flags(cmd *cobra.Command) {
	f := cmd.Flags()
	f.StringVar(&d.ledger, "ledger", "", "keep the rulings in `FILE`, not beside the manuscript")
	f.StringVar(&d.encoding, "encoding", "", "`ENCODING` of a manuscript in neither UTF-8 nor UTF-16, such as windows-1252")
	f.BoolVar(&d.noAdapt, "no-adapt", false, "price edits as for all writers, whatever was accepted before")
	d.words.flags(cmd)
}

// signed adds the flag of the commands that make rulings.
func (d *desk) signed(cmd *cobra.Command) {
	cmd.Flags().StringVar(&d.as, "as", "", "make rulings as `NAME` rather than under your name on this system")
}

// open opens a manuscript on the desk; toRead leaves its ledger to others.
func (p *program) open(ctx context.Context, d *desk, manuscript string, toRead bool) (*docket.Session, error) {
	m := p.meter("reading")
	defer m.clear()
	return docket.Start(ctx, d.options(manuscript, toRead, m.step))
}

// options returns what the flags ask of a session.
func (d *desk) options(manuscript string, toRead bool, progress func(done, total int)) docket.Options {
	return docket.Options{
		Manuscript: manuscript, Ledger: d.ledger, Encoding: d.encoding, Who: d.who(), ToRead: toRead, Progress: progress,
		Lexicon: d.lexicon, Variety: d.variety.value, House: d.house, Series: d.series, With: d.with, Costs: d.costs, NoAdapt: d.noAdapt,
	}
}

// who is the name that rulings are made under.
func (d *desk) who() string {
	if d.as != "" {
		return d.as
	}
	if u, err := user.Current(); err == nil && u.Username != "" {
		return u.Username
	}
	return "unknown"
}

// fileError returns an error of the system under the path as it was given.
func fileError(path string, err error) error {
	return fmt.Errorf("%s: %w", path, cause(err))
}
