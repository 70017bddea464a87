package night

import (
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"lastdrop/report"
)

func TestSweepPublishesInOrder(t *testing.T) {
	b := newBench(t, map[string]string{
		"b.csv": aRunOf(1, "started 2031-04-02T23:14:00") + aRunOf(2, "started 2031-04-03T00:10:00") + "broken later\n",
		"a.csv": "broken first\n" + "broken second\n",
		"c.csv": aRunOf(3, "schema bench-b"),
	})
	r := b.sweep()
	n := r.Night
	equal(t, "dumps", r.Dumps, 3)
	equal(t, "path", r.Path("dumps/b/c.csv"), b.path("dumps/b/c.csv"))
	equalLists(t, "files", r.Files, []string{b.path("out/evaluations.jsonl"), b.path("out/unread.jsonl")})
	var runs, unread []string
	for _, e := range n.Evaluations {
		runs = append(runs, fmt.Sprint(e.Dump, " ", e.Run, " ", e.State, " ", e.Revision, " ", e.Record, " ", e.Lastdrop))
	}
	for _, u := range n.Unread {
		unread = append(unread, fmt.Sprint(u.Dump, ":", u.Line, " ", u.Says))
	}
	equalLists(t, "runs", runs, []string{"dumps/b.csv 1 new 1 1 0.0.0", "dumps/b.csv 2 new 1 1 0.0.0", "dumps/c.csv 1 new 1 1 0.0.0"})
	equalLists(t, "unread", unread, []string{"dumps/a.csv:1 first", "dumps/a.csv:2 second", "dumps/b.csv:11 later"})
	equal(t, "first day", n.FirstDay, "2031-04-02")
	equal(t, "last day", n.LastDay, "2031-04-03")
	equal(t, "schemas", fmt.Sprint(n.Schemas), "[{bench-b 00 1 } {plain 00 2 }]")
	equal(t, "invented", n.Invented, true)

	b.opts.Origins = map[string]string{"00": "replaces shipped"}
	n = b.sweep().Night
	equal(t, "schemas with origin", fmt.Sprint(n.Schemas), "[{bench-b 00 1 replaces shipped} {plain 00 2 replaces shipped}]")
	equal(t, "a laboratory's own bench-b is not invented", n.Invented, false)
}

// mixed is a laboratory with all that joining and waiting can bring.
func mixed(t *testing.T) *bench {
	dumps := map[string]string{"twin1.csv": aRun("sample V-12"), "twin2.csv": aRun("sample V-13"), "none.csv": "", "bad.csv": "broken x\n"}
	for i := range 40 {
		dumps[fmt.Sprintf("%c/%d.csv", 'a'+i%5, i)] = aRunOf(i/2, "flag overshoot doubtful")
	}
	dumps["archive.zip"] = zipOf(t, "z/7.csv", aRunOf(7, "flag overshoot doubtful"), "a/8.csv", aRunOf(8, "flag overshoot doubtful"))
	return newBench(t, dumps)
}

func TestSameBytesWhateverTheOrderAndTheWorkers(t *testing.T) {
	b := mixed(t)
	b.put("more/1.csv", aRunOf(100))
	b.opts.Folders = []string{b.path("dumps"), b.path("more")}
	b.sweep()
	want := b.read("out/evaluations.jsonl") + b.read("out/unread.jsonl")
	for _, workers := range []int{1, 2, 7} {
		for _, folders := range [][]string{{"dumps", "more"}, {"more", "dumps"}} {
			b.opts.Workers = workers
			b.opts.Folders = []string{b.path(folders[0]), b.path(folders[1])}
			b.opts.Now = func() time.Time { return moment.Add(40 * time.Hour) }
			b.opts.Into = b.path(fmt.Sprint("out", workers, folders[0]))
			r := b.sweep()
			into := filepath.Base(b.opts.Into)
			if got := b.read(into+"/evaluations.jsonl") + b.read(into+"/unread.jsonl"); got != want {
				t.Errorf("%d workers, folders %v: other bytes\n got %s\nwant %s", workers, folders, got, want)
			}
			equal(t, "runs", len(r.Night.Evaluations), 23)
		}
	}
}

func TestDumpsStayAsTheyAre(t *testing.T) {
	b := mixed(t)
	before := state(t, b.path("dumps"))
	b.sweep()
	equalLists(t, "dumps", state(t, b.path("dumps")), before)
}

