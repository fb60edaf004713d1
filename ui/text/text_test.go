package text_test

import (
	"fmt"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"

	"emendary/ui/text"
)

func TestVisible(t *testing.T) {
	for _, c := range []struct{ name, in, want, ascii string }{
		{"plain", "harbour", "harbour", "harbour"},
		{"letters of all kinds", "é漢שקط", "é漢שקط", "é漢שקط"},
		{"escape", "a\x1b[31mb", "a␛[31mb", "a<1B>[31mb"},
		{"nul and delete", "\x00\x7f", "␀␡", "<00><7F>"},
		{"tab and line end", "a\tb\nc\r\nd", "a b c d", "a b c d"},
		{"carriage return alone", "a\rb", "a␍b", "a<0D>b"},
		{"C1 control", "a\u009bb", "a<9B>b", "a<9B>b"},
		{"no UTF-8", "a\xffb", "a\uFFFDb", "a\uFFFDb"},
		{"bidi controls", "\u202eab\u202c\u2066\u2069\u200f", "<RLO>ab<PDF><LRI><PDI><RLM>", "<RLO>ab<PDF><LRI><PDI><RLM>"},
		{"line separator", "a\u2028b", "a<2028>b", "a<2028>b"},
		{"joiners pass", "👩\u200d🚀", "👩\u200d🚀", "👩\u200d🚀"},
		{"soft hyphen", "a\u00adb", "a<SHY>b", "a<SHY>b"},
		{"tags", "a\U000e0041", "a<E0041>", "a<E0041>"},
	} {
		t.Run(c.name, func(t *testing.T) {
			assert.Equal(t, c.want, text.Visible(c.in, false))
			assert.Equal(t, c.ascii, text.Visible(c.in, true))
		})
	}
}

func FuzzVisibleLeavesNoControlCharacter(f *testing.F) {
	for _, s := range []string{"", "a\x1b]0;x\x07", "\u202e", "\xff\xfe", "\u0085\u2029", "ab\r\ncd"} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, s string) {
		for _, ascii := range []bool{false, true} {
			for _, r := range text.Visible(s, ascii) {
				if r < 0x20 || r >= 0x7f && r < 0xa0 || r >= 0x202a && r <= 0x202e || r >= 0x2066 && r <= 0x2069 {
					t.Fatalf("%U is left of %q", r, s)
				}
			}
		}
	})
}

func wrapped(s string, width int, keep [2]int) []string {
	var out []string
	for _, l := range text.Wrap(s, width, keep) {
		out = append(out, s[l.Start:l.End])
	}
	return out
}

func TestWrap(t *testing.T) {
	for _, c := range []struct {
		name  string
		in    string
		width int
		want  []string
	}{
		{"nothing", "", 10, []string{""}},
		{"fits", "by six", 6, []string{"by six"}},
		{"one column short", "by six", 5, []string{"by", "six"}},
		{"breaks at the last space", "the whole of the", 9, []string{"the whole", "of the"}},
		{"a word too long", "donaudampfschiff", 6, []string{"donaud", "ampfsc", "hiff"}},
		{"a long word after a short one", "a donaudampf", 6, []string{"a", "donaud", "ampf"}},
		{"double width", "漢字漢字", 5, []string{"漢字", "漢字"}},
		{"combining marks", "e\u0301e\u0301e\u0301", 2, []string{"e\u0301e\u0301", "e\u0301"}},
	} {
		t.Run(c.name, func(t *testing.T) { assert.Equal(t, c.want, wrapped(c.in, c.width, [2]int{})) })
	}
	assert.Equal(t, []string{"a b", "[c d] e"}, wrapped("a b [c d] e", 8, [2]int{4, 9}), "what is to be kept stays whole")
}

func FuzzWrapKeepsEveryWordAndTheWidth(f *testing.F) {
	f.Add("The pilot brought her round the point", 9)
	f.Add("漢字 x  y", 3)
	f.Add("e\u0301 \u00a0 a", 1)
	f.Fuzz(func(t *testing.T, s string, width int) {
		if width < 2 || width > 200 {
			return
		}
		s = text.Visible(strings.ToValidUTF8(s, ""), false)
		joined := ""
		for _, l := range wrapped(s, width, [2]int{}) {
			joined += l
			letters := len(wrapped(strings.TrimSpace(l), 1, [2]int{}))
			if w := text.Width(strings.TrimRight(l, " ")); w > width && letters > 1 { // one letter may be too wide
				t.Fatalf("%q has %d columns, not %d", l, w, width)
			}
		}
		strip := func(s string) string { return strings.Join(strings.Fields(s), "") }
		if strip(joined) != strip(s) {
			t.Fatalf("%q became %q", s, joined)
		}
	})
}

func TestCutAndPad(t *testing.T) {
	assert.Equal(t, "harb…", text.Cut("harbour", 5, "…"))
	assert.Equal(t, "harbour", text.Cut("harbour", 7, "…"))
	assert.Equal(t, "", text.Cut("harbour", 0, "…"))
	assert.Equal(t, "漢…", text.Cut("漢字漢字", 4, "…"))
	assert.Equal(t, "…our", text.CutLeft("harbour", 4, "…"))
	assert.Equal(t, "字", text.CutLeft("漢字", 3, ""), "half a letter is none")
	assert.Equal(t, "ab  ", text.Pad("ab", 4))
	assert.Equal(t, "  ab", text.PadLeft("ab", 4))
	assert.Equal(t, "left  right", text.Ends("left", "right", 11, "…"))
	assert.Equal(t, "le…  right", text.Ends("left", "right", 10, "…"))
	for width := range 30 {
		assert.LessOrEqual(t, text.Width(text.Ends("漢字漢字漢字", "1 open · 2 ruled", width, "…")), width)
		assert.LessOrEqual(t, text.Width(text.CutLeft("漢字漢字漢字", width, "…")), width)
	}
}

func ExampleVisible() {
	fmt.Println(text.Visible("har\x1b[31mber", false))
	// Output: har␛[31mber
}
