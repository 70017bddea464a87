package demo

import (
	"bytes"
	"flag"
	"io/fs"
	"os"
	"path/filepath"
	"strings"
	"testing"
)

var update = flag.Bool("update", false, "write testdata/tern-island again")

// shipped is the laboratory that the README's main command runs on.
const shipped = "../../../testdata/tern-island"

// The shipped laboratory must be what the program writes, byte by byte, and
// nothing besides.
func TestShippedLaboratory(t *testing.T) {
	if *update {
		if err := os.RemoveAll(shipped); err != nil {
			t.Fatal(err)
		}
		if err := Write(shipped, DefaultSeed); err != nil {
			t.Fatal(err)
		}
	}
	files, _, err := Files(DefaultSeed)
	if err != nil {
		t.Fatal(err)
	}
	want := map[string]bool{}
	for _, f := range files {
		want[f.Path] = true
		got, err := os.ReadFile(filepath.Join(shipped, filepath.FromSlash(f.Path)))
		if err != nil {
			t.Errorf("%s: %v; go test -update writes it", f.Path, err)
			continue
		}
		if !bytes.Equal(got, f.Data) {
			t.Errorf("%s differs from what the program writes, from byte %d on; go test -update writes it", f.Path, firstDifference(got, f.Data))
		}
	}
	err = filepath.WalkDir(shipped, func(path string, d fs.DirEntry, err error) error {
		if err != nil || d.IsDir() {
			return err
		}
		rel, err := filepath.Rel(shipped, path)
		if !want[filepath.ToSlash(rel)] {
			t.Errorf("%s is in %s, and the program does not write it", rel, shipped)
		}
		return err
	})
	if err != nil {
		t.Error(err)
	}
}

// firstDifference returns the first byte at which two files differ.
func firstDifference(a, b []byte) int {
	for i := range min(len(a), len(b)) {
		if a[i] != b[i] {
			return i
		}
	}
	return min(len(a), len(b))
}

func TestWriteTakesOnlyAnEmptyFolder(t *testing.T) {
	dir := t.TempDir()
	if err := Write(filepath.Join(dir, "new", "folder"), 7); err != nil {
		t.Errorf("a new folder: %v", err)
	}
	if _, err := os.Stat(filepath.Join(dir, "new", "folder", "dumps", "bench-c", "shift-10.csv")); err != nil {
		t.Error(err)
	}
	err := Write(dir, 7)
	if err == nil || !strings.Contains(err.Error(), "not empty") {
		t.Errorf("a folder with something in it: error %v", err)
	}
	if _, err := os.Stat(filepath.Join(dir, "README.md")); err == nil {
		t.Error("a refused folder was written into")
	}
	if err := Write(t.TempDir(), 7); err != nil {
		t.Errorf("an empty folder: %v", err)
	}
	file := filepath.Join(dir, "file")
	if err := os.WriteFile(file, nil, 0o644); err != nil {
		t.Fatal(err)
	}
	if err := Write(file, 7); err == nil {
		t.Error("a file in place of a folder: no error")
	}
}

func TestSameSeedSameBytes(t *testing.T) {
	a, _, errA := Files(11)
	b, _, errB := Files(11)
	c, _, errC := Files(12)
	if errA != nil || errB != nil || errC != nil {
		t.Fatal(errA, errB, errC)
	}
	changed := 0
	for i := range a {
		if a[i].Path != b[i].Path || !bytes.Equal(a[i].Data, b[i].Data) {
			t.Errorf("%s differs between two calls", a[i].Path)
		}
		if a[i].Path != c[i].Path {
			t.Errorf("%s is %s with another seed", a[i].Path, c[i].Path)
		}
		if !bytes.Equal(a[i].Data, c[i].Data) {
			changed++
		}
	}
	if changed < 60 {
		t.Errorf("another seed changes %d files only", changed)
	}
}

// The plan itself: how many of what, as the documentation promises.
func TestPlan(t *testing.T) {
	files, planted, err := Files(DefaultSeed)
	if err != nil {
		t.Fatal(err)
	}
	dumps, faults, disputed, clean, sets, vinegars := 0, map[Fault]int{}, 0, 0, 0, 0
	for _, f := range files {
		if ext := filepath.Ext(f.Path); strings.HasPrefix(f.Path, "dumps/") && (ext == ".csv" || ext == ".txt" || ext == ".dat") {
			dumps++
		}
	}
	for _, p := range planted {
		faults[p.Fault]++
		disputed += count(p.Weight == "disputed")
		clean += count(p.Fault == Clean)
		vinegars += count(p.Procedure == "vinegar acidity" && p.Expect != ExpectAlso)
		sets += count(p.Kind == "at-reading")
	}
	if dumps < 58 || dumps > 64 {
		t.Errorf("%d dumps; about 60 are promised", dumps)
	}
	if disputed < 6 || clean < 40 {
		t.Errorf("%d runs meant to be disputed, %d clean; at least 6 and 40 are promised", disputed, clean)
	}
	if 4*sets < vinegars || 5*sets > 2*vinegars {
		t.Errorf("%d of %d vinegars go to a set reading; about a third is promised", sets, vinegars)
	}
	for _, s := range stories() {
		if faults[s.fault] == 0 {
			t.Errorf("%s is told and not planted", s.fault)
		}
	}
}

// What the README says of a run stands in the same list as the truth, so a
// reader of either finds the same rows.
func TestReadmeTellsEveryFault(t *testing.T) {
	files, planted, err := Files(3)
	if err != nil {
		t.Fatal(err)
	}
	text := map[string]string{}
	for _, f := range files {
		text[f.Path] = string(f.Data)
	}
	rows := strings.Count(text["truth.csv"], "\n") - 1
	if rows != len(planted) {
		t.Errorf("truth.csv has %d rows for %d runs", rows, len(planted))
	}
	for i, row := range strings.Split(strings.TrimSpace(text["truth.csv"]), "\n") {
		if n := strings.Count(row, ","); n != 14 {
			t.Errorf("row %d of truth.csv has %d commas, want 14: %s", i+1, n, row)
		}
	}
	for _, p := range planted {
		told := strings.Contains(text["README.md"], "| "+p.Dump+" |")
		if p.Fault != Clean && !told {
			t.Errorf("README.md does not tell of %s", where(p))
		}
	}
	if !strings.Contains(text["README.md"], "invented") {
		t.Error("README.md does not say that all is invented")
	}
}
