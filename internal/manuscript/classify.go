package manuscript

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

// classify adds the traits and the fault that a word shows by itself.
func classify(w *Word) {
	if isPlain(w.Text) {
		classifyPlain(w)
		return
	}
	base, possessive := Base(w.Text)
	upper, lower, digits := 0, 0, 0
	for _, r := range base {
		switch {
		case unicode.IsNumber(r):
			digits++
		case unicode.IsUpper(r):
			upper++
		case unicode.IsLetter(r):
			lower++
		}
	}
	if upper >= 2 && lower == 0 && digits == 0 {
		w.Traits |= AllCapitals
	}
	if digits > 0 && upper+lower == 0 {
		w.Traits |= Number
		if possessive != "" && possessive != "’" && possessive != "'" {
			w.Traits |= Ordinal // 1920’s
		}
	}
	if pointless, ok := strings.CutSuffix(base, "."); ok && isInitial(pointless) || isPointed(pointless) {
		w.Traits |= Initial
	}
	if isRomanWord(base) {
		w.Traits |= Roman
	}
	if digits > 0 && upper+lower > 0 {
		classifyMixed(w)
	}
	if strings.Contains(w.Text, "‘") && w.Fault == NoFault {
		w.Fault, w.Instead = TurnedApostrophe, strings.ReplaceAll(w.Text, "‘", "’")
	}
}

// classifyPlain is classify for a word that isPlain.
func classifyPlain(w *Word) {
	switch w.Text[0] {
	case 'i', 'v', 'x', 'l':
		if isRomanWord(w.Text) {
			w.Traits |= Roman
		}
	}
}

// isPlain tells an ASCII letter followed by small ones, as most words are: such
// a word can show no trait but Roman.
func isPlain(s string) bool {
	for i := range len(s) {
		if c := s[i]; (c < 'a' || c > 'z') && (i > 0 || c < 'A' || c > 'Z') {
			return false
		}
	}
	return true
}

// classifyMixed judges a word of digits and letters.
func classifyMixed(w *Word) {
	sign, body := cutSign(w.Text)
	number, suffix := cutOrdinal(body)
	if number != "" && isDigits(number) {
		w.Traits |= Number | Ordinal
		if right := ordinalSuffix(number); suffix != "s" && !strings.EqualFold(suffix, right) {
			if isUpperAll(suffix) {
				right = strings.ToUpper(right)
			}
			w.Fault, w.Instead = WrongOrdinal, sign+number+right
		}
		return
	}
	if number != "" {
		if meant := meantDigits(number, suffix != "s"); meant != "" && (len(number) > 2 || suffix != "s") {
			if suffix != "s" {
				suffix = ordinalSuffix(meant)
			}
			w.Traits |= Number | Ordinal
			w.Fault, w.Instead = LetterForDigit, sign+meant+suffix
			return
		}
	}
	if meant := meantDigits(body, false); meant != "" {
		w.Traits |= Number
		w.Fault, w.Instead = LetterForDigit, sign+meant
		return
	}
	if meant := meantLetters(w.Text); meant != "" {
		w.Fault, w.Instead = DigitForLetter, meant
	}
}

// cutSign cuts a leading apostrophe, currency sign, plus or minus off.
func cutSign(s string) (sign, rest string) {
	r, n := utf8.DecodeRuneInString(s)
	if unicode.IsLetter(r) || unicode.IsNumber(r) {
		return "", s
	}
	return s[:n], s[n:]
}

// cutOrdinal cuts the ending off an ordinal or a decade.
func cutOrdinal(s string) (number, suffix string) {
	for _, n := range []int{2, 1} {
		if len(s) <= n {
			continue
		}
		switch suffix := s[len(s)-n:]; suffix {
		case "st", "nd", "rd", "th", "ST", "ND", "RD", "TH", "s":
			return s[:len(s)-n], suffix
		}
	}
	return "", ""
}

// isDigits tells ASCII digits with separators between them.
func isDigits(s string) bool {
	return isDigitAt(s, 0) && isDigitAt(s, len(s)-1) && strings.Trim(s, "0123456789,.") == ""
}

