package docket

import (
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"strings"

	"emendary/internal/shelf"
	"emendary/lexicon"
	"emendary/lexicon/english"
)

// Words puts a base lexicon and lists together, in any variety: the words of a
// file in place of the English base, a house and a series list by name or file;
// "" leaves each out. A list by a name that is new is empty. The words of other
// languages are those that the base lacks altogether. base is the name of the base
// lexicon, paths the files of the lists by "house" and "series".
func Words(file, house, series string, with []Language) (lex *lexicon.Lexicon, base string, paths map[string]string, err error) {
	list := english.Base()
	if file != "" {
		if list, err = load(file); err != nil {
			return nil, "", nil, err
		}
	}
	lex, base, paths = lexicon.New(list, lexicon.AnyVariety), list.Name(), map[string]string{}
	if foreign, err := foreignWords(lex, with); err != nil {
		return nil, "", nil, err
	} else if foreign != nil {
		lex = lex.With(lexicon.Foreign, foreign)
	}
	for _, l := range []struct {
		setting, value string
		layer          lexicon.Layer
	}{{settingHouse, house, lexicon.House}, {settingSeries, series, lexicon.Series}} {
		if l.value == "" {
			continue
		}
		path, err := shelf.Find(l.value)
		if err != nil {
			return nil, "", nil, err
		}
		list, err := load(path)
		if errors.Is(err, fs.ErrNotExist) && !strings.ContainsAny(l.value, `/\`) {
			list, err = lexicon.NewList(l.value, nil) // it comes into being with its first word
		}
		if err != nil {
			return nil, "", nil, err
		}
		paths[l.setting] = path
		lex = lex.With(l.layer, list)
	}
	return lex, base, paths, nil
}

func load(path string) (*lexicon.List, error) { return fromFile(path, wantWords, lexicon.Load) }

// wantWords says what to name where a word list can't be opened.
const wantWords = "name a word list, one word a line"

// fromFile reads a file; want says what to name where it can't be opened.
func fromFile[T any](path, want string, read func(io.Reader, string) (T, error)) (none T, err error) {
	f, err := os.Open(path)
	var named *fs.PathError
	if errors.As(err, &named) {
		err = named.Err
	}
	if err != nil {
		return none, fmt.Errorf("%s: %w; %s", path, err, want)
	}
	defer f.Close()
	return read(f, path)
}
