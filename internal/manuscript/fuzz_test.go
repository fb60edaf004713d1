package manuscript

import (
	"bytes"
	"strings"
	"testing"
	"unicode/utf8"
)

// seeds are texts with one of everything that reading and emending know.
func seeds() []string {
	return []string{
		"---\ntitle: A Lamp\n---\n# A Lamp\n\n## One\n\nThe pilot’s *harb*er, ’tis “never mind,” said the har-\nbour-master.\n",
		"> > the har-\n> ber is\nlazy\n\n- a\n  1. b\n\n     c\n\n| a | b |\n|---|---|\n| c | d\\|e |\n",
		"caf&eacute; &fjlig;ord \\*a\\* e\u0301 so\u00ADft so\u00AD\nft [a](b \"c\") ![d](e) <https://f.example> `g` <b>h</b><br>\n",
		"a[^1] ~~b~~\n\n[^1]: c\n\n    d\n\nMole\n: a wall\n\n[x]: y\n\n    code\n\n```\ncode\n```\n<div>\nraw\n</div>\n\nT\n===\n",
		"‘Tis l9l4, 2th, hel1o,’ he said. Two- and three-masted; half-owner and -master, U.S. J. R. Pell’s xiv XIV £5 1,200 ‘90s o’ nothin’.",
		"CHAPTER ONE\r\n\r\n  It _was_ late.\r\n\r\n\r\nTHE MOLE\r\n\r\n    a\r\n    b\r\n",
		"a\rb\r\rc", "\xEF\xBB\xBFa", "\xFF\xFEa\x00\xE9\x00", "\xFE\xFF\x00a", "\xFF\xFE=\xD8\x00\xDE", "***", "\n", "港口 гавань λιμήν 🇫🇷🇩🇪 👩‍🚀",
		"www.quay.example pell@quay.example /var/log/quay @pell #mole a_b", "[[[[****____````<<<<", "a *b\n*c* d_e_", "|a|\n|-|\n|`b\\|c`|",
	}
}

// check asserts what holds of every document.
func check(t *testing.T, d *Document) {
	for i, p := range d.Paragraphs {
		if d.Parts[p.Part].First > i || p.Part+1 < len(d.Parts) && d.Parts[p.Part+1].First <= i {
			t.Fatalf("paragraph %d is not in its part", i)
		}
		if !utf8.ValidString(p.Text) {
			t.Fatalf("paragraph %q is not valid UTF-8", p.Text)
		}
		end, place := 0, 0
		for _, w := range p.Words {
			if w.Start < end || w.End <= w.Start || w.End > len(p.Text) {
				t.Fatalf("word %q [%d,%d) after %d of %q", w.Text, w.Start, w.End, end, p.Text)
			}
			end = w.End
			if w.Text == "" || w.Setting == "" || (w.Fault == NoFault) != (w.Instead == "") {
				t.Fatalf("word %+v", w)
			}
			var joined strings.Builder
			for _, l := range d.Letters(i, w.Start, w.End) {
				if l.Span.Start < place || l.Span.End < l.Span.Start || l.Span.End > len(d.data) {
					t.Fatalf("letter %q at %v after %d of %q", l.Text, l.Span, place, d.data)
				}
				place = l.Span.End
				if !l.Mark {
					joined.WriteString(l.Text)
				}
			}
			got, want := composed(joined.String()), w.Text
			if w.Traits&Broken != 0 {
				// The text keeps the hyphen of each break, the letters do not.
				got, want = dehyphened(got), dehyphened(want)
			}
			if got != want {
				t.Fatalf("letters read %q, word %q", got, w.Text)
			}
		}
	}
	last := 0
	for _, p := range d.Passed {
		if p.Span.Start < last || p.Span.End < p.Span.Start || p.Span.End > len(d.data) {
			t.Fatalf("passed %+v after %d", p, last)
		}
		last = p.Span.Start
	}
}

func dehyphened(s string) string {
	return strings.NewReplacer("-", "", "\u2010", "", "\u2011", "").Replace(s)
}

// identity asserts that an emendation of every word to itself changes no byte.
func identity(t *testing.T, d *Document) {
	var all []Emendation
	for i, p := range d.Paragraphs {
		for _, w := range p.Words {
			e := Emendation{Paragraph: i, Start: w.Start, End: w.End}
			for _, l := range d.Letters(i, w.Start, w.End) {
				e.Letters = append(e.Letters, l.Text)
			}
			all = append(all, e)
		}
	}
	out, err := d.Emend(all)
	if err != nil {
		t.Fatalf("%v: %q", err, d.data)
	}
	if !bytes.Equal(out, d.data) {
		t.Fatalf("%q became %q", d.data, out)
	}
}

// FuzzRead reads any bytes in any format and encoding.
func FuzzRead(f *testing.F) {
	for _, s := range seeds() {
		for i := range uint8(8) {
			f.Add([]byte(s), i)
		}
	}
	f.Fuzz(func(t *testing.T, data []byte, choice uint8) {
		opt := Options{
			Format:   []string{"text", "markdown"}[choice%2],
			Encoding: []string{"", "windows-1252", "utf-16le", "gb18030"}[choice/2%4],
		}
		d, err := Read("m", data, opt)
		if err != nil {
			if strings.Contains(err.Error(), "\n") {
				t.Fatalf("error of more than one line: %v", err)
			}
			return
		}
		check(t, d)
		identity(t, d)
		d.Position(int(choice) * len(data) / 255)
	})
}

// FuzzEmend replaces one letter by another text: the emendation is refused, or
// the file differs within the letter's span alone.
func FuzzEmend(f *testing.F) {
	for _, s := range seeds() {
		for i, with := range []string{"x", "", "é", "*", "&", "1."} {
			f.Add(s, uint16(i*7), with)
		}
	}
	f.Fuzz(func(t *testing.T, source string, pick uint16, with string) {
		for _, format := range []string{"text", "markdown"} {
			d, err := Read("m", []byte(source), Options{Format: format})
			if err != nil || len(d.Paragraphs) == 0 {
				continue
			}
			i := int(pick) % len(d.Paragraphs)
			p := &d.Paragraphs[i]
			e := Emendation{Paragraph: i, End: len(p.Text)}
			var letters []Letter
			var starts []int
			d.eachLetter(i, 0, len(p.Text), func(l Letter, at extent) {
				letters, starts, e.Letters = append(letters, l), append(starts, at.start), append(e.Letters, l.Text)
			})
			j := int(pick) / len(d.Paragraphs) % len(letters)
			e.Letters[j] = with
			out, err := d.Emend([]Emendation{e})
			if err != nil {
				continue
			}
			// Letters that share a reference are written together.
			from, to := j, j
			for p.shared(starts[from]) {
				from--
			}
			for to+1 < len(letters) && p.shared(starts[to+1]) {
				to++
			}
			span := Span{letters[from].Span.Start, letters[to].Span.End}
			tail := d.data[span.End:]
			if !bytes.HasPrefix(out, d.data[:span.Start]) || !bytes.HasSuffix(out, tail) || len(out) < span.Start+len(tail) {
				t.Fatalf("%q at %v became %q", d.data, span, out)
			}
		}
	})
}
