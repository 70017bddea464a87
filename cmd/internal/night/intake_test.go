package night

import (
	"os"
	"testing"
)

func patterns(t *testing.T, all ...string) (list []Pattern) {
	t.Helper()
	for _, s := range all {
		p, err := ParsePattern(s)
		if err != nil {
			t.Fatal(err)
		}
		list = append(list, p)
	}
	return list
}

func TestSingleFiles(t *testing.T) {
	b := newBench(t, map[string]string{"1.csv": aRunOf(1), "2.csv": aRunOf(2), "3.export": aRunOf(3), "a/4.zip": zipOf(t, "4.csv", aRunOf(4))})
	b.opts.Folders = []string{b.path("dumps/2.csv"), b.path("dumps/3.export"), b.path("dumps/a/4.zip"), b.path("dumps/2.csv")}
	r := b.sweep()
	equalLists(t, "files", told(r), []string{"a/4.zip/4.csv S4", "dumps/2.csv S2", "dumps/3.export S3"})
	equal(t, "path", r.Path("dumps/2.csv"), b.path("dumps/2.csv"))

	b.opts.Folders = []string{b.path("dumps/2.csv"), b.path("dumps"), b.path("dumps/3.export")}
	r = b.sweep()
	equalLists(t, "files and their folder", told(r), []string{"dumps/1.csv S1", "dumps/2.csv S2", "dumps/3.export S3", "dumps/a/4.zip/4.csv S4"})
	equal(t, "other files", r.Night.OtherFiles, 0)
}

// Who names files leaves others out, and means it.
func TestNamedFilesHaveNoGaps(t *testing.T) {
	b := newBench(t, map[string]string{"0001.csv": aRunOf(1), "0002.csv": aRunOf(2), "0004.csv": aRunOf(4), "0005.csv": aRunOf(5), "0006.csv": aRunOf(6)})
	equal(t, "gaps of the folder", len(b.sweep().Night.Gaps), 1)
	var files []string
	for _, n := range []string{"1", "2", "4", "5", "6"} {
		files = append(files, b.path("dumps/000"+n+".csv"))
	}
	b.opts.Folders = files
	r := b.sweep()
	equal(t, "runs", len(r.Night.Evaluations), 5)
	equal(t, "gaps of the files", len(r.Night.Gaps), 0)
}

// What the user names is followed; what lies in a folder is not.
func TestAFileByALink(t *testing.T) {
	b := newBench(t, map[string]string{"1.csv": aRunOf(1)})
	b.put("elsewhere/2.csv", aRunOf(2))
	if err := os.Symlink(b.path("elsewhere/2.csv"), b.path("dumps/link.csv")); err != nil {
		t.Skipf("this system makes no symbolic links: %v", err)
	}
	b.opts.Folders = []string{b.path("dumps/link.csv")}
	equalLists(t, "runs", told(b.sweep()), []string{"dumps/link.csv S2"})
}

func TestIncludeAndExclude(t *testing.T) {
	dumps := map[string]string{"a/1.csv": aRunOf(1), "a/2.txt": aRunOf(2), "b/3.csv": aRunOf(3), "old/4.csv": aRunOf(4), "x.md": "",
		"5.zip": zipOf(t, "a/5.csv", aRunOf(5), "b/6.csv", aRunOf(6), "x.md", "")}
	for _, c := range []struct {
		what             string
		include, exclude []string
		want             []string
		excluded, others int
	}{
		{"all", nil, nil, []string{"dumps/5.zip/a/5.csv S5", "dumps/5.zip/b/6.csv S6", "dumps/a/1.csv S1", "dumps/a/2.txt S2", "dumps/b/3.csv S3", "dumps/old/4.csv S4"}, 0, 2},
		{"by ending", []string{"*.txt"}, nil, []string{"dumps/a/2.txt S2"}, 5, 2},
		{"by folder", []string{"a"}, nil, []string{"dumps/5.zip/a/5.csv S5", "dumps/a/1.csv S1", "dumps/a/2.txt S2"}, 3, 2},
		{"without a folder", nil, []string{"dumps/old", "dumps/*/3.csv"}, []string{"dumps/5.zip/a/5.csv S5", "dumps/5.zip/b/6.csv S6", "dumps/a/1.csv S1", "dumps/a/2.txt S2"}, 2, 2},
		{"without an archive", nil, []string{"*.zip"}, []string{"dumps/a/1.csv S1", "dumps/a/2.txt S2", "dumps/b/3.csv S3", "dumps/old/4.csv S4"}, 1, 1},
		{"both", []string{"dumps/**/*.csv"}, []string{"b", "old"}, []string{"dumps/5.zip/a/5.csv S5", "dumps/a/1.csv S1"}, 4, 2},
	} {
		b := newBench(t, dumps)
		b.opts.Include, b.opts.Exclude = patterns(t, c.include...), patterns(t, c.exclude...)
		r := b.sweep()
		equalLists(t, c.what, told(r), c.want)
		equal(t, c.what+": left out", r.Night.Excluded, c.excluded)
		equal(t, c.what+": other files", r.Night.OtherFiles, c.others)
	}
}

func TestNothingIsLeft(t *testing.T) {
	b := newBench(t, map[string]string{"1.csv": aRunOf(1), "x.md": "", "2.zip": zipOf(t, "y.md", "")})
	b.opts.Include = patterns(t, "*.dat")
	e := b.refused(NoDump)
	equal(t, "message", e.Error(), "no dump found in "+b.path("dumps")+" (2 other files; 1 dump left out by --include and --exclude)")
	equal(t, "try", e.Try, "look at the patterns behind --include and --exclude")
}

func TestGapsOfANight(t *testing.T) {
	b := newBench(t, map[string]string{"0001.csv": aRunOf(1), "0002.csv": aRunOf(2), "0004.csv": aRunOf(4),
		"0005.csv": "broken x\n", "0007.csv": aRunOf(7), "0006.bmp": "", "old.zip": zipOf(t, "0008.csv", aRunOf(8))})
	r := b.sweep()
	if len(r.Night.Gaps) != 1 || r.Night.Gaps[0].Name != "dumps/0003" || r.Night.Count("disputed") != 0 {
		t.Errorf("gaps: got %v", r.Night.Gaps)
	}
}
