package ingest

import (
	"slices"
	"strings"
	"testing"
)

// A mark for "not given" is no empty cell: a volume that failed is not "no
// titrant". Sums by hand.
func TestMarksAreNoEmptyCells(t *testing.T) {
	marks := func(schema string) string {
		return strings.Replace(schema, "decimalChar", "missingValues = \"--\"\ndecimalChar", 1)
	}
	volume := marks(single("volume|V|mL|empty = \"same\"\npH|pH||empty = \"skip\""))
	rows := "V;pH\n0;3\n;3,1\n1,5;3,2\n2;\n;3,4\n2,5;--\n3;3,5\n4;3,6\n5;3,7\n"
	got{schema: volume, dump: rows, points: "0:3 0:3.1 1.5:3.2 2:3.4 3:3.5 4:3.6 5:3.7", repairs: []string{"line 5: 2 rows from here on without a reading, passed over"}}.check(t)
	got{schema: volume, dump: strings.Replace(rows, "1,5;", "--;", 1),
		problem: `x.csv:4:1: volume: "--" means that nothing is given; the dump is damaged or the reading failed; export it again`}.check(t)
	got{schema: volume, dump: strings.Replace(rows, "2;\n", "--;\n", 1), // later rows refer to it
		problem: `x.csv:5:1: volume: "--" means that nothing is given; the dump is damaged or the reading failed; export it again`}.check(t)
	dose := marks(single("increment|dose|mL|empty = \"same\"\npH|pH||empty = \"skip\""))
	rows = "dose;pH\n0;3\n1;3\n1,5;\n;3,2\n1;3\n1;3\n"
	got{schema: dose, dump: rows, points: "0:3 1:3 2.5:3.2 3.5:3 4.5:3",
		repairs: []string{"line 4: 1 row from here on without a reading, passed over", "line 5: 1 row from here on without an increment, taken as no titrant"}}.check(t)
	got{schema: dose, dump: strings.Replace(rows, "1,5;", "--;", 1),
		problem: `x.csv:4:1: increment: "--" means that nothing is given; the dump is damaged or the reading failed; export it again`}.check(t)
	plain := single("increment|dose|mL\npH|pH||empty = \"skip\"")
	got{schema: plain, dump: strings.Replace(rows, "1,5;", ";", 1),
		problem: `x.csv:5:1: increment: the cell is empty; the dump is damaged or the reading failed; export it again`}.check(t)
}

// A status that tells which rows deliver titrant: in those the increment must
// stand. By hand: 2 + 0.5 + 1 + 1 mL.
func TestDosesThatMustBeThere(t *testing.T) {
	schema := single("status|what|| values = { read = \"reading\", dose = \"dose\", rest = \"skip\" }\nincrement|step|mL|empty = \"same\"\npotential|E|mV|empty = \"skip\"")
	rows := "what;step;E\nread;;10\ndose;2;\nread;;20\nrest;;\nread;;21\ndose;0,5;\nread;;30\ndose;1;\nread;;40\ndose;1;\nread;;50\n"
	got{schema: schema, dump: rows, points: "0:10 2:20 2:21 2.5:30 3.5:40 4.5:50"}.check(t)
	got{schema: schema, dump: strings.Replace(rows, "dose;0,5;", "dose;;", 1),
		problem: `x.csv:7:6: increment: the cell is empty in a row that delivers titrant; the dump is damaged; export it again`}.check(t)
	volume := single("status|what|| values = { read = \"reading\", dose = \"dose\" }\nvolume|V|mL|empty = \"same\"\npotential|E|mV|empty = \"skip\"")
	rows = "what;V;E\nread;0;10\ndose;2;\nread;;20\ndose;2,5;\nread;;30\ndose;3,5;\nread;;40\ndose;4,5;\nread;;50\n"
	got{schema: volume, dump: rows, points: "0:10 2:20 2.5:30 3.5:40 4.5:50"}.check(t)
	got{schema: volume, dump: strings.Replace(rows, "dose;2,5;", "dose;;", 1),
		problem: `x.csv:5:6: volume: the cell is empty in a row that delivers titrant; the dump is damaged; export it again`}.check(t)
}

// A header on each page: all its rows, or none of them is passed over.
func TestHeaderOnEachPage(t *testing.T) {
	long := strings.Replace(single("run|run\nincrement|dose mL|mL\npH|pH", "repeatedHeader = true"), `"single"`, `"long"`, 1)
	long = strings.Replace(long, "decimalChar", "headerRows = [1, 2]\ndecimalChar", 1)
	dump := "run;dose;pH\n;mL;\nA;0;3\nB;0;5\nA;1;3\nB;1;5\nrun;dose;pH\n;mL;\nA;1;3,1\nB;1;5,1\nA;1;3\nB;1;5\nA;1;3\nB;1;5\n"
	runs, _, problems := Read([]byte(dump), "x.csv", made(t, long))
	if len(problems) > 0 || len(runs) != 2 || points(&runs[0]) != "0:3 1:3 2:3.1 3:3 4:3" || points(&runs[1]) != "0:5 1:5 2:5.1 3:5 4:5" {
		t.Fatalf("%d runs, %v", len(runs), problems)
	}
	if want := []string{"line 7: the header again, passed over"}; !slices.Equal(runs[1].Repairs, want) || !slices.Equal(runs[0].Repairs, want) {
		t.Errorf("repairs %q and %q, want %q", runs[0].Repairs, runs[1].Repairs, want)
	}
	// Without the units the row below the names is a row of the table.
	page := strings.Replace(single("increment|dose mL|mL\npH|pH", "repeatedHeader = true"), "decimalChar", "headerRows = [1, 2]\ndecimalChar", 1)
	got{schema: page, dump: "dose;pH\nmL;\n0;3\n1;3\ndose;pH\n1;3\n1;3\n1;3\n1;3\n",
		problem: `x.csv:5:1: increment: "dose" is not a number, and 1 more place; a plain decimal number is expected; the cell is damaged or the column is another one`}.check(t)
}

// What is missing in a column that the run can do without is told as it stands.
func TestMissingTemperature(t *testing.T) {
	schema := strings.Replace(single("volume|V|mL\npH|pH\ntemperature|T|Cel"), "decimalChar", "missingValues = \"n.m.\"\ndecimalChar", 1)
	run := got{schema: schema, dump: "V;pH;T\n0;3;22\n1;3;n.m.\n2;3;22\n3;3;22\n4;3;22\n", points: "0:3 1:3 2:3 3:3 4:3",
		repairs: []string{`line 3: temperature: "n.m." means that nothing is given; the column is not used`}}.check(t)
	if run.TemperaturesC != nil {
		t.Errorf("temperatures %v", run.TemperaturesC)
	}
}
