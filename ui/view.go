package ui

import (
	"fmt"
	"path/filepath"
	"strings"

	"github.com/charmbracelet/bubbles/key"

	"emendary/ui/text"
)

// keyLine lists keys by their first names on a line of width columns, whole ones
// only; a sign at the end says that there are more.
func (m Model) keyLine(keys []key.Binding, width int) string {
	line := ""
	for i, b := range keys {
		item := m.sheet.Key.Render(m.keyName(strings.Fields(b.Help().Key)[0])) + " " + m.sheet.Quiet.Render(b.Help().Desc)
		if i > 0 {
			item = "  " + item
		}
		room := width - 2 // for the sign
		if i == len(keys)-1 {
			room = width
		}
		if text.Width(line)+text.Width(item) > room {
			return line + " " + m.sheet.Quiet.Render(m.sheet.Signs.Ellipsis)
		}
		line += item
	}
	return line
}

// View draws the screen: exactly as many lines as the terminal has, none wider.
func (m Model) View() string {
	switch {
	case m.width == 0:
		return ""
	case m.tooSmall():
		times := m.sheet.Signs.Times
		return text.Cut(fmt.Sprintf("the bench needs %d%s%d; this screen is %d%s%d",
			leastWidth, times, leastHeight, m.width, times, m.height), m.width, "")
	}
	lines := []string{m.head(), m.sheet.Quiet.Render(" " + strings.Repeat(m.sheet.Signs.Rule, m.width-2))}
	keys := m.footer()
	room := m.height - len(lines) - len(keys) - 1
	lines = append(lines, text.Fit(m.middle(), m.width, room)...)
	lines = append(lines, m.messageLine())
	lines = append(lines, keys...)
	return strings.Join(text.Fit(lines, m.width, m.height), "\n")
}

// head is the first line: where the editor is, and how far along.
func (m Model) head() string {
	d, s := m.docket, m.sheet.Signs
	dot := " " + s.Dot + " "
	title := m.visible(d.Document.Title)
	if title == "" {
		title = m.visible(filepath.Base(d.Document.Path))
	}
	where := ""
	if first := m.firstChapter(); m.entry != nil && len(m.entry.Occurrences) > 0 && len(d.Document.Parts) > first+1 {
		part := d.Citation(m.entry, m.concordance.Cursor()).Part
		if part >= first {
			where = fmt.Sprintf("%schapter %d of %d", dot, part-first+1, len(d.Document.Parts)-first)
		}
		if name := m.visible(d.Document.Parts[part].Title); name != "" && m.width >= 100 {
			where += dot + name
		}
	}
	t := d.Tally()
	open := fmt.Sprintf("%d open", t.Open)
	if t.PutOff > 0 {
		open += fmt.Sprintf(" (%d later)", t.PutOff)
	}
	tally := fmt.Sprintf("%s%s%d ruled%s%s", open, dot, t.Ruled, dot, count(t.Queries, "query"))
	room := m.width - 4 - text.Width(tally) - text.Width(where)
	return text.Ends(" "+m.sheet.Title.Render(text.Cut(title, max(room, 8), s.Ellipsis))+where, tally+" ", m.width, s.Ellipsis)
}

// messageLine says what the last key did.
func (m Model) messageLine() string {
	s := " " + text.Cut(m.message, m.width-2, m.sheet.Signs.Ellipsis)
	if m.batch != nil && m.screen != onFailure {
		s = " writing the ruling " + m.sheet.Signs.Ellipsis
	}
	if m.alarm {
		return m.sheet.Alarm.Render(s)
	}
	return m.sheet.Settled.Render(s)
}

// footer lists the keys that matter now, on as many lines as the frame has.
func (m Model) footer() []string {
	list := func(keys ...key.Binding) string { return " " + m.keyLine(keys, m.width-2) }
	full := m.frame().footer
	only := func(keys []key.Binding) []string {
		return text.Fit([]string{list(keys...)}, m.width, full)
	}
	switch m.screen {
	case onFailure:
		return only(m.Failure.ShortHelp())
	case onHelp, onParagraph:
		p := m.page.Keys
		return only([]key.Binding{p.Close, pair(p.Down, p.Up, "line"), pair(p.PageUp, p.PageDown, "page")})
	case onFinder:
		return only(m.finder.Keys.ShortHelp())
	case onCorrection:
		c := m.correction.Keys
		return only([]key.Binding{c.Accept, brief(c.Query, "with a query"), brief(c.Form, "the form"), brief(c.Candidate, "the candidate"), c.Leave})
	case onAddition:
		a := m.addition.Keys
		return only([]key.Binding{a.Add, pair(a.Left, a.Right, "choose"), pair(a.Down, a.Up, "list, kind, note"), brief(a.Query, "with a query"), a.Leave})
	case onQuery:
		return only(m.query.Keys.ShortHelp())
	case onLanguage:
		return only([]key.Binding{brief(m.language.Keys.Stand, "let stand"), m.language.Keys.Leave})
	case onActions:
		return only([]key.Binding{pair(m.Strip.Left, m.Strip.Right, "choose"), m.Strip.Do, m.Strip.Close})
	case onFinished:
		return only([]key.Binding{m.Keys.Previous, m.Keys.Find, m.Keys.Undo, m.Keys.Redo, m.Keys.Help, m.Keys.Quit})
	}
	k := m.Keys
	var second []key.Binding
	switch m.focus {
	case onAlignment:
		second = []key.Binding{pair(m.alignment.Keys.Down, m.alignment.Keys.Up, "row"), pair(k.Previous, k.Next, "entry"), k.NextOpen, k.Find, m.nextPart()}
	case onConcordance:
		c := m.concordance.Keys
		second = []key.Binding{pair(c.Down, c.Up, "row"), brief(c.Check, "check"), brief(c.Setting, "setting"), brief(c.Open, "paragraph"), m.nextPart()}
	case onRelated:
		r := m.related.Keys
		second = []key.Binding{pair(r.Down, r.Up, "row"), brief(r.Check, "check"), pair(k.Previous, k.Next, "entry"), m.nextPart()}
	}
	if full == 1 && m.onPassage() {
		return []string{list(k.Stand, k.Unfold, k.Query, k.Help)}
	}
	if full == 1 {
		return []string{list(k.Accept, k.Stand, k.Add, k.Query, k.Correct, k.Help)}
	}
	second = append(second, k.Help, k.Quit)
	return []string{list(m.rulingKeys()...), list(second...)}
}

