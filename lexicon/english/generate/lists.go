package main

import (
	"bufio"
	"cmp"
	"fmt"
	"maps"
	"os"
	"path/filepath"
	"slices"
	"strconv"
	"strings"

	"emendary/lexicon"
)

// maxLevel is the rarest size of list that is shipped.
const maxLevel = 70

// collection is every word with the lists it stands in.
type collection map[string][]lexicon.Source

func (c collection) add(word string, s lexicon.Source) {
	if !slices.Contains(c[word], s) {
		c[word] = append(c[word], s)
	}
}

// readLists reads the lists in dir and leaves out what is not shipped.
func readLists(dir string) (collection, error) {
	entries, err := os.ReadDir(dir)
	if err != nil {
		return nil, fmt.Errorf("%w; unpack the package scowl and name its folder with -dir", err)
	}
	c := collection{}
	lists := 0
	for _, e := range entries {
		s, ok, err := parseName(e.Name())
		if err != nil {
			return nil, fmt.Errorf("%s: %w", filepath.Join(dir, e.Name()), err)
		}
		if !ok {
			continue
		}
		lists++
		if err := c.readList(filepath.Join(dir, e.Name()), s); err != nil {
			return nil, err
		}
	}
	if lists == 0 {
		return nil, fmt.Errorf("%s has no word lists; unpack the package scowl and name its folder with -dir", dir)
	}
	c.completeBritishIze()
	c.leaveOutRare()
	c.leaveOutPossessives()
	return c, nil
}

// parseName reads a list's name, category-class.level; ok is false for lists
// that are left out whatever their level.
func parseName(name string) (s lexicon.Source, ok bool, err error) {
	rest, level, dotted := strings.Cut(name, ".")
	category, class, dashed := strings.Cut(rest, "-")
	n, err := strconv.ParseUint(level, 10, 8)
	if !dotted || !dashed || err != nil {
		return s, false, fmt.Errorf("not named category-class.level; take it out of the folder")
	}
	return lexicon.Source{Category: category, Class: class, Level: uint8(n)}, category != "special", nil
}

func (c collection) readList(path string, s lexicon.Source) error {
	f, err := os.Open(path)
	if err != nil {
		return err
	}
	defer f.Close()
	lines := bufio.NewScanner(f)
	for lines.Scan() {
		if word := lines.Text(); word != "" {
			c.add(word, s)
		}
	}
	if err := lines.Err(); err != nil {
		return fmt.Errorf("%s: %w", path, err)
	}
	return nil
}

// completeBritishIze files in british_z what british has and british_z lacks
// although no -ise is in question (learnt, enquiry, Koran): any british word but
// those that british_z spells with z in place of s.
func (c collection) completeBritishIze() {
	respelt := map[string]bool{}
	for word := range c {
		if c.in(word, "british_z") && !c.in(word, "british") {
			respelt[strings.ReplaceAll(word, "z", "s")] = true
		}
	}
	for word, sources := range c {
		if c.in(word, "british_z") || respelt[strings.ReplaceAll(word, "z", "s")] {
			continue
		}
		for _, s := range sources {
			if s.Category == "british" {
				s.Category = "british_z"
				c.add(word, s)
			}
		}
	}
}

func (c collection) in(word, category string) bool {
	return slices.ContainsFunc(c[word], func(s lexicon.Source) bool { return s.Category == category })
}

// leaveOutRare leaves out the sizes that are not shipped.
func (c collection) leaveOutRare() {
	for word, sources := range c {
		c[word] = slices.DeleteFunc(sources, func(s lexicon.Source) bool { return s.Level > maxLevel })
	}
	maps.DeleteFunc(c, func(_ string, sources []lexicon.Source) bool { return len(sources) == 0 })
}

// leaveOutPossessives leaves out harbour's where harbour is in. A contraction
// stays.
func (c collection) leaveOutPossessives() {
	maps.DeleteFunc(c, func(word string, sources []lexicon.Source) bool {
		stem, possessive := strings.CutSuffix(word, "'s")
		return possessive && len(c[stem]) > 0 &&
			!slices.ContainsFunc(sources, func(s lexicon.Source) bool { return s.Class == "contractions" })
	})
}

// readAdditions adds the words of a word list, whose second column is the class
// and third the level, to the category that all varieties share.
func (c collection) readAdditions(path string) error {
	f, err := os.Open(path)
	if err != nil {
		return err
	}
	defer f.Close()
	list, err := lexicon.Load(f, path)
	if err != nil {
		return err
	}
	for w := range list.Words() {
		level, err := strconv.ParseUint(w.Note, 10, 8)
		if err != nil || level > maxLevel {
			return fmt.Errorf("%s: the level of %s is %q; give a number up to %d", path, w.Text, w.Note, maxLevel)
		}
		if len(c[w.Text]) > 0 {
			return fmt.Errorf("%s: the package has %s; take it out", path, w.Text)
		}
		c.add(w.Text, lexicon.Source{Category: "english", Class: w.Kind, Level: uint8(level)})
	}
	return nil
}

// flat returns the lexicon in its flat form, and how many words it has.
func (c collection) flat() ([]byte, int, error) {
	words := make([]lexicon.Word, 0, len(c))
	for _, text := range slices.Sorted(maps.Keys(c)) {
		sources := c[text]
		slices.SortFunc(sources, func(a, b lexicon.Source) int {
			return cmp.Or(cmp.Compare(a.Level, b.Level), strings.Compare(a.Category, b.Category), strings.Compare(a.Class, b.Class))
		})
		words = append(words, lexicon.Word{Text: text, Sources: sources})
	}
	list, err := lexicon.NewList("English", words)
	if err != nil {
		return nil, 0, err
	}
	flat, err := list.AppendBinary(nil)
	return flat, list.Len(), err
}
