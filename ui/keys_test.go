package ui

import (
	"context"
	"strings"
	"testing"

	"github.com/charmbracelet/bubbles/key"
	"github.com/stretchr/testify/assert"

	"emendary/internal/docket"
	"emendary/ui/line"
)

// Every key and every help text, so that none changes by accident.
func TestKeysAndTheirHelp(t *testing.T) {
	m := New(context.Background(), &docket.Session{Docket: &docket.Docket{}}, Options{Getenv: plain})
	var got []string
	tell := func(part string, groups [][]key.Binding) {
		for _, g := range groups {
			for _, b := range g {
				got = append(got, part+" | "+strings.Join(b.Keys(), " ")+" | "+b.Help().Key+" | "+b.Help().Desc)
			}
		}
	}
	for _, s := range m.helpSections() {
		tell(s.name, s.keys.FullHelp())
	}
	tell("field", line.FieldKeys().FullHelp())
	assert.Equal(t, strings.Split(strings.TrimSpace(wantKeys), "\n"), got)
}

// No two bindings that are on at the same time share a key.
func TestNoKeyMeansTwoThings(t *testing.T) {
	m := New(context.Background(), &docket.Session{Docket: &docket.Docket{}}, Options{Getenv: plain})
	k := m.Keys
	everywhere := []key.Binding{k.Stand, k.Add, k.Query, k.Later, k.Correct, k.Unfold, k.Undo, k.Redo, k.Next, k.Previous,
		k.NextOpen, k.Find, k.Order, k.Adapt, k.Focus, k.Help, k.Quit, k.Accept}
	for name, part := range map[string][][]key.Binding{
		"alignment":   append(m.alignment.Keys.FullHelp(), []key.Binding{k.Actions}),
		"concordance": m.concordance.Keys.FullHelp(),
		"related":     m.related.Keys.FullHelp(),
	} {
		seen := make(map[string]string)
		for _, group := range append(part, everywhere) {
			for _, b := range group {
				for _, k := range b.Keys() {
					assert.Empty(t, seen[k], "%s: %q is %s and %s", name, k, seen[k], b.Help().Desc)
					seen[k] = b.Help().Desc
				}
			}
		}
	}
}

// part | keys | keys as the help names them | help
const wantKeys = `
on the bench | f enter | f enter | accept
on the bench | d | d | let stand
on the bench | s | s | add
on the bench | a | a | query
on the bench | g | g | later
on the bench | ; | ; | correct
on the bench | p | p | unfold the passage
on the bench | u | u | undo
on the bench | r | r | redo
on the bench | l right | l → | next entry
on the bench | h left | h ← | previous entry
on the bench | n | n | next open
on the bench | / | / | find
on the bench | t | t | next order
on the bench | e | e | price edits by what was accepted
on the bench | tab | tab | next part of the screen
on the bench |   | space | actions
on the bench | ? | ? | help
on the bench | q ctrl+c | q ctrl+c | leave
on the bench | ctrl+c | ctrl+c | leave from anywhere
in the alignment | j down | j ↓ | next candidate
in the alignment | k up | k ↑ | previous candidate
in the concordance | j down | j ↓ | next citation
in the concordance | k up | k ↑ | previous citation
in the concordance |   | space | check or uncheck the citation
in the concordance | v | v | check or uncheck its whole setting
in the concordance | o | o | show its paragraph in full
in the related forms | j down | j ↓ | next related form
in the related forms | k up | k ↑ | previous related form
in the related forms |   | space | check or uncheck the form
in the strip of actions | left h | h ← | left
in the strip of actions | right l | l → | right
in the strip of actions | enter | enter | do it
in the strip of actions | esc   up down | esc space | close
a correction of your own | enter | enter | accept it
a correction of your own | tab | tab | accept it with a query
a correction of your own | up | ↑ | start from the form
a correction of your own | down | ↓ | start from the candidate
a correction of your own | esc | esc | back
adding to a list | enter s | s enter | add
adding to a list | left h | h ← | left
adding to a list | right l | l → | right
adding to a list | down j | j ↓ | list, kind, note
adding to a list | up k | k ↑ | back up
adding to a list | tab | tab | add with a query
adding to a list | esc | esc | back
a query | enter | enter | ask
a query | tab up | tab ↑ | whom
a query | down shift+tab | ↓ | alone or with a ruling
a query | esc | esc | back
the language of a passage | enter | enter | let it stand in this language, or in none named
the language of a passage | esc | esc | back
finding a form | enter | enter | show the form
finding a form | down tab ctrl+n | tab ↓ | next form
finding a form | up shift+tab ctrl+p | ↑ | previous form
finding a form | esc | esc | back
a page | esc q ? o enter | esc enter | back to the bench
a page | j down | j ↓ | line down
a page | k up | k ↑ | line up
a page | l   right pgdown | l → space | page down
a page | h left pgup | h ← | page up
when a ruling could not be written | r enter | r enter | write it again
when a ruling could not be written | esc | esc | leave the entry open
when a ruling could not be written | q ctrl+c | q ctrl+c | leave the bench
field | left ctrl+b | ← | letter left
field | right ctrl+f | → | letter right
field | home ctrl+a | home | start of the line
field | end ctrl+e | end | end of the line
field | backspace ctrl+h | backspace | delete the letter before
field | delete ctrl+d | delete | delete the letter after
field | ctrl+u | ctrl+u | empty the line
`
