package ingest

import (
	"fmt"
	"slices"
	"strings"
	"testing"

	"lastdrop/schemas"
)

// partly is a dump of several runs of which some are refused: the message
// begins after "x.csv:".
type partly struct {
	name     string
	dump     string // § marks the place of the first problem
	runs     []int  // numbers of the runs that are read
	problems []string
}

var stackedCases = []partly{
	{"all read", "bench B day log\r\n" + bRun(1) + "< curve\t5\r\n\r\n" + bRun(2) + "< curve\t5\r\n", []int{1, 2}, nil},
	{"count disagrees in the second of three", "bench B day log\r\n" + bRun(1) + "< curve\t5\r\n\r\n" + bRun(2) + "< curve\t6\r\n\r\n" + bRun(3) + "< curve\t5\r\n",
		[]int{1, 3}, []string{`19: run 2: readings: 5 rows where line 20 states "6"; the dump is cut off or damaged; export it again`}},
	{"cut off after a row", "bench B day log\r\n" + bRun(1) + "< curve\t5\r\n\r\n" + bRun(2),
		[]int{1}, []string{`19: run 2: the dump ends, and the run begun in line 12 has no "< curve"; the dump is cut off; export it again`}},
	{"cut off within the end row", "bench B day log\r\n" + bRun(1) + "< curve\t5\r\n\r\n" + bRun(2) + "< cur",
		[]int{1}, []string{`20: run 2: the dump ends, and the run begun in line 12 has no "< curve"; the dump is cut off; export it again`}},
	{"end row lacks its line end and states the count", "bench B day log\r\n" + bRun(1) + "< curve\t5", []int{1}, nil},
	{"end row lacks its count", "bench B day log\r\n" + bRun(1) + "< curve\r\n", nil,
		[]string{`9: run 1: readings: the dump does not state how many rows the run has; schema bench-b expects it; the line is lost: export the dump again`}},
	{"next run begins before the end", "bench B day log\r\n" + bRun(1) + bRun(2) + "< curve\t5\r\n",
		[]int{2}, []string{`10: run 1: the next run begins, and the run begun in line 2 has no "< curve"; the dump is cut off; export it again`}},
	{"begin row damaged", "bench B day log\r\n" + bRun(1) + "< curve\t5\r\n\r\n§>curve" + strings.TrimPrefix(bRun(2), "> curve") + "< curve\t5\r\n" + bRun(3) + "< curve\t5\r\n",
		[]int{1, 3}, []string{`@: run 2: ">curve\t2" stands outside any run; a run begins with "> curve"; its line may be damaged: export the dump again`}},
	{"begin row lost", "bench B day log\r\n" + bRun(1) + "< curve\t5\r\n§sample\tX\r\nno.\tV/mL\tpH\r\n< curve\t0\r\n",
		[]int{1}, []string{`@: run 2: "sample\tX" stands outside any run; a run begins with "> curve"; its line may be damaged: export the dump again`}},
	{"row lost", "bench B day log\r\n" + strings.Replace(bRun(1), "3\t10.000\t124.6\t41\r\n4", "§4", 1) + "< curve\t4\r\n", nil,
		[]string{`@: run 1: number: row 4 follows row 2; a row is missing, doubled or moved; export the dump again`}},
	{"first row lost", "bench B day log\r\n" + strings.Replace(bRun(1), "1\t0.000\t101.2\t0\r\n2", "§2", 1) + "< curve\t4\r\n", nil,
		[]string{`@: run 1: number: the first row has the number 2; rows before it are missing; export the dump again`}},
	{"row number is no number", "bench B day log\r\n" + strings.Replace(bRun(1), "1\t0.000", "§i\t0.000", 1) + "< curve\t5\r\n", nil,
		[]string{`@: run 1: number: "i" is not a number; this column counts the rows; the line is damaged`}},
	{"set point in another quantity", "bench B day log\r\n" + strings.Replace(bRun(1), "no.", "set point\t§8.1O\r\nno.", 1) + "< curve\t5\r\n", nil,
		[]string{`@: run 1: end_reading: "8.1O" is not a number; a plain decimal number is expected; the cell is damaged or the column is another one`}},
	{"nothing but the first line", "bench B day log\r\n", nil, []string{`1: no run in the dump; a run begins with "> curve"; export it again`}},
}

