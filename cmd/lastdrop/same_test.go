package main

import (
	"path/filepath"
	"strings"
	"testing"

	"lastdrop/cmd/internal/demo"
)

// exempt is true for the published files whose bytes depend on the clock too.
func exempt(name string) bool { return name == "waiting.jsonl" || name == "last-sweep.txt" }

// laidOut writes the dumps of the demonstration in the order given or the
// other way round, so that the folder lists them in another order.
func laidOut(t *testing.T, folder string, backwards bool) {
	t.Helper()
	files, _, err := demo.Files(demo.DefaultSeed)
	if err != nil {
		t.Fatal(err)
	}
	for i := range files {
		f := files[i]
		if backwards {
			f = files[len(files)-1-i]
		}
		writeDemonstration(t, folder, f)
	}
}

func TestSameBytesOfAllOutputs(t *testing.T) {
	var first map[string]string
	for _, c := range []struct {
		workers   string
		backwards bool
	}{{"1", false}, {"2", true}, {"2", false}} {
		dir := t.TempDir()
		laidOut(t, dir, c.backwards)
		before := tree(t, filepath.Join(dir, "dumps"))
		r := try(t, []string{"sweep", filepath.Join(dir, "dumps"), "--into", filepath.Join(dir, "out"), "--workers", c.workers, "--curves", "--quiet"}, nil)
		if r.exit != 0 {
			t.Fatalf("%+v: exit %d, %s", c, r.exit, r.stderr)
		}
		got := map[string]string{}
		for name, dated := range tree(t, filepath.Join(dir, "out")) {
			if !exempt(name) {
				_, got[name], _ = strings.Cut(dated, "\n")
			}
		}
		if first == nil {
			first = got
		}
		if len(got) != 4 {
			t.Errorf("%+v: got %d files to compare, want 4", c, len(got))
		}
		for name := range first {
			if got[name] != first[name] || got[name] == "" {
				t.Errorf("%+v: %s has other bytes, or none", c, name)
			}
		}
		after := tree(t, filepath.Join(dir, "dumps"))
		for name, was := range before {
			if after[name] != was {
				t.Errorf("%+v: the dump %s was changed", c, name)
			}
		}
	}
}
