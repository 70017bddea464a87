package ingest

import (
	"fmt"
	"slices"
	"strings"
	"testing"
)

// wideSchema reads a wide table with decimal commas.
func wideSchema(fields string, more ...string) string {
	return strings.Replace(single(fields, more...), `"single"`, `"wide"`, 1)
}

const (
	wideFields = "volume|V|mL\npH|pH\ntemperature|T|Cel"
	wideNames  = "wide.titles = [\"Sample\", \"Start\"]\nfacts = [{name=\"sample\", titles=\"Sample\"}, {name=\"operator\", titles=\"By\"}, {name=\"started\", titles=\"Start\"}]"
)

// wideListing is every run and problem in one line each.
func wideListing(dump, schema string, t *testing.T) string {
	t.Helper()
	runs, _, problems := Read([]byte(dump), "x.csv", made(t, schema))
	var lines []string
	for i := range runs {
		r := &runs[i]
		lines = append(lines, fmt.Sprintf("%d %s %s %s|%s|%v%s", r.Number, r.Facts.Sample, r.Facts.Operator, r.Facts.Started, points(r), r.TemperaturesC, strings.Join(append([]string{""}, r.Repairs...), "|")))
	}
	for _, p := range problems {
		lines = append(lines, p.Error())
	}
	return strings.Join(lines, "\n")
}

func TestWideRuns(t *testing.T) {
	head := "By;Analyst 1;;;;\nA;;;B;\n2031-04-02T08:14;;;2031-04-02T09:00;\nV;pH;T;V;pH\n"
	rows := "0;3;22;0;5\n1;3,1;22;1;5\n2;3,2;22;2;5\n3;3,3;22;3;5\n4;3,4;22;4;5\n"
	a := "1 A Analyst 1 2031-04-02T08:14:00|0:3 1:3.1 2:3.2 3:3.3 4:3.4|[22 22 22 22 22]"
	b := "2 B Analyst 1 2031-04-02T09:00:00|0:5 1:5 2:5 3:5 4:5|[]"
	// The preamble row of head has delimiters behind it.
	dropped := "|line 1: trailing delimiter dropped"
	for _, c := range []struct{ name, dump, want string }{
		{"two runs", head + rows, a + dropped + "\n" + b + dropped},
		{"the second is longer", head + rows + ";;;5;6\n;;;6;6,5\n", a + dropped + "\n" + strings.Replace(b, "4:5", "4:5 5:6 6:6.5", 1) + dropped},
		{"goes on below its end", head + rows + ";;;5;6\n5;3;22;6;6\n", b[:len(b)-3] + " 5:6 6:6|[]" + dropped + "\nx.csv:11:1: run 1: the run goes on below line 10, where its columns are empty; a row is damaged; export the dump again"},
		{"a cell too many", head + rows + "5;3,5;22;5;6;7\n", "x.csv:10:14: run 1: 6 cells where the header in line 4 has 5; the line is damaged; export the dump again\nx.csv:10:14: run 2: 6 cells where the header in line 4 has 5; the line is damaged; export the dump again"},
		{"a bad cell in one", head + strings.Replace(rows, "3,2", "3.2", 1), b + dropped + "\n" + `x.csv:7:3: run 1: pH: "3.2" is not a number; other numbers of the run have the decimal mark ","; export the dump again`},
		{"two names above one run", strings.Replace(head, "A;;;B;", "A;C;;B;", 1) + rows, b + dropped + "\n" + `x.csv:2:3: run 1: "C" beside "A" above one run; one cell may name a run; the line is damaged: export the dump again`},
		{"cut off", head + rows + "5;3,5;22;5", a + dropped + "|line 10: last row without line end dropped\n" + b + dropped + "|line 10: last row without line end dropped"},
		{"a cell lost above", strings.Replace(head, "A;;;B;", "A;;B;", 1) + rows, "x.csv:2:6: 4 cells above a header of 5; the line is damaged; export the dump again"},
		{"a quote above", strings.Replace(head, "A;;;B;", "A;;;\"B;", 1) + rows, "x.csv:2:5: a quote that is not closed on its line; the line is damaged; export the dump again"},
		{"blank line and unknown column", "By;Analyst 1;;;;\nA;;;B;;\n2031-04-02T08:14;;;2031-04-02T09:00;;\nV;pH;T;V;pH;x\n" + strings.ReplaceAll(strings.Replace(rows, "1;3,1", "\n1;3,1", 1), ";5\n", ";5;1\n"),
			a + dropped + "|line 4: column \"x\" not used|line 6: blank line in the table skipped\n" + b + dropped + "|line 4: column \"x\" not used|line 6: blank line in the table skipped"},
		{"no header", "By;Analyst 1\n" + rows, `x.csv:1:1: schema: no schema fits; it begins with "By;Analyst 1" (tried made); export it as a schema expects, or write a schema for it`},
		{"a run without a reading", strings.Replace(head, "V;pH\n", "V;E\n", 1) + rows, a + dropped + "|line 4: column \"E\" not used\n" + `x.csv:4:1: run 2: reading: no such column in the header (has "V", "pH", "T", "V", "E"); schema made needs a header with "V" and "pH"`},
	} {
		t.Run(c.name, func(t *testing.T) {
			if got := wideListing(c.dump, wideSchema(wideFields, wideNames), t); got != c.want {
				t.Errorf("\ngot  %s\nwant %s", got, c.want)
			}
		})
	}
}

