package main

import (
	"context"
	"fmt"
	"io"
	"os/exec"
	"path/filepath"
	"regexp"
	"slices"
	"strconv"
	"strings"
	"syscall"
	"testing"
	"time"

	"github.com/charmbracelet/x/vt"
	"github.com/creack/pty"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/internal/docket"
	"emendary/internal/ledger"
)

// enough is how long the longest review may take before its test gives up: half a
// minute at most, but several times that under the race detector on a busy machine.
const enough = 4 * time.Minute

// bench is the program's bench on a terminal, read off its screen as an editor does.
type bench struct {
	*terminal
	emulator *vt.Emulator
	screen   string // what the emulator shows
	ctx      context.Context
}

// review opens the bench on a manuscript, with flags.
func review(t *testing.T, manuscript string, flags ...string) *bench {
	t.Helper()
	ctx, cancel := context.WithTimeout(context.Background(), enough)
	t.Cleanup(cancel)
	cmd := exec.Command("emendary", append([]string{"review", filepath.Base(manuscript), "--as", "Anna"}, flags...)...)
	b := &bench{terminal: startOn(t, cmd, filepath.Dir(manuscript)), ctx: ctx}
	rows, columns, err := pty.Getsize(b.pty)
	require.NoError(t, err)
	b.emulator = vt.NewEmulator(columns, rows)
	// What the screen would answer goes nowhere. It is never closed: its Close races
	// with its Read.
	go func() { _, _ = io.Copy(io.Discard, b.emulator) }()
	return b
}

// wait reads until the screen is as wanted; what says in words how that is.
func (b *bench) wait(what string, wanted func() bool) {
	b.t.Helper()
	for !wanted() {
		select {
		case chunk, ok := <-b.chunks:
			if !ok {
				b.t.Fatalf("the program ended before the screen showed %s:\n%s", what, b.screen)
			}
			b.raw.Write(chunk)
			_, _ = b.emulator.Write(chunk)
			b.screen = b.emulator.String()
		case <-b.ctx.Done():
			b.t.Fatalf("the screen never showed %s:\n%s", what, b.screen)
		}
	}
}

// until waits for texts to be on the screen together.
func (b *bench) until(texts ...string) {
	b.t.Helper()
	b.wait(fmt.Sprintf("%q", texts), func() bool {
		return !slices.ContainsFunc(texts, func(text string) bool { return !strings.Contains(b.screen, text) })
	})
}

// What is where on the screen.
var (
	heads        = regexp.MustCompile(`(?m)^(?: +\d+ to \d+ of \d+)? +(\S.*?) +bits  share`)
	loneHeads    = regexp.MustCompile(`(?m)^ +(\S.*?) *\n.*no word is near this form`)
	candidate    = regexp.MustCompile(`(?m)^ [▸ ] (\S.*?)  .* (?:<1|\d+) %`)
	candidates   = regexp.MustCompile(`(?m)^ +\d+ to \d+ of (\d+) .*bits  share`)
	lastOnScreen = regexp.MustCompile(`(?m)^ +\d+ to (\d+) of \d+ .*bits  share`)
	rowInFocus   = regexp.MustCompile(`(?m)^ ▸ (\S.*?)  `)
	tally        = regexp.MustCompile(`(\d+ open.* quer(?:y|ies))`)
	ruledCount   = regexp.MustCompile(`(\d+) ruled`)
	checked      = regexp.MustCompile(`concordance · (\d+) of \d+ checked`)
	citations    = regexp.MustCompile(`concordance · \d+ of (\d+) checked`)
	firstInLine  = regexp.MustCompile(`▸concordance · \d+ of \d+ checked *(?:1 to \d+ *)?\n(▸)`)
	citation     = regexp.MustCompile(`(?m)^(▸[✓ ] .*)$`)
	kinds        = regexp.MustCompile(`(?m)^ ▸kind +(.*)$`)
	kindOfWord   = regexp.MustCompile(`(?m)^ ▸kind .*\[(.*)\]`)
)

