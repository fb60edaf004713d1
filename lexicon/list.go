package lexicon

import (
	"encoding/binary"
	"fmt"
	"iter"
	"math"
	"reflect"
	"slices"
	"strings"

	"golang.org/x/text/unicode/norm"

	"emendary/align"
)

// MaxLetters is the most letters a word of a list may have.
const MaxLetters = 100

// List is the words of one layer. It is immutable and may be used by several
// goroutines at once. The zero value, and a nil List, has no words.
type List struct {
	name    string
	trie    trie
	letters []string // what the labels of the trie stand for: folded letters, ascending
	written int      // written forms

	reversed reversed // the same words from their ends
	marks             // what is listed where

	// offsets[n] is where in records the written forms of word n stand: their
	// number, then for each its attribute, its length in bytes and its text, the
	// numbers as uvarints, in ascending order of the texts.
	offsets    []uint32
	records    string
	attributes []attribute
}

// Name returns the list's name, as errors and screens give it.
func (l *List) Name() string {
	if l == nil {
		return ""
	}
	return l.name
}

// Len returns how many written forms the list has, barred ones included.
func (l *List) Len() int {
	if l == nil {
		return 0
	}
	return l.written
}

// Words returns the list's words in the order of their folded letters, those
// that have the same ones in the order of their texts.
func (l *List) Words() iter.Seq[Word] {
	return func(yield func(Word) bool) {
		if l == nil {
			return
		}
		for n := range l.offsets {
			for text, a := range l.forms(uint32(n)) {
				if !yield(a.word(text, Base)) {
					return
				}
			}
		}
	}
}

// forms returns the written forms of word n with their attributes.
func (l *List) forms(n uint32) iter.Seq2[string, *attribute] {
	return func(yield func(string, *attribute) bool) {
		for a, text := range l.indexes(n) {
			if !yield(text, &l.attributes[a]) {
				return
			}
		}
	}
}

// indexes returns the written forms of word n after the indexes of their
// attributes.
func (l *List) indexes(n uint32) iter.Seq2[int, string] {
	return func(yield func(int, string) bool) {
		r := l.record(n)
		for range r.number() {
			a := r.number()
			text := r.text()
			if r.short || a >= len(l.attributes) || !yield(a, text) {
				return
			}
		}
	}
}

// record returns a reader of the written forms of word n.
func (l *List) record(n uint32) reader {
	if int(n) >= len(l.offsets) || int(l.offsets[n]) > len(l.records) {
		return reader{}
	}
	return reader{rest: l.records[l.offsets[n]:]}
}

// NewList makes a list of words; their layers are ignored, and of words that have
// the same text the last one stands. The texts and what stands instead of them
// are brought to NFC. A word must be one word of at most [MaxLetters] letters,
// without characters that cannot be seen; the error names the list, and the word
// by its number from 1.
//
// It takes O(n log n) comparisons for n words.
func NewList(name string, words []Word) (*List, error) {
	b := newListBuilder(name)
	for i, w := range words {
		if err := b.add(w); err != nil {
			return nil, fmt.Errorf("%s: word %d: %w", name, i+1, err)
		}
	}
	return b.list()
}

// listBuilder gathers words and makes a list of them.
type listBuilder struct {
	name     string
	alphabet align.Alphabet
	entries  []listed
	place    map[string]int // index in entries, by text
}

// listed is a word with its folded letters.
type listed struct {
	word    Word
	letters []align.Letter
	labels  []uint32
}

func newListBuilder(name string) *listBuilder {
	return &listBuilder{name: name, place: map[string]int{}}
}

// add adds a word, or takes the place of the one with the same text.
func (b *listBuilder) add(w Word) error {
	if err := checkWord(w); err != nil {
		return err
	}
	w.Text, w.Instead = norm.NFC.String(w.Text), norm.NFC.String(w.Instead)
	w.Sources = slices.Clone(w.Sources)
	letters := b.alphabet.Letters(w.Text)
	if len(letters) > MaxLetters {
		return fmt.Errorf("%.40q… has %d letters; a word may have %d", w.Text, len(letters), MaxLetters)
	}
	if i, ok := b.place[w.Text]; ok {
		b.entries[i].word = w
		return nil
	}
	b.place[w.Text] = len(b.entries)
	b.entries = append(b.entries, listed{word: w, letters: b.alphabet.Fold(letters)})
	return nil
}

// list returns the list of the words added.
func (b *listBuilder) list() (*List, error) {
	l := &List{name: b.name, letters: b.label(), written: len(b.entries)}
	slices.SortFunc(b.entries, func(x, y listed) int {
		if c := slices.Compare(x.labels, y.labels); c != 0 {
			return c
		}
		return strings.Compare(x.word.Text, y.word.Text)
	})
	tries := newTrieBuilder()
	var records []byte
	var words [][]uint32
	indexes := map[string][]int{} // of attributes, by what is easily compared of them
	for start := 0; start < len(b.entries); {
		end := start + 1
		for end < len(b.entries) && slices.Equal(b.entries[end].labels, b.entries[start].labels) {
			end++
		}
		if len(records) > math.MaxUint32 {
			return nil, fmt.Errorf("%s: more than 4 GB of words; use a shorter list", b.name)
		}
		l.offsets = append(l.offsets, uint32(len(records)))
		records = binary.AppendUvarint(records, uint64(end-start))
		for _, e := range b.entries[start:end] {
			records = binary.AppendUvarint(records, uint64(l.attribute(indexes, e.word)))
			records = appendText(records, e.word.Text)
		}
		words = append(words, b.entries[start].labels)
		tries.add(b.entries[start].labels)
		start = end
	}
	l.trie = tries.finish()
	l.records = string(records)
	l.reversed = reverse(words, len(l.letters))
	if err := l.mark(words); err != nil {
		return nil, err
	}
	return l, nil
}

// label numbers the letters of all entries in the order of their texts, spells
// the entries with the numbers and returns the letters in that order.
func (b *listBuilder) label() []string {
	labels := map[align.Letter]uint32{}
	for _, e := range b.entries {
		for _, letter := range e.letters {
			labels[letter] = 0
		}
	}
	letters := make([]align.Letter, 0, len(labels))
	for letter := range labels {
		letters = append(letters, letter)
	}
	slices.SortFunc(letters, func(x, y align.Letter) int {
		return strings.Compare(b.alphabet.Text(x), b.alphabet.Text(y))
	})
	texts := make([]string, len(letters))
	for i, letter := range letters {
		labels[letter], texts[i] = uint32(i), b.alphabet.Text(letter)
	}
	for i := range b.entries {
		e := &b.entries[i]
		e.labels = make([]uint32, len(e.letters))
		for j, letter := range e.letters {
			e.labels[j] = labels[letter]
		}
	}
	return texts
}

// attribute returns the index of w's attribute, which it adds where it is new.
func (l *List) attribute(indexes map[string][]int, w Word) int {
	a := attributeOf(w)
	key := a.kind + "\t" + a.note + "\t" + a.instead
	for _, i := range indexes[key] {
		if reflect.DeepEqual(l.attributes[i], a) {
			return i
		}
	}
	indexes[key] = append(indexes[key], len(l.attributes))
	l.attributes = append(l.attributes, a)
	return len(l.attributes) - 1
}
