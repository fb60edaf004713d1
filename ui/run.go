package ui

import (
	"context"
	"errors"
	"io"
	"os"
	"os/signal"
	"syscall"

	tea "github.com/charmbracelet/bubbletea"
	"github.com/muesli/termenv"

	"emendary/internal/docket"
	"emendary/internal/ledger"
	"emendary/ui/ground"
	"emendary/ui/style"
)

// Options of the bench. The zero value takes the standard input and output, and
// all else from the environment.
type Options struct {
	Input      io.Reader
	Output     io.Writer
	ASCII      bool                // signs in ASCII, whatever the locale
	NoColor    bool                // no colours, whatever the terminal
	Background string              // dark or light; "" means what COLORFGBG says
	Marks      style.Convention    // of the proof-correction marks; "" means British
	Version    string              // shown on the help page
	Program    string              // how the next commands are named; "" means emendary
	Getenv     func(string) string // nil means os.Getenv

	// Write writes rulings durably; nil means the session's own.
	Write func(ctx context.Context, rulings ...ledger.Ruling) error
}

func (o Options) ability() style.Ability {
	getenv := o.Getenv
	if getenv == nil {
		getenv = os.Getenv
	}
	a := style.FromEnvironment(getenv)
	a.ASCII = a.ASCII || o.ASCII
	if o.NoColor {
		a.Profile = termenv.Ascii
	}
	if o.Background != "" {
		a.Background = ground.Background(o.Background)
	}
	return a
}

func (o Options) writer(s *docket.Session) func(context.Context, ...ledger.Ruling) error {
	if o.Write != nil {
		return o.Write
	}
	return s.Write
}

func (o Options) program() string {
	if o.Program != "" {
		return o.Program
	}
	return "emendary"
}

// Run shows the bench on a terminal until the editor leaves it, ctx ends or the
// terminal goes away. await returns the session of the manuscript called name once
// it is laid out, or what is wrong with it, which Run returns; until then there is
// a screen that says so, and keys are kept. The session stays the caller's. A ruling that is being written then is written to its end.
// The terminal is left as it was, also after a crash, which comes back as an error.
func Run(ctx context.Context, name string, await func() (*docket.Session, error), opt Options) error {
	// Bubble Tea leaves less tidily on SIGINT than on the others: heed all alike.
	options := []tea.ProgramOption{tea.WithContext(ctx), tea.WithAltScreen(), tea.WithoutSignalHandler()}
	if opt.Input != nil {
		options = append(options, tea.WithInput(opt.Input))
	}
	if opt.Output != nil {
		options = append(options, tea.WithOutput(opt.Output))
	}
	work, cancel := context.WithCancel(ctx) // ends the computations with the bench
	defer cancel()
	program := tea.NewProgram(newOpening(work, name, await, opt), options...)

	leave := make(chan os.Signal, 1)
	signal.Notify(leave, syscall.SIGINT, syscall.SIGTERM, syscall.SIGHUP)
	defer signal.Stop(leave)
	go func() {
		select {
		case <-leave:
			program.Quit()
		case <-work.Done():
		}
	}()

	final, err := program.Run()
	o, ok := final.(opening)
	switch {
	case !ok || errors.Is(err, tea.ErrProgramPanic):
	case o.err != nil:
		err = o.err
	case o.bench != nil:
		err = errors.Join(err, o.bench.finish())
	}
	return err
}

// finish waits for the rulings being written, if any, and says whether they were.
func (m Model) finish() error {
	if m.batch == nil {
		return nil
	}
	return m.batch.write()
}
