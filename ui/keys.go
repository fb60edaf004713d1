package ui

import "github.com/charmbracelet/bubbles/key"

// KeyMap is the keys of the bench itself; each part of the screen has its own beside
// them. The rulings and moves lie under a hand on the home row, and the arrows,
// enter, space and tab do all of it too.
type KeyMap struct {
	Accept, Stand, Add, Query, Later, Correct key.Binding
	Unfold                                    key.Binding
	Undo, Redo                                key.Binding
	Next, Previous, NextOpen, Find, Order     key.Binding
	Adapt                                     key.Binding
	Focus, Actions                            key.Binding
	Help, Quit, Break                         key.Binding
}

// Keys returns the keys with their help.
func Keys() KeyMap {
	return KeyMap{
		Accept:   key.NewBinding(key.WithKeys("f", "enter"), key.WithHelp("f enter", "accept")),
		Stand:    key.NewBinding(key.WithKeys("d"), key.WithHelp("d", "let stand")),
		Add:      key.NewBinding(key.WithKeys("s"), key.WithHelp("s", "add")),
		Query:    key.NewBinding(key.WithKeys("a"), key.WithHelp("a", "query")),
		Later:    key.NewBinding(key.WithKeys("g"), key.WithHelp("g", "later")),
		Correct:  key.NewBinding(key.WithKeys(";"), key.WithHelp(";", "correct")),
		Unfold:   key.NewBinding(key.WithKeys("p"), key.WithHelp("p", "unfold the passage")),
		Undo:     key.NewBinding(key.WithKeys("u"), key.WithHelp("u", "undo")),
		Redo:     key.NewBinding(key.WithKeys("r"), key.WithHelp("r", "redo")),
		Next:     key.NewBinding(key.WithKeys("l", "right"), key.WithHelp("l →", "next entry")),
		Previous: key.NewBinding(key.WithKeys("h", "left"), key.WithHelp("h ←", "previous entry")),
		NextOpen: key.NewBinding(key.WithKeys("n"), key.WithHelp("n", "next open")),
		Find:     key.NewBinding(key.WithKeys("/"), key.WithHelp("/", "find")),
		Order:    key.NewBinding(key.WithKeys("t"), key.WithHelp("t", "next order")),
		Adapt:    key.NewBinding(key.WithKeys("e"), key.WithHelp("e", "price edits by what was accepted")),
		Focus:    key.NewBinding(key.WithKeys("tab"), key.WithHelp("tab", "next part of the screen")),
		Actions:  key.NewBinding(key.WithKeys(" "), key.WithHelp("space", "actions")),
		Help:     key.NewBinding(key.WithKeys("?"), key.WithHelp("?", "help")),
		Quit:     key.NewBinding(key.WithKeys("q", "ctrl+c"), key.WithHelp("q ctrl+c", "leave")),
		Break:    key.NewBinding(key.WithKeys("ctrl+c"), key.WithHelp("ctrl+c", "leave from anywhere")),
	}
}

// rulings are the first line of the footer.
func (k KeyMap) rulings() []key.Binding {
	return []key.Binding{k.Accept, k.Stand, k.Add, k.Query, k.Later, k.Correct, k.Undo, k.Redo}
}

// ShortHelp returns what the footer shows.
func (k KeyMap) ShortHelp() []key.Binding { return append(k.rulings(), k.Help, k.Quit) }

// FullHelp returns all keys: the rulings, then the moves.
func (k KeyMap) FullHelp() [][]key.Binding {
	return [][]key.Binding{
		{k.Accept, k.Stand, k.Add, k.Query, k.Later, k.Correct, k.Unfold, k.Undo, k.Redo},
		{k.Next, k.Previous, k.NextOpen, k.Find, k.Order, k.Adapt, k.Focus, k.Actions, k.Help, k.Quit, k.Break},
	}
}

// StripKeyMap is the keys of the strip of actions.
type StripKeyMap struct {
	Left, Right, Do, Close key.Binding
}

// StripKeys returns the keys with their help.
func StripKeys() StripKeyMap {
	return StripKeyMap{
		Left:  key.NewBinding(key.WithKeys("left", "h"), key.WithHelp("h ←", "left")),
		Right: key.NewBinding(key.WithKeys("right", "l"), key.WithHelp("l →", "right")),
		Do:    key.NewBinding(key.WithKeys("enter"), key.WithHelp("enter", "do it")),
		Close: key.NewBinding(key.WithKeys("esc", " ", "up", "down"), key.WithHelp("esc space", "close")),
	}
}

// ShortHelp returns what the footer shows.
func (k StripKeyMap) ShortHelp() []key.Binding { return []key.Binding{k.Left, k.Right, k.Do, k.Close} }

// FullHelp returns all keys.
func (k StripKeyMap) FullHelp() [][]key.Binding { return [][]key.Binding{k.ShortHelp()} }

// FailureKeyMap is the keys once a ruling could not be written.
type FailureKeyMap struct {
	Retry, Drop, Quit key.Binding
}

// FailureKeys returns the keys with their help.
func FailureKeys() FailureKeyMap {
	return FailureKeyMap{
		Retry: key.NewBinding(key.WithKeys("r", "enter"), key.WithHelp("r enter", "write it again")),
		Drop:  key.NewBinding(key.WithKeys("esc"), key.WithHelp("esc", "leave the entry open")),
		Quit:  key.NewBinding(key.WithKeys("q", "ctrl+c"), key.WithHelp("q ctrl+c", "leave the bench")),
	}
}

// ShortHelp returns what the footer shows.
func (k FailureKeyMap) ShortHelp() []key.Binding { return []key.Binding{k.Retry, k.Drop, k.Quit} }

// FullHelp returns all keys.
func (k FailureKeyMap) FullHelp() [][]key.Binding { return [][]key.Binding{k.ShortHelp()} }
