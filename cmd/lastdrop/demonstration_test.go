package main

import (
	"log/slog"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"lastdrop/cmd/internal/demo"
	"lastdrop/cmd/internal/night"
	"lastdrop/cmd/internal/refit"
	"lastdrop/report"
	"lastdrop/schemas"
)

// sweptNight is a demonstration night with what a sweep made of it.
type sweptNight struct {
	*report.Night
	planted []demo.Planted
}

func sweepDemonstration(t *testing.T, seed uint64) sweptNight {
	t.Helper()
	files, planted, err := demo.Files(seed)
	if err != nil {
		t.Fatal(err)
	}
	dir := t.TempDir()
	for _, f := range files {
		writeDemonstration(t, dir, f)
	}
	result, err := night.Sweep(t.Context(), night.Options{
		Folders: []string{filepath.Join(dir, "dumps")}, Into: filepath.Join(dir, "out"), Date: "2031-04-03",
		Now: func() time.Time { return moment }, Lastdrop: version, Limits: refit.Limits(), Refit: evaluator("", schemas.Shipped()),
		Log: slog.New(slog.DiscardHandler),
	})
	if err != nil {
		t.Fatal(err)
	}
	return sweptNight{Night: result.Night, planted: planted}
}

// writeDemonstration writes one file of a demonstration into a folder.
func writeDemonstration(tb testing.TB, folder string, f demo.File) {
	tb.Helper()
	path := filepath.Join(folder, filepath.FromSlash(f.Path))
	if err := os.MkdirAll(filepath.Dir(path), 0o777); err != nil {
		tb.Fatal(err)
	}
	if err := os.WriteFile(path, f.Data, 0o666); err != nil {
		tb.Fatal(err)
	}
}

// run returns the evaluation of a planted run, nil when there is none.
func (n *sweptNight) run(p demo.Planted) *report.Evaluation {
	for i := range n.Evaluations {
		if e := &n.Evaluations[i]; e.Dump == "dumps/"+p.Dump && e.Run == p.Run {
			return e
		}
	}
	return nil
}

func (n *sweptNight) isUnread(p demo.Planted) bool {
	for _, u := range n.Unread {
		if u.Dump == "dumps/"+p.Dump && (p.Run == 0 || u.Run == 0 || u.Run == p.Run) {
			return true
		}
	}
	return false
}

// holders counts the runs that name a dump as another export of theirs.
func (n *sweptNight) holders(p demo.Planted) (count int, sample string) {
	for i := range n.Evaluations {
		for _, also := range n.Evaluations[i].Also {
			if also == "dumps/"+p.Dump {
				count, sample = count+1, n.Evaluations[i].Facts.Sample
			}
		}
	}
	return count, sample
}

// What the demonstration plants, whole nights through the whole way: nothing
// is lost, nothing stands twice, and what depends on two dumps is found. What
// one dump alone shows is tested in package demo.
func TestDemonstrationNights(t *testing.T) {
	for seed := demo.DefaultSeed; seed < demo.DefaultSeed+51; seed++ {
		n := sweepDemonstration(t, seed)
		counted := 0
		for _, p := range n.planted {
			e := n.run(p)
			switch {
			case p.Expect == demo.ExpectCounted:
				counted++
			case p.Expect == demo.ExpectUnread:
				if e != nil || !n.isUnread(p) {
					t.Errorf("seed %d, %s run %d: is not unread", seed, p.Dump, p.Run)
				}
			case p.Expect == demo.ExpectAlso:
				if count, sample := n.holders(p); e != nil || count != 1 || sample != p.Sample {
					t.Errorf("seed %d, %s: named by %d runs, the last of sample %q, want one, of %q", seed, p.Dump, count, sample, p.Sample)
				}
			case e == nil:
				t.Errorf("seed %d, %s run %d: is missing", seed, p.Dump, p.Run)
			case e.Facts.Operator == "":
				t.Errorf("seed %d, %s run %d: has no operator", seed, p.Dump, p.Run)
			case p.Fault == demo.SameReadings || p.Fault == demo.ExportedAgain:
				wantDisputing(t, e, p.Flag)
			}
		}
		if n.OtherFiles != counted {
			t.Errorf("seed %d: got %d other files, want %d", seed, n.OtherFiles, counted)
		}
		if got := n.Count(report.VerdictDisputed); got < 6 {
			t.Errorf("seed %d: got %d disputed runs, want at least 6", seed, got)
		}
		if !n.Invented || n.FirstDay != "2031-04-02" {
			t.Errorf("seed %d: invented %v, first day %q", seed, n.Invented, n.FirstDay)
		}
	}
}

func wantDisputing(t *testing.T, e *report.Evaluation, flag string) {
	t.Helper()
	for _, f := range e.Flags {
		if f.Flag == flag && f.Weight == report.Disputed && e.Verdict == report.VerdictDisputed && e.Open {
			return
		}
	}
	t.Errorf("%s run %d: %s is missing or does not dispute: %+v", e.Dump, e.Run, flag, e.Flags)
}

// The endpoints of the sound runs against the exact places that the simulator
// knows. One run may be off by the agreement limit without a procedure, 0.5 %
// (numerics, §4: agreement limit); all together hardly, since dosing places
// fall at random.
func TestDemonstrationEndpointsAreTrue(t *testing.T) {
	const limitPercent, biasPercent = 0.5, 0.05
	sum, all := 0.0, 0
	for seed := demo.DefaultSeed; seed < demo.DefaultSeed+10; seed++ {
		n := sweepDemonstration(t, seed)
		for _, p := range n.planted {
			e := n.run(p)
			if e == nil || p.Fault != demo.Clean {
				continue
			}
			truth := truePlaces(p)
			if len(e.Endpoints) != len(truth) {
				t.Errorf("%s run %d: got %d endpoints, want %d", e.Dump, e.Run, len(e.Endpoints), len(truth))
				continue
			}
			for i, want := range truth {
				percent := 100 * (e.Endpoints[i].VolumeML - want) / want
				sum, all = sum+percent, all+1
				if math.Abs(percent) > limitPercent {
					t.Errorf("seed %d, %s run %d: endpoint %d at %.4f mL, truth %.4f mL: %.2f %% off, at most %g %%", seed, e.Dump, e.Run, i+1,
						e.Endpoints[i].VolumeML, want, percent, limitPercent)
				}
			}
		}
	}
	if mean := sum / float64(all); math.Abs(mean) > biasPercent || all < 400 {
		t.Errorf("mean of %d endpoints: %.4f %% off, at most %g %%", all, mean, biasPercent)
	}
	t.Logf("mean of %d endpoints: %.4f %%", all, sum/float64(all))
}

// truePlaces are the exact volumes (mL) of the kind of endpoint that a run
// has.
func truePlaces(p demo.Planted) []float64 {
	switch {
	case p.AtReadingML > 0:
		return []float64{p.AtReadingML}
	case strings.HasPrefix(p.Kind, "inflection"):
		return p.InflectionsML
	}
	return p.EndpointsML
}
