package spline

import (
	"fmt"
	"sort"

	"gonum.org/v1/gonum/interp"
)

// Shape is a cubic through every point that rises where the points rise and
// never leaves the range of two neighbours [fritsch]. Its second derivative
// jumps at the points; it is for showing curves, not for finding endpoints.
type Shape struct{ x, y, slope []float64 }

// NewShape needs x strictly increasing, finite values, two points at least.
func NewShape(x, y []float64) (*Shape, error) {
	if len(x) < 2 || len(x) != len(y) {
		return nil, fmt.Errorf("spline: %d values of x and %d of y; at least 2 of each are needed", len(x), len(y))
	}
	for i := range x {
		if !finite(x[i]) || !finite(y[i]) || i > 0 && x[i] <= x[i-1] {
			return nil, fmt.Errorf("spline: point %d is (%g, %g); finite numbers and a rising x are needed", i, x[i], y[i])
		}
	}
	s := &Shape{x: append([]float64(nil), x...), y: append([]float64(nil), y...), slope: make([]float64, len(x))}
	if len(x) == 2 {
		m := (y[1] - y[0]) / (x[1] - x[0])
		s.slope[0], s.slope[1] = m, m
		return s, nil
	}
	var fb interp.FritschButland
	if err := fb.Fit(x, y); err != nil {
		return nil, fmt.Errorf("spline: %w", err)
	}
	for i := range x {
		s.slope[i] = fb.PredictDerivative(x[i])
	}
	return s, nil
}

// At returns value, slope and second derivative at x; x outside the points is
// taken to the nearest end.
func (s *Shape) At(x float64) (y, slope, second float64) {
	n := len(s.x)
	x = min(max(x, s.x[0]), s.x[n-1])
	i := min(max(sort.SearchFloat64s(s.x, x)-1, 0), n-2)
	h := s.x[i+1] - s.x[i]
	t := (x - s.x[i]) / h
	d0, d1 := s.slope[i], s.slope[i+1]
	m := (s.y[i+1] - s.y[i]) / h
	a, b := 3*m-2*d0-d1, d0+d1-2*m // y = y0 + h(d0 t + a t^2 + b t^3)
	y = s.y[i] + h*t*(d0+t*(a+t*b))
	slope = d0 + t*(2*a+3*t*b)
	second = (2*a + 6*b*t) / h
	return y, slope, second
}

// Reach returns the x between from and to at which the shape has the value y,
// by bisection to the last digits; ok is false if the values at from and to
// do not enclose y.
func (s *Shape) Reach(y, from, to float64) (x float64, ok bool) {
	ya, _, _ := s.At(from)
	yb, _, _ := s.At(to)
	if (ya-y)*(yb-y) > 0 {
		return 0, false
	}
	rising := yb > ya
	for range 60 {
		mid := from + (to-from)/2
		ym, _, _ := s.At(mid)
		if (ym < y) == rising {
			from = mid
		} else {
			to = mid
		}
	}
	return from + (to-from)/2, true
}
