package ingest

import (
	"fmt"
	"slices"
	"strings"
	"testing"

	"lastdrop/schemas"
)

// made parses schemas that a test writes.
func made(t testing.TB, sources ...string) []*schemas.Schema {
	t.Helper()
	var set []*schemas.Schema
	for _, src := range sources {
		s, err := schemas.Parse("made.toml", []byte(src))
		if err != nil {
			t.Fatal(err)
		}
		set = append(set, s)
	}
	return set
}

// single is a schema of one run a dump, semicolons and decimal commas.
func single(fields string, more ...string) string {
	return "name = \"made\"\nlayout = \"single\"\nrecognise.header = true\npreamble = { lines = \"cells\" }\n" + strings.Join(more, "\n") +
		"\n[dialect]\ndelimiter = \";\"\ndecimalChar = \",\"\n" + fieldsOf(fields)
}

// fieldsOf writes a list of "name|titles|unit|further keys" as fields.
func fieldsOf(list string) string {
	var b strings.Builder
	for one := range strings.SplitSeq(list, "\n") {
		part := append(strings.Split(one, "|"), "", "", "")
		fmt.Fprintf(&b, "[[fields]]\nname = %q\ntitles = %q\n", part[0], part[1])
		if part[2] != "" {
			fmt.Fprintf(&b, "unit = %q\n", part[2])
		}
		b.WriteString(part[3] + "\n")
	}
	return b.String()
}

// volumes and values of a run as short text.
func points(r *Run) string {
	var list []string
	for _, p := range r.Readings {
		list = append(list, fmt.Sprintf("%v:%v", p.VolumeML, p.Value))
	}
	return strings.Join(list, " ")
}

// got is a dump read with one made schema.
type got struct {
	schema, dump string
	points       string // "" when the dump is refused
	repairs      []string
	problem      string
}

func (g got) check(t *testing.T) Run {
	t.Helper()
	runs, _, problems := Read([]byte(g.dump), "x.csv", made(t, g.schema))
	if g.points == "" {
		if len(problems) != 1 || problems[0].Error() != g.problem || len(runs) > 0 {
			t.Errorf("%d runs, problems\n     %v\nwant [%s]", len(runs), problems, g.problem)
		}
		return Run{}
	}
	if len(problems) > 0 || len(runs) != 1 {
		t.Fatalf("%d runs, problems %v", len(runs), problems)
	}
	if p := points(&runs[0]); p != g.points {
		t.Errorf("\ngot  %s\nwant %s", p, g.points)
	}
	if !slices.Equal(runs[0].Repairs, g.repairs) {
		t.Errorf("\nrepairs %q\nwant    %q", runs[0].Repairs, g.repairs)
	}
	return runs[0]
}

const ph = "volume|V|mL\npH|pH"

// The sums are by hand: 0.1 ten times is 1 and no 0.9999999999999999.
func TestIncrementsAreSummed(t *testing.T) {
	schema := single("increment|dose|uL\npH|pH")
	got{schema: schema, dump: "dose;pH\n0;3\n100;3\n100;3,1\n100;3,2\n100;3\n100;3\n100;3\n100;3\n100;3\n100;3\n100;4\n",
		points: "0:3 0.1:3 0.2:3.1 0.3:3.2 0.4:3 0.5:3 0.6:3 0.7:3 0.8:3 0.9:3 1:4"}.check(t)
	got{schema: schema, dump: "dose;pH\n0;3\n100;3\n;3,1\n100;3\n100;3\n100;4\n",
		problem: `x.csv:4:1: increment: the cell is empty; the dump is damaged or the reading failed; export it again`}.check(t)
	got{schema: schema, dump: "dose;pH\n0;3\n900000;3\n200000;3\n100;3\n100;3\n100;4\n",
		problem: `x.csv:4:1: increment: 1100 mL is outside 0 to 1000 mL in sum; no burette delivers that; check column, unit and decimal mark`}.check(t)
}

