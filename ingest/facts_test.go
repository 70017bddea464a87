package ingest

import (
	"math"
	"slices"
	"testing"

	"lastdrop/schemas"
)

// plainFacts reads a plain dump with these lines above a good table.
func plainFacts(t *testing.T, lines string) Run {
	t.Helper()
	return readOne(t, []byte(lines+"volume_mL,pH\n"+plainRows+"2.000,3.72\n"), schemas.Shipped())
}

func TestFactsOfPlain(t *testing.T) {
	run := plainFacts(t, "# Sample:  HCL: #7 \n#procedure:p\n  # instrument : Bench A\n# a remark\n# operator:\n# purpose: Blank\n# started: 2031-04-02 08:14\n"+
		"# titrant: NaOH\n# titrant_mol_per_l: 1e-1\n# aliquot_ml: 10.00\n# solvent_ml: 0\n# reaction: Acid-Base\n# temperature_c: 22.4\n# end_reading: 8.1\n# bottle: 7\n# electrons: 2\n")
	f := run.Facts
	for _, c := range []struct{ name, got, want string }{
		{"sample", f.Sample, "HCL: #7"}, {"procedure", f.Procedure, "p"}, {"instrument", f.Instrument, "Bench A"}, {"operator", f.Operator, ""},
		{"purpose", f.Purpose, "blank"}, {"started", f.Started, "2031-04-02T08:14:00"}, {"titrant", f.Titrant, "NaOH"}, {"reaction", f.Reaction, "acid-base"},
		{"titrant_mol_per_l", number(f.TitrantMolPerL), "0.1"}, {"aliquot_ml", number(f.AliquotML), "10"}, {"solvent_ml", number(f.SolventML), "0"},
		{"temperature_c", number(f.TemperatureC), "22.4"}, {"end_reading", number(f.EndReading), "8.1"},
	} {
		if c.got != c.want {
			t.Errorf("%s: %q, want %q", c.name, c.got, c.want)
		}
	}
	if want := []Fact{{"bottle", "7"}, {"electrons", "2"}}; !slices.Equal(f.Other, want) {
		t.Errorf("other: %q, want %q", f.Other, want)
	}
	if want := []string{`line 4: "a remark" has no key and value, not used`}; !slices.Equal(run.Repairs, want) {
		t.Errorf("repairs %q, want %q", run.Repairs, want)
	}
}

func TestAbsentFactsAreAbsent(t *testing.T) {
	f := plainFacts(t, "").Facts
	if f.TitrantMolPerL != nil || f.AliquotML != nil || f.SolventML != nil || f.TemperatureC != nil || f.EndReading != nil || f.Started != "" || f.Other != nil {
		t.Errorf("facts of a bare table: %+v", f)
	}
}

func TestIndicatedEndpoints(t *testing.T) {
	for _, c := range []struct {
		name, lines string
		want        []Indicated
	}{
		{"kind not stated", "# indicated_endpoint_ml: 12.660\n", []Indicated{{"inflection", 12.66, 0.001, 1}}},
		{"kind stated", "# indicated_kind: At-Reading\n# indicated_endpoint_ml: 12.7\n", []Indicated{{"at-reading", 12.7, 0.1, 2}}},
		{"two", "# indicated_endpoint_ml: 4\n# indicated_endpoint_2_ml: 12.00\n", []Indicated{{"inflection", 4, 1, 1}, {"inflection", 12, 0.01, 2}}},
		{"none", "# indicated_endpoint_ml:\n", nil},
	} {
		t.Run(c.name, func(t *testing.T) {
			if got := plainFacts(t, c.lines).Indicated; !slices.Equal(got, c.want) {
				t.Errorf("%+v, want %+v", got, c.want)
			}
		})
	}
	run := readOne(t, []byte("# indicated_endpoint_ml: 2\nvolume_mL,conductivity_mS_cm\n0,4\n1,3\n2,2\n3,3\n4,4\n"), schemas.Shipped())
	if run.Indicated[0].Kind != "break" {
		t.Errorf("kind in a conductivity run: %s, want break", run.Indicated[0].Kind)
	}
}

// unitSchema reads volts against litres and more.
const unitSchema = `name = "units"
layout = "single"
keepUnterminatedRow = true
dialect = { delimiter = ";", decimalChar = ",", commentChar = "%", missingValues = ["---", "-999"] }
recognise = { firstLine = "units" }
preamble = { lines = "comments", separator = "=" }
fields = [
  { name = "volume", titles = "V", unit = "L" },
  { name = "potential", titles = "E", unit = "V" },
  { name = "conductivity", titles = "k", unit = "S/m" },
  { name = "time", titles = "t", unit = "min" },
  { name = "temperature", titles = "T", unit = "K" },
]
facts = [
  { name = "started", titles = "at", format = "%m/%d/%y %I:%M %p", zone = "-05:00" },
  { name = "aliquot_ml", titles = "aliquot", unit = "uL" },
  { name = "titrant_mol_per_l", titles = "c", unit = "mmol/L" },
  { name = "temperature_c", titles = "T", unit = "K" },
  { name = "end_reading", titles = "end" },
  { name = "reaction", titles = "type", values = { "silver" = "precipitation", "none" = "" } },
  { name = "operator", titles = "who", default = "Analyst 9" },
]
indicated = [ { titles = "found", unit = "uL", kind = "equivalence" } ]
`

