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

// pass is a pass of the readings through a fixed value, between two
// readings; up in the direction of the titration.
type pass struct {
	from, to int // indices of the increments of a first and last pass that noise made of one
	up       bool
}

// passes lists how the readings pass the target. Neighbouring passes between
// which no reading is further from it than noise allows are one.
func (k *cleaned) passes(target float64) []pass {
	var out []pass
	n := len(k.u)
	for i := 0; i+1 < n; i++ {
		below, next := k.u[i] < target, k.u[i+1] < target
		if k.u[i] == target && i == 0 { // begins at the value
			below = !next
		}
		if below == next {
			continue
		}
		if m := len(out); m > 0 && k.stays(target, out[m-1].to+1, i) {
			out[m-1].to = i
			out[m-1].up = k.u[out[m-1].from] < target && k.u[i+1] >= target
			continue
		}
		out = append(out, pass{from: i, to: i, up: below})
	}
	return out
}

// stays tells whether readings from..to lie at the target but for noise.
func (k *cleaned) stays(target float64, from, to int) bool {
	for i := from; i <= to; i++ {
		if math.Abs(k.u[i]-target) > 5*k.noise {
			return false
		}
	}
	return true
}

// atReading returns the volume at which the shape-keeping curve through the
// readings first reaches the fixed reading in the direction of the titration,
// and the volumes of all passes if there are others. Its uncertainty joins the
// reading's noise and calibration, carried through the slope, and the
// burette's; where the bracket holds a leap of more than half a decade the
// curve inside it is a guess: the truth lies anywhere in it, so the interval
// is the bracket and u the distance to expect, sqrt(h^2/12 + (V-middle)^2).
//
// Where noise made several passes of one, the middle of the first and last is
// taken and half their distance joins u. ok is false if the readings never
// pass the value so.
func atReading(k *cleaned, shape *spline.Shape, reading float64) (e Estimate, others []float64, ok bool) {
	target := k.sign * reading / k.decade
	for _, p := range k.passes(target) {
		a, okA := shape.Reach(target, k.v[p.from], k.v[p.from+1])
		b, okB := shape.Reach(target, k.v[p.to], k.v[p.to+1])
		if !okA || !okB {
			continue
		}
		if !p.up || ok {
			others = append(others, (a+b)/2)
			continue
		}
		ok = true
		e = Estimate{Estimator: AtReadingName, Kind: AtReading, V: (a + b) / 2, Reading: reading}
		i := p.from
		if p.to > p.from {
			i = k.bracketOf(e.V)
		}
		e.Bracket = [2]int{k.at[i], k.at[i+1]}
		e.Rise = k.u[i+1] - k.u[i]
		k.atReadingInterval(&e, i, (b-a)/2)
	}
	return e, others, ok
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
		e.Low, e.High = math.Min(e.Low, k.v[i]), math.Max(e.High, k.v[i+1])
	}
}

func sq(x float64) float64 { return x * x }