// Rows between the doses have a time and a reading, or only a time.
func TestRowsBetweenDoses(t *testing.T) {
	schema := single("time|t|s\nincrement|dose|mL|empty = \"same\"\npotential|E|mV|empty = \"skip\"", `sameVolume = "last"`)
	run := got{schema: schema, dump: "t;dose;E\n0;;10\n5;1,0;11\n9;;12\n12;;\n15;0,5;\n20;;13\n25;0,5;14\n26;0,25;15\n31;0,25;16\n",
		points:  "0:10 1:12 1.5:13 2:14 2.25:15 2.5:16",
		repairs: []string{"line 2: 4 rows from here on without an increment, taken as no titrant", "line 5: 2 rows from here on without a reading, passed over"}}.check(t)
	if want := []float64{0, 9, 20, 25, 26, 31}; !slices.Equal(run.TimesS, want) {
		t.Errorf("times %v, want %v", run.TimesS, want)
	}
}

func TestStatusSaysWhatARowIs(t *testing.T) {
	schema := single("increment|dose|mL\npH|pH\nstatus|s|| values = { ok = \"reading\", late = \"timed-out\", wait = \"skip\" }\nremark|note")
	run := got{schema: schema, dump: "dose;pH;s;note\n0;3;ok;\n1;3,1;wait;stirrer on\n0;3,2;ok;\n1;3,3;late;\n1;3,4;ok;\n1;3,5;LATE;refill\n1;3,6;ok;\n",
		points: "0:3 1:3.2 2:3.3 3:3.4 4:3.5 5:3.6", repairs: []string{"line 5: 2 readings from here on had not come to rest, used as they are"}}.check(t)
	if want := []Remark{{3, "stirrer on"}, {7, "refill"}}; !slices.Equal(run.Remarks, want) {
		t.Errorf("remarks %v, want %v", run.Remarks, want)
	}
	got{schema: schema, dump: "dose;pH;s;note\n0;3;ok;\n1;3;new;\n", problem: `x.csv:3:5: status: "new" is not known; state in values of schema made what it means`}.check(t)
}

// A 20 mL burette filled twice: 20 + 20 + 3 mL.
func TestBurettesAreFilledAgain(t *testing.T) {
	schema := single("volume|V|mL|refills = true\npH|pH")
	got{schema: schema, dump: "V;pH\n0;3\n10,00;3\n20,00;3\n0,00;3\n12,55;4\n20,00;5\n3,00;6\n", points: "0:3 10:3 20:3 20:3 32.55:4 40:5 43:6",
		repairs: []string{"line 5: volume begins anew at 0 after 20, the burette was filled; it goes on from 20", "line 8: volume begins anew at 3 after 20, the burette was filled; it goes on from 40"}}.check(t)
}

// 1.02 g of a titrant of 1.02 g/mL is 1 mL; 4 mS in a cell of 0.5 /cm is 2 mS/cm.
func TestMassAndConductance(t *testing.T) {
	mass := single("volume|m|g\npH|pH", "facts = [{name=\"density_g_per_ml\", titles=\"rho\", unit=\"kg/m3\"}]")
	run := got{schema: mass, dump: "rho;1020\nm;pH\n0,00;3\n1,02;3\n2,04;3\n3,06;3\n4,08;3\n", points: "0:3 1:3 2:3 3:3 4:3"}.check(t)
	if run.VolumeStepML != 0.01/1.02 {
		t.Errorf("step %v mL, want 0.01 g / 1.02 g/mL", run.VolumeStepML)
	}
	got{schema: mass, dump: "m;pH\n0,00;3\n1,02;3\n2,04;3\n3,06;3\n4,08;3\n",
		problem: `x.csv:1: density_g_per_ml: the titrant is weighed and its density is not known; state it in the dump, or as a default in schema made`}.check(t)
	cell := single("volume|V|mL\nconductance|G|uS", "facts = [{name=\"cell_constant_per_cm\", titles=\"K\", unit=\"/m\", default=50}]")
	run = got{schema: cell, dump: "V;G\n0;4000\n1;3000\n2;2000\n3;3000\n4;4000\n", points: "0:2 1:1.5 2:1 3:1.5 4:2"}.check(t)
	if run.Signal != Conductivity || run.ReadingStep != 0.0005 {
		t.Errorf("%s, step %v; want conductivity, 0.0005", run.Signal, run.ReadingStep)
	}
	got{schema: cell, dump: "K;0,01\nV;G\n0;4000\n1;3000\n2;2000\n3;3000\n4;4000\n",
		problem: `x.csv:1:3: cell_constant_per_cm: 0.0001 /cm is outside 0.001 to 100 /cm; no conductivity cell has that; check unit and decimal mark`}.check(t)
	got{schema: strings.Replace(cell, ", default=50", "", 1), dump: "V;G\n0;4000\n1;3000\n2;2000\n3;3000\n4;4000\n",
		problem: `x.csv:1: cell_constant_per_cm: the readings are conductances and the cell constant is not known; state it in the dump, or as a default in schema made`}.check(t)
}

