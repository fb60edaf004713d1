// Emendary is the command line of Emendary: it opens manuscripts, shows their
// dockets and writes emended copies and reports.
//
// Each command is in a file of its own that reads the arguments, calls the
// package that knows the answer, and prints it. What is printed how is stated at
// the head of print.go; exit statuses are stated at status.
package main

import (
	"context"
	"errors"
	"io"
	"os"
	"os/signal"
	"syscall"

	// ground comes first: see there why nothing may ask the terminal.
	_ "emendary/ui/ground"
)

func main() { os.Exit(run(os.Args[1:], os.Stdin, os.Stdout, os.Stderr)) }

// run carries out one command line and returns the exit status.
func run(args []string, in io.Reader, out, notes io.Writer) int {
	all, end := context.WithCancel(context.Background())
	defer end()
	ctx, release := heedSignals(all)
	defer release()
	p := &program{in: &interruptible{ctx, in}, printer: newPrinter(in, out, notes), release: release}
	root := newRoot(p)
	root.SetArgs(args)
	err := root.ExecuteContext(ctx)
	if flushed := p.flush(); err == nil {
		err = flushed
	}
	if cause := context.Cause(ctx); err != nil && errors.As(cause, new(interrupted)) {
		err = cause
	}
	return p.status(err)
}

// program is what every command works with.
type program struct {
	*printer
	in      io.Reader
	release func() // gives the signals back, to a screen that heeds them itself
}

// interrupted is the cause that ends a context when a signal came.
type interrupted struct{ signal syscall.Signal }

func (i interrupted) Error() string { return i.signal.String() }

// heedSignals returns a context that the first SIGINT or SIGTERM ends; the next
// one ends the program at once, as it would have without this.
func heedSignals(parent context.Context) (ctx context.Context, release func()) {
	ctx, cancel := context.WithCancelCause(parent)
	signals := make(chan os.Signal, 1)
	signal.Notify(signals, os.Interrupt, syscall.SIGTERM)
	go func() {
		select {
		case s := <-signals:
			signal.Stop(signals)
			if number, ok := s.(syscall.Signal); ok {
				cancel(interrupted{number})
			}
			cancel(nil)
		case <-ctx.Done():
		}
	}()
	return ctx, func() { signal.Stop(signals) }
}

// interruptible is a reader that gives up waiting once ctx ends.
type interruptible struct {
	ctx context.Context
	r   io.Reader
}

func (i *interruptible) Read(b []byte) (int, error) {
	type answer struct {
		data []byte
		err  error
	}
	answers := make(chan answer, 1)
	go func() {
		own := make([]byte, len(b)) // b is the caller's again once Read returns
		n, err := i.r.Read(own)
		answers <- answer{own[:n], err}
	}()
	select {
	case a := <-answers:
		return copy(b, a.data), a.err
	case <-i.ctx.Done():
		return 0, i.ctx.Err()
	}
}
