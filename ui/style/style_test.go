package style_test

import (
	"reflect"
	"testing"

	"github.com/muesli/termenv"
	"github.com/stretchr/testify/assert"

	"emendary/ui/ground"
	"emendary/ui/style"
	"emendary/ui/text"
)

func TestFromEnvironment(t *testing.T) {
	for _, c := range []struct {
		name string
		env  map[string]string
		want style.Ability
	}{
		{"nothing known", nil, style.Ability{Profile: termenv.Ascii, Plain: true, ASCII: true}},
		{"dumb", map[string]string{"TERM": "dumb", "LANG": "C.UTF-8"}, style.Ability{Profile: termenv.Ascii, Plain: true}},
		{"sixteen colours", map[string]string{"TERM": "xterm", "LANG": "en_GB.UTF-8"}, style.Ability{Profile: termenv.ANSI}},
		{"256 colours", map[string]string{"TERM": "tmux-256color", "LANG": "en_GB.utf8"}, style.Ability{Profile: termenv.ANSI256}},
		{"true colour", map[string]string{"TERM": "xterm", "COLORTERM": "truecolor", "LANG": "C.UTF-8"}, style.Ability{Profile: termenv.TrueColor}},
		{"NO_COLOR keeps attributes", map[string]string{"TERM": "xterm-256color", "NO_COLOR": "1", "LANG": "C.UTF-8"}, style.Ability{Profile: termenv.Ascii}},
		{"the first of the locale decides", map[string]string{"TERM": "xterm", "LC_ALL": "C", "LANG": "C.UTF-8"}, style.Ability{Profile: termenv.ANSI, ASCII: true}},
		{"the background", map[string]string{"TERM": "xterm", "LANG": "C.UTF-8", "COLORFGBG": "0;15"}, style.Ability{Profile: termenv.ANSI, Background: ground.Light}},
	} {
		t.Run(c.name, func(t *testing.T) {
			assert.Equal(t, c.want, style.FromEnvironment(func(name string) string { return c.env[name] }))
		})
	}
}

func TestStylesSendOnlyWhatTheTerminalCan(t *testing.T) {
	for _, c := range []struct {
		name    string
		ability style.Ability
		form    string
	}{
		{"plain", style.Ability{Profile: termenv.Ascii, Plain: true}, "x"},
		{"no colour", style.Ability{Profile: termenv.Ascii}, "\x1b[7mx\x1b[0m"},
		{"sixteen", style.Ability{Profile: termenv.ANSI, Background: ground.Dark}, "\x1b[1;7;33mx\x1b[0m"},
		{"true colour on dark", style.Ability{Profile: termenv.TrueColor, Background: ground.Dark}, "\x1b[1;7;38;2;232;172;79mx\x1b[0m"},
		{"true colour on light", style.Ability{Profile: termenv.TrueColor, Background: ground.Light}, "\x1b[1;7;38;2;138;75;0mx\x1b[0m"},
	} {
		assert.Equal(t, c.form, style.Make(c.ability).Form.Render("x"), c.name)
	}
}

func TestTheFormIsBracketedWhereNoColourMarksIt(t *testing.T) {
	assert.True(t, style.Make(style.Ability{Profile: termenv.Ascii}).Bracket)
	assert.False(t, style.Make(style.Ability{Profile: termenv.ANSI}).Bracket)
}

// Signs of one column keep columns aligned on every terminal; the stand-ins are ASCII.
func TestSigns(t *testing.T) {
	u, a := reflect.ValueOf(style.Unicode()), reflect.ValueOf(style.ASCII())
	for i := range u.NumField() {
		name := u.Type().Field(i).Name
		if u.Field(i).Kind() != reflect.String {
			continue
		}
		assert.NotEmpty(t, a.Field(i).String(), name)
		for _, r := range a.Field(i).String() {
			assert.Less(t, r, rune(0x7f), name)
		}
		if name != "Capital" && name != "Lower" {
			assert.Equal(t, 1, text.Width(u.Field(i).String()), name)
		}
	}
	assert.Len(t, style.ASCII().Strip, len(style.Unicode().Strip))
}
