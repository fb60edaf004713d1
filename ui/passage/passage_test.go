package passage_test

import (
	"strings"
	"testing"

	"github.com/muesli/termenv"
	"github.com/stretchr/testify/assert"

	"emendary/ui/passage"
	"emendary/ui/style"
	"emendary/ui/text"
)

func TestTheFormAlwaysShows(t *testing.T) {
	for _, before := range []int{0, 1, 20, 500} {
		for _, after := range []int{0, 1, 500} {
			for height := 1; height < 7; height++ {
				m := passage.New(style.Make(style.Ability{Profile: termenv.Ascii, Plain: true}))
				m.SetSize(60, height)
				m.Show(strings.Repeat("before ", before), "har ber", strings.Repeat(" 漢字", after))
				lines := strings.Split(m.View(), "\n")
				assert.Len(t, lines, height)
				assert.Contains(t, m.View(), "[har ber]")
				for _, l := range lines {
					assert.LessOrEqual(t, text.Width(l), 60)
				}
			}
		}
	}
}

func TestAPassageThatGoesOnSaysSo(t *testing.T) {
	m := passage.New(style.Make(style.Ability{Profile: termenv.Ascii, Plain: true}))
	m.SetSize(60, 3)
	m.Show(strings.Repeat("before ", 100), "harber", strings.Repeat(" after", 100))
	lines := strings.Split(m.View(), "\n")
	assert.True(t, strings.HasPrefix(lines[0], "…"))
	assert.True(t, strings.HasSuffix(lines[2], "…"))
}
