package refit_test

import (
	"bytes"
	"crypto/sha256"
	"encoding/hex"
	"fmt"
	"math"
	"testing"

	"lastdrop/cmd/internal/refit"
	"lastdrop/fit/published"
	"lastdrop/report"
	"lastdrop/schemas"
)

// Every published table goes the whole way, from the bytes of a dump to
// endpoints, and must give the published answers. Sources, conventions and
// the reasons of the tolerances stand in fit/published.
func TestPublishedTables(t *testing.T) {
	for _, tb := range published.Tables() {
		t.Run(tb.Name, func(t *testing.T) {
			e := refitTable(t, tb)
			if len(e.Endpoints) == 0 && e.Verdict == report.VerdictSound {
				t.Error("no endpoint although the dump names its titrant, and no flag says so")
			}
			wrong := misses(tb, e)
			if len(wrong) == 0 {
				return
			}
			if tb.Hard != "" && e.Verdict != report.VerdictSound {
				t.Logf("%s, as may be: %s; misses: %q", e.Verdict, tb.Hard, wrong)
				return
			}
			for _, w := range wrong {
				t.Error(w)
			}
			t.Logf("%s, found: %s; flags: %+v", e.Verdict, found(e), e.Flags)
		})
	}
}

// refitTable reads and refits the one run of a table.
func refitTable(t *testing.T, tb published.Table) report.Evaluation {
	t.Helper()
	sum := sha256.Sum256(tb.Dump)
	done, unread := refit.Dump(tb.Dump, "published/"+tb.Name+".csv", hex.EncodeToString(sum[:]), schemas.Shipped(), refit.Options{})
	if len(unread) > 0 || len(done) != 1 {
		t.Fatalf("%d runs read, want 1; unread: %+v", len(done), unread)
	}
	e := done[0]
	if e.Signal != tb.Signal {
		t.Errorf("signal: got %q, want %q", e.Signal, tb.Signal)
	}
	comments := bytes.Count(tb.Dump, []byte("\n#")) + 1 // the first line is one
	if want := bytes.Count(tb.Dump, []byte("\n")) - comments - 1; e.Readings != want {
		t.Errorf("readings: got %d, want %d", e.Readings, want)
	}
	return e
}

// estimates lists what each estimator says of each endpoint, by kind.
func estimates(e report.Evaluation, kind string) (of []report.Estimate) {
	for _, p := range e.Endpoints {
		listed := false
		for _, s := range p.Estimates {
			if s.Kind == kind {
				of = append(of, s)
			}
			listed = listed || s.Estimator == p.Estimator && s.Kind == p.Kind
		}
		if !listed && p.Kind == kind {
			of = append(of, report.Estimate{Estimator: p.Estimator, Kind: p.Kind, VolumeML: p.VolumeML})
		}
	}
	return of
}

// misses lists every answer that is missing or outside its tolerance and
// every endpoint that is none. Equivalence volumes are compared as soon as
// some estimator gives one.
func misses(tb published.Table, e report.Evaluation) (wrong []string) {
	for _, kind := range []string{"inflection", "break", "equivalence"} {
		found := estimates(e, kind)
		if kind == "equivalence" && len(found) == 0 {
			continue
		}
		for _, a := range tb.Answers {
			if a.Kind != kind || a.MayMiss {
				continue
			}
			if d, ok := nearest(found, a); !ok || math.Abs(d) > a.ToleranceML {
				wrong = append(wrong, says(a, d, ok))
			}
		}
		wrong = append(wrong, strangers(tb, found, kind)...)
	}
	return wrong
}

// nearest returns the smallest distance, in mL, of an estimate that the
// answer speaks of; ok is false when there is none.
func nearest(found []report.Estimate, a published.Answer) (d float64, ok bool) {
	for _, s := range found {
		if a.Estimator != "" && a.Estimator != s.Estimator {
			continue
		}
		if x := s.VolumeML - a.VolumeML; !ok || math.Abs(x) < math.Abs(d) {
			d, ok = x, true
		}
	}
	return d, ok
}

func says(a published.Answer, d float64, ok bool) string {
	got := "no endpoint"
	if ok {
		got = fmt.Sprintf("%.4f mL", a.VolumeML+d)
	}
	return fmt.Sprintf("endpoint %d, %s %s: got %s, want %.4f mL (%s), difference %+.4f, tolerance %.4f mL (%s)",
		a.Endpoint, a.Kind, a.Estimator, got, a.VolumeML, a.How, d, a.ToleranceML, a.ToleranceReason)
}

// strangers lists estimates that are near no answer of their kind.
func strangers(tb published.Table, found []report.Estimate, kind string) (wrong []string) {
	for _, s := range found {
		known := false
		for _, a := range tb.Answers {
			known = known || a.Kind == kind && math.Abs(s.VolumeML-a.VolumeML) <= a.ToleranceML
		}
		if !known {
			wrong = append(wrong, fmt.Sprintf("%s %s at %.4f mL, where no endpoint is known", s.Estimator, s.Kind, s.VolumeML))
		}
	}
	return wrong
}

// found is a short listing for failure texts.
func found(e report.Evaluation) string {
	var b bytes.Buffer
	for _, p := range e.Endpoints {
		fmt.Fprintf(&b, "%s %s %.4f ± %.4f mL; ", p.Estimator, p.Kind, p.VolumeML, p.UML)
	}
	return b.String()
}

// The comparison itself: one estimate a little outside, a missing one, one
// too many, one of another kind, and one that is right.
func TestMissesAreSeen(t *testing.T) {
	tb := published.Table{Answers: []published.Answer{
		{Endpoint: 1, Kind: "inflection", VolumeML: 10, ToleranceML: 0.05},
		{Endpoint: 2, Kind: "inflection", VolumeML: 20, ToleranceML: 0.05, MayMiss: true},
	}}
	at := func(kind string, volumes ...float64) (e report.Evaluation) {
		for _, v := range volumes {
			e.Endpoints = append(e.Endpoints, report.Endpoint{Kind: kind, Estimator: "derivative", VolumeML: v})
		}
		return e
	}
	for _, c := range []struct {
		name string
		e    report.Evaluation
		want int
	}{
		{"right", at("inflection", 10.049), 0},
		{"right, and the one that may be missed", at("inflection", 9.951, 20.01), 0},
		{"just outside: missing there, a stranger here", at("inflection", 10.051), 2},
		{"missing", at("inflection"), 1},
		{"only the one that may be missed", at("inflection", 20), 1},
		{"one too many", at("inflection", 10, 5), 1},
		{"other kind: missing, and a stranger among the breaks", at("break", 10), 2},
	} {
		if got := misses(tb, c.e); len(got) != c.want {
			t.Errorf("%s: %d misses %q, want %d", c.name, len(got), got, c.want)
		}
	}
	tb.Answers[0].Estimator = "two-line"
	if got := misses(tb, at("inflection", 10)); len(got) != 1 {
		t.Errorf("another estimator: misses %q, want 1", got)
	}
}
