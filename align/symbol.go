package align

import "golang.org/x/text/unicode/norm"

// symbol is a letter as fitted costs tell letters apart in the neighbourhood of an
// edit: the letters a to z, the signs that stand within words, and one symbol for
// all others. A letter with marks has the symbol of its base letter.
type symbol uint8

const (
	edge       symbol = 0 // before the first letter and after the last
	apostrophe symbol = 27
	hyphen     symbol = 28
	blank      symbol = 29 // a space
	stop       symbol = 30
	other      symbol = 31
	symbols           = 32
)

// signs writes the symbols in a file of costs, one sign each.
const signs = "#abcdefghijklmnopqrstuvwxyz'-_.*"

func (s symbol) String() string { return signs[s : s+1] }

func (s symbol) isVowel() bool {
	switch s.String() {
	case "a", "e", "i", "o", "u", "y":
		return true
	}
	return false
}

// symbolOf returns the symbol of a folded letter.
func symbolOf(l Letter) symbol {
	switch {
	case 'a' <= l && l <= 'z':
		return symbol(l-'a') + 1
	case l == '\'':
		return apostrophe
	case l == '-':
		return hyphen
	case l == ' ':
		return blank
	case l == '.':
		return stop
	case l >= 0x80 && l < firstNumber:
		base := norm.NFD.PropertiesString(string(rune(l))).Decomposition()
		if len(base) > 0 && 'a' <= base[0] && base[0] <= 'z' {
			return symbol(base[0]-'a') + 1
		}
	}
	return other
}

// spell returns the symbols of letters.
func spell(letters []Letter) []symbol {
	out := make([]symbol, len(letters))
	for i, l := range letters {
		out[i] = symbolOf(l)
	}
	return out
}

// at returns the symbol at i, the edge where there is none.
func at(s []symbol, i int) symbol {
	if i < 0 || i >= len(s) {
		return edge
	}
	return s[i]
}

// position is where in the form an edit stands.
type position uint8

const (
	start     position = iota // before or on the first letter
	middle                    // between
	end                       // on one of the last two letters, or after them
	positions = 3
)

// positionOf returns the position of letter i of a form of n letters.
func positionOf(i, n int) position {
	switch {
	case i == 0:
		return start
	case i >= n-2:
		return end
	}
	return middle
}

// keyboard tells which keys lie beside each other.
type keyboard struct {
	rows []keyRow
	near [symbols][symbols]bool
}

// keyRow is the letters of a row of keys, and how far it is shifted to the right,
// in widths of a key.
type keyRow struct {
	shift float64
	keys  string
}

// qwerty is the layout of most English keyboards (ISO/IEC 9995-3, figure of the
// common layout, from memory); rows are shifted by about a quarter of a key and
// half a key more.
var qwerty = []keyRow{{0, "qwertyuiop"}, {0.25, "asdfghjkl"}, {0.75, "zxcvbnm"}}

// newKeyboard finds the neighbours: keys whose centres are less than 1.3 widths
// apart, which are those to the left and right and the two that touch in the next row.
func newKeyboard(rows []keyRow) keyboard {
	const reach = 1.3 * 1.3
	k := keyboard{rows: rows}
	type key struct {
		there bool
		x, y  float64
	}
	var at [symbols]key
	for y, row := range rows {
		for x, c := range row.keys {
			at[symbolOf(Letter(c))] = key{true, row.shift + float64(x), float64(y)}
		}
	}
	for a, p := range at {
		for b, q := range at {
			dx, dy := p.x-q.x, p.y-q.y
			k.near[a][b] = a != b && p.there && q.there && dx*dx+dy*dy < reach
		}
	}
	return k
}
