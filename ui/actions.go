package ui

import "emendary/ui/text"

// failureView says in full why a ruling could not be written.
func (m Model) failureView(width int) []string {
	why := m.visible(m.failure)
	var lines []string
	for _, l := range text.Wrap(why, width-4, [2]int{}) {
		lines = append(lines, "   "+m.sheet.Alarm.Render(why[l.Start:l.End]))
	}
	return lines
}

// actionStrip draws the strip of actions on two lines, the chosen one in brackets.
func (m Model) actionStrip(width int) []string {
	lines := []string{""}
	for i, b := range m.actions() {
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
