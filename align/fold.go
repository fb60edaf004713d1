package align

import (
	"strings"
	"unicode"
	"unicode/utf8"

	"golang.org/x/text/unicode/norm"
)

// Fold returns letters with what an alignment or a lookup ignores taken away,
// one for one:
//
//   - case, by simple case folding (Unicode 3.13 and CaseFolding.txt, status C
//     and S; the lower-case letter stands for all). So ẞ folds to ß, but ß does
//     not fold to ss; nor do the Turkish dotless ı and dotted İ fold to i;
//   - the apostrophes ’ (U+2019), ‘ (U+2018) and ʼ (U+02BC), which fold to ';
//   - the hyphens U+2010 and U+2011 (no-break), which fold to -.
//
// Marks are kept: é does not fold to e. Folding twice is folding once. The letters
// passed stay as they are.
func (a *Alphabet) Fold(letters []Letter) []Letter {
	folded := make([]Letter, len(letters))
	for i, l := range letters {
		if l < firstNumber {
			folded[i] = Letter(foldRune(rune(l)))
			continue
		}
		// NFC once more: H with macron below takes two code points, the
		// small letter one.
		text := a.text(l)
		if lower := strings.Map(foldRune, text); lower != text && utf8.ValidString(text) {
			l = a.letter(norm.NFC.String(lower))
		}
		folded[i] = l
	}
	return folded
}

// AppendFolded appends the folded letters of s to letters, as Fold(Letters(s))
// returns them. For s in ASCII it allocates nothing where letters has room.
func (a *Alphabet) AppendFolded(letters []Letter, s string) []Letter {
	if !isPlain(s) {
		return append(letters, a.Fold(a.Letters(s))...)
	}
	for i := range len(s) {
		letters = append(letters, Letter(foldRune(rune(s[i]))))
	}
	return letters
}

func foldRune(r rune) rune {
	switch {
	case 'A' <= r && r <= 'Z':
		return r + ('a' - 'A')
	case r < 0x80:
		return r
	}
	switch r {
	case '‘', '’', 'ʼ':
		return '\''
	case '\u2010', '\u2011':
		return '-'
	case '\u0345':
		return r // a mark, although it folds to the letter iota
	}
	if unicode.SimpleFold(r) == r {
		return r
	}
	return unicode.ToLower(unicode.ToUpper(r)) // ς → Σ → σ
}
