package manuscript

import (
	"bytes"
	"errors"
	"fmt"
	"sort"
	"unicode/utf16"
	"unicode/utf8"

	"golang.org/x/text/encoding"
	"golang.org/x/text/encoding/htmlindex"
	"golang.org/x/text/unicode/norm"
)

// The WHATWG labels of the encodings that need no table.
const (
	utf8Label    = "utf-8"
	utf16LELabel = "utf-16le"
	utf16BELabel = "utf-16be"
)

// decoding is the text of a file as UTF-8 and the way back to the file's bytes.
type decoding struct {
	label  string
	text   string
	runs   []run             // in order of the text; never empty
	legacy encoding.Encoding // nil for the Unicode encodings
}

// run is a stretch of characters that are all of one length in the text and of
// one length in the file, so that one entry places them all. A file in UTF-8 is
// one run whatever its length; other files start a run wherever the lengths
// change, which in prose is at most twice a word.
type run struct {
	text, file         int32 // where it starts
	textUnit, fileUnit uint8 // bytes of each of its characters
}

// fileOffset returns where in the file the character at byte offset of the
// text starts. O(log n) in the number of runs.
func (d *decoding) fileOffset(offset int) int {
	i := sort.Search(len(d.runs), func(i int) bool { return int(d.runs[i].text) > offset }) - 1
	r := d.runs[max(i, 0)]
	return int(r.file) + (offset-int(r.text))/int(r.textUnit)*int(r.fileUnit)
}

// textOffset is the inverse of fileOffset; a byte before the text, as of a
// byte-order mark, counts as the start.
func (d *decoding) textOffset(offset int) int {
	i := sort.Search(len(d.runs), func(i int) bool { return int(d.runs[i].file) > offset }) - 1
	if i < 0 {
		return 0
	}
	r := d.runs[i]
	return min(int(r.text)+(offset-int(r.file))/int(r.fileUnit)*int(r.textUnit), len(d.text))
}

func (d *decoding) fileSpan(start, end int) Span {
	return Span{d.fileOffset(start), d.fileOffset(end)}
}

// add records a character of the given lengths.
func (d *decoding) add(text, file, textUnit, fileUnit int) {
	if n := len(d.runs); n > 0 && int(d.runs[n-1].textUnit) == textUnit && int(d.runs[n-1].fileUnit) == fileUnit {
		return
	}
	d.runs = append(d.runs, run{int32(text), int32(file), uint8(textUnit), uint8(fileUnit)})
}

// decode turns the bytes of a file into text. A byte-order mark decides; else
// the label does; else the file is UTF-8. Errors begin after the file's name.
func decode(data []byte, label string) (*decoding, error) {
	name := utf8Label
	var legacy encoding.Encoding
	if label != "" {
		found, err := htmlindex.Get(label)
		if err != nil {
			return nil, fmt.Errorf("no encoding is called %q; use a label of the WHATWG Encoding Standard, for instance windows-1252", label)
		}
		if name, err = htmlindex.Name(found); err != nil {
			return nil, fmt.Errorf("encoding %q cannot be read; convert the file to UTF-8", label)
		}
		legacy = found
	}
	mark := 0
	switch {
	case bytes.HasPrefix(data, []byte("\xEF\xBB\xBF")):
		name, mark = utf8Label, 3
	case bytes.HasPrefix(data, []byte("\xFF\xFE")):
		name, mark = utf16LELabel, 2
	case bytes.HasPrefix(data, []byte("\xFE\xFF")):
		name, mark = utf16BELabel, 2
	}
	switch name {
	case utf8Label:
		return decodeUTF8(data, mark)
	case utf16LELabel, utf16BELabel:
		return decodeUTF16(data, mark, name)
	case "iso-2022-jp", "replacement", "x-user-defined":
		// Their bytes mean nothing without the bytes before them, or stand for
		// no letters, so a letter could not be spliced in.
		return nil, fmt.Errorf("encoding %s cannot be emended letter by letter; convert the file to UTF-8", name)
	}
	return decodeLegacy(data, legacy, name)
}

func decodeUTF8(data []byte, mark int) (*decoding, error) {
	body := data[mark:]
	for i := 0; i < len(body); {
		if body[i] < utf8.RuneSelf {
			i++
			continue
		}
		r, n := utf8.DecodeRune(body[i:])
		if r == utf8.RuneError && n == 1 {
			if i := bytes.IndexByte(body, 0); i >= 0 {
				return nil, binaryError(data, mark+i)
			}
			return nil, fmt.Errorf("byte %d: not valid UTF-8; name its encoding with --encoding, for instance --encoding windows-1252", mark+i)
		}
		i += n
	}
	if i := bytes.IndexByte(body, 0); i >= 0 {
		return nil, binaryError(data, mark+i)
	}
	return &decoding{label: utf8Label, text: string(body), runs: []run{{0, int32(mark), 1, 1}}}, nil
}

