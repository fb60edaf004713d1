package report

import (
	"bytes"
	"encoding/json"
	"fmt"
	"strings"
	"unicode"
	"unicode/utf8"
)

// table is a report as TSV: a header line, then one line a row.
type table struct{ *bytes.Buffer }

// row writes one line. Tabs and line breaks in a cell become spaces, and a cell
// that a spreadsheet would take for a formula begins with an apostrophe.
func (t *table) row(cells ...any) {
	for i, c := range cells {
		if i > 0 {
			t.WriteByte('\t')
		}
		t.WriteString(cell(fmt.Sprint(c)))
	}
	t.WriteByte('\n')
}

func cell(s string) string {
	s = oneLine(s)
	if formula(s) {
		return "'" + s
	}
	return s
}

// formula reports whether a spreadsheet would compute s.
func formula(s string) bool { return s != "" && strings.ContainsRune("=+-@", rune(s[0])) }

// lines is a report as JSON, one object a line.
type lines struct{ *bytes.Buffer }

// add writes one object. Characters that cannot be seen are escaped, so that none
// reaches a terminal and none is lost.
func (l *lines) add(object any) {
	var b bytes.Buffer
	e := json.NewEncoder(&b)
	e.SetEscapeHTML(false)
	if err := e.Encode(object); err != nil {
		return // objects here hold texts and numbers only, which always encode
	}
	for _, r := range b.String() {
		switch {
		case r == '\n' || unicode.IsGraphic(r):
			l.WriteRune(r)
		case r > 0xffff:
			high, low := (r-0x10000)>>10+0xd800, (r-0x10000)&0x3ff+0xdc00
			fmt.Fprintf(l, `\u%04x\u%04x`, high, low)
		default:
			fmt.Fprintf(l, `\u%04x`, r)
		}
	}
}

// shorten cuts s to at most n code points; the cut is shown.
func shorten(s string, n int) string {
	if utf8.RuneCountInString(s) <= n {
		return s
	}
	return string([]rune(s)[:n]) + " …"
}
