package main

import (
	"errors"
	"fmt"
	"slices"
	"strings"

	"github.com/spf13/cobra"
	"github.com/spf13/pflag"

	"emendary/align"
)

// Help lists the commands in the order of the work.
func init() { cobra.EnableCommandSorting = false }

// newRoot returns the whole command line. It is made anew for each run: commands
// hold the values of their flags.
func newRoot(p *program) *cobra.Command {
	root := &cobra.Command{
		Use:   name,
		Short: "rule on every word that a word list does not know",
		Long: `Emendary finds the forms in a manuscript that no word list knows, lays each
against the words it may stand for, letter by letter, and keeps every ruling so
that no question is asked twice. The manuscript itself is never changed.

Begin here:

  emendary review novel.md               rule on its forms; stop at will
  emendary apply novel.md                write novel.emended.md beside it
  emendary report style-sheet novel.md   its word list, for the next book too`,
		Example: "  emendary\n  emendary --version\n  emendary --help",
		Version: version(),
		Args:    known,
		RunE: func(cmd *cobra.Command, _ []string) error {
			p.sayf("%s\n\nAll commands: %s --help. One of them: %s COMMAND --help.", cmd.Long, name, name)
			return nil
		},
		DisableFlagsInUseLine: true,

		SilenceErrors: true, // status prints them
		SilenceUsage:  true,
	}
	root.SetOut(p.out)
	root.SetErr(p.notes)
	root.SetHelpTemplate(helpTemplate)
	root.SetUsageTemplate(usageTemplate)
	root.SetVersionTemplate("{{.Version}}\n")
	root.SetFlagErrorFunc(flagError)
	root.CompletionOptions.DisableDefaultCmd = true
	root.AddCommand(newReview(p), newDocket(p), newCandidates(p), newAlign(p), newRule(p),
		newApply(p), newReport(p), newAssay(p), newFit(p), newVersion(p), newCompletion(p))
	root.SetHelpCommand(newHelp())
	for _, c := range root.Commands() {
		c.DisableFlagsInUseLine = true
	}
	return root
}

const helpTemplate = `{{with (or .Long .Short)}}{{. | trimTrailingWhitespaces}}

{{end}}{{.UsageString}}`

const usageTemplate = `usage:
{{if .Runnable}}  {{.UseLine}}
{{end}}{{if .HasAvailableSubCommands}}  {{.CommandPath}} COMMAND

commands:
{{range .Commands}}{{if .IsAvailableCommand}}  {{rpad .Name .NamePadding}}  {{.Short}}
{{end}}{{end}}{{end}}{{if .HasExample}}
examples:
{{.Example}}
{{end}}{{if .HasAvailableLocalFlags}}
flags:
{{.LocalFlags.FlagUsages | trimTrailingWhitespaces}}
{{end}}`

// newHelp returns the command that shows how another is used.
func newHelp() *cobra.Command {
	return &cobra.Command{
		Use:     "help [COMMAND]",
		Short:   "show how a command is used",
		Example: "  emendary help docket",
		RunE: func(cmd *cobra.Command, args []string) error {
			found, rest, err := cmd.Root().Find(args)
			if err == nil && len(rest) > 0 {
				err = known(found, rest)
			}
			if err != nil {
				return err
			}
			found.InitDefaultHelpFlag()
			return found.Help()
		},
	}
}

// known refuses arguments of the root, which are commands that there aren't.
func known(cmd *cobra.Command, args []string) error {
	if len(args) == 0 {
		return nil
	}
	var names []string
	for _, c := range cmd.Root().Commands() {
		if c.IsAvailableCommand() {
			names = append(names, c.Name())
		}
	}
	if near := nearest(args[0], names); near != "" {
		return fmt.Errorf("unknown command %q; did you mean %s?", args[0], near)
	}
	return fmt.Errorf("unknown command %q; %s --help lists them all", args[0], name)
}

