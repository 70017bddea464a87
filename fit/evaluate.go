package fit

import (
	"fmt"
	"math"

	"lastdrop/fit/spline"
)

// Result is all that this package says of one curve.
type Result struct {
	Estimator string // of the answers
	Endpoints []Endpoint
	Flags     []Flag
	LeftOut   []LeftOut
	Used      []int         // readings used, indices in the Curve, in rising volume
	Noise     float64       // sd of a reading in its unit; conductivity: relative to the reading
	Residuals []float64     // of Used, in sd (potentiometric) or in % of the reading (conductivity, arms only, else NaN)
	Shape     *spline.Shape // y in the curve's unit against V; nil for conductivity
	Corrected []float64     // of Used: conductivity corrected for dilution; nil else
	Arms      []Arm         // nil but for conductivity
	Unsure    []Estimate    // jumps that stand out but are known too badly to be endpoints
	Passes    []float64     // mL: other places at which the readings pass the end reading
	Compared  []Compared    // each indicated endpoint with its nearest refit of like kind
}

// Estimators are the names that a caller may ask for.
func Estimators() []string { return []string{Derivative, AtReadingName, TwoLine} }

// Evaluate cleans a curve, runs the estimators that apply and judges their
// endpoints. estimator names the one whose answer counts; "" takes
// at-reading where the curve states an end reading, derivative for other pH
// and potential curves and two-line for conductivity. An estimator that does
// not apply to the signal is an error, as is a curve that Check refuses.
func Evaluate(c *Curve, estimator string, l Limits) (*Result, error) {
	if err := c.Check(); err != nil {
		return nil, err
	}
	name, err := choose(c, estimator)
	if err != nil {
		return nil, err
	}
	k := order(c, l)
	if len(k.v) < minReadings {
		return nil, fmt.Errorf("%d readings with rising volume; a curve needs at least %d", len(k.v), minReadings)
	}
	if c.Signal == Conductivity {
		return conductometric(c, &k, name, l), nil
	}
	return potentiometric(c, &k, name, l)
}

func choose(c *Curve, estimator string) (string, error) {
	conductivity := c.Signal == Conductivity
	switch {
	case c.Signal < PH || c.Signal > Conductivity:
		return "", fmt.Errorf("signal %d is none of pH, potential and conductivity", c.Signal)
	case estimator == "" && conductivity:
		return TwoLine, nil
	case estimator == "" && c.EndReading != nil:
		return AtReadingName, nil
	case estimator == "":
		return Derivative, nil
	case estimator == TwoLine && !conductivity:
		return "", fmt.Errorf("estimator %q needs a conductivity run; use derivative or at-reading", estimator)
	case estimator != TwoLine && conductivity:
		return "", fmt.Errorf("estimator %q needs a pH or potential run; use two-line", estimator)
	case estimator == AtReadingName && c.EndReading == nil:
		return "", fmt.Errorf("estimator %q needs the fact end_reading", estimator)
	}
	for _, name := range Estimators() {
		if name == estimator {
			return name, nil
		}
	}
	return "", fmt.Errorf("no estimator %q; use derivative, at-reading or two-line", estimator)
}

// potentiometric evaluates a pH or potential curve.
func potentiometric(c *Curve, k *cleaned, name string, l Limits) (*Result, error) {
	raw := *k
	stepU := c.StepY / k.decade
	noisy := k.setNoise(stepU)
	k.stuckReadings(stepU, l) // first: what follows a stuck stretch leaps back like a stray
	k.strays(stepU, l)
	r := &Result{Estimator: name, Noise: k.noise * k.decade, LeftOut: k.leftOut, Used: k.at}
	d, err := newDerivative(k, l)
	if err != nil {
		return nil, err
	}
	if r.Shape, err = spline.NewShape(k.v, k.readings()); err != nil {
		return nil, err
	}
	inflections, unsure := d.estimates()
	r.Unsure = unsure
	r.Residuals = d.inv.residuals(k)
	var fixed []Estimate
	if c.EndReading != nil {
		fixed = r.fixedReading(c, k, l)
	}
	if name == AtReadingName {
		r.Endpoints = answers(fixed, inflections)
	} else {
		r.Endpoints = answers(inflections, fixed)
	}
	judge(c, k, r, l, d.endsInJump())
	if noisy {
		r.flag(Flag{Name: "noisy", Weight: Doubtful, Figure: r.Noise, Limit: mostNoise * k.decade, Unit: unitOf(c.Signal)})
	}
	r.judgeLeftOut(c, &raw, name, l)
	sortFlags(r.Flags)
	return r, nil
}