// find returns what the group of an expression matches on screen; "" for nothing.
func (b *bench) find(expression *regexp.Regexp) string {
	if m := expression.FindStringSubmatch(b.screen); m != nil {
		return m[1]
	}
	return ""
}

// number returns the number that the group of an expression matches; 0 for none.
func (b *bench) number(expression *regexp.Regexp) int {
	n, _ := strconv.Atoi(b.find(expression)) // "" where there is none
	return n
}

// form returns the form on screen, bare, once its candidates are there too; ""
// before.
func (b *bench) form() string {
	if form := b.find(heads); form != "" {
		return bare(form)
	}
	return bare(b.find(loneHeads))
}

// bare returns text as forms are compared here: without spaces and the marks that
// columns have in their place.
func bare(text string) string { return strings.NewReplacer(" ", "", "‸", "", "#", "").Replace(text) }

// press types keys and waits for a text.
func (b *bench) press(keys string, texts ...string) {
	b.t.Helper()
	b.typeKeys(keys)
	b.until(texts...)
}

// ruled types the last key of a ruling and waits until the bench has said what was
// ruled and has moved on. The message is drawn below all that changes.
func (b *bench) ruled(keys, message string) {
	b.t.Helper()
	before := b.find(tally)
	b.typeKeys(keys)
	b.wait(message, func() bool {
		return b.find(tally) != before && strings.Contains(bare(b.screen), bare(message))
	})
}

// chooses moves to the candidate that is word, and reports whether there is one.
func (b *bench) chooses(word string) bool {
	b.t.Helper()
	rows := b.rows()
	if !slices.Contains(rows, word) && b.number(candidates) > len(rows) { // the rest is further down
		b.typeKeys(strings.Repeat("j", b.number(candidates)))
		b.wait("the last candidate under the cursor", func() bool {
			rows = b.rows()
			return len(rows) > 0 && b.number(lastOnScreen) == b.number(candidates) && b.find(rowInFocus) == rows[len(rows)-1]
		})
	}
	at, to := slices.Index(rows, b.find(rowInFocus)), slices.Index(rows, word)
	if to < 0 {
		return false
	}
	b.typeKeys(strings.Repeat("k", max(0, at-to)) + strings.Repeat("j", max(0, to-at)))
	b.wait(word+" under the cursor", func() bool { return b.find(rowInFocus) == word })
	return true
}

// rows returns the candidates on screen, from the top.
func (b *bench) rows() []string {
	var out []string
	for _, m := range candidate.FindAllStringSubmatch(b.screen, -1) {
		out = append(out, m[1])
	}
	return out
}

// checksAll checks every citation.
func (b *bench) checksAll() {
	b.t.Helper()
	all := b.number(citations)
	if b.number(checked) == all {
		return
	}
	b.typeKeys("\t" + strings.Repeat("k", all))
	b.wait("the first citation under the cursor", func() bool { return b.find(firstInLine) != "" })
	for {
		line, n := b.find(citation), b.number(checked)
		if strings.HasPrefix(line, "▸ ") {
			b.typeKeys(" ")
			b.wait("one more citation checked", func() bool { return b.number(checked) == n+1 })
			n++
		}
		if n == all {
			return
		}
		line = b.find(citation)
		b.typeKeys("j")
		b.wait("the next citation", func() bool { return b.find(citation) != line })
	}
}

