//go:build !windows

package main

import (
	"os"
	"path/filepath"
	"strings"
	"syscall"
	"testing"
)

// A folder of links is told as what it is. What a repository cannot hold, a
// link and a pipe, is made here.
func TestLinksAndPipesAreNamed(t *testing.T) {
	dumps, into := laboratory(t)
	elsewhere := filepath.Join(t.TempDir(), "elsewhere")
	if err := os.Rename(dumps, elsewhere); err != nil {
		t.Fatal(err)
	}
	if err := os.Mkdir(dumps, 0o777); err != nil {
		t.Fatal(err)
	}
	if err := os.Symlink(elsewhere, filepath.Join(dumps, "link")); err != nil {
		t.Skipf("this system makes no symbolic links: %v", err)
	}
	r := try(t, []string{"sweep", dumps, "--into", into, "--quiet"}, nil)
	want := "lastdrop: no dump found in " + dumps + " (1 symbolic link, not followed)\nlastdrop: try: sweep the folder that the links point to\n"
	if r.exit != 6 || r.stderr != want {
		t.Errorf("links only: exit %d, stderr\n got %s\nwant %s", r.exit, r.stderr, want)
	}

	if err := syscall.Mkfifo(filepath.Join(dumps, "pipe.csv"), 0o666); err != nil {
		t.Skipf("this system makes no pipes: %v", err)
	}
	if err := os.WriteFile(filepath.Join(dumps, "1.csv"), []byte(aCurve), 0o666); err != nil {
		t.Fatal(err)
	}
	r = try(t, []string{"sweep", dumps, "--into", into}, nil)
	for _, want := range []string{"One symbolic link was not followed: dumps/link.\n", "One pipe, socket or device was not opened: dumps/pipe.csv.\n"} {
		if r.exit != 0 || !strings.Contains(r.stdout, want) {
			t.Errorf("exit %d, want %q in\n%s", r.exit, want, r.stdout)
		}
	}
}

// A text of a dump or a name must not act on a terminal that a draft is
// printed on.
func TestDraftsAreHarmless(t *testing.T) {
	path := filepath.Join(t.TempDir(), "a\nb\x1b[31m.csv")
	dump := "Sample\x1b[31m: x\x1b[0m\nV (mL);E (mV)\n0;1\n1;2\n2;3\n3;5\n4;9\n5;12\n6;14\n7;15\n"
	if err := os.WriteFile(path, []byte(dump), 0o666); err != nil {
		t.Skip(err)
	}
	r := try(t, []string{"schema", "draft", path}, nil)
	if strings.Contains(r.stdout+r.stderr, "\x1b") {
		t.Errorf("an escape reaches the terminal: %q\n%q", r.stdout, r.stderr)
	}
}