// Expected values by hand: moving the decimal point, 60 s a minute,
// 0 °C = 273.15 K.
func TestUnitsBecomeOurs(t *testing.T) {
	s, err := schemas.Parse("units.toml", []byte(unitSchema))
	if err != nil {
		t.Fatal(err)
	}
	run := readOne(t, []byte("units\n% at = 4/2/31 8:14 pm\n% aliquot=2500\n%c=100,0\n%T=295,15\n%end=0,25\n%type=Silver\n%found=4330\n%drops=---\nV;E;t;T\n"+
		"0;-0,0621;0;295,15\n0,001;0,085;0,5;295,15\n0,002;0,107;1;295,15\n0,0030;0,123;1,25;295,15\n0,004;0,1383;2;295,15"), []*schemas.Schema{s})
	f := run.Facts
	if f.Started != "2031-04-02T20:14:00-05:00" || *f.AliquotML != 2.5 || *f.TitrantMolPerL != 0.1 || *f.EndReading != 250 || f.Reaction != "precipitation" || f.Operator != "Analyst 9" {
		t.Errorf("facts %+v, aliquot %v, titrant %v, end %v", f, *f.AliquotML, *f.TitrantMolPerL, *f.EndReading)
	}
	if math.Abs(*f.TemperatureC-22) > 1e-12 || math.Abs(run.TemperaturesC[4]-22) > 1e-12 {
		t.Errorf("temperatures %v and %v °C, want 22", *f.TemperatureC, run.TemperaturesC[4])
	}
	want := []Reading{{0, -62.1, 11}, {1, 85, 12}, {2, 107, 13}, {3, 123, 14}, {4, 138.3, 15}}
	if !slices.Equal(run.Readings, want) {
		t.Errorf("readings %v, want %v", run.Readings, want)
	}
	if !slices.Equal(run.TimesS, []float64{0, 30, 60, 75, 120}) {
		t.Errorf("times %v s", run.TimesS)
	}
	// Finest display: 0,0030 L is 0.1 mL; 0,1383 V is 0.1 mV; 4330 µL is 0.001 mL.
	if run.VolumeStepML != 0.1 || run.ReadingStep != 0.1 || run.Indicated[0] != (Indicated{"equivalence", 4.33, 0.001, 8}) {
		t.Errorf("steps %v mL, %v mV; indicated %+v", run.VolumeStepML, run.ReadingStep, run.Indicated[0])
	}
	if want := []string{"line 15: last row without line end kept"}; !slices.Equal(run.Repairs, want) {
		t.Errorf("repairs %q, want %q", run.Repairs, want)
	}
}

// A missing-value mark that looks like a number is no number, and a siemens
// per metre is ten millisiemens per centimetre.
func TestMissingMarksAndSiemens(t *testing.T) {
	s, err := schemas.Parse("units.toml", []byte(unitSchema))
	if err != nil {
		t.Fatal(err)
	}
	set := []*schemas.Schema{s}
	run := readOne(t, []byte("units\nV;k\n0;0,42596\n0,001;1\n0,002;1\n0,003;1\n0,004;1\n"), set)
	if run.Signal != Conductivity || run.Readings[0].Value != 4.2596 || run.ReadingStep != 1e-4 {
		t.Errorf("%s %v step %v, want conductivity 4.2596 step 0.0001", run.Signal, run.Readings[0].Value, run.ReadingStep)
	}
	_, _, problems := Read([]byte("units\nV;E\n0;0\n0;-999\n"), "x.csv", set)
	if want := `x.csv:4:3: potential: "-999" means that nothing is given; the dump is damaged or the reading failed; export it again`; len(problems) != 1 || problems[0].Error() != want {
		t.Errorf("\ngot  %v\nwant %s", problems, want)
	}
}

func TestManyFactsAreLimited(t *testing.T) {
	lines := ""
	for range 205 {
		lines += "# key: value\n"
	}
	run := plainFacts(t, lines)
	if len(run.Facts.Other) != 200 || !slices.Equal(run.Repairs, []string{"lines 201 to 205: more than 200 facts, not used"}) {
		t.Errorf("%d facts, repairs %q", len(run.Facts.Other), run.Repairs)
	}
}