// Columns with numbers, and a volume and a time that all runs share.
func TestWideSharedColumns(t *testing.T) {
	schema := wideSchema("time|t|s|shared = true\nvolume|V|mL|shared = true\npH|pH {n}\ntemperature|T{n}|Cel\nunused|x")
	dump := "t;V;PH 1;T1;x;pH 12;T12\n0;0;3;22;;5;20\n5;1;3;22;;5;20\n9;2;3;22;;5;20\n12;3;3;22;;5;20\n20;4;3;22;;5;20\n21;5;;;;6;21\n"
	runs, _, problems := Read([]byte(dump), "x.csv", made(t, schema))
	if len(problems) > 0 || len(runs) != 2 {
		t.Fatal(problems)
	}
	if points(&runs[0]) != "0:3 1:3 2:3 3:3 4:3" || points(&runs[1]) != "0:5 1:5 2:5 3:5 4:5 5:6" || !slices.Equal(runs[1].TimesS, []float64{0, 5, 9, 12, 20, 21}) || runs[1].TemperaturesC[5] != 21 {
		t.Errorf("%s %v\n%s %v %v", points(&runs[0]), runs[0].TimesS, points(&runs[1]), runs[1].TimesS, runs[1].TemperaturesC)
	}
}

func TestTooManyWideRuns(t *testing.T) {
	dump := strings.Repeat("V;pH;", maxWideRuns) + "V;pH\n" + strings.Repeat("0;3;", maxWideRuns) + "0;3\n"
	_, _, problems := Read([]byte(dump), "x.csv", made(t, wideSchema(wideFields)))
	if want := "x.csv:1:1: 1001 runs in one table; at most 1000 are read"; len(problems) != 1 || problems[0].Error() != want {
		t.Errorf("\ngot  %v\nwant %s", problems, want)
	}
}

// Facts in a column, in the file's name and in its folder's.
func TestFactsOfColumnsAndNames(t *testing.T) {
	schema := single("volume|V|mL\npH|pH", `facts = [
  { name = "sample", titles = "S", columns = ["Sample"], file = "run-{}_*.csv" },
  { name = "instrument", folder = "bench {}", values = { "a" = "Bench A" } },
  { name = "aliquot_ml", unit = "mL", file = "*_{}mL.csv" },
]`)
	set := made(t, schema)
	rows := "V;pH\n0;3\n1;3\n2;3\n3;3\n4;3\n"
	with := "V;Sample;pH\n0;X;3\n1;X;3\n2;;3\n3;X;3\n4;X;3\n"
	for _, c := range []struct{ name, path, dump, sample, instrument, aliquot, repair, problem string }{
		{"names", "in/Bench A/RUN-VIN-7_2,5mL.csv", rows, "VIN-7", "Bench A", "2.5", "", ""},
		{"other names", "VIN-7.csv", rows, "", "", "", "", ""},
		{"names of Windows", `in\bench b\run-1_x.csv`, rows, "1", "b", "", "", ""},
		{"column before name", "run-1_x.csv", with, "X", "", "", "", ""},
		{"column that changes", "run-1_x.csv", strings.Replace(with, "4;X", "4;Y", 1), "", "", "", "", `run-1_x.csv:6:3: sample: "Y" here, "X" in line 2; a fact may be stated once; export the dump again`},
		{"no number", "run-1_tenmL.csv", rows, "", "", "", "", `run-1_tenmL.csv: aliquot_ml: "ten" is not a number; a plain decimal number is expected; the cell is damaged or the column is another one`},
		{"preamble and column agree", "x.csv", "S;X\n" + with, "X", "", "", "line 3: sample stated again", ""},
		{"control character", "run-a\x01_x.csv", rows, "a\ufffd", "", "", "file name: sample: characters that cannot be shown replaced", ""},
	} {
		t.Run(c.name, func(t *testing.T) {
			runs, _, problems := Read([]byte(c.dump), c.path, set)
			if c.problem != "" {
				if len(problems) != 1 || problems[0].Error() != c.problem {
					t.Errorf("\ngot  %v\nwant %s", problems, c.problem)
				}
				return
			}
			if len(problems) > 0 {
				t.Fatal(problems)
			}
			f := runs[0].Facts
			if f.Sample != c.sample || f.Instrument != c.instrument || number(f.AliquotML) != c.aliquot || strings.Join(runs[0].Repairs, "|") != c.repair {
				t.Errorf("facts %+v, aliquot %s, repairs %q", f, number(f.AliquotML), runs[0].Repairs)
			}
		})
	}
}

