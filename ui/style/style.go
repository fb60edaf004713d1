// Package style holds how the bench looks: one Sheet of text styles and one set
// of Signs, made once from what the terminal can do and passed down to every
// part of the screen. Nothing here asks the terminal.
//
// The palette is small and each colour means one thing: amber is where a word
// departs from the form, green is settled or checked, red is trouble, and quiet
// grey is what the eye may skip. Each of them is doubled by a sign or a place,
// so that nothing is told by colour alone.
package style

import (
	"io"

	"github.com/charmbracelet/lipgloss"
	"github.com/muesli/termenv"

	"emendary/ui/ground"
)

// Sheet is the styles of the bench and the signs that go with them.
type Sheet struct {
	Title   lipgloss.Style // the manuscript's title, headings
	Text    lipgloss.Style // running text
	Quiet   lipgloss.Style // dots, rules, what may be skipped
	Form    lipgloss.Style // the form where it stands in the passage
	Head    lipgloss.Style // column heads: the form's letters
	Differs lipgloss.Style // where a candidate departs from the form
	Struck  lipgloss.Style // a letter that a mark takes away
	Cursor  lipgloss.Style // the row under the cursor
	Settled lipgloss.Style // check marks, rulings made
	Alarm   lipgloss.Style // errors
	Key     lipgloss.Style // keys in the footer and the help
	Signs   Signs
	Bracket bool // set the form in brackets: there is no style to mark it by
}

// Make returns the styles for a terminal of ability a. It writes nothing.
func Make(a Ability) Sheet {
	r := lipgloss.NewRenderer(io.Discard)
	r.SetHasDarkBackground(a.Background != ground.Light)
	r.SetColorProfile(a.Profile)
	if a.Profile == termenv.Ascii && !a.Plain {
		r.SetColorProfile(termenv.ANSI) // attributes without colours
	}
	plain := r.NewStyle().Inline(true)
	s := Sheet{
		Title: plain.Bold(true), Text: plain, Quiet: plain, Form: plain.Reverse(true),
		Head: plain.Bold(true), Differs: plain.Bold(true), Struck: plain.Underline(true),
		Cursor: plain.Bold(true), Settled: plain, Alarm: plain.Bold(true), Key: plain.Bold(true),
		Signs: Unicode(), Bracket: a.Profile == termenv.Ascii,
	}
	if a.ASCII {
		s.Signs = ASCII()
	}
	if a.Profile == termenv.Ascii {
		return s
	}
	p := paletteOf(a)
	s.Quiet = p.quiet(s.Quiet)
	s.Form = plain.Bold(true).Reverse(true).Foreground(p.amber)
	s.Differs = s.Differs.Foreground(p.amber)
	s.Struck = s.Struck.Foreground(p.amber)
	s.Settled = s.Settled.Foreground(p.green)
	s.Alarm = s.Alarm.Foreground(p.red)
	s.Key = plain.Bold(true)
	return s
}

type palette struct {
	amber, green, red lipgloss.TerminalColor
	quiet             func(lipgloss.Style) lipgloss.Style
}

// paletteOf picks colours with at least 4.5:1 contrast on a black or a white
// ground. Where the ground is unknown, or there are sixteen colours only, it
// takes those that the terminal's own theme has made readable.
func paletteOf(a Ability) palette {
	fg := func(c string) func(lipgloss.Style) lipgloss.Style {
		return func(s lipgloss.Style) lipgloss.Style { return s.Foreground(lipgloss.Color(c)) }
	}
	if a.Profile == termenv.ANSI || a.Background == ground.Unknown {
		return palette{lipgloss.Color("3"), lipgloss.Color("2"), lipgloss.Color("1"),
			func(s lipgloss.Style) lipgloss.Style { return s.Faint(true) }}
	}
	if a.Background == ground.Light {
		return palette{lipgloss.Color("#8a4b00"), lipgloss.Color("#1b6b3a"), lipgloss.Color("#b3261e"), fg("#6a6f76")}
	}
	return palette{lipgloss.Color("#e8ac4f"), lipgloss.Color("#7fc08f"), lipgloss.Color("#f08a80"), fg("#8b929b")}
}
