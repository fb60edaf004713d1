// Package manuscript reads manuscripts into paragraphs of words that know where
// they stand in the file, and writes emended copies.
//
// Read it in this order. Open or Read gives a Document: its parts, its
// paragraphs, and what was passed over. A Paragraph has its text as a reader
// sees it, and its words; a Word has its form, setting, traits, and a fault that
// the splitter itself can tell. Letters gives the letters of any stretch of a
// paragraph, each with its bytes in the file. An Emendation says what each of
// them becomes, and Emend splices it in: every byte that is not an emended
// letter's is as it was.
//
// A file is read in three layers. An encoding turns bytes into text and knows
// the way back (encoding.go). A format finds the prose in the text (format.go
// has the interface; text.go and markdown.go implement it, and state their
// rules). The splitter cuts prose into words by UAX #29 with a tailoring for
// prose, each rule of which is stated where it is coded: what is cut at cut
// (token.go), apostrophes at assignRoles (quote.go), speech at markSpeech
// (speech.go), hyphens and line ends at extend (word.go), sentences at sentence
// (sentence.go), faults at classifyMixed (classify.go), numerals at isRomanWord
// (roman.go), addresses at addresses (address.go).
//
// Text of a file is data: nothing in it makes the package panic, and what would
// take the parser of Markdown too long is refused (markdown_limit.go).
//
// The package does not guess encodings, knows English alone in its rules for
// apostrophes and ordinals, and does not break up runs of Thai or Chinese into
// words beyond what UAX #29 does.
package manuscript