// rules makes a ruling on the entry on screen, as an editor does who knows what
// is right.
func (b *bench) rules(form string, right docket.Line) {
	b.t.Helper()
	switch right.Act {
	case ledger.Accept:
		typed := ""
		if !b.chooses(right.Word) {
			typed = ";" + right.Word + "\r"
		}
		b.checksAll()
		if typed == "" {
			typed = "f"
		}
		b.ruled(typed, "accepted "+right.Word+" for "+form)
	case ledger.Reject:
		b.checksAll()
		b.ruled("d", form+" stands")
	case ledger.Add:
		b.checksAll()
		b.press("s", "list        [book]", "▸kind")
		kinds := strings.Fields(strings.NewReplacer("[", " ", "]", " ").Replace(b.find(kinds)))
		from, to := slices.Index(kinds, b.find(kindOfWord)), slices.Index(kinds, right.Kind)
		require.True(b.t, from >= 0 && to >= 0, b.screen)
		b.ruled(strings.Repeat("h", max(0, from-to))+strings.Repeat("l", max(0, to-from))+"\r",
			"added "+form+" to the book list as "+right.Kind)
	case ledger.Query:
		b.checksAll()
		b.press("a"+right.Query, "[alone]", "[author]")
		b.ruled("\r", "query to author on "+form)
	}
}

// answers returns the ruling that the truth of the demo has for each bare form.
func answers(t *testing.T) map[string]docket.Line {
	t.Helper()
	lines, err := docket.ReadLines(strings.NewReader(truth(t)), "truth.tsv")
	require.NoError(t, err)
	out := make(map[string]docket.Line, len(lines))
	for _, l := range lines {
		key := bareForm(l.Form)
		require.NotContains(t, out, key)
		out[key] = l
	}
	return out
}

// bareForm returns a form bare and with straight apostrophes, as the docket has them.
func bareForm(form string) string { return strings.ReplaceAll(bare(form), "’", "'") }

func TestReviewOfTheWholeDemo(t *testing.T) {
	t.Parallel()
	manuscript := demoCopy(t)
	original := readFile(t, manuscript)
	right := answers(t)
	b := review(t, manuscript)
	asked := map[string]int{}
	for {
		b.wait("an entry, or that none is open", func() bool {
			return b.form() != "" || strings.Contains(b.screen, "Nothing is open")
		})
		form := b.form()
		if form == "" {
			break
		}
		ruling, ok := right[bareForm(form)]
		require.True(t, ok, "the truth has no ruling on %s:\n%s", form, b.screen)
		asked[form]++
		if ruling.Act == ledger.Query && asked[form] == 1 { // to be asked once all else is ruled on
			b.ruled("g", form+" put off")
			continue
		}
		b.rules(form, ruling)
	}
	b.until("0 open", fmt.Sprintf("%d ruled · 2 queries", len(right)))
	b.typeKeys("q")
	require.Equal(t, 0, b.ends())
	assert.Contains(t, b.text(), fmt.Sprintf("manuscript.md: 0 open, %d ruled, 2 queries", len(right)))
	for form, times := range asked {
		if want := right[bareForm(form)].Act; want == ledger.Query {
			assert.Equal(t, 2, times, "%s was put off once", form)
		} else {
			assert.Equal(t, 1, times, "%s is asked once", form)
		}
	}

	status, stdout, stderr := inProcess(t, "", "docket", manuscript, "--format", "jsonl")
	require.Equal(t, 0, status, stderr)
	assert.Empty(t, stdout, "open entries")

	status, stdout, stderr = inProcess(t, "", "report", "rulings", manuscript)
	require.Equal(t, 0, status, stderr)
	made, err := docket.ReadLines(strings.NewReader(stdout), "rulings")
	require.NoError(t, err)
	require.Len(t, made, len(right))
	for _, got := range made {
		want := right[bareForm(got.Form)]
		assert.Equal(t, []any{want.Act, want.Word, want.List, want.Kind, want.Query, want.To, ledger.Every, "Anna"},
			[]any{got.Act, got.Word, got.List, got.Kind, got.Query, got.To, got.Scope, got.Who}, got.Form)
	}

	status, _, stderr = inProcess(t, "", "apply", manuscript)
	require.Equal(t, 0, status, stderr)
	want, got := readFile(t, filepath.Join(demo, "emended.md")), readFile(t, emendedName(manuscript))
	if got != want {
		t.Error(firstDifference(want, got))
	}
	assert.Equal(t, original, readFile(t, manuscript))
}