// state lists name, mode, time and bytes of all that lies in a folder.
func state(t *testing.T, dir string) (list []string) {
	err := filepath.WalkDir(dir, func(path string, d os.DirEntry, err error) error {
		if err != nil {
			return err
		}
		info, err := d.Info()
		if err != nil {
			return err
		}
		line := fmt.Sprint(path, info.Mode(), info.ModTime().UnixNano())
		if !d.IsDir() {
			data, err := os.ReadFile(path)
			if err != nil {
				return err
			}
			line += sha(data)
		}
		list = append(list, line)
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
	return list
}

func TestAFailedOutputLeavesTheOldNight(t *testing.T) {
	b := newBench(t, map[string]string{"1.csv": aRunOf(1)})
	b.sweep()
	before := state(t, b.path("out"))
	b.put("dumps/2.csv", aRunOf(2))
	full := errors.New("no space left on device")
	b.outputs(Output{"evaluations.jsonl", func(w io.Writer, n *report.Night) error { return objects(w, n.Evaluations) }},
		Output{"summary.pdf", func(w io.Writer, n *report.Night) error {
			fmt.Fprint(w, "half a page")
			return full
		}})
	e := b.refused(Unfinished)
	if !errors.Is(e, full) || !strings.Contains(e.Error(), "nothing was published into "+b.path("out")) {
		t.Errorf("got %v", e)
	}
	equalLists(t, "OUT", names(state(t, b.path("out"))), names(before))
	equal(t, "evaluations", strings.Count(b.read("out/evaluations.jsonl"), "\n"), 1)
}

// names strips the time of the folder itself, which our own temporary names
// change.
func names(state []string) []string { return state[1:] }

func TestAnInterruptedSweepLeavesTheOldNight(t *testing.T) {
	b := mixed(t)
	b.sweep()
	before := state(t, b.path("out"))
	stopped := errors.New("stopped")
	for _, at := range []string{"refit", "output"} {
		ctx, stop := context.WithCancelCause(t.Context())
		defer stop(nil)
		o := b.opts
		switch at {
		case "refit":
			o.Refit = func(data []byte, name, sha string) ([]report.Evaluation, []report.Unread) {
				stop(stopped)
				return inventedRefit(data, name, sha)
			}
		case "output":
			o.Outputs = func(*report.Night) ([]Output, error) {
				return []Output{{"evaluations.jsonl", func(io.Writer, *report.Night) error { stop(stopped); return nil }}}, nil
			}
		}
		if _, err := Sweep(ctx, o); !errors.Is(err, stopped) {
			t.Errorf("stopped in %s: got error %v", at, err)
		}
		equalLists(t, "OUT, stopped in "+at, names(state(t, b.path("out"))), names(before))
	}
}

// Files of an earlier, larger night go with the night that does not have them;
// whatever else lies in OUT stays.
func TestFilesOfAnEarlierNight(t *testing.T) {
	b := newBench(t, map[string]string{"1.csv": aRunOf(1)})
	part := func(name string) Output {
		return Output{name, func(w io.Writer, _ *report.Night) error { _, err := io.WriteString(w, name); return err }}
	}
	b.opts.Own = func(name string) bool { return strings.HasPrefix(name, "part-") }
	b.outputs(part("part-1"), part("part-2"), part("part-3"))
	b.sweep()
	b.put("out/notes.txt", "mine")
	b.outputs(part("part-1"), part("part-2"))
	result := b.sweep()
	equal(t, "files told", len(result.Files), 2)
	entries, err := os.ReadDir(b.path("out"))
	if err != nil {
		t.Fatal(err)
	}
	var got []string
	for _, e := range entries {
		got = append(got, e.Name())
	}
	equalLists(t, "OUT", got, []string{"last-sweep.txt", "notes.txt", "part-1", "part-2"})
}

func TestTwoSweepsAtOnce(t *testing.T) {
	b := newBench(t, map[string]string{"1.csv": aRunOf(1)})
	b.outputs(Output{"evaluations.jsonl", func(io.Writer, *report.Night) error {
		second := b.opts
		second.Outputs = nil
		_, err := Sweep(t.Context(), second)
		if e, ok := errors.AsType[*Error](err); !ok || e.Kind != InUse {
			t.Errorf("second sweep: got %v", err)
		}
		return nil
	}})
	b.sweep()
}

func TestLastSweep(t *testing.T) {
	b := newBench(t, map[string]string{"1.csv": aRunOf(1), "2.csv": "broken x\n", "3.md": ""})
	last := Last{At: moment, Lastdrop: "0.0.0", Exit: 6, Says: "no dump found in x\ny"}
	if err := last.Write(b.path("out")); err != nil {
		t.Fatal(err)
	}
	if _, err := os.Stat(b.path("out")); err == nil {
		t.Error("OUT was made for last-sweep.txt alone")
	}
	last.Result = b.sweep()
	if err := last.Write(b.path("out")); err != nil {
		t.Fatal(err)
	}
	equal(t, "after a night", b.read("out/last-sweep.txt"), "time: 2031-04-03T02:15:00Z\nlastdrop: 0.0.0\nexit: 6\n"+
		"published: 2031-04-03\ndumps: 2\nruns: 1\ndisputed: 0\ndoubtful: 0\nsound: 1\nunread: 1\nwaiting: 0\nother files: 1\nnot followed: 0\nleft out: 0\ngaps: 0\n")
	last.Result = nil
	if err := last.Write(b.path("out")); err != nil {
		t.Fatal(err)
	}
	equal(t, "without a night", b.read("out/last-sweep.txt"), "time: 2031-04-03T02:15:00Z\nlastdrop: 0.0.0\nexit: 6\npublished: nothing\nwhy: no dump found in x\uFFFDy\n")
}
