package ui

import "emendary/ui/text"

// actionStrip draws the strip of actions on two lines, the chosen one in brackets.
func (m Model) actionStrip(width int) []string {
	lines := []string{""}
	for i, b := range m.Keys.actions() {
		label := " " + b.Help().Desc + " "
		if i == m.action {
			label = m.sheet.Cursor.Render(m.sheet.Signs.Open + b.Help().Desc + m.sheet.Signs.Close)
		}
		if n := len(lines) - 1; text.Width(lines[n])+text.Width(label) > width-2 {
			lines = append(lines, "")
		}
		lines[len(lines)-1] += label
	}
	for i := range lines {
		lines[i] = " " + lines[i]
	}
	return lines
}
