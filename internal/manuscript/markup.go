package manuscript

import (
	"strconv"
	"strings"
	"unicode/utf8"

	"github.com/yuin/goldmark/util"
)

// decodeMarkup returns the text of the backslash escape or character reference
// that text begins with, and its length in bytes; 0 where there is none.
// CommonMark 0.31, sections 2.4 and 2.5.
func decodeMarkup(text string) (string, int) {
	if len(text) < 2 {
		return "", 0
	}
	if text[0] == '\\' {
		if util.IsPunct(text[1]) {
			return text[1:2], 2
		}
		return "", 0
	}
	end := strings.IndexByte(text[:min(len(text), 40)], ';')
	if text[0] != '&' || end < 2 {
		return "", 0
	}
	name := text[1:end]
	if name[0] != '#' {
		entity, ok := util.LookUpHTML5EntityByName(name)
		if !ok {
			return "", 0
		}
		return string(entity.Characters), end + 1
	}
	digits, base, most := name[1:], 10, 7
	if len(digits) > 0 && (digits[0] == 'x' || digits[0] == 'X') {
		digits, base, most = digits[1:], 16, 6
	}
	if len(digits) > most {
		return "", 0
	}
	n, err := strconv.ParseUint(digits, base, 32)
	if err != nil {
		return "", 0
	}
	if n == 0 || n > utf8.MaxRune || 0xD800 <= n && n <= 0xDFFF {
		n = utf8.RuneError
	}
	return string(rune(n)), end + 1
}

// write escapes what might be read as markup. It does not look whether it
// would: a backslash before punctuation always reads as that punctuation.
func (markdownFormat) write(letter, before, after string, first bool) string {
	var out strings.Builder
	for i, r := range letter {
		sofar := before
		if i > 0 {
			sofar = letter[:i]
		}
		escape := false
		switch r {
		case '\\', '`', '*', '_', '[', ']', '<', '>', '&', '|', '~':
			escape = true
		case '#', '+', '-', '=', ':':
			escape = first && i == 0
		case '(':
			escape = i == 0 && strings.HasSuffix(before, "]")
		case '!':
			escape = strings.HasPrefix(after, "[")
		case '.', ')':
			// After a number that opens its line it would make a list.
			escape = sofar != "" && strings.Trim(sofar, "0123456789 >\t") == ""
		}
		if escape {
			out.WriteByte('\\')
		}
		out.WriteRune(r)
	}
	return out.String()
}

// frontMatter returns the length of the block of settings that a file begins
// with, and the title it names. Such a block stands between two lines --- (or
// --- and ...) or two lines +++ at the very start, and its first line that is
// not blank names a setting.
func frontMatter(text string) (length int, title string) {
	var closing []string
	separator := ":"
	switch {
	case strings.HasPrefix(text, "---"):
		closing = []string{"---", "..."}
	case strings.HasPrefix(text, "+++"):
		closing, separator = []string{"+++"}, "="
	default:
		return 0, ""
	}
	settings := 0
	for at := 0; at < len(text); {
		l := lineAt(text, at)
		line := text[at:l.end]
		switch {
		case at == 0:
			if strings.TrimSpace(line) != closing[0] {
				return 0, ""
			}
		case l.blank() || strings.HasPrefix(line, "#"):
		case settings > 0 && (line == closing[0] || line == closing[len(closing)-1]):
			return l.next, title
		default:
			key, value, ok := strings.Cut(line, separator)
			if settings == 0 && (!ok || strings.ContainsAny(strings.TrimSpace(key), " \t")) && !strings.HasPrefix(line, "[") {
				return 0, ""
			}
			if settings++; ok && strings.TrimSpace(key) == "title" {
				title = strings.TrimSpace(strings.Trim(strings.TrimSpace(value), `"'`))
			}
		}
		at = l.next
	}
	return 0, ""
}
