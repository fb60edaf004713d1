package alignment_test

import (
	"strings"
	"testing"

	tea "github.com/charmbracelet/bubbletea"
	"github.com/muesli/termenv"
	"github.com/stretchr/testify/assert"

	"emendary/align"
	"emendary/ui/alignment"
	"emendary/ui/style"
	"emendary/ui/text"
)

var letters align.Alphabet

func lettersOf(s string) (out []string) {
	for _, l := range letters.Letters(s) {
		out = append(out, letters.Text(l))
	}
	return out
}

func rowOf(form, word string) alignment.Row {
	a := align.Align(letters.Fold(letters.Letters(form)), letters.Fold(letters.Letters(word)), align.Unit{})
	return alignment.Row{Text: word, Letters: lettersOf(word), Alignment: a, Cost: 8.1, Share: 0.61, Priced: true}
}

func laid(ability style.Ability, form string, words ...string) alignment.Model {
	m := alignment.New(style.Make(ability))
	m.SetSize(78, 4+len(words))
	var rows []alignment.Row
	for _, w := range words {
		rows = append(rows, rowOf(form, w))
	}
	m.Lay(lettersOf(form), rows)
	return m
}

func trimmed(view string) string {
	lines := strings.Split(view, "\n")
	for i := range lines {
		lines[i] = strings.TrimRight(lines[i], " ")
	}
	return "\n" + strings.Join(lines, "\n") + "\n"
}

var plain = style.Ability{Profile: termenv.Ascii, Plain: true}

func TestTheGrid(t *testing.T) {
	for _, c := range []struct{ name, form, words, want string }{
		{"insertions open columns", "harber", "harbour harbor barber harper", `
                 h  a  r  b  e  ‸  r    cost  share
 ▸ harbour       ·  ·  ·  ·  o  u  ·     8.1   61 %
   harbor        ·  ·  ·  ·  o     ·     8.1   61 %
   barber        b  ·  ·  ·  ·     ·     8.1   61 %
   harper        ·  ·  ·  p  ·     ·     8.1   61 %
                 h  a  r  b  e  ‸  r
                             o/ u
   substitute o for e, insert u after it
`},
		{"a transposition crosses", "recieve", "receive", `
                 r  e  c  i  e  v  e    cost  share
 ▸ receive       ·  ·  ·  e  i  ·  ·     8.1   61 %
                 r  e  c  i  e  v  e
                          tr ∽
   transpose i and the second e
`},
		{"a deletion has its dele", "neeed", "need", `
                 n  e  e  e  d    cost  share
 ▸ need          ·  ·  ·  ₰  ·     8.1   61 %
                 n  e  e  e  d
                          ₰
   delete the third e
`},
		{"capitals", "rose", "Rose", `
                 r  o  s  e    cost  share
 ▸ Rose          R  ·  ·  ·     8.1   61 %
                 r  o  s  e
                 cap
   capital R
`},
		{"capitals in a row", "usa", "USA", `
                 u  s  a    cost  share
 ▸ USA           U  S  A     8.1   61 %
                 u  s  a
                 cap── ──
   all in capitals
`},
		{"double width and combining", "漢字e\u0301", "漢e\u0301s", `
                 漢  字  é  ‸    cost  share
 ▸ 漢és          ·   ₰   ·  s     8.1   61 %
                 漢  字  é  ‸
                     ₰      s
   delete 字, insert s after é
`},
	} {
		t.Run(c.name, func(t *testing.T) {
			got := trimmed(laid(plain, c.form, strings.Fields(c.words)...).View())
			assert.Equal(t, strings.ReplaceAll(c.want, "é", "é"), strings.ReplaceAll(got, "e\u0301", "é"))
		})
	}
}

func TestAWordInTwoIsMarkedBySpace(t *testing.T) {
	view := laid(plain, "alot", "a lot").View()
	assert.Contains(t, view, "#")
	assert.Contains(t, view, "insert a space after a")
}

