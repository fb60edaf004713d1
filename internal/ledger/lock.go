package ledger

import (
	"errors"
	"fmt"
	"io"
	"os"
	"strconv"
	"strings"
	"time"
	"unicode"

	"github.com/gofrs/flock"
)

// InUse is the error of Open where another session has the ledger. What is not
// known of the other session is zero.
type InUse struct {
	Path  string // the ledger, as it was asked for
	Who   string
	Host  string
	PID   int
	Since time.Time
}

// Error says who has the ledger, where and since when (local time).
func (e *InUse) Error() string {
	var b strings.Builder
	b.WriteString(e.Path + ": in use by ")
	if e.Who == "" {
		b.WriteString("another session")
	} else {
		b.WriteString(e.Who)
	}
	if e.Host != "" {
		b.WriteString(" on " + e.Host)
	}
	if !e.Since.IsZero() {
		b.WriteString(" since " + e.Since.Local().Format("2006-01-02 15:04"))
	}
	b.WriteString("; close that review and try again")
	return b.String()
}

// lockTries bounds how often take starts again because the holder before it
// removed the lock file in between. Each round needs another session to open and
// close the ledger, so that more than a few mean it is in busy use.
const lockTries = 100

// lock is the advisory lock on a ledger: a file beside it that the system locks
// for as long as the process lives, so that a killed session leaves no lock
// behind. The file's text says who holds it; it is for people and is not trusted.
type lock struct {
	file *flock.Flock
}

// take locks the file at path, creating it where it is missing, and writes who
// holds it. It returns *InUse (without its Path) where another session has it.
//
// The holder removes the file when it lets go. A session that had opened the old
// file by then would lock a file that nobody else can see; so take compares the
// file it locked with the one at path, and starts again where they differ.
func take(path, who string) (*lock, error) {
	for range lockTries {
		f := flock.New(path)
		got, err := f.TryLock()
		if err != nil {
			return nil, err
		}
		if !got {
			return nil, readHolder(path)
		}
		locked, err := f.Stat()
		if err == nil {
			var there os.FileInfo
			if there, err = os.Stat(path); err == nil && os.SameFile(locked, there) {
				// Who holds the lock is a courtesy: the lock holds without it.
				_ = os.WriteFile(path, holderText(who), 0o600)
				return &lock{file: f}, nil
			}
		}
		_ = f.Unlock()
		if err != nil && !errors.Is(err, os.ErrNotExist) {
			return nil, err
		}
	}
	return nil, &InUse{}
}

// release removes the lock file while it is still locked, then lets go of it.
func (l *lock) release() error {
	err := os.Remove(l.file.Path())
	if errors.Is(err, os.ErrNotExist) {
		err = nil
	}
	return errors.Join(err, l.file.Unlock())
}

func holderText(who string) []byte {
	host, _ := os.Hostname() // unknown is empty
	return fmt.Appendf(nil, "ledger in use\nwho: %s\nhost: %s\npid: %d\nsince: %s\n",
		oneLine(who), oneLine(host), os.Getpid(), time.Now().UTC().Format(time.RFC3339))
}

// readHolder reads what holderText wrote, as far as it can be read.
func readHolder(path string) *InUse {
	e := &InUse{}
	f, err := os.Open(path)
	if err != nil {
		return e
	}
	defer f.Close()
	text, err := io.ReadAll(io.LimitReader(f, 4096))
	if err != nil {
		return e
	}
	for line := range strings.Lines(string(text)) {
		key, value, _ := strings.Cut(line, ":")
		value = oneLine(value)
		switch key {
		case "who":
			e.Who = value
		case "host":
			e.Host = value
		case "pid":
			e.PID, _ = strconv.Atoi(value)
		case "since":
			e.Since, _ = time.Parse(time.RFC3339, value)
		}
	}
	return e
}

// oneLine makes text from outside fit to stand in a one-line message: what is not
// printable becomes a space, and what is longer than a name is cut.
func oneLine(s string) string {
	s = strings.Map(func(r rune) rune {
		if !unicode.IsPrint(r) {
			return ' '
		}
		return r
	}, s)
	s = strings.Join(strings.Fields(s), " ")
	if r := []rune(s); len(r) > 100 {
		s = string(r[:100]) + "…"
	}
	return s
}