func TestStackedRuns(t *testing.T) {
	for _, c := range stackedCases {
		t.Run(c.name, func(t *testing.T) { c.check(t, asUTF16, []byte("\xff\xfe")) })
	}
}

func footed(parts ...string) string { return cHead + strings.Join(parts, "") }

var longCases = []partly{
	{"all read", footed(cRun("C1"), cRun("C2"), "totals\ntotal,C1,5,1500"+cTotal, "total,C2,5,"+cTotal), []int{1, 2}, nil},
	{"rows of two runs in turn", footed("C1,0,0,0,4,22\nC2,0,0,0,5,22\nC1,1,0,10,4,22\nC2,1,0,10,5,22\nC1,2,0,20,4,22\nC2,2,0,20,5,22\nC1,3,0,30,4,22\nC2,3,0,30,5,22\nC2,4,0,40,5,22\nC1,4,0,40,4,22\n",
		"totals\ntotal,C1,5,"+cTotal, "total,C2,5,"+cTotal), []int{1, 2}, nil},
	{"count disagrees in one", footed(cRun("C1"), cRun("C2"), "totals\ntotal,C1,5,"+cTotal, "total,C2,6,"+cTotal), []int{1},
		[]string{`12: run 2: readings: 5 rows where line 15 states "6"; the dump is cut off or damaged; export it again`}},
	{"footer row missing", footed(cRun("C1"), cRun("C2"), "totals\ntotal,C2,5,"+cTotal), []int{2},
		[]string{`14: run 1: the dump ends without the footer row of run "C1"; the dump is cut off; export it again`}},
	{"cut off in the table", footed(cRun("C1"), cRun("C2")), nil,
		[]string{`12: run 1: the dump ends without the footer row of run "C1"; the dump is cut off; export it again`,
			`12: run 2: the dump ends without the footer row of run "C2"; the dump is cut off; export it again`}},
	{"footer row without line end", footed(cRun("C1"), cRun("C2"), "totals\ntotal,C1,5,"+cTotal, "total,C2,5,"+strings.TrimSuffix(cTotal, "\n")+"§"), []int{1},
		[]string{`@: run 2: the footer row has no line end and may be cut off; export the dump again`}},
	{"second footer row of a run", footed(cRun("C1"), "totals\ntotal,C1,5,"+cTotal, "§total,C1,5,"+cTotal), nil,
		[]string{`@: run 1: a second footer row of run "C1"; the line is doubled; export the dump again`}},
	{"footer row of a run without rows", footed(cRun("C1"), "totals\ntotal,C1,5,"+cTotal, "§total,C9,5,"+cTotal), []int{1},
		[]string{`@: run 2: run: a footer row of run "C9", which has no row in the table; rows are missing or the line is damaged; export the dump again`}},
	{"footer row with a cell too few", footed(cRun("C1"), cRun("C2"), "totals\ntotal,C1,5,"+cTotal, "total,C2,5"+strings.TrimSuffix(cTotal, "\n")+"§\n"), []int{1},
		[]string{`@: run 2: 12 cells in a footer row, schema bench-c has 13; the line is damaged; export the dump again`}},
	{"row that is no footer row", footed(cRun("C1"), "totals\ntotal,C1,5,"+cTotal, "§sum,1\n"), nil,
		[]string{`@: run 1: "sum,1" is no footer row; a line is damaged or broken in two, or another table follows; export the dump again`}},
	{"no footer row at all", footed(cRun("C1"), "totals\n§sum,1\n"), nil,
		[]string{`9: run 1: the dump ends without the footer row of run "C1"; the dump is cut off; export it again`,
			`@: run 2: "sum,1" is no footer row; a line is damaged or broken in two, or another table follows; export the dump again`}},
	{"row broken in two", footed(cRun("C1"), strings.Replace(cRun("C2"), "3900.5,22.4", "3900.5,22\n4§", 1), "totals\ntotal,C1,5,"+cTotal, "total,C2,5,"+cTotal), []int{1},
		[]string{`@: run 2: 1 cell where the header in line 2 has 6; the line is damaged; export the dump again`}},
	{"bad cell in one run", footed(cRun("C1"), strings.Replace(cRun("C2"), "3900.5", "§39OO.5", 1), "totals\ntotal,C1,5,"+cTotal, "total,C2,5,"+cTotal), []int{1},
		[]string{`@: run 2: conductivity: "39OO.5" is not a number; a plain decimal number is expected; the cell is damaged or the column is another one`}},
	{"run name damaged in one row", footed(cRun("C1"), strings.Replace(cRun("C2"), "C2,2", "CZ,2", 1), "totals\ntotal,C1,5,"+cTotal, "total,C2,5,"+cTotal), []int{1},
		[]string{`11:4: run 2: number: row 3 follows row 1; a row is missing, doubled or moved; export the dump again`,
			`10:4: run 3: number: the first row has the number 2; rows before it are missing; export the dump again`}},
	{"run name empty", footed(cRun("C1"), "§,0,0,0,4,22\n", "totals\ntotal,C1,5,"+cTotal), []int{1},
		[]string{`@: run 2: run: the cell that names the run is empty; the line is damaged; export the dump again`}},
	{"header without the run", "bench C shift table\n§runn,step,delivered_uL,cond_uS_per_cm\nC1,0,0,4\n", nil,
		[]string{`@: run: no such column in the header (has "runn", "step", "delivered_uL", "cond_uS_per_cm"); schema bench-c needs a header with "delivered_uL" and "cond_uS_per_cm" and "run"`}},
	{"no header", "bench C shift table\n§C1,0,0,4\n", nil,
		[]string{`@: "C1,0,0,4" is neither a fact nor the header; schema bench-c needs a header with "delivered_uL" and "cond_uS_per_cm" and "run"`}},
	{"no rows", cHead, nil, []string{`2: no row below the header; the dump is cut off; export it again`}},
	{"first line only", "bench C shift table\n", nil, []string{`1: no header row; schema bench-c needs a header with "delivered_uL" and "cond_uS_per_cm" and "run"`}},
}

