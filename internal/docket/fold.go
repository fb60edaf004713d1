package docket

import (
	"slices"

	"emendary/internal/manuscript"
)

// pending is an occurrence on its way into an entry.
type pending struct {
	Occurrence
	traits manuscript.Trait
	verdict
}

// fold makes entries of occurrences that differ in capitals at most.
//
// A capital within a sentence makes an entry of its own (Rose, rose), and so does
// each spelling that mixes capitals (McKay). A capital at the start of a sentence
// or in a heading, and capitals throughout, say nothing: those occurrences join
// the entry that is there, the lower-case one or the capitalised one, the more
// frequent if both are; where they are alone they make one entry, under the first
// spelling among them that is not in capitals throughout.
func fold(group []*pending) []*Entry {
	slices.SortFunc(group, func(a, b *pending) int { return byPlace(a.Occurrence, b.Occurrence) })
	var plain, capital, silent []*pending
	others := map[string][]*pending{}
	var order []string
	for _, p := range group {
		start := p.traits&(manuscript.SentenceStart|manuscript.HeadingWord) != 0
		switch c := capitalsOf(p.Text); {
		case c == lower:
			plain = append(plain, p)
		case c == all, c == initial && start:
			silent = append(silent, p)
		case c == initial:
			capital = append(capital, p)
		default:
			if others[p.Text] == nil {
				order = append(order, p.Text)
			}
			others[p.Text] = append(others[p.Text], p)
		}
	}
	switch {
	case len(silent) == 0:
	case len(plain) > 0 && len(plain) >= len(capital):
		plain = append(plain, silent...)
	case len(capital) > 0:
		capital = append(capital, silent...)
	case len(order) == 1:
		others[order[0]] = append(others[order[0]], silent...)
	default:
		capital = silent
	}
	var out []*Entry
	for _, ps := range [][]*pending{plain, capital} {
		if len(ps) > 0 {
			out = append(out, gather(ps))
		}
	}
	for _, text := range order {
		out = append(out, gather(others[text]))
	}
	return out
}

// gather makes one entry of ps; the first of them that is not in capitals
// throughout names it.
func gather(ps []*pending) *Entry {
	name := ps[0]
	for _, p := range ps {
		if capitalsOf(p.Text) != all {
			name = p
			break
		}
	}
	e := &Entry{
		Kind: name.kind, Form: plainApostrophe(name.Text), Why: name.why, Instead: name.instead,
		Occurrences: make([]Occurrence, len(ps)), open: len(ps),
	}
	slices.SortFunc(ps, func(a, b *pending) int { return byPlace(a.Occurrence, b.Occurrence) })
	for i, p := range ps {
		e.Occurrences[i] = p.Occurrence
	}
	return e
}
