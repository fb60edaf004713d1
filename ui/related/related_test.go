package related_test

import (
	"strings"
	"testing"

	tea "github.com/charmbracelet/bubbletea"
	"github.com/muesli/termenv"
	"github.com/stretchr/testify/assert"

	"emendary/ui/related"
	"emendary/ui/style"
	"emendary/ui/text"
)

func shown(width, height int) related.Model {
	m := related.New(style.Make(style.Ability{Profile: termenv.Ascii, Plain: true}))
	m.SetSize(width, height)
	m.Focus(true)
	m.Show([]related.Row{
		{Form: "harbers", Becomes: "harbours", Known: true, Count: 2, Checked: true},
		{Form: "harber-light", Becomes: "harbour-light", Count: 1},
		{Form: strings.Repeat("漢字", 40), Count: 3},
	})
	return m
}

func TestEachFormShowsWhatItBecomes(t *testing.T) {
	view := shown(60, 4).View()
	assert.Contains(t, view, "related forms · 1 of 3 checked")
	assert.Contains(t, view, "harbers              → harbours  ×2")
	assert.Contains(t, view, "harber-light         → harbour-light (in no list)  ×1")
}

func TestSpaceChecks(t *testing.T) {
	m := shown(60, 4)
	for _, k := range []string{"j", " ", "j", "j", " ", "k", "k", "k", " "} {
		m, _ = m.Update(tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune(k)})
	}
	var checked []bool
	for _, r := range m.Rows() {
		checked = append(checked, r.Checked)
	}
	assert.Equal(t, []bool{false, true, true}, checked)
}

func TestTheSizeIsKept(t *testing.T) {
	for width := 20; width < 80; width++ {
		for height := range 5 {
			lines := strings.Split(shown(width, height).View(), "\n")
			assert.LessOrEqual(t, len(lines), max(height, 1))
			for _, l := range lines {
				assert.LessOrEqual(t, text.Width(l), width)
			}
		}
	}
}

func TestNothingIsShownWhereThereIsNone(t *testing.T) {
	m := shown(60, 3)
	m.Show(nil)
	assert.Equal(t, "\n\n", m.View())
}
