package ingest

import (
	"bytes"
	"encoding/csv"
	"math"
	"os"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"testing"
	"unicode/utf8"

	"lastdrop/schemas"
)

// Dialects that a chemist invented who had only language.md before him: the
// dump, its schema, and what he wrote down about each run by hand.

// written is a dialect with its truth.
type written struct {
	name, path string
	data       []byte
	schema     *schemas.Schema
	truth      []map[string]string // a run each, by the titles of the first line
}

// writtenDialects are all the dialects that have a truth.
func writtenDialects(t *testing.T) []written {
	t.Helper()
	truths, err := filepath.Glob(filepath.Join(dialects, "truth", "*.csv"))
	if err != nil || len(truths) < 11 {
		t.Fatal(len(truths), err)
	}
	var list []written
	for _, truth := range truths {
		src, err := os.ReadFile(truth)
		if err != nil {
			t.Fatal(err)
		}
		w := written{truth: truthRows(t, truth, src), name: strings.TrimSuffix(filepath.Base(truth), ".csv")}
		files, _ := filepath.Glob(filepath.Join(dialects, w.name+".*"))
		for _, path := range files {
			data, err := os.ReadFile(path)
			if err != nil {
				t.Fatal(err)
			}
			switch {
			case strings.HasSuffix(path, ".want.txt"):
			case filepath.Ext(path) == ".toml":
				if w.schema, err = schemas.Parse(path, data); err != nil {
					t.Fatal(err)
				}
			default:
				w.path, w.data = path, data
			}
		}
		list = append(list, w)
	}
	return list
}

func truthRows(t *testing.T, path string, data []byte) []map[string]string {
	t.Helper()
	rows, err := csv.NewReader(strings.NewReader(string(data))).ReadAll()
	if err != nil {
		t.Fatalf("%s: %v", path, err)
	}
	var list []map[string]string
	for _, row := range rows[1:] {
		one := map[string]string{}
		for i, title := range rows[0] {
			one[title] = row[i]
		}
		list = append(list, one)
	}
	return list
}

// unsaid is what the language cannot say of a dialect: a line of a footer
// without separator.
var unsaid = map[string]string{"slate": "indicated_ml"}

// Each dump is known among all schemas and read as its author wrote it down.
func TestDialectsReadAsTheirAuthorWroteDown(t *testing.T) {
	list := writtenDialects(t)
	set := slices.Clone(schemas.Shipped())
	for _, w := range list {
		set = append(set, w.schema)
	}
	for _, w := range list {
		t.Run(w.name, func(t *testing.T) {
			runs, schema, problems := Read(w.data, w.path, set)
			if schema == nil || schema.Name != w.schema.Name || len(problems) > 0 {
				t.Fatalf("schema %v, problems %v", schema, problems)
			}
			if len(runs) != len(w.truth) {
				t.Fatalf("%d runs, want %d", len(runs), len(w.truth))
			}
			for i := range runs {
				w.compare(t, &runs[i], w.truth[i])
			}
		})
	}
}

// compare holds a run against its truth, numbers to 1e-9 of themselves.
func (w *written) compare(t *testing.T, r *Run, truth map[string]string) {
	t.Helper()
	first, last := r.Readings[0], r.Readings[len(r.Readings)-1]
	var ends []float64
	for _, one := range r.Indicated {
		ends = append(ends, one.VolumeML)
	}
	for title, got := range map[string]string{"run": strconv.Itoa(r.Number), "sample": r.Facts.Sample, "procedure": r.Facts.Procedure, "started": r.Facts.Started,
		"signal": string(r.Signal), "readings": strconv.Itoa(len(r.Readings))} {
		if want, ok := truth[title]; !ok || got != want {
			t.Errorf("run %d, %s: %q, want %q", r.Number, title, got, want)
		}
	}
	for title, got := range map[string][]float64{"first_volume_ml": {first.VolumeML}, "first_value": {first.Value}, "last_volume_ml": {last.VolumeML}, "last_value": {last.Value}, "indicated_ml": ends} {
		text, ok := truth[title]
		if unsaid[w.name] == title {
			text = ""
		}
		want := strings.Fields(text)
		if !ok || len(got) != len(want) {
			t.Errorf("run %d, %s: %v, want %s", r.Number, title, got, text)
			continue
		}
		for i := range got {
			if v, err := strconv.ParseFloat(want[i], 64); err != nil || math.Abs(got[i]-v) > 1e-9*math.Abs(v) {
				t.Errorf("run %d, %s: %v, want %s", r.Number, title, got[i], want[i])
			}
		}
	}
}

// Any one byte changed into a character of structure: each run that is read
// has the numbers of a true one, or more repairs than that one.
func TestStructuralByteInWrittenDialects(t *testing.T) {
	for _, w := range writtenDialects(t) {
		t.Run(w.name, func(t *testing.T) {
			set := []*schemas.Schema{w.schema}
			text, encode := w.data, func(b []byte) []byte { return b }
			if w.schema.Dialect.Encoding == schemas.UTF16BE { // one byte of UTF-16 is no character: damage the text and encode it
				text = fromUTF16(swapped(text))
				encode = func(b []byte) []byte { return swapped(append([]byte("\xff\xfe"), asUTF16(string(b))...)) }
			}
			truth, repairs := map[string]bool{}, map[string]int{}
			runs, _, _ := Read(encode(text), w.path, set)
			for i := range runs {
				runs[i].Remarks, runs[i].Results = nil, nil
				_, numbers := content(&runs[i])
				truth[numbers] = true
				repairs[runs[i].Facts.Sample] = len(runs[i].Repairs)
			}
			read := 0
			for n := range text {
				for _, c := range []byte(",;\t\"\n\r#|\x00") {
					if text[n] >= utf8.RuneSelf && len(text) != len(w.data) {
						continue
					}
					damaged := bytes.Clone(text)
					damaged[n] = c
					runs, _, _ := Read(encode(damaged), w.path, set)
					for i := range runs {
						read++
						runs[i].Remarks, runs[i].Results = nil, nil
						_, numbers := content(&runs[i])
						// The first or last character of a line cut off is seen by nobody.
						cut := (c == '\n' || c == '\r') && (n > 0 && isLineEnd(text[n-1]) || n+1 < len(text) && isLineEnd(text[n+1]))
						if !truth[numbers] && len(runs[i].Repairs) <= repairs[runs[i].Facts.Sample] && !cut {
							t.Errorf("byte %d (%q) as %q, untold:\n%s", n, text[max(0, n-9):min(len(text), n+9)], c, numbers)
						}
					}
				}
			}
			if read < 100 {
				t.Errorf("%d runs read; the test tests nothing", read)
			}
		})
	}
}

func isLineEnd(c byte) bool { return c == '\n' || c == '\r' }

// swapped has the bytes of each pair the other way round.
func swapped(b []byte) []byte {
	b = bytes.Clone(b)
	for i := 0; i+1 < len(b); i += 2 {
		b[i], b[i+1] = b[i+1], b[i]
	}
	return b
}
