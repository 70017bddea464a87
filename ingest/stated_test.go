package ingest

import (
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"
)

// The day and the time of a start in two lines.
func TestStartInTwoPlaces(t *testing.T) {
	schema := single(ph, `facts = [{name="started", titles="Day", timeTitles="Clock", format="%d.%m.%Y %H:%M"}]`)
	rows := "V;pH\n0;3\n1;3\n2;3\n3;3\n4;3\n"
	for _, c := range []struct{ above, want, repair string }{
		{"Day;03.06.2032\nClock;13:47\n", "2032-06-03T13:47:00", ""},
		{"Clock;9:05\nDay;3.6.2032\n", "2032-06-03T09:05:00", ""},
		{"Day;03.06.2032\n", "", `line 1: started: no time of day beside "03.06.2032"; the fact is not used`},
		{"Clock;13:47\n", "", `line 1: "Clock" by itself is no fact, kept as it is`},
		{"Day;03.06.2032\nClock;25:47\n", "", `line 1: started: "03.06.2032 25:47" is a date or time that does not exist; the fact is not used`},
		{"", "", ""},
	} {
		run := readOne(t, []byte(c.above+rows), made(t, schema))
		if run.Facts.Started != c.want || strings.Join(run.Repairs, "|") != c.repair {
			t.Errorf("%q: %q, repairs %q; want %q, %q", c.above, run.Facts.Started, run.Repairs, c.want, c.repair)
		}
	}
}

// An endpoint in a column: in the rows of a run, in numbered columns of one
// run, in the columns of each run side by side.
func TestEndpointsInColumns(t *testing.T) {
	one := single(ph, `indicated = [{ columns = "EP{n}", unit = "mL" }]`)
	run := readOne(t, []byte("V;pH;EP2;EP1\n0;3;;\n1;3;3,5;1,25\n2;3;3,5;1,25\n3;3;;1,25\n4;3;3,5;\n"), made(t, one))
	if want := []Indicated{{"inflection", 1.25, 0.01, 3}, {"inflection", 3.5, 0.1, 3}}; !slices.Equal(run.Indicated, want) || run.Repairs != nil {
		t.Errorf("%+v, want %+v; repairs %q", run.Indicated, want, run.Repairs)
	}
	got{schema: one, dump: "V;pH;EP1\n0;3;1,25\n1;3;1,25\n2;3;1,26\n3;3;1,25\n4;3;1,25\n",
		problem: `x.csv:4:5: indicated: "1,26" here, "1,25" in line 2; a fact may be stated once; export the dump again`}.check(t)
	wide := wideSchema("volume|V{n}|mL\npH|pH{n}", `facts = [{ name = "sample", columns = "lot {n}" }]`, `indicated = [{ columns = "found {n}", unit = "uL" }]`)
	rows := "lot 1;V1;pH1;found 1;lot 2;V2;pH2;found 2\n"
	for i := range 5 {
		rows += fmt.Sprintf("A;%d;3;1250;B;%d;5;2250\n", i, i)
	}
	runs, _, problems := Read([]byte(rows), "x.csv", made(t, wide))
	if len(problems) > 0 || len(runs) != 2 {
		t.Fatal(len(runs), problems)
	}
	for i, want := range []struct {
		sample string
		ml     float64
	}{{"A", 1.25}, {"B", 2.25}} {
		if r := &runs[i]; r.Facts.Sample != want.sample || len(r.Indicated) != 1 || r.Indicated[0].VolumeML != want.ml {
			t.Errorf("run %d: %q %+v, want %+v", i+1, r.Facts.Sample, r.Indicated, want)
		}
	}
}

// An endpoint in grams: 8.0376 g of 1.0047 g/mL is 8 mL.
func TestEndpointByMass(t *testing.T) {
	schema := single("volume|m|g\npH|pH", `facts = [{ name = "density_g_per_ml", titles = "rho", unit = "g/mL" }]`, `indicated = [{ titles = "EP", unit = "g" }]`)
	rows := "m;pH\n0;3\n2,0094;3\n4,0188;3\n6;3\n8;3\n"
	run := readOne(t, []byte("rho;1,0047\nEP;8,0376\n"+rows), made(t, schema))
	if len(run.Indicated) != 1 || math.Abs(run.Indicated[0].VolumeML-8) > 1e-12 || math.Abs(run.Indicated[0].StepML-0.0001/1.0047) > 1e-15 {
		t.Errorf("%+v, want 8 mL, step 0.0001 g / 1.0047 g/mL", run.Indicated)
	}
}

// Groups that are the delimiter, in quotes; columns lined up with blanks; the
// month as a word; a tab within a fact.
func TestWaysOfWriting(t *testing.T) {
	grouped := strings.NewReplacer(`delimiter = ";"`, "delimiter = \",\"\ngroupChar = \",\"", `decimalChar = ","`, `decimalChar = "."`).Replace(single("volume|V|uL\npH|pH"))
	got{schema: grouped, dump: "V,pH\n0,3\n\"1,250.5\",3\n\"2,000\",3\n3000,3\n4000,4\n", points: "0:3 1.2505:3 2:3 3:3 4:4"}.check(t)
	got{schema: grouped, dump: "V,pH\n0,3\n1,250.5,3\n2000,3\n3000,3\n4000,4\n",
		problem: `x.csv:3:9: 3 cells where the header in line 1 has 2; a decimal comma in a dump with commas between the columns? export it again with a decimal point`}.check(t)

	lined := `name = "made"
layout = "single"
recognise.header = true
preamble = { lines = "text" }
dialect = { delimiter = " ", delimiterRepeated = true }
facts = [{ name = "started", titles = "Begun", format = "%d-%b-%Y %H:%M" }, { name = "sample", titles = "Lot" }]
` + fieldsOf("volume|V/mL|mL\npH|pH")
	dump := "Begun : 4-jun-2032 9:12\nLot: a\tb  \n\n  V/mL    pH  \n 0.00   3.10  \n 1.00  3.20\n10.00   3.3\n11.00 3.40\n12.00   3.50\n"
	run := got{schema: lined, dump: dump, points: "0:3.1 1:3.2 10:3.3 11:3.4 12:3.5"}.check(t)
	if run.Facts.Started != "2032-06-04T09:12:00" || run.Facts.Sample != "a b" {
		t.Errorf("%+v", run.Facts)
	}
	got{schema: lined, dump: strings.Replace(dump, "10.00   3.3", "10 00   3.3", 1), problem: `x.csv:7:9: 3 cells where the header in line 4 has 2; the line is damaged; export the dump again`}.check(t)
	got{schema: lined, dump: strings.Replace(dump, "10.00   3.3", "10.00", 1), problem: `x.csv:7:6: 1 cell where the header in line 4 has 2; the line is damaged; export the dump again`}.check(t)
}
