package lexicon

import (
	"fmt"
	"strings"
)

// Variety is which English a spelling belongs to.
type Variety uint8

const (
	AnyVariety Variety = iota // every variety below at once
	American
	BritishIse // British with organise
	BritishIze // British with organize
	Canadian
	Australian
)

// varieties are all of them, with their names and the spelling category that is
// theirs beside "english", which all share.
var varieties = [...]struct{ flag, name, category string }{
	AnyVariety: {"any", "any variety", ""},
	American:   {"american", "American", "american"},
	BritishIse: {"british-ise", "British -ise", "british"},
	BritishIze: {"british-ize", "British -ize", "british_z"},
	Canadian:   {"canadian", "Canadian", "canadian"},
	Australian: {"australian", "Australian", "australian"},
}

// Varieties returns the single varieties, without AnyVariety, in the order in
// which [Lexicon.Attested] prefers them.
func Varieties() []Variety {
	return []Variety{American, BritishIse, BritishIze, Canadian, Australian}
}

// ParseVariety reads a flag value: any, american, british-ise, british-ize,
// canadian or australian.
func ParseVariety(s string) (Variety, error) {
	var flags []string
	for v, names := range varieties {
		if s == names.flag {
			return Variety(v), nil
		}
		flags = append(flags, names.flag)
	}
	return AnyVariety, fmt.Errorf("no variety is called %q; choose one of %s", s, strings.Join(flags, ", "))
}

// Flag returns the value that [ParseVariety] reads as v.
func (v Variety) Flag() string {
	if int(v) < len(varieties) {
		return varieties[v].flag
	}
	return fmt.Sprintf("variety-%d", uint8(v))
}

// String returns v's name as a screen shows it: "British -ise".
func (v Variety) String() string {
	if int(v) < len(varieties) {
		return varieties[v].name
	}
	return fmt.Sprintf("variety %d", uint8(v))
}

// varietySet is a set of single varieties; AnyVariety is never a member.
type varietySet uint8

// allVarieties holds every single variety.
const allVarieties = varietySet(1<<American | 1<<BritishIse | 1<<BritishIze | 1<<Canadian | 1<<Australian)

// has reports whether v is in s. AnyVariety is where s is not empty; a variety
// that does not exist never is.
func (s varietySet) has(v Variety) bool {
	if v == AnyVariety {
		return s != 0
	}
	return v < 8 && s&(1<<v) != 0
}

// varietiesOf returns the varieties that have the words of a spelling category.
// Categories of variants belong to none.
func varietiesOf(category string) varietySet {
	if category == "english" {
		return allVarieties
	}
	for v, names := range varieties {
		if category != "" && names.category == category {
			return 1 << v
		}
	}
	return 0
}
