package main

import (
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"

	"github.com/google/renameio/v2"
)

// placeForCopy returns the file that a copy called out is written to: out itself,
// or what it is a link to. It refuses what must not be replaced: the files in
// keep, by whatever path or link; what is no file; and, without force, any file
// that is there.
func placeForCopy(out string, force bool, keep ...string) (string, error) {
	target, err := filepath.EvalSymlinks(out)
	if errors.Is(err, fs.ErrNotExist) {
		if _, err := os.Lstat(out); err == nil {
			return "", fmt.Errorf("%s: a link to nothing; name another place with -o OUT", out)
		}
		return out, nil
	}
	if err != nil {
		return "", fmt.Errorf("%s: %w; name another place with -o OUT", out, cause(err))
	}
	there, err := os.Stat(target)
	if err != nil {
		return "", fileError(out, err)
	}
	for _, path := range keep {
		if kept, err := os.Stat(path); err == nil && os.SameFile(there, kept) {
			return "", fmt.Errorf("%s: the same file as %s, which is never written over; name another place with -o OUT", out, path)
		}
	}
	switch {
	case there.IsDir():
		return "", fmt.Errorf("%s: a directory; name a file with -o OUT", out)
	case !there.Mode().IsRegular():
		return "", fmt.Errorf("%s: no ordinary file; name another place with -o OUT", out)
	case !force:
		return "", fmt.Errorf("%s: is there already; replace it with --force, or name another place with -o OUT", out)
	}
	return target, nil
}

// writeCopy writes data to path, durably and all at once: before it returns nil,
// what was at path is still there whole.
func writeCopy(path string, data []byte, mode fs.FileMode) (err error) {
	folder := filepath.Dir(path)
	f, err := renameio.NewPendingFile(path, renameio.WithTempDir(folder), renameio.WithStaticPermissions(mode))
	if err != nil {
		return err
	}
	defer func() { err = errors.Join(err, f.Cleanup()) }()
	if _, err := f.Write(data); err != nil {
		return err
	}
	if err := f.CloseAtomicallyReplace(); err != nil {
		return err
	}
	return syncFolder(folder)
}

// syncFolder makes a rename in a folder durable. Where folders cannot be synced,
// as on some network drives, that is no reason to call the copy failed.
func syncFolder(path string) error {
	f, err := os.Open(path)
	if err != nil {
		return nil
	}
	_ = f.Sync()
	return f.Close()
}
