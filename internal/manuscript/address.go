package manuscript

import (
	"slices"
	"strings"
	"unicode"
	"unicode/utf8"
)

// reasoned is a stretch of a paragraph's text that is passed over.
type reasoned struct {
	extent
	reason string
}

// addresses finds what is no prose in running text: URLs, e-mail addresses,
// file paths, handles, tags, and names with an underscore in them, as code has.
// Each stands between spaces, quotes, angle brackets or dashes; punctuation
// after it is no part of it. What lies in skips is left alone.
func addresses(text string, skips []extent) []reasoned {
	var found []reasoned
	for at := 0; at < len(text); {
		sign := addressSign(text, at)
		if sign < 0 {
			break
		}
		from, to := at, len(text)
		if i := strings.LastIndexFunc(text[at:sign], endsChunk); i >= 0 {
			_, size := utf8.DecodeRuneInString(text[at+i:])
			from = at + i + size
		}
		if i := strings.IndexFunc(text[sign:], endsChunk); i >= 0 {
			to = sign + i
		}
		at = to
		if to-from > 2 {
			from, to = trimChunk(text, from, to)
			if reason := addressReason(text[from:to]); reason != "" && !overlaps(skips, from, to) {
				found = append(found, reasoned{extent{from, to}, reason})
			}
		}
	}
	return found
}

// addressSign returns where the first sign of an address stands from byte at on,
// -1 where none does: an address holds one of them, or a point that is not its last
// character. Most paragraphs have none; searches for one byte tell so fastest.
func addressSign(text string, at int) int {
	first := -1
	for _, c := range [...]byte{'@', '#', '/', '\\', '_'} {
		if i := strings.IndexByte(text[at:], c); i >= 0 {
			first = at + i
			text = text[:first]
		}
	}
	for i := at; ; i++ {
		n := strings.IndexByte(text[i:], '.')
		if n < 0 {
			return first
		}
		i += n
		if i+1 == len(text) {
			if first < 0 {
				return -1
			}
			return i // before another sign
		}
		if r, _ := utf8.DecodeRuneInString(text[i+1:]); !endsChunk(r) {
			return i
		}
	}
}

func endsChunk(r rune) bool {
	switch {
	case r < utf8.RuneSelf:
		return r <= ' ' || r == '"' || r == '<' || r == '>'
	case unicode.IsSpace(r):
		return true
	}
	return strings.ContainsRune("“”‘’«»—–…", r)
}

// trimChunk takes brackets and quotes off both ends, points and the like off
// the end; a closing bracket stays where the chunk holds its opening one.
func trimChunk(text string, from, to int) (int, int) {
	for from < to && strings.IndexByte("([{'*", text[from]) >= 0 {
		from++
	}
	for from < to {
		c := text[to-1]
		if strings.IndexByte(".,;:!?'*]}", c) < 0 && (c != ')' || strings.Count(text[from:to], "(") >= strings.Count(text[from:to], ")")) {
			break
		}
		to--
	}
	return from, to
}

// addressReason says what kind of address a chunk is, "" if none.
func addressReason(s string) string {
	if len(s) < 3 {
		return ""
	}
	switch {
	case isURL(s):
		return PassedURL
	case isEmail(s):
		return PassedEmail
	case isPath(s):
		return PassedPath
	case s[0] == '@' && isName(s[1:]):
		return PassedHandle
	case s[0] == '#' && isName(s[1:]):
		return PassedTag
	case isCodeName(s):
		return PassedCode
	}
	return ""
}

func isURL(s string) bool {
	if i := strings.Index(s, "://"); i > 0 {
		return strings.IndexFunc(s[:i], func(r rune) bool { return !isASCIIName(r) && r != '+' && r != '.' }) < 0
	}
	if strings.HasPrefix(s, "www.") || strings.HasPrefix(s, "mailto:") {
		return true
	}
	host, path, _ := strings.Cut(s, "/")
	if !isHost(host) {
		return false
	}
	if path != "" {
		return true
	}
	switch host[strings.LastIndexByte(host, '.')+1:] {
	case "com", "org", "net", "edu", "gov", "info", "io", "uk":
		return true
	}
	return false
}

