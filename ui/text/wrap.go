package text

import (
	"strings"

	"github.com/rivo/uniseg"
)

// Line is a line of wrapped text as a range of its bytes.
type Line struct{ Start, End int }

// Wrap breaks s at spaces into lines of at most width columns. Spaces at a break
// belong to no line; a word wider than a line is broken between letters. Bytes
// [keep[0],keep[1]) are broken only where they do not fit on a line of their own.
// It takes O(n) time and has at least one line.
func Wrap(s string, width int, keep [2]int) []Line {
	width = max(width, 1)
	var lines []Line
	start, w := 0, 0   // of the line
	gap, gapW := -1, 0 // the last space a line may break at, and the width up to after it
	state := -1
	for at, rest := 0, s; rest != ""; {
		letter, tail, _, newState := uniseg.FirstGraphemeClusterInString(rest, state)
		lw := Width(letter)
		space := strings.TrimSpace(letter) == "" && letter != "\u00a0"
		if space && (at < keep[0] || at >= keep[1]) {
			gap, gapW = at, w+lw
		}
		if w+lw > width && !space && at > start {
			if gap >= start {
				lines = append(lines, Line{start, gap})
				start, w = gap+spaceLen(s[gap:]), w-gapW
			} else {
				lines = append(lines, Line{start, at})
				start, w = at, 0
			}
			gap = -1
			if w+lw > width && at > start {
				lines = append(lines, Line{start, at})
				start, w = at, 0
			}
		}
		w += lw
		at += len(letter)
		rest, state = tail, newState
	}
	return append(lines, Line{start, len(s)})
}

func spaceLen(s string) int {
	letter, _, _, _ := uniseg.FirstGraphemeClusterInString(s, -1)
	return len(letter)
}
