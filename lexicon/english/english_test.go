package english_test

import (
	"crypto/sha256"
	"encoding/hex"
	"os"
	"testing"
	"time"

	"emendary/lexicon"
	"emendary/lexicon/english"
)

func TestTry(t *testing.T) {
	t0 := time.Now()
	b := english.Base()
	t.Log(time.Since(t0), b.Len())
	x := lexicon.New(b, lexicon.American)
	t.Log(time.Since(t0), b.Len())
	for _, f := range []string{"harbor", "Harbor", "harbour", "HARBOR", "HarBor", "thames", "Thames", "MCKAY", "Mckay", "don’t", "o’clock", "O’clock", "’Tis", "U.S.", "e.g", "e.g.", "Mr", "Mr.", "US", "us", "okay", "café"} {
		t.Logf("%s %v", f, x.Find(f))
	}
	t0 = time.Now()
	n := x.Within("harber", 2)
	t.Log(time.Since(t0))
	for _, w := range n[:20] {
		t.Log(w.Distance, w.Word.Text, w.Word.Sources)
	}
	data, _ := os.ReadFile("english.lexicon")
	sum := sha256.Sum256(data)
	if hex.EncodeToString(sum[:]) != english.SHA256 || b.Len() != english.Words {
		t.Error("no")
	}
}