func isEmail(s string) bool {
	name, host, ok := strings.Cut(s, "@")
	return ok && name != "" && isHost(host) &&
		strings.IndexFunc(name, func(r rune) bool { return !isASCIIName(r) && !strings.ContainsRune(".%+'", r) }) < 0
}

// isHost tells two or more names with points between, the last of them two
// small letters or more.
func isHost(s string) bool {
	labels := strings.Split(s, ".")
	for _, l := range labels {
		if l == "" || strings.IndexFunc(l, func(r rune) bool { return !isASCIIName(r) || r == '_' }) >= 0 {
			return false
		}
	}
	last := labels[len(labels)-1]
	return len(labels) > 1 && len(last) > 1 && strings.Trim(last, "abcdefghijklmnopqrstuvwxyz") == ""
}

// isPath tells rooted and relative paths of either kind of system, and file
// names with a usual extension.
func isPath(s string) bool {
	switch {
	case strings.HasPrefix(s, "~/"), strings.HasPrefix(s, "./"), strings.HasPrefix(s, "../"), strings.HasPrefix(s, `\\`):
		return true
	case len(s) > 3 && s[1] == ':' && s[2] == '\\' && isASCIIName(rune(s[0])):
		return true
	case s[0] == '/':
		return strings.Count(s, "/") > 1 && !strings.Contains(s, "//")
	}
	name, extension, ok := strings.Cut(s, ".")
	if !ok || name == "" || strings.IndexFunc(name, func(r rune) bool { return !isASCIIName(r) && r != '/' && r != '\\' }) >= 0 {
		return false
	}
	switch extension {
	case "txt", "md", "doc", "docx", "odt", "rtf", "pdf", "epub", "html", "htm", "xml", "tex", "csv", "tsv", "json", "yaml",
		"jpg", "jpeg", "png", "gif", "zip", "exe":
		return true
	}
	return false
}

// isName tells a letter followed by letters, digits and underscores.
func isName(s string) bool {
	return startsWithLetter(s) && strings.IndexFunc(s, func(r rune) bool { return !isWordRune(r) && r != '_' }) < 0
}

// isCodeName tells names with an underscore between letters or digits.
func isCodeName(s string) bool {
	i := strings.IndexByte(s, '_')
	return i > 0 && i < len(s)-1 && strings.IndexFunc(s, func(r rune) bool { return !isASCIIName(r) && !strings.ContainsRune(".()", r) }) < 0
}

func isASCIIName(r rune) bool {
	return 'a' <= r && r <= 'z' || 'A' <= r && r <= 'Z' || '0' <= r && r <= '9' || r == '-' || r == '_'
}

func overlaps(extents []extent, from, to int) bool {
	for _, e := range extents {
		if e.start < to && from < e.end {
			return true
		}
	}
	return false
}

// withAddresses returns all stretches without words, in order. One that touches
// letters, as code with an ending does, takes them in: they are no word alone.
func withAddresses(text string, skips []extent, found []reasoned) []extent {
	if len(skips)+len(found) == 0 {
		return nil
	}
	all := slices.Clone(skips)
	for _, f := range found {
		all = append(all, f.extent)
	}
	slices.SortFunc(all, func(a, b extent) int { return a.start - b.start })
	for i := range all {
		for all[i].start > 0 {
			r, n := utf8.DecodeLastRuneInString(text[:all[i].start])
			if !isWordRune(r) {
				break
			}
			all[i].start -= n
		}
		for all[i].end < len(text) {
			r, n := utf8.DecodeRuneInString(text[all[i].end:])
			if !isWordRune(r) && !unicode.IsMark(r) && !(strings.ContainsRune("'’-", r) && startsWithLetter(text[all[i].end+n:])) {
				break
			}
			all[i].end += n
		}
	}
	return all
}