// ordinalSuffix returns the ending of an English ordinal: th after 11, 12 and
// 13, else by the last digit.
func ordinalSuffix(number string) string {
	n := len(number)
	if n > 1 && number[n-2] == '1' {
		return "th"
	}
	switch number[n-1] {
	case '1':
		return "st"
	case '2':
		return "nd"
	case '3':
		return "rd"
	}
	return "th"
}

// meantDigits returns the number that was meant by digits with l, I, O or o
// among them, "" where it is likelier something else. There must be a digit;
// and, but for the number of an ordinal, where the letters are
//
//   - one small l at the end, the rest must look like a year (191l, not 20l:
//     litres);
//   - one capital at the start, three digits must follow (I914, not I95);
//   - one small o at the start, two digits must follow.
func meantDigits(s string, ordinal bool) string {
	digits, letters := 0, 0
	for i := range len(s) {
		switch c := s[i]; {
		case isDigitAt(s, i):
			digits++
		case strings.IndexByte("lIOo", c) >= 0:
			letters++
		case strings.IndexByte(",.", c) < 0 || i == 0 || i == len(s)-1:
			return ""
		}
	}
	if digits == 0 || letters == 0 {
		return ""
	}
	if letters == 1 && !ordinal {
		switch last := len(s) - 1; {
		case s[last] == 'l' && !(len(s) == 4 && (s[0] == '1' || s[0] == '2')):
			return ""
		case (s[0] == 'I' || s[0] == 'O') && digits < 3:
			return ""
		case s[0] == 'o' && digits < 2:
			return ""
		}
	}
	return strings.NewReplacer("l", "1", "I", "1", "O", "0", "o", "0").Replace(s)
}

// meantLetters returns the word that was meant by letters with 0 or 1 among
// them, "" where it is likelier something else (B1, H2O, mp3, 1am). Around the
// digit, which must stand alone and be the only one,
//
//   - inside the word, three letters or more, all small but the first or all
//     capital;
//   - at the start, for 0 one small letter or more and for 1 three, but no unit
//     (10km) and no ordinal;
//   - at the end, for 0 only, three small letters or more.
//
// 0 means o; 1 means i between consonants, except after l and before another l,
// and at the start before a consonant, else l.
func meantLetters(s string) string {
	at := strings.IndexAny(s, "01")
	if at < 0 || strings.ContainsAny(s[at+1:], "0123456789") {
		return ""
	}
	letters, tail := 0, s[at+1:]
	for _, r := range s[:at] + tail {
		if !unicode.IsLetter(r) {
			return ""
		}
		letters++
	}
	all := s[:at] + tail
	_, first := utf8.DecodeRuneInString(all)
	small := strings.ToLower(all[first:]) == all[first:]
	shouted := isUpperAll(all) && letters > 3
	switch {
	case at == 0 && s[0] == '0' && (!small || unicode.IsUpper(rune(all[0])) || letters < 1 || len(all) == 1 && all != "f" && all != "n" && all != "r"):
		return ""
	case at == 0 && s[0] == '1' && (letters < 3 || !small || unicode.IsUpper(rune(all[0])) || isUnit(all)):
		return ""
	case at > 0 && tail == "" && (s[at] != '0' || letters < 3 || !small):
		return ""
	case at > 0 && tail != "" && (letters < 3 || !small && !shouted):
		return ""
	}
	meant := "o"
	if s[at] == '1' {
		meant = "l"
		if consonantBefore, consonantAfter := isConsonantEnd(s[:at]), tail != "" && !isVowel(rune(tail[0])); consonantAfter && (at == 0 || consonantBefore) {
			meant = "i"
		}
	}
	if shouted {
		meant = strings.ToUpper(meant)
	}
	return s[:at] + meant + tail
}

func isVowel(r rune) bool { return strings.ContainsRune("aeiouAEIOU", r) }

func isConsonantEnd(s string) bool {
	r, n := utf8.DecodeLastRuneInString(s)
	return n > 0 && !isVowel(r)
}

// isUnit tells endings of quantities.
func isUnit(s string) bool {
	switch s {
	case "min", "mins", "hrs", "sec", "secs", "lbs", "kgs", "kms", "mph", "kph", "rpm", "khz", "mhz", "day", "pts", "ltr", "amp", "ply":
		return true
	}
	return false
}
