package fit

import (
	"math"

	"gonum.org/v1/gonum/mat"
)

// gentle places a candidate whose rise spreads over many readings. The spline
// that found it must follow plateaus that curve far more in V(u), so it hardly
// smooths the jump. Around an inflection V(u) is nearly
//
//	V = a + b x + c x^2 + d x^3,  x = u - u_candidate
//
// (between two buffers it is a hyperbolic sine, which the cubic follows to a
// few per cent of its curvature between the half-height points), so a weighted
// cubic there gives the place x = -c/3d, from all its readings together.
type gentle struct {
	u, v  float64 // place, decades and mL
	half  float64 // decades from it to where the slope has halved
	noise float64 // standard uncertainty of v from the readings, mL
}

// Rules for the cubic, chosen on simulated curves (measured 2026).
const (
	gentleReach  = 1.4 // window on either side, in half-widths at half height
	leastGentle  = 7   // readings, three more than coefficients
	gentlePasses = 2   // the second centres the window on the first one's place
)

// place fits the cubic; ok is false where the readings are too few or the
// cubic has no inflection between the half-height points.
func (s *inverse) place(c candidate) (g gentle, ok bool) {
	centre, half := c.u, math.Min(c.u-c.lo, c.hi-c.u)
	for range gentlePasses {
		next, found := s.cubicAt(c, centre, half)
		if !found {
			break
		}
		g, ok = next, true
		centre, half = g.u, math.Min(g.half, 2*half)
	}
	return g, ok
}

// cubicAt fits the cubic to the readings about centre and propagates their
// noise to its inflection, first order, [gum] 5.1.2 (clause from memory).
func (s *inverse) cubicAt(c candidate, centre, half float64) (g gentle, ok bool) {
	x, y, w := s.window(c, centre, half)
	if len(x) < leastGentle {
		return g, false
	}
	p, cov, chi2, err := weightedCubic(x, y, w)
	if err != nil || !(p[3] > 0) {
		return g, false
	}
	at := -p[2] / (3 * p[3])
	slope := p[1] + at*p[2] // p1 + 2 p2 x + 3 p3 x^2 at x = -p2/(3 p3)
	g.u, g.v = centre+at, p[0]+at*(p[1]+at*(p[2]+at*p[3]))
	if g.u < c.lo || g.u > c.hi || !(slope > 0) {
		return g, false
	}
	g.half = math.Sqrt(slope / (3 * p[3]))
	grad := mat.NewVecDense(4, []float64{1, at, at*at - slope/(3*p[3]), at*at*at + slope*p[2]/(3*p[3]*p[3])})
	g.noise = math.Sqrt(mat.Inner(grad, cov, grad) * math.Max(1, chi2/float64(len(x)-4)))
	return g, true
}

// window takes the readings within reach of centre, further out where they
// are fewer than the cubic needs, and never beyond the flatter places.
func (s *inverse) window(c candidate, centre, half float64) (x, y, w []float64) {
	for reach := gentleReach; len(x) < leastGentle && reach < 4; reach *= 1.25 {
		x, y, w = x[:0], y[:0], w[:0]
		for i, u := range s.u {
			if math.Abs(u-centre) <= reach*half && u >= c.before && u <= c.behind {
				x, y, w = append(x, u-centre), append(y, s.v[i]), append(w, s.w[i])
			}
		}
	}
	return x, y, w
}

// weightedCubic fits y = p0 + p1 x + p2 x^2 + p3 x^3 and returns the
// covariance of p for weights 1/sd^2 and the weighted sum of squares.
func weightedCubic(x, y, w []float64) (p [4]float64, cov *mat.SymDense, chi2 float64, err error) {
	normal, right := mat.NewSymDense(4, nil), mat.NewVecDense(4, nil)
	for i := range x {
		row := [4]float64{1, x[i], x[i] * x[i], x[i] * x[i] * x[i]}
		for a := range row {
			right.SetVec(a, right.AtVec(a)+w[i]*row[a]*y[i])
			for b := a; b < 4; b++ {
				normal.SetSym(a, b, normal.At(a, b)+w[i]*row[a]*row[b])
			}
		}
	}
	var chol mat.Cholesky
	if !chol.Factorize(normal) {
		return p, nil, 0, mat.ErrNotPSD
	}
	var solved mat.VecDense
	if err = chol.SolveVecTo(&solved, right); err != nil {
		return p, nil, 0, err
	}
	cov = mat.NewSymDense(4, nil)
	if err = chol.InverseTo(cov); err != nil {
		return p, nil, 0, err
	}
	for i := range p {
		p[i] = solved.AtVec(i)
	}
	for i := range x {
		chi2 += w[i] * sq(y[i]-(p[0]+x[i]*(p[1]+x[i]*(p[2]+x[i]*p[3]))))
	}
	return p, cov, chi2, nil
}
