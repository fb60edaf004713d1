package manuscript

import (
	"math/bits"
	"unicode/utf8"

	"github.com/rivo/uniseg"
)

// segment is a stretch between two word boundaries of UAX #29, untailored.
type segment struct {
	start, end int
	kind       kind
	whole      bool // a word that cut leaves as it is, as far as is known without looking again
	plain      bool // a word that isPlain; such a word is whole
}

// segments calls yield with each segment of text from byte start on, which must be
// a boundary that no rule looks across. It takes O(n) time and allocates nothing.
//
// What scan is sure of is cut by it, the rest by the library. A segment of scan's
// begins and ends where no rule could join what stands on the two sides, so the
// library may start afresh after it and scan after any segment of the library's.
func segments(text string, start int, yield func(segment)) {
	state := -1
	for start < len(text) {
		// Most of prose is a word in small letters and one space.
		if c := text[start]; 'a' <= c|0x20 && c|0x20 <= 'z' {
			i := smallRun(text, start+1)
			if i+1 < len(text) && text[i] == ' ' && text[i+1] > ' ' && text[i+1] < utf8.RuneSelf {
				yield(segment{start, i, wordToken, true, true})
				yield(segment{start: i, end: i + 1, kind: space})
				start, state = i+1, -1
				continue
			}
		}
		g := scan(text, start)
		if g.end > start {
			state = -1
		} else {
			var found string
			found, _, state = uniseg.FirstWordInString(text[start:], state)
			g = segment{start: start, end: start + len(found), kind: kindOf(found)}
			g.whole = g.kind == wordToken && isWhole(found)
		}
		yield(g)
		start = g.end
	}
}

// class is what a character is to the rules of UAX #29, as far as scan knows it.
type class uint8

const (
	unsure     class = iota // the library knows: it may even join what stands before
	letter                  // ALetter
	digit                   // Numeric
	underscore              // ExtendNumLet
	midLetter               // MidLetter: joins letters
	midNumber               // MidNum: joins digits
	midBoth                 // MidNumLet and Single_Quote: join letters, and digits
	blank                   // WSegSpace
	lineEnding              // CR
	alone                   // stands alone before anything that scan is sure of
)

// of is a character's class for the rules, and its kind where it stands alone.
type of struct {
	class class
	kind  kind
}

// ascii tells the characters of ASCII.
var ascii = func() (table [utf8.RuneSelf]of) {
	for c := range table {
		table[c] = of{alone, kindOf(string(rune(c)))}
		switch {
		case 'a' <= c && c <= 'z' || 'A' <= c && c <= 'Z':
			table[c].class = letter
		case '0' <= c && c <= '9':
			table[c].class = digit
		}
	}
	table['_'].class = underscore
	table[':'].class = midLetter
	table[','].class, table[';'].class = midNumber, midNumber
	table['.'].class, table['\''].class = midBoth, midBoth
	table[' '].class = blank
	table['\r'].class = lineEnding
	return table
}()

// at returns what the character at byte i is, and its length in bytes. Beyond ASCII
// it knows the letters of Latin-1, and the quotes, dashes and ellipsis of prose.
func at(text string, i int) (of, int) {
	c := text[i]
	switch {
	case c < utf8.RuneSelf:
		return ascii[c], 1
	case c == 0xC3 && i+1 < len(text): // U+00C0 to U+00FF
		if text[i+1] != 0x97 && text[i+1] != 0xB7 { // × and ÷
			return of{letter, wordToken}, 2
		}
	case c == 0xE2 && i+2 < len(text) && text[i+1] == 0x80: // U+2000 to U+203F
		switch text[i+2] {
		case 0x93, 0x94: // – —
			return of{alone, other}, 3
		case 0x98, 0x99: // ‘ ’
			return of{midBoth, single}, 3
		case 0x9C, 0x9D, 0x9E: // “ ” „
			return of{alone, double}, 3
		case 0xA6: // …
			return of{alone, end}, 3
		}
	}
	return of{}, 0
}

// scan returns the segment of text that begins at byte start, where it is sure of
// its end: a word of letters that at knows, or one other such character, and behind
// it one more that at knows or the end of the text. Else the segment is empty.
//
// The rules it applies are WB3 to WB3b, WB3d, WB5 to WB13b and WB999 of UAX #29;
// WB4 and the rules from WB15 on need a character that it is not sure of.
func scan(text string, start int) segment {
	if c := text[start]; 'a' <= c|0x20 && c|0x20 <= 'z' {
		i := smallRun(text, start+1)
		if i == len(text) || text[i] < utf8.RuneSelf && (ascii[text[i]].class >= blank || !joinsWord(text, i)) {
			return segment{start, i, wordToken, true, true}
		}
	}
	first, size := at(text, start)
	switch i := start + size; first.class {
	case unsure:
		return segment{}
	case letter, digit, underscore:
		return scanWord(text, start, i, first)
	case lineEnding:
		if i < len(text) && text[i] == '\n' {
			i++
		}
		return segment{start: start, end: i, kind: kindOf(text[start:i])}
	default:
		for first.class == blank && i < len(text) && text[i] == ' ' {
			i++
		}
		if i < len(text) && text[i] >= utf8.RuneSelf {
			if next, _ := at(text, i); next.class == unsure {
				return segment{}
			}
		}
		return segment{start: start, end: i, kind: first.kind}
	}
}

// joinsWord reports whether the character of ASCII at byte i, before which a letter
// of ASCII stands, may belong to the letter's word.
func joinsWord(text string, i int) bool {
	switch ascii[text[i]].class {
	case letter, digit, underscore:
		return true
	case midLetter, midBoth:
		return i+1 < len(text) && (text[i+1] >= utf8.RuneSelf || ascii[text[i+1]].class == letter)
	}
	return false
}

// scanWord is scan for a word whose first character ends before byte i.
func scanWord(text string, start, i int, first of) segment {
	last := first
	word, whole := last.class != underscore, last.class != underscore
	for i < len(text) {
		next, size := at(text, i)
		switch next.class {
		case unsure:
			return segment{}
		case letter, digit:
			last, word = next, true
			i += size
			continue
		case underscore:
			last, whole = next, false
			i += size
			continue
		case midLetter, midNumber, midBoth:
			if i+size == len(text) {
				break
			}
			after, afterSize := at(text, i+size)
			if after.class == unsure {
				return segment{}
			}
			letters := last.class == letter && after.class == letter && next.class != midNumber
			digits := last.class == digit && after.class == digit && next.class != midLetter
			if letters || digits {
				whole = whole && (text[i] == '\'' || text[i] == ',' || size == 3 && text[i+2] == 0x99)
				last = after
				i += size + afterSize
				continue
			}
		}
		break
	}
	if !word {
		return segment{start: start, end: i, kind: other}
	}
	return segment{start: start, end: i, kind: wordToken, whole: whole}
}

// smallRun returns where the run of small letters of ASCII that begins at byte i
// ends. It looks at eight bytes at a time.
func smallRun(text string, i int) int {
	const ones, high = 0x0101010101010101, 0x8080808080808080
	for ; i+8 <= len(text); i += 8 {
		v := eightBytes(text[i:])
		// Of seven bits, adding takes those from 'a' on over the high bit, and those
		// beyond 'z'; no byte carries into the next.
		low := v &^ high
		small := (low + (0x80-'a')*ones) &^ (low + (0x80-'z'-1)*ones) &^ v & high
		if small != high {
			return i + bits.TrailingZeros64(small^high)/8
		}
	}
	for i < len(text) && 'a' <= text[i] && text[i] <= 'z' {
		i++
	}
	return i
}
