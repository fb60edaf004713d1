//go:build !race

package main

// longNovel is how many words the longest novel has.
const longNovel = 250_000
