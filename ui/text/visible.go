package text

import (
	"fmt"
	"strings"
	"unicode"
	"unicode/utf8"
)

// Visible returns s fit for the terminal: what would steer it is shown instead.
// C0 controls and DEL become their pictures (U+2400 block), C1 controls and
// controls of direction or layout their names in brackets, bytes that are no
// UTF-8 U+FFFD. Tabs and line breaks become spaces. With ascii the pictures are
// names in brackets too; text that is merely not ASCII stays as it is.
func Visible(s string, ascii bool) string {
	if clean(s) {
		return s
	}
	var b strings.Builder
	for len(s) > 0 {
		r, n := utf8.DecodeRuneInString(s)
		switch {
		case r == utf8.RuneError && n == 1:
			b.WriteString("\uFFFD")
		case r == '\n' || r == '\t' || r == '\r' && strings.HasPrefix(s, "\r\n"):
			if r != '\r' {
				b.WriteByte(' ')
			}
		case r < 0x20 && !ascii:
			b.WriteRune(0x2400 + r)
		case r == 0x7f && !ascii:
			b.WriteRune(0x2421)
		case r < 0x20 || r >= 0x7f && r < 0xa0:
			fmt.Fprintf(&b, "<%02X>", r)
		case steers(r):
			b.WriteString("<" + nameOf(r) + ">")
		default:
			b.WriteString(s[:n])
		}
		s = s[n:]
	}
	return b.String()
}

func clean(s string) bool {
	for _, r := range s {
		if r < 0x20 || r >= 0x7f && r < 0xa0 || r == utf8.RuneError || steers(r) {
			return false
		}
	}
	return true
}

// steers reports the format characters that move, turn or hide text. The joiners
// U+200C and U+200D are letters' business and pass, as do variation selectors.
func steers(r rune) bool {
	switch {
	case r == 0x200c || r == 0x200d:
		return false
	case r == 0x2028 || r == 0x2029:
		return true
	case r >= 0xe0000 && r <= 0xe007f: // tags
		return true
	}
	return unicode.Is(unicode.Cf, r)
}

// nameOf gives the abbreviations of Unicode's name aliases, else the number.
func nameOf(r rune) string {
	switch r {
	case 0x00ad:
		return "SHY"
	case 0x061c:
		return "ALM"
	case 0x200b:
		return "ZWSP"
	case 0x200e:
		return "LRM"
	case 0x200f:
		return "RLM"
	case 0x202a:
		return "LRE"
	case 0x202b:
		return "RLE"
	case 0x202c:
		return "PDF"
	case 0x202d:
		return "LRO"
	case 0x202e:
		return "RLO"
	case 0x2060:
		return "WJ"
	case 0x2066:
		return "LRI"
	case 0x2067:
		return "RLI"
	case 0x2068:
		return "FSI"
	case 0x2069:
		return "PDI"
	case 0xfeff:
		return "ZWNBSP"
	}
	return fmt.Sprintf("%04X", r)
}