func TestKillInTheMiddleOfAReview(t *testing.T) {
	t.Parallel()
	const rulings = 10
	manuscript := demoCopy(t)
	right := answers(t)
	b := review(t, manuscript, "--order", "place")
	var forms []string
	for b.number(ruledCount) < rulings {
		b.wait("an entry", func() bool { return b.form() != "" })
		forms = append(forms, b.form())
		b.rules(b.form(), right[bareForm(b.form())])
	}
	b.wait("the next entry", func() bool { return b.form() != "" })
	next, stood := b.form(), b.find(tally)
	require.NotContains(t, forms, next)
	require.NoError(t, b.cmd.Process.Signal(syscall.SIGKILL))
	require.Equal(t, -1, b.ends(), "ended by the signal")
	require.FileExists(t, manuscript+".ledger.lock")

	again := review(t, manuscript, "--order", "place")
	again.until(stood)
	again.wait("the entry that was on screen", func() bool { return again.form() == next })
	again.rules(next, right[bareForm(next)])
	again.typeKeys("q")
	assert.Equal(t, 0, again.ends())
}

func TestKeysSentInOneBurstAllCount(t *testing.T) {
	t.Parallel()
	const rulings = 40
	manuscript := demoCopy(t)
	b := review(t, manuscript, "--order", "place")
	b.typeKeys(strings.Repeat("d", rulings) + "q") // at once, before the first screen
	b.wait("nothing more", func() bool { return strings.Contains(b.raw.String(), "manuscript.md: ") })
	require.Equal(t, 0, b.ends())

	s, err := docket.Start(b.ctx, docket.Options{Manuscript: manuscript, ToRead: true})
	require.NoError(t, err)
	defer s.Close()
	var ruled, entries []string
	carried := map[string]bool{} // related forms, ruled on with others
	for _, r := range s.Docket.Rulings() {
		assert.Equal(t, ledger.Reject, r.Act, r.Form)
		if !r.With.IsZero() {
			carried[r.Form] = true
		} else {
			ruled = append(ruled, r.Form)
		}
	}
	for _, e := range s.Docket.Entries {
		if !carried[e.Form] {
			entries = append(entries, e.Form)
		}
	}
	assert.Equal(t, entries[:rulings], ruled)
}

func TestATerminalOfAnotherSizeShowsTheSameEntry(t *testing.T) {
	t.Parallel()
	b := review(t, demoCopy(t), "--order", "place")
	b.until("▸ Merrick")
	b.press("l", "▸ harbour")
	b.press("jjj", "▸ barber")
	foot := regexp.MustCompile("f accept|jk row")
	for _, size := range []struct{ columns, rows int }{{160, 50}, {60, 18}, {80, 24}} {
		b.emulator.Resize(size.columns, size.rows)
		require.NoError(t, pty.Setsize(b.pty, &pty.Winsize{Cols: uint16(size.columns), Rows: uint16(size.rows)}))
		// The head and the foot are drawn for this size, the entry between them.
		rule := regexp.MustCompile(fmt.Sprintf(`(?m)^ (─{%d}) ?$`, size.columns-2))
		b.wait(fmt.Sprintf("a bench of %d × %d", size.columns, size.rows), func() bool {
			lines := strings.Split(b.screen, "\n")
			return b.find(rule) != "" && foot.MatchString(lines[len(lines)-1])
		})
		assert.Equal(t, "harber", b.form(), "%d × %d:\n%s", size.columns, size.rows, b.screen)
		assert.Equal(t, "barber", b.find(rowInFocus), "%d × %d:\n%s", size.columns, size.rows, b.screen)
	}
	b.ruled("f", "accepted barber for harber")
	b.typeKeys("q")
	assert.Equal(t, 0, b.ends())
}
