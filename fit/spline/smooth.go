// Package spline has the two curves that endpoints are read from: a weighted
// cubic smoothing spline with exact roots and error propagation, and a
// shape-keeping cubic for what is drawn. It knows nothing of chemistry; x and
// y are plain numbers, units are the caller's.
//
// Sources:
//
//	[reinsch]  C. H. Reinsch, Numer. Math. 10 (1967) 177
//	[green]    P. J. Green, B. W. Silverman, Nonparametric Regression and
//	           Generalized Linear Models (1994), ch. 2 (from memory)
//	[fritsch]  F. N. Fritsch, J. Butland, SIAM J. Sci. Stat. Comput. 5 (1984) 300
package spline

import (
	"fmt"
	"math"
)

// Smoother fits weighted cubic smoothing splines
//
//	minimise  sum w_i (y_i - g(x_i))^2 + lambda * integral g''^2
//
// to one set of data for any number of lambdas, O(n) each [reinsch]. It keeps
// its working memory: one Smoother serves one goroutine.
type Smoother struct {
	x, y, w []float64
	h       []float64 // knot distances, n-1
	qy      []float64 // Q'y, n-2
	d, e, f []float64 // LDL' of R + lambda Q'W^-1 Q: diagonal, first and second subdiagonal
	gamma   []float64 // second derivatives at the inner knots
	g, m    []float64 // fitted values and second derivatives at all knots
}

// Load takes new data: x strictly increasing, w positive, all finite, at
// least three points. It copies nothing; the slices must stay as they are
// while the Smoother is in use.
func (s *Smoother) Load(x, y, w []float64) error {
	n := len(x)
	if n < 3 || len(y) != n || len(w) != n {
		return fmt.Errorf("spline: %d, %d and %d values of x, y and w; at least 3 of each are needed", n, len(y), len(w))
	}
	for i := range x {
		if !finite(x[i]) || !finite(y[i]) || !finite(w[i]) || w[i] <= 0 {
			return fmt.Errorf("spline: point %d is (%g, %g) with weight %g; finite numbers and a positive weight are needed", i, x[i], y[i], w[i])
		}
		if i > 0 && x[i] <= x[i-1] {
			return fmt.Errorf("spline: x falls from %g to %g at point %d; it must rise", x[i-1], x[i], i)
		}
	}
	s.x, s.y, s.w = x, y, w
	s.h = resize(s.h, n-1)
	for _, p := range []*[]float64{&s.qy, &s.d, &s.e, &s.f, &s.gamma} {
		*p = resize(*p, n-2)
	}
	s.g, s.m = resize(s.g, n), resize(s.m, n)
	for i := range s.h {
		s.h[i] = x[i+1] - x[i]
	}
	for j := range s.qy {
		s.qy[j] = (y[j+2]-y[j+1])/s.h[j+1] - (y[j+1]-y[j])/s.h[j]
	}
	return nil
}

func finite(v float64) bool { return !math.IsNaN(v) && !math.IsInf(v, 0) }

func resize(a []float64, n int) []float64 {
	if cap(a) < n {
		return make([]float64, n)
	}
	return a[:n]
}

// factor makes the LDL' factors of R + lambda Q'W^-1 Q, a matrix with two
// subdiagonals.
func (s *Smoother) factor(lambda float64) {
	k := len(s.qy)
	for j := range k {
		h0, h1 := s.h[j], s.h[j+1]
		a, b, c := 1/h0, -1/h0-1/h1, 1/h1 // column j of Q
		diag := (h0+h1)/3 + lambda*(a*a/s.w[j]+b*b/s.w[j+1]+c*c/s.w[j+2])
		var off1, off2 float64
		if j+1 < k {
			h2 := s.h[j+2]
			off1 = h1/6 + lambda*(b/h1/s.w[j+1]+c*(-1/h1-1/h2)/s.w[j+2])
		}
		if j+2 < k {
			off2 = lambda * c / s.h[j+2] / s.w[j+2]
		}
		if j >= 1 {
			diag -= s.e[j-1] * s.e[j-1] * s.d[j-1]
			off1 -= s.e[j-1] * s.f[j-1] * s.d[j-1]
		}
		if j >= 2 {
			diag -= s.f[j-2] * s.f[j-2] * s.d[j-2]
		}
		s.d[j], s.e[j], s.f[j] = diag, off1/diag, off2/diag
	}
}

