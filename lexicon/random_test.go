package lexicon_test

import (
	"math/rand/v2"

	"emendary/lexicon"
)

// texts returns the written forms of a list.
func texts(l *lexicon.List) []string {
	var all []string
	for w := range l.Words() {
		all = append(all, w.Text)
	}
	return all
}

// misspellings returns n words with up to edits random edits each, some of them
// with letters above ASCII; the same ones every time.
func misspellings(words []string, n, edits int) []string {
	random := rand.New(rand.NewPCG(1, 2))
	letters := []rune("abcdefghijklmnopqrstuvwxyzéöñ’-ж")
	forms := make([]string, n)
	for i := range forms {
		form := []rune(words[random.IntN(len(words))])
		for range random.IntN(edits + 1) {
			form = misspell(random, form, letters)
		}
		forms[i] = string(form)
	}
	return forms
}

func misspell(random *rand.Rand, form, letters []rune) []rune {
	if len(form) == 0 {
		return []rune{letters[0]}
	}
	i := random.IntN(len(form))
	letter := letters[random.IntN(len(letters))]
	switch random.IntN(4) {
	case 0: // one too many
		return append(form[:i:i], append([]rune{letter}, form[i:]...)...)
	case 1: // one left out
		return append(form[:i:i], form[i+1:]...)
	case 2: // two changed over
		if i > 0 {
			form[i-1], form[i] = form[i], form[i-1]
		}
		return form
	}
	form[i] = letter
	return form
}
