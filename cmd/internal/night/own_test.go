package night

import (
	"errors"
	"io"
	"strings"
	"testing"

	"lastdrop/report"
)

func TestAForeignOUTIsRefused(t *testing.T) {
	for _, c := range []struct{ file, text, says string }{
		{"evaluations.jsonl", "theirs", "holds evaluations.jsonl, and no last-sweep.txt of a sweep beside it"},
		{"last-sweep.txt", "my broom", "holds last-sweep.txt, and no last-sweep.txt of a sweep beside it"},
	} {
		b := newBench(t, map[string]string{"1.csv": aRunOf(1)})
		b.put("out/"+c.file, c.text)
		before := state(t, b.path("out"))
		e := b.refused(BadRequest)
		if !strings.Contains(e.Error(), c.says) || !strings.Contains(e.Try, "name another folder with --into, or move the file out of it") {
			t.Errorf("%s: got %q, try %q", c.file, e.Error(), e.Try)
		}
		equalLists(t, "OUT", state(t, b.path("out")), before)
	}
}

func TestOtherFilesInOUTAreNoHindrance(t *testing.T) {
	b := newBench(t, map[string]string{"1.csv": aRunOf(1)})
	b.put("out/notes.md", "ours to keep")
	b.sweep()
	equal(t, "notes", b.read("out/notes.md"), "ours to keep")
}

// A first sweep that ended in the middle leaves an OUT that the next one takes.
func TestAFirstSweepThatFailedIsNoHindrance(t *testing.T) {
	b := newBench(t, map[string]string{"1.csv": aRunOf(1)})
	outputs := b.opts.Outputs
	b.outputs(Output{"summary.pdf", func(io.Writer, *report.Night) error { return errors.New("full") }})
	b.refused(Unfinished)
	equal(t, "last-sweep.txt", b.read("out/last-sweep.txt"),
		"time: 2031-04-03T02:15:00Z\nlastdrop: 0.0.0\nexit: none yet\npublished: nothing\nwhy: the first sweep has not ended, or was ended by force\n")
	b.put("out/evaluations.jsonl", "half")
	b.opts.Outputs = outputs
	b.sweep()
}
