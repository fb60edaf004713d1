// Package text measures, cuts and cleans text for the screen. Widths are in
// terminal columns by grapheme cluster; every function takes O(n) time.
package text

import (
	"fmt"
	"strings"

	"github.com/charmbracelet/x/ansi"
)

// Width returns how many columns s takes; escape sequences of styles take none.
func Width(s string) int { return ansi.StringWidth(s) }

// Cut returns s in at most width columns, with more at the end where it was cut.
func Cut(s string, width int, more string) string {
	if width <= 0 {
		return ""
	}
	if Width(s) <= width {
		return s
	}
	if Width(more) >= width {
		return ansi.Truncate(s, width, "")
	}
	return ansi.Truncate(s, width, more)
}

// CutLeft returns the end of s in at most width columns, with more before it
// where it was cut.
func CutLeft(s string, width int, more string) string {
	w := Width(s)
	if w <= width {
		return s
	}
	if width <= 0 {
		return ""
	}
	if Width(more) >= width {
		more = ""
	}
	// Cutting within a double-width letter leaves the letter, one column too wide.
	for skip := w - width + Width(more); skip <= w; skip++ {
		if t := more + ansi.TruncateLeft(s, skip, ""); Width(t) <= width {
			return t
		}
	}
	return ""
}

// Pad returns s with spaces after it up to width columns; longer text is left as it is.
func Pad(s string, width int) string {
	if n := width - Width(s); n > 0 {
		return s + strings.Repeat(" ", n)
	}
	return s
}

// PadLeft returns s with spaces before it up to width columns.
func PadLeft(s string, width int) string {
	if n := width - Width(s); n > 0 {
		return strings.Repeat(" ", n) + s
	}
	return s
}

// Centre returns s in the middle of width columns, nearer the left where it must choose.
func Centre(s string, width int) string {
	n := width - Width(s)
	if n <= 0 {
		return s
	}
	return strings.Repeat(" ", n/2) + s + strings.Repeat(" ", n-n/2)
}

// Ends sets left and right at the two ends of a line of width columns. Where
// both do not fit, left gives way first.
func Ends(left, right string, width int, more string) string {
	if right == "" {
		return Cut(left, width, more)
	}
	right = Cut(right, width, more)
	room := width - Width(right)
	if room < 4 {
		return right
	}
	return Pad(Cut(left, room-2, more), room) + right
}

// Fit returns exactly height lines of at most width columns.
func Fit(lines []string, width, height int) []string {
	out := make([]string, max(height, 0))
	for i := range out {
		if i < len(lines) {
			out[i] = Cut(lines[i], width, "")
		}
	}
	return out
}

// Percent returns a probability in whole per cent.
func Percent(p float64) string {
	if p < 0.005 {
		return "<1 %"
	}
	return fmt.Sprintf("%.0f %%", 100*p)
}
