package export

import (
	"bytes"
	"flag"
	"os"
	"path/filepath"
	"testing"
)

var update = flag.Bool("update", false, "rewrite the golden files in testdata")

// golden compares data with a file in testdata, or rewrites it with -update.
func golden(t *testing.T, name string, data []byte) {
	t.Helper()
	path := filepath.Join("testdata", name)
	if *update {
		if err := os.WriteFile(path, data, 0o644); err != nil {
			t.Fatal(err)
		}
		return
	}
	want, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	if bytes.Equal(data, want) {
		return
	}
	got, old := bytes.Split(data, []byte("\n")), bytes.Split(want, []byte("\n"))
	for i := range min(len(got), len(old)) {
		if !bytes.Equal(got[i], old[i]) {
			t.Fatalf("%s line %d: %q, want %q", name, i+1, got[i], old[i])
		}
	}
	t.Fatalf("%s: %d lines, want %d", name, len(got), len(old))
}
