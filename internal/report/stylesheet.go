package report

import (
	"cmp"
	"fmt"
	"maps"
	"path/filepath"
	"slices"
	"strconv"
	"strings"

	"emendary/internal/docket"
	"emendary/internal/ledger"
	"emendary/internal/manuscript"
	"emendary/lexicon"
)

// styleSheet is the book's word list: what the rulings in force settled about the
// words of the manuscript, and by which lexicon it was read.
//
// On it are the words of all adds, the forms let stand, and the words of those
// accepts that chose between forms a lexicon or an author may well use: another
// variety's, a barred word, a word in context, and unknown forms of a name, of a
// word that only a house, series or book list has, or of one that is on the docket
// itself (Thessaly, not Thessally). Mere slips are not.
type styleSheet struct {
	manuscript string
	general    [][2]string
	items      []*item
}

// item is one word of a style sheet.
type item struct {
	word  string
	known bool // put on a list by an add
	stand bool // let stand
	lists []string
	kinds []string
	notes []string
	not   []string        // forms not used
	bars  map[string]bool // those of them that a list for the next book bars
	curly bool            // the manuscript sets its apostrophes curly
	count int             // occurrences that stand as word once emended
	first place
}

func gatherStyleSheet(s *docket.Session) (content, error) {
	out := &styleSheet{manuscript: s.Docket.Document.Title, general: general(s)}
	on := ruled(s)
	byWord := map[string]*item{}
	get := func(word string) *item {
		it := byWord[word]
		if it == nil {
			it = &item{word: word, bars: map[string]bool{}}
			byWord[word] = it
			out.items = append(out.items, it)
		}
		return it
	}
	for _, r := range s.Docket.Rulings() {
		places := on[r.ID]
		if len(places) == 0 && overruled(s.Docket.Find(r.Form)) {
			continue
		}
		var it *item
		switch {
		case r.Act == ledger.Add:
			it = get(r.Form)
			it.known = true
			it.lists = with(it.lists, cmp.Or(r.List, "book"))
			it.kinds = with(it.kinds, r.Kind)
		case r.Act == ledger.Reject && r.EntryKind != string(docket.Passage): // those are no words
			it = get(r.Form)
			it.stand = true
		case r.Act == ledger.Accept && chosen(s, r):
			it = get(r.Word)
			it.not = with(it.not, r.Form)
			if k := docket.Kind(r.EntryKind); k == docket.OtherVariety || k == docket.BarredWord {
				it.bars[r.Form] = true
			}
		default:
			continue
		}
		it.notes = with(it.notes, r.Note)
		for _, p := range places {
			it.stands(p)
		}
	}
	out.countListed(s, byWord)
	slices.SortFunc(out.items, func(a, b *item) int {
		return cmp.Or(slices.Index(groups(), groupOf(a.word))-slices.Index(groups(), groupOf(b.word)),
			cmp.Compare(docket.FiledUnder(a.word), docket.FiledUnder(b.word)), cmp.Compare(a.word, b.word))
	})
	return out, nil
}

// overruled reports whether later rulings decided all places of an entry anew; a
// query alone decides nothing.
func overruled(e *docket.Entry) bool {
	if e == nil {
		return false
	}
	for _, o := range e.Occurrences {
		if o.Ruling == nil || o.Ruling.Act == ledger.Query {
			return false
		}
	}
	return true
}

func (it *item) stands(p place) {
	if it.count == 0 || byPlace(p, it.first) < 0 {
		it.first = p
	}
	it.curly = it.curly || strings.Contains(p.form, "’")
	it.count++
}

// countListed counts the places at which the words of accepts stand already: they
// may be listed, and then no entry has them. O(words of the manuscript).
func (s *styleSheet) countListed(from *docket.Session, byWord map[string]*item) {
	doc := from.Docket.Document
	for i := range doc.Paragraphs {
		p := &doc.Paragraphs[i]
		for _, w := range p.Words {
			base, _ := manuscript.Base(w.Text)
			it := byWord[base]
			if it == nil {
				it = byWord[strings.ToLower(base)]
			}
			if it == nil || it.known || it.stand {
				continue
			}
			letters := doc.Letters(i, w.Start, w.End)
			if len(letters) == 0 {
				continue
			}
			line, column := doc.Position(letters[0].Span.Start)
			it.stands(place{part: p.Part + 1, title: doc.Parts[p.Part].Title, line: line, column: column})
		}
	}
}

// common is the size level up to which every reader knows a listed name: months,
// days and great places. An accept to one of these mends a slip.
const common = 35

// chosen reports whether an accept chose between forms.
func chosen(s *docket.Session, r ledger.Ruling) bool {
	switch docket.Kind(r.EntryKind) {
	case docket.OtherVariety, docket.BarredWord, docket.WordInContext:
		return true
	case docket.Join:
		return false
	}
	finding := s.Docket.Lexicon().Find(r.Word)
	if finding.Status != lexicon.Known {
		return slices.ContainsFunc(s.Docket.Entries, func(e *docket.Entry) bool {
			return e.Form == r.Word && e.Kind == docket.UnknownForm
		})
	}
	w := finding.Words[0]
	if w.Layer > lexicon.Foreign {
		return true
	}
	level, ok := w.Level(s.Variety)
	return w.IsName() && (!ok || level > common)
}

// general says by what the manuscript was read.
func general(s *docket.Session) [][2]string {
	variety := s.Variety.String() + ", as the manuscript attests"
	if s.Chosen {
		variety = s.Variety.String() + ", as chosen"
	}
	var attested []string
	for _, v := range lexicon.Varieties() {
		if n := s.Attested[v]; n > 0 {
			attested = append(attested, fmt.Sprintf("%s %d", v, n))
		}
	}
	out := [][2]string{{"base lexicon", fileName(s.Base)}, {"variety", variety}}
	if len(attested) > 0 {
		out = append(out, [2]string{"occurrences that speak for each", strings.Join(attested, ", ")})
	}
	for _, l := range s.Options.With {
		out = append(out, [2]string{"words of another language", l.Name + ", " + fileName(l.File)})
	}
	out = append(out, passages(s)...)
	return append(out, [2]string{"house list", cmp.Or(fileName(s.Options.House), "none")},
		[2]string{"series list", cmp.Or(fileName(s.Options.Series), "none")})
}

// passages says how many passages stand in each language.
func passages(s *docket.Session) [][2]string {
	stand := map[string]int{}
	for _, e := range s.Docket.Entries {
		if e.Kind != docket.Passage {
			continue
		}
		for _, o := range e.Occurrences {
			if o.Ruling != nil && o.Ruling.Act == ledger.Reject {
				stand[cmp.Or(o.Ruling.Kind, "another language")]++
			}
		}
	}
	var out [][2]string
	for _, language := range slices.Sorted(maps.Keys(stand)) {
		out = append(out, [2]string{"passages in " + language, strconv.Itoa(stand[language])})
	}
	return out
}

// fileName is a list's name without its folder, which is nobody else's business.
func fileName(list string) string {
	if list == "" {
		return ""
	}
	return strings.TrimSuffix(filepath.Base(list), ".txt")
}

// with returns texts with text at its end, unless it is empty or there already.
func with(texts []string, text string) []string {
	if text == "" || slices.Contains(texts, text) {
		return texts
	}
	return append(texts, text)
}
