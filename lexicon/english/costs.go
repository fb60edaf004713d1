package english

import (
	_ "embed"
	"sync"

	"emendary/align"
)

// english.costs is the text, to be read and compared; costs.compiled says the same,
// and is what is embedded. To fit the costs anew after align has changed, in this
// folder:
//
//	go generate -run 'emendary fit|./compile'
//
//go:generate go run emendary/cmd/emendary fit ../../testdata/wikipedia-misspellings.tsv -o english.costs --force --source "Wikipedia, Lists of common misspellings, in its form for machines, by its contributors (testdata/README.md)" --licence "CC BY-SA 3.0" --date 2026-12-01
//go:generate go run ./compile -in english.costs -out costs.compiled

//go:embed costs.compiled
var compiledCosts string

// Costs returns the default costs of edits, fitted from the open list of
// misspellings that their Origin names. It takes a fraction of a millisecond the
// first time, and nothing after.
func Costs() *align.Fitted { return costs() }

var costs = sync.OnceValue(func() *align.Fitted {
	f, err := align.OpenCosts("English", compiledCosts)
	if err != nil {
		panic(err) // the build is broken: a test opens the same bytes
	}
	return f
})
