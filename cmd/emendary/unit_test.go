package main

import (
	"bytes"
	"context"
	"errors"
	"io"
	"iter"
	"math/rand/v2"
	"os"
	"path/filepath"
	"runtime"
	"strings"
	"sync/atomic"
	"syscall"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

func TestNearest(t *testing.T) {
	names := []string{"review", "docket", "candidates", "align", "rule", "apply", "report", "version"}
	for given, want := range map[string]string{
		"reveiw": "review", "dockets": "docket", "Docket": "docket", "candidate": "candidates", "cand": "candidates",
		"aling": "align", "rules": "rule", "aply": "apply", "zzz": "", "": "", "x": "", "harbour": "",
	} {
		assert.Equal(t, want, nearest(given, names), given)
	}
}

func TestEmendedName(t *testing.T) {
	for manuscript, want := range map[string]string{
		"novel.md": "novel.emended.md", "a/novel.txt": "a/novel.emended.txt", "novel": "novel.emended",
		".novel": ".novel.emended", "v1.2/novel": "v1.2/novel.emended", "novel.tar.md": "novel.tar.emended.md",
	} {
		assert.Equal(t, want, emendedName(manuscript))
	}
}

func TestCounted(t *testing.T) {
	for n, want := range map[int]string{0: "0 entries", 1: "1 entry", 2: "2 entries"} {
		assert.Equal(t, want, counted(n, "entry", "entries"))
	}
}

func TestShare(t *testing.T) {
	for share, want := range map[float64]string{1: "100 %", 0.615: "62 %", 0.005: "0 %", 0.0049: "<1 %", 0: "<1 %"} {
		assert.Equal(t, want, listedCandidate{Share: &share}.share("%s"))
	}
	assert.Empty(t, listedCandidate{}.share("%s"))
}

func TestStatus(t *testing.T) {
	for _, c := range []struct {
		err   error
		want  int
		notes string
	}{
		{nil, 0, ""},
		{errDisputes, 1, ""},
		{errors.New("novel.md: no such file"), 2, "emendary: novel.md: no such file\n"},
		{errors.New("a\nb\x1b[2J"), 2, "emendary: a b␛[2J\n"},
		{interrupted{syscall.SIGINT}, 130, ""},
		{interrupted{syscall.SIGTERM}, 143, ""},
		{context.Canceled, 130, ""},
		{&os.PathError{Op: "write", Path: "/dev/stdout", Err: syscall.EPIPE}, 141, ""},
	} {
		var notes bytes.Buffer
		p := &program{printer: newPrinter(nil, io.Discard, &notes)}
		assert.Equal(t, c.want, p.status(c.err), "%v", c.err)
		assert.Equal(t, c.notes, notes.String())
	}
}

func TestInOrder(t *testing.T) {
	random := rand.New(rand.NewPCG(1, 2))
	items := make([]int, 500)
	for i := range items {
		items[i] = random.IntN(1000)
	}
	var working, most atomic.Int32
	var got []int
	err := inOrder(context.Background(), withoutError(items), func(_ context.Context, n int) (int, error) {
		now := working.Add(1)
		defer working.Add(-1)
		for old := most.Load(); now > old && !most.CompareAndSwap(old, now); old = most.Load() {
		}
		for range n { // so that later items may be done before earlier ones
			runtime.Gosched()
		}
		return n, nil
	}, func(n int) error { got = append(got, n); return nil })
	require.NoError(t, err)
	assert.Equal(t, items, got)
	assert.LessOrEqual(t, int(most.Load()), runtime.GOMAXPROCS(0))
}

func TestInOrderStopsAtTheFirstError(t *testing.T) {
	trouble := errors.New("trouble")
	forever := func(bad int) iter.Seq2[int, error] {
		return func(yield func(int, error) bool) {
			for i := 0; ; i++ {
				var err error
				if i == bad {
					err = trouble
				}
				if !yield(i, err) {
					return
				}
			}
		}
	}
	same := func(_ context.Context, n int) (int, error) { return n, nil }
	collect := func(into *[]int) func(int) error {
		return func(n int) error { *into = append(*into, n); return nil }
	}
	for name, c := range map[string]struct {
		items iter.Seq2[int, error]
		work  func(context.Context, int) (int, error)
		emit  func(into *[]int) func(int) error
	}{
		"of the items": {forever(3), same, collect},
		"of the work": {forever(-1), func(_ context.Context, n int) (int, error) {
			if n >= 3 {
				return 0, trouble
			}
			return n, nil
		}, collect},
		"of emit": {forever(-1), same, func(into *[]int) func(int) error {
			return func(n int) error {
				if n == 3 {
					return trouble
				}
				return collect(into)(n)
			}
		}},
	} {
		t.Run(name, func(t *testing.T) {
			var got []int
			err := inOrder(context.Background(), c.items, c.work, c.emit(&got))
			assert.ErrorIs(t, err, trouble)
			assert.Equal(t, []int{0, 1, 2}, got)
		})
	}
	t.Run("of the context", func(t *testing.T) {
		ctx, cancel := context.WithCancel(context.Background())
		var got []int
		err := inOrder(ctx, forever(-1), same, func(n int) error {
			if got = append(got, n); n == 2 {
				cancel()
			}
			return nil
		})
		assert.ErrorIs(t, err, context.Canceled)
		assert.Less(t, len(got), 1000)
	})
}

func TestLines(t *testing.T) {
	read := func(text string) (got []string, err error) {
		for line, e := range lines(strings.NewReader(text), "standard input") {
			if e != nil {
				return got, e
			}
			got = append(got, line)
		}
		return got, nil
	}
	got, err := read("harber\r\n\n  lantrn \nlast")
	require.NoError(t, err)
	assert.Equal(t, []string{"harber", "lantrn", "last"}, got)
	got, err = read("harber\nlan\xfftrn\n")
	assert.EqualError(t, err, "standard input: line 2: not valid UTF-8; convert it first")
	assert.Equal(t, []string{"harber"}, got)
	_, err = read("\n" + strings.Repeat("x", longestForm+1))
	assert.EqualError(t, err, "standard input: line 2: longer than 1024 bytes; give one word a line")
}

func TestAReaderGivesUpWaiting(t *testing.T) {
	silent, _ := io.Pipe()
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	_, err := (&interruptible{ctx, silent}).Read(make([]byte, 1))
	assert.ErrorIs(t, err, context.Canceled)
	all, err := io.ReadAll(&interruptible{context.Background(), strings.NewReader("all of it")})
	require.NoError(t, err)
	assert.Equal(t, "all of it", string(all))
}

func TestTheMeterShowsLongWorkAlone(t *testing.T) {
	var screen bytes.Buffer
	now := time.Unix(0, 0)
	m := &meter{w: &screen, what: "reading", now: func() time.Time { return now }, began: now}
	m.step(1, 10)
	now = now.Add(patience - 1)
	m.step(2, 10)
	assert.Empty(t, screen.String())
	now = now.Add(1)
	m.step(3, 10)
	bar := "\rreading  30% [=========                     ]"
	assert.Equal(t, bar, screen.String())
	now = now.Add(pause - 1)
	m.step(4, 10)
	assert.Equal(t, bar, screen.String(), "a bar so new stays")
	m.clear()
	assert.Equal(t, bar+"\r\x1b[2K\r", screen.String())
	m.clear()
	assert.Equal(t, bar+"\r\x1b[2K\r", screen.String())

	screen.Reset()
	p := &program{printer: newPrinter(nil, io.Discard, &screen)} // no terminal
	quiet := p.meter("reading")
	quiet.step(1, 1)
	quiet.clear()
	assert.Empty(t, screen.String())
}

func TestACopyIsWrittenWholeAndKeepsTheMode(t *testing.T) {
	folder := t.TempDir()
	path := filepath.Join(folder, "copy.md")
	for _, text := range []string{"first", "second"} {
		require.NoError(t, writeCopy(path, []byte(text), 0o640))
		assert.Equal(t, text, readFile(t, path))
		info, err := os.Stat(path)
		require.NoError(t, err)
		assert.Equal(t, os.FileMode(0o640), info.Mode().Perm())
	}
	left, err := os.ReadDir(folder)
	require.NoError(t, err)
	assert.Len(t, left, 1, "a temporary file is left")
}