// Times as a clock shows them count from the first row, over midnight too.
func TestClockTimes(t *testing.T) {
	for _, c := range []struct {
		name, format string
		rows         []string
		want         []float64
		repair       string
	}{
		{"over midnight", "%H:%M:%S", []string{"23:59:50", "00:00:00", "00:00:05", "00:01:00", "00:02:00"}, []float64{0, 10, 15, 70, 130}, ""},
		{"minutes and seconds", "%M:%S", []string{"0:00", "0:30", "1:05", "59:59", "75:00"}, []float64{0, 30, 65, 3599, 4500}, ""},
		{"12 h", "%I:%M:%S %p", []string{"11:59:58 am", "12:00:00 pm", "12:59:59 pm", "1:00:00 pm", "1:00:07 PM"}, []float64{0, 2, 3601, 3602, 3609}, "line 4: time jumps by 3599 s, a pause or a clock that was set; kept as it is"},
		{"with a date", "%d.%m.%Y %H:%M:%S.%f", []string{"28.02.2031 23:59:59.5", "01.03.2031 00:00:00.0", "01.03.2031 00:00:01.0", "01.03.2031 00:00:02.0", "01.03.2031 00:00:04.25"}, []float64{0, 0.5, 1.5, 2.5, 4.75}, ""},
		{"clock put back", "%H:%M:%S", []string{"02:59:58", "02:59:59", "02:00:00", "02:00:01", "02:00:02"}, nil, "line 4: time: -3598 s after 1 s, time runs backwards; the column is not used"},
		{"no time", "%H:%M", []string{"08:14", "8.15", "08:16", "08:17", "08:18"}, nil, `line 3: time: "8.15" is no time of this form; the column is not used`},
		{"impossible", "%H:%M", []string{"08:14", "24:15", "08:16", "08:17", "08:18"}, nil, `line 3: time: "24:15" is a time that does not exist; the column is not used`},
	} {
		t.Run(c.name, func(t *testing.T) {
			dump := "t;V;pH\n"
			for i, row := range c.rows {
				dump += fmt.Sprintf("%s;%d;3\n", row, i)
			}
			var repairs []string
			if c.repair != "" {
				repairs = []string{c.repair}
			}
			run := got{schema: single("time|t||format = \"" + c.format + "\"\n" + ph), dump: dump, points: "0:3 1:3 2:3 3:3 4:3", repairs: repairs}.check(t)
			if !slices.Equal(run.TimesS, c.want) {
				t.Errorf("times %v, want %v", run.TimesS, c.want)
			}
		})
	}
}

func TestDriftIsKept(t *testing.T) {
	run := got{schema: single("volume|V|mL\npotential|E|mV\ndrift|d|mV/s"), dump: "V;E;d\n0;1;0,5\n1;2;-0,25\n2;3;0\n3;4;0\n4;5;0\n", points: "0:1 1:2 2:3 3:4 4:5"}.check(t)
	if want := []float64{30, -15, 0, 0, 0}; !slices.Equal(run.DriftsPerMin, want) { // 60 s a minute
		t.Errorf("drifts %v, want %v", run.DriftsPerMin, want)
	}
}

