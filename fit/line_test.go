package fit

import (
	"encoding/json"
	"math"
	"os"
	"testing"
)

// near fails unless got is want within tolerance, absolute below 1 and
// relative above.
func near(t *testing.T, what string, got, want, tolerance float64) {
	t.Helper()
	if d := math.Abs(got - want); !(d <= tolerance*math.Max(1, math.Abs(want))) {
		t.Errorf("%s: got %.15g, want %.15g, difference %.3g, tolerance %.3g", what, got, want, d, tolerance)
	}
}

func load(t *testing.T, name string, into any) {
	t.Helper()
	data, err := os.ReadFile("testdata/" + name)
	if err != nil {
		t.Fatal(err)
	}
	if err := json.Unmarshal(data, into); err != nil {
		t.Fatal(err)
	}
}

// Reference: NIST StRD, Norris, certified values.
func TestLineAgainstNorris(t *testing.T) {
	var n struct {
		X, Y      []float64
		Certified struct {
			Intercept, Slope  float64
			UIntercept        float64 `json:"u_intercept"`
			USlope            float64 `json:"u_slope"`
			ResidualSD        float64 `json:"residual_sd"`
			ResidualSumSquare float64 `json:"residual_sum_of_squares"`
			DOF               int
		}
		Cov float64 `json:"computed_cov_intercept_slope"`
	}
	load(t, "norris.json", &n)
	l := fitLine(n.X, n.Y, ones(len(n.X)))
	c := n.Certified
	s2 := l.SSE / float64(l.N-2)
	near(t, "intercept", l.A, c.Intercept, 1e-11)
	near(t, "slope", l.B, c.Slope, 1e-13)
	near(t, "u of the intercept", math.Sqrt(s2*l.VarA), c.UIntercept, 1e-12)
	near(t, "u of the slope", math.Sqrt(s2*l.VarB), c.USlope, 1e-14)
	near(t, "residual sd", math.Sqrt(s2), c.ResidualSD, 1e-12)
	near(t, "sum of squares", l.SSE, c.ResidualSumSquare, 1e-12)
	near(t, "covariance", s2*l.Cov, n.Cov, 1e-14)
	if l.N-2 != c.DOF {
		t.Errorf("%d degrees of freedom, want %d", l.N-2, c.DOF)
	}
}

func ones(n int) []float64 {
	w := make([]float64, n)
	for i := range w {
		w[i] = 1
	}
	return w
}

type fiellerCase struct {
	Name   string
	Arms   []struct{ X, Y []float64 }
	Pooled struct {
		UX      float64 `json:"u_x"`
		DOF     int
		T975    float64 `json:"t975"`
		Bounded bool
		Low     *float64 `json:"low95_x"`
		High    *float64 `json:"high95_x"`
	}
	X float64
}

// Reference: testdata/fieller.py (closed form in 50-digit arithmetic) and
// testdata/fieller.R (lm, qt).
func TestCrossingAgainstReferences(t *testing.T) {
	var file struct{ Cases []fiellerCase }
	load(t, "fieller.json", &file)
	if len(file.Cases) < 5 {
		t.Fatalf("%d cases, want 5", len(file.Cases))
	}
	for _, c := range file.Cases {
		var arms [2]arm
		for i, a := range c.Arms {
			arms[i].line = fitLine(a.X, a.Y, ones(len(a.X)))
		}
		s2, student := pooled(arms[:])
		near(t, c.Name+" Student factor", student, c.Pooled.T975, 1e-9)
		x, u, low, high, ok := crossing(arms[0].line, arms[1].line, s2, student)
		if ok != c.Pooled.Bounded {
			t.Errorf("%s: bounded %v, want %v", c.Name, ok, c.Pooled.Bounded)
		}
		if !ok {
			continue
		}
		near(t, c.Name+" x", x, c.X, 1e-11)
		near(t, c.Name+" u", u, c.Pooled.UX, 1e-11)
		near(t, c.Name+" low", low, *c.Pooled.Low, 1e-9)
		near(t, c.Name+" high", high, *c.Pooled.High, 1e-9)
	}
}

