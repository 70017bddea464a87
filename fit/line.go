package fit

import "math"

// Line is a weighted least-squares line y = A + B x with the covariance of
// its coefficients for unit variance of weight one: multiply by s^2.
type Line struct {
	A, B       float64
	VarA, VarB float64
	Cov        float64
	N          int
	SSE        float64 // weighted sum of squared residuals
}

// sums are the weighted sums behind a line about an origin x0; sums of
// neighbouring stretches subtract, so any stretch costs O(1).
type sums struct{ n, w, x, y, xx, xy, yy float64 }

func (a sums) minus(b sums) sums {
	return sums{a.n - b.n, a.w - b.w, a.x - b.x, a.y - b.y, a.xx - b.xx, a.xy - b.xy, a.yy - b.yy}
}

func (a *sums) add(x, y, w float64) {
	a.n++
	a.w += w
	a.x += w * x
	a.y += w * y
	a.xx += w * x * x
	a.xy += w * x * y
	a.yy += w * y * y
}

// sse is the weighted residual sum of squares of the line through the
// stretch; rounding may leave it a little below zero, which counts as zero.
func (a sums) sse() float64 {
	sxx, sxy, syy := a.xx-a.x*a.x/a.w, a.xy-a.x*a.y/a.w, a.yy-a.y*a.y/a.w
	if sxx <= 0 {
		return math.Max(syy, 0)
	}
	return math.Max(syy-sxy*sxy/sxx, 0)
}

// fitLine fits a line; x must hold two different values at least. Sums are
// taken about the weighted means, so that large x cost no digits.
func fitLine(x, y, w []float64) Line {
	var sw, mx, my float64
	for i := range x {
		sw += w[i]
		mx += w[i] * x[i]
		my += w[i] * y[i]
	}
	mx, my = mx/sw, my/sw
	var sxx, sxy float64
	for i := range x {
		sxx += w[i] * (x[i] - mx) * (x[i] - mx)
		sxy += w[i] * (x[i] - mx) * (y[i] - my)
	}
	l := Line{B: sxy / sxx, N: len(x), VarB: 1 / sxx}
	l.A = my - l.B*mx
	l.VarA = 1/sw + mx*mx/sxx
	l.Cov = -mx / sxx
	for i := range x {
		l.SSE += w[i] * sq(y[i]-l.A-l.B*x[i])
	}
	return l
}

// At is the line's value at x.
func (l Line) At(x float64) float64 { return l.A + l.B*x }

// crossing returns the x where two lines meet, its first-order standard
// uncertainty u and its 95 % limits by Fieller's theorem [fieller], for a
// residual variance s2 and Student factor t. With
//
//	x = N/D,  N = A2 - A1,  D = B1 - B2
//
// the limits are the roots of (N - xD)^2 = t^2 s2 (VN - 2xC + x^2 VD); ok is
// false if D does not differ from 0 by its own t-interval, so that the limits
// would be unbounded.
func crossing(l1, l2 Line, s2, t float64) (x, u, low, high float64, ok bool) {
	n, d := l2.A-l1.A, l1.B-l2.B
	vn, vd, c := s2*(l1.VarA+l2.VarA), s2*(l1.VarB+l2.VarB), -s2*(l1.Cov+l2.Cov)
	qa := d*d - t*t*vd
	if !(qa > 0) {
		return 0, 0, 0, 0, false
	}
	x = n / d
	u = math.Sqrt(math.Max(vn-2*x*c+x*x*vd, 0)) / math.Abs(d)
	qb, qc := n*d-t*t*c, n*n-t*t*vn
	root := math.Sqrt(math.Max(qb*qb-qa*qc, 0))
	return x, u, (qb - root) / qa, (qb + root) / qa, true
}