func TestLongRuns(t *testing.T) {
	for _, c := range longCases {
		t.Run(c.name, func(t *testing.T) { c.check(t, asUTF8, nil) })
	}
}

func (c partly) check(t *testing.T, encode func(string) []byte, mark []byte) {
	text, place := marked(t, c.dump, encode)
	runs, _, problems := Read(append(slices.Clone(mark), encode(text)...), "x.csv", schemas.Shipped())
	var numbers []int
	for i := range runs {
		numbers = append(numbers, runs[i].Number)
		if len(runs[i].Readings) != 5 {
			t.Errorf("run %d has %d readings, want 5", runs[i].Number, len(runs[i].Readings))
		}
	}
	if !slices.Equal(numbers, c.runs) {
		t.Errorf("runs %v, want %v", numbers, c.runs)
	}
	for i, p := range problems {
		want := "none"
		if i < len(c.problems) {
			want = "x.csv:" + strings.Replace(c.problems[i], "@", place, 1)
		}
		if p.Error() != want {
			t.Errorf("\ngot  %s\nwant %s", p, want)
		}
	}
	if len(problems) < len(c.problems) {
		t.Errorf("%d problems, want %d", len(problems), len(c.problems))
	}
}

// Runs whose rows stand in turn keep their own readings.
func TestRowsInTurnGoToTheirRuns(t *testing.T) {
	runs, _, problems := Read([]byte(longCases[1].dump), "x.csv", schemas.Shipped())
	if len(problems) > 0 || len(runs) != 2 {
		t.Fatal(problems)
	}
	// Run C1 has 4 µS/cm = 0.004 mS/cm throughout, C2 has 5; volumes go up by 10 µL.
	for i, want := range []float64{0.004, 0.005} {
		for j, r := range runs[i].Readings {
			if r.Value != want || r.VolumeML != float64(j)/100 || runs[i].TemperaturesC[j] != 22 {
				t.Errorf("run %d reading %d: %+v, %v °C", i+1, j, r, runs[i].TemperaturesC[j])
			}
		}
	}
	lines := fmt.Sprint(runs[0].Readings[4].Line, runs[1].Readings[4].Line)
	if lines != "12 11" {
		t.Errorf("lines of the last readings: %s, want 12 11", lines)
	}
}

