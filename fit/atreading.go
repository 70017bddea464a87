package fit

import (
	"math"

	"lastdrop/fit/spline"
)

// AtReadingName is the name of the estimator of this file.
const AtReadingName = "at-reading"

// calibrationU is the standard uncertainty of a reading against the buffers
// or standards of its calibration, in decades: 0.01 pH, 0.6 mV (common
// practice, no source).
const calibrationU = 0.01

// atReading returns the volume at which the shape-keeping curve through the
// readings reaches the fixed reading. Its uncertainty joins the reading's
// noise and calibration, carried through the slope, and the burette's; where
// the bracket holds a leap of more than half a decade the curve inside it is
// a guess: the truth lies anywhere in it, so the interval is the bracket's
// middle +- 0.475 h and u the distance to expect, sqrt(h^2/12 + (V-middle)^2).
//
// With noise the readings may pass the value several times: the middle of
// the first and last crossing is taken and half their distance joins u. ok is
// false if the readings never pass it.
func atReading(k *cleaned, shape *spline.Shape, reading float64) (e Estimate, ok bool) {
	target := k.sign * reading / k.decade
	first, last := -1, -1
	for i := 0; i+1 < len(k.u); i++ {
		if (k.u[i] <= target) != (k.u[i+1] <= target) || k.u[i+1] == target && i+2 == len(k.u) {
			if first < 0 {
				first = i
			}
			last = i
		}
	}
	if first < 0 {
		return e, false
	}
	a, okA := shape.Reach(target, k.v[first], k.v[first+1])
	b, okB := shape.Reach(target, k.v[last], k.v[last+1])
	if !okA || !okB {
		return e, false
	}
	e = Estimate{Estimator: AtReadingName, Kind: AtReading, V: (a + b) / 2, Reading: reading}
	i := k.bracketOf(e.V)
	if first == last { // a crossing on a reading itself belongs to its own increment
		i = first
	}
	e.Bracket = [2]int{k.at[i], k.at[i+1]}
	e.Rise = k.u[i+1] - k.u[i]
	k.atReadingInterval(&e, i, (b-a)/2)
	return e, true
}

// leapDecades is the rise inside a bracket from which an interpolation in it
// is a guess: the overshoot rule's half decade.
const leapDecades = 0.5

func (k *cleaned) atReadingInterval(e *Estimate, i int, scatter float64) {
	h := k.v[i+1] - k.v[i]
	slope := math.Max(math.Abs(e.Rise)/h, 1e-9)
	e.U = math.Sqrt(sq(k.noise/slope) + sq(calibrationU/slope) + sq(k.uv) + sq(scatter))
	half := student95 * e.U
	e.Low, e.High = e.V-half, e.V+half
	if e.Leap = e.Rise > leapDecades; e.Leap {
		middle := (k.v[i] + k.v[i+1]) / 2
		e.U = math.Max(e.U, math.Sqrt(sq(h)/12+sq(e.V-middle)))
		e.Low, e.High = math.Min(e.Low, middle-uniform95*h), math.Max(e.High, middle+uniform95*h)
	}
}

func sq(x float64) float64 { return x * x }
