package main

import (
	"bytes"
	"os"
	"path/filepath"
	"strings"
	"testing"
)

// pdfFiles are the names of the pages in a folder and what they hold.
func pdfFiles(t *testing.T, folder string) map[string][]byte {
	t.Helper()
	names, err := filepath.Glob(filepath.Join(folder, "*.pdf"))
	if err != nil {
		t.Fatal(err)
	}
	files := map[string][]byte{}
	for _, name := range names {
		if files[filepath.Base(name)], err = os.ReadFile(name); err != nil {
			t.Fatal(err)
		}
	}
	return files
}

// A night of more than 200 pages of runs fills two volumes, the same with any
// number of workers; the night after it, which is small, takes the second one
// away again.
func TestVolumesOfASweep(t *testing.T) {
	dir := t.TempDir()
	dumps, into := filepath.Join(dir, "dumps"), filepath.Join(dir, "out")
	manyDumps(t, dumps, 190) // about 260 runs
	r := try(t, []string{"sweep", dumps, "--into", into, "--pages", "all", "--workers", "2"}, nil)
	if r.exit != 0 || !strings.Contains(r.stdout, "summary-2.pdf\n") || !strings.Contains(r.stdout, "The pages fill two volumes;") {
		t.Fatalf("exit %d, %s%s", r.exit, r.stderr, r.stdout)
	}
	large := pdfFiles(t, into)
	if len(large) != 2 {
		t.Fatalf("got %d files of pages, want 2", len(large))
	}
	other := filepath.Join(dir, "other")
	if r := try(t, []string{"sweep", dumps, "--into", other, "--pages", "all", "--workers", "1", "--quiet"}, nil); r.exit != 0 {
		t.Fatal(r.stderr)
	}
	for name, bytesOf := range pdfFiles(t, other) {
		if !bytes.Equal(bytesOf, large[name]) {
			t.Errorf("%s has other bytes with other workers", name)
		}
	}
	r = try(t, []string{"sweep", filepath.Join(dumps, "night-1"), "--into", into}, nil)
	if got := pdfFiles(t, into); r.exit != 0 || len(got) != 1 || got["summary.pdf"] == nil || strings.Contains(r.stdout, "summary-2.pdf") {
		t.Errorf("the small night leaves %d files of pages, exit %d, %s", len(got), r.exit, r.stderr)
	}
}
