package night

import (
	"errors"
	"io/fs"
	"os"
	"strings"
	"testing"
	"testing/fstest"
)

func TestWhichFilesAreDumps(t *testing.T) {
	b := newBench(t, map[string]string{
		"z.csv": aRunOf(1), "B/ä.TXT": aRunOf(2), "a/x.tsv": aRunOf(3), "a.dat": aRunOf(4),
		"notes.md":    "",                                    // an other file
		".hidden.csv": aRunOf(5), ".hidden/x.csv": aRunOf(6), // passed over
	})
	outside := b.path("outside")
	if err := os.Mkdir(outside, 0o777); err != nil {
		t.Fatal(err)
	}
	b.put("outside/secret.csv", aRunOf(7))
	for from, to := range map[string]string{"dumps/link": outside, "dumps/link.csv": b.path("outside/secret.csv"), "dumps/again.csv": "z.csv"} {
		if err := os.Symlink(to, b.path(from)); err != nil {
			t.Skipf("this system makes no symbolic links: %v", err)
		}
	}
	r := b.sweep()
	var dumps []string
	for _, e := range r.Night.Evaluations {
		dumps = append(dumps, e.Dump)
	}
	equalLists(t, "dumps in byte order", dumps, []string{"dumps/B/ä.TXT", "dumps/a.dat", "dumps/a/x.tsv", "dumps/z.csv"})
	equal(t, "other files", r.Night.OtherFiles, 1)
	equal(t, "dumps", r.Dumps, 4)
	equalLists(t, "links", r.Night.Links, []string{"dumps/again.csv", "dumps/link", "dumps/link.csv"})
	if want := "links=3 first=dumps/again.csv"; !strings.Contains(b.log.String(), want) {
		t.Errorf("log: got %s, want %s in it", b.log.String(), want)
	}
}

func TestNoDump(t *testing.T) {
	b := newBench(t, map[string]string{"notes.md": ""})
	e := b.refused(NoDump)
	equal(t, "message", e.Error(), "no dump found in "+b.path("dumps")+" (1 other file)")
}

func TestFoldersThatCannotBeSweptTogether(t *testing.T) {
	for _, c := range []struct {
		what string
		set  func(*bench)
		kind Kind
		says string
	}{
		{"equal last names", func(b *bench) {
			b.put("x/dumps/1.csv", aRunOf(2))
			b.opts.Folders = append(b.opts.Folders, b.path("x/dumps"))
		}, BadRequest, `have the same last name "dumps"`},
		{"OUT inside", func(b *bench) { b.opts.Into = b.path("dumps/new/out") }, BadRequest, "lies in the swept folder"},
		{"OUT equal", func(b *bench) { b.opts.Into = b.path("dumps/../dumps") }, BadRequest, "lies in the swept folder"},
		{"OUT around", func(b *bench) { b.opts.Into = b.dir }, BadRequest, "lies in OUT"},
		{"missing", func(b *bench) { b.opts.Folders = []string{b.path("dumbs")} }, Unfinished, "there is no such folder or file"},
		{"a file in OUT", func(b *bench) { b.opts.Folders, b.opts.Into = []string{b.path("dumps/1.csv")}, b.path("dumps") }, BadRequest, "lies in OUT"},
		{"a file and a folder of equal names", func(b *bench) {
			b.put("x/dumps/1.csv", aRunOf(2))
			b.opts.Folders = append(b.opts.Folders, b.path("x/dumps/1.csv"))
		}, BadRequest, `have the same last name "dumps"`},
		{"the same folder twice", func(b *bench) { b.opts.Folders = append(b.opts.Folders, b.path("dumps")) }, BadRequest, "have the same last name"},
		{"no name", func(b *bench) { b.opts.Folders = []string{"/"} }, BadRequest, "has no folder name"},
		{"a device", func(b *bench) { b.opts.Folders = []string{os.DevNull} }, BadRequest, "is neither a folder nor a regular file"},
		{"OUT is a file", func(b *bench) { b.put("out", "x") }, Unfinished, "OUT cannot be written"},
	} {
		b := newBench(t, map[string]string{"1.csv": aRunOf(1)})
		c.set(b)
		e := b.refused(c.kind)
		if !strings.Contains(e.Error(), c.says) {
			t.Errorf("%s: got %q, want %q in it", c.what, e.Error(), c.says)
		}
		if e.Try == "" {
			t.Errorf("%s: nothing to try", c.what)
		}
	}
}

func TestOutInsideByALink(t *testing.T) {
	b := newBench(t, map[string]string{"1.csv": aRunOf(1)})
	if err := os.Symlink(b.path("dumps"), b.path("elsewhere")); err != nil {
		t.Skipf("this system makes no symbolic links: %v", err)
	}
	b.opts.Into = b.path("elsewhere/out")
	b.refused(BadRequest)
}

// locked is a file system with one folder that nobody may read.
type locked struct {
	fstest.MapFS
	folder string
}

func (l locked) ReadDir(name string) ([]fs.DirEntry, error) {
	if name == l.folder {
		return nil, &fs.PathError{Op: "open", Path: name, Err: fs.ErrPermission}
	}
	return l.MapFS.ReadDir(name)
}

func TestUnreadableFolderEndsTheSweep(t *testing.T) {
	files := locked{fstest.MapFS{"a/1.csv": {}, "b/2.csv": {}}, "b"}
	_, err := discover(t.Context(), []folder{{path: "/srv/dumps", name: "dumps", files: files}}, &Options{})
	e, ok := errors.AsType[*Error](err)
	if !ok || e.Kind != Unfinished || e.Error() != "/srv/dumps/b: cannot be read: permission denied" {
		t.Errorf("got %v", err)
	}
}