// binaryError tells a file of UTF-16 without its mark from one that is no text:
// in the former every other byte of English prose is zero.
func binaryError(data []byte, at int) error {
	head := data[:min(len(data), 4096)]
	var zero [2]int
	for i, b := range head {
		if b == 0 {
			zero[i%2]++
		}
	}
	switch half := len(head) / 2; {
	case zero[1] > half*3/4 && zero[0] == 0:
		return fmt.Errorf("byte %d: a zero byte; this looks like UTF-16 without a byte-order mark, so add --encoding utf-16le", at)
	case zero[0] > half*3/4 && zero[1] == 0:
		return fmt.Errorf("byte %d: a zero byte; this looks like UTF-16 without a byte-order mark, so add --encoding utf-16be", at)
	}
	return fmt.Errorf("byte %d: a zero byte, so this is no text; save the manuscript as plain text or Markdown", at)
}

func decodeUTF16(data []byte, mark int, label string) (*decoding, error) {
	d := &decoding{label: label}
	unit := func(i int) rune {
		if label == utf16LELabel {
			return rune(data[i]) | rune(data[i+1])<<8
		}
		return rune(data[i])<<8 | rune(data[i+1])
	}
	text := make([]byte, 0, len(data)/2+len(data)/16)
	for i := mark; i < len(data); {
		if i+1 == len(data) {
			return nil, fmt.Errorf("byte %d: not valid UTF-16, the last byte stands alone; restore the file", i)
		}
		r, n := unit(i), 2
		if r == 0 {
			return nil, fmt.Errorf("byte %d: a zero character, so this is no text; save the manuscript as plain text or Markdown", i)
		}
		if utf16.IsSurrogate(r) {
			if i+3 < len(data) {
				r, n = utf16.DecodeRune(r, unit(i+2)), 4
			}
			if n == 2 || r == utf8.RuneError {
				return nil, fmt.Errorf("byte %d: not valid UTF-16, half of a pair stands alone; restore the file", i)
			}
		}
		d.add(len(text), i, utf8.RuneLen(r), n)
		text = utf8.AppendRune(text, r)
		i += n
	}
	d.text = string(text)
	d.close(mark)
	return d, nil
}

// decodeLegacy decodes character by character: the decoders of x/text stop when
// the destination is full, so the least destination that takes anything takes
// one character.
func decodeLegacy(data []byte, legacy encoding.Encoding, label string) (*decoding, error) {
	if i := bytes.IndexByte(data, 0); i >= 0 {
		return nil, binaryError(data, i)
	}
	d := &decoding{label: label, legacy: legacy}
	decoder := legacy.NewDecoder()
	text := make([]byte, 0, len(data)+len(data)/8)
	var room [2 * utf8.UTFMax]byte
	for i := 0; i < len(data); {
		wrote, read := 0, 0
		for size := 1; size <= len(room) && wrote == 0; size++ {
			decoder.Reset()
			var err error
			wrote, read, err = decoder.Transform(room[:size], data[i:min(len(data), i+8)], i+8 >= len(data))
			if wrote == 0 && err == nil {
				break
			}
		}
		if wrote == 0 || read == 0 || bytes.ContainsRune(room[:wrote], utf8.RuneError) {
			return nil, fmt.Errorf("byte %d: not valid %s; name the file's encoding with --encoding, for instance --encoding utf-8", i, label)
		}
		d.add(len(text), i, wrote, read)
		text = append(text, room[:wrote]...)
		i += read
	}
	d.text = string(text)
	d.close(0)
	return d, nil
}

// close gives a text without characters its one run.
func (d *decoding) close(mark int) {
	if len(d.runs) == 0 {
		d.runs = []run{{0, int32(mark), 1, 1}}
	}
}

var errNotInEncoding = errors.New("not in the encoding")

// encode returns the bytes of a letter in the file's encoding: composed where
// the encoding has it so, else decomposed.
func (d *decoding) encode(letter string) ([]byte, error) {
	switch d.label {
	case utf8Label:
		return []byte(letter), nil
	case utf16LELabel, utf16BELabel:
		var out []byte
		for _, u := range utf16.Encode([]rune(letter)) {
			if d.label == utf16LELabel {
				out = append(out, byte(u), byte(u>>8))
			} else {
				out = append(out, byte(u>>8), byte(u))
			}
		}
		return out, nil
	}
	for _, form := range []norm.Form{norm.NFC, norm.NFD} {
		if out, err := d.legacy.NewEncoder().Bytes(form.Bytes([]byte(letter))); err == nil {
			return out, nil
		}
	}
	return nil, errNotInEncoding
}
