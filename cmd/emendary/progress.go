package main

import (
	"io"
	"time"

	"github.com/schollz/progressbar/v3"
)

// patience is how long work may take before a progress bar is worth its line.
const patience = 500 * time.Millisecond

// meter shows the progress of long work on a terminal. The zero value shows
// nothing.
type meter struct {
	w     io.Writer // nil for none
	now   func() time.Time
	began time.Time
	bar   *progressbar.ProgressBar
	what  string
}

// newMeter returns a meter on w, which shows something only where w is a terminal.
func newMeter(w io.Writer, terminal bool) *meter {
	if !terminal {
		return &meter{}
	}
	return &meter{w: w, now: time.Now, began: time.Now()}
}

// step says how far the work called what has come.
func (m *meter) step(what string, done, total int) {
	if m.w == nil || total == 0 || m.now().Sub(m.began) < patience {
		return
	}
	if m.bar == nil || m.what != what {
		m.clear()
		m.what = what
		m.bar = progressbar.NewOptions(total, progressbar.OptionSetWriter(m.w), progressbar.OptionSetDescription(what),
			progressbar.OptionClearOnFinish(), progressbar.OptionSetPredictTime(false), progressbar.OptionSetWidth(30),
			progressbar.OptionThrottle(100*time.Millisecond), progressbar.OptionSetRenderBlankState(true))
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
