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

// Each shipped schema reads its hand-written dump. The listing was compared
// with the dump by eye, number by number; it is read in review like code.
func TestDialectsReadAsWritten(t *testing.T) {
	for _, s := range schemas.Shipped() {
		t.Run(s.Name, func(t *testing.T) {
			files, err := filepath.Glob(filepath.Join(dialects, s.Name+".*"))
			if err != nil {
				t.Fatal(err)
			}
			dump := ""
			for _, f := range files {
				if !strings.HasSuffix(f, ".want.txt") {
					dump = f
				}
			}
			if dump == "" {
				t.Fatalf("no dump of schema %s in %s", s.Name, dialects)
			}
			data, err := os.ReadFile(dump)
			if err != nil {
				t.Fatal(err)
			}
			golden(t, filepath.Join(dialects, s.Name+".want.txt"), listing(data, filepath.Base(dump), schemas.Shipped()))
		})
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
	fmt.Fprintf(b, "  steps: volume %v mL, reading %v %s\n", r.VolumeStepML, r.ReadingStep, r.Signal.Unit())
	for i, p := range r.Readings {
		fmt.Fprintf(b, "  line %d: %v mL %v %s", p.Line, p.VolumeML, p.Value, r.Signal.Unit())
		if r.TimesS != nil {
			fmt.Fprintf(b, " %v s", r.TimesS[i])
		}
		if r.TemperaturesC != nil {
			fmt.Fprintf(b, " %v °C", r.TemperaturesC[i])
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
