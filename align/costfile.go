package align

import (
	"bufio"
	"fmt"
	"io"
	"slices"
	"strconv"
	"strings"
)

// A file of costs is UTF-8 text in lines of fields parted by tabs. It begins
// with the line of costsHead; a line that starts with # is a remark. What the
// first field says of the others:
//
//	source   text: who made the pairs, and where they are from
//	licence  text: theirs
//	date     of the fitting, 2006-01-02
//	pairs    their number
//	lean     six numbers: how many meetings a coarser estimate counts for, for the
//	         chance of a slip and for what is written then, coarsest first; and
//	         two more: for transpositions, for edits of several letters
//	keys     a row of the keyboard: its shift to the right in keys, its letters
//	look     letter or gap; start, middle or end; look (see spot); met, wrong
//	kind     letter or gap; start, middle or end; kind; count
//	space    letter or gap: left out or too many; words met, wrong
//	swaps    start, middle or end; met, swapped
//	letter   letter before, letter of the word, letter of the form after; met; and
//	         for each other letter written there: the letter (# for none), count
//	gap      letter before, letter of the form after; met; and for each letter
//	         too many written there: the letter, count
//	stretch  letters of the word; met, swapped
//	long     letters of the form, of the word; count
//
// Letters are written as in signs: # is the edge of the word, _ a space, * any
// other letter. Counts are rounded to two places, and what comes to nothing then
// is left out, so that files differ only where costs do.
const costsHead = "emendary costs 1"

// sideNames and positionNames are what a file calls sides and positions.
var (
	sideNames     = [sides]string{"letter", "gap"}
	positionNames = [positions]string{"start", "middle", "end"}
)

// WriteTo writes the costs as a file that [ReadCosts] reads. The costs that it
// reads are the same but for rounding.
func (f *Fitted) WriteTo(w io.Writer) (int64, error) {
	b := &strings.Builder{}
	line := func(fields ...string) { b.WriteString(strings.Join(fields, "\t") + "\n") }
	b.WriteString(costsHead + "\n")
	line("source", f.Origin.Source)
	line("licence", f.Origin.Licence)
	line("date", f.Origin.Date)
	line("pairs", strconv.Itoa(f.Origin.Pairs))
	lean := []string{"lean"}
	for _, x := range f.smooth.fields() {
		lean = append(lean, figure(*x))
	}
	line(lean...)
	for _, r := range f.keys.rows {
		line("keys", figure(r.shift), r.keys)
	}
	c := f.counts
	for side, name := range sideNames {
		for p, at := range positionNames {
			for look, r := range c.looks[side][p] {
				if r.met >= least {
					line("look", name, at, strconv.Itoa(look), figure(r.met), figure(r.wrong))
				}
			}
			for k, n := range c.kinds[side][p] {
				if n >= least {
					line("kind", name, at, kindNames[k], figure(n))
				}
			}
		}
	}
	for side, name := range sideNames {
		line("space", name, figure(c.spaces[side].met), figure(c.spaces[side].wrong))
	}
	for p, at := range positionNames {
		line("swaps", at, figure(c.swaps[p].met), figure(c.swaps[p].wrong))
	}
	for i, s := range c.spots {
		if s.met >= least {
			line(s.fields(c.slipsOf(i, i+1))...)
		}
	}
	for _, s := range c.stretches {
		if s.met >= least {
			line("stretch", s.of.String(), figure(s.met), figure(s.wrong))
		}
	}
	for _, e := range c.long {
		line("long", e.from.String(), e.to.String(), figure(e.n))
	}
	n, err := io.WriteString(w, b.String())
	return int64(n), err
}

// least is the smallest count that a file shows.
const least = 0.005

// figure writes a count.
func figure(x float64) string {
	s := strconv.FormatFloat(x, 'f', 2, 64)
	return strings.TrimSuffix(strings.TrimRight(s, "0"), ".")
}

// fields are those of a spot with the slips there.
func (r spotCount) fields(slips []slipCount) []string {
	s := spotAt(int(r.at))
	fields := []string{"letter", s.left.String(), s.letter.String(), s.right.String(), figure(r.met)}
	if s.gap {
		fields = []string{"gap", s.left.String(), s.right.String(), figure(r.met)}
	}
	for _, slip := range slips {
		if slip.n >= least {
			fields = append(fields, slip.written.String(), figure(slip.n))
		}
	}
	return fields
}

func (t stretch) String() string {
	var b strings.Builder
	for _, s := range t[:t.size()] {
		b.WriteString(s.String())
	}
	return b.String()
}

// fields are the numbers of a smoothing in the order of a file.
func (s *smoothing) fields() []*float64 {
	return []*float64{&s.wrong[0], &s.wrong[1], &s.wrong[2], &s.written[0], &s.written[1], &s.written[2], &s.swap, &s.long}
}

