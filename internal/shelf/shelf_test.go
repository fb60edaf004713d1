package shelf_test

import (
	"bytes"
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"sync"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"emendary/internal/shelf"
)

// childEnv makes the test program put words on a list instead of testing:
// PATH, a colon and the first letters of its words.
const childEnv = "SHELF_TEST_CHILD"

const perWriter = 25

func TestMain(m *testing.M) {
	if path, prefix, ok := strings.Cut(os.Getenv(childEnv), ":"); ok {
		if err := putMany(path, prefix); err != nil {
			fmt.Fprintln(os.Stderr, err)
			os.Exit(1)
		}
		os.Exit(0)
	}
	os.Exit(m.Run())
}

func putMany(path, prefix string) error {
	for i := range perWriter {
		if err := shelf.Put(path, fmt.Sprintf("%s%d", prefix, i), "term", ""); err != nil {
			return err
		}
	}
	return nil
}

func TestFind(t *testing.T) {
	data, here := t.TempDir(), t.TempDir()
	t.Setenv("XDG_DATA_HOME", data)
	t.Chdir(here)
	require.NoError(t, os.WriteFile("words", nil, 0o600))
	require.NoError(t, os.Mkdir("folder", 0o700))
	lists := filepath.Join(data, "emendary", "lists")
	tests := []struct{ give, want string }{
		{"quay", filepath.Join(lists, "quay.txt")},
		{"quay.txt", filepath.Join(lists, "quay.txt")},
		{"Sallow Quay 2_b-c.d", filepath.Join(lists, "Sallow Quay 2_b-c.d.txt")},
		{"Caf\u0065\u0301", filepath.Join(lists, "Caf\u00e9.txt")},
		{"folder", filepath.Join(lists, "folder.txt")},
		{"words", filepath.Join(here, "words")},
		{"./none", filepath.Join(here, "none")},
		{"/a/b.txt", "/a/b.txt"},
	}
	for _, tt := range tests {
		got, err := shelf.Find(tt.give)
		require.NoError(t, err, tt.give)
		assert.Equal(t, tt.want, got, tt.give)
	}
	for _, bad := range []string{"", ".", "..", ".hidden", " quay", "quay ", "a:b", "a\tb", "a\x00b", "a\xffb", "*", ".txt", strings.Repeat("a", 300)} {
		_, err := shelf.Find(bad)
		assert.Error(t, err, "%q", bad)
	}
}

func TestDirFollowsTheSpecification(t *testing.T) {
	t.Setenv("HOME", "/home/anna")
	tests := []struct{ data, want string }{
		{"/data", "/data/emendary/lists"},
		{"", "/home/anna/.local/share/emendary/lists"},
		{"relative", "/home/anna/.local/share/emendary/lists"}, // "must be absolute", else ignored
	}
	for _, tt := range tests {
		t.Setenv("XDG_DATA_HOME", tt.data)
		got, err := shelf.Dir()
		require.NoError(t, err)
		assert.Equal(t, tt.want, got)
	}
}

func TestList(t *testing.T) {
	t.Setenv("XDG_DATA_HOME", t.TempDir())
	names, err := shelf.List()
	require.NoError(t, err)
	assert.Empty(t, names)
	for _, name := range []string{"quay", "Anna"} {
		path, err := shelf.Find(name)
		require.NoError(t, err)
		require.NoError(t, shelf.Put(path, "harbour", "", ""))
	}
	dir, err := shelf.Dir()
	require.NoError(t, err)
	require.NoError(t, os.WriteFile(filepath.Join(dir, "notes.md"), nil, 0o600))
	require.NoError(t, os.Mkdir(filepath.Join(dir, "folder.txt"), 0o700))
	names, err = shelf.List()
	require.NoError(t, err)
	assert.Equal(t, []string{"Anna", "quay"}, names)
	info, err := os.Stat(dir)
	require.NoError(t, err)
	assert.Equal(t, os.FileMode(0o700), info.Mode().Perm())
}

const heading = "# one word a line; then a tab and its kind, a tab and a note\n"

