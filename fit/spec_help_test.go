package fit_test

import (
	"fmt"
	"math"
	"regexp"
	"testing"

	"lastdrop/fit"
	"lastdrop/fit/simulate"
)

// near fails when got is further from want than tol; NaN is near to nothing.
func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !isNear(got, want, tol) {
		t.Errorf("%s: got %.12g, want %.12g, difference %.3g, tolerance %.3g", what, got, want, got-want, tol)
	}
}

func isNear(got, want, tol float64) bool { return math.Abs(got-want) <= tol }

func TestIsNear(t *testing.T) {
	for _, c := range []struct {
		got, want, tol float64
		near           bool
	}{
		{1, 1.01, 0.011, true}, {1, 1.01, 0.009, false}, {1.01, 1, 0.009, false},
		{math.NaN(), 1, 9, false}, {1, math.NaN(), 9, false}, {1, 1, math.NaN(), false}, {math.Inf(1), 1, 9, false},
	} {
		if isNear(c.got, c.want, c.tol) != c.near {
			t.Errorf("isNear(%g, %g, %g) is %v", c.got, c.want, c.tol, !c.near)
		}
	}
}

// evaluate is fit.Evaluate for curves that must be accepted.
func evaluate(t *testing.T, c *fit.Curve, estimator string) *fit.Result {
	t.Helper()
	return evaluateWith(t, c, estimator, fit.Defaults())
}

func evaluateWith(t *testing.T, c *fit.Curve, estimator string, l fit.Limits) *fit.Result {
	t.Helper()
	r, err := fit.Evaluate(c, estimator, l)
	if err != nil {
		t.Fatalf("%q on %d readings: %v", estimator, len(c.V), err)
	}
	return r
}

// flagged returns the flags of a name.
func flagged(r *fit.Result, name string) (found []fit.Flag) {
	for _, f := range r.Flags {
		if f.Name == name {
			found = append(found, f)
		}
	}
	return found
}

// names lists the flags of a result with their weights.
func names(r *fit.Result) string {
	s := ""
	for _, f := range r.Flags {
		s += fmt.Sprintf(" %s/%s(%.3g > %.3g %s, endpoint %d)", f.Name, weightName(f.Weight), f.Figure, f.Limit, f.Unit, f.Endpoint)
	}
	return s
}

func weightName(w fit.Weight) string {
	switch w {
	case fit.Note:
		return "note"
	case fit.Doubtful:
		return "doubtful"
	case fit.Disputed:
		return "disputed"
	}
	return "no weight"
}

// heaviest returns the greatest weight of all flags, 0 without one.
func heaviest(r *fit.Result) (w fit.Weight) {
	for _, f := range r.Flags {
		w = max(w, f.Weight)
	}
	return w
}

// places lists the endpoints, mL.
func places(r *fit.Result) string {
	s := ""
	for _, e := range r.Endpoints {
		s += fmt.Sprintf(" %.4f [%.4f, %.4f]", e.V, e.Low, e.High)
	}
	return s
}

// run simulates and returns what a laboratory would hand to the refit, with
// the truth beside it.
func run(t testing.TB, s simulate.Titration, seed uint64) (*fit.Curve, simulate.Truth) {
	t.Helper()
	c, truth, err := s.Run(seed)
	if err != nil {
		t.Fatal(err)
	}
	signal := map[simulate.Signal]fit.Signal{
		simulate.PH: fit.PH, simulate.Potential: fit.Potential, simulate.Conductivity: fit.Conductivity}[s.Signal]
	curve := &fit.Curve{V: c.VolumesML, Y: c.Readings, Signal: signal, StepV: s.Burette.DisplayStep,
		StepY: s.Electrode.DisplayStep, TemperatureC: s.TemperatureC, Expected: true}
	if signal == fit.Conductivity {
		curve.V0 = s.V0ML
	}
	return curve, truth
}

// answersTo returns the places that the answer of a curve should cover:
// inflections, for conductivity the breaks.
func answersTo(truth simulate.Truth) []float64 {
	if truth.InflectionsML != nil {
		return truth.InflectionsML
	}
	return truth.EndpointsML
}

// fraction spreads seeds evenly over 0 to 1 (golden ratio), so that the truth
// falls anywhere between two readings of a grid.
func fraction(seed uint64) float64 {
	_, f := math.Modf(float64(seed) * 0.6180339887498949)
	return f
}

// rate is a count out of many.
type rate struct{ n, of int }

func (r *rate) add(yes bool) {
	r.of++
	if yes {
		r.n++
	}
}

func (r rate) percent() float64 { return 100 * float64(r.n) / float64(max(r.of, 1)) }

func (r rate) String() string { return fmt.Sprintf("%d of %d (%.1f %%)", r.n, r.of, r.percent()) }

// atLeast fails when the rate is below a percentage; nothing tried is a
// failure too.
func (r rate) atLeast(t *testing.T, what string, percent float64) {
	t.Helper()
	if r.of == 0 || r.percent() < percent {
		t.Errorf("%s: %v, want at least %g %%", what, r, percent)
	}
}

// atMost fails when the rate is above a percentage.
func (r rate) atMost(t *testing.T, what string, percent float64) {
	t.Helper()
	if r.of == 0 || r.percent() > percent {
		t.Errorf("%s: %v, want at most %g %%", what, r, percent)
	}
}

// credible fails when the count is too low for a true rate of a percentage:
// so few or fewer would come by chance in less than 1 of 100 tests. For rates
// out of few.
func (r rate) credible(t *testing.T, what string, percent float64) {
	t.Helper()
	if p := atMostOf(r.n, r.of, percent/100); r.of == 0 || p < 0.01 {
		t.Errorf("%s: %v; at a true rate of %g %% so few come with probability %.2g", what, r, percent, p)
	}
}

// atMostOf is the probability of n or fewer of many at a rate of p
// (binomial).
func atMostOf(n, of int, p float64) float64 {
	sum := 0.0
	all, _ := math.Lgamma(float64(of + 1))
	for k := 0; k <= n; k++ {
		a, _ := math.Lgamma(float64(k + 1))
		b, _ := math.Lgamma(float64(of - k + 1))
		sum += math.Exp(all - a - b + float64(k)*math.Log(p) + float64(of-k)*math.Log1p(-p))
	}
	return sum
}

// By hand: 0.99^10 = 0.90438; 1 - 0.5^3 = 0.875.
func TestAtMostOf(t *testing.T) {
	near(t, "none of 10 at 1 %", atMostOf(0, 10, 0.01), 0.904382, 1e-6)
	near(t, "2 of 3 at 50 %", atMostOf(2, 3, 0.5), 0.875, 1e-12)
}

// pointer is an address in printed text.
var pointer = regexp.MustCompile(`0x[0-9a-f]{6,}`)

// stripPointers leaves out the addresses of printed text.
func stripPointers(s string) string { return pointer.ReplaceAllString(s, "") }
