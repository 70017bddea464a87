package fit_test

import (
	"math"
	"testing"

	"lastdrop/fit"
	"lastdrop/fit/simulate"
)

// hydrochloric is hydrochloric acid with NaOH 0.1 mol/L, endpoint at 10 mL by
// stoichiometry, in even doses, without noise.
func hydrochloric(t *testing.T, dose float64) *fit.Curve {
	t.Helper()
	s := simulate.Titration{
		Signal: simulate.PH, V0ML: 50, TemperatureC: 25,
		Vessel:  simulate.Solution{Spectators: []simulate.Spectator{{Ion: "Cl-", MolPerL: 0.02}}},
		Titrant: simulate.Solution{Spectators: []simulate.Spectator{{Ion: "Na+", MolPerL: 0.1}}},
		Ends:    []simulate.End{{}}, Electrode: simulate.Electrode{Slope: 1, DisplayStep: 0.01},
		Dosing: simulate.Dosing{FixedML: dose, StopML: 14},
	}
	c, _, err := s.Run(1)
	if err != nil {
		t.Fatal(err)
	}
	return &fit.Curve{V: c.VolumesML, Y: c.Readings, Signal: fit.PH, StepV: 0.01, StepY: 0.01, Expected: true}
}

func must(t *testing.T, c *fit.Curve) *fit.Result {
	t.Helper()
	r, err := fit.Evaluate(c, "", fit.Defaults())
	if err != nil {
		t.Fatal(err)
	}
	return r
}

func has(r *fit.Result, name string, least fit.Weight) bool {
	for _, f := range r.Flags {
		if f.Name == name && f.Weight >= least {
			return true
		}
	}
	return false
}

func disputed(r *fit.Result) bool {
	for _, f := range r.Flags {
		if f.Weight == fit.Disputed {
			return true
		}
	}
	return false
}

// A cable that comes off shows pH 7, an electrode that dries stays where it
// was; neither may leave an endpoint that is called sound.
func TestFrozenReadingsDefendNoEndpoint(t *testing.T) {
	for _, from := range []float64{5, 8, 9, 9.5, 9.9, 10, 10.1, 10.4} {
		for _, shows := range []float64{math.NaN(), 7} {
			for _, wobble := range []float64{0, 0.01} {
				c := hydrochloric(t, 0.1)
				last := math.NaN()
				for i, v := range c.V {
					if v < from {
						last = c.Y[i]
						continue
					}
					c.Y[i] = last
					if !math.IsNaN(shows) {
						c.Y[i] = shows
					}
					c.Y[i] += wobble * float64(i%5/4)
				}
				if r := must(t, c); !disputed(r) {
					t.Errorf("frozen from %g mL (shows %g, wobble %g): endpoints%s, flags%s; want a disputed run", from, shows, wobble, places(r), names(r))
				}
			}
		}
	}
}

// A curve that is let run on is not frozen: its plateau moves with the
// logarithm of the excess.
func TestPlateauIsNotFrozen(t *testing.T) {
	for _, dose := range []float64{0.05, 0.1, 0.25} {
		if r := must(t, hydrochloric(t, dose)); len(r.LeftOut) > 0 || len(r.Endpoints) != 1 {
			t.Errorf("doses of %g mL: left out %v, endpoints%s", dose, r.LeftOut, places(r))
		}
	}
}

// The fixed reading is the first pass in the direction of the titration; a
// second one is disputed, noise at the reading is not.
func TestFixedReadingPassedAgain(t *testing.T) {
	end := 8.2
	plain := hydrochloric(t, 0.1)
	plain.EndReading = &end
	want := must(t, plain).Endpoints[0].V

	back := hydrochloric(t, 0.1)
	back.EndReading = &end
	for i, v := range back.V {
		if v > 12 {
			back.Y[i] = 11 - 2*(v-12)
		}
	}
	start := hydrochloric(t, 0.1)
	start.EndReading = &end
	start.Y[0], start.Y[1] = 9.2, 9.0
	for name, c := range map[string]*fit.Curve{"falls back": back, "begins above": start} {
		r := must(t, c)
		if len(r.Endpoints) != 1 || math.Abs(r.Endpoints[0].V-want) > 1e-9 || !has(r, "passes-again", fit.Disputed) {
			t.Errorf("%s: endpoints%s, want %.4f; flags%s, want passes-again", name, places(r), want, names(r))
		}
	}
	if r := must(t, plain); has(r, "passes-again", fit.Note) {
		t.Errorf("one pass: flags%s", names(r))
	}
}

