package demo

import (
	"math"
	"strings"
	"testing"

	"lastdrop/ingest"
	"lastdrop/schemas"
)

// The project's reader must find in every dump what these tests find in its
// text, digit by digit, and must refuse what was damaged.
func TestReaderAgrees(t *testing.T) {
	set := schemas.Shipped()
	for _, seed := range []uint64{DefaultSeed, 101, 102, 103} {
		files, planted, err := Files(seed)
		if err != nil {
			t.Fatal(err)
		}
		for _, f := range files {
			dump, ok := strings.CutPrefix(f.Path, "dumps/")
			if !ok {
				continue
			}
			runs, _, problems := ingest.Read(f.Data, dump, set)
			for _, p := range planted {
				if p.Dump == dump && p.Expect != ExpectCounted {
					compare(t, p, f, runs, problems)
				}
			}
		}
	}
}

// compare looks for the run of p in what was read.
func compare(t *testing.T, p Planted, f File, runs []ingest.Run, problems []*schemas.Problem) {
	t.Helper()
	var got *ingest.Run
	for i := range runs {
		if runs[i].Number == max(p.Run, 1) {
			got = &runs[i]
		}
	}
	if p.Expect == ExpectUnread {
		if got != nil || len(problems) != 1 {
			t.Errorf("%s: read %v, problems %v; want one problem", where(p), got != nil, problems)
		}
		return
	}
	if got == nil {
		t.Errorf("%s is not read: %v", where(p), problems)
		return
	}
	want := parse(t, f)[p.Run-1]
	volumes, readings := got.Curve()
	if !near9(volumes, want.volumes) || !near9(readings, want.readings) {
		t.Errorf("%s: other readings are read than stand in the dump", where(p))
	}
	if len(got.Repairs) != 0 {
		t.Errorf("%s: repairs %v in a dump that needs none", where(p), got.Repairs)
	}
	compareFacts(t, p, got, want)
}

// near9 compares to nine significant digits: a unit may be converted.
func near9(a, b []float64) bool {
	if len(a) != len(b) {
		return false
	}
	for i := range a {
		if math.Abs(a[i]-b[i]) > 1e-9*math.Max(1, math.Abs(b[i])) {
			return false
		}
	}
	return true
}

// compareFacts looks at what enters the arithmetic or the identity.
func compareFacts(t *testing.T, p Planted, got *ingest.Run, want parsed) {
	t.Helper()
	f := got.Facts
	if f.Sample != p.Sample || f.Procedure != p.Procedure || f.Operator == "" || f.Titrant == "" || string(got.Signal) != p.Signal {
		t.Errorf("%s: facts %+v, signal %s", where(p), f, got.Signal)
	}
	if f.AliquotML == nil || f.SolventML == nil || math.Abs(*f.AliquotML+*f.SolventML-p.V0ML) > 1e-9 {
		t.Errorf("%s: aliquot and solvent are not the %g mL before titration", where(p), p.V0ML)
	}
	if !strings.HasPrefix(f.Started, "2031-04-02T") {
		t.Errorf("%s: started %q", where(p), f.Started)
	}
	if f.Instrument == "" || f.TitrantMolPerL == nil || f.Reaction == "" {
		t.Errorf("%s: instrument %q, reaction %q, or the titrant's concentration is lost", where(p), f.Instrument, f.Reaction)
	}
	if set := f.EndReading != nil; set != (p.Kind == "at-reading") {
		t.Errorf("%s: end reading %v of a run to %s", where(p), f.EndReading, p.Kind)
	}
	var seen []float64
	for _, i := range got.Indicated {
		seen = append(seen, i.VolumeML)
		if i.Kind != p.Kind {
			t.Errorf("%s: indicated kind %q, want %q", where(p), i.Kind, p.Kind)
		}
	}
	if !near9(seen, want.indicated) {
		t.Errorf("%s: indicated %v, the dump has %v", where(p), seen, want.indicated)
	}
}
