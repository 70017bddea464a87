package spline

import "sort"

// Cubic is a natural cubic spline: knots x, values g, second derivatives m.
type Cubic struct{ x, g, m []float64 }

// Turn is a place where the slope of a Cubic has an extreme, that is where
// its second derivative changes sign.
type Turn struct {
	X     float64
	Slope float64
	Least bool // a minimum of the slope; else a maximum
}

// Knots returns the first and the last knot.
func (c *Cubic) Knots() (first, last float64) { return c.x[0], c.x[len(c.x)-1] }

// piece returns i with x in [x_i, x_i+1], the outer pieces for x outside.
func (c *Cubic) piece(x float64) int {
	return min(max(sort.SearchFloat64s(c.x, x)-1, 0), len(c.x)-2)
}

// At returns value, slope and second derivative at x. Outside the knots the
// curve goes on straight.
func (c *Cubic) At(x float64) (y, slope, second float64) {
	i := c.piece(x)
	h := c.x[i+1] - c.x[i]
	if x < c.x[0] || x > c.x[len(c.x)-1] {
		return c.straight(x)
	}
	a, b := (c.x[i+1]-x)/h, (x-c.x[i])/h
	y = a*c.g[i] + b*c.g[i+1] + ((a*a*a-a)*c.m[i]+(b*b*b-b)*c.m[i+1])*h*h/6
	slope = (c.g[i+1]-c.g[i])/h + (-(3*a*a-1)*c.m[i]+(3*b*b-1)*c.m[i+1])*h/6
	second = a*c.m[i] + b*c.m[i+1]
	return y, slope, second
}

func (c *Cubic) straight(x float64) (y, slope, second float64) {
	end := c.x[0]
	if x > end {
		end = c.x[len(c.x)-1]
	}
	y, slope, _ = c.At(end)
	return y + slope*(x-end), slope, 0
}

// Third returns the third derivative in the piece that holds x.
func (c *Cubic) Third(x float64) float64 {
	i := c.piece(x)
	return (c.m[i+1] - c.m[i]) / (c.x[i+1] - c.x[i])
}

// Turns returns every extreme of the slope inside the knots in rising x. The
// second derivative is a straight line on each piece, so each is exact.
func (c *Cubic) Turns() []Turn {
	var t []Turn
	for i := 0; i+1 < len(c.x); i++ {
		a, b := c.m[i], c.m[i+1]
		if (a <= 0) == (b <= 0) { // m = 0 counts with the falling side
			continue
		}
		x := c.x[i] + (c.x[i+1]-c.x[i])*a/(a-b)
		_, slope, _ := c.At(x)
		t = append(t, Turn{X: x, Slope: slope, Least: b > 0})
	}
	return t
}

// Functionals returns the coefficients of value and second derivative at x
// with respect to (g, m) at the knots, for Smoother.Influence.
func (c *Cubic) Functionals(x float64) (valueG, valueM, secondM []float64) {
	n := len(c.x)
	valueG, valueM, secondM = make([]float64, n), make([]float64, n), make([]float64, n)
	i := c.piece(x)
	h := c.x[i+1] - c.x[i]
	a, b := (c.x[i+1]-x)/h, (x-c.x[i])/h
	valueG[i], valueG[i+1] = a, b
	valueM[i], valueM[i+1] = (a*a*a-a)*h*h/6, (b*b*b-b)*h*h/6
	secondM[i], secondM[i+1] = a, b
	return valueG, valueM, secondM
}
