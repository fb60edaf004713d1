package style

// Convention is the proof-correction practice that the marks follow. The marks
// of one convention are never mixed with another's.
type Convention string

// British is the practice of marking a letter in the text and writing the
// correction beside it, closed by a slash (common practice; from memory). In
// American practice a slash through a letter asks for lower case.
const British Convention = "British"

// Signs are the marks that the bench draws by itself, apart from text of the manuscript.
type Signs struct {
	Cursor, Checked, Unchecked string
	Agrees                     string // a candidate's letter is the form's
	Caret, Slash, Dele         string
	Transpose, Space, CloseUp  string
	Stet                       string // under each letter of a form that stands
	Capital, Lower             string
	Rule, Dot, Ellipsis, Arrow string
	Paragraph, Times           string
	Up, Down, Left, Right      string
	More, Less                 string   // a row goes on beyond the edge
	Open, Close                string   // around a form that no style can mark
	Strip                      []string // dispersion, from none to most
	Gap                        string
	ASCII                      bool // these are the stand-ins
}

// Unicode returns the signs for a terminal that shows UTF-8. None is wider than
// one column and none combines with its neighbour, since terminals differ in both.
func Unicode() Signs {
	return Signs{
		Cursor: "▸", Checked: "✓", Unchecked: " ", Agrees: "·",
		Caret: "‸", Slash: "/", Dele: "₰", Transpose: "∽", Space: "#", CloseUp: "⁐", Stet: ".",
		Capital: "cap", Lower: "lc",
		Rule: "─", Dot: "·", Ellipsis: "…", Arrow: "→", Paragraph: "¶", Times: "×",
		Up: "↑", Down: "↓", Left: "←", Right: "→", More: "›", Less: "‹",
		Open: "[", Close: "]", Gap: "│",
		Strip: []string{"▁", "▂", "▃", "▄", "▅", "▆", "▇", "█"},
	}
}

// ASCII returns stand-ins of ASCII characters alone.
func ASCII() Signs {
	return Signs{
		Cursor: ">", Checked: "x", Unchecked: " ", Agrees: ".",
		Caret: "^", Slash: "/", Dele: "_", Transpose: "~", Space: "#", CloseUp: "=", Stet: ".",
		Capital: "cap", Lower: "lc",
		Rule: "-", Dot: "-", Ellipsis: "~", Arrow: "->", Paragraph: "p", Times: "x",
		Up: "up", Down: "down", Left: "left", Right: "right", More: ">", Less: "<",
		Open: "[", Close: "]", Gap: "|",
		ASCII: true,
		Strip: []string{"_", ".", ":", "-", "=", "+", "*", "#"},
	}
}
