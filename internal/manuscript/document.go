package manuscript

import (
	"crypto/sha256"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"strings"
)

// Options of Open and Read. The zero value lets the file say what it is.
type Options struct {
	Encoding string // a legacy code page by its WHATWG label; "" means UTF-8, or what the byte-order mark says
	Format   string // "text" or "markdown"; "" means by content and name
}

// Span is a range of bytes of the file, half open.
type Span struct{ Start, End int }

// Document is a manuscript read into parts and paragraphs. It does not change
// once read, so several goroutines may use it.
type Document struct {
	Path       string
	Title      string // from front matter or the first heading of level 1, else the file's name without its extension
	Format     string // "text", "markdown"
	Encoding   string // WHATWG label
	SHA256     [32]byte
	Parts      []Part
	Paragraphs []Paragraph // in the order of the file
	Passed     []Passed    // what was passed over, in the order of the file

	data   []byte
	source *decoding
	format format
	lines  []int32 // where each line of source.text starts
	posts  []post  // within long lines, in order
}

// Part is a chapter: it runs from its heading to the next. Text before the
// first heading is a part of its own with an empty title.
type Part struct {
	Title string
	First int // index of its first paragraph
}

// Passed is a stretch that holds no prose of the manuscript.
type Passed struct {
	Reason string // one of the constants below
	Text   string
	Span   Span
}

// The reasons for which a stretch is passed over.
const (
	PassedCode        = "code"
	PassedLinkTarget  = "link target"
	PassedEmail       = "e-mail address"
	PassedURL         = "URL"
	PassedHTML        = "HTML"
	PassedFrontMatter = "front matter"
	PassedPath        = "file path"
	PassedHandle      = "handle" // @harbourmaster
	PassedTag         = "tag"    // #sallowquay
)

// Setting is where a citation stands.
//
// Where several hold, the first of heading, note, quotation, speech, italics
// and narration is the setting: what decides whose words they are, and so how
// freely they may be emended, goes before how they are set in type.
type Setting string

const (
	Narration Setting = "narration"
	Speech    Setting = "speech"
	Quotation Setting = "quotation"
	Italics   Setting = "italics"
	Note      Setting = "note"
	Heading   Setting = "heading"
)

// Paragraph is a block of prose: a paragraph, heading, list item, cell or note.
type Paragraph struct {
	Part  int    // index into Parts
	Text  string // decoded, without marks; a line break of the source is "\n" whatever it is in the file
	Words []Word // in order, none overlaps another

	pieces []piece // where Text comes from; see piece
}

// maxSize is the largest file that is read: offsets are kept in 32 bits.
const maxSize = 1 << 30

// Open reads the file at path. Its errors begin with the path; they wrap those
// of the file system.
func Open(path string, opt Options) (*Document, error) {
	info, err := os.Stat(path)
	if err != nil {
		return nil, fileError(path, err)
	}
	switch {
	case info.IsDir():
		return nil, fmt.Errorf("%s: a directory; name the manuscript's file", path)
	case info.Size() > maxSize:
		return nil, tooLarge(path)
	}
	data, err := os.ReadFile(path)
	if err != nil {
		return nil, fileError(path, err)
	}
	return Read(path, data, opt)
}

func fileError(path string, err error) error {
	var named *fs.PathError
	if errors.As(err, &named) {
		err = named.Err
	}
	return fmt.Errorf("%s: %w", path, err)
}

func tooLarge(path string) error {
	return fmt.Errorf("%s: larger than a gigabyte; split the manuscript into volumes", path)
}

// Read reads the bytes of a file. The path names the manuscript in errors and
// helps to tell its format; nothing is opened. The document keeps data, which
// must not change afterwards.
//
// It takes time linear in the size of the file, and for a novel of 250,000
// words (1.4 MB) some 30 MB of memory, most of them the words.
func Read(path string, data []byte, opt Options) (*Document, error) {
	if len(data) == 0 {
		return nil, fmt.Errorf("%s: empty file; nothing to review", path)
	}
	if len(data) > maxSize {
		return nil, tooLarge(path)
	}
	if kind := knownBinary(data); kind != "" {
		return nil, fmt.Errorf("%s: %s, which is not read; save the manuscript as plain text or Markdown", path, kind)
	}
	source, err := decode(data, opt.Encoding)
	if err != nil {
		return nil, fmt.Errorf("%s: %w", path, err)
	}
	chosen, err := chooseFormat(opt.Format, path, source.text)
	if err != nil {
		return nil, fmt.Errorf("%s: %w", path, err)
	}
	return readAs(path, data, source, chosen)
}

// readAs is Read once encoding and format are known.
func readAs(path string, data []byte, source *decoding, chosen format) (*Document, error) {
	found, err := chosen.read(source.text)
	if err != nil {
		return nil, fmt.Errorf("%s: %w", path, err)
	}
	d := &Document{
		Path:     path,
		Title:    found.title,
		Format:   chosen.name(),
		Encoding: source.label,
		SHA256:   sha256.Sum256(data),
		data:     data,
		source:   source,
		format:   chosen,
		lines:    lineStarts(source.text),
	}
	d.posts = d.setPosts()
	if d.Title == "" {
		base := filepath.Base(path)
		d.Title = strings.TrimSuffix(base, filepath.Ext(base))
	}
	d.fill(found)
	return d, nil
}

// knownBinary names the kinds of file that editors are most likely to try, by
// their first bytes.
func knownBinary(data []byte) string {
	for _, known := range []struct{ start, kind string }{
		{"PK\x03\x04", "a word processor's or other zipped file"},
		{"%PDF-", "a PDF"},
		{"{\\rtf", "a rich-text file"},
		{"\xD0\xCF\x11\xE0", "an old word processor's file"},
		{"\x1F\x8B", "a gzipped file"},
	} {
		if strings.HasPrefix(string(data[:min(len(data), 8)]), known.start) {
			return known.kind
		}
	}
	return ""
}
