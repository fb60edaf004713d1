// Package shelf finds the house and series lists and changes them: plain word
// lists that several books, sessions and editors share.
//
// Find tells where a list is, List which there are; Put adds a word and Take
// takes it off again. A list is a text file: one word a line, then perhaps a tab
// and its kind, a tab and a note; # starts a comment; "okay → OK" bars a word. It
// belongs to the editor, who may edit it by hand: this package changes the one
// line it is asked to and keeps every other byte. Reading a list into a lexicon is
// left to others.
package shelf

import (
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"unicode"

	"golang.org/x/text/unicode/norm"
)

// extension ends the file name of every list that goes by a name.
const extension = ".txt"

// maxName bounds a name in bytes: file systems allow 255, and a change needs some
// for its temporary file.
const maxName = 200

// Dir returns the folder in which the lists live that go by a name:
// emendary/lists in $XDG_DATA_HOME, or in ~/.local/share where that is unset,
// empty or not absolute (XDG Base Directory Specification 0.8). The environment is
// read at each call. The folder need not exist.
func Dir() (string, error) {
	data := os.Getenv("XDG_DATA_HOME")
	if !filepath.IsAbs(data) {
		home, err := os.UserHomeDir()
		if err != nil {
			return "", errors.New("no folder for lists: neither XDG_DATA_HOME nor HOME is set; set one, or name a list by its file")
		}
		data = filepath.Join(home, ".local", "share")
	}
	return filepath.Join(data, "emendary", "lists"), nil
}

// Find returns the absolute path of a list given by name or by file. What has a
// path separator in it, or is a file in the current folder, is a file; all else is
// a name and means NAME.txt in Dir, with or without the .txt. Names are made of
// letters, digits, spaces and - _ . and do not begin with a point, nor begin or
// end with a space. The list need not exist: Put creates it.
func Find(nameOrPath string) (path string, err error) {
	if nameOrPath == "" {
		return "", errors.New("a list needs a name or a file; none was given")
	}
	if strings.ContainsRune(nameOrPath, '/') || strings.ContainsRune(nameOrPath, filepath.Separator) || isFile(nameOrPath) {
		return filepath.Abs(nameOrPath)
	}
	name := norm.NFC.String(strings.TrimSuffix(nameOrPath, extension))
	if err := checkName(name); err != nil {
		return "", err
	}
	dir, err := Dir()
	if err != nil {
		return "", err
	}
	return filepath.Join(dir, name+extension), nil
}

// List returns the names of the lists in Dir, sorted; none where there is no such
// folder. Files that Find would not find by name are left out.
func List() ([]string, error) {
	dir, err := Dir()
	if err != nil {
		return nil, err
	}
	entries, err := os.ReadDir(dir)
	if errors.Is(err, fs.ErrNotExist) {
		return nil, nil
	}
	if err != nil {
		return nil, fmt.Errorf("%s: lists cannot be read: %w", dir, cause(err))
	}
	var names []string
	for _, e := range entries {
		name, ok := strings.CutSuffix(e.Name(), extension)
		if ok && checkName(name) == nil && isFile(filepath.Join(dir, e.Name())) {
			names = append(names, name)
		}
	}
	slices.Sort(names)
	return names, nil
}

func isFile(path string) bool {
	info, err := os.Stat(path)
	return err == nil && !info.IsDir()
}

func checkName(name string) error {
	switch {
	case name == "", strings.HasPrefix(name, "."), strings.TrimSpace(name) != name, len(name) > maxName:
	case strings.ContainsFunc(name, func(r rune) bool {
		return r == unicode.ReplacementChar || !unicode.In(r, unicode.L, unicode.M, unicode.Nd) && !strings.ContainsRune("-_ .", r)
	}):
	default:
		return nil
	}
	return fmt.Errorf("%.60q cannot name a list; use letters, digits, spaces and - _ ., or give a file with its folder", name)
}

// cause strips the path from a system error: it stands at the head of the line.
func cause(err error) error {
	var p *fs.PathError
	if errors.As(err, &p) {
		return p.Err
	}
	return err
}
