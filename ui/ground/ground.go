// Package ground settles whether the terminal's background is dark before
// anything asks the terminal itself.
//
// Bubble Tea v1 asks for the background colour in a package initialiser and
// waits up to five seconds for an answer; on a terminal that stays silent even
// "version" would wait, and a late answer arrives as keys. The question is not
// asked once the background is set. Packages are initialised in the order of
// their import paths as soon as their own imports are, so this package imports
// Lip Gloss alone and its path sorts before Bubble Tea's. A test in package ui
// runs the program on a silent terminal and fails should that ever change.
package ground

import (
	"os"
	"strconv"
	"strings"

	"github.com/charmbracelet/lipgloss"
)

func init() { lipgloss.SetHasDarkBackground(Of(os.Getenv("COLORFGBG")) != Light) }

// Background is the ground that text is drawn on.
type Background string

const (
	Unknown Background = "" // colours that read on either
	Dark    Background = "dark"
	Light   Background = "light"
)

// Of reads the background from a COLORFGBG value such as "15;0", where the last
// field is the number of the background colour: 7 and 9 to 15 are light. It is
// Unknown where the value does not say.
func Of(colorfgbg string) Background {
	last := colorfgbg[strings.LastIndexByte(colorfgbg, ';')+1:]
	n, err := strconv.Atoi(last)
	switch {
	case err != nil || n < 0 || n > 15:
		return Unknown
	case n == 7 || n >= 9:
		return Light
	}
	return Dark
}
