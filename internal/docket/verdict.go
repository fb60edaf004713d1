package docket

import (
	"strings"

	"emendary/internal/manuscript"
	"emendary/lexicon"
)

// verdict is what the lexicon makes of a form: the kind of entry it needs, or
// none ("").
type verdict struct {
	kind    Kind
	why     string
	instead []string
}

// judge returns the verdict on f. ours tells the words that this manuscript's
// own rulings put on a list: they stay on the docket as what they were.
func judge(lex *lexicon.Lexicon, f *form, ours map[string]bool) verdict {
	if f.fault != manuscript.NoFault {
		return verdict{UnknownForm, string(f.fault), []string{f.instead}}
	}
	finding := lex.Find(f.text)
	switch finding.Status {
	case lexicon.Known:
		if finding.Words[0].Layer > lexicon.Base && ours[Key(f.text)] {
			return verdict{kind: UnknownForm}
		}
		return verdict{}
	case lexicon.Barred:
		return barred(finding)
	case lexicon.OtherVariety:
		return verdict{kind: OtherVariety, why: varieties(finding.Words)}
	}
	return judgeMembers(lex, f.text)
}

// Knows reports whether text, of one or more words, would raise no question in a
// manuscript: each of its words is known, or a compound of known ones.
func Knows(lex *lexicon.Lexicon, text string) bool {
	words := strings.Fields(text)
	for _, word := range words {
		if judge(lex, &form{text: word}, nil).kind != "" {
			return false
		}
	}
	return len(words) > 0
}

// judgeMembers looks a compound up by its members: it needs no entry where all
// are known, else an entry of the kind that its first unknown member needs.
func judgeMembers(lex *lexicon.Lexicon, text string) verdict {
	unknown := verdict{kind: UnknownForm}
	parts := members(text)
	if len(parts) < 2 {
		return unknown
	}
	result := verdict{}
	for _, member := range parts {
		if prefixes[Key(member)] {
			continue
		}
		finding := lex.Find(member)
		switch finding.Status {
		case lexicon.Known:
		case lexicon.Barred:
			if result.kind == "" {
				result = verdict{kind: BarredWord, why: member + " is barred"}
			}
		case lexicon.OtherVariety:
			if result.kind == "" {
				result = verdict{kind: OtherVariety, why: varieties(finding.Words)}
			}
		default:
			return unknown
		}
	}
	return result
}

// prefixes join with a hyphen to any word but are no words themselves.
var prefixes = map[string]bool{
	"ante": true, "bi": true, "co": true, "counter": true, "de": true, "dis": true, "en": true,
	"hyper": true, "infra": true, "inter": true, "intra": true, "mid": true, "mis": true,
	"multi": true, "neo": true, "non": true, "poly": true, "post": true, "pre": true, "proto": true,
	"pseudo": true, "re": true, "semi": true, "sub": true, "tri": true, "ultra": true, "un": true, "vice": true,
}

func barred(f lexicon.Finding) verdict {
	v := verdict{kind: BarredWord, why: "barred by the " + strings.ToLower(f.Words[0].Layer.String()) + " list"}
	if use := f.Words[0].Instead; use != "" {
		v.why += "; use " + use
		v.instead = []string{use}
	}
	return v
}

// varieties names those that have any of the words, or says that none has.
func varieties(words []lexicon.Word) string {
	var names []string
	for _, w := range words {
		for _, v := range w.Varieties() {
			if name := v.String(); len(names) == 0 || names[len(names)-1] != name {
				names = append(names, name)
			}
		}
	}
	if len(names) == 0 {
		return "rarer variant"
	}
	return strings.Join(names, ", ")
}
