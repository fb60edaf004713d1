package english

import (
	"bytes"
	_ "embed"
	"fmt"
	"sync"

	"emendary/align"
)

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
