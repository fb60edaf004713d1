// Package lexicon knows words: which forms a word list covers, and which of its
// words lie within a given distance of a form.
//
// Its types, in reading order:
//
//   - [Word] is one word with what its list says of it.
//   - [List] is the words of one list. [Load] reads it from text, [NewList] makes
//     it from words, [Open] or [View] views one that [List.AppendBinary] wrote.
//   - [Lexicon] is up to five lists looked up as one: the base lexicon and, above
//     it, words of other languages, the house, the series and the book list
//     ([Layer]), in one [Variety].
//   - [Lexicon.Find] answers whether a form is known; [Lexicon.Within] gives all
//     words within a distance of it ([Lexicon.AppendWithin] where many forms are
//     asked about), and [Lexicon.Attested] the variety that a manuscript is written
//     in.
//   - [Ranking] is a lexicon under a [Prior]; [Ranking.Best] gives the n words that
//     cost least by edits and prior together, [Ranking.Near] those near the best.
//
// The embedded English base lexicon is package emendary/lexicon/english.
//
// # The trie
//
// Every list is one minimal acyclic automaton over folded letters (Daciuk,
// Mihov, Watson and Watson, “Incremental Construction of Minimal Acyclic
// Finite-State Automata”, Computational Linguistics 26(1), 2000, section 3:
// sorted input). Its arcs carry how many words lie before them, which numbers
// the words densely in the order of their letters (Lucchesi and Kowaltowski,
// “Applications of Finite Automata Representing Large Vocabularies”, Software
// Practice and Experience 23(1), 1993, section 4), and what a list says of a word
// hangs on its number. Words that differ in case alone (rose, Rose) share a path
// and a number, which then stands for several written forms.
//
// Beside it each list has an automaton of its words from their ends, for searches
// that start where a form is right, and marks in the first one that tell which
// words lie below, for searches that weigh them.
//
// # Case, apostrophes and full stops
//
// A form is covered by an entry that has the same folded letters (see
// [align.Alphabet.Fold]: straight and curly apostrophes are one letter, and so
// are the hyphens U+002D, U+2010 and U+2011) if one of these holds:
//
//   - The two have the same capitals.
//   - The form is all capitals: MCKAY and HARBOUR, from McKay and harbour.
//   - The entry has no capitals and the form has one, its first letter with case:
//     Harbour, from harbour; O'clock, from o'clock.
//
// So a lower-case form is never covered by an entry with capitals (thames), nor
// mixed case by anything but itself (HarBour, Mckay).
//
// Text that is split into words loses a full stop at a word's end, and lists have
// abbreviations with and without it. So a form and an entry that differ in one
// final full stop only are the same (Dr and Dr.), and a form with a full stop
// after every letter is covered by an entry of class abbreviations without them
// (U.S. and U.S.A, from US and USA).
//
// # What it does not do
//
// Possessives are not split off (harbour's), nor compounds at their hyphens:
// the caller does, and looks up what remains.
package lexicon