// Weighting by 1/sd^2 is the same as repeating a reading: by hand, weight 3
// is three readings.
func TestWeightsCountAsReadings(t *testing.T) {
	a := fitLine([]float64{0, 1, 2, 4}, []float64{1, 2.9, 5.2, 8.8}, []float64{1, 3, 1, 2})
	b := fitLine([]float64{0, 1, 1, 1, 2, 4, 4}, []float64{1, 2.9, 2.9, 2.9, 5.2, 8.8, 8.8}, ones(7))
	near(t, "intercept", a.A, b.A, 1e-13)
	near(t, "slope", a.B, b.B, 1e-13)
	near(t, "sum of squares", a.SSE, b.SSE, 1e-12)
	near(t, "variance of the slope", a.VarB, b.VarB, 1e-13)
}

// The sums over a stretch give the same sum of squares as the line through it.
func TestStretchSumsAgreeWithLine(t *testing.T) {
	x := []float64{0, 1, 2, 3, 4, 5, 6, 7}
	y := []float64{2, 2.4, 2.1, 1.2, 1.9, 3.7, 5.1, 4.8}
	c := newConduct(x, y, 0)
	for from := 0; from < 6; from++ {
		for to := from + 2; to < 8; to++ {
			near(t, "sum of squares", c.sse(from, to), c.line(from, to).SSE, 1e-12)
		}
	}
}

type knownCurve struct {
	Name        string
	Unit        string
	Inflections []float64 `json:"inflections_ml"`
	Samplings   []struct {
		Name     string
		VolumeML []float64 `json:"volume_ml"`
		Reading  []float64
		Brackets [][2]float64 `json:"brackets_ml"`
	}
}

// Reference: testdata/curves.py, inflections of exact curves by SciPy to
// 1e-10 mL. Noise-free readings: the bracket must hold the true inflection,
// and the estimate may miss it by half the bracket at most. Where doses of
// 1 mL jump a whole curve two increments may be alike; there the estimate
// may lie one bracket off, and the interval must still hold the truth.
func TestDerivativeOnExactCurves(t *testing.T) {
	var file struct{ Cases []knownCurve }
	load(t, "curves.json", &file)
	if len(file.Cases) < 6 {
		t.Fatalf("%d curves, want 6", len(file.Cases))
	}
	for _, c := range file.Cases {
		for _, s := range c.Samplings {
			signal := PH
			if c.Unit == "mV" {
				signal = Potential
			}
			r, err := Evaluate(&Curve{V: s.VolumeML, Y: s.Reading, Signal: signal, Expected: true}, Derivative, Defaults())
			if err != nil {
				t.Fatal(err)
			}
			what := c.Name + " " + s.Name
			if len(r.Endpoints) != len(c.Inflections) {
				t.Errorf("%s: %d endpoints, want %d", what, len(r.Endpoints), len(c.Inflections))
				continue
			}
			for i, e := range r.Endpoints {
				checkExact(t, what, e.Estimate, c.Inflections[i], s.Brackets[i], s.Name == "dense")
			}
		}
	}
}

func checkExact(t *testing.T, what string, e Estimate, truth float64, bracket [2]float64, dense bool) {
	t.Helper()
	h := bracket[1] - bracket[0]
	if e.Low > truth || e.High < truth {
		t.Errorf("%s: interval %.4f to %.4f mL does not hold %.4f", what, e.Low, e.High, truth)
	}
	if miss := math.Abs(e.V - truth); miss > h/2 && (dense || miss > h) {
		t.Errorf("%s: got %.4f mL, want %.4f, half the bracket is %.4f", what, e.V, truth, h/2)
	}
	if e.Leap && e.U < h/math.Sqrt(12)*(1-1e-9) {
		t.Errorf("%s: u %.4f mL is below bracket/sqrt(12) = %.4f", what, e.U, h/math.Sqrt(12))
	}
}
