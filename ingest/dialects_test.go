package ingest

import (
	"flag"
	"fmt"
	"os"
	"path/filepath"
	"strconv"
	"strings"
	"testing"

	"lastdrop/schemas"
)

var update = flag.Bool("update", false, "write the golden files anew")

const dialects = "../testdata/dialects"

// zoo returns every schema of which the folder of dialects has a dump: the
// shipped ones, and the invented ones that stand beside their dumps.
func zoo(t testing.TB) []*schemas.Schema {
	t.Helper()
	set := schemas.Shipped()
	files, err := filepath.Glob(filepath.Join(dialects, "*.toml"))
	if err != nil {
		t.Fatal(err)
	}
	for _, f := range files {
		src, err := os.ReadFile(f)
		if err != nil {
			t.Fatal(err)
		}
		s, err := schemas.Parse(f, src)
		if err != nil {
			t.Fatal(err)
		}
		if s.Name+".toml" != filepath.Base(f) {
			t.Fatalf("%s is the schema %s; file and schema have one name", f, s.Name)
		}
		set = append(set, s)
	}
	return set
}

// zooDump returns the dump of a schema, name.anything, and its file name.
func zooDump(t testing.TB, name string) (data []byte, file string) {
	t.Helper()
	files, err := filepath.Glob(filepath.Join(dialects, name+".*"))
	if err != nil {
		t.Fatal(err)
	}
	for _, f := range files {
		if strings.HasSuffix(f, ".want.txt") || strings.HasSuffix(f, ".toml") {
			continue
		}
		if file != "" {
			t.Fatalf("two dumps of schema %s: %s and %s", name, file, f)
		}
		file = f
	}
	if data, err = os.ReadFile(file); err != nil {
		t.Fatalf("no dump of schema %s in %s: %v", name, dialects, err)
	}
	return data, filepath.Base(file)
}

// Each schema reads its hand-written dump, and wins it among all of them: the
// listing names it. The listing was compared with the dump by eye, number by
// number; it is read in review like code.
func TestDialectsReadAsWritten(t *testing.T) {
	set := zoo(t)
	for _, s := range set {
		t.Run(s.Name, func(t *testing.T) {
			data, file := zooDump(t, s.Name)
			got := listing(data, file, set)
			if want := fmt.Sprintf("%s: schema %s\n", file, s.Name); !strings.HasPrefix(got, want) {
				t.Errorf("the dump is not recognised: got\n%s\nwant %s", got, want)
			}
			golden(t, filepath.Join(dialects, s.Name+".want.txt"), got)
		})
	}
}

// No schema fits the dump of another: evidence that decides by points alone
// would be too weak for dumps that are damaged or changed by hand.
func TestDialectsAreTold(t *testing.T) {
	set := zoo(t)
	for _, of := range set {
		data, file := zooDump(t, of.Name)
		for _, s := range set {
			_, schema, problems := Read(data, file, []*schemas.Schema{s})
			if (schema != nil) != (s.Name == of.Name) {
				t.Errorf("schema %s and the dump %s: %v, problems %v", s.Name, file, schema != nil, problems)
			}
		}
	}
}

// golden compares text with a file, which changes only under -update.
func golden(t *testing.T, path, got string) {
	t.Helper()
	if *update {
		if err := os.WriteFile(path, []byte(got), 0o644); err != nil {
			t.Fatal(err)
		}
		return
	}
	want, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	if got != string(want) {
		t.Errorf("%s:\ngot\n%s\nwant\n%s", path, got, want)
	}
}

// listing is all that Read says of a dump, as text.
func listing(data []byte, path string, set []*schemas.Schema) string {
	runs, schema, problems := Read(data, path, set)
	var b strings.Builder
	name := "none"
	if schema != nil {
		name = schema.Name
	}
	fmt.Fprintf(&b, "%s: schema %s\n", path, name)
	for i := range runs {
		listRun(&b, &runs[i])
	}
	for _, p := range problems {
		fmt.Fprintf(&b, "problem %v\n", p)
	}
	return b.String()
}

func listRun(b *strings.Builder, r *Run) {
	fmt.Fprintf(b, "run %d from line %d: %d readings of %s\n", r.Number, r.Line, len(r.Readings), r.Signal)
	f := r.Facts
	for _, fact := range []Fact{{"sample", f.Sample}, {"procedure", f.Procedure}, {"instrument", f.Instrument}, {"operator", f.Operator},
		{"purpose", f.Purpose}, {"started", f.Started}, {"titrant", f.Titrant}, {"titrant_mol_per_l", number(f.TitrantMolPerL)},
		{"aliquot_ml", number(f.AliquotML)}, {"solvent_ml", number(f.SolventML)}, {"reaction", f.Reaction},
		{"temperature_c", number(f.TemperatureC)}, {"end_reading", number(f.EndReading)}} {
		if fact.Value != "" {
			fmt.Fprintf(b, "  %s: %s\n", fact.Key, fact.Value)
		}
	}
	for _, o := range f.Other {
		fmt.Fprintf(b, "  other %q: %q\n", o.Key, o.Value)
	}
	for _, i := range r.Indicated {
		fmt.Fprintf(b, "  indicated in line %d: %s at %v mL, step %v mL\n", i.Line, i.Kind, i.VolumeML, i.StepML)
	}
	for _, one := range r.Results {
		fmt.Fprintf(b, "  result in line %d: %q is %v, unit %s, as written %q\n", one.Line, one.Key, one.Value, one.Unit, one.Text)
	}
	for _, m := range r.Remarks {
		fmt.Fprintf(b, "  remark in line %d: %q\n", m.Line, m.Text)
	}
	fmt.Fprintf(b, "  steps: volume %v mL, reading %v %s\n", r.VolumeStepML, r.ReadingStep, r.Signal.Unit())
	for i, p := range r.Readings {
		fmt.Fprintf(b, "  line %d: %v mL %v %s", p.Line, p.VolumeML, p.Value, r.Signal.Unit())
		if r.TimesS != nil {
			fmt.Fprintf(b, " %v s", r.TimesS[i])
		}
		if r.TemperaturesC != nil {
			fmt.Fprintf(b, " %v °C", r.TemperaturesC[i])
		}
		if r.DriftsPerMin != nil {
			fmt.Fprintf(b, " %v/min", r.DriftsPerMin[i])
		}
		b.WriteString("\n")
	}
	for _, line := range r.Repairs {
		fmt.Fprintf(b, "  repair %s\n", line)
	}
}

func number(v *float64) string {
	if v == nil {
		return ""
	}
	return strconv.FormatFloat(*v, 'g', -1, 64)
}
