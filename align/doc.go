// Package align compares two strings letter by letter: how far apart they are,
// and which edits turn the one into the other.
//
// Its types, in reading order:
//
//   - [Letter] is what is compared: a user-perceived character as a number.
//     An [Alphabet] makes letters of a string and a string of letters.
//   - [Levenshtein], [Restricted] and [Distance] count the edits between two
//     strings under unit costs; they differ in what they allow a transposition.
//   - [Costs] prices edits; [Unit] is the plainest. [Fitted] are those of a
//     noisy channel, in bits: [Fit] estimates them from pairs, [ReadCosts] reads
//     them from a file, and a [Sheet] has those of one form ready for a search,
//     a [Scorer] for many words.
//   - [Align] finds a cheapest [Alignment], which is a list of [Edit] values
//     that cover form and word from left to right; [Count] says how many are as
//     cheap, [All] lists them.
//   - [Star] lays several alignments of one form over common columns, a [Grid].
//
// The form is what stands in the text, the word what it may stand for. Edits are
// named as one who corrects the form would name them: an insertion adds to it.
//
// Letters are compared as they are: fold them first ([Alphabet.Fold]) where case
// is not to count. Any other numbered symbols will do in place of letters, such
// as the words of two versions of a text, numbered by the caller.
//
// Alignments are of the restricted kind: no letter takes part in two edits, so
// that edits stand side by side and can be drawn in columns. Distance alone
// allows more, and so has no alignment here.
//
// Time, and for alignments space, grows with the product of the two lengths:
// two strings of 10,000 letters make 100 million cells. That is no matter for
// words; whoever passes whole texts must bound their length.
package align
