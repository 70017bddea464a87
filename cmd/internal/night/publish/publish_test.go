package publish

import (
	"context"
	"errors"
	"io"
	"os"
	"path/filepath"
	"sort"
	"strings"
	"testing"
)

// text is a file with this text.
func text(name, body string) File {
	return File{Name: name, Write: func(w io.Writer) error {
		_, err := io.WriteString(w, body)
		return err
	}}
}

func publish(t *testing.T, dir string, files ...File) error {
	t.Helper()
	return publishWithout(t, dir, nil, files...)
}

func publishWithout(t *testing.T, dir string, gone []string, files ...File) error {
	t.Helper()
	p, err := Open(dir)
	if err != nil {
		t.Fatal(err)
	}
	err = p.Publish(t.Context(), files, gone)
	if err := p.Close(); err != nil {
		t.Fatal(err)
	}
	return err
}

// want compares all that lies in a folder, hidden files and folders too.
func want(t *testing.T, what, dir string, files ...string) {
	t.Helper()
	var got []string
	entries, err := os.ReadDir(dir)
	if err != nil {
		t.Fatal(err)
	}
	for _, e := range entries {
		body, err := os.ReadFile(filepath.Join(dir, e.Name()))
		if err != nil {
			body = []byte("(" + err.Error() + ")")
		}
		got = append(got, e.Name()+"="+string(body))
	}
	sort.Strings(files)
	if strings.Join(got, " ") != strings.Join(files, " ") {
		t.Errorf("%s:\n got %v\nwant %v", what, got, files)
	}
}

func TestAllFilesOrNone(t *testing.T) {
	dir := filepath.Join(t.TempDir(), "new", "out")
	if err := publish(t, dir, text("a", "1"), text("b", "1")); err != nil {
		t.Fatal(err)
	}
	want(t, "first", dir, "a=1", "b=1")
	if err := publish(t, dir, text("a", "2"), text("b", "2"), text("c", "2")); err != nil {
		t.Fatal(err)
	}
	want(t, "second", dir, "a=2", "b=2", "c=2")

	full := errors.New("no space left on device")
	err := publish(t, dir, text("a", "3"), File{Name: "b", Write: func(w io.Writer) error {
		io.WriteString(w, "half")
		return full
	}})
	if !errors.Is(err, full) {
		t.Errorf("failed write: got error %v", err)
	}
	want(t, "after a failed write", dir, "a=2", "b=2", "c=2")
}

// What leaves does so with the new files, and stays when they fail.
func TestWhatLeaves(t *testing.T) {
	dir := t.TempDir()
	if err := publish(t, dir, text("a", "1"), text("b", "1"), text("c", "1")); err != nil {
		t.Fatal(err)
	}
	full := errors.New("no space left on device")
	err := publishWithout(t, dir, []string{"c"}, text("a", "2"), File{Name: "b", Write: func(io.Writer) error { return full }})
	if !errors.Is(err, full) {
		t.Errorf("failed write: got error %v", err)
	}
	want(t, "after a failed write", dir, "b=1", "c=1", "a=1")
	if err := publishWithout(t, dir, []string{"c", "never there"}, text("a", "2"), text("b", "2")); err != nil {
		t.Fatal(err)
	}
	want(t, "one less", dir, "b=2", "a=2")
}

// A folder that is not empty cannot be removed, as a file that is open
// elsewhere cannot on some systems.
func TestWhatCannotLeave(t *testing.T) {
	dir := t.TempDir()
	if err := errors.Join(publish(t, dir, text("a", "1"), text("b", "1")), os.MkdirAll(filepath.Join(dir, "full", "x"), 0o777)); err != nil {
		t.Fatal(err)
	}
	if err := publishWithout(t, dir, []string{"b", "full"}, text("a", "2")); err == nil {
		t.Error("no error")
	}
	want(t, "OUT", dir, "a=1", "b=1", "full="+readDirError(dir, "full"))
}

// A folder in the place of a file cannot be replaced, as an open workbook
// cannot on some systems.
func TestWhatMovedGoesBack(t *testing.T) {
	dir := t.TempDir()
	if err := publish(t, dir, text("a", "1"), text("old", "1")); err != nil {
		t.Fatal(err)
	}
	p, err := Open(dir)
	if err != nil {
		t.Fatal(err)
	}
	defer p.Close()
	files := []File{text("a", "2"), text("b", "2"), text("c", "2")}
	if err := errors.Join(p.write(t.Context(), files), p.keep(files, []string{"old"}), os.Rename(p.path(stage), p.path(ready))); err != nil {
		t.Fatal(err)
	}
	if err := os.MkdirAll(filepath.Join(dir, "c", "full"), 0o777); err != nil {
		t.Fatal(err)
	}
	if err := p.remove(); err != nil {
		t.Fatal(err)
	}
	moved, err := p.move(files)
	if err == nil || len(moved) != 2 {
		t.Fatalf("move: got %d moved, error %v, want 2 and an error", len(moved), err)
	}
	want(t, "half way", dir, ".lastdrop-ready="+readDirError(dir, ready), "a=2", "b=2", "c="+readDirError(dir, "c"))
	if err := p.undo(append(moved, "old")); err != nil {
		t.Fatal(err)
	}
	if err := os.RemoveAll(filepath.Join(dir, "c")); err != nil {
		t.Fatal(err)
	}
	want(t, "undone", dir, "a=1", "old=1")
}

