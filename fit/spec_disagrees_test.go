package fit_test

import (
	"fmt"
	"math"
	"testing"

	"lastdrop/fit"
	"lastdrop/fit/simulate"
)

// indicate returns a copy with indicated endpoints shown to a display step.
func indicate(c *fit.Curve, kind string, step float64, volumes ...float64) *fit.Curve {
	d := copied(c)
	for _, v := range volumes {
		d.Indicated = append(d.Indicated, fit.Indicated{Kind: kind, V: rounded(v, step), StepV: step})
	}
	return d
}

// secondZero is what a plain instrument indicates: the zero of the second
// divided differences beside the steepest increment near a place.
func secondZero(c *fit.Curve, about float64) float64 {
	mid := func(i int) float64 { return (c.V[i] + c.V[i+1]) / 2 }
	slope := func(i int) float64 { return (c.Y[i+1] - c.Y[i]) / (c.V[i+1] - c.V[i]) }
	k, best := 1, 0.0
	for i := 1; i+2 < len(c.V); i++ {
		if math.Abs(mid(i)-about) < 0.2*about && math.Abs(slope(i)) > best {
			best, k = math.Abs(slope(i)), i
		}
	}
	before := (slope(k) - slope(k-1)) / (mid(k) - mid(k-1))
	after := (slope(k+1) - slope(k)) / (mid(k+1) - mid(k))
	return c.V[k] + (c.V[k+1]-c.V[k])*before/(before-after)
}

// Numerics §4, disagrees, inflection: outside the refit's bracket and further
// from it than the limit (0.5 % or 0.010 mL). Sound instruments, which
// indicate the exact place or the second-difference zero of their own
// readings, to 0.001 or 0.01 mL: at most 1 %. Planted ones, one limit and two
// display steps outside the bracket on either side: always, disputed, at the
// right endpoint, and no other.
func TestDisagreesOnInflections(t *testing.T) {
	t.Parallel()
	var sound rate
	for _, fam := range potentiometric() {
		for _, w := range ways() {
			for seed := uint64(1); seed <= 12; seed++ {
				step := []float64{0.001, 0.01}[seed%2]
				what := fmt.Sprintf("%s, %s, seed %d", fam.name, w.name, seed)
				c, truth := run(t, w.dose(fam.make(sample(seed))), seed)
				zeros := make([]float64, fam.ends)
				for k, v := range truth.InflectionsML {
					zeros[k] = secondZero(c, v)
				}
				for _, volumes := range [][]float64{truth.InflectionsML, zeros} {
					sound.add(len(flagged(evaluate(t, indicate(c, fit.Inflection, step, volumes...), ""), "disagrees")) > 0)
				}
				plantedInflections(t, what, c, truth.InflectionsML, step)
			}
		}
	}
	t.Logf("sound instruments that disagree: %v", sound)
	sound.atMost(t, "sound instruments that disagree", 1)
}

func plantedInflections(t *testing.T, what string, c *fit.Curve, truth []float64, step float64) {
	for k, e := range evaluate(t, c, "").Endpoints {
		far := fit.Defaults().Agreement(e.V) + 2*step
		for _, v := range []float64{c.V[e.Bracket[0]] - far, c.V[e.Bracket[1]] + far} {
			volumes := append([]float64(nil), truth...)
			volumes[k] = v
			r := evaluate(t, indicate(c, fit.Inflection, step, volumes...), "")
			f := flagged(r, "disagrees")
			if len(f) != 1 || f[0].Weight != fit.Disputed || f[0].Endpoint != k+1 || f[0].Figure <= f[0].Limit {
				t.Errorf("%s: indicated %.3f, bracket %g to %g mL: flags%s, want disagrees, disputed, at endpoint %d", what, v, c.V[e.Bracket[0]], c.V[e.Bracket[1]], names(r), k+1)
			}
		}
	}
}

// An indicated endpoint of another kind is not compared.
func TestOnlyLikeKindsAreCompared(t *testing.T) {
	c, truth := run(t, dynamic(strong(1), 0.04), 1)
	far := truth.InflectionsML[0] + 1
	r := evaluate(t, indicate(c, fit.Break, 0.001, far), "")
	if len(flagged(r, "disagrees")) != 0 {
		t.Errorf("a break beside an inflection: flags%s", names(r))
	}
	r = evaluate(t, indicate(c, fit.Inflection, 0.001, far), "")
	if len(flagged(r, "disagrees")) != 1 {
		t.Errorf("an inflection 1 mL off: flags%s", names(r))
	}
}

// endReadings are readings that laboratories titrate to.
var endReadings = []struct {
	make    func(float64) simulate.Titration
	name    string
	reading float64
}{
	{acetic, "acidity", 8.1}, {acetic, "acidity", 8.2}, {carbonate, "alkalinity", 8.3}, {carbonate, "alkalinity", 4.5},
	{strong, "acid strength", 7}, {strong, "acid strength", 8.2}, {ammonia, "ammonia", 5.3}, {silver, "chloride, mV", 280},
}

// atEnd simulates a titration to a set reading, dosing to the end of the curve
// or stopping there, and returns the exact volume of that reading.
func atEnd(t *testing.T, s simulate.Titration, reading float64, stop bool, seed uint64) (*fit.Curve, float64) {
	t.Helper()
	if stop {
		s.Dosing.StopReading = reading
	}
	c, _ := run(t, s, seed)
	c.EndReading = &reading
	v, err := s.VolumeAt(reading)
	if err != nil {
		t.Fatal(err)
	}
	return c, v
}