func TestStetHasADotUnderEveryLetter(t *testing.T) {
	m := laid(plain, "harber", "harbour")
	m.Stet()
	assert.Equal(t, `
                 h  a  r  b  e  ‸  r    cost  share
 ▸ harbour       ·  ·  ·  ·  o  u  ·     8.1   61 %
                 h  a  r  b  e     r
                 .  .  .  .  .     .
   stet: the form stands
`, trimmed(m.View()))
	m, _ = m.Update(tea.KeyMsg{Type: tea.KeyDown})
	assert.Contains(t, m.View(), "substitute o for e")
}

func TestTheHeadSaysWhichRowsAreDrawn(t *testing.T) {
	m := laid(plain, "harber", "harbour", "harbor", "barber", "harper")
	m.SetSize(78, 7)
	assert.Contains(t, m.View(), "   1 to 3 of 4   h  a  r")
	for range 3 {
		m, _ = m.Update(tea.KeyMsg{Type: tea.KeyDown})
	}
	assert.Contains(t, m.View(), "   2 to 4 of 4   h  a  r")
	assert.Contains(t, m.View(), "▸ harper")
}

func TestSentence(t *testing.T) {
	for _, c := range []struct{ form, word, want string }{
		{"harber", "harbour", "substitute o for e, insert u after it"},
		{"beleived", "believed", "transpose the second e and i"},
		{"comittee", "committee", "insert m after m"},
		{"har bour", "harbour", "close up after the first r"},
		{"har-bour", "harbour", "delete the hyphen"},
		{"arbour", "harbour", "insert h before a"},
		{"dont", "don't", "insert an apostrophe after n"},
		{"LONDON", "london", "all in lower case"},
		{"harbour", "harbour", "the form as it stands"},
		{"hat", "hatted", "insert ted after t"},
		{"", "a", "insert a"},
		{"a", "", "delete a"},
	} {
		got := alignment.Sentence(lettersOf(c.form), rowOf(c.form, c.word))
		assert.Equal(t, c.want, got, "%s → %s", c.form, c.word)
	}
}

func TestAnAlignmentOfSomethingElseSaysNothing(t *testing.T) {
	row := rowOf("harbour", "harbours")
	assert.Equal(t, "", alignment.Sentence(lettersOf("ha"), row))
	row.Letters = nil
	assert.Equal(t, "", alignment.Sentence(lettersOf("harbour"), row))
}

// However long the form, the grid keeps to its width and shows a departure of the
// row under the cursor.
func TestLongFormsKeepTheWidth(t *testing.T) {
	long := strings.Repeat("a", 30) + "b" + strings.Repeat("c", 30)
	for width := 60; width < 100; width += 7 {
		m := laid(plain, long, strings.Replace(long, "b", "x", 1), long+"s")
		m.SetSize(width, 8)
		for _, l := range strings.Split(m.View(), "\n") {
			assert.LessOrEqual(t, text.Width(l), width)
		}
		assert.Contains(t, m.View(), "x/")
	}
}

func TestASCIIStandIns(t *testing.T) {
	a := plain
	a.ASCII = true
	view := laid(a, "recievedd", "received", "a lot").View()
	for _, r := range view {
		assert.Less(t, r, rune(0x7f))
	}
	assert.Contains(t, view, "tr ~")
}

func FuzzViewKeepsItsSize(f *testing.F) {
	f.Add("harber", "harbour", 80, 9)
	f.Add("漢字", "", 60, 4)
	f.Add("a\u0301\u0302", "שלום", 61, 5)
	f.Add("", "x", 20, 1)
	f.Fuzz(func(t *testing.T, form, word string, width, height int) {
		if width < 40 || width > 300 || height < 1 || height > 60 || len(form) > 200 || len(word) > 200 {
			return
		}
		m := laid(plain, form, word, form)
		m.SetSize(width, height)
		lines := strings.Split(m.View(), "\n")
		if len(lines) > height {
			t.Fatalf("%d lines of %d", len(lines), height)
		}
		for _, l := range lines {
			if text.Width(l) > width {
				t.Fatalf("%d columns of %d: %q", text.Width(l), width, l)
			}
		}
	})
}