// Several header rows make one title each.
func TestHeaderRows(t *testing.T) {
	rows := "0;3\n1;3\n2;3\n3;3\n4;3\n"
	two := strings.Replace(single("volume|V in mL|mL\npH|pH"), "decimalChar", "headerRows = [1, 2]\nheaderJoin = \" in \"\ndecimalChar", 1)
	got{schema: two, dump: "V;pH\nmL;\n" + rows, points: "0:3 1:3 2:3 3:3 4:3"}.check(t)
	got{schema: two, dump: "V;pH;\nmL\n" + rows, points: "0:3 1:3 2:3 3:3 4:3", repairs: []string{"line 1: trailing delimiter dropped"}}.check(t)
	got{schema: two, dump: "V;pH\nL;\n" + rows, problem: `x.csv:1:1: schema: no schema fits; it begins with "V;pH" (tried made); export it as a schema expects, or write a schema for it`}.check(t)
	ruled := strings.Replace(two, "[1, 2]", "[1, 3]", 1)
	got{schema: ruled, dump: "V;pH\n-----\nmL;\n" + rows, points: "0:3 1:3 2:3 3:3 4:3"}.check(t)
}

func TestRepeatedHeaders(t *testing.T) {
	dump := "V;pH\n0;3\n1;3\nV;pH\n2;3\n3;3\n4;3\n"
	got{schema: single(ph, "repeatedHeader = true"), dump: dump, points: "0:3 1:3 2:3 3:3 4:3", repairs: []string{"line 4: the header again, passed over"}}.check(t)
	got{schema: single(ph), dump: dump, problem: `x.csv:4:1: volume: "V" is the header again, and 1 more place; two exports in one file? export each by itself`}.check(t)
}

func TestFooterLines(t *testing.T) {
	rows := "V;pH\n0;3\n1;3\n2;3\n3;3\n4;3\n"
	facts := "facts = [{name=\"sample\", titles=\"Sample\"}]\n"
	for _, c := range []struct{ name, footer, tail, sample, problem string }{
		{"cells", `footer = { begin = "End", lines = "cells" }`, "End\nSample;A;B\n\n", "A;B", ""},
		{"cells below a blank line", `footer = { blank = true, lines = "cells" }`, "\nSample;A\n", "A", ""},
		{"text", `footer = { begin = "End", lines = "text" }`, "End\nSample: A; B\n", "A; B", ""},
		{"unused", `footer = { begin = "End", lines = "unused" }`, "End\nSample;A\n\"\n1;2;3;4\n", "", ""},
		{"cut off", `footer = { begin = "End", lines = "unused" }`, "", "", `x.csv:6: no line below the rows begins with "End"; the dump is cut off; export it again`},
		{"damaged", `footer = { begin = "End", lines = "cells" }`, "End\nSample;\"A\n", "", `x.csv:8:1: "Sample;\"A" is no line of the footer; a line is damaged, or another table follows; export the dump again`},
	} {
		t.Run(c.name, func(t *testing.T) {
			g := got{schema: single(ph, facts, c.footer), dump: rows + c.tail, points: "0:3 1:3 2:3 3:3 4:3", problem: c.problem}
			if c.name == "cells" {
				g.repairs = []string{"line 8: the value holds the delimiter and was taken whole"}
			}
			if c.problem != "" {
				g.points = ""
			}
			if run := g.check(t); run.Facts.Sample != c.sample {
				t.Errorf("sample %q, want %q", run.Facts.Sample, c.sample)
			}
		})
	}
}

// Comments below the table are facts where the schema says so.
func TestFooterComments(t *testing.T) {
	schema := "name=\"c\"\nlayout=\"single\"\nrecognise.header=true\ndialect.commentChar=\"#\"\nfooter.lines=\"comments\"\nfacts=[{name=\"sample\",titles=\"s\"}]\n" + fieldsOf(ph)
	run := got{schema: schema, dump: "V,pH\n0,3\n1,3\n# s: A\n2,3\n3,3\n4,3\n", points: "0:3 1:3 2:3 3:3 4:3"}.check(t)
	if run.Facts.Sample != "A" {
		t.Errorf("sample %q", run.Facts.Sample)
	}
}

