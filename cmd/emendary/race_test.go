//go:build race

package main

// longNovel is how many words the longest novel has: under the race detector, fewer
// than without.
const longNovel = 15_000
