// Package english is the base lexicon of English, embedded.
//
// Its words come from Debian's package scowl, whose copyright notice is in the
// file COPYRIGHT beside this one, and from additions.txt, a short list of our own;
// [Source] says which version. Each word has the spelling category, class and
// size level of every list of sizes 10 to 70 that it stands in. Left out are the
// package's special lists (jargon of computing; Roman numerals, which the splitter
// of words knows by rule) and possessives of words that are in.
//
// To build the lexicon anew, in this folder:
//
//	apt-get download scowl
//	dpkg -x scowl_2020.12.07-2_all.deb scowl
//	go generate
//	rm -r scowl scowl_2020.12.07-2_all.deb
package english

import (
	_ "embed"
	"sync"

	"emendary/lexicon"
)

//go:generate go run ./generate -dir scowl

//go:embed english.lexicon
var data string

// Base returns the embedded base lexicon of English. It takes a tenth of a
// millisecond the first time, and nothing after.
func Base() *lexicon.List { return base() }

var base = sync.OnceValue(func() *lexicon.List {
	l, err := lexicon.View("English", data)
	if err != nil {
		panic(err) // the build is broken: tests open the same bytes
	}
	return l
})
