package fit_test

import (
	"fmt"
	"math"
	"testing"

	"lastdrop/fit"
	"lastdrop/fit/simulate"
)

// wantFlag checks that a flag of one endpoint is there exactly when it should
// be, with the weight it should have (0 for none).
func wantFlag(t *testing.T, what string, r *fit.Result, name string, endpoint int, want fit.Weight) {
	t.Helper()
	got := fit.Weight(0)
	for _, f := range flagged(r, name) {
		if f.Endpoint == endpoint {
			got = f.Weight
		}
	}
	if got != want {
		t.Errorf("%s, endpoint %d at%s: %s is %s, want %s; flags%s", what, endpoint, places(r), name, weightName(got), weightName(want), names(r))
	}
}

// byTwo is the weight of a figure with a limit for doubt and one for dispute.
func byTwo(figure, doubtful, disputed float64) fit.Weight {
	switch {
	case figure > disputed:
		return fit.Disputed
	case figure > doubtful:
		return fit.Doubtful
	}
	return 0
}

// Numerics §4: wide-bracket for every derivative (or at-reading) answer whose
// bracket is above 3 % of the endpoint, disputed above 10 %, and for no other.
// The width comes from the readings, not from the flag.
func TestWideBracketIsAlwaysTold(t *testing.T) {
	t.Parallel()
	var lost rate
	for _, fam := range potentiometric() {
		for _, dose := range []float64{0.15, 0.25, 0.31, 0.35, 0.5, 0.7, 0.9, 1.1, 1.3} {
			if fam.ends > 1 && dose > 0.9 {
				continue // a first endpoint in a bracket of 10 % and more leaves few readings between the two
			}
			for seed := uint64(1); seed <= 20; seed++ {
				what := fmt.Sprintf("%s, doses of %g mL, seed %d", fam.name, dose, seed)
				c, _ := run(t, fixed(fam.make(sample(seed)), dose), seed)
				r := evaluate(t, c, "")
				lost.add(len(r.Endpoints) != fam.ends)
				for k, e := range r.Endpoints {
					percent := 100 * (c.V[e.Bracket[1]] - c.V[e.Bracket[0]]) / e.V
					wantFlag(t, what, r, "wide-bracket", k+1, byTwo(percent, 3, 10))
					for _, f := range flagged(r, "wide-bracket") {
						if f.Endpoint == k+1 {
							near(t, what+", width in percent", f.Figure, percent, 1e-9)
						}
					}
				}
			}
		}
	}
	t.Logf("number of endpoints wrong on evenly dosed curves, 1.5 to 13 %%: %v", lost)
	lost.atMost(t, "endpoints lost or added in sparse curves", 5) // numerics §4: at most 5 % lost
}

// The same limits hold for a fixed reading.
func TestWideBracketOfAFixedReading(t *testing.T) {
	end := 8.2
	for _, dose := range []float64{0.25, 0.35, 0.9, 1.2} {
		for seed := uint64(1); seed <= 20; seed++ {
			c, _ := run(t, fixed(acetic(sample(seed)), dose), seed)
			c.EndReading = &end
			r := evaluate(t, c, "")
			if len(r.Endpoints) != 1 {
				t.Fatalf("doses of %g mL, seed %d: endpoints%s", dose, seed, places(r))
			}
			e := r.Endpoints[0]
			percent := 100 * (c.V[e.Bracket[1]] - c.V[e.Bracket[0]]) / e.V
			wantFlag(t, fmt.Sprintf("to pH %g, doses of %g mL, seed %d", end, dose, seed), r, "wide-bracket", 1, byTwo(percent, 3, 10))
		}
	}
}

// endedAt stops dosing at the first reading past one that lies so many decades
// beyond (below: before) the inflection.
func endedAt(t *testing.T, s simulate.Titration, decades float64, seed uint64) (*fit.Curve, simulate.Truth) {
	t.Helper()
	_, truth := run(t, s, seed)
	at, err := s.Reading(truth.InflectionsML[0])
	if err != nil {
		t.Fatal(err)
	}
	first, err := s.Reading(0)
	if err != nil {
		t.Fatal(err)
	}
	if s.Signal == simulate.Potential {
		decades *= 59.16
	}
	s.Dosing.StopReading = at + math.Copysign(decades, decades*(at-first))
	return run(t, s, seed)
}

// Dosing that ended inside the jump, before its steepest place: no endpoint,
// and stops-short, disputed if an endpoint was expected and doubtful if not.
func TestStopsShort(t *testing.T) {
	t.Parallel()
	var told rate
	for _, fam := range singles() {
		for _, w := range ways() {
			for _, decades := range []float64{-1, -0.5, 0} {
				for seed := uint64(1); seed <= 10; seed++ {
					c, truth := endedAt(t, w.dose(fam.make(sample(seed))), decades, seed)
					if last := len(c.V) - 1; truth.Exact[last-1] == 0 || c.V[last] > truth.InflectionsML[0] {
						continue // the last dose went past the steepest place
					}
					c.Expected = seed%2 == 0
					r := evaluate(t, c, "")
					what := fmt.Sprintf("%s, %s, ended %g decades from the inflection, seed %d", fam.name, w.name, decades, seed)
					told.add(len(flagged(r, "stops-short")) == 1)
					if len(r.Endpoints) > 0 {
						t.Errorf("%s: endpoints%s, last reading at %g mL, inflection %.4f mL", what, places(r), c.V[len(c.V)-1], truth.InflectionsML[0])
						continue
					}
					saysNoEndpoint(t, what, c, r)
				}
			}
		}
	}
	t.Logf("stops-short told: %v", told)
	told.atLeast(t, "stops-short where dosing ended in the jump", 99)
}

// Dosing that ended before the jump: no endpoint, in one of the two names.
func TestEndedBeforeTheJump(t *testing.T) {
	t.Parallel()
	for _, fam := range singles() {
		for _, w := range ways() {
			for _, share := range []float64{0.5, 0.8, 0.9, 0.97} {
				for seed := uint64(1); seed <= 6; seed++ {
					s := w.dose(fam.make(sample(seed)))
					s.Dosing.StopML = share * 10 * sample(seed)
					c, _ := run(t, s, seed)
					c.Expected = seed%2 == 0
					r := evaluate(t, c, "")
					what := fmt.Sprintf("%s, %s, ended at %g of the endpoint, seed %d", fam.name, w.name, share, seed)
					if len(r.Endpoints) > 0 {
						t.Errorf("%s: endpoints%s", what, places(r))
						continue
					}
					saysNoEndpoint(t, what, c, r)
				}
			}
		}
	}
}
