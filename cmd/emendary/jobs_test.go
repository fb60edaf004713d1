package main

import (
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// truth returns the rulings of an ideal editor on the demo as the lines that rule
// reads. The kinds that take more than a list of words to find are left out: the
// demo's README says which.
func truth(t *testing.T) string {
	t.Helper()
	rows := strings.Split(strings.TrimSuffix(readFile(t, filepath.Join(demo, "truth.tsv")), "\n"), "\n")
	header := strings.Split(rows[0], "\t")
	b := strings.Builder{}
	b.WriteString("form\truling\tword\tlist\tkind\tnote\tquery\tto\n")
	for _, row := range rows[1:] {
		cells := strings.Split(row, "\t")
		require.Len(t, cells, len(header), row)
		get := func(column string) string { return cells[slices.Index(header, column)] }
		kind, query, to, list := get("kind"), "", "", ""
		switch get("ruling") {
		case "add":
			list = "book"
		case "query":
			query, to = "As meant? "+get("note"), "author"
		}
		if get("ruling") != "add" {
			if kind != "unknown form" && kind != "other variety" && kind != "join" {
				continue
			}
			kind = "" // of the entry; the kind of a ruling is that of the word
		}
		b.WriteString(strings.Join([]string{get("form"), get("ruling"), get("word"), list, kind, get("note"), query, to}, "\t") + "\n")
	}
	return b.String()
}

// demoCopy returns a fresh copy of the demo manuscript.
func demoCopy(t *testing.T) string {
	t.Helper()
	path := filepath.Join(t.TempDir(), "manuscript.md")
	require.NoError(t, copyFile(filepath.Join(demo, "manuscript.md"), path))
	return path
}

func TestTheTruthOfTheDemoEmendsIt(t *testing.T) {
	manuscript := demoCopy(t)
	before := readFile(t, manuscript)

	status, stdout, stderr := inProcess(t, truth(t), "rule", manuscript, "--variety", "british-ise", "--as", "Anna")
	require.Empty(t, stderr)
	require.Equal(t, 0, status, stdout)
	assert.Contains(t, stdout, " 0 in dispute; 0 entries still open\n")

	status, stdout, stderr = inProcess(t, "", "apply", manuscript)
	require.Empty(t, stderr)
	require.Equal(t, 0, status)
	assert.Contains(t, stdout, "0 entries still open")
	assert.Equal(t, readFile(t, filepath.Join(demo, "emended.md")), readFile(t, emendedName(manuscript)))
	assert.Equal(t, before, readFile(t, manuscript))

	status, stdout, stderr = inProcess(t, "", "docket", manuscript, "--format", "tsv")
	assert.Equal(t, 0, status)
	assert.Equal(t, "form\tkind\tcount\tslip\tcandidates\tplaces\n", stdout)
	assert.Equal(t, "emendary: "+manuscript+": nothing is open\n", stderr)
}

func TestRulingsGoRound(t *testing.T) {
	manuscript := demoCopy(t)
	status, _, stderr := inProcess(t, truth(t), "rule", manuscript, "--as", "Anna")
	require.Equal(t, 0, status, stderr)
	status, rulings, stderr := inProcess(t, "", "report", "rulings", manuscript)
	require.Equal(t, 0, status, stderr)
	require.Greater(t, strings.Count(rulings, "\n"), 80)

	fresh := demoCopy(t)
	status, stdout, stderr := inProcess(t, rulings, "rule", fresh, "--as", "Bert")
	require.Equal(t, 0, status, stderr)
	assert.Contains(t, stdout, " 0 already in force, 0 in dispute; 0 entries still open")
	status, again, stderr := inProcess(t, "", "report", "rulings", fresh)
	require.Equal(t, 0, status, stderr)
	assert.Equal(t, rulings, again)

	status, stdout, stderr = inProcess(t, rulings, "rule", fresh)
	assert.Equal(t, 0, status, stderr)
	assert.Contains(t, stdout, ": 0 rulings taken, ")
}

// Rulings on some occurrences alone go round with their places.
func TestRulingsOnSomeOccurrencesGoRound(t *testing.T) {
	const text = "The harber lay still.\n\nAn old harber, and a harber wall.\n"
	const lines = "form\truling\tword\tscope\tplace\tquery\tto\n" +
		"harber\taccept\tharbour\tchecked\t3:8\tAll right?\tauthor\n" +
		"harber\treject\t\tchecked\t1:5\t\t\n"
	first := writeFile(t, t.TempDir(), "m.md", text)
	status, _, stderr := inProcess(t, lines, "rule", first)
	require.Equal(t, 0, status, stderr)
	_, rulings, _ := inProcess(t, "", "report", "rulings", first)

	second := writeFile(t, t.TempDir(), "m.md", text)
	status, stdout, stderr := inProcess(t, rulings, "rule", second)
	require.Equal(t, 0, status, stderr)
	assert.Contains(t, stdout, "2 rulings taken, 0 already in force, 0 in dispute; 1 entry still open")
	_, again, _ := inProcess(t, "", "report", "rulings", second)
	assert.Equal(t, rulings, again)
	status, _, stderr = inProcess(t, "", "apply", second)
	require.Equal(t, 0, status, stderr)
	assert.Equal(t, "The harber lay still.\n\nAn old harbour, and a harber wall.\n", readFile(t, emendedName(second)))
}
