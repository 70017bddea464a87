package fit_test

import (
	"fmt"
	"slices"
	"testing"

	"lastdrop/fit"
)

// lawTol is in mL: the laws hold exactly but for rounding, which a search for
// a smoothing parameter or a root may enlarge.
const lawTol = 1e-6

// copied returns a curve that shares no memory with c.
func copied(c *fit.Curve) *fit.Curve {
	d := *c
	d.V, d.Y = slices.Clone(c.V), slices.Clone(c.Y)
	d.Indicated = slices.Clone(c.Indicated)
	return &d
}

// transformed is a copy with every volume and reading passed through a line.
func transformed(c *fit.Curve, volumeTimes, volumePlus, readingTimes, readingPlus float64) *fit.Curve {
	d := copied(c)
	for i := range d.V {
		d.V[i] = volumePlus + volumeTimes*d.V[i]
		d.Y[i] = readingPlus + readingTimes*d.Y[i]
	}
	d.StepV, d.V0 = d.StepV*volumeTimes, d.V0*volumeTimes-volumePlus
	if c.V0 == 0 {
		d.V0 = 0
	}
	return d
}

// follows checks that the endpoints of got are those of want with the volumes
// passed through a line.
func follows(t *testing.T, what string, got, want *fit.Result, times, plus float64) {
	t.Helper()
	if len(got.Endpoints) != len(want.Endpoints) || len(want.Endpoints) == 0 {
		t.Errorf("%s: endpoints%s, want those of%s", what, places(got), places(want))
		return
	}
	tol := lawTol * max(1, times)
	for k, w := range want.Endpoints {
		g := got.Endpoints[k]
		near(t, what+", V", g.V, plus+times*w.V, tol)
		near(t, what+", U", g.U, times*w.U, tol)
		near(t, what+", low", g.Low, plus+times*w.Low, tol)
		near(t, what+", high", g.High, plus+times*w.High, tol)
		if g.Bracket != w.Bracket {
			t.Errorf("%s: bracket %v, want %v", what, g.Bracket, w.Bracket)
		}
	}
}

// eachCurve calls f with curves of all families: every way, a few seeds.
func eachCurve(t *testing.T, f func(t *testing.T, what string, c *fit.Curve)) {
	for _, p := range []struct {
		families []family
		ways     []way
	}{{potentiometric(), ways()}, {conductometric(), evenWays()}} {
		for _, fam := range p.families {
			for _, w := range p.ways {
				for seed := uint64(1); seed <= 4; seed++ {
					c, _ := run(t, w.dose(fam.make(sample(seed))), seed)
					f(t, fmt.Sprintf("%s, %s, seed %d", fam.name, w.name, seed), c)
				}
			}
		}
	}
}

// Volumes counted from another zero move the answer by as much. The volume in
// the vessel is then counted from there too, so that V0 + V stays; otherwise
// the dilution correction would be another. Shifts to the left are no part of
// the law: volumes are delivered volumes and start at 0 or above. Flags may
// change, as their limits are in percent of the volume.
func TestAnswerMovesWithTheZeroOfVolume(t *testing.T) {
	eachCurve(t, func(t *testing.T, what string, c *fit.Curve) {
		want := evaluate(t, c, "")
		for _, shift := range []float64{1, 5} {
			got := evaluate(t, transformed(c, 1, shift, 1, 0), "")
			follows(t, fmt.Sprintf("%s, V + %g", what, shift), got, want, 1, shift)
		}
	})
}

// Volumes in another unit: with every limit in mL in that unit too, the same
// answer in that unit, and the same flags.
func TestAnswerScalesWithTheUnitOfVolume(t *testing.T) {
	eachCurve(t, func(t *testing.T, what string, c *fit.Curve) {
		want := evaluate(t, c, "")
		for _, k := range []float64{0.125, 10} {
			l := fit.Defaults()
			l.BuretteUML *= k
			got := evaluateWith(t, transformed(c, k, 0, 1, 0), "", l)
			follows(t, fmt.Sprintf("%s, V x %g", what, k), got, want, k, 0)
			if len(got.Flags) != len(want.Flags) {
				t.Errorf("%s, V x %g: flags%s, want%s", what, k, names(got), names(want))
			}
		}
	})
}

