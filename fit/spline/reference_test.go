package spline

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

func TestNearSeesAMiss(t *testing.T) {
	for _, got := range []float64{1.01, math.NaN(), math.Inf(1)} {
		var inner testing.T
		near(&inner, "", got, 1, 1e-3)
		if !inner.Failed() {
			t.Errorf("near lets %g pass for 1", got)
		}
	}
}

type values struct{ G, G1, G2 []float64 }

type smoothingCase struct {
	Name     string
	X, Y, W  []float64
	BetweenX []float64 `json:"between_x"`
	Fits     []struct {
		Lambda, Chi2 float64
		AtKnots      values `json:"at_knots"`
		Between      values
		Influence    struct {
			X     float64
			G, G2 []float64
		}
	}
	Line struct {
		Intercept, Slope, Chi2 float64
		G                      []float64
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

func smoothingCases(t *testing.T) []smoothingCase {
	var file struct{ Cases []smoothingCase }
	load(t, "smoothing.json", &file)
	if len(file.Cases) < 5 {
		t.Fatalf("%d cases in smoothing.json, want 5", len(file.Cases))
	}
	return file.Cases
}

// Reference: exact rational and 40-digit arithmetic, agreeing with SciPy's
// make_smoothing_spline and R's smooth.spline as testdata/smoothing.py tells.
func TestSmootherAgainstReferences(t *testing.T) {
	for _, c := range smoothingCases(t) {
		var s Smoother
		if err := s.Load(c.X, c.Y, c.W); err != nil {
			t.Fatal(err)
		}
		for _, f := range c.Fits {
			what := c.Name + " lambda " + jsonNumber(f.Lambda)
			near(t, what+" chi2", s.Fit(f.Lambda), f.Chi2, 1e-8)
			cubic := s.Cubic()
			compare(t, what+" at knots", &cubic, c.X, f.AtKnots)
			compare(t, what+" between", &cubic, c.BetweenX, f.Between)
			g, m, second := cubic.Functionals(f.Influence.X)
			zero := make([]float64, len(c.X))
			compareInfluence(t, what+" influence on g", s.Influence(f.Lambda, g, m), f.Influence.G)
			compareInfluence(t, what+" influence on g''", s.Influence(f.Lambda, zero, second), f.Influence.G2)
		}
	}
}

func jsonNumber(v float64) string { b, _ := json.Marshal(v); return string(b) }

func compare(t *testing.T, what string, c *Cubic, x []float64, want values) {
	t.Helper()
	scale := 1.0
	for _, v := range want.G2 {
		scale = math.Max(scale, math.Abs(v))
	}
	for i := range x {
		g, g1, g2 := c.At(x[i])
		near(t, what+" value", g, want.G[i], 1e-8)
		near(t, what+" slope", g1, want.G1[i], 1e-8)
		near(t, what+" second derivative", g2/scale, want.G2[i]/scale, 1e-8)
	}
}

func compareInfluence(t *testing.T, what string, got, want []float64) {
	t.Helper()
	if len(got) != len(want) {
		t.Fatalf("%s: %d values, want %d", what, len(got), len(want))
	}
	scale := 1.0
	for _, v := range want {
		scale = math.Max(scale, math.Abs(v))
	}
	for i := range got {
		near(t, what, got[i]/scale, want[i]/scale, 1e-7)
	}
}

// A lambda beyond all scales leaves the weighted straight line.
func TestSmootherTendsToTheLine(t *testing.T) {
	for _, c := range smoothingCases(t) {
		var s Smoother
		if err := s.Load(c.X, c.Y, c.W); err != nil {
			t.Fatal(err)
		}
		sum := 0.0
		for _, w := range c.W {
			sum += w
		}
		span := c.X[len(c.X)-1] - c.X[0]
		chi2 := s.Fit(sum * span * span * span * 1e6)
		near(t, c.Name+" chi2", chi2/c.Line.Chi2, 1, 1e-4)
		cubic := s.Cubic()
		for _, x := range c.X {
			g, _, _ := cubic.At(x)
			near(t, c.Name+" line", g, c.Line.Intercept+c.Line.Slope*x, 1e-4)
		}
	}
}

// FitChi2 promises chi2 within 1 % of its target.
func TestFitChi2(t *testing.T) {
	for _, c := range smoothingCases(t) {
		var s Smoother
		if err := s.Load(c.X, c.Y, c.W); err != nil {
			t.Fatal(err)
		}
		for _, share := range []float64{0.01, 0.1, 0.5, 0.9} {
			target := share * c.Line.Chi2
			lambda := s.FitChi2(target)
			near(t, c.Name+" chi2/target", s.Fit(lambda)/target, 1, 0.0101)
		}
		// where the line itself misses by less, nearly the line is the answer
		near(t, c.Name+" beyond the line", s.Fit(s.FitChi2(2*c.Line.Chi2))/c.Line.Chi2, 1, 0.01)
	}
}

// V = u^3 - 3u: by hand the slope 3u^2 - 3 has its least value, -3, at u = 0.
func TestTurnsOfACubic(t *testing.T) {
	var x, y, w []float64
	for i := -10; i <= 10; i++ {
		u := float64(i)/5 + 0.03 // no knot at the turn
		x, y, w = append(x, u), append(y, u*u*u-3*u), append(w, 1)
	}
	var s Smoother
	if err := s.Load(x, y, w); err != nil {
		t.Fatal(err)
	}
	s.Fit(0)
	c := s.Cubic()
	var least []Turn
	for _, turn := range c.Turns() {
		if turn.Least && math.Abs(turn.X) < 1 {
			least = append(least, turn)
		}
	}
	if len(least) != 1 {
		t.Fatalf("%d least slopes inside, want 1", len(least))
	}
	// the natural ends bend the spline; their effect dies off by 0.27 a knot
	near(t, "place", least[0].X, 0, 1e-4)
	near(t, "slope", least[0].Slope, -3, 1e-3)
	// third derivative 6, by hand
	near(t, "third derivative", c.Third(0), 6, 1e-3)
}

func TestLoadRefuses(t *testing.T) {
	for name, c := range map[string]struct{ x, y, w []float64 }{
		"two points":   {[]float64{1, 2}, []float64{1, 2}, []float64{1, 1}},
		"lengths":      {[]float64{1, 2, 3}, []float64{1, 2}, []float64{1, 1, 1}},
		"falling x":    {[]float64{1, 3, 2}, []float64{1, 2, 3}, []float64{1, 1, 1}},
		"repeated x":   {[]float64{1, 2, 2}, []float64{1, 2, 3}, []float64{1, 1, 1}},
		"NaN":          {[]float64{1, 2, 3}, []float64{1, math.NaN(), 3}, []float64{1, 1, 1}},
		"infinite":     {[]float64{1, 2, math.Inf(1)}, []float64{1, 2, 3}, []float64{1, 1, 1}},
		"zero weight":  {[]float64{1, 2, 3}, []float64{1, 2, 3}, []float64{1, 0, 1}},
		"minus weight": {[]float64{1, 2, 3}, []float64{1, 2, 3}, []float64{1, -1, 1}},
	} {
		var s Smoother
		if s.Load(c.x, c.y, c.w) == nil {
			t.Errorf("%s: accepted", name)
		}
	}
}

type shapeCase struct {
	Name         string
	X, Y         []float64
	SlopeAtKnots []float64 `json:"slope_at_knots"`
	Between      struct{ X, Y, Y1, Y2 []float64 }
}

// Reference: SciPy's PchipInterpolator, testdata/shape.py.
func TestShapeAgainstReference(t *testing.T) {
	var file struct{ Cases []shapeCase }
	load(t, "shape.json", &file)
	if len(file.Cases) < 6 {
		t.Fatalf("%d cases in shape.json, want 6", len(file.Cases))
	}
	for _, c := range file.Cases {
		s, err := NewShape(c.X, c.Y)
		if err != nil {
			t.Fatal(err)
		}
		for i, x := range c.Between.X {
			y, y1, y2 := s.At(x)
			near(t, c.Name+" value", y, c.Between.Y[i], 1e-12)
			near(t, c.Name+" slope", y1, c.Between.Y1[i], 1e-11)
			near(t, c.Name+" second derivative", y2, c.Between.Y2[i], 1e-10)
		}
		for i, x := range c.X {
			y, y1, _ := s.At(x)
			near(t, c.Name+" value at a knot", y, c.Y[i], 1e-12)
			near(t, c.Name+" slope at a knot", y1, c.SlopeAtKnots[i], 1e-11)
		}
	}
}

// Reach is the inverse of At; outside the enclosed values it says so.
func TestReach(t *testing.T) {
	s, err := NewShape([]float64{0, 1, 2, 3}, []float64{2, 3, 9, 9.5})
	if err != nil {
		t.Fatal(err)
	}
	x, ok := s.Reach(5, 1, 2)
	if !ok {
		t.Fatal("5 lies between 3 and 9")
	}
	y, _, _ := s.At(x)
	near(t, "value at the place reached", y, 5, 1e-12)
	if _, ok := s.Reach(1, 0, 3); ok {
		t.Error("1 lies below every value")
	}
}

func TestNewShapeRefuses(t *testing.T) {
	for name, c := range map[string]struct{ x, y []float64 }{
		"one point":  {[]float64{1}, []float64{1}},
		"lengths":    {[]float64{1, 2}, []float64{1}},
		"repeated x": {[]float64{1, 1}, []float64{1, 2}},
		"NaN":        {[]float64{1, 2}, []float64{1, math.NaN()}},
	} {
		if _, err := NewShape(c.x, c.y); err == nil {
			t.Errorf("%s: accepted", name)
		}
	}
}
