package fit

import (
	"math"
	"sort"
)

// readingNoise returns the standard deviation of one reading in the unit of
// u: the smaller of two estimates from the flatter half of the curve, by
// three-point and by four-point differences, each divided by its standard
// factor. Both are too large where the curve bends more than the readings
// scatter; the four points follow a parabola. step is the display step in
// that unit; a reading cannot be known better than step/sqrt(12) [gum
// F.2.2.1, clause from memory]. The bounds least and most keep it believable.
func readingNoise(v, u []float64, step, least, most float64) float64 {
	least = math.Max(least, step/math.Sqrt(12))
	if len(v) < 6 {
		return math.Min(math.Max(0.005, least), most)
	}
	noise := math.Min(scatter(v, u, 3), scatter(v, u, 4))
	return math.Min(math.Max(noise, least), math.Max(most, least))
}

// scatter is the noise by differences over so many points: the combination
// sum c_i u_i with c_i = 1/prod_j (v_i - v_j) vanishes on polynomials of a
// degree below points-1, and its standard deviation is noise*sqrt(sum c^2).
func scatter(v, u []float64, points int) float64 {
	n := len(v) - points + 1
	r, slope := make([]float64, n), make([]float64, n)
	for i := range r {
		sum, norm := 0.0, 0.0
		for a := i; a < i+points; a++ {
			c := 1.0
			for b := i; b < i+points; b++ {
				if b != a {
					c /= v[a] - v[b]
				}
			}
			sum += c * u[a]
			norm += c * c
		}
		r[i] = math.Abs(sum) / math.Sqrt(norm)
		slope[i] = math.Abs((u[i+points-1] - u[i]) / (v[i+points-1] - v[i]))
	}
	flat := median(slope) * (1 + 1e-9) // equal slopes stay equal when units change
	var q []float64
	for i := range r {
		if slope[i] <= flat {
			q = append(q, r[i])
		}
	}
	return trimmedSD(q)
}

// Three quarters of the smallest |r| are kept; trimmedFactor makes their root
// mean square that of a whole normal sample: 1/sqrt(1 - 2 z phi(z)/0.75) with
// z = 1.1503, the normal quantile at 0.875. A median of |r| would serve as
// well against outliers, but on readings shown to 0.01 it can only be one of
// a few numbers, and 1.4826 times it was 1.4 times the true noise (measured
// 2026).
const (
	trimmedShare  = 0.75
	trimmedFactor = 1.6475
	trimmedWorth  = 0.6 // efficiency against the standard deviation of a normal sample (measured 2026)
)

// trimmedSD estimates the standard deviation of a sample about zero from its
// absolute values, which it sorts.
func trimmedSD(r []float64) float64 {
	sort.Float64s(r)
	keep := max(int(math.Round(trimmedShare*float64(len(r)))), 1)
	sum := 0.0
	for _, x := range r[:keep] {
		sum += x * x
	}
	return trimmedFactor * math.Sqrt(sum/float64(keep))
}

// Bounds of the reading noise of pH and potential runs, decades: what
// electrodes and amplifiers of titrators do (common practice, no source).
const (
	leastNoise = 0.001
	mostNoise  = 0.03
)

// manyBack is the share of increments, and leastBack their number, from which
// readings that run backwards by more than three times the noise of a
// difference show that the noise is larger than the bound: a coarse curve
// bends, which looks like noise, but it does not run backwards.
const (
	manyBack  = 0.02
	leastBack = 2
)

// setNoise sets the noise of a pH or potential curve. noisy tells that it is
// above the bound and the readings prove it.
func (k *cleaned) setNoise(stepU float64) (noisy bool) {
	k.noise = readingNoise(k.v, k.u, stepU, leastNoise, mostNoise)
	if k.noise < mostNoise {
		return false
	}
	back := 0
	for i := 0; i+1 < len(k.u); i++ {
		if k.u[i]-k.u[i+1] > 3*math.Sqrt2*mostNoise {
			back++
		}
	}
	if back < leastBack || float64(back) < manyBack*float64(len(k.u)) {
		return false
	}
	k.noise = readingNoise(k.v, k.u, stepU, leastNoise, math.Inf(1))
	return true
}