// A falling curve is a rising one in the mirror; a constant added to all pH
// (or mV) changes no place. A conductivity counts from zero, so it may be
// scaled instead.
func TestAnswerDoesNotDependOnTheReadingsZeroOrDirection(t *testing.T) {
	type line struct{ times, plus float64 }
	eachCurve(t, func(t *testing.T, what string, c *fit.Curve) {
		want := evaluate(t, c, "")
		lines := []line{{-1, 14}, {1, 0.37}, {1, -2.5}}
		if c.Signal == fit.Conductivity {
			lines = []line{{1000, 0}, {0.37, 0}}
		}
		for _, l := range lines {
			d := transformed(c, 1, 0, l.times, l.plus)
			if c.Signal == fit.Conductivity {
				d.StepY *= l.times
			}
			got := evaluate(t, d, "")
			what := fmt.Sprintf("%s, %g + %g y", what, l.plus, l.times)
			follows(t, what, got, want, 1, 0)
			for k := range min(len(got.Endpoints), len(want.Endpoints)) {
				// Readings reach 500 mV and slopes 1400 mV/mL: a tolerance of lawTol in mL is 2 uV.
				near(t, what+", reading", got.Endpoints[k].Reading, l.plus+l.times*want.Endpoints[k].Reading, 2000*lawTol)
			}
			if len(got.Flags) != len(want.Flags) {
				t.Errorf("%s: flags%s, want%s", what, names(got), names(want))
			}
		}
	})
}

// Endpoints come in the order of volume, and so do the estimates of each kind.
func TestEndpointsComeInTheOrderOfVolume(t *testing.T) {
	eachCurve(t, func(t *testing.T, what string, c *fit.Curve) {
		r := evaluate(t, c, "")
		for k := 1; k < len(r.Endpoints); k++ {
			if r.Endpoints[k].V <= r.Endpoints[k-1].V {
				t.Errorf("%s: endpoints%s", what, places(r))
			}
		}
		for k, e := range r.Endpoints {
			answer := slices.IndexFunc(e.Estimates, func(x fit.Estimate) bool { return x.Estimator == r.Estimator })
			if answer < 0 || e.Estimates[answer].V != e.V || e.Estimator != r.Estimator {
				t.Errorf("%s: endpoint %d by %q has no answer of %q among its %d estimates", what, k+1, e.Estimator, r.Estimator, len(e.Estimates))
			}
		}
	})
}

// Of several readings at one volume the last counts, whatever the earlier
// ones were; they are left out as repeats.
func TestLastReadingAtOneVolumeCounts(t *testing.T) {
	eachCurve(t, func(t *testing.T, what string, c *fit.Curve) {
		want := evaluate(t, c, "")
		d, places := copied(c), []int{}
		d.V, d.Y = nil, nil
		for i := range c.V {
			if i%3 == 1 { // an unsettled reading, 0.3 of the way back to the one before; every other volume two
				for range 1 + i%2 {
					places = append(places, len(d.V))
					d.V, d.Y = append(d.V, c.V[i]), append(d.Y, c.Y[i]+0.3*(c.Y[i-1]-c.Y[i]))
				}
			}
			d.V, d.Y = append(d.V, c.V[i]), append(d.Y, c.Y[i])
		}
		got := evaluate(t, d, "")
		var repeats []int
		for _, l := range got.LeftOut {
			if l.Why == fit.LeftRepeat {
				repeats = append(repeats, l.At)
			}
		}
		if !slices.Equal(repeats, places) {
			t.Errorf("%s: repeats %v, want %v", what, repeats, places)
		}
		sameInVolume(t, what, d, c, got, want)
	})
}

// sameInVolume checks equal answers of two curves with different indices.
func sameInVolume(t *testing.T, what string, d, c *fit.Curve, got, want *fit.Result) {
	t.Helper()
	if len(got.Endpoints) != len(want.Endpoints) {
		t.Errorf("%s: endpoints%s, want%s", what, places(got), places(want))
		return
	}
	for k, w := range want.Endpoints {
		g := got.Endpoints[k]
		near(t, what+", V", g.V, w.V, lawTol)
		near(t, what+", U", g.U, w.U, lawTol)
		for side := range 2 {
			if d.V[g.Bracket[side]] != c.V[w.Bracket[side]] || d.Y[g.Bracket[side]] != c.Y[w.Bracket[side]] {
				t.Errorf("%s: bracket %v at other readings than %v", what, g.Bracket, w.Bracket)
			}
		}
	}
}

// The refit is a pure function: the curve stays as it was, and twice gives the
// same.
func TestEvaluateIsPure(t *testing.T) {
	eachCurve(t, func(t *testing.T, what string, c *fit.Curve) {
		before := copied(c)
		first := fmt.Sprintf("%+v", *evaluate(t, c, ""))
		second := fmt.Sprintf("%+v", *evaluate(t, c, ""))
		if !slices.Equal(before.V, c.V) || !slices.Equal(before.Y, c.Y) {
			t.Errorf("%s: the curve was changed", what)
		}
		if stripPointers(first) != stripPointers(second) {
			t.Errorf("%s: two evaluations differ", what)
		}
	})
}
