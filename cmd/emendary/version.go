package main

import (
	"runtime"
	"runtime/debug"

	"github.com/spf13/cobra"

	"emendary/lexicon/english"
)

// newVersion returns the command that says what this program is.
func newVersion(p *program) *cobra.Command {
	return &cobra.Command{
		Use:     "version",
		Short:   "show the version and what the base lexicon is made from",
		Example: "  emendary version",
		Args:    takes(0, ""),
		Run: func(*cobra.Command, []string) {
			p.sayf("%s %s", name, version())
			p.sayf("%s %s/%s", runtime.Version(), runtime.GOOS, runtime.GOARCH)
			p.sayf("base lexicon: %d words from %s %s of %s", english.Words, english.Source, english.Version, english.Date)
		},
	}
}

// version returns the version that the program was built from.
func version() string {
	if info, ok := debug.ReadBuildInfo(); ok && info.Main.Version != "" && info.Main.Version != "(devel)" {
		return info.Main.Version
	}
	return "development version"
}
