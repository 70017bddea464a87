package ingest

import (
	"fmt"
	"slices"
	"strings"
	"testing"

	"lastdrop/schemas"
)

// readOne reads a dump that must have one run and no problem.
func readOne(t *testing.T, data []byte, set []*schemas.Schema) Run {
	t.Helper()
	runs, _, problems := Read(data, "x.csv", set)
	if len(problems) > 0 || len(runs) != 1 {
		t.Fatalf("%d runs, problems %v", len(runs), problems)
	}
	return runs[0]
}

// Whatever is changed to read a run is listed; nothing else is.
func TestRepairsAreListed(t *testing.T) {
	rows := plainRows + "2.000,3.72\n"
	for _, c := range []struct {
		name, dump string
		want       []string
	}{
		{"none", plainHead + rows, nil},
		{"trailing delimiters", strings.ReplaceAll(plainHead+rows, "\n", ",\n"), []string{"lines 1 to 8: trailing delimiter dropped"}},
		{"trailing delimiter in two places", plainHead + "0,3,\n1,3\n2,3\n3,3,,\n4,3\n", []string{"line 4: trailing delimiter dropped", "line 7: trailing delimiter dropped"}},
		{"blank lines in the table", plainHead + "0,3\n\n1,3\n,\n \n2,3\n3,3\n4,3\n", []string{"line 5: blank line in the table skipped", "lines 7 to 8: blank line in the table skipped"}},
		{"blank lines around the table", "\n" + strings.Replace(plainHead, "volume", "\n\nvolume", 1) + rows + "\n\n", nil},
		{"last row without line end", plainHead + rows + "2.5,3.9", []string{"line 9: last row without line end dropped"}},
		{"cut off in the middle of a character", plainHead + rows + "2.5,3.9\xe2\x88", []string{"line 8: the dump ends within a character and is cut off", "line 9: last row without line end dropped"}},
		{"column not known", strings.Replace(plainHead, "pH", "pH,\"stir\"\"rer\"", 1) + strings.ReplaceAll(rows, "\n", ",on\n"), []string{`line 3: column "stir\"rer" not used`}},
		{"comment below the header", plainHead + rows + "# sample: other\n", []string{"line 9: comment below the header not used"}},
		{"fact stated again", "# sample: HCL-0051\n" + plainHead + rows, []string{"line 2: sample stated again"}},
		{"impossible date", "# started: 2031-02-30T08:14\n" + plainHead + rows, []string{`line 1: started: "2031-02-30T08:14" is a date or time that does not exist; the fact is not used`}},
		{"no date", "# started: yesterday\n" + plainHead + rows, []string{`line 1: started: "yesterday" is no date and time of this form; the fact is not used`}},
		{"temperature", "# temperature_c: 22,4\n" + plainHead + rows, []string{`line 1: temperature_c: "22,4" is not a number; the fact is not used`}},
		{"temperature impossible", "# temperature_c: 295.5\n" + plainHead + rows, []string{`line 1: temperature_c: 295.5 °C is outside -20 to 150 °C; the fact is not used`}},
		{"reaction", "# reaction: acidbase\n" + plainHead + rows, []string{`line 1: reaction: "acidbase" is not known; the fact is not used`}},
		{"control characters", "# operator: A\x1b[31mB\u202e\n" + plainHead + rows, []string{"line 1: operator: characters that cannot be shown replaced"}},
		{"long text", "# operator: " + strings.Repeat("ä", 201) + "\n" + plainHead + rows, []string{"line 1: operator: cut to 200 characters"}},
		{"misspelt key", "# titrand: NaOH\n# solvent: 4\n" + plainHead + rows, []string{`line 1: "titrand" is nearly "titrant", kept as it is`}},
		{"no separator", "# aliquot_ml = 10\n# a remark\n# aliquot_mlx\n" + strings.Replace(plainHead, "aliquot", "# aliquot", 1) + rows, []string{`line 1: no ":" behind "aliquot_ml", the fact is not used`, `line 2: "a remark" has no key and value, not used`, `line 3: "aliquot_mlx" has no key and value, not used`, `line 5: "# aliquot_ml" is nearly "aliquot_ml", kept as it is`}},
		{"kind without endpoint", "# indicated_kind: break\n" + plainHead + rows, []string{"line 1: the kind of an indicated endpoint that is not stated"}},
	} {
		t.Run(c.name, func(t *testing.T) {
			run := readOne(t, []byte(c.dump), schemas.Shipped())
			if !slices.Equal(run.Repairs, c.want) {
				t.Errorf("\ngot  %q\nwant %q", run.Repairs, c.want)
			}
			if len(run.Readings) != 5 {
				t.Errorf("%d readings, want 5", len(run.Readings))
			}
		})
	}
}

