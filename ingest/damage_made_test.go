package ingest

import (
	"bytes"
	"strings"
	"testing"
)

// structured are dumps of the layouts and rows that no shipped schema has,
// each with its schema.
func structured() map[string][2]string {
	rows := "0,00;3,10\n1,50;3,21\n2,25;3,52\n3,75;5,03\n4,50;8,94\n5,25;9,45\n"
	return map[string][2]string{
		"wide":    {wideSchema(wideFields, wideNames), "By;Analyst 1\nAA;;;BB;\n2031-04-02T08:14;;;2031-04-02T09:00;\nV;pH;T;V;pH\n0,00;3,10;22,1;0,00;5,10\n1,50;3,21;22,1;1,25;5,21\n2,25;3,32;22,2;2,50;5,32\n3,75;3,43;22,2;3,75;5,43\n4,50;3,54;22,3;4,25;5,54\n;;;5,25;5,65\n"},
		"blank":   {strings.Replace(single(ph, `facts = [{name="sample", titles="Sample"}]`, "stack = { blank = true }"), `"single"`, `"stacked"`, 1), "Sample;AA\nV;pH\n" + rows + "\nSample;BB\nV;pH\n" + rows + "\n"},
		"footer":  {single("increment|V|mL\npH|pH", `facts = [{name="sample", titles="Sample"},{name="aliquot_ml", titles="Aliquot", unit="mL"}]`, `footer = { begin = "End", lines = "cells" }`), "Sample;AA\nV;pH\n" + rows + "End;\nAliquot;12,50\n"},
		"status":  {single("increment|V|mL|empty = \"same\"\npH|pH||empty = \"skip\"\nstatus|S|| values = { ok = \"reading\", no = \"skip\" }\nnumber|No"), "V;pH;S;No\n0,00;3,10;ok;1\n;3,15;no;2\n1,50;;ok;3\n;3,21;ok;4\n0,75;3,52;ok;5\n1,50;5,03;ok;6\n0,75;8,94;ok;7\n0,75;9,45;ok;8\n"},
		"grouped": {strings.Replace(single("volume|V|uL|suffixes = \"uL\"\npH|pH"), "decimalChar", "groupChar = \".\"\ndecimalChar", 1), "V;pH\n0 uL;3,10\n1.500 uL;3,21\n2.250 uL;3,52\n3.750 uL;5,03\n4.500 uL;8,94\n5.250 uL;9,45\n"},
	}
}

// Any one byte changed into a character of structure: each run that is read is
// a true one, or its repairs tell what is not.
func TestStructuralByteInMadeDumps(t *testing.T) {
	for name, c := range structured() {
		t.Run(name, func(t *testing.T) {
			set, data := made(t, c[0]), []byte(c[1])
			runs, _, problems := Read(data, "x.csv", set)
			if len(problems) > 0 {
				t.Fatal(problems)
			}
			truth := map[string]bool{}
			repairs := 0
			for i := range runs {
				all, _ := content(&runs[i])
				truth[all] = true
				repairs += len(runs[i].Repairs)
			}
			read := 0
			for n := range data {
				for _, b := range []byte(";\"\n\r\x00") {
					damaged := bytes.Clone(data)
					damaged[n] = b
					runs, _, _ := Read(damaged, "x.csv", set)
					for i := range runs {
						read++
						all, _ := content(&runs[i])
						// The first or last character of a line cut off is seen by nobody.
						cut := (n+1 < len(data) && data[n+1] == '\n' || n > 0 && data[n-1] == '\n') && (b == '\n' || b == '\r')
						if !truth[all] && len(runs[i].Repairs) <= repairs && !cut {
							t.Errorf("byte %d (%q) as %q, untold:\n%s", n, data[max(0, n-5):min(len(data), n+5)], b, all)
						}
					}
				}
			}
			t.Logf("%d runs read", read)
			if read < 30 {
				t.Error("the test tests nothing")
			}
		})
	}
}