// A volume typed ten times too high is one reading out of order, not the ten
// that come after it.
func TestOneMistypedVolume(t *testing.T) {
	for _, c := range []struct{ at, as float64 }{{9.9, 99}, {5, 50}, {9.5, 10.3}, {10.2, 1.02}} {
		curve := hydrochloric(t, 0.1)
		at := -1
		for i, v := range curve.V {
			if math.Abs(v-c.at) < 1e-9 {
				at, curve.V[i] = i, c.as
			}
		}
		if at < 0 {
			t.Fatalf("no reading at %g mL", c.at)
		}
		r := must(t, curve)
		var out []int
		for _, l := range r.LeftOut {
			out = append(out, l.At)
		}
		if len(out) != 1 || out[0] != at || len(r.Endpoints) != 1 || math.Abs(r.Endpoints[0].V-10) > 0.1 {
			t.Errorf("%g typed as %g: left out %v, want [%d]; endpoints%s, want 10", c.at, c.as, out, at, places(r))
		}
	}
}

// A microlitre titration has a microlitre limit: by numerics §3 the burette's
// u is at most a tenth of the median increment, and the floor 8 u.
func TestMicrolitreTitrationsAreCompared(t *testing.T) {
	c := hydrochloric(t, 0.1)
	for i := range c.V {
		c.V[i] /= 1000
	}
	c.StepV = 0.00001
	for _, off := range []float64{-0.05, 0.05} {
		c.Indicated = []fit.Indicated{{Kind: fit.Inflection, V: 0.01 * (1 + off), StepV: 0.00001}}
		if r := must(t, c); !has(r, "disagrees", fit.Disputed) {
			t.Errorf("indicated %+.0f %% off 10 µL: flags%s, want disagrees", 100*off, names(r))
		}
	}
}

// An export that drops trailing zeros writes 11 for 11.000: the display step
// does not excuse it. Two indicated endpoints cannot both belong to one.
func TestIndicatedInFewDigits(t *testing.T) {
	c := hydrochloric(t, 0.1)
	for _, ind := range [][]fit.Indicated{
		{{Kind: fit.Inflection, V: 11, StepV: 1}},
		{{Kind: fit.Inflection, V: 9, StepV: 1}},
		{{Kind: fit.Inflection, V: 10, StepV: 0.01}, {Kind: fit.Inflection, V: 5, StepV: 0.01}},
	} {
		c.Indicated = ind
		r := must(t, c)
		if !has(r, "disagrees", fit.Disputed) {
			t.Errorf("indicated %v, refit%s: flags%s, want disagrees", ind, places(r), names(r))
		}
	}
	c.Indicated = []fit.Indicated{{Kind: fit.Inflection, V: 10, StepV: 1}}
	if r := must(t, c); disputed(r) {
		t.Errorf("indicated 10, refit%s: flags%s, want none", places(r), names(r))
	}
}

// What cannot be compared is told, and a kind that the signal cannot have is
// a doubt.
func TestUnlikeKindsAreTold(t *testing.T) {
	c := hydrochloric(t, 0.1)
	for kind, least := range map[string]fit.Weight{"equivalence": fit.Note, fit.AtReading: fit.Note, fit.Break: fit.Doubtful} {
		c.Indicated = []fit.Indicated{{Kind: kind, V: 11, StepV: 0.01}}
		if r := must(t, c); !has(r, "not-compared", least) {
			t.Errorf("indicated %s: flags%s, want not-compared", kind, names(r))
		}
	}
}

// Noise above what an electrode in order has is estimated as it is, and told;
// the interval then holds the endpoint.
func TestNoisyReadingsAreTold(t *testing.T) {
	held, told, n, sum := 0, 0, 0, 0.0
	for seed := uint64(1); seed <= 40; seed++ {
		s := simulate.Titration{
			Signal: simulate.PH, V0ML: 50, TemperatureC: 25,
			Vessel:  simulate.Solution{Groups: []simulate.Group{simulate.Acetic(0.02012)}},
			Titrant: simulate.Solution{Spectators: []simulate.Spectator{{Ion: "Na+", MolPerL: 0.1}}},
			Ends:    []simulate.End{{Levels: []int{1}}}, Electrode: simulate.Electrode{Slope: 1, NoiseSD: 0.08, DisplayStep: 0.01},
			Dosing: simulate.Dosing{FixedML: 0.1, StopML: 14},
		}
		c, truth, err := s.Run(seed)
		if err != nil {
			t.Fatal(err)
		}
		r := must(t, &fit.Curve{V: c.VolumesML, Y: c.Readings, Signal: fit.PH, StepV: 0.001, StepY: 0.01, Expected: true})
		n++
		if has(r, "noisy", fit.Doubtful) {
			told++
			sum += r.Noise
		}
		for _, e := range r.Endpoints {
			if e.Low <= truth.InflectionsML[0] && truth.InflectionsML[0] <= e.High {
				held++
				break
			}
		}
	}
	if told < n*9/10 {
		t.Errorf("noise of 0.08 pH told in %d of %d, want nine of ten", told, n)
	}
	if mean := sum / float64(told); math.Abs(mean-0.08) > 0.008 {
		t.Errorf("mean noise %g pH, want 0.08 within a tenth", mean)
	}
	if held < n*9/10 {
		t.Errorf("an interval holds the inflection in %d of %d, want nine of ten", held, n)
	}
	t.Logf("noise 0.08 pH: told in %d of %d, an interval holds the inflection in %d", told, n, held)
}
