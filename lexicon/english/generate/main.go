// Command generate builds the embedded base lexicon of English from Debian's
// package scowl, unpacked, and a list of additions. Package english tells how to
// run it. The same input gives the same bytes.
package main

import (
	"flag"
	"fmt"
	"os"
	"path/filepath"
)

func main() {
	dir := flag.String("dir", "scowl", "the folder that the package scowl is unpacked in; / where it is installed")
	additions := flag.String("additions", "additions.txt", "word list with the additions")
	out := flag.String("out", ".", "the folder to write english.lexicon, source.go and COPYRIGHT to")
	flag.Parse()
	if err := generate(*dir, *additions, *out); err != nil {
		fmt.Fprintln(os.Stderr, "generate:", err)
		os.Exit(1)
	}
}

func generate(dir, additions, out string) error {
	collected, err := readLists(filepath.Join(dir, "usr/share/dict/scowl"))
	if err != nil {
		return err
	}
	if err := collected.readAdditions(additions); err != nil {
		return err
	}
	flat, words, err := collected.flat()
	if err != nil {
		return err
	}
	doc := filepath.Join(dir, "usr/share/doc/scowl")
	release, err := readRelease(filepath.Join(doc, "changelog.Debian.gz"))
	if err != nil {
		return err
	}
	copyright, err := os.ReadFile(filepath.Join(doc, "copyright"))
	if err != nil {
		return err
	}
	for name, content := range map[string][]byte{
		"english.lexicon": flat,
		"source.go":       release.source(flat, words),
		"COPYRIGHT":       copyright,
	} {
		if err := os.WriteFile(filepath.Join(out, name), content, 0o644); err != nil {
			return err
		}
	}
	return nil
}
