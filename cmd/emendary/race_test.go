//go:build race

package main

// longNovel is how many words the longest novel has: under the race detector, a
// tenth of what it is without.
const longNovel = 25_000
