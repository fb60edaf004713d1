package docket

import (
	"io"
	"path/filepath"

	"emendary/align"
	"emendary/lexicon/english"
)

// Names of costs that are in no file.
const (
	DefaultCosts = "english" // fitted from the open list of misspellings
	UnitCosts    = "unit"    // every edit costs one unit
)

// Costs returns the costs of that name or file, the default ones for "", nil for
// unit costs.
func Costs(name string) (*align.Fitted, error) {
	switch name {
	case "", DefaultCosts:
		return english.Costs(), nil
	case UnitCosts:
		return nil, nil
	}
	return fromFile(name, "name a file that fit wrote", func(r io.Reader, name string) (*align.Fitted, error) {
		return align.ReadCosts(r, name)
	})
}

// findCosts makes the name of a costs file hold from any folder.
func findCosts(name string) (string, error) {
	switch name {
	case "", DefaultCosts, UnitCosts:
		return name, nil
	}
	return filepath.Abs(name)
}
