package fit_test

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"lastdrop/fit"
	"lastdrop/fit/simulate"
)

// Numerics §4: of sound runs at most 1 % are disputed and 3 % doubtful, by all
// causes together. Sound: clean, doses below 2 % of the endpoint, an instrument
// that indicates what its own readings say.
func TestSoundRunsAreSound(t *testing.T) {
	t.Parallel()
	var disputed, doubtful rate
	judge := func(what string, c *fit.Curve) {
		r := evaluate(t, c, "")
		disputed.add(heaviest(r) == fit.Disputed)
		doubtful.add(heaviest(r) == fit.Doubtful)
		if heaviest(r) > fit.Note {
			t.Logf("%s: flags%s", what, names(r))
		}
	}
	for _, fam := range potentiometric() {
		for _, w := range append(ways()[:2], way{"fixed 0.19", evenly(0.19)}, way{"fixed 0.1", evenly(0.1)}) {
			for seed := uint64(1); seed <= 25; seed++ {
				c, truth := run(t, w.dose(fam.make(sample(seed))), seed)
				zeros := make([]float64, fam.ends)
				for k, v := range truth.InflectionsML {
					zeros[k] = secondZero(c, v)
				}
				judge(fmt.Sprintf("%s, %s, seed %d", fam.name, w.name, seed), indicate(c, fit.Inflection, 0.001, zeros...))
			}
		}
	}
	for _, fam := range conductometric() {
		for _, dose := range []float64{0.1, 0.19} {
			for seed := uint64(1); seed <= 50; seed++ {
				c, truth := run(t, fixed(fam.make(sample(seed)), dose), seed)
				judge(fmt.Sprintf("%s, doses of %g mL, seed %d", fam.name, dose, seed), indicate(c, fit.Break, 0.001, byHand(c, truth.EndpointsML[0])))
			}
		}
	}
	t.Logf("sound runs: disputed %v, doubtful %v", disputed, doubtful)
	disputed.atMost(t, "sound runs disputed", 1)
	doubtful.atMost(t, "sound runs doubtful", 3)
}

// flagNames are those of numerics §4 that speak of one curve, and three of this
// package's own.
const flagNames = " disagrees wide-interval wide-bracket overshoot no-endpoint stops-short poor-fit stray-reading volume-reversal stuck dilution-unknown refill not-compared passes-again noisy "

// beyond are flags whose figure is above their limit (overshoot: or on it).
const beyond = " disagrees wide-interval wide-bracket overshoot poor-fit stray-reading volume-reversal stuck "

// inconsistent lists what is wrong with the flags of a result.
func inconsistent(c *fit.Curve, r *fit.Result) (faults []string) {
	say := func(format string, a ...any) { faults = append(faults, fmt.Sprintf(format, a...)) }
	for _, f := range r.Flags {
		if !strings.Contains(flagNames, " "+f.Name+" ") || f.Unit == "" {
			say("flag %q in %q", f.Name, f.Unit)
		}
		if strings.Contains(beyond, " "+f.Name+" ") && !(math.Abs(f.Figure) > f.Limit || f.Name == "overshoot" && f.Figure == f.Limit) {
			say("%s has figure %g within its limit %g", f.Name, f.Figure, f.Limit)
		}
	}
	left := map[string]bool{}
	for _, l := range r.LeftOut {
		left[l.Why] = true
		if l.Why != fit.LeftRepeat && l.Why != fit.LeftStuck && !leftOut(r, l.At, l.Why) {
			say("reading %d is left out (%s) without a flag", l.At, l.Why)
		}
	}
	for _, why := range []string{fit.LeftStray, fit.LeftStuck, fit.LeftReversal} {
		if left[why] != (len(flagged(r, why)) > 0) {
			say("%s: left out %v, flagged %v", why, left[why], !left[why])
		}
	}
	return append(faults, unsound(c, r)...)
}

// Every flag has a name of the specification, a weight, a unit, and a figure
// really beyond its limit; it points to an endpoint and readings that exist;
// what is left out has a flag and the other way round (repeats need none). On
// clean, sparse, overdosed and spoiled curves.
func TestFlagsAreConsistent(t *testing.T) {
	t.Parallel()
	check := func(what string, c *fit.Curve) {
		r := evaluate(t, c, "")
		for _, fault := range inconsistent(c, r) {
			t.Errorf("%s: %s; flags%s", what, fault, names(r))
		}
	}
	everyFamily(func(fam family, w way) {
		for seed := uint64(1); seed <= 4; seed++ {
			s := w.dose(fam.make(sample(seed)))
			c, _ := run(t, s, seed)
			what := fmt.Sprintf("%s, %s, seed %d", fam.name, w.name, seed)
			check(what, c)
			check(what+", spoiled", spoiled(c, int(seed)))
			check(what+", cut", &fit.Curve{V: c.V[:len(c.V)/2], Y: c.Y[:len(c.V)/2], Signal: c.Signal, V0: c.V0, StepY: c.StepY})
			if c.Signal != fit.Conductivity {
				o, _ := run(t, overdosed(s, 10*sample(seed), 0.5), seed)
				check(what+", overdosed", indicate(o, fit.Inflection, 0.01, 11))
			}
		}
	})
}

// spoiled has repeats, a stray, a volume that goes back and a stuck stretch.
func spoiled(c *fit.Curve, k int) *fit.Curve {
	d := copied(c)
	n := len(d.V)
	d.Y[n/4+k] *= 1.05
	d.V[n/3+k] = d.V[n/3+k-3] - 0.001
	for i := 3*n/4 + 1; i < 3*n/4+5; i++ {
		d.Y[i] = d.Y[3*n/4]
	}
	d.V[n-2-k] = d.V[n-3-k]
	d.Indicated = []fit.Indicated{{Kind: fit.Inflection, V: d.V[n/2], StepV: 0.01}, {Kind: fit.Break, V: d.V[n/2], StepV: 0.01}}
	return d
}

// evenly is fixed as a way.
func evenly(dose float64) func(simulate.Titration) simulate.Titration {
	return func(s simulate.Titration) simulate.Titration { return fixed(s, dose) }
}
