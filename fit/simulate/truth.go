package simulate

import (
	"fmt"
	"math"
)

// scanStep is the step in decades by which the curve is searched for its
// steepest places; a jump is wider than ten of them.
const scanStep = 0.01

// truth computes what is known before anything is read.
func (t Titration) truth(m model) (Truth, error) {
	ends, err := m.endpoints()
	if err != nil {
		return Truth{}, err
	}
	truth := Truth{V0ML: t.V0ML, EndpointsML: ends}
	if t.Signal == Conductivity {
		return truth, nil
	}
	for k := range ends {
		v, err := steepest(m, ends, k)
		if err != nil {
			return Truth{}, err
		}
		truth.InflectionsML = append(truth.InflectionsML, v)
	}
	return truth, nil
}

// steepest returns the volume near endpoint k at which a decade costs the
// least titrant. It looks between half the way to the endpoints on either side
// (from 40 % of the way from the start, so that the first rise of a weak acid
// is no candidate). The search runs along the reading, not along the volume:
// there the steepest place is a smooth and broad minimum, and the volume at it
// is good to about 1e-9 mL.
func steepest(m model, ends []float64, k int) (float64, error) {
	from, to := 0.4*ends[k], 1.5*ends[k]
	if k > 0 {
		from = (ends[k-1] + ends[k]) / 2
	}
	if k+1 < len(ends) {
		to = (ends[k] + ends[k+1]) / 2
	}
	lo, err := m.decades(from)
	if err != nil {
		return 0, err
	}
	hi, err := m.decades(to)
	if err != nil {
		return 0, err
	}
	if lo > hi {
		lo, hi = hi, lo
	}
	cost := func(u float64) float64 {
		_, ml := m.volumeAt(u)
		return math.Abs(ml)
	}
	best := lo
	for u := lo; u < hi; u += scanStep {
		if cost(u) < cost(best) {
			best = u
		}
	}
	if best < lo+scanStep || best > hi-2*scanStep {
		return 0, fmt.Errorf("the curve has no steepest place near %g mL", ends[k])
	}
	v, _ := m.volumeAt(golden(cost, best-scanStep, best+scanStep))
	return v, nil
}

// golden returns the minimum of f between lo and hi, where it has one alone,
// by golden section.
func golden(f func(float64) float64, lo, hi float64) float64 {
	const ratio = 0.6180339887498949 // (sqrt 5 - 1)/2
	a, b := hi-ratio*(hi-lo), lo+ratio*(hi-lo)
	fa, fb := f(a), f(b)
	for hi-lo > 1e-9 {
		if fa < fb {
			hi, b, fb = b, a, fa
			a = hi - ratio*(hi-lo)
			fa = f(a)
		} else {
			lo, a, fa = a, b, fb
			b = lo + ratio*(hi-lo)
			fb = f(b)
		}
	}
	return (lo + hi) / 2
}
