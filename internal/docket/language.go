package docket

import (
	"errors"
	"fmt"
	"path/filepath"
	"strings"

	"emendary/lexicon"
)

// Language is another language with a file of its words.
type Language struct {
	Name string // as candidates and reports give it
	File string
}

// ParseLanguage reads LANG=FILE.
func ParseLanguage(s string) (Language, error) {
	name, file, ok := strings.Cut(s, "=")
	name = strings.TrimSpace(name)
	if !ok || name == "" || file == "" || strings.ContainsAny(s, "\n\r\t") {
		return Language{}, errors.New("is not LANG=FILE, such as cornish=words.txt")
	}
	return Language{name, file}, nil
}

// writeLanguages writes languages as the ledger keeps them: LANG=FILE, one a line,
// the files by their whole path, since the next session may start elsewhere.
func writeLanguages(languages []Language) (string, error) {
	lines := make([]string, len(languages))
	for i, l := range languages {
		path, err := filepath.Abs(l.File)
		if err != nil {
			return "", err
		}
		lines[i] = l.Name + "=" + path
	}
	return strings.Join(lines, "\n"), nil
}

// readLanguages reads what writeLanguages wrote.
func readLanguages(s string) ([]Language, error) {
	var out []Language
	for line := range strings.Lines(s) {
		line = strings.TrimSuffix(line, "\n")
		l, err := ParseLanguage(line)
		if err != nil {
			return nil, fmt.Errorf("the ledger remembers %.40q, which %w; give --with anew", line, err)
		}
		out = append(out, l)
	}
	return out, nil
}

// foreignWords returns the words of the languages that base has no entry for, each
// with its language as its kind; nil where there is no language. What base lists,
// in whatever variety, is for base to judge.
func foreignWords(base *lexicon.Lexicon, languages []Language) (*lexicon.List, error) {
	if len(languages) == 0 {
		return nil, nil
	}
	at := map[string]int{}
	var words []lexicon.Word
	var names []string
	for _, l := range languages {
		read, err := fromFile(l.File, wantWords, lexicon.ReadWords)
		if err != nil {
			return nil, err
		}
		names = append(names, l.Name)
		own := map[string]bool{}
		for _, w := range read {
			if own[w.Text] || w.Barred {
				continue
			}
			own[w.Text] = true
			if i, ok := at[w.Text]; ok {
				words[i].Kind += ", " + l.Name
			} else if base.Find(w.Text).Status == lexicon.Unknown {
				at[w.Text] = len(words)
				words = append(words, lexicon.Word{Text: w.Text, Kind: l.Name})
			}
		}
	}
	return lexicon.NewList(strings.Join(names, ", "), words)
}
