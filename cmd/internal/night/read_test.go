package night

import (
	"io/fs"
	"os"
	"strings"
	"testing"
	"testing/fstest"
	"time"

	"lastdrop/report"
)

func TestYoungDumpsWait(t *testing.T) {
	b := newBench(t, map[string]string{"1.csv": aRunOf(1), "2.csv": aRunOf(2), "3.csv": aRunOf(3)})
	for name, age := range map[string]time.Duration{"2.csv": 12 * time.Second, "3.csv": -3 * time.Hour} {
		at := moment.Add(-age)
		if err := os.Chtimes(b.path("dumps/"+name), at, at); err != nil {
			t.Fatal(err)
		}
	}
	b.opts.MinAge = 15 * time.Minute
	n := b.sweep().Night
	equal(t, "runs", len(n.Evaluations), 1)
	equal(t, "waiting", len(n.Waiting), 2)
	equal(t, "young", n.Waiting[0], report.Waiting{Record: 1, Dump: "dumps/2.csv", Says: "12 s old; a sweep takes dumps from 15 min on"})
	equal(t, "future", n.Waiting[1].Says, "dated 3 h in the future; a sweep takes dumps from 15 min on")

	b.opts.MinAge = 0
	equal(t, "without --min-age", len(b.sweep().Night.Evaluations), 3)
}

// busy is a file system in which a dump changes each time that its state is
// asked for: by size, by time, or by vanishing.
type busy struct {
	fstest.MapFS
	how   string
	asked map[string]int
}

func (b busy) Stat(name string) (fs.FileInfo, error) {
	b.asked[name]++
	if b.asked[name] > 1 {
		f := *b.MapFS[name]
		switch b.how {
		case "size":
			f.Data = append(f.Data, '\n')
		case "time":
			f.ModTime = f.ModTime.Add(time.Second)
		case "gone":
			return nil, fs.ErrNotExist
		}
		b.MapFS[name] = &f
	}
	return b.MapFS.Stat(name)
}

func TestDumpThatChangesWhileRead(t *testing.T) {
	for how, want := range map[string]string{
		"size": "changed while it was read; the next sweep takes it",
		"time": "changed while it was read; the next sweep takes it",
		"gone": "vanished before it was read",
		"":     "",
	} {
		files := busy{fstest.MapFS{"1.csv": {Data: []byte(aRunOf(1)), ModTime: moment}}, how, map[string]int{}}
		out := evaluateOne(dump{name: "dumps/1.csv", files: files, path: "1.csv"}, Options{Refit: inventedRefit})
		equal(t, how, out.waits, want)
		equal(t, how+": runs", len(out.evaluations), map[bool]int{true: 1, false: 0}[want == ""])
	}
}

// closed refuses to open files.
type closed struct{ fstest.MapFS }

func (c closed) Open(name string) (fs.File, error) {
	return nil, &fs.PathError{Op: "open", Path: name, Err: fs.ErrPermission}
}

func TestUnreadableDumpIsUnread(t *testing.T) {
	files := closed{fstest.MapFS{"1.csv": {ModTime: moment}}}
	out := evaluateOne(dump{name: "dumps/1.csv", files: files, path: "1.csv"}, Options{Refit: inventedRefit})
	want := report.Unread{Record: 1, State: "new", Dump: "dumps/1.csv",
		Says: "the file cannot be read: permission denied", Hint: "check its permissions and its disk"}
	equal(t, "unread", out.unread[0], want)
}

func TestLargeDumpIsUnread(t *testing.T) {
	b := newBench(t, map[string]string{"1.csv": ""})
	if err := os.Truncate(b.path("dumps/1.csv"), maxDumpBytes+1<<20); err != nil {
		t.Fatal(err)
	}
	n := b.sweep().Night
	equal(t, "says", n.Unread[0].Says, "65.0 MiB; a dump has at most 64 MiB")
}

func TestAMistakeOfOursCostsOneDump(t *testing.T) {
	b := newBench(t, map[string]string{"1.csv": "panic\n", "2.csv": aRunOf(2), "3.csv": ""})
	n := b.sweep().Night
	equal(t, "runs", len(n.Evaluations), 1)
	equal(t, "unread", len(n.Unread), 2)
	if !strings.Contains(n.Unread[0].Says, "made a mistake on it: index out of range") {
		t.Errorf("says: got %q", n.Unread[0].Says)
	}
	equal(t, "empty dump", n.Unread[1].Says, "holds no run")
}

func TestSpan(t *testing.T) {
	for d, want := range map[time.Duration]string{
		0: "0 s", 119 * time.Second: "119 s", 2 * time.Minute: "2 min", 119 * time.Minute: "119 min",
		2 * time.Hour: "2 h", 47 * time.Hour: "47 h", 48 * time.Hour: "2 d",
	} {
		equal(t, d.String(), span(d), want)
	}
}
