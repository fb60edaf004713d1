package shelf

import (
	"bytes"
	"context"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"time"

	"github.com/gofrs/flock"
)

const (
	// patience is how long a change waits for another one to finish, which takes
	// as long as writing a small file.
	patience = 10 * time.Second
	// poll is how often it looks.
	poll = 2 * time.Millisecond
)

// Put puts word on the list at path with a kind and a note, either of which may
// be empty: in place of the line of that very word if the list has one (the last,
// if several; also one that bars it), else at the end. Every other byte stays. A
// list that does not exist is created (mode 0600, folders 0700) with a heading.
//
// The change is atomic and durable, and none is lost where several processes make
// theirs at once. A word with a space, control character or arrow in it, or with #
// at its start, is refused; in kind and note such characters become spaces. It
// takes O(size of the list) time and two waits for the disk.
func Put(path, word, kind, note string) error {
	line, err := format(word, kind, note)
	if err != nil {
		return fmt.Errorf("%s: %w", path, err)
	}
	if err := os.MkdirAll(filepath.Dir(path), 0o700); err != nil {
		return fmt.Errorf("%s: the folder cannot be made: %w", path, cause(err))
	}
	return change(path, func(text []byte) []byte { return put(text, line) })
}

// Take removes the line that Put wrote for the same arguments, and says whether
// it did: false means that the line is not there any more as it was put, or that
// there is no list. A line that Put had replaced does not come back. Every other
// byte stays; the change is made as Put makes it.
func Take(path, word, kind, note string) (did bool, err error) {
	line, err := format(word, kind, note)
	if err != nil {
		return false, fmt.Errorf("%s: %w", path, err)
	}
	if _, err := os.Stat(path); errors.Is(err, fs.ErrNotExist) {
		return false, nil
	}
	err = change(path, func(text []byte) []byte {
		text, did = take(text, line)
		return text
	})
	return did && err == nil, err
}

// Line returns the line that the list at path has about word, as it stands there,
// and whether there is one. Where Put would replace something, this is what.
func Line(path, word string) (line string, ok bool, err error) {
	text, err := os.ReadFile(path)
	if errors.Is(err, fs.ErrNotExist) {
		return "", false, nil
	}
	if err != nil {
		return "", false, fmt.Errorf("%s: the list cannot be read: %w", path, cause(err))
	}
	want := wordOf([]byte(word))
	lines := split(text)
	i := last(lines, func(l []byte) bool { return want != "" && wordOf(l) == want })
	if i < 0 {
		return "", false, nil
	}
	return string(bytes.TrimPrefix(body(lines[i]), []byte(byteOrderMark))), true, nil
}

// change replaces the text of the list at path by what edit makes of it, under a
// lock and in one step. A symbolic link stays one: what it leads to is changed.
func change(path string, edit func([]byte) []byte) error {
	file := path
	if real, err := filepath.EvalSymlinks(path); err == nil {
		file = real
	}
	lock, err := hold(file)
	if err != nil {
		return fmt.Errorf("%s: the list cannot be changed: %w", path, cause(err))
	}
	defer lock.Unlock()
	text, err := os.ReadFile(file)
	if err != nil {
		return fmt.Errorf("%s: the list cannot be read: %w", path, cause(err))
	}
	if bytes.IndexByte(text, 0) >= 0 {
		return fmt.Errorf("%s: this is no word list (it holds a zero byte); name a text file in UTF-8", path)
	}
	edited := edit(text)
	if bytes.Equal(edited, text) {
		return nil
	}
	if err := replace(file, edited); err != nil {
		return fmt.Errorf("%s: the list cannot be written: %w", path, cause(err))
	}
	return nil
}

// hold locks the list itself, creating it where it is missing, so that no file is
// left lying beside it. A change puts a new file in the old one's place; whoever
// waited for the old one finds that out by comparing, and waits for the new one.
func hold(file string) (*flock.Flock, error) {
	ctx, cancel := context.WithTimeout(context.Background(), patience)
	defer cancel()
	for {
		f := flock.New(file)
		if _, err := f.TryLockContext(ctx, poll); err != nil {
			if errors.Is(err, context.DeadlineExceeded) {
				return nil, errors.New("another program keeps it locked; close that program and try again")
			}
			return nil, err
		}
		locked, err := f.Stat()
		if err == nil {
			var there os.FileInfo
			if there, err = os.Stat(file); err == nil && os.SameFile(locked, there) {
				return f, nil
			}
		}
		_ = f.Unlock()
		if err != nil && !errors.Is(err, fs.ErrNotExist) {
			return nil, err
		}
	}
}

// replace puts a file with the given text in the place of file, keeping its mode.
// A crash leaves the old text or the new.
func replace(file string, text []byte) (err error) {
	info, err := os.Stat(file)
	if err != nil {
		return err
	}
	dir := filepath.Dir(file)
	fresh, err := os.CreateTemp(dir, "."+filepath.Base(file)+".*")
	if err != nil {
		return err
	}
	defer func() {
		if err != nil {
			err = errors.Join(err, fresh.Close(), os.Remove(fresh.Name()))
		}
	}()
	if _, err := fresh.Write(text); err != nil {
		return err
	}
	if err := fresh.Chmod(info.Mode().Perm()); err != nil {
		return err
	}
	if err := fresh.Sync(); err != nil {
		return err
	}
	if err := os.Rename(fresh.Name(), file); err != nil {
		return err
	}
	_ = fresh.Close() // on disk already
	if d, err := os.Open(dir); err == nil {
		_ = d.Sync() // not every file system can
		_ = d.Close()
	}
	return nil
}