// A local time of a named zone: 28 March 2032 is a day without the time from 2
// to 3 in Berlin, 31 October 2032 one that has it twice. Source: Directive
// 2000/84/EC (last Sunday of March and October, 01:00 UTC).
func TestTimesOfNamedZones(t *testing.T) {
	schema := single(ph, `facts = [{name="started", titles="at", format="%d.%m.%Y %H:%M", zone="Europe/Berlin"}]`)
	for _, c := range []struct{ at, want, repair string }{
		{"28.03.2032 01:59", "2032-03-28T01:59:00+01:00", ""},
		{"28.03.2032 02:30", "", `line 1: started: "28.03.2032 02:30" is a time that the clocks of Europe/Berlin left out; the fact is not used`},
		{"28.03.2032 03:00", "2032-03-28T03:00:00+02:00", ""},
		{"31.10.2032 01:59", "2032-10-31T01:59:00+02:00", ""},
		{"31.10.2032 02:00", "", `line 1: started: "31.10.2032 02:00" is a time that the clocks of Europe/Berlin showed twice; the fact is not used`},
		{"31.10.2032 02:59", "", `line 1: started: "31.10.2032 02:59" is a time that the clocks of Europe/Berlin showed twice; the fact is not used`},
		{"31.10.2032 03:00", "2032-10-31T03:00:00+01:00", ""},
		{"31.04.2032 03:00", "", `line 1: started: "31.04.2032 03:00" is a date or time that does not exist; the fact is not used`},
	} {
		run := readOne(t, []byte("at;"+c.at+"\nV;pH\n0;3\n1;3\n2;3\n3;3\n4;3\n"), made(t, schema))
		if run.Facts.Started != c.want || strings.Join(run.Repairs, "|") != c.repair {
			t.Errorf("%s: %q, repairs %q; want %q, %q", c.at, run.Facts.Started, run.Repairs, c.want, c.repair)
		}
	}
}

// Two versions of a schema: the second calls the columns the same and has the
// volume in another unit.
func TestVersionsByTheDay(t *testing.T) {
	old := single(ph, `facts = [{name="started", titles="at"}]`)
	newer := "valid_from = 2031-07-01\n" + strings.Replace(old, `"mL"`, `"uL"`, 1)
	set := made(t, old, newer)
	rows := "V;pH\n0;3\n1;3\n2;3\n3;3\n4;3\n"
	for _, c := range []struct{ at, points, problem string }{
		{"at;2031-06-30T23:59\n", "0:3 1:3 2:3 3:3 4:3", ""},
		{"at;2031-07-01T00:00\n", "0:3 0.001:3 0.002:3 0.003:3 0.004:3", ""},
		{"", "", "x.csv:1:1: schema: which version of schema made holds cannot be told (always and from 2031-07-01); every run of the dump must state when it was started, and all in the time of one version"},
	} {
		runs, schema, problems := Read([]byte(c.at+rows), "x.csv", set)
		switch {
		case c.problem != "":
			if len(problems) != 1 || problems[0].Error() != c.problem || schema != nil {
				t.Errorf("\ngot  %v\nwant %s", problems, c.problem)
			}
		case len(runs) != 1 || points(&runs[0]) != c.points || schema == nil:
			t.Errorf("%s: %+v, %v", c.at, runs, problems)
		}
	}
	_, _, problems := Read([]byte("at;2031-06-30T23:59\n"+rows), "x.csv", set[1:])
	if want := "x.csv:1: started: 2031-06-30T23:59:00, before schema made holds (from 2031-07-01); add the version of the schema for that time"; len(problems) != 1 || problems[0].Error() != want {
		t.Errorf("\ngot  %v\nwant %s", problems, want)
	}
}

