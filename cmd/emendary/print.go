package main

import (
	"bufio"
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"syscall"

	"golang.org/x/term"

	"emendary/ui/text"
)

// This file prints; nothing else does. The rules of output:
//
//   - What was asked for goes to standard output, and nothing else does, so that
//     it can be piped and parsed.
//   - Errors and notes go to standard error, one line each, after "emendary: ".
//     They begin in lower case, unless with a name, and have no full stop at the
//     end. An error says what is wrong and where; what to do about it comes last,
//     after a semicolon.
//   - Text from files may hold anything: where it is shown rather than passed on
//     as data, control characters are replaced by their symbols.
//   - A reader of standard output that goes away is no error.

// name is what the program calls itself.
const name = "emendary"

// printer writes to standard output and standard error.
type printer struct {
	out   *bufio.Writer
	notes io.Writer
	// Whether there is a terminal at the other end; of standard input too.
	outIsTerminal, notesIsTerminal, inIsTerminal bool
}

func newPrinter(in io.Reader, out, notes io.Writer) *printer {
	return &printer{bufio.NewWriter(out), notes, isTerminal(out), isTerminal(notes), isTerminal(in)}
}

// isTerminal reports whether a stream is a terminal. It asks the system, not
// the terminal.
func isTerminal(stream any) bool {
	f, ok := stream.(*os.File)
	return ok && term.IsTerminal(int(f.Fd()))
}

// sayf writes a line to standard output.
func (p *printer) sayf(format string, args ...any) {
	fmt.Fprintf(p.out, format+"\n", args...)
}

// notef writes a note to standard error, after what standard output still holds.
func (p *printer) notef(format string, args ...any) {
	_ = p.out.Flush() // a failure stays with the writer, and flush reports it
	fmt.Fprintf(p.notes, "%s: %s\n", name, shown(fmt.Sprintf(format, args...)))
}

// flush passes on what has been said so far. The first failure to write stays.
func (p *printer) flush() error {
	if err := p.out.Flush(); err != nil {
		return fmt.Errorf("standard output: %w", err)
	}
	return nil
}

// errDisputes is returned where all is said, but not all lines were taken.
var errDisputes = errors.New("lines in dispute")

// status prints err, if it is one to be printed, and returns the exit status: 0
// where all went well, 1 where rulings were disputed, 2 for an error, 128 and the
// signal's number after a signal (so 130 after SIGINT).
func (p *printer) status(err error) int {
	var i interrupted
	switch {
	case err == nil:
		return 0
	case errors.Is(err, errDisputes):
		return 1
	case errors.As(err, &i):
		return 128 + int(i.signal)
	case errors.Is(err, syscall.EPIPE):
		return 128 + int(syscall.SIGPIPE)
	case errors.Is(err, context.Canceled):
		return 128 + int(syscall.SIGINT)
	}
	p.notef("%v", err)
	return 2
}

// counted returns a number with the noun that goes with it.
func counted(n int, one, many string) string {
	if n == 1 {
		return "1 " + one
	}
	return fmt.Sprintf("%d %s", n, many)
}

// shown returns text fit for a line of a terminal.
func shown(s string) string { return text.Visible(s, false) }
