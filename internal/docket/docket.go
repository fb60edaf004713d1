package docket

import (
	"cmp"
	"slices"
	"sync"
	"sync/atomic"
	"time"

	"emendary/align"
	"emendary/internal/ledger"
	"emendary/internal/manuscript"
	"emendary/lexicon"
)

// Docket is the entries of one manuscript, in an order of review: by first place
// until Reorder says otherwise. Its state changes by Record, Adapt, Reorder and
// TakeSlips alone, and Find may add an entry; all of these belong to one goroutine.
// Candidates, Near, Parts, Dispersion, Slip, SlipGiven and Lexicon may run beside
// it in others: they read only what never changes.
type Docket struct {
	Document *manuscript.Document
	Entries  []*Entry
	Unplaced []Unplaced // rulings whose places could not be found again

	census *census
	use    map[string]int                  // count of each form by key
	base   *lexicon.Lexicon                // decides what is on the docket: all layers but the book's
	fitted *align.Fitted                   // costs of edits, of all writers; nil for unit costs
	lex    atomic.Pointer[lexicon.Lexicon] // base and what this book's rulings added

	words    []int // of each part
	order    Order
	exact    map[*Entry]float64       // probabilities of a slip that TakeSlips brought
	laid     []*Entry                 // the entries as they were first laid out; never changes
	current  atomic.Pointer[[]*Entry] // the entries as they are laid out, by place
	ours     map[string]bool          // keys of forms that the manuscript's own rulings put on lists
	ruled    map[string]bool          // forms of passages that rulings in force are on
	unfolded map[string]bool          // those of them whose words are ruled on one by one
	byForm   map[string]*Entry        // by exact form
	byKey    map[string][]*Entry      // by key
	log      []ledger.Ruling          // all rulings recorded, undos included

	searching sync.Mutex    // guards what follows
	costs     *align.Fitted // of edits, in use
	searcher  *Search
	knowing   sync.Once
	known     []familiar // see familiars
	surveying sync.Once
	survey    *survey // made when first asked for
	who       string
	now       func() time.Time
}

// Unplaced is a place of a ruling that the manuscript as it is now does not have.
type Unplaced struct {
	Ruling     ledger.Ruling
	Occurrence ledger.Occurrence
}

// lay lays out the docket of a census under lex. Of rulings it takes the words
// that they put on lists and the passages they are on; Record takes the rest.
func lay(doc *manuscript.Document, c *census, lex *lexicon.Lexicon, costs *align.Fitted, rulings []ledger.Ruling) *Docket {
	d := &Docket{
		Document: doc, census: c, base: lex, fitted: costs, costs: costs, now: time.Now,
		use: map[string]int{}, byForm: map[string]*Entry{}, byKey: map[string][]*Entry{},
		order: ByPlace, exact: map[*Entry]float64{}, ours: listed(rulings),
	}
	d.words = d.partWords()
	d.lex.Store(lex)
	for text, f := range c.forms {
		d.use[Key(text)] += len(f.places)
	}
	d.takePassageRulings(ledger.Effective(rulings))
	for _, e := range d.entries() {
		d.list(e)
	}
	d.laid = slices.Clone(d.Entries)
	d.current.Store(&d.laid)
	return d
}

func (d *Docket) list(e *Entry) {
	d.Entries = append(d.Entries, e)
	d.byForm[e.Form] = e
	k := Key(e.Form)
	d.byKey[k] = append(d.byKey[k], e)
}

// Lexicon returns the lexicon in use: it grows as words are added.
func (d *Docket) Lexicon() *lexicon.Lexicon { return d.lex.Load() }

// Due returns the entries that are to be ruled on, in the order of review: the open
// ones but for listed words that somebody asked for.
func (d *Docket) Due() []*Entry {
	var due []*Entry
	for _, e := range d.Entries {
		if e.Open() && e.Kind != WordInContext {
			due = append(due, e)
		}
	}
	return due
}

