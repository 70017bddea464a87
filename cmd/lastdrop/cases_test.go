package main

import (
	"errors"
	"flag"
	"io/fs"
	"os"
	"path/filepath"
	"sort"
	"strconv"
	"strings"
	"testing"
	"time"
)

var update = flag.Bool("update", false, "rewrite the wanted output of the cases in testdata/cmd")

// casesFolder holds a folder for each case: args (one a line), in/ (copied to
// where the command runs), want.stdout, want.stderr, want.exit, and, where
// the command leaves files, want.left.
const casesFolder = "../../testdata/cmd"

// moment is what the clock of every test shows.
var moment = time.Date(2031, 4, 3, 2, 15, 0, 0, time.UTC)

func TestCases(t *testing.T) {
	folder, err := filepath.Abs(casesFolder)
	if err != nil {
		t.Fatal(err)
	}
	entries, err := os.ReadDir(folder)
	if err != nil {
		t.Fatal(err)
	}
	for _, e := range entries {
		t.Run(e.Name(), func(t *testing.T) { runCase(t, filepath.Join(folder, e.Name())) })
	}
}

func runCase(t *testing.T, folder string) {
	args, err := os.ReadFile(filepath.Join(folder, "args"))
	if err != nil {
		t.Fatal(err)
	}
	work := t.TempDir()
	lay(t, filepath.Join(folder, "in"), work)
	before := tree(t, work)
	t.Chdir(work)
	r := try(t, argumentsIn(string(args)), nil)
	golden(t, filepath.Join(folder, "want.stdout"), r.stdout)
	golden(t, filepath.Join(folder, "want.stderr"), r.stderr)
	golden(t, filepath.Join(folder, "want.exit"), strconv.Itoa(r.exit)+"\n")
	golden(t, filepath.Join(folder, "want.left"), left(t, work, before))
}

func argumentsIn(text string) []string {
	if text == "" {
		return nil
	}
	return strings.Split(strings.TrimSuffix(text, "\n"), "\n")
}

// result is what a run gave.
type result struct {
	stdout, stderr string
	exit           int
}

// try runs the program in this process, with a fixed clock and no environment
// but the one given.
func try(t *testing.T, args []string, environment map[string]string) result {
	t.Helper()
	var stdout, stderr strings.Builder
	p := &program{
		stdin: strings.NewReader(""), stdout: &stdout, stderr: &stderr,
		now: func() time.Time { return moment }, getenv: func(name string) string { return environment[name] },
	}
	exit := p.run(t.Context(), args)
	return result{stdout.String(), stderr.String(), exit}
}

// lay copies what a case brings. Files are an hour old, those with "young" in
// their name twelve seconds.
func lay(t *testing.T, from, to string) {
	t.Helper()
	err := filepath.WalkDir(from, func(path string, d fs.DirEntry, err error) error {
		if errors.Is(err, fs.ErrNotExist) && path == from {
			return fs.SkipAll
		}
		if err != nil {
			return err
		}
		below, err := filepath.Rel(from, path)
		if err != nil {
			return err
		}
		target := filepath.Join(to, below)
		if d.IsDir() {
			return os.MkdirAll(target, 0o777)
		}
		data, err := os.ReadFile(path)
		if err != nil {
			return err
		}
		age := time.Hour
		if strings.Contains(d.Name(), "young") {
			age = 12 * time.Second
		}
		at := moment.Add(-age)
		return errors.Join(os.WriteFile(target, data, 0o666), os.Chtimes(target, at, at))
	})
	if err != nil {
		t.Fatal(err)
	}
}

// tree maps every file below a folder to its bytes and time.
func tree(t *testing.T, folder string) map[string]string {
	t.Helper()
	files := map[string]string{}
	err := filepath.WalkDir(folder, func(path string, d fs.DirEntry, err error) error {
		if err != nil || d.IsDir() {
			return err
		}
		data, err := os.ReadFile(path)
		if err != nil {
			return err
		}
		info, err := d.Info()
		if err != nil {
			return err
		}
		below, err := filepath.Rel(folder, path)
		files[filepath.ToSlash(below)] = info.ModTime().String() + "\n" + string(data)
		return err
	})
	if err != nil {
		t.Fatal(err)
	}
	return files
}

// left lists the files that a command made or changed; of those that are text
// and hold no computed number, with what they hold.
func left(t *testing.T, folder string, before map[string]string) string {
	t.Helper()
	after := tree(t, folder)
	for name := range before {
		if _, there := after[name]; !there {
			t.Errorf("%s is gone", name)
		}
	}
	var names []string
	for name, now := range after {
		if before[name] != now {
			names = append(names, name)
		}
	}
	sort.Strings(names)
	var b strings.Builder
	for _, name := range names {
		b.WriteString("== " + name + "\n")
		switch filepath.Base(name) {
		case "unread.jsonl", "waiting.jsonl", "last-sweep.txt":
			_, text, _ := strings.Cut(after[name], "\n")
			b.WriteString(text)
		}
	}
	return b.String()
}

// golden compares with a file that only -update writes.
func golden(t *testing.T, path, got string) {
	t.Helper()
	if *update {
		if err := os.WriteFile(path, []byte(got), 0o666); err != nil {
			t.Fatal(err)
		}
		return
	}
	want, err := os.ReadFile(path)
	if err != nil {
		t.Errorf("%v; go test ./cmd/lastdrop -update writes it", err)
		return
	}
	g, w := strings.Split(got, "\n"), strings.Split(string(want), "\n")
	for i := range max(len(g), len(w)) {
		if line(g, i) != line(w, i) {
			t.Errorf("%s, line %d:\n got %s\nwant %s", filepath.Base(path), i+1, line(g, i), line(w, i))
			return
		}
	}
}

// line returns a line in quotes, or that there is none.
func line(lines []string, i int) string {
	if i >= len(lines) {
		return "(the end)"
	}
	return strconv.Quote(lines[i])
}
