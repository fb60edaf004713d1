package docket

import (
	"context"
	"errors"
	"fmt"
	"sync"
	"time"

	"emendary/internal/ledger"
	"emendary/internal/manuscript"
	"emendary/internal/shelf"
	"emendary/lexicon"
)

// Options of a session.
type Options struct {
	Manuscript string
	Ledger     string     // "" means beside the manuscript
	Lexicon    string     // a word list that replaces the base lexicon
	Variety    string     // flag value; "" means what the ledger remembers, else what the manuscript attests
	House      string     // list by name or file; "" means what the ledger remembers
	Series     string     // likewise
	Costs      string     // name or file of edit costs; "" means what the ledger remembers, else the default
	NoAdapt    bool       // price edits as for all writers, whatever was accepted
	With       []Language // whose words are known too; none means what the ledger remembers
	Encoding   string
	Who        string
	ToRead     bool                  // no lock, no writes
	Progress   func(done, total int) // of the manuscript's paragraphs; may be nil
	Now        func() time.Time      // nil means time.Now
}

// Names under which the ledger remembers settings.
const (
	settingVariety = "variety"
	settingHouse   = "house"
	settingSeries  = "series"
	settingCosts   = "costs"
	settingWith    = "with" // as writeLanguages writes it
)

// Session is a manuscript on the desk: its docket with the ledger and the lists
// that the rulings go to.
type Session struct {
	Docket   *Docket
	Ledger   *ledger.Ledger
	Options  Options                 // as resolved: settings from the ledger filled in
	Variety  lexicon.Variety         // in use
	Attested map[lexicon.Variety]int // occurrences in the manuscript that speak for each variety
	Chosen   bool                    // the variety was chosen, not attested
	Base     string                  // name of the base lexicon

	with  string            // Options.With as the ledger keeps it
	paths map[string]string // files of the house and series lists
	mu    sync.Mutex
	adds  map[ledger.ID]ledger.Ruling // adds to files, for undo
	undos map[ledger.ID]ledger.Ruling
}

// Start reads the manuscript, opens its ledger and lays out its docket. Errors
// name the file and what to do; ctx ends it early with nothing written.
func Start(ctx context.Context, opt Options) (_ *Session, err error) {
	if opt.Progress == nil {
		opt.Progress = noProgress
	}
	if opt.Now == nil {
		opt.Now = time.Now
	}
	if opt.Ledger == "" {
		opt.Ledger = ledger.PathFor(opt.Manuscript)
	}
	s := &Session{
		Options: opt,
		adds:    map[ledger.ID]ledger.Ruling{}, undos: map[ledger.ID]ledger.Ruling{},
	}
	doc, err := manuscript.Open(opt.Manuscript, manuscript.Options{Encoding: opt.Encoding})
	if err != nil {
		return nil, err
	}
	// What is wrong with the lists has to show before there is a ledger to write.
	kept, err := s.recall(ctx)
	if err != nil {
		return nil, err
	}
	lex, base, paths, err := Words(s.Options.Lexicon, s.Options.House, s.Options.Series, s.Options.With)
	if err != nil {
		return nil, err
	}
	s.Base, s.paths = base, paths
	costs, err := Costs(s.Options.Costs)
	if err != nil {
		return nil, err
	}
	if opt.ToRead {
		s.Ledger, err = ledger.OpenToRead(opt.Ledger)
	} else {
		s.Ledger, err = ledger.Open(opt.Ledger, opt.Who)
	}
	if err != nil {
		return nil, err
	}
	defer func() {
		if err != nil {
			s.Ledger.Close()
		}
	}()
	if err := s.remember(ctx, kept); err != nil {
		return nil, err
	}
	rulings, err := s.Ledger.Rulings(ctx)
	if err != nil {
		return nil, err
	}
	c, err := count(ctx, doc, lex, opt.Progress)
	if err != nil {
		return nil, err
	}
	lex = s.choose(lex, c)
	s.Docket = lay(doc, c, lex, costs, rulings)
	s.Docket.who, s.Docket.now = opt.Who, opt.Now
	s.Docket.Record(rulings...)
	if !opt.NoAdapt {
		s.Docket.Adapt()
	}
	s.keep(rulings)
	return s, nil
}

// Close releases the ledger.
func (s *Session) Close() error { return s.Ledger.Close() }

// Lists returns the lists that an add can go to, the book's own first.
func (s *Session) Lists() []string {
	lists := []string{"book"}
	for _, name := range []string{settingSeries, settingHouse} {
		if s.paths[name] != "" {
			lists = append(lists, name)
		}
	}
	return lists
}

// settings returns the options that the ledger keeps, by the name it keeps them under.
func (s *Session) settings() map[string]*string {
	return map[string]*string{
		settingVariety: &s.Options.Variety, settingHouse: &s.Options.House, settingSeries: &s.Options.Series,
		settingCosts: &s.Options.Costs, settingWith: &s.with,
	}
}

