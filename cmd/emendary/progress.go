package main

import (
	"fmt"
	"io"
	"time"

	"github.com/charmbracelet/bubbles/progress"
	"github.com/charmbracelet/x/ansi"
	"github.com/muesli/termenv"
)

// patience is how long work may take before a progress bar is worth its line, and
// pause how long a bar stays as it is.
const (
	patience = 500 * time.Millisecond
	pause    = 100 * time.Millisecond
)

// meter shows how far long work has come. The zero value shows nothing.
type meter struct {
	w     io.Writer // nil for none
	what  string
	now   func() time.Time
	began time.Time
	drawn time.Time // zero where no bar is on the screen
}

// meter returns a meter of the work called what. It shows something only where
// standard error is a terminal.
func (p *program) meter(what string) *meter {
	if !p.notesIsTerminal {
		return &meter{}
	}
	return &meter{w: p.notes, what: what, now: time.Now, began: time.Now()}
}

// step says how far the work has come.
func (m *meter) step(done, total int) {
	if m.w == nil || total == 0 {
		return
	}
	now := m.now()
	if now.Sub(m.began) < patience || now.Sub(m.drawn) < pause {
		return
	}
	m.drawn = now
	bar := progress.New(progress.WithWidth(30), progress.WithFillCharacters('=', ' '), progress.WithoutPercentage(),
		progress.WithColorProfile(termenv.Ascii))
	part := float64(done) / float64(total)
	fmt.Fprintf(m.w, "\r%s %3.0f%% [%s]", m.what, 100*part, bar.ViewAs(part))
}

// clear takes the bar off the screen.
func (m *meter) clear() {
	if !m.drawn.IsZero() {
		fmt.Fprint(m.w, "\r"+ansi.EraseEntireLine+"\r")
		m.drawn = time.Time{}
	}
}
