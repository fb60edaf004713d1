package align

import (
	"encoding/binary"
	"errors"
	"fmt"
	"math"
	"strings"
)

// The compiled form of costs says what a file of costs says, in the same order, for
// a program that embeds it: it is read in a hundredth of the time. It begins with
// compiledHead; all that follows is uvarints and texts after their lengths. Counts
// are in hundredths, as a file rounds them. A spot is how far its index is from that
// of the one before, its count and the number of its slips, and each slip the letter
// (a number of signs) and its count; stretches are three letters each.
const compiledHead = "costs\x01"

// hundredths are in a count of 1.
const hundredths = 100

// AppendBinary appends the costs in the form that [OpenCosts] reads. The costs that
// it reads are the same but for rounding: the very same where they come from a file.
// The bytes depend on the costs alone. It never fails.
func (f *Fitted) AppendBinary(b []byte) ([]byte, error) {
	number := func(n int) { b = binary.AppendUvarint(b, uint64(n)) }
	count := func(x float64) { b = binary.AppendUvarint(b, uint64(math.Round(x*hundredths))) }
	text := func(s string) {
		number(len(s))
		b = append(b, s...)
	}
	letters := func(s stretch) { b = append(b, byte(s[0]), byte(s[1]), byte(s[2])) }
	b = append(b, compiledHead...)
	text(f.Origin.Source)
	text(f.Origin.Licence)
	text(f.Origin.Date)
	number(f.Origin.Pairs)
	for _, x := range f.smooth.fields() {
		count(*x)
	}
	number(len(f.keys.rows))
	for _, r := range f.keys.rows {
		count(r.shift)
		text(r.keys)
	}
	c := *f.counts
	for _, x := range c.general.fields() {
		count(*x)
	}
	number(len(c.spots))
	number(len(c.slips))
	before := 0
	for i, s := range c.spots {
		slips := c.slipsOf(i, i+1)
		number(int(s.at) - before)
		count(s.met)
		number(len(slips))
		for _, slip := range slips {
			b = append(b, byte(slip.written))
			count(slip.n)
		}
		before = int(s.at)
	}
	number(len(c.stretches))
	for _, s := range c.stretches {
		letters(s.of)
		count(s.met)
		count(s.wrong)
	}
	number(len(c.long))
	for _, e := range c.long {
		letters(e.from)
		letters(e.to)
		count(e.n)
	}
	return b, nil
}

// fields are the numbers of what is counted apart from letters, in one order.
func (g *general) fields() []*float64 {
	const number = sides*positions*(2*looks+kinds) + 2*positions + 2*sides
	out := make([]*float64, 0, number)
	for side := range sides {
		for p := range positions {
			for look := range looks {
				out = append(out, &g.looks[side][p][look].met, &g.looks[side][p][look].wrong)
			}
			for kind := range kinds {
				out = append(out, &g.kinds[side][p][kind])
			}
		}
		out = append(out, &g.spaces[side].met, &g.spaces[side].wrong)
	}
	for p := range positions {
		out = append(out, &g.swaps[p].met, &g.swaps[p].wrong)
	}
	return out
}

// OpenCosts reads costs that [Fitted.AppendBinary] compiled. It takes a fraction of
// a millisecond and a dozen allocations for costs of 4,500 pairs. name is that of
// the data, for errors.
func OpenCosts(name, data string) (*Fitted, error) {
	r := compiledReader{data: data}
	f, err := r.costs()
	if err != nil {
		return nil, fmt.Errorf("%s: no compiled costs: %w; compile them anew", name, err)
	}
	return f, nil
}

// compiledReader reads the compiled form from a place on. Where it is damaged it is
// short from then on, and gives zeros and empty texts.
type compiledReader struct {
	data  string
	at    int
	short bool
}

func (r *compiledReader) costs() (*Fitted, error) {
	if !strings.HasPrefix(r.data, compiledHead) {
		return nil, errors.New("other first bytes than expected")
	}
	r.at = len(compiledHead)
	origin := Origin{Source: r.text(), Licence: r.text(), Date: r.text(), Pairs: int(r.number())}
	var by smoothing
	for _, x := range by.fields() {
		*x = r.count()
	}
	rows := make([]keyRow, r.length())
	for i := range rows {
		rows[i] = keyRow{r.count(), r.text()}
	}
	c := &counts{}
	for _, x := range c.general.fields() {
		*x = r.count()
	}
	if err := r.spots(c); err != nil {
		return nil, err
	}
	c.stretches = make([]stretchCount, r.length())
	for i := range c.stretches {
		c.stretches[i] = stretchCount{of: r.letters(), ratio: ratio{r.count(), r.count()}}
	}
	c.long = make([]longCount, r.length())
	for i := range c.long {
		e := longCount{longEdit{r.letters(), r.letters()}, r.count()}
		r.short = r.short || e.from.size() == 0 || e.to.size() == 0
		c.long[i] = e
	}
	if r.short || r.at != len(r.data) {
		return nil, errors.New("it ends too soon or too late")
	}
	f := newFitted(c, newKeyboard(rows), by)
	f.Origin = origin
	return f, nil
}

func (r *compiledReader) spots(c *counts) error {
	c.spots, c.slips = make([]spotCount, r.length()), make([]slipCount, r.length())
	at, slip := uint64(0), 0
	for i := range c.spots {
		step, met, slips := r.number(), r.count(), r.number()
		at += step
		if at >= groups*symbols || step == 0 && i > 0 || slips > uint64(len(c.slips)-slip) {
			return fmt.Errorf("spot %d is out of place", i)
		}
		wrong := 0.0
		for last := slip + int(slips); slip < last; slip++ {
			c.slips[slip] = slipCount{written: r.letter(), n: r.count()}
			wrong += c.slips[slip].n
		}
		c.spots[i] = spotCount{ratio{met, wrong}, int32(slip), uint16(at)}
	}
	if slip != len(c.slips) {
		return fmt.Errorf("%d slips at the spots, not %d", slip, len(c.slips))
	}
	return nil
}

// number reads a number of 49 bits at the most.
func (r *compiledReader) number() uint64 {
	var n uint64
	for shift := 0; shift < 49 && r.at < len(r.data); shift += 7 {
		b := r.data[r.at]
		r.at++
		n |= uint64(b&0x7f) << shift
		if b < 0x80 {
			return n
		}
	}
	r.end()
	return 0
}

// end says that there is less to read than there should be.
func (r *compiledReader) end() { r.at, r.short = len(r.data), true }

func (r *compiledReader) count() float64 { return float64(r.number()) / hundredths }

// length reads the number of things that follow, each of which takes a byte.
func (r *compiledReader) length() int {
	n := r.number()
	if n > uint64(len(r.data)-r.at) {
		r.end()
		return 0
	}
	return int(n)
}

func (r *compiledReader) text() string {
	n := r.length()
	r.at += n
	return r.data[r.at-n : r.at]
}

func (r *compiledReader) letter() symbol {
	if r.at == len(r.data) || r.data[r.at] >= symbols {
		r.end()
		return edge
	}
	r.at++
	return symbol(r.data[r.at-1])
}

func (r *compiledReader) letters() stretch { return stretch{r.letter(), r.letter(), r.letter()} }