// Text lines hold delimiters and quotes.
func TestTextPreamble(t *testing.T) {
	schema := strings.Replace(single(ph, `facts = [{name="sample", titles="Sample"}, {name="operator", titles="By"}]`), `"cells"`, `"text", separator = "="`, 1)
	run := got{schema: schema, dump: "Report of the bench\nSample = A; \"B\nBy=Analyst 1;;\nV;pH\n0;3\n1;3\n2;3\n3;3\n4;3\n", points: "0:3 1:3 2:3 3:3 4:3",
		repairs: []string{`line 1: "Report of the bench" has no key and value, not used`, "line 3: trailing delimiter dropped"}}.check(t)
	if run.Facts.Sample != `A; "B` || run.Facts.Operator != "Analyst 1" {
		t.Errorf("facts %+v", run.Facts)
	}
}

// Runs parted by blank lines only.
func TestStackedByBlankLines(t *testing.T) {
	schema := strings.Replace(single(ph, `facts = [{name="sample", titles="S"}]`, "[stack]\nblank = true"), `"single"`, `"stacked"`, 1)
	one := "V;pH\n0;3\n1;3\n2;3\n3;3\n4;3\n"
	runs, _, problems := Read([]byte("S;A\n\n"+one+"\n\nS;B\n"+one+"\nS;C\n"), "x.csv", made(t, schema))
	if len(runs) != 2 || runs[0].Facts.Sample != "A" || runs[1].Facts.Sample != "B" || points(&runs[1]) != "0:3 1:3 2:3 3:3 4:3" {
		t.Errorf("runs %+v", runs)
	}
	want := `x.csv:19: run 3: no header row; schema made needs a header with "V" and "pH"`
	if len(problems) != 1 || problems[0].Error() != want {
		t.Errorf("\ngot  %v\nwant %s", problems, want)
	}
}

// A blank line too many within the rows parts nothing.
func TestBlankLineTooMany(t *testing.T) {
	rows := "V;pH\n0;3\n1;3\n2;3\n3;3\n4;3\n\n5;4\n6;5\n"
	for _, schema := range []string{
		single(ph, "footer = { blank = true, lines = \"cells\" }"),
		strings.Replace(single(ph, "stack = { blank = true }"), `"single"`, `"stacked"`, 1),
	} {
		got{schema: schema, dump: rows, points: "0:3 1:3 2:3 3:3 4:3 5:4 6:5", repairs: []string{"line 7: blank line in the table skipped"}}.check(t)
	}
}

// Numbers as a dump may write them, each only where the schema allows it.
func TestWrittenNumbers(t *testing.T) {
	schema := strings.Replace(single("volume|V|uL|suffixes = [\"uL\", \"µL\"]\npH|pH||bounds = true"), "decimalChar", "groupChar = \" \"\ndecimalChar", 1)
	got{schema: schema, dump: "V;pH\n0 uL;3\n1 000;3\n2\u202f000,5 µL;<3\n3\u00a0000uL;> 4\n4000;3\n", points: "0:3 1:3 2.0005:3 3:4 4:3",
		repairs: []string{`line 4: "<3" is a bound, taken as the number`, `line 5: "> 4" is a bound, taken as the number`}}.check(t)
	got{schema: schema, dump: "V;pH\n10 00;3\n", problem: `x.csv:2:1: volume: "10 00" is not a number; a plain decimal number is expected; the cell is damaged or the column is another one`}.check(t)
	got{schema: single(ph), dump: "V;pH\n0;<3\n", problem: `x.csv:2:3: pH: "<3" is a bound and no number; state bounds = true in the schema where the number itself may be taken`}.check(t)
}

func TestEscapedCharacters(t *testing.T) {
	schema := strings.Replace(single(ph, `facts = [{name="sample", titles="Sample"}]`), "decimalChar", "escapeChar = \"\\\\\"\ndecimalChar", 1)
	run := got{schema: schema, dump: "Sample;\"a\\\"b\"\nV;pH\n0;3\n1;3\n2;3\n3;3\n4;3\n", points: "0:3 1:3 2:3 3:3 4:3"}.check(t)
	if run.Facts.Sample != `a"b` {
		t.Errorf("sample %q", run.Facts.Sample)
	}
}
