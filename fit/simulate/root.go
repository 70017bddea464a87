package simulate

import (
	"fmt"
	"math"
)

// rootSteps is far more than bisection alone needs from a span of 50 to 1e-14.
const rootSteps = 200

// root returns where a monotone function passes zero between lo and hi:
// Newton's step where it stays inside the bracket, bisection where not. The
// result is good to about 1e-14 of x or to what the rounding of f permits.
func root(f func(x float64) (value, slope float64), lo, hi float64) (float64, error) {
	flo, _ := f(lo)
	fhi, _ := f(hi)
	if !(flo*fhi <= 0) {
		return 0, fmt.Errorf("no solution between %g and %g", lo, hi)
	}
	rising := fhi > flo
	x := (lo + hi) / 2
	for range rootSteps {
		y, dy := f(x)
		if y == 0 {
			return x, nil
		}
		if (y > 0) == rising {
			hi = x
		} else {
			lo = x
		}
		next := x - y/dy
		if !(next > lo && next < hi) {
			next = (lo + hi) / 2
		}
		if math.Abs(next-x) <= 1e-14*math.Max(1, math.Abs(x)) {
			return next, nil
		}
		x = next
	}
	return x, nil
}