// recall fills in the options not given from the ledger, and returns all that it
// keeps.
func (s *Session) recall(ctx context.Context) (kept map[string]string, err error) {
	if s.Options.Variety != "" {
		if _, err := lexicon.ParseVariety(s.Options.Variety); err != nil {
			return nil, err
		}
	}
	l, err := ledger.OpenToRead(s.Options.Ledger)
	if err != nil && !s.Options.ToRead {
		l, err = ledger.Open(s.Options.Ledger, s.Options.Who) // says what is wrong for one who writes
	}
	if err != nil {
		return nil, err
	}
	defer func() { err = errors.Join(err, l.Close()) }()
	kept = map[string]string{}
	if s.Options.Costs, err = findCosts(s.Options.Costs); err != nil {
		return nil, err
	}
	if s.with, err = writeLanguages(s.Options.With); err != nil {
		return nil, err
	}
	for name, value := range s.settings() {
		if kept[name], err = l.Setting(ctx, name); err != nil {
			return nil, err
		}
		if *value == "" {
			*value = kept[name]
		}
	}
	if len(s.Options.With) == 0 {
		s.Options.With, err = readLanguages(s.with)
	}
	return kept, err
}

// remember writes to the ledger the options that differ from what it keeps.
func (s *Session) remember(ctx context.Context, kept map[string]string) error {
	if s.Options.ToRead {
		return nil
	}
	for name, value := range s.settings() {
		if *value == kept[name] {
			continue
		}
		if err := s.Ledger.SetSetting(ctx, name, *value); err != nil {
			return err
		}
	}
	return nil
}

// choose settles the variety: as asked for, else as the manuscript attests.
func (s *Session) choose(lex *lexicon.Lexicon, c *census) *lexicon.Lexicon {
	s.Variety, s.Attested = lex.Attested(c.counts())
	if v, err := lexicon.ParseVariety(s.Options.Variety); err == nil && s.Options.Variety != "" {
		s.Variety, s.Chosen = v, true
	}
	return lex.WithVariety(s.Variety)
}

// listed returns the keys of the forms that rulings in force put on a file list.
func listed(rulings []ledger.Ruling) map[string]bool {
	out := map[string]bool{}
	for _, r := range ledger.Effective(rulings) {
		if r.Act == ledger.Add {
			out[Key(r.Form)] = true
		}
	}
	return out
}

// keep remembers rulings that an undo may have to follow to a list.
func (s *Session) keep(rulings []ledger.Ruling) {
	s.mu.Lock()
	defer s.mu.Unlock()
	for _, r := range rulings {
		switch r.Act {
		case ledger.Add:
			s.adds[r.ID] = r
		case ledger.Undo:
			s.undos[r.ID] = r
		}
	}
}

// Write puts rulings on disk, durably: first the lists that they add to or take
// from, then the ledger, all of them or none. A write that failed can be tried
// again as it is. It does not touch the docket: Record does, once Write has
// returned. It may run beside the screen.
func (s *Session) Write(ctx context.Context, rulings ...ledger.Ruling) error {
	for _, r := range rulings {
		if err := s.shelve(r); err != nil {
			return err
		}
	}
	if err := s.Ledger.Append(ctx, rulings...); err != nil {
		return err
	}
	s.keep(rulings)
	return nil
}

// shelve carries an add, its undo or its redo out on the list it concerns.
func (s *Session) shelve(r ledger.Ruling) error {
	on := true
	for r.Act == ledger.Undo {
		s.mu.Lock()
		add, isAdd := s.adds[r.Undoes]
		undo, isUndo := s.undos[r.Undoes]
		led := s.ledBy(r.Undoes)
		s.mu.Unlock()
		on = !on
		for _, l := range led {
			if err := s.put(l, on); err != nil {
				return err
			}
		}
		switch {
		case isAdd:
			r = add
		case isUndo:
			r = undo
		default:
			return nil
		}
	}
	return s.put(r, on)
}

// ledBy returns the adds that were made together with the ruling of that ID.
func (s *Session) ledBy(id ledger.ID) []ledger.Ruling {
	var out []ledger.Ruling
	for _, r := range s.adds {
		if r.With == id {
			out = append(out, r)
		}
	}
	return out
}

func (s *Session) put(r ledger.Ruling, on bool) error {
	if r.Act != ledger.Add || r.List == "book" || r.List == "" {
		return nil
	}
	path := s.paths[r.List]
	if path == "" {
		return fmt.Errorf("there is no %s list here; name one with --%s NAME and try again", r.List, r.List)
	}
	if on {
		return shelf.Put(path, r.Form, r.Kind, r.Note)
	}
	_, err := shelf.Take(path, r.Form, r.Kind, r.Note)
	return err
}
