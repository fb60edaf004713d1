package docket

import (
	"regexp"
	"strings"
	"unicode"

	"emendary/internal/manuscript"
	"emendary/lexicon"
)

// parted is a word of the manuscript without what its setting hung on it.
type parted struct{ lead, text, tail string }

// clitics are the reduced words that hang on any other: the harbour’ll.
var clitics = map[string]bool{"'ll": true, "'d": true, "'ve": true, "'re": true, "'m": true}

// lineBreak is a hyphen at a line end with what follows it up to the next word.
var lineBreak = regexp.MustCompile(`[-‐]\s*\n\s*`)

// part takes suspended hyphens, a possessive and clitics off a word, unless the
// word is known with them (don’t, o’clock). A word broken at a line end is read
// without its hyphen, unless only the hyphened form makes known words.
func part(p *manuscript.Paragraph, w manuscript.Word, lex *lexicon.Lexicon) parted {
	text := w.Text
	if w.Traits&manuscript.Broken != 0 {
		text = mend(p.Text[w.Start:w.End], text, lex)
	}
	lead, text, tail := suspended(text)
	if w.Fault != manuscript.NoFault || known(lex, text) {
		return parted{lead, text, tail}
	}
	base, possessive := manuscript.Base(text)
	tail = possessive + tail
	if possessive == "" {
		base, tail = clitic(base, tail)
	}
	if w.Traits&manuscript.Elision != 0 && !known(lex, base) {
		// An apostrophe that the splitter could not tell from a quotation mark; one
		// that is curled shut opens no quotation, and a letter alone is cut short.
		if trimmed := strings.TrimRight(base, straight+curly); trimmed != base && len(trimmed) > 1 && known(lex, trimmed) {
			base, tail = trimmed, base[len(trimmed):]+tail
		}
		if trimmed := strings.TrimLeft(base, straight); trimmed != base && known(lex, trimmed) {
			lead, base = lead+base[:len(base)-len(trimmed)], trimmed
		}
	}
	return parted{lead, base, tail}
}

// mend reads a word that a line end broke. source is the word as it stands,
// hyphened the same without the line break.
func mend(source, hyphened string, lex *lexicon.Lexicon) string {
	joined := strings.ReplaceAll(lineBreak.ReplaceAllString(source, ""), "\u00ad", "")
	base, _ := manuscript.Base(joined)
	if known(lex, joined) || known(lex, base) {
		return joined
	}
	for _, member := range members(hyphened) {
		if !known(lex, member) {
			return joined
		}
	}
	return hyphened
}

func suspended(text string) (lead, rest, tail string) {
	rest = strings.TrimLeft(text, "-‐‑")
	lead = text[:len(text)-len(rest)]
	trimmed := strings.TrimRight(rest, "-‐‑")
	return lead, trimmed, rest[len(trimmed):]
}

func clitic(base, tail string) (string, string) {
	i := strings.LastIndexAny(base, straight+curly)
	if i > 0 && clitics[Key(base[i:])] {
		return base[:i], base[i:] + tail
	}
	return base, tail
}

// members splits a compound at its hyphens.
func members(text string) []string {
	return strings.FieldsFunc(text, isHyphen)
}

func isHyphen(r rune) bool { return r == '-' || r == '‐' || r == '‑' }

func known(lex *lexicon.Lexicon, text string) bool {
	return text != "" && lex.Find(text).Status == lexicon.Known
}

func hasDigit(text string) bool { return strings.ContainsFunc(text, unicode.IsDigit) }

// asked reports whether a word can be on the docket at all.
func asked(w manuscript.Word) bool {
	if w.Fault != manuscript.NoFault {
		return true
	}
	const never = manuscript.Number | manuscript.Ordinal | manuscript.Roman | manuscript.Initial
	return w.Traits&never == 0 && !hasDigit(w.Text)
}