// flagError words what is wrong with a flag.
func flagError(cmd *cobra.Command, err error) error {
	help := cmd.CommandPath() + " --help lists them all"
	var missing *pflag.NotExistError
	if errors.As(err, &missing) {
		flag := missing.GetSpecifiedName()
		if missing.GetSpecifiedShortnames() != "" {
			return fmt.Errorf("unknown flag -%s; %s", flag, help)
		}
		var names []string
		cmd.Flags().VisitAll(func(f *pflag.Flag) { names = append(names, f.Name) })
		if near := nearest(flag, names); near != "" {
			return fmt.Errorf("unknown flag --%s; did you mean --%s?", flag, near)
		}
		return fmt.Errorf("unknown flag --%s; %s", flag, help)
	}
	var bare *pflag.ValueRequiredError
	if errors.As(err, &bare) {
		return fmt.Errorf("flag %s has no value; give it one", dashed(bare.GetFlag(), bare.GetSpecifiedName()))
	}
	var bad *pflag.InvalidValueError
	if errors.As(err, &bad) {
		return fmt.Errorf("flag %s: %q %s", dashed(bad.GetFlag(), bad.GetFlag().Name), bad.GetValue(), wrong(bad))
	}
	return err
}

// dashed returns a flag as it was given.
func dashed(flag *pflag.Flag, given string) string {
	if flag != nil && given == flag.Shorthand {
		return "-" + given
	}
	return "--" + given
}

// wrong says what is wrong with the value of a flag.
func wrong(bad *pflag.InvalidValueError) string {
	switch bad.GetFlag().Value.Type() {
	case "bool":
		return "is neither true nor false"
	case "int":
		return "is not a whole number"
	}
	return bad.Unwrap().Error()
}

// nearest returns the one of names that a slip may have made into given, or "".
func nearest(given string, names []string) string {
	var alphabet align.Alphabet
	letters := alphabet.Fold(alphabet.Letters(given))
	const farthest = 2
	best, least := "", farthest+1
	for _, n := range names {
		d := align.Restricted(letters, alphabet.Letters(n))
		if len(given) > 2 && strings.HasPrefix(n, given) {
			d = min(d, 1)
		}
		if d < least && d < len(n) {
			best, least = n, d
		}
	}
	return best
}

// takes returns a check that there are n arguments; what names the first.
func takes(n int, what string) cobra.PositionalArgs {
	return func(cmd *cobra.Command, args []string) error {
		switch {
		case len(args) == 0 && n > 0:
			return fmt.Errorf("%s: no %s given; type %s", cmd.Name(), what, cmd.UseLine())
		case len(args) < n:
			return fmt.Errorf("%s: something is missing after %s; type %s", cmd.Name(), args[len(args)-1], cmd.UseLine())
		case len(args) > n:
			return fmt.Errorf("%s: %q is too much; type %s", cmd.Name(), args[n], cmd.UseLine())
		}
		return nil
	}
}

// oneManuscript checks the arguments of commands that will take several.
func oneManuscript(cmd *cobra.Command, args []string) error {
	if len(args) > 1 {
		return fmt.Errorf("%s: %d manuscripts given; name one, a book of several files cannot be read yet", cmd.Name(), len(args))
	}
	return takes(1, "manuscript")(cmd, args)
}

// oneOf returns a check that there is one argument, out of a few; what says of
// what kind they are.
func oneOf(what string, names []string) cobra.PositionalArgs {
	return func(cmd *cobra.Command, args []string) error {
		if err := takes(1, what)(cmd, args); err != nil || slices.Contains(names, args[0]) {
			return err
		}
		if near := nearest(args[0], names); near != "" {
			return fmt.Errorf("%s: unknown %s %q; did you mean %s?", cmd.Name(), what, args[0], near)
		}
		return fmt.Errorf("%s: unknown %s %q; there are %s", cmd.Name(), what, args[0], strings.Join(names, ", "))
	}
}

// choice is a flag that takes one of a few values.
type choice struct {
	value   string
	allowed []string
}

func (c *choice) String() string { return c.value }
func (c *choice) Type() string   { return "string" }
func (c *choice) Set(s string) error {
	if !slices.Contains(c.allowed, s) {
		return fmt.Errorf("is not one of %s", strings.Join(c.allowed, ", "))
	}
	c.value = s
	return nil
}
