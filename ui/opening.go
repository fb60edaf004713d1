package ui

import (
	"context"
	"strings"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"emendary/internal/docket"
	"emendary/ui/style"
	"emendary/ui/text"
)

// opening is the bench from its first screen on: while a long manuscript is laid
// out it says so and keeps the keys that are typed, then it is the bench itself.
type opening struct {
	ctx   context.Context
	name  string // of the manuscript
	await func() (*docket.Session, error)
	opt   Options
	sheet style.Sheet
	keys  KeyMap

	size  tea.WindowSizeMsg
	typed []tea.KeyMsg
	bench *Model // nil until the session is there
	err   error  // why there is none
}

// opened brings the session, or what is wrong.
type opened struct {
	session *docket.Session
	err     error
}

func newOpening(ctx context.Context, name string, await func() (*docket.Session, error), opt Options) opening {
	return opening{ctx: ctx, name: name, await: await, opt: opt, sheet: style.Make(opt.ability()), keys: Keys()}
}

// Init waits for the session in a command.
func (o opening) Init() tea.Cmd {
	return func() tea.Msg {
		s, err := o.await()
		return opened{s, err}
	}
}

// Update keeps what comes before the bench is there, and passes on the rest.
func (o opening) Update(msg tea.Msg) (tea.Model, tea.Cmd) {
	if o.bench != nil {
		return o.pass(msg)
	}
	switch msg := msg.(type) {
	case tea.WindowSizeMsg:
		o.size = msg
	case tea.KeyMsg:
		if key.Matches(msg, o.keys.Break) {
			return o, tea.Quit
		}
		o.typed = append(o.typed, msg)
	case opened:
		if o.err = msg.err; o.err != nil {
			return o, tea.Quit
		}
		return o.begin(msg.session)
	}
	return o, nil
}

// begin hands over to the bench, with the size of the screen and the keys typed.
func (o opening) begin(s *docket.Session) (tea.Model, tea.Cmd) {
	bench := New(o.ctx, s, o.opt)
	o.bench = &bench
	cmds := []tea.Cmd{bench.Init()}
	kept := []tea.Msg{o.size}
	for _, k := range o.typed {
		kept = append(kept, k)
	}
	for _, msg := range kept {
		next, cmd := o.pass(msg)
		o, cmds = next, append(cmds, cmd)
	}
	o.typed = nil
	return o, tea.Batch(cmds...)
}

func (o opening) pass(msg tea.Msg) (opening, tea.Cmd) {
	next, cmd := o.bench.Update(msg)
	if bench, ok := next.(Model); ok {
		o.bench = &bench
	}
	return o, cmd
}

// View is the bench's, or a screen that says what is awaited.
func (o opening) View() string {
	if o.bench != nil && o.bench.begun {
		return o.bench.View()
	}
	width, height := o.size.Width, o.size.Height
	if width < 2 || height < 1 {
		return ""
	}
	signs := o.sheet.Signs
	lines := []string{
		" " + o.sheet.Title.Render(text.Cut(text.Visible(o.name, signs.ASCII), width-1, signs.Ellipsis)),
		o.sheet.Quiet.Render(" " + strings.Repeat(signs.Rule, width-2)),
		"",
		text.Cut(" laying out the docket "+signs.Ellipsis, width, ""),
	}
	for len(lines) < height {
		lines = append(lines, "")
	}
	return strings.Join(lines[:height], "\n")
}
