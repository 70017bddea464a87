package fit

import "math"

// strays leaves out readings that stand off the curve of their neighbours, the
// worst first, until none is left to tell. At most a tenth of the readings
// can be strays; with more the curve is simply noisy.
//
// A stray differs from the chord of its two neighbours and from the straight
// lines through the two readings before and the two behind it, all in the
// same direction. A smooth curve cannot do that: where it is convex it lies
// below its chords and above its tangents, at an inflection its tangents
// disagree, and at a corner it lies on one of the lines. So neither a jump
// nor a break is taken for a stray. On a pH or potential curve, which rises,
// a reading above or below both its neighbours is off by at least that much,
// whatever the lines say. The first and last two readings cannot be judged
// so and stay.
func (k *cleaned) strays(stepU float64, l Limits) {
	most := len(k.v) / 10
	for range most {
		i, distance, allowed := k.worstStray(strayBound(len(k.v), l.StrayFalseRate), stepU/math.Sqrt(12))
		if i < 0 {
			return
		}
		k.leftOut = append(k.leftOut, LeftOut{At: k.at[i], Why: LeftStray, Figure: distance * k.decade, Limit: allowed * k.decade})
		*k = k.without(func(j int) bool { return j == i })
	}
}

// worstStray returns the index of the reading furthest beyond its bound, or
// -1. The rounding of the display counts beside the noise: a coarse display
// hides noise of its own size from the estimate.
func (k *cleaned) worstStray(bound, rounding float64) (at int, distance, allowed float64) {
	at = -1
	worst := 1.0
	for i := 2; i+2 < len(k.v); i++ {
		part := 0.5 // a corner lies on one line but for noise
		if !k.relative {
			part = 0.25
		}
		d := math.Abs(offNeighbours(k.v[i-2:i+3], k.u[i-2:i+3], part))
		if !k.relative {
			d = math.Max(d, outOfRow(k.u[i-1:i+2]))
		}
		chord := (k.u[i+1] - k.u[i-1]) / (k.v[i+1] - k.v[i-1])
		limit := bound * math.Hypot(math.Hypot(k.sd(i), rounding), k.uv*chord) * math.Sqrt(1.5)
		if r := d / limit; r > worst {
			at, worst, distance, allowed = i, r, d, limit
		}
	}
	return at, distance, allowed
}

// outOfRow returns by how much the middle one of three readings lies above or
// below both others, 0 if it lies between them.
func outOfRow(u []float64) float64 {
	low, high := math.Min(u[0], u[2]), math.Max(u[0], u[2])
	return math.Max(math.Max(u[1]-high, low-u[1]), 0)
}

// offNeighbours returns how far the third of five points lies off the chord
// of its neighbours, 0 where the lines on either side do not agree that it
// is off in the same direction by at least that part of it.
func offNeighbours(v, u []float64, part float64) float64 {
	line := func(a, b int) float64 { return u[2] - (u[a] + (u[b]-u[a])*(v[2]-v[a])/(v[b]-v[a])) }
	chord, before, behind := line(1, 3), line(0, 1), line(4, 3)
	if chord*before <= 0 || chord*behind <= 0 || math.Min(math.Abs(before), math.Abs(behind)) < part*math.Abs(chord) {
		return 0
	}
	return chord
}
