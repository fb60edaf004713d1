package concordance_test

import (
	"fmt"
	"strings"
	"testing"

	tea "github.com/charmbracelet/bubbletea"
	"github.com/muesli/termenv"
	"github.com/stretchr/testify/assert"

	"emendary/ui/concordance"
	"emendary/ui/style"
	"emendary/ui/text"
)

func shown(settings []string, width, height int, row func(int) concordance.Row) (concordance.Model, []bool, []bool) {
	checked, seen := make([]bool, len(settings)), make([]bool, len(settings))
	for i := range checked {
		checked[i] = true
	}
	m := concordance.New(style.Make(style.Ability{Profile: termenv.Ascii, Plain: true}))
	m.SetSize(width, height)
	m.Show(settings, row, checked, seen, 0)
	m.Focus(true)
	return m, checked, seen
}

func press(m concordance.Model, keys string) concordance.Model {
	for _, r := range keys {
		m, _ = m.Update(tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune{r}})
	}
	return m
}

func rows(i int) concordance.Row {
	return concordance.Row{Part: 1 + i/2, Paragraph: 9 + i, Before: "before dawn the whole of the ", Form: "harber", After: " had turned out to see"}
}

func TestCitationsStandAlignedOnTheForm(t *testing.T) {
	m, _, _ := shown([]string{"narration", "speech", "note"}, 70, 5, rows)
	lines := strings.Split(m.View(), "\n")
	at := text.Width(lines[1][:strings.Index(lines[1], "harber")])
	for _, l := range lines[1:4] {
		assert.Equal(t, at, text.Width(l[:strings.Index(l, "harber")]), "%q", l)
	}
	assert.Contains(t, lines[2], "speech")
	assert.NotContains(t, lines[1], "narration", "the common case needs no word")
}

func TestSpaceChecksOneAndVItsSetting(t *testing.T) {
	m, checked, _ := shown([]string{"narration", "speech", "narration", "speech"}, 70, 6, rows)
	m = press(m, "jv")
	assert.Equal(t, []bool{true, false, true, false}, checked)
	m = press(m, "v")
	assert.Equal(t, []bool{true, true, true, true}, checked)
	m = press(m, "j ")
	assert.Equal(t, []bool{true, true, false, true}, checked)
	assert.Contains(t, m.View(), "3 of 4 checked")
}

func TestOnlyDrawnCitationsAreSeen(t *testing.T) {
	asked := make(map[int]bool)
	m, _, seen := shown(make([]string, 100), 70, 5, func(i int) concordance.Row { asked[i] = true; return rows(i) })
	assert.Equal(t, 4, count(seen))
	_ = m.View()
	assert.Len(t, asked, 4, "the others are not even asked for")
	m = press(m, strings.Repeat("j", 99))
	assert.Equal(t, 100, count(seen))
	assert.Equal(t, 99, m.Cursor())
}

func count(bs []bool) (n int) {
	for _, b := range bs {
		if b {
			n++
		}
	}
	return n
}

func TestRulingsStandAtTheEndOfTheirRow(t *testing.T) {
	m, _, _ := shown([]string{"narration", "speech"}, 70, 4, func(i int) concordance.Row {
		r := rows(i)
		r.Ruled = []string{"→ harbour", ""}[i]
		return r
	})
	assert.Contains(t, strings.Split(m.View(), "\n")[1], "→ harbour")
}

func TestNoLineIsWiderThanAsked(t *testing.T) {
	long := func(i int) concordance.Row {
		return concordance.Row{Part: 100, Paragraph: 12345, Before: strings.Repeat("漢字 ", 500*i), Form: strings.Repeat("é漢", 3+20*i),
			After: strings.Repeat("e\u0301 字", 500*i), Ruled: strings.Repeat("→ harbour", i)}
	}
	for width := 30; width < 130; width++ {
		m, _, _ := shown([]string{"quotation", "italics", "narration"}, width, 5, long)
		for _, l := range strings.Split(m.View(), "\n") {
			assert.LessOrEqual(t, text.Width(l), width, fmt.Sprintf("%q", l))
		}
	}
}
