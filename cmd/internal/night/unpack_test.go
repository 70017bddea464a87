package night

import (
	"archive/zip"
	"bytes"
	"compress/gzip"
	"fmt"
	"strings"
	"testing"
	"testing/fstest"
	"time"

	"lastdrop/ingest/archive"
	"lastdrop/report"
)

// zipOf packs name and text, in turn.
func zipOf(t *testing.T, members ...string) string {
	t.Helper()
	var b bytes.Buffer
	z := zip.NewWriter(&b)
	for i := 0; i < len(members); i += 2 {
		w, err := z.Create(members[i])
		if err == nil {
			_, err = w.Write([]byte(members[i+1]))
		}
		if err != nil {
			t.Fatal(err)
		}
	}
	if err := z.Close(); err != nil {
		t.Fatal(err)
	}
	return b.String()
}

func gzipOf(t *testing.T, text string) string {
	t.Helper()
	var b bytes.Buffer
	z := gzip.NewWriter(&b)
	if _, err := z.Write([]byte(text)); err != nil {
		t.Fatal(err)
	}
	if err := z.Close(); err != nil {
		t.Fatal(err)
	}
	return b.String()
}

// told lists runs with their other names, and what is unread or waits.
func told(r *Result) (list []string) {
	for _, e := range r.Night.Evaluations {
		list = append(list, strings.TrimSuffix(fmt.Sprint(e.Dump, " ", e.Facts.Sample, " ", strings.Join(e.Also, ",")), " "))
	}
	for _, u := range r.Night.Unread {
		list = append(list, u.Dump+": "+u.Says)
	}
	for _, w := range r.Night.Waiting {
		list = append(list, w.Dump+" waits: "+w.Says)
	}
	return list
}

func TestDumpsInArchives(t *testing.T) {
	b := newBench(t, map[string]string{
		"1.csv":         aRunOf(1),
		"2031-03.zip":   zipOf(t, "a/1.csv", aRunOf(1), "a/2.csv", aRunOf(2), "notes.md", "x", ".hidden/3.csv", aRunOf(3), "__MACOSX/._1.csv", "x", "inner.zip", "x"),
		"deep/4.csv.gz": gzipOf(t, aRunOf(4)),
		"deep/5.md.gz":  gzipOf(t, "x"),
	})
	r := b.sweep()
	equalLists(t, "runs", told(r), []string{
		"dumps/1.csv S1 dumps/2031-03.zip/a/1.csv", "dumps/2031-03.zip/a/2.csv S2", "dumps/deep/4.csv.gz/4.csv S4"})
	equal(t, "dumps", r.Dumps, 4)
	equal(t, "other files", r.Night.OtherFiles, 3) // notes.md, inner.zip, 5.md
	equal(t, "path", r.Path("dumps/2031-03.zip/a/2.csv"), b.path("dumps/2031-03.zip/a/2.csv"))
}

func TestArchivesThatCannotBeRead(t *testing.T) {
	whole := zipOf(t, "1.csv", aRunOf(1))
	b := newBench(t, map[string]string{
		"a.zip":    "no archive",
		"b.zip":    whole[:len(whole)-30],
		"c.csv.gz": "no archive",
		"d.zip":    zipOf(t, "1.csv", aRunOf(1), "1.csv", aRunOf(2)),
		"e.zip":    zipOf(t),
		"good.csv": aRunOf(9),
	})
	equalLists(t, "runs", told(b.sweep()), []string{
		"dumps/d.zip/1.csv S1", "dumps/good.csv S9",
		"dumps/a.zip: is no zip archive: not a valid zip file", "dumps/b.zip: is no zip archive: not a valid zip file",
		"dumps/c.csv.gz: is no gzip archive: invalid header",
		"dumps/d.zip/1.csv: the archive holds this name twice; only the first one is read"})
}

// A bomb costs one unread dump, however much it holds.
func TestBombs(t *testing.T) {
	zeros := strings.Repeat("0", 3<<20)
	b := newBench(t, map[string]string{
		"ratio.csv.gz": gzipOf(t, zeros),
		"total.zip":    zipOf(t, "1.csv", aRunOf(1), "2.csv", zeros[:1<<20], "3.csv", zeros[:1<<20], "4.csv", aRunOf(4)),
	})
	b.opts.Unpack = archive.Limits{MemberBytes: 64 << 20, TotalBytes: 3 << 19, Members: 100, Ratio: 200}
	b.opts.Refit = func(data []byte, name, sha string) (done []report.Evaluation, unread []report.Unread) {
		if bytes.HasPrefix(data, []byte("0")) {
			return nil, []report.Unread{{Says: "zeros"}}
		}
		return inventedRefit(data, name, sha)
	}
	equalLists(t, "runs", told(b.sweep()), []string{
		"dumps/total.zip/1.csv S1",
		"dumps/ratio.csv.gz/ratio.csv: unpacks to more than 200 times its size",
		"dumps/total.zip: its members unpack to more than 1572864 bytes",
		"dumps/total.zip/2.csv: zeros"})
}

func TestYoungArchiveWaitsAsAWhole(t *testing.T) {
	b := newBench(t, map[string]string{"a.zip": zipOf(t, "1.csv", aRunOf(1), "2.csv", aRunOf(2)), "3.csv": aRunOf(3)})
	b.opts.MinAge = 2 * time.Hour
	b.opts.Now = func() time.Time { return moment }
	equalLists(t, "told", told(b.sweep()), []string{"dumps/3.csv waits: 60 min old; a sweep takes dumps from 2 h on", "dumps/a.zip waits: 60 min old; a sweep takes dumps from 2 h on"})
}

func TestArchiveThatChangesWhileRead(t *testing.T) {
	for how, want := range map[string]string{"size": changedMeanwhile, "time": changedMeanwhile, "gone": "vanished before it was read", "": ""} {
		files := busy{fstest.MapFS{"1.zip": {Data: []byte(zipOf(t, "1.csv", aRunOf(1))), ModTime: moment}}, how, map[string]int{}}
		y := dump{name: "dumps/1.zip", files: files, path: "1.zip", archive: true}.unpack(t.Context(), Options{Refit: inventedRefit})
		if len(y.outcomes) != 1 {
			t.Fatalf("%s: %d outcomes", how, len(y.outcomes))
		}
		equal(t, how, y.outcomes[0].waits, want)
		equal(t, how+": runs", len(y.outcomes[0].evaluations), map[bool]int{true: 1, false: 0}[want == ""])
	}
}