// ReadCosts reads costs that [Fitted.WriteTo] wrote. Errors name the line; name
// is the file's.
func ReadCosts(r io.Reader, name string) (*Fitted, error) {
	in := costReader{t: newTally()}
	lines := bufio.NewScanner(r)
	n := 0
	for lines.Scan() {
		n++
		line := lines.Text()
		if n == 1 {
			if line != costsHead {
				return nil, fmt.Errorf("%s: no file of costs: it begins with %.30q, not with %q; fit one anew", name, line, costsHead)
			}
			continue
		}
		if line == "" || line[0] == '#' {
			continue
		}
		in.fields = append(in.fields[:0], strings.Split(line, "\t")...)
		if err := in.line(); err != nil {
			return nil, fmt.Errorf("%s: line %d: %w; fit the costs anew", name, n, err)
		}
	}
	if err := lines.Err(); err != nil {
		return nil, fmt.Errorf("%s: line %d: %w", name, n+1, err)
	}
	if n == 0 || len(in.t.spots) == 0 {
		return nil, fmt.Errorf("%s: it has no costs; fit some", name)
	}
	f := newFitted(in.t.rest(), newKeyboard(in.rows), in.smooth)
	f.Origin = in.origin
	return f, nil
}

// costFields is how many fields follow the first, where their number is fixed.
var costFields = map[string]int{
	"source": 1, "licence": 1, "date": 1, "pairs": 1, "lean": 8, "keys": 2,
	"look": 5, "kind": 4, "space": 3, "swaps": 3, "stretch": 3, "long": 3,
}

// costReader reads a file of costs line by line.
type costReader struct {
	origin Origin
	t      *tally
	rows   []keyRow
	smooth smoothing
	fields []string
}

func (r *costReader) line() error {
	of, rest := r.fields[0], r.fields[1:]
	if n, ok := costFields[of]; ok && len(rest) != n {
		return fmt.Errorf("%s has %d fields, not %d", of, len(rest), n)
	}
	p := parser{}
	switch of {
	case "source":
		r.origin.Source = rest[0]
	case "licence":
		r.origin.Licence = rest[0]
	case "date":
		r.origin.Date = rest[0]
	case "pairs":
		r.origin.Pairs = int(p.count(rest[0]))
	case "lean":
		for i, x := range r.smooth.fields() {
			*x = p.count(rest[i])
		}
	case "keys":
		r.rows = append(r.rows, keyRow{p.count(rest[0]), rest[1]})
	case "look":
		look := p.among(rest[2], lookNames[:])
		r.t.looks[p.among(rest[0], sideNames[:])][p.among(rest[1], positionNames[:])][look] = ratio{p.count(rest[3]), p.count(rest[4])}
	case "kind":
		r.t.kinds[p.among(rest[0], sideNames[:])][p.among(rest[1], positionNames[:])][p.among(rest[2], kindNames[:])] = p.count(rest[3])
	case "space":
		r.t.spaces[p.among(rest[0], sideNames[:])] = ratio{p.count(rest[1]), p.count(rest[2])}
	case "swaps":
		r.t.swaps[p.among(rest[0], positionNames[:])] = ratio{p.count(rest[1]), p.count(rest[2])}
	case "letter":
		p.spot(r.t, rest, 3)
	case "gap":
		p.spot(r.t, rest, 2)
	case "stretch":
		s := p.stretch(rest[0])
		r.t.met[s] = p.count(rest[1])
		if n := p.count(rest[2]); n > 0 {
			r.t.swapped[s] = n
		}
	case "long":
		r.t.long[longEdit{p.stretch(rest[0]), p.stretch(rest[1])}] = p.count(rest[2])
	default:
		return fmt.Errorf("%.30q says nothing known", of)
	}
	return p.err
}

// lookNames are the looks as a file has them.
var lookNames = [looks]string{"0", "1", "2", "3", "4", "5", "6", "7"}

// parser reads fields; its error is that of the first it could not read.
type parser struct{ err error }

func (p *parser) fail(format string, args ...any) {
	if p.err == nil {
		p.err = fmt.Errorf(format, args...)
	}
}

func (p *parser) count(s string) float64 {
	x, err := strconv.ParseFloat(s, 64)
	if err != nil || x < 0 || x > 1e12 {
		p.fail("%.30q is no count", s)
		return 0
	}
	return x
}

func (p *parser) among(s string, names []string) int {
	i := slices.Index(names, s)
	if i < 0 {
		p.fail("%.30q is none of %s", s, strings.Join(names, ", "))
		return 0
	}
	return i
}

func (p *parser) symbol(s string) symbol {
	if i := strings.Index(signs, s); i >= 0 && len(s) == 1 {
		return symbol(i)
	}
	p.fail("%.30q is no letter; letters are written as one of %s", s, signs)
	return other
}

func (p *parser) stretch(s string) stretch {
	var t stretch
	if len(s) == 0 || len(s) > len(t) {
		p.fail("%.30q is not one to three letters", s)
		return t
	}
	for i := range len(s) {
		if t[i] = p.symbol(s[i : i+1]); t[i] == edge {
			p.fail("%.30q is not one to three letters", s)
		}
	}
	return t
}

// spot reads what is known of a spot that the first n fields name.
func (p *parser) spot(t *tally, fields []string, n int) {
	if len(fields) < n+1 || (len(fields)-n-1)%2 != 0 {
		p.fail("%d fields; want the letters, a count, and pairs of letter and count", len(fields))
		return
	}
	s := spot{gap: n == 2, left: p.symbol(fields[0]), right: p.symbol(fields[n-1])}
	if !s.gap {
		s.letter = p.symbol(fields[1])
	}
	r := ratio{met: p.count(fields[n])}
	var slips [symbols]float64
	for rest := fields[n+1:]; len(rest) > 0; rest = rest[2:] {
		x := p.count(rest[1])
		slips[p.symbol(rest[0])] = x
		r.wrong += x
	}
	t.spots[s.index()] = r
	if r.wrong > 0 {
		t.slips[s.index()] = slips
	}
}
