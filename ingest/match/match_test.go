package match

import (
	"testing"

	"lastdrop/ingest/cells"
	"lastdrop/schemas"
)

func parsed(t *testing.T, src string) *schemas.Schema {
	t.Helper()
	s, err := schemas.Parse("m.toml", []byte(src))
	if err != nil {
		t.Fatal(err)
	}
	return s
}

const wide = "name=\"m\"\nlayout=\"wide\"\nrecognise.header=true\nfields=[{name=\"volume\",titles=\"V {n} mL\",unit=\"mL\"},{name=\"time\",titles=\"t\",unit=\"s\"},{name=\"temperature\",titles=\"T\",unit=\"Cel\"},{name=\"pH\",titles=[\"pH\",\"pH{n}\"]}]\n"

func TestFieldOf(t *testing.T) {
	s := parsed(t, wide)
	for title, want := range map[string]schemas.Role{
		"t": schemas.RoleTime, "T": schemas.RoleTemperature, "PH": schemas.RolePH, "ph12": schemas.RolePH, "pH{n}": schemas.RolePH, "v 3 ML": schemas.RoleVolume,
		"pHx": "", "V  mL": "", "V 1a mL": "", "": "",
	} {
		got := schemas.Role("")
		if f := FieldOf(s, []byte(title)); f != nil {
			got = f.Role
		}
		if got != want {
			t.Errorf("%q: %q, want %q", title, got, want)
		}
	}
}

func TestTitlesOfSeveralRows(t *testing.T) {
	s := parsed(t, wide+"dialect.headerRows=[1,3]\ndialect.headerJoin=\"/\"\n")
	body := "V,,pH\n-,-\nmL,s,,x\n1,2\n"
	scan := cells.Scanner{Body: []byte(body), Delimiter: ','}
	var row cells.Row
	scan.Next(&row)
	titles, rows := Titles(s, &scan, &row)
	got := ""
	for _, b := range titles {
		got += string(b) + "|"
	}
	if got != "V/mL|s|pH|x|" || rows != 3 {
		t.Errorf("%s, %d rows; want V/mL|s|pH|x|, 3", got, rows)
	}
	if scan.Next(&row); row.Line != 2 {
		t.Errorf("the scanner was moved to line %d", row.Line)
	}
}

func TestFits(t *testing.T) {
	s := parsed(t, "name=\"m\"\nlayout=\"single\"\nrecognise={header=true, lines=[\"Bench\"], absent=[\"Old\"]}\npreamble.lines=\"cells\"\nfields=[{name=\"volume\",titles=\"V\",unit=\"mL\"},{name=\"pH\",titles=\"pH\"}]\n")
	for _, c := range []struct{ dump, why string }{
		{"Bench,1\nV,pH\n", ""}, {"x,1\r\nBench,1\r\nV,pH\r\n", ""},
		{"aBench,1\nV,pH\n", `no line begins with "Bench"`},
		{"Bench,1\nOld,2\nV,pH\n", `a line begins with "Old"`},
		{"Bench,1\nV,E\n", `the header is "V,E" (schema m needs a header with "V" and "pH")`},
		{"Bench,1\n1,2\n", "the evidence in [recognise] is not there"},
	} {
		if _, fault, why := Fits([]byte(c.dump), s); fault != nil || why != c.why {
			t.Errorf("%q: %q, %v; want %q", c.dump, why, fault, c.why)
		}
	}
}

func TestFitsByTheFirstLine(t *testing.T) {
	s := parsed(t, "name=\"m\"\nlayout=\"single\"\nrecognise={header=true, firstLineBegins=\"Bench E\"}\npreamble.lines=\"cells\"\nfields=[{name=\"volume\",titles=\"V\",unit=\"mL\"},{name=\"pH\",titles=\"pH\"}]\n")
	for _, c := range []struct{ dump, why string }{
		{"\nBench E,2\nV,pH\n", ""},
		{"Bench F,2\nV,pH\n", `line 1 is "Bench F,2" where it expects one that begins with "Bench E"`},
		{"BENCH E,2\nV,E\n", `line 1 is "BENCH E,2" where it expects one that begins with "Bench E"`},
		{"Bench E,2\nV,E\n", `schema m needs a header with "V" and "pH"`},
		{"x,2\nV,E\n", "the evidence in [recognise] is not there"},
	} {
		if _, fault, why := Fits([]byte(c.dump), s); fault != nil || why != c.why {
			t.Errorf("%q: %q, %v; want %q", c.dump, why, fault, c.why)
		}
	}
}