// In lines of key;value every key is expected, so an unknown one is told.
func TestUnknownKeysOfCellsAreTold(t *testing.T) {
	dump := strings.Replace(aHead, ";4", ";4;;", 1) + "Sampl name;X\r\nNote;a;b\r\nRemark;5\" pipe\r\nonly one cell\r\nReadings;5;;\r\n" + aTable + aRows + "9,500;5,5;22,5\r\n"
	run := readOne(t, as1252(dump), schemas.Shipped())
	want := []string{"line 1: trailing delimiter dropped", `line 4: "Sampl name" is nearly "Sample name", kept as it is`, "line 5: the value holds the delimiter and was taken whole",
		`line 5: "Note" is not in schema bench-a, kept as it is`, "line 6: a quote within a text kept as it is",
		`line 6: "Remark" is not in schema bench-a, kept as it is`, `line 7: "only one cell" has no key and value, not used`, "line 8: trailing delimiter dropped"}
	if !slices.Equal(run.Repairs, want) {
		t.Errorf("\ngot  %q\nwant %q", run.Repairs, want)
	}
	if other := []Fact{{"Sampl name", "X"}, {"Note", "a;b"}, {"Remark", `5" pipe`}}; !slices.Equal(run.Facts.Other, other) {
		t.Errorf("other facts %q, want %q", run.Facts.Other, other)
	}
}

// Time and temperature are no result: where one fails, the column goes.
func TestOptionalColumnsAreLeftOut(t *testing.T) {
	head := "volume_mL,pH,time_s,temperature_c\n"
	for _, c := range []struct {
		name, rows, repair string
		times, temps       int
	}{
		{"both good", "0,3,0,22\n1,3,1,22\n2,3,2.5,22\n3,3,2.5,22\n4,3,9,22\n", "", 5, 5},
		{"time backwards", "0,3,0,22\n1,3,9,22\n2,3,8,22\n3,3,10,22\n4,3,11,22\n", "line 4: time: 8 s after 9 s, time runs backwards; the column is not used", 0, 5},
		{"time empty", "0,3,0,22\n1,3,,22\n2,3,,22\n3,3,10,22\n4,3,11,22\n", "line 3: time: the cell is empty; the column is not used", 0, 5},
		{"temperature no number", "0,3,0,22\n1,3,1,22\n2,3,2,2Z\n3,3,10,22\n4,3,11,22\n", `line 4: temperature: "2Z" is not a number; the column is not used`, 5, 0},
	} {
		t.Run(c.name, func(t *testing.T) {
			run := readOne(t, []byte(head+c.rows), schemas.Shipped())
			if got := strings.Join(run.Repairs, "|"); got != c.repair {
				t.Errorf("\ngot  %s\nwant %s", got, c.repair)
			}
			if len(run.TimesS) != c.times || len(run.TemperaturesC) != c.temps {
				t.Errorf("%d times and %d temperatures, want %d and %d", len(run.TimesS), len(run.TemperaturesC), c.times, c.temps)
			}
		})
	}
}

func TestRepairsAreLimited(t *testing.T) {
	dump := plainHead
	for i := range 60 {
		dump += fmt.Sprintf("%d,3,\n%d,3\n", i, i)
	}
	run := readOne(t, []byte(dump), schemas.Shipped())
	if len(run.Repairs) != 41 || run.Repairs[40] != "and 20 more" {
		t.Errorf("%d repairs, last %q; want 41, \"and 20 more\"", len(run.Repairs), run.Repairs[len(run.Repairs)-1])
	}
}
