package page_test

import (
	"fmt"
	"strings"
	"testing"

	tea "github.com/charmbracelet/bubbletea"
	"github.com/muesli/termenv"
	"github.com/stretchr/testify/assert"

	"emendary/ui/page"
	"emendary/ui/style"
)

func hundred() page.Model {
	m := page.New(style.Make(style.Ability{Profile: termenv.Ascii, Plain: true}))
	m.SetSize(40, 10)
	var lines []string
	for i := range 100 {
		lines = append(lines, fmt.Sprintf("line %d", i))
	}
	m.Show(lines, 0)
	return m
}

func TestAPageScrollsToItsEndAndBack(t *testing.T) {
	m := hundred()
	assert.Equal(t, 90, m.Rest())
	press := func(keys string) {
		for _, r := range keys {
			m, _ = m.Update(tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune{r}})
		}
	}
	press("jj")
	assert.Contains(t, m.View(), "line 2 ")
	assert.NotContains(t, m.View(), "line 1 ")
	press(strings.Repeat("l", 20))
	assert.Equal(t, 0, m.Rest())
	assert.Contains(t, m.View(), "line 99")
	press(strings.Repeat("h", 20) + "k")
	assert.Equal(t, 90, m.Rest())
}

func TestTheLineAskedForIsInSight(t *testing.T) {
	m := hundred()
	for at := range 100 {
		m.Show(strings.Split(strings.Repeat("x\n", at)+"here\n"+strings.Repeat("x\n", 100-at), "\n"), at)
		assert.Contains(t, m.View(), "here")
	}
}
