package ingest

import (
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"lastdrop/schemas"
)

// explained is an explanation as text.
func explained(e Explanation) string {
	var b strings.Builder
	fmt.Fprintf(&b, "schema %s, %s, %s; missing %q\n", e.Schema, e.Path, e.Encoding, e.Missing)
	for _, r := range e.Runs {
		fmt.Fprintf(&b, "run %d line %d read %t, %d readings %s %q\n", r.Run.Number, r.Run.Line, r.Read, len(r.Run.Readings), r.Run.Signal, r.Run.Repairs)
		for _, c := range r.Columns {
			fmt.Fprintf(&b, "  %q %s %s -> %s\n", c.Title, c.Role, c.Unit, c.Becomes)
		}
		for _, row := range r.Rows {
			time := ""
			if row.TimeS != nil {
				time = fmt.Sprintf(" %v s", *row.TimeS)
			}
			fmt.Fprintf(&b, "  %d %q %v mL %v%s\n", row.Line, row.Written, row.Reading.VolumeML, row.Reading.Value, time)
		}
	}
	for _, p := range e.Problems {
		fmt.Fprintf(&b, "problem %v\n", p)
	}
	return b.String()
}

// The numbers of each row are in the dump, moved by the power of ten of the
// unit; bench-c has µL and µS/cm.
func TestExplainBenchC(t *testing.T) {
	data, err := os.ReadFile(filepath.Join(dialects, "bench-c.csv"))
	if err != nil {
		t.Fatal(err)
	}
	for _, s := range schemas.Shipped() {
		if s.Name == "bench-c" {
			golden(t, filepath.Join("testdata", "explain-bench-c.want.txt"), explained(Explain(data, "bench-c.csv", s)))
		}
	}
}

func TestExplainWithoutEvidence(t *testing.T) {
	set := made(t, single("volume|V|mL\npH|pH\ntime|t||format = \"%H:%M\"", `facts = [{name="sample", columns="Who"}]`))
	for _, c := range []struct{ name, dump, want string }{
		{"read", "t;V;pH;Who;x\n08:00;0;3;A;\n08:01;1;3;A;\n08:02;2;3;A;\n08:03;3;3;A;\n08:05;4;3;A;\n08:06;5;4;A;\n08:07;6;4;A;\n",
			"schema made, x.csv, utf-8; missing \"\"\nrun 1 line 1 read true, 7 readings pH [\"line 1: column \\\"x\\\" not used\"]\n  \"t\" time  -> s\n  \"V\" volume mL -> mL\n  \"pH\" pH [pH] -> pH\n  \"Who\" fact sample  -> \n  \"x\"   -> \n" +
				"  2 [\"08:00\" \"0\" \"3\" \"A\" \"\"] 0 mL 3 0 s\n  3 [\"08:01\" \"1\" \"3\" \"A\" \"\"] 1 mL 3 60 s\n  4 [\"08:02\" \"2\" \"3\" \"A\" \"\"] 2 mL 3 120 s\n" +
				"  6 [\"08:05\" \"4\" \"3\" \"A\" \"\"] 4 mL 3 300 s\n  7 [\"08:06\" \"5\" \"4\" \"A\" \"\"] 5 mL 4 360 s\n  8 [\"08:07\" \"6\" \"4\" \"A\" \"\"] 6 mL 4 420 s\n"},
		{"no header", "a;b\n1;2\n", "schema made, x.csv, utf-8; missing \"the evidence in [recognise] is not there\"\nrun 1 line 1 read false, 0 readings  []\nproblem x.csv:1: no header row; schema made needs a header with \"V\" and \"pH\"\n"},
		{"no text", "V;pH\n\xff;3\n", "schema made, x.csv, ; missing \"\"\nproblem x.csv:2:1: byte FF is not UTF-8; the dump is damaged or in another encoding\n"},
		{"empty", "", "schema made, x.csv, ; missing \"\"\nproblem x.csv:1:1: the dump is empty; export it again\n"},
	} {
		t.Run(c.name, func(t *testing.T) {
			if got := explained(Explain([]byte(c.dump), "x.csv", set[0])); got != c.want {
				t.Errorf("\ngot  %s\nwant %s", got, c.want)
			}
		})
	}
}