// Size returns how many running words the manuscript has.
func (d *Docket) Size() int { return d.census.size }

// Parts returns how often the form of e stands in each part of the manuscript.
func (d *Docket) Parts(e *Entry) []int {
	parts := make([]int, len(d.Document.Parts))
	for i := range e.Occurrences {
		parts[d.Document.Paragraphs[e.Occurrences[i].Paragraph].Part]++
	}
	return parts
}

// Find returns the entry of a form, ruled on or not, whatever its capitals if
// none has them just so; a listed word's entry is made on the spot, of kind
// WordInContext, and stays. nil where the manuscript lacks the form.
func (d *Docket) Find(text string) *Entry {
	text = plainApostrophe(text)
	if e := d.byForm[text]; e != nil {
		return e
	}
	if f := d.census.forms[text]; f != nil {
		if e := d.inContext(f); e != nil {
			return e
		}
	}
	if es := d.byKey[Key(text)]; len(es) > 0 {
		return es[0]
	}
	for _, other := range d.spellings(Key(text)) {
		if e := d.inContext(other); e != nil {
			return e
		}
	}
	return nil
}

// spellings returns the forms that share a key, in alphabetical order.
func (d *Docket) spellings(k string) []*form {
	if d.use[k] == 0 {
		return nil
	}
	var out []*form
	for text, f := range d.census.forms {
		if Key(text) == k {
			out = append(out, f)
		}
	}
	slices.SortFunc(out, func(a, b *form) int { return cmp.Compare(a.text, b.text) })
	return out
}

// inContext makes an entry of those places of f that no entry has.
func (d *Docket) inContext(f *form) *Entry {
	taken := map[place]bool{}
	for _, e := range d.byKey[Key(f.text)] {
		for _, o := range e.Occurrences {
			taken[place{int32(o.Paragraph), int32(o.Word)}] = true
		}
	}
	e := &Entry{Kind: WordInContext, Form: f.text}
	for _, p := range f.places {
		if !taken[p] {
			e.Occurrences = append(e.Occurrences, d.occurrence(p))
		}
	}
	if len(e.Occurrences) == 0 {
		return nil
	}
	e.open = len(e.Occurrences)
	d.list(e)
	return e
}

// FormCount is a form of the manuscript with its count.
type FormCount struct {
	Form  string
	Count int
	Entry bool // it is on the docket, ruled or open
}

// Forms returns every form of the manuscript, entries first, then by alphabet:
// what a form is found in by fuzzy match. O(n log n) in the distinct forms.
func (d *Docket) Forms() []FormCount {
	out := make([]FormCount, 0, len(d.census.forms)+len(d.Entries))
	for _, e := range d.Entries {
		out = append(out, FormCount{e.Form, len(e.Occurrences), true})
	}
	for text, f := range d.census.forms {
		if len(d.byKey[Key(text)]) == 0 {
			out = append(out, FormCount{text, len(f.places), false})
		}
	}
	slices.SortFunc(out, func(a, b FormCount) int {
		if a.Entry != b.Entry {
			if a.Entry {
				return -1
			}
			return 1
		}
		return cmp.Or(cmp.Compare(Key(a.Form), Key(b.Form)), cmp.Compare(a.Form, b.Form))
	})
	return out
}

// Tally counts where the review stands: entries open (put-off ones included) and
// ruled on, queries in force, entries put off.
type Tally struct{ Open, Ruled, Queries, PutOff int }

// Tally counts the entries. A listed word counts only once it is ruled on. O(entries).
func (d *Docket) Tally() Tally {
	var t Tally
	for _, e := range d.Entries {
		switch {
		case !e.Open():
			t.Ruled++
		case e.Kind != WordInContext:
			t.Open++
		}
		if e.PutOff() {
			t.PutOff++
		}
		for _, r := range e.rulings {
			if r.Query != "" {
				t.Queries++
			}
		}
	}
	return t
}

// noProgress is the progress of callers that show none.
func noProgress(int, int) {}
