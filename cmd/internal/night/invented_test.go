package night

import (
	"bufio"
	"bytes"
	"encoding/json"
	"fmt"
	"io"
	"log/slog"
	"os"
	"path/filepath"
	"strconv"
	"strings"
	"testing"
	"time"

	"lastdrop/ingest"
	"lastdrop/report"
)

// inventedRefit stands in for package refit: a dump of one key and value a
// line ("run" begins a run), so that a test says in sight what a dump holds.
func inventedRefit(data []byte, name, sha string) (done []report.Evaluation, unread []report.Unread) {
	lines := bufio.NewScanner(bytes.NewReader(data))
	for n := 1; lines.Scan(); n++ {
		key, value, _ := strings.Cut(lines.Text(), " ")
		if key == "panic" {
			panic("index out of range")
		}
		if key == "broken" {
			unread = append(unread, report.Unread{Run: len(done) + 1, Line: n, Says: value})
			continue
		}
		if key == "run" {
			done = append(done, report.Evaluation{Dump: name, DumpSHA256: sha, Run: len(done) + 1, Line: n, Signal: "pH",
				Schema: "plain", SchemaSHA256: "00", Picture: &report.Picture{XName: "mL"}})
			continue
		}
		inventedLine(&done[len(done)-1], key, value, n)
	}
	return done, unread
}

func inventedLine(e *report.Evaluation, key, value string, line int) {
	first, second, _ := strings.Cut(value, " ")
	v, _ := strconv.ParseFloat(first, 64)
	w, _ := strconv.ParseFloat(second, 64)
	switch key {
	case "sample":
		e.Facts.Sample = value
	case "started":
		e.Facts.Started = value
	case "aliquot":
		e.Facts.AliquotML = &v
	case "operator":
		e.Facts.Operator = value
	case "schema":
		e.Schema = value
	case "indicated":
		e.Indicated = append(e.Indicated, report.Indicated{Kind: "inflection", VolumeML: v, StepML: 0.01, Line: line})
	case "flag":
		e.Flags = append(e.Flags, report.Flag{Flag: first, Weight: report.Weight(second)})
	case "reading":
		e.AsRead = append(e.AsRead, ingest.Reading{VolumeML: v, Value: w, Line: line})
		e.Readings++
	}
}

// moment is what every clock of these tests shows.
var moment = time.Date(2031, 4, 3, 2, 15, 0, 0, time.UTC)

// bench is a laboratory in a temporary folder: dumps in dumps/, OUT in out/.
type bench struct {
	t    *testing.T
	dir  string
	log  bytes.Buffer
	opts Options
}

func newBench(t *testing.T, dumps map[string]string) *bench {
	t.Helper()
	b := &bench{t: t, dir: t.TempDir()}
	if err := os.Mkdir(b.path("dumps"), 0o777); err != nil {
		t.Fatal(err)
	}
	for name, text := range dumps {
		b.put("dumps/"+name, text)
	}
	b.opts = Options{
		Folders: []string{b.path("dumps")}, Into: b.path("out"), Date: "2031-04-03", Lastdrop: "0.0.0",
		Now:   func() time.Time { return moment },
		Refit: inventedRefit,
		Log:   slog.New(slog.NewTextHandler(&b.log, nil)),
	}
	b.opts.Own = func(name string) bool { return strings.HasSuffix(name, ".jsonl") }
	b.outputs(
		Output{"evaluations.jsonl", func(w io.Writer, n *report.Night) error { return objects(w, n.Evaluations) }},
		Output{"unread.jsonl", func(w io.Writer, n *report.Night) error { return objects(w, n.Unread) }},
	)
	return b
}

// outputs sets what a night is published as.
func (b *bench) outputs(all ...Output) {
	b.opts.Outputs = func(*report.Night) ([]Output, error) { return all, nil }
}

func objects[T any](w io.Writer, all []T) error {
	to := json.NewEncoder(w)
	for _, one := range all {
		if err := to.Encode(one); err != nil {
			return err
		}
	}
	return nil
}

func (b *bench) path(below string) string { return filepath.Join(b.dir, filepath.FromSlash(below)) }

// put writes a file that is an hour old.
func (b *bench) put(below, text string) {
	b.t.Helper()
	path := b.path(below)
	if err := os.MkdirAll(filepath.Dir(path), 0o777); err != nil {
		b.t.Fatal(err)
	}
	if err := os.WriteFile(path, []byte(text), 0o666); err != nil {
		b.t.Fatal(err)
	}
	old := moment.Add(-time.Hour)
	if err := os.Chtimes(path, old, old); err != nil {
		b.t.Fatal(err)
	}
}

func (b *bench) sweep() *Result {
	b.t.Helper()
	r, err := Sweep(b.t.Context(), b.opts)
	if err != nil {
		b.t.Fatalf("sweep: %v", err)
	}
	return r
}

// refused sweeps and wants an *Error of that kind.
func (b *bench) refused(kind Kind) *Error {
	b.t.Helper()
	_, err := Sweep(b.t.Context(), b.opts)
	e, ok := err.(*Error)
	if !ok || e.Kind != kind {
		b.t.Fatalf("sweep: got error %v, want one of kind %d", err, kind)
	}
	return e
}

func (b *bench) read(below string) string {
	b.t.Helper()
	data, err := os.ReadFile(b.path(below))
	if err != nil {
		b.t.Fatal(err)
	}
	return string(data)
}

// aRun is a dump of one run with two readings.
func aRun(lines ...string) string {
	return "run\n" + strings.Join(lines, "\n") + "\nreading 0 3.10\nreading 1.25 7.42\n"
}

// aRunOf is a run of a sample whose readings no other sample has.
func aRunOf(number int, lines ...string) string {
	return "run\nsample S" + strconv.Itoa(number) + "\n" + strings.Join(lines, "\n") +
		fmt.Sprintf("\nreading 0 3.10\nreading 1.25 7.%03d\n", number)
}

func equal[T comparable](t *testing.T, what string, got, want T) {
	t.Helper()
	if got != want {
		t.Errorf("%s:\n got %v\nwant %v", what, got, want)
	}
}

func equalLists(t *testing.T, what string, got, want []string) {
	t.Helper()
	equal(t, what, strings.Join(got, "\n"), strings.Join(want, "\n"))
}
