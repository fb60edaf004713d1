package alignment

import (
	"fmt"
	"slices"
	"strings"

	"emendary/align"
	"emendary/ui/text"
)

// Sentence says in words what the marks of row ask for: "substitute o for e,
// insert u after it". A letter that the form has more than once is told apart by
// its number.
func Sentence(form []string, row Row) string {
	t := teller{form: form, word: row.Letters, touched: -1}
	for _, e := range joined(row.Alignment.Edits, row.Letters) {
		if e.I < 0 || e.I+len(e.From) > len(form) || e.J < 0 || e.J+len(e.To) > len(row.Letters) {
			return "" // an alignment of something else
		}
		t.tell(e)
	}
	t.closeRun()
	if len(t.said) == 0 {
		return "the form as it stands"
	}
	return strings.Join(t.said, ", ")
}

// joined returns edits with the letters inserted at one place, one after the
// other, as one insertion; spaces and hyphens are told one by one.
func joined(edits []align.Edit, word []string) []align.Edit {
	var out []align.Edit
	single := func(e align.Edit) bool {
		return e.Op != align.Insertion || e.J < 0 || e.J+len(e.To) > len(word) || slices.ContainsFunc(word[e.J:e.J+len(e.To)], joins)
	}
	for _, e := range edits {
		if n := len(out); n > 0 && !single(e) && !single(out[n-1]) && out[n-1].I == e.I {
			out[n-1].To = slices.Concat(out[n-1].To, e.To)
			continue
		}
		out = append(out, e)
	}
	return out
}

type teller struct {
	form, word []string
	said       []string
	touched    int // letter of the form that was named last, -1 for none
	run        run // letters whose capitals change
}

type run struct {
	from, to int // letters of the form, half open
	capital  bool
	letter   string // the first of them, as it becomes
}

func (t *teller) tell(e align.Edit) {
	if e.Op == align.Agreement {
		for k := range e.From {
			t.capitals(e.I+k, t.word[e.J+k])
		}
		return
	}
	t.closeRun()
	from := e.I + len(e.From) - 1
	to := name(t.word[e.J : e.J+len(e.To)])
	switch e.Op {
	case align.Insertion:
		t.say("insert %s%s", to, t.where(e.I-1))
		return
	case align.Deletion:
		if len(e.From) == 1 && strings.TrimSpace(t.form[e.I]) == "" {
			t.say("close up%s", t.where(e.I-1))
		} else {
			t.say("delete %s", t.letters(e.I, len(e.From)))
		}
	case align.Transposition:
		t.say("transpose %s and %s", t.nth(e.I), t.nth(e.I+1))
	default:
		t.say("substitute %s for %s", to, t.letters(e.I, len(e.From)))
	}
	t.touched = from
}

func (t *teller) say(format string, args ...any) {
	t.said = append(t.said, fmt.Sprintf(format, args...))
}

// where says after which letter something goes.
func (t *teller) where(i int) string {
	switch {
	case i < 0 && len(t.form) == 0:
		return ""
	case i < 0:
		return " before " + t.nth(0)
	case i == t.touched:
		return " after it"
	}
	return " after " + t.nth(i)
}

// capitals notes that letter i of the form becomes letter, if that is a change.
func (t *teller) capitals(i int, letter string) {
	if t.form[i] == letter {
		t.closeRun()
		return
	}
	capital := letter != strings.ToLower(letter)
	if t.run.to == i && t.run.to > t.run.from && t.run.capital == capital {
		t.run.to++
		return
	}
	t.closeRun()
	t.run = run{i, i + 1, capital, letter}
}

func (t *teller) closeRun() {
	r := t.run
	t.run = run{}
	what := "lower case"
	if r.capital {
		what = "capitals"
	}
	switch n := r.to - r.from; {
	case n == 0:
	case n == 1 && r.capital:
		t.say("capital %s", text.Visible(r.letter, false))
	case n == 1:
		t.say("lower-case %s", text.Visible(r.letter, false))
	case n == len(t.form):
		t.say("all in %s", what)
	default:
		t.say("%s from %s to %s", what, t.nth(r.from), t.nth(r.to-1))
	}
}

func (t *teller) letters(i, n int) string {
	if n == 1 {
		return t.nth(i)
	}
	return name(t.form[i : i+n])
}

var numbers = []string{"first", "second", "third", "fourth", "fifth", "sixth", "seventh", "eighth", "ninth"}

// nth names letter i of the form, by number where the form has it more than once.
func (t *teller) nth(i int) string {
	total, before := 0, 0
	for k, l := range t.form {
		if l == t.form[i] {
			if total++; k < i {
				before++
			}
		}
	}
	bare, special := strings.CutPrefix(name(t.form[i:i+1]), "a ")
	if !special {
		bare, special = strings.CutPrefix(bare, "an ")
	}
	switch {
	case total > 1 && before < len(numbers):
		return "the " + numbers[before] + " " + bare
	case special:
		return "the " + bare
	}
	return bare
}

// name returns letters as a sentence names them.
func name(letters []string) string {
	if len(letters) == 1 {
		switch l := letters[0]; {
		case strings.TrimSpace(l) == "":
			return "a space"
		case joins(l):
			return "a hyphen"
		case l == "'" || l == "’":
			return "an apostrophe"
		}
	}
	return text.Visible(strings.Join(letters, ""), false)
}
