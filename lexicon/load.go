package lexicon

import (
	"bufio"
	"bytes"
	"errors"
	"fmt"
	"io"
	"strings"
	"unicode"
	"unicode/utf8"
)

// maxLine is the most bytes a line of a list may have.
const maxLine = 64 << 10

// Load reads a word list and returns it under the given name. The list is UTF-8
// text, with or without a byte-order mark, its lines ended by LF or CR LF:
//
//	# Practice of the house.
//	harbourside                  # one word a line
//	Sallow Quay’s                ← refused: two words
//	Merrin⇥person⇥the pilot      a tab and the word's kind, a tab and a note
//	okay → OK                    bars okay and names OK instead; -> will do
//	alright →                    bars alright alone
//
// A # begins a comment where it begins a line or follows a blank, up to the
// second tab: a note is kept as it stands. Kind and note may be missing or empty.
// What stands instead of a barred word may be several words. Of lines for the
// same word, the last one stands, so that a list can be added to at its end.
//
// The error names the list, the line and the remedy. A line is refused that holds
// more than one word, more than three columns, nothing that is a letter or a
// digit, a word of more than [MaxLetters] letters, bytes that are not UTF-8, or
// characters that cannot be seen, such as control characters.
func Load(r io.Reader, name string) (*List, error) {
	b := newListBuilder(name)
	if err := scan(r, name, b.add); err != nil {
		return nil, err
	}
	return b.list()
}

// ReadWords returns the words of a list that Load would read, in the order of its lines
// and each as often as it stands there, without making a list of them: for lists
// that are put together from several. Its errors are those of Load, but for words
// of too many letters, which NewList refuses.
func ReadWords(r io.Reader, name string) ([]Word, error) {
	var words []Word
	err := scan(r, name, func(w Word) error {
		words = append(words, w)
		return checkWord(w)
	})
	if err != nil {
		return nil, err
	}
	return words, nil
}

// scan hands the words of a list's lines to take, one by one.
func scan(r io.Reader, name string, take func(Word) error) error {
	lines := bufio.NewScanner(r)
	lines.Buffer(nil, maxLine)
	lines.Split(scanLine)
	number := 0
	for lines.Scan() {
		number++
		line := lines.Text()
		if number == 1 {
			line = strings.TrimPrefix(line, "\ufeff")
		}
		w, ok, err := parseLine(line)
		if err == nil && ok {
			err = take(w)
		}
		if err != nil {
			return fmt.Errorf("%s: line %d: %w", name, number, err)
		}
	}
	if err := lines.Err(); errors.Is(err, bufio.ErrTooLong) {
		return fmt.Errorf("%s: line %d: longer than %d bytes; give each word a line of its own", name, number+1, maxLine)
	} else if err != nil {
		return fmt.Errorf("%s: after line %d: %w", name, number, err)
	}
	return nil
}

// scanLine splits at LF and takes one CR before it off.
func scanLine(data []byte, atEOF bool) (advance int, token []byte, err error) {
	if i := bytes.IndexByte(data, '\n'); i >= 0 {
		return i + 1, bytes.TrimSuffix(data[:i], []byte{'\r'}), nil
	}
	if atEOF && len(data) > 0 {
		return len(data), bytes.TrimSuffix(data, []byte{'\r'}), nil
	}
	return 0, nil, nil
}

// parseLine returns the word of a line; ok is false where it has none.
func parseLine(line string) (w Word, ok bool, err error) {
	if i := invalidUTF8(line); i >= 0 {
		return w, false, fmt.Errorf("byte %d is not UTF-8; save the list as UTF-8", i+1)
	}
	first, rest, _ := strings.Cut(line, "\t")
	second, note, _ := strings.Cut(rest, "\t")
	note = strings.TrimSpace(note)
	first, commented := cutComment(first)
	if commented {
		second, note = "", ""
	} else if second, commented = cutComment(second); commented {
		note = ""
	}
	if first == "" {
		if second != "" || note != "" {
			return w, false, errors.New("no word before the first tab; start the line with the word, or with # for a comment")
		}
		return w, false, nil
	}
	w = Word{Text: first, Kind: second, Note: note}
	for _, arrow := range []string{"→", "->"} {
		if word, instead, found := strings.Cut(first, arrow); found {
			w.Text, w.Instead, w.Barred = strings.TrimSpace(word), strings.TrimSpace(instead), true
			break
		}
	}
	return w, true, nil
}

// cutComment returns a column without its comment and the blanks around it.
func cutComment(column string) (string, bool) {
	for i := 0; i < len(column); i++ {
		if column[i] == '#' && (i == 0 || column[i-1] == ' ') {
			return strings.TrimSpace(column[:i]), true
		}
	}
	return strings.TrimSpace(column), false
}

// checkWord returns what is wrong with a word of a list, all but its length.
func checkWord(w Word) error {
	switch {
	case w.Text == "" && w.Barred:
		return errors.New("no word before the arrow; give the word that is barred")
	case w.Text == "":
		return errors.New("the word is empty; give it or leave it out")
	case strings.ContainsFunc(w.Text, unicode.IsSpace):
		return errors.New("more than one word; give each word a line of its own")
	case strings.ContainsRune(w.Note, '\t'):
		return errors.New("more than three columns; give word, kind and note")
	}
	for _, text := range []string{w.Text, w.Kind, w.Note, w.Instead} {
		if i := invalidUTF8(text); i >= 0 {
			return fmt.Errorf("byte %d of %.40q is not UTF-8; save the list as UTF-8", i+1, text)
		}
		for _, r := range text {
			if !visible(r) {
				return fmt.Errorf("character U+%04X cannot be seen; delete it", r)
			}
		}
	}
	if !strings.ContainsFunc(w.Text, func(r rune) bool { return unicode.IsLetter(r) || unicode.IsNumber(r) }) {
		return fmt.Errorf("%.40q has no letter; begin the line with # to make it a comment", w.Text)
	}
	return nil
}

// visible reports whether r may stand in a list: what can be seen, and the two
// joiners that some scripts spell with.
func visible(r rune) bool {
	return unicode.IsGraphic(r) || r == '\u200c' || r == '\u200d'
}

// invalidUTF8 returns the index of the first byte that is not UTF-8, or -1.
func invalidUTF8(s string) int {
	for i, r := range s {
		if r == utf8.RuneError {
			if _, size := utf8.DecodeRuneInString(s[i:]); size == 1 {
				return i
			}
		}
	}
	return -1
}
