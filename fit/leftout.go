package fit

import "math"

// Moved is what a left-out reading's flag knows of its consequence.
type Moved struct {
	First LeftOut
	Count int
	By    float64 // how far the nearest endpoint moves if the readings stay, mL; NaN without one
}

// judgeLeftOut flags readings that were left out: a note where leaving them
// out moves no endpoint by more than a third of the limit, else doubtful.
// raw is the curve with them in; readings that went back in volume can't be
// put in, so several of them are doubtful by themselves.
func (r *Result) judgeLeftOut(c *Curve, raw *cleaned, name string, l Limits) {
	for _, why := range []string{LeftStray, LeftStuck, LeftReversal} {
		m := Moved{By: math.NaN()}
		var at []int
		for _, o := range r.LeftOut {
			if o.Why != why {
				continue
			}
			if m.Count == 0 || o.Figure > m.First.Figure {
				m.First = o
			}
			m.Count++
			at = append(at, o.At)
		}
		if m.Count == 0 {
			continue
		}
		f := Flag{Name: why, Weight: Note, Figure: m.First.Figure, Limit: m.First.Limit, Unit: unitOf(c.Signal), At: at}
		if why == LeftReversal {
			f.Unit = "mL"
			f.Weight = heavierNote(m.Count > 2)
		} else {
			m.By = r.movedBy(c, raw, name, l)
			f.Weight = heavierNote(r.matters(m.By, raw, l))
			if m.First.ToEnd {
				f.Weight = heavier(r.endsNear(c.V[at[0]]))
			}
		}
		f.About = m
		r.flag(f)
	}
}

// nearEnd is how far beyond an endpoint, as a share of it, usable readings must
// go before they may stand still: the flank behind it is half of what defends
// it.
const nearEnd = 0.1

// endsNear tells whether the readings stand still from v mL on, too near to an
// endpoint.
func (r *Result) endsNear(v float64) bool {
	for _, e := range r.Endpoints {
		if v < e.V*(1+nearEnd) {
			return true
		}
	}
	return false
}

func heavierNote(doubtful bool) Weight {
	if doubtful {
		return Doubtful
	}
	return Note
}

func unitOf(s Signal) string {
	switch s {
	case Potential:
		return "mV"
	case Conductivity:
		return "mS/cm"
	}
	return "pH"
}

// matters tells whether a movement exceeds a third of the agreement limit of
// the first endpoint; an endpoint that comes or goes matters.
func (r *Result) matters(by float64, raw *cleaned, l Limits) bool {
	if len(r.Endpoints) == 0 {
		return false
	}
	return !(by <= l.agreement(r.Endpoints[0].V, raw.burette)/3)
}

// movedBy returns the largest distance from an endpoint to the nearest one
// found with all readings in, NaN if there is none.
func (r *Result) movedBy(c *Curve, raw *cleaned, name string, l Limits) float64 {
	var with []Estimate
	if c.Signal == Conductivity {
		y := corrected(raw.v, raw.u, c.V0)
		with, _, _ = newConduct(raw.v, y, c.StepY).breaks(raw, c.V0)
	} else {
		raw.noise = r.Noise / raw.decade
		if d, err := newDerivative(raw, l); err == nil && name == Derivative {
			with, _ = d.estimates()
		} else if c.EndReading != nil {
			with = new(Result).fixedReading(c, raw, l)
		}
	}
	worst := 0.0
	for _, e := range r.Endpoints {
		n, ok := nearest(with, e.V)
		if !ok {
			return math.NaN()
		}
		worst = math.Max(worst, math.Abs(n.V-e.V))
	}
	return worst
}

// residuals are relative to the reading in %, NaN for readings in no arm.
func (c *conduct) residuals(arms []Arm, k *cleaned) []float64 {
	out := make([]float64, len(c.v))
	for i := range out {
		out[i] = math.NaN()
	}
	for _, a := range arms {
		for i := range c.v {
			if c.v[i] >= a.FromV && c.v[i] <= a.ToV {
				out[i] = 100 * (c.y[i] - a.Line.At(c.v[i])) * math.Sqrt(c.w[i])
			}
		}
	}
	return out
}
