package english

import (
	"bytes"
	_ "embed"
	"fmt"
	"sync"

	"emendary/align"
)

// To fit the costs anew after align has changed, in this folder: go generate -run fit.
//
//go:generate go run emendary/cmd/emendary fit ../../testdata/wikipedia-misspellings.tsv -o english.costs --force --source "Wikipedia, Lists of common misspellings, in its form for machines, by its contributors (testdata/README.md)" --licence "CC BY-SA 3.0" --date 2026-12-01

//go:embed english.costs
var costsText []byte

// Costs returns the default costs of edits, fitted from the open list of
// misspellings that the file names.
var Costs = sync.OnceValue(func() *align.Fitted {
	f, err := align.ReadCosts(bytes.NewReader(costsText), "english.costs")
	if err != nil {
		panic(fmt.Sprintf("english: the embedded costs are damaged: %v", err)) // the build is broken: a test reads them
	}
	return f
})
