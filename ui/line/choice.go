package line

import (
	"emendary/ui/style"
	"emendary/ui/text"
)

// Choice is a row of words of which one is chosen.
type Choice struct {
	Name    string
	Options []string
	At      int
}

// Chosen returns the chosen word; "" where there is none.
func (c Choice) Chosen() string {
	if c.At >= len(c.Options) {
		return ""
	}
	return c.Options[c.At]
}

// Step moves the choice by n, around the ends.
func (c *Choice) Step(n int) {
	if len(c.Options) > 0 {
		c.At = (c.At + n + len(c.Options)) % len(c.Options)
	}
}

// Choose chooses a word, if it is among the options.
func (c *Choice) Choose(word string) {
	for i, o := range c.Options {
		if o == word {
			c.At = i
		}
	}
}

// view draws the row; the chosen word stands in brackets, so that it can be told
// without any style. Options that do not fit scroll.
func (c Choice) view(sheet style.Sheet, width int, focused bool) string {
	lead := "  "
	if focused {
		lead = " " + sheet.Cursor.Render(sheet.Signs.Cursor)
	}
	lead = text.Pad(lead, 2) + text.Pad(sheet.Title.Render(c.Name), 12)
	for from := 0; ; from++ {
		line := lead
		if from > 0 {
			line += sheet.Quiet.Render(sheet.Signs.Less)
		}
		end := 0
		for i := from; i < len(c.Options); i++ {
			o := text.Visible(c.Options[i], sheet.Signs.ASCII)
			if i == c.At {
				line += sheet.Cursor.Render(sheet.Signs.Open + o + sheet.Signs.Close)
				end = text.Width(line)
			} else {
				line += " " + o + " "
			}
		}
		if end <= width || from >= c.At {
			return text.Cut(line, width, sheet.Signs.More)
		}
	}
}