// A run whose rows stand in turn with others keeps its times; blank lines and
// comments in a long table are told.
func TestLongTableOfAnotherSchema(t *testing.T) {
	s, err := schemas.Parse("l.toml", []byte(`name = "l"
layout = "long"
dialect.commentChar = "#"
recognise.header = true
preamble.lines = "comments"
fields = [{name="run",titles="r"},{name="volume",titles="V",unit="mL"},{name="pH",titles="pH"},{name="time",titles="t",unit="s"}]
facts = [{name="operator",titles="who"}]
`))
	if err != nil {
		t.Fatal(err)
	}
	dump := "# who: Analyst 4\nr,V,pH,t\n"
	for i := range 5 {
		dump += fmt.Sprintf("a,%d,3,%d\n# x\nb,%d,4,%d\n", i, 10*i, i, 100-i)
	}
	runs, _, problems := Read([]byte(dump+"\n\na,6,3,99\n"), "x.csv", []*schemas.Schema{s})
	if len(problems) > 0 || len(runs) != 2 {
		t.Fatal(problems)
	}
	a, b := runs[0], runs[1]
	if !slices.Equal(a.TimesS, []float64{0, 10, 20, 30, 40, 99}) || a.Facts.Operator != "Analyst 4" || b.Facts.Operator != "Analyst 4" || len(b.Readings) != 5 {
		t.Errorf("times %v, facts %+v and %+v", a.TimesS, a.Facts, b.Facts)
	}
	if len(a.Repairs) != 6 || a.Repairs[0] != "line 4: comment below the header not used" || a.Repairs[5] != "lines 18 to 19: blank line in the table skipped" {
		t.Errorf("repairs %q", a.Repairs)
	}
	if want := "line 8: time: 99 s after 100 s, time runs backwards; the column is not used"; b.TimesS != nil || !slices.Equal(b.Repairs, []string{want}) {
		t.Errorf("times %v, repairs %q", b.TimesS, b.Repairs)
	}
}

// An appended slice of one run must not write into the next one's readings.
func TestRunsShareNoRoom(t *testing.T) {
	runs, _, _ := Read([]byte(longCases[0].dump), "x.csv", schemas.Shipped())
	_ = append(runs[0].Readings, Reading{VolumeML: 99})
	if runs[1].Readings[0].VolumeML != 0 {
		t.Error("appending to run 1 changed run 2")
	}
}

// What stands behind a mark is a fact when it is one cell, and told when it is
// more: a line end may be lost.
func TestCellsBehindMarks(t *testing.T) {
	schema := "name=\"s\"\nlayout=\"stacked\"\nrecognise.header=true\npreamble.lines=\"cells\"\nstack={begin=\"Run\",end=\"End\"}\nfacts=[{name=\"sample\",titles=\"Run\"},{name=\"readings\",titles=\"End\"}]\n" + fieldsOf(ph)
	run := got{schema: schema, dump: "Run,A\nV,pH\n0,3\n1,3\n2,3\n3,3\n4,3\nEnd,5\n", points: "0:3 1:3 2:3 3:3 4:3"}.check(t)
	if run.Facts.Sample != "A" {
		t.Errorf("sample %q, want A", run.Facts.Sample)
	}
	got{schema: schema, dump: "Run,A,Operator,B\nV,pH\n0,3\n1,3\n2,3\n3,3\n4,3\nEnd,5,Run,B\n", points: "0:3 1:3 2:3 3:3 4:3",
		repairs: []string{`line 1: "Operator,B" behind "Run" not used`, `line 8: "Run,B" behind "End" not used`}}.check(t)
}