// solve replaces b by the solution with the last factors.
func (s *Smoother) solve(b []float64) {
	k := len(b)
	for j := range k {
		if j >= 1 {
			b[j] -= s.e[j-1] * b[j-1]
		}
		if j >= 2 {
			b[j] -= s.f[j-2] * b[j-2]
		}
	}
	for j := k - 1; j >= 0; j-- {
		b[j] /= s.d[j]
		if j+1 < k {
			b[j] -= s.e[j] * b[j+1]
		}
		if j+2 < k {
			b[j] -= s.f[j] * b[j+2]
		}
	}
}

// Fit fits with the given lambda >= 0 and returns the weighted sum of squared
// residuals, chi2. lambda = 0 interpolates.
func (s *Smoother) Fit(lambda float64) (chi2 float64) {
	s.factor(lambda)
	copy(s.gamma, s.qy)
	s.solve(s.gamma)
	n := len(s.x)
	s.m[0], s.m[n-1] = 0, 0
	copy(s.m[1:], s.gamma)
	for i := range s.x {
		r := lambda * s.qRow(i, s.gamma) / s.w[i]
		s.g[i] = s.y[i] - r
		chi2 += s.w[i] * r * r
	}
	return chi2
}

// qRow is row i of Q times v.
func (s *Smoother) qRow(i int, v []float64) float64 {
	t := 0.0
	if i >= 2 {
		t += v[i-2] / s.h[i-1]
	}
	if i >= 1 && i-1 < len(v) {
		t -= v[i-1] * (1/s.h[i-1] + 1/s.h[i])
	}
	if i < len(v) {
		t += v[i] / s.h[i]
	}
	return t
}

// FitChi2 fits with the lambda at which chi2 is the target: with weights
// 1/sd^2 and target n the curve misses the readings by as much as their noise
// says. Where even a straight line misses by less, it returns nearly that
// line. It returns the lambda used.
//
// chi2 rises with lambda, so the root is bracketed and refined on logarithms
// until chi2 is within 1 % of the target, far inside its own scatter
// sqrt(2n).
func (s *Smoother) FitChi2(target float64) (lambda float64) {
	span := s.x[len(s.x)-1] - s.x[0]
	wsum := 0.0
	for _, w := range s.w {
		wsum += w
	}
	unit := wsum * span * span * span
	lo, hi := -14.0, 2.0 // log10 of lambda in that unit: interpolating ... straight
	clo, chi := -math.MaxFloat64, math.Log(s.Fit(unit*math.Pow(10, hi))/target)
	if chi <= 0 {
		return unit * math.Pow(10, hi)
	}
	at := -6.0
	for range 24 {
		c := math.Log(math.Max(s.Fit(unit*math.Pow(10, at)), 1e-300) / target)
		if math.Abs(c) < 0.01 || hi-lo < 1e-3 {
			break
		}
		if c > 0 {
			hi, chi = at, c
		} else {
			lo, clo = at, c
		}
		at = (lo + hi) / 2
		if clo > -20 { // chi2 is close to a power of lambda between the ends
			at = lo + (hi-lo)*math.Min(math.Max(-clo/(chi-clo), 0.1), 0.9)
		}
	}
	return unit * math.Pow(10, at)
}

// Cubic returns the last fit as a curve of its own.
func (s *Smoother) Cubic() Cubic {
	c := Cubic{x: append([]float64(nil), s.x...), g: append([]float64(nil), s.g...), m: append([]float64(nil), s.m...)}
	return c
}

// Influence returns the gradient of the linear functional
// a.g + b.m (g, m: fitted values and second derivatives at the knots) with
// respect to the data y, for the last fit with that lambda. The variance of
// the functional is then sum grad_i^2 / w_i for weights 1/sd^2.
func (s *Smoother) Influence(lambda float64, a, b []float64) []float64 {
	k := len(s.qy)
	c := make([]float64, k)
	for j := range k {
		q0, q2 := 1/s.h[j], 1/s.h[j+1]
		c[j] = b[j+1] - lambda*(q0*a[j]/s.w[j]-(q0+q2)*a[j+1]/s.w[j+1]+q2*a[j+2]/s.w[j+2])
	}
	s.solve(c)
	grad := make([]float64, len(s.x))
	for i := range grad {
		grad[i] = a[i] + s.qRow(i, c)
	}
	return grad
}