func readDirError(dir, name string) string {
	_, err := os.ReadFile(filepath.Join(dir, name))
	return "(" + err.Error() + ")"
}

func TestAFolderInTheWayPublishesNothing(t *testing.T) {
	dir := t.TempDir()
	if err := os.MkdirAll(filepath.Join(dir, "b"), 0o777); err != nil {
		t.Fatal(err)
	}
	if err := publish(t, dir, text("a", "1"), text("b", "1")); err == nil {
		t.Error("no error")
	}
	want(t, "OUT", dir, "b="+readDirError(dir, "b"))
}

// What a kill leaves, at each stage, and what the next Open makes of it.
func TestOpenFinishesOrForgets(t *testing.T) {
	for _, c := range []struct {
		what string
		left map[string]string
		want []string
	}{
		{"killed while writing", map[string]string{"a": "1", ".lastdrop-stage/a": "ha", ".lastdrop-stage/before/a": "1"}, []string{"a=1"}},
		{"killed before the first move", map[string]string{"a": "1", ".lastdrop-ready/a": "2", ".lastdrop-ready/b": "2", ".lastdrop-ready/before/a": "1"}, []string{"a=2", "b=2"}},
		{"killed between two moves", map[string]string{"a": "2", "b": "1", ".lastdrop-ready/b": "2", ".lastdrop-ready/before/a": "1", ".lastdrop-ready/before/b": "1"}, []string{"a=2", "b=2"}},
		{"killed after the last", map[string]string{"a": "2", ".lastdrop-ready/before/a": "1"}, []string{"a=2"}},
		{"killed before a removal", map[string]string{"a": "1", "old": "1", ".lastdrop-ready/a": "2", ".lastdrop-ready/leaving/old": "", ".lastdrop-ready/before/a": "1", ".lastdrop-ready/before/old": "1"}, []string{"a=2"}},
		{"killed after a removal", map[string]string{"a": "1", ".lastdrop-ready/a": "2", ".lastdrop-ready/leaving/old": "", ".lastdrop-ready/before/old": "1"}, []string{"a=2"}},
		{"killed with a removal not decided", map[string]string{"a": "1", "old": "1", ".lastdrop-stage/leaving/old": "", ".lastdrop-stage/before/old": "1"}, []string{"a=1", "old=1"}},
		{"killed in Replace", map[string]string{"a": "1", ".lastdrop-loose-last": "ha"}, []string{"a=1"}},
	} {
		dir := t.TempDir()
		for name, body := range c.left {
			path := filepath.Join(dir, filepath.FromSlash(name))
			if err := errors.Join(os.MkdirAll(filepath.Dir(path), 0o777), os.WriteFile(path, []byte(body), 0o666)); err != nil {
				t.Fatal(err)
			}
		}
		p, err := Open(dir)
		if err != nil {
			t.Fatalf("%s: %v", c.what, err)
		}
		if err := p.Close(); err != nil {
			t.Errorf("%s: %v", c.what, err)
		}
		want(t, c.what, dir, c.want...)
	}
}

func TestCancelledBeforeTheMove(t *testing.T) {
	dir := t.TempDir()
	p, err := Open(dir)
	if err != nil {
		t.Fatal(err)
	}
	ctx, cancel := context.WithCancelCause(t.Context())
	stopped := errors.New("stopped")
	err = p.Publish(ctx, []File{{Name: "a", Write: func(io.Writer) error { cancel(stopped); return nil }}}, nil)
	if !errors.Is(err, stopped) {
		t.Errorf("got error %v", err)
	}
	if err := p.Close(); err != nil {
		t.Error(err)
	}
	want(t, "OUT", dir)
}

func TestOneAtATime(t *testing.T) {
	dir := t.TempDir()
	p, err := Open(dir)
	if err != nil {
		t.Fatal(err)
	}
	if _, err := Open(dir); !errors.Is(err, ErrInUse) {
		t.Errorf("second: got error %v", err)
	}
	if err := p.Close(); err != nil {
		t.Fatal(err)
	}
	again, err := Open(dir)
	if err != nil {
		t.Fatalf("after the first is done: %v", err)
	}
	again.Close()
}

func TestReplace(t *testing.T) {
	dir := t.TempDir()
	for _, body := range []string{"1", "2"} {
		if err := Replace(dir, "last", text("", body).Write); err != nil {
			t.Fatal(err)
		}
		want(t, "OUT", dir, "last="+body)
	}
	full := errors.New("no space left on device")
	if err := Replace(dir, "last", func(io.Writer) error { return full }); !errors.Is(err, full) {
		t.Errorf("got error %v", err)
	}
	want(t, "after a failed write", dir, "last=2")
}