func TestPutKeepsEveryOtherByte(t *testing.T) {
	tests := []struct{ name, before, word, kind, note, after string }{
		{"new list", "", "quay", "", "", heading + "quay\n"},
		{"all columns", "# mine\n", "Sallow", "place", "a quay", "# mine\nSallow\tplace\ta quay\n"},
		{"note alone", "# mine\n", "Sallow", "", "a quay", "# mine\nSallow\t\ta quay\n"},
		{"no line end at the end", "a", "b", "", "", "a\nb\n"},
		{"two kinds of line ends", "a\r\n\n  b \n", "c", "", "", "a\r\n\n  b \nc\r\n"},
		{"in place", "a\nb\tterm  # old\r\nc\n", "b", "place", "", "a\nb\tplace\r\nc\n"},
		{"in place of a bar", "okay → OK\nz", "okay", "", "", "okay\nz"},
		{"in place of the last", "b\tx\nb\ty\n", "b", "z", "", "b\tx\nb\tz\n"},
		{"another case is another word", "rose\n", "Rose", "", "", "rose\nRose\n"},
		{"a comment is no word", "# b\n#b\n", "b", "", "", "# b\n#b\nb\n"},
		{"in place after a byte order mark", "\ufeffb\nc\n", "b", "k", "", "\ufeffb\tk\nc\n"},
		{"what cannot be shown", "a\n", "b", "k\t#i\n", "n\x1b[31m\u2028o", "a\nb\tk i\tn [31m o\n"},
		{"bytes that are not UTF-8 stay", "a\xff\n", "b", "", "", "a\xff\nb\n"},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			path := filepath.Join(t.TempDir(), "l.txt")
			if tt.before != "" {
				require.NoError(t, os.WriteFile(path, []byte(tt.before), 0o640))
			}
			require.NoError(t, shelf.Put(path, tt.word, tt.kind, tt.note))
			assertText(t, path, tt.after)
			require.NoError(t, shelf.Put(path, tt.word, tt.kind, tt.note))
			assertText(t, path, tt.after)
			info, err := os.Stat(path)
			require.NoError(t, err)
			if tt.before == "" {
				assert.Equal(t, os.FileMode(0o600), info.Mode())
			} else {
				assert.Equal(t, os.FileMode(0o640), info.Mode())
			}
			entries, err := os.ReadDir(filepath.Dir(path))
			require.NoError(t, err)
			assert.Len(t, entries, 1, "nothing is left beside the list")
		})
	}
}

func assertText(t *testing.T, path, want string) {
	t.Helper()
	got, err := os.ReadFile(path)
	require.NoError(t, err)
	assert.Equal(t, want, string(got))
}

func TestPutRefusesWhatWouldNotReadBack(t *testing.T) {
	path := filepath.Join(t.TempDir(), "l.txt")
	for _, word := range []string{"", " ", "a b", "a\tb", "a\nb", "#a", "a→b", "a->b", "a\x00", "\xff", "a\u00a0b", "a\u202eb", "--"} {
		assert.Error(t, shelf.Put(path, word, "", ""), "%q", word)
	}
	assert.NoFileExists(t, path)
	require.NoError(t, os.WriteFile(path, []byte("a\x00\n\x00"), 0o600))
	assert.ErrorContains(t, shelf.Put(path, "a", "", ""), "no word list")
	assertText(t, path, "a\x00\n\x00")
	assert.Error(t, shelf.Put(t.TempDir(), "a", "", ""), "a folder")
	assert.Error(t, shelf.Put(filepath.Join(path, "l.txt"), "a", "", ""), "a file where a folder should be")
}

func TestTakeRemovesOnlyWhatPutWrote(t *testing.T) {
	path := filepath.Join(t.TempDir(), "l.txt")
	did, err := shelf.Take(path, "b", "", "")
	require.NoError(t, err)
	assert.False(t, did)
	assert.NoFileExists(t, path)

	const before = "# mine\r\na\tterm\r\n"
	require.NoError(t, os.WriteFile(path, []byte(before), 0o600))
	require.NoError(t, shelf.Put(path, "b", "place", "n"))
	line, ok, err := shelf.Line(path, "b")
	require.NoError(t, err)
	assert.True(t, ok)
	assert.Equal(t, "b\tplace\tn", line)
	did, err = shelf.Take(path, "b", "place", "changed since")
	require.NoError(t, err)
	assert.False(t, did)
	did, err = shelf.Take(path, "b", "place", "n")
	require.NoError(t, err)
	assert.True(t, did)
	assertText(t, path, before)
	_, ok, err = shelf.Line(path, "b")
	require.NoError(t, err)
	assert.False(t, ok)
}

func TestALinkStaysALink(t *testing.T) {
	dir := t.TempDir()
	file, link := filepath.Join(dir, "file"), filepath.Join(dir, "link")
	require.NoError(t, os.WriteFile(file, []byte("a\n"), 0o600))
	require.NoError(t, os.Symlink("file", link))
	require.NoError(t, shelf.Put(link, "b", "", ""))
	assertText(t, file, "a\nb\n")
	info, err := os.Lstat(link)
	require.NoError(t, err)
	assert.NotZero(t, info.Mode()&os.ModeSymlink)
}

func TestNothingIsLostWhereManyPutAtOnce(t *testing.T) {
	path := filepath.Join(t.TempDir(), "l.txt")
	var wg sync.WaitGroup
	for _, prefix := range []string{"g", "h"} {
		wg.Go(func() { assert.NoError(t, putMany(path, prefix)) })
	}
	for _, prefix := range []string{"p", "q"} {
		wg.Go(func() {
			child := exec.Command(os.Args[0])
			child.Env = append(os.Environ(), childEnv+"="+path+":"+prefix)
			out, err := child.CombinedOutput()
			assert.NoError(t, err, string(out))
		})
	}
	wg.Wait()
	text, err := os.ReadFile(path)
	require.NoError(t, err)
	assert.Equal(t, 1+4*perWriter, bytes.Count(text, []byte("\n")))
	for _, prefix := range []string{"g", "h", "p", "q"} {
		for i := range perWriter {
			assert.Contains(t, string(text), fmt.Sprintf("\n%s%d\tterm\n", prefix, i))
		}
	}
}
