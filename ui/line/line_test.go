package line_test

import (
	"strings"
	"testing"

	tea "github.com/charmbracelet/bubbletea"
	"github.com/muesli/termenv"
	"github.com/stretchr/testify/assert"

	"emendary/ui/line"
	"emendary/ui/style"
	"emendary/ui/text"
)

var sheet = style.Make(style.Ability{Profile: termenv.Ascii, Plain: true})

func keyOf(name string) tea.KeyMsg {
	special := map[string]tea.KeyType{"left": tea.KeyLeft, "right": tea.KeyRight, "home": tea.KeyHome, "end": tea.KeyEnd,
		"back": tea.KeyBackspace, "delete": tea.KeyDelete, "clear": tea.KeyCtrlU, "up": tea.KeyUp, "down": tea.KeyDown,
		"tab": tea.KeyTab, "enter": tea.KeyEnter}
	if t, ok := special[name]; ok {
		return tea.KeyMsg{Type: t}
	}
	return tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune(name)}
}

// Letters are grapheme clusters: one key deletes a letter with all its marks.
func TestField(t *testing.T) {
	for _, c := range []struct{ name, keys, want string }{
		{"typing", "h a r", "har"},
		{"back over a letter with a mark", "e\u0301 back", ""},
		{"back over one of two", "漢 字 back", "漢"},
		{"back at the start", "a home back", "a"},
		{"insert within", "h r left a", "har"},
		{"delete after", "a b home delete", "b"},
		{"delete at the end", "a delete", "a"},
		{"ends", "b home a end c", "abc"},
		{"left stops at the start", "a left left left b", "ba"},
		{"right stops at the end", "a right right b", "ab"},
		{"clear", "a b clear c", "c"},
	} {
		t.Run(c.name, func(t *testing.T) {
			f := line.NewField(sheet)
			for _, k := range strings.Fields(c.keys) {
				f = f.Update(keyOf(k))
			}
			assert.Equal(t, c.want, f.Value())
		})
	}
}

func TestAFieldTakesNoControlCharacters(t *testing.T) {
	f := line.NewField(sheet)
	f = f.Update(tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune("a\x1b\u009b\nb"), Paste: true})
	assert.Equal(t, "a b", f.Value())
}

func FuzzFieldKeepsItsWidth(f *testing.F) {
	f.Add("har漢e\u0301ber", 3, 12)
	f.Add("", 0, 1)
	f.Fuzz(func(t *testing.T, s string, left, width int) {
		if left < 0 || left > 50 || width < 1 || width > 80 || len(s) > 200 {
			return
		}
		field := line.NewField(sheet)
		field.Set(s)
		for range left {
			field = field.Update(keyOf("left"))
		}
		if w := text.Width(field.View(width)); w > width {
			t.Fatalf("%d columns of %d: %q", w, width, field.View(width))
		}
	})
}

func TestCorrectionStartsFromTheFormOrTheCandidate(t *testing.T) {
	c := line.NewCorrection(sheet, "harber", "harbour")
	c = c.Update(keyOf("up"))
	assert.Equal(t, "harber", c.Value())
	c = c.Update(keyOf("down")).Update(keyOf("s"))
	assert.Equal(t, "harbours", c.Value())
}

func TestAdditionOffersTheKindOfEachList(t *testing.T) {
	kinds := map[string]string{"book": "person", "series": "vessel"}
	a := line.NewAddition(sheet, []string{"book", "series"}, "book", func(list string) string { return kinds[list] })
	assert.Equal(t, "person", a.Kind.Chosen())
	a = a.Update(keyOf("k")).Update(keyOf("l"))
	assert.Equal(t, "series", a.List.Chosen())
	assert.Equal(t, "vessel", a.Kind.Chosen())
}

func TestInANoteLettersAreLetters(t *testing.T) {
	a := line.NewAddition(sheet, []string{"book"}, "book", func(string) string { return "term" })
	assert.True(t, a.Takes(keyOf("s")))
	a = a.Update(keyOf("j"))
	assert.False(t, a.Takes(keyOf("s")))
	assert.True(t, a.Takes(keyOf("enter")))
	for _, k := range []string{"s", "h", "j"} {
		a = a.Update(keyOf(k))
	}
	assert.Equal(t, "shj", a.Note())
	assert.Equal(t, "term", a.Update(keyOf("up")).Kind.Chosen())
}

func TestQueryTurnsThroughItsAddressees(t *testing.T) {
	q := line.NewQuery(sheet, "publisher", []string{"alone", "with let stand"}, 0)
	assert.Equal(t, "publisher", q.Whom.Chosen())
	q = q.Update(keyOf("tab")).Update(keyOf("tab"))
	assert.Equal(t, "author", q.Whom.Chosen())
	q = q.Update(keyOf("down"))
	assert.Equal(t, "with let stand", q.With.Chosen())
	assert.Equal(t, "alone", q.Update(keyOf("down")).With.Chosen())
}

func TestAChoiceKeepsTheChosenInSight(t *testing.T) {
	a := line.NewAddition(sheet, []string{"book"}, "book", func(string) string { return "word" })
	for width := 40; width < 120; width += 7 {
		view := a.View(width)
		assert.Contains(t, view[1], "[word]")
		for _, l := range view {
			assert.LessOrEqual(t, text.Width(l), width)
		}
	}
	var none line.Choice
	none.Step(1)
	assert.Equal(t, "", none.Chosen())
}