// pair names two keys that go opposite ways by their letters, under one word.
func pair(a, b key.Binding, desc string) key.Binding {
	first := func(k key.Binding) string { return strings.Fields(k.Help().Key)[0] }
	return key.NewBinding(key.WithKeys(append(a.Keys(), b.Keys()...)...), key.WithHelp(first(a)+first(b), desc))
}

// brief is a key under a shorter word than its help has.
func brief(k key.Binding, desc string) key.Binding {
	k.SetHelp(k.Help().Key, desc)
	return k
}

// nextPart is the key for the next focus under the name of where it leads.
func (m Model) nextPart() key.Binding {
	switch {
	case m.focus == onAlignment:
		return brief(m.Keys.Focus, "concordance")
	case m.focus == onConcordance && len(m.kin) > 0:
		return brief(m.Keys.Focus, "related")
	}
	return brief(m.Keys.Focus, "alignment")
}

// middle is what stands between the head and the message.
func (m Model) middle() []string {
	switch m.screen {
	case onHelp, onParagraph:
		lines := strings.Split(m.page.View(), "\n")
		if n := m.page.Rest(); n > 0 {
			lines = append(lines, m.sheet.Quiet.Render(fmt.Sprintf(" %s %s below", m.sheet.Signs.Down, count(n, "line"))))
		}
		return lines
	case onFinder:
		return strings.Split(m.finder.View(), "\n")
	}
	if m.entry == nil {
		return m.finished()
	}
	return m.bench()
}

// bench draws the entry.
func (m Model) bench() []string {
	f := m.frame()
	split := func(s string, n int) []string { return text.Fit(strings.Split(s, "\n"), f.left, n) }
	lines := split(m.passage.View(), f.passage)
	lines = append(lines, make([]string, f.gap)...)
	lines = append(lines, split(m.alignment.View(), f.alignment)...)
	lines = append(lines, make([]string, f.air)...)
	lines = append(lines, m.factsLines(f)...)
	line := split(strings.Join(m.typedView(f), "\n"), f.line)
	rest := split(m.concordance.View(), f.concordance)
	kin := split(m.related.View(), f.related)
	if f.right == 0 {
		lines = append(lines, line...)
		lines = append(lines, rest...)
		return append(lines, kin...)
	}
	lines = append(lines, make([]string, f.gap)...)
	lines = append(lines, line...)
	lines = append(lines, kin...)
	return m.beside(lines, strings.Split(m.concordance.View(), "\n"), f)
}

// beside sets the concordance to the right of the other parts.
func (m Model) beside(left, right []string, f frame) []string {
	out := make([]string, f.concordance)
	left = text.Fit(left, f.left, f.concordance)
	right = text.Fit(right, f.right, f.concordance)
	for i := range out {
		out[i] = text.Pad(left[i], f.left) + m.sheet.Quiet.Render(m.sheet.Signs.Gap) + " " + right[i]
	}
	return out
}

// typedView draws what is being typed, or the strip of actions, under a rule.
func (m Model) typedView(f frame) []string {
	rule := m.sheet.Quiet.Render(" " + strings.Repeat(m.sheet.Signs.Rule, f.left-2))
	switch m.screen {
	case onCorrection:
		return append([]string{rule}, m.correction.View(f.left)...)
	case onAddition:
		return append([]string{rule}, m.addition.View(f.left)...)
	case onQuery:
		return append([]string{rule}, m.query.View(f.left)...)
	case onLanguage:
		return append([]string{rule}, m.language.View(f.left)...)
	case onActions:
		return append([]string{rule}, m.actionStrip(f.left)...)
	case onFailure:
		return append([]string{rule}, m.failureView(f.left)...)
	}
	return nil
}