// fixedReading runs at-reading on the oriented curve in decades. A volume that
// is known too badly is no endpoint; passes beside the one taken are kept for
// a flag.
func (r *Result) fixedReading(c *Curve, k *cleaned, l Limits) []Estimate {
	shape, err := spline.NewShape(k.v, k.u)
	if err != nil {
		return nil
	}
	e, others, ok := atReading(k, shape, *c.EndReading)
	if !ok {
		return nil
	}
	r.Passes = others
	if !e.Leap && student95*e.U > l.HalfWidthMost/100*e.V {
		r.Unsure = append(r.Unsure, e)
		return nil
	}
	return []Estimate{e}
}

func (k *cleaned) readings() []float64 {
	y := make([]float64, len(k.u))
	for i, u := range k.u {
		y[i] = k.reading(u)
	}
	return y
}

// residuals are those of the inverse spline in their own sd, one a reading.
func (s *inverse) residuals(k *cleaned) []float64 {
	w := k.weights()
	out := make([]float64, len(k.v))
	for i := range out {
		g, _, _ := s.curve.At(k.u[i])
		out[i] = (g - k.v[i]) * math.Sqrt(w[i]) // above the curve is positive
	}
	return out
}

// answers joins the chosen estimator's endpoints with the nearest estimate of
// the other one.
func answers(chosen, other []Estimate) []Endpoint {
	var out []Endpoint
	for _, e := range chosen {
		p := Endpoint{Estimate: e, Estimates: []Estimate{e}}
		if o, ok := nearest(other, e.V); ok {
			p.Estimates = append(p.Estimates, o)
		}
		out = append(out, p)
	}
	return out
}

func nearest(es []Estimate, v float64) (best Estimate, ok bool) {
	for _, e := range es {
		if !ok || math.Abs(e.V-v) < math.Abs(best.V-v) {
			best, ok = e, true
		}
	}
	return best, ok
}

// conductometric evaluates a conductivity curve.
func conductometric(c *Curve, k *cleaned, name string, l Limits) *Result {
	y := corrected(k.v, k.u, c.V0)
	raw := *k
	k.noise, k.relative = newConduct(k.v, y, c.StepY).relSD, true
	k.stuckReadings(c.StepY, l)
	k.strays(c.StepY, l)
	y = corrected(k.v, k.u, c.V0)
	w := newConduct(k.v, y, c.StepY)
	es, arms, gain := w.breaks(k, c.V0)
	if !gainEnough(gain, len(k.v), c.Expected, l) {
		es = nil
	}
	r := &Result{Estimator: name, Noise: w.relSD, LeftOut: k.leftOut, Used: k.at, Corrected: y, Arms: arms}
	r.Residuals = w.residuals(arms, k)
	var kept []Estimate
	for _, e := range es {
		if student95*e.U <= l.HalfWidthMost/100*e.V {
			kept = append(kept, e)
		} else {
			r.Unsure = append(r.Unsure, e)
		}
	}
	r.Endpoints = answers(kept, nil)
	judge(c, k, r, l, false)
	r.judgeLeftOut(c, &raw, name, l)
	sortFlags(r.Flags)
	return r
}

// gainEnough tells whether the break brings enough: an unexpected one must
// gain by every reading, an expected one in total.
func gainEnough(gain float64, n int, expected bool, l Limits) bool {
	if expected {
		return gain >= l.BreakGainTotal
	}
	return gain >= l.BreakGain*float64(n)
}