// The crossing of a set reading against the exact volume: one endpoint, the
// exact place in its bracket to the burette's error, the interval over it in
// 90 % of each case, no flag of stopping short where dosing ended there, and
// an error of at most 0.8 of the bracket (half for a centred answer, and what
// a straight line through a jump misses).
func TestAtReadingAgainstTheExactVolume(t *testing.T) {
	t.Parallel()
	for _, x := range endReadings {
		for _, stop := range []bool{false, true} {
			var covers rate
			var percent []float64
			for _, w := range ways() {
				for seed := uint64(1); seed <= 20; seed++ {
					what := fmt.Sprintf("%s to %g, stopping there %v, %s, seed %d", x.name, x.reading, stop, w.name, seed)
					c, exact := atEnd(t, w.dose(x.make(sample(seed))), x.reading, stop, seed)
					r := evaluate(t, c, "")
					if len(r.Endpoints) != 1 || r.Estimator != fit.AtReadingName || r.Endpoints[0].Kind != fit.AtReading {
						t.Errorf("%s: endpoints%s by %q, flags%s", what, places(r), r.Estimator, names(r))
						continue
					}
					e := r.Endpoints[0]
					covers.add(e.Low <= exact && exact <= e.High)
					percent = append(percent, 100*math.Abs(e.V-exact)/exact)
					near(t, what+", V", e.V, exact, 0.8*(c.V[e.Bracket[1]]-c.V[e.Bracket[0]])+slack)
					near(t, what+", reading", e.Reading, x.reading, 1e-6)
					if len(flagged(r, "stops-short"))+len(flagged(r, "no-endpoint")) > 0 {
						t.Errorf("%s: flags%s", what, names(r))
					}
				}
			}
			what := fmt.Sprintf("%s to %g, stopping there %v", x.name, x.reading, stop)
			t.Logf("%s: covers %v, median error %.4f %%", what, covers, median(percent))
			covers.credible(t, what+", 95 % interval", 90)
		}
	}
}

// Numerics §4, disagrees, at-reading and break: further from the refit than
// the larger of the limit and 3 root (u^2 + display^2/12). Sound instruments
// interpolate straight between their two readings.
func TestDisagreesAtReadings(t *testing.T) {
	t.Parallel()
	var sound rate
	for _, x := range endReadings {
		for _, w := range ways() {
			for seed := uint64(1); seed <= 10; seed++ {
				step := []float64{0.001, 0.01}[seed%2]
				c, exact := atEnd(t, w.dose(x.make(sample(seed))), x.reading, false, seed)
				e := evaluate(t, c, "").Endpoints[0]
				a, b := e.Bracket[0], e.Bracket[1]
				line := c.V[a] + (c.V[b]-c.V[a])*(x.reading-c.Y[a])/(c.Y[b]-c.Y[a])
				for _, v := range []float64{exact, line} {
					sound.add(len(flagged(evaluate(t, indicate(c, fit.AtReading, step, v), ""), "disagrees")) > 0)
				}
				plantedNear(t, fmt.Sprintf("%s to %g, %s, seed %d", x.name, x.reading, w.name, seed), c, e.Estimate, step)
			}
		}
	}
	t.Logf("sound instruments that disagree: %v", sound)
	sound.atMost(t, "sound instruments that disagree", 1)
}

// plantedNear checks that 1.1 limits off the refit disagree, and 0.9 do not.
func plantedNear(t *testing.T, what string, c *fit.Curve, e fit.Estimate, step float64) {
	t.Helper()
	limit := max(fit.Defaults().Agreement(e.V), 3*math.Hypot(e.U, step/math.Sqrt(12)))
	for _, off := range []float64{-1.1, -0.9, 0.9, 1.1} {
		d := copied(c)
		d.Indicated = []fit.Indicated{{Kind: e.Kind, V: e.V + off*limit, StepV: step}}
		r := evaluate(t, d, "")
		want := fit.Weight(0)
		if math.Abs(off) > 1 {
			want = fit.Disputed
		}
		wantFlag(t, fmt.Sprintf("%s, indicated %+g limits off", what, off), r, "disagrees", 1, want)
	}
}

// byHand is the crossing of plain least-squares lines through the corrected
// readings between 0.4 and 0.9, and between 1.1 and 2 endpoints: what an
// analyst does.
func byHand(c *fit.Curve, end float64) float64 {
	line := func(from, to float64) (a, b float64) {
		var n, sx, sy, sxx, sxy float64
		for i, v := range c.V {
			if y := c.Y[i] * (c.V0 + v) / c.V0; v >= from && v <= to {
				n, sx, sy, sxx, sxy = n+1, sx+v, sy+y, sxx+v*v, sxy+v*y
			}
		}
		b = (n*sxy - sx*sy) / (n*sxx - sx*sx)
		return (sy - b*sx) / n, b
	}
	a1, b1 := line(0.4*end, 0.9*end)
	a2, b2 := line(1.1*end, 2*end)
	return (a2 - a1) / (b1 - b2)
}

func TestDisagreesOnBreaks(t *testing.T) {
	t.Parallel()
	var sound rate
	for _, fam := range conductometric() {
		for _, w := range evenWays() {
			for seed := uint64(1); seed <= 15; seed++ {
				step := []float64{0.001, 0.01}[seed%2]
				c, truth := run(t, w.dose(fam.make(sample(seed))), seed)
				end := truth.EndpointsML[0]
				for _, v := range []float64{end, byHand(c, end)} {
					sound.add(len(flagged(evaluate(t, indicate(c, fit.Break, step, v), ""), "disagrees")) > 0)
				}
				plantedNear(t, fmt.Sprintf("%s, %s, seed %d", fam.name, w.name, seed), c, evaluate(t, c, "").Endpoints[0].Estimate, step)
			}
		}
	}
	t.Logf("sound instruments that disagree: %v", sound)
	sound.atMost(t, "sound instruments that disagree", 1)
}
