package ui

// wide is from how many columns on the concordance stands beside the alignment.
const wide = 120

// frame is how many lines each part of the bench gets.
type frame struct {
	passage, gap, alignment, air, facts, line, concordance, related int
	footer                                                          int
	left                                                            int // columns of the left half; all of them where narrow
	right                                                           int // of the right half; 0 where narrow
}

// typedLines is how many lines the line being typed takes.
func (m *Model) typedLines() int {
	switch m.screen {
	case onCorrection, onLanguage:
		return 2
	case onAddition, onQuery:
		return 4
	case onActions:
		return 3
	case onFailure:
		return 4
	}
	return 0
}

// body is how many lines are left between the head and the footer.
func (m *Model) body(footer int) int { return m.height - 2 - 1 - footer }

// frame shares the screen out. The alignment keeps its place from entry to entry:
// only what is typed and the related forms take lines from the concordance.
func (m *Model) frame() frame {
	f := frame{left: m.width, footer: 2, facts: 1, passage: 3, line: m.typedLines()}
	if m.height < 22 {
		f.footer, f.passage = 1, 2
	}
	extra := max(0, m.height-24)
	f.passage = min(f.passage+extra/6, 8)
	rows := min(5+extra/3, candidates)
	if m.height < 24 {
		rows = max(3, 5-(24-m.height+1)/2)
	}
	f.alignment = 1 + rows + 3
	kin := len(m.related.Rows())
	if kin > 0 {
		f.related = 1 + min(kin, 1+extra/4)
		if m.focus == onRelated {
			f.related = max(f.related, 1+min(kin, 3))
		}
	}
	if m.width >= wide {
		f.facts = 2
	}
	rest := m.body(f.footer) - f.passage - f.alignment - f.facts
	if m.width >= wide {
		f.left = min(m.width*11/20, 92)
		f.right = m.width - f.left - 2
		f.concordance = m.body(f.footer)
		f.gap = 1
		if rest > f.line+1+kin+2 {
			f.air, rest = 1, rest-1
		}
		f.related = min(max(0, rest-f.line-f.gap), 1+kin)
		if kin == 0 {
			f.related = 0
		}
		return f
	}
	if rest-f.related > 5 {
		f.gap, rest = 1, rest-1
	}
	if extra > 4 {
		f.air, rest = 1, rest-1
	}
	if f.line > 0 {
		f.related = 0 // what is typed comes first
	}
	f.line = min(f.line, max(0, rest))
	f.related = min(f.related, max(0, rest-f.line-2))
	f.concordance = rest - f.line - f.related
	return f
}

// layout gives every part its size.
func (m *Model) layout() {
	if m.tooSmall() {
		return
	}
	f := m.frame()
	m.passage.SetSize(f.left, f.passage)
	if f.right > 0 {
		m.alignment.SetSize(f.left-1, f.alignment)
		m.concordance.SetSize(f.right, f.concordance)
	} else {
		m.alignment.SetSize(f.left, f.alignment)
		m.concordance.SetSize(f.left, f.concordance)
	}
	m.related.SetSize(f.left, f.related)
	m.page.SetSize(m.width, m.height-6) // a line says how much is below
	m.finder.SetSize(m.width, m.height-5)
}

// resize takes the terminal's new size.
func (m *Model) resize(width, height int) {
	m.width, m.height = width, height
	m.layout()
	switch m.screen {
	case onHelp:
		m.page.Show(m.helpLines(), 0)
	case onParagraph:
		m.showParagraph()
	}
}

func (m *Model) tooSmall() bool { return m.width < leastWidth || m.height < leastHeight }
