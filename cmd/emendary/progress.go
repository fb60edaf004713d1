package main

import (
	"io"
	"time"

	"github.com/schollz/progressbar/v3"
)

// patience is how long work may take before a progress bar is worth its line.
const patience = 500 * time.Millisecond

// meter shows how far long work has come. The zero value shows nothing.
type meter struct {
	w     io.Writer // nil for none
	what  string
	now   func() time.Time
	began time.Time
	bar   *progressbar.ProgressBar
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
	if m.w == nil || total == 0 || m.now().Sub(m.began) < patience {
		return
	}
	if m.bar == nil {
		m.bar = progressbar.NewOptions(total, progressbar.OptionSetWriter(m.w), progressbar.OptionSetDescription(m.what),
			progressbar.OptionSetTheme(progressbar.ThemeASCII), progressbar.OptionSetWidth(30),
			progressbar.OptionSetPredictTime(false), progressbar.OptionClearOnFinish(), progressbar.OptionThrottle(100*time.Millisecond))
	}
	_ = m.bar.Set(done) // a bar that cannot be drawn is no matter
}

// clear takes the bar off the screen.
func (m *meter) clear() {
	if m.bar != nil {
		_ = m.bar.Clear()
		m.bar = nil
	}
}
