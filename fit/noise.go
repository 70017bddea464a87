package fit

import "math"

// readingNoise returns the standard deviation of one reading in the unit of
// u, from scaled three-point second differences on the flatter half of the
// curve: 1.4826 * median |r|, r = (u_i - interpolated neighbours) / its
// standard factor. step is the display step in that unit; a reading cannot be
// known better than step/sqrt(12) [gum F.2.2.1, clause from memory]. The
// bounds least and most keep it believable.
func readingNoise(v, u []float64, step, least, most float64) float64 {
	n := len(v)
	least = math.Max(least, step/math.Sqrt(12))
	if n < 6 {
		return math.Min(math.Max(0.005, least), most)
	}
	r, slope := make([]float64, n-2), make([]float64, n-2)
	for i := range r {
		a := (v[i+2] - v[i+1]) / (v[i+2] - v[i])
		r[i] = math.Abs(u[i+1]-a*u[i]-(1-a)*u[i+2]) / math.Sqrt(1+a*a+(1-a)*(1-a))
		slope[i] = math.Abs((u[i+2] - u[i]) / (v[i+2] - v[i]))
	}
	flat := median(slope)
	var q []float64
	for i := range r {
		if slope[i] <= flat {
			q = append(q, r[i])
		}
	}
	return math.Min(math.Max(1.4826*median(q), least), math.Max(most, least))
}

// Bounds of the reading noise of pH and potential runs, decades: what
// electrodes and amplifiers of titrators do (common practice, no source).
const (
	leastNoise = 0.001
	mostNoise  = 0.03
)
