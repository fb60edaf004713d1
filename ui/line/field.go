// Package line holds what is typed below the alignment: a correction of one's
// own, what to put on which list, or a query.
package line

import (
	"strings"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"
	"github.com/rivo/uniseg"

	"emendary/ui/style"
	"emendary/ui/text"
)

// FieldKeyMap is the keys of editing within a line of text.
type FieldKeyMap struct {
	Left, Right, Start, End, Back, Forward, Clear key.Binding
}

// FieldKeys returns the keys with their help.
func FieldKeys() FieldKeyMap {
	return FieldKeyMap{
		Left:    key.NewBinding(key.WithKeys("left", "ctrl+b"), key.WithHelp("←", "letter left")),
		Right:   key.NewBinding(key.WithKeys("right", "ctrl+f"), key.WithHelp("→", "letter right")),
		Start:   key.NewBinding(key.WithKeys("home", "ctrl+a"), key.WithHelp("home", "start of the line")),
		End:     key.NewBinding(key.WithKeys("end", "ctrl+e"), key.WithHelp("end", "end of the line")),
		Back:    key.NewBinding(key.WithKeys("backspace", "ctrl+h"), key.WithHelp("backspace", "delete the letter before")),
		Forward: key.NewBinding(key.WithKeys("delete", "ctrl+d"), key.WithHelp("delete", "delete the letter after")),
		Clear:   key.NewBinding(key.WithKeys("ctrl+u"), key.WithHelp("ctrl+u", "empty the line")),
	}
}

// FullHelp returns all keys.
func (k FieldKeyMap) FullHelp() [][]key.Binding {
	return [][]key.Binding{{k.Left, k.Right, k.Start, k.End, k.Back, k.Forward, k.Clear}}
}

// Field is one line of text under edit, letter by letter (grapheme clusters).
type Field struct {
	Keys  FieldKeyMap
	sheet style.Sheet
	text  string
	at    int // byte offset of the cursor, at the start of a letter
}

// NewField returns an empty field.
func NewField(sheet style.Sheet) Field { return Field{Keys: FieldKeys(), sheet: sheet} }

// Value returns the text.
func (f Field) Value() string { return f.text }

// Set replaces the text and puts the cursor at its end.
func (f *Field) Set(s string) { f.text, f.at = s, len(s) }

// Update edits the text; a paste is taken in with its line breaks as spaces.
func (f Field) Update(k tea.KeyMsg) Field {
	before, after := f.text[:f.at], f.text[f.at:]
	switch {
	case key.Matches(k, f.Keys.Left):
		f.at -= len(lastLetter(before))
	case key.Matches(k, f.Keys.Right):
		f.at += len(firstLetter(after))
	case key.Matches(k, f.Keys.Start):
		f.at = 0
	case key.Matches(k, f.Keys.End):
		f.at = len(f.text)
	case key.Matches(k, f.Keys.Back):
		f.at -= len(lastLetter(before))
		f.text = before[:f.at] + after
	case key.Matches(k, f.Keys.Forward):
		f.text = before + after[len(firstLetter(after)):]
	case key.Matches(k, f.Keys.Clear):
		f.text, f.at = "", 0
	case (k.Type == tea.KeyRunes || k.Type == tea.KeySpace) && !k.Alt:
		typed := taken(string(k.Runes))
		f.text = before + typed + after
		f.at += len(typed)
	}
	return f
}

// taken returns what a line takes of typed or pasted text: no control characters.
func taken(s string) string {
	return strings.Map(func(r rune) rune {
		switch {
		case r == '\n' || r == '\t' || r == '\r':
			return ' '
		case r < 0x20 || r >= 0x7f && r < 0xa0:
			return -1
		}
		return r
	}, strings.ToValidUTF8(s, ""))
}

func firstLetter(s string) string {
	letter, _, _, _ := uniseg.FirstGraphemeClusterInString(s, -1)
	return letter
}

func lastLetter(s string) string {
	letter := ""
	for state := -1; s != ""; {
		letter, s, _, state = uniseg.FirstGraphemeClusterInString(s, state)
	}
	return letter
}

// View returns the text with a cursor in at most width columns, scrolled so that
// the cursor shows.
func (f Field) View(width int) string {
	ascii := f.sheet.Signs.ASCII
	before, under, after := f.text[:f.at], firstLetter(f.text[f.at:]), ""
	if under != "" {
		after = f.text[f.at+len(under):]
	} else {
		under = " "
	}
	left := text.CutLeft(text.Visible(before, ascii), max(0, width-2), f.sheet.Signs.Less)
	cursor := text.Visible(under, ascii)
	if f.sheet.Bracket {
		cursor = "_" + cursor
	} else {
		cursor = f.sheet.Text.Reverse(true).Render(cursor)
	}
	return text.Cut(left+cursor+text.Visible(after, ascii), width, "")
}