// Endpoints by number and results of the instrument.
func TestNumberedEndpointsAndResults(t *testing.T) {
	schema := single(ph, `
indicated = [{ titles = "EP{n}", unit = "mL", suffixes = "mL", kindTitles = "Kind{n}", kindValues = { steep = "inflection", set = "at-reading" } }]
results = [{ titles = ["acid", "Acid 2"], unit = "g/L" }, { titles = "rest", unit = "%", suffixes = "%" }]`)
	run := readOne(t, []byte("EP1;1,50 mL\nEP2;3,1\nKind2;set\nacid;7,25\nrest;4 %\nV;pH\n0;3\n1;3\n2;3\n3;3\n4;3\n"), made(t, schema))
	if want := []Indicated{{"inflection", 1.5, 0.01, 1}, {"at-reading", 3.1, 0.1, 2}}; !slices.Equal(run.Indicated, want) {
		t.Errorf("%+v, want %+v", run.Indicated, want)
	}
	if want := []Result{{"acid", 7.25, "7,25", "g/L", 4}, {"rest", 4, "4 %", "%", 5}}; !slices.Equal(run.Results, want) || run.Repairs != nil {
		t.Errorf("%+v, want %+v; repairs %q", run.Results, want, run.Repairs)
	}
	run = readOne(t, []byte("acid;high\nV;pH\n0;3\n1;3\n2;3\n3;3\n4;3\n"), made(t, schema))
	if want := []string{`line 1: result: "high" is not a number; it is not used`}; run.Results != nil || !slices.Equal(run.Repairs, want) {
		t.Errorf("%+v, repairs %q", run.Results, run.Repairs)
	}
}

// A schema with more evidence wins by two points or not at all.
func TestSchemasCompete(t *testing.T) {
	plain := single(ph)
	lines := strings.Replace(strings.Replace(plain, `"made"`, `"lines"`, 1), "recognise.header = true", `recognise = { header = true, lines = ["Bench"] }`, 1)
	absent := strings.Replace(strings.Replace(plain, `"made"`, `"absent"`, 1), "recognise.header = true", `recognise = { header = true, absent = ["Sample"] }`, 1)
	begins := strings.Replace(strings.Replace(plain, `"made"`, `"begins"`, 1), "recognise.header = true", `recognise = { firstLineBegins = "Bench E" }`, 1)
	rows := "V;pH\n0;3\n1;3\n2;3\n3;3\n4;3\n"
	for _, c := range []struct {
		name, dump string
		set        []string
		want       string
	}{
		{"three points to one", "Bench;E\n" + rows, []string{plain, lines}, "lines"},
		{"the line is not there", "Banch;E\n" + rows, []string{plain, lines}, "made"},
		{"two points to one", rows, []string{plain, absent}, "x.csv:1:1: schema: the schemas absent (2 points) and made (1 point) both fit; one must lead by 2: state firstLine or lines in [recognise] of the right one"},
		{"a line that must not be there", "Sample;A\n" + rows, []string{plain, absent}, "made"},
		{"equal", "Bench E;2\n" + rows, []string{begins, lines}, "x.csv:1:1: schema: the schemas begins (3 points) and lines (3 points) both fit; one must lead by 2: state firstLine or lines in [recognise] of the right one"},
		{"first line begins", "Bench E;2\n" + rows, []string{begins, plain}, "begins"},
	} {
		t.Run(c.name, func(t *testing.T) {
			_, schema, problems := Read([]byte(c.dump), "x.csv", made(t, c.set...))
			got := fmt.Sprint(problems)
			if schema != nil {
				got = schema.Name
			} else if len(problems) == 1 {
				got = problems[0].Error()
			}
			if got != c.want {
				t.Errorf("\ngot  %s\nwant %s", got, c.want)
			}
		})
	}
}

// Whatever the bytes, the wide layout keeps its promises too.
func FuzzWide(f *testing.F) {
	f.Add([]byte("A;;;B;\n2031;;;x;\nV;pH;T;V;pH\n0;3;22;0;5\n;;;5;6\n"))
	set := made(f, wideSchema(wideFields, wideNames), single("time|t||format = \"%H:%M\"\nincrement|dose|g|empty = \"same\"\nconductance|G|uS|empty = \"skip\"", "footer = { blank = true, lines = \"cells\" }",
		`facts = [{name="density_g_per_ml", titles="rho", unit="kg/m3", default=1000},{name="cell_constant_per_cm", titles="K", unit="/m", default=50}]`))
	f.Fuzz(func(t *testing.T, data []byte) {
		runs, schema, problems := Read(data, "x.csv", set)
		if len(runs) == 0 && len(problems) == 0 {
			t.Fatal("neither runs nor problems")
		}
		for i := range runs {
			checkRun(t, &runs[i], lineCount(data))
		}
		for _, p := range problems {
			if p.Line < 0 || p.Line > lineCount(data) || p.Col < 0 || p.Col > longestLine(data)+1 {
				t.Fatalf("place outside the dump: %v", p)
			}
		}
		if schema != nil && len(data) < 1<<12 {
			Explain(data, "x.csv", schema)
		}
	})
}
