package published

import (
	"encoding/json"
	"math"
	"testing"
)

// Dickson (1981), Table 1 and its equation with f = W0/(W0+w): it holds for every
// row. What is left over, divided by its derivative with pH, must be below
// half a unit of the sixth decimal.
func TestSeawaterFollowsItsEquation(t *testing.T) {
	v, ph := curve(t, table(t, "seawater").Dump)
	if len(v) != 51 {
		t.Fatalf("%d rows, want 51", len(v))
	}
	for i := range v {
		const step = 1e-5
		slope := (seawaterRest(v[i], ph[i]+step) - seawaterRest(v[i], ph[i]-step)) / (2 * step)
		near(t, "pH", ph[i]-seawaterRest(v[i], ph[i])/slope, ph[i], 5.1e-7)
	}
}

// seawaterRest is left minus right side of the published equation, mol/kg.
func seawaterRest(w, ph float64) float64 {
	const (
		at, ct, bt, st, ft     = 0.00245, 0.00220, 0.00042, 0.02824, 0.00007
		k1, k2, kb, kw, ks, kf = 1.00e-6, 8.20e-10, 1.78e-9, 4.32e-14, 1 / 12.3, 1. / 408
		w0, c                  = 200, 0.3
	)
	h, f := math.Pow(10, -ph), w0/(w0+w)
	left := f*ct*(k1*h+2*k1*k2)/(h*h+k1*h+k1*k2) + f*bt*kb/(kb+h) + kw/h - h - f*st*h/(ks+h) - f*ft*h/(kf+h)
	return left - (w0*at-w*c)/(w0+w)
}

// inflections is testdata/inflections.json.
type inflections struct {
	Seawater   extremes `json:"seawater"`
	DiluteAcid extremes `json:"dilute_acid"`
}

type extremes struct {
	Table struct {
		RMS     float64 `json:"rms_ph"`
		Largest float64 `json:"largest_ph"`
	} `json:"table_from_curve"`
	Extremes []struct {
		Volume float64 `json:"volume_ml"`
		Slope  float64 `json:"slope_per_ml"`
	} `json:"slope_extremes"`
}

// The answers are those of the committed script, rounded to 1e-6 mL.
func TestSeawaterInflections(t *testing.T) {
	var ref inflections
	load(t, "inflections.json", &ref)
	e := ref.Seawater.Extremes
	if len(e) != 3 {
		t.Fatalf("%d extremes of the slope, want maximum, minimum, maximum", len(e))
	}
	a := table(t, "seawater").Answers
	near(t, "first inflection", a[0].VolumeML, e[0].Volume, 5.1e-7)
	near(t, "second inflection", a[1].VolumeML, e[2].Volume, 5.1e-7)
	near(t, "equivalence", a[2].VolumeML, 200*0.00245/0.3, 5.1e-7) // Dickson (1981): W0 AT / C
}

// The dilute acid's slope has a maximum, but one that nobody could see; the
// figures in Table.Hard are those of the committed script.
func TestDiluteAcidIsFlat(t *testing.T) {
	var ref inflections
	load(t, "inflections.json", &ref)
	e := ref.DiluteAcid.Extremes
	if len(e) != 2 {
		t.Fatalf("%d extremes of the slope, want minimum and maximum", len(e))
	}
	near(t, "highest slope", e[1].Slope, 0.340, 0.0006)
	near(t, "contrast", e[1].Slope/e[0].Slope, 1.09, 0.006)
	near(t, "stoichiometry", 49.94*1.02e-4/1.004e-3, table(t, "dilute-acid").Answers[0].VolumeML, 5e-5)
}

// twoLine is one object of testdata/two_line.json.
type twoLine struct {
	Ranges      [2][2]float64 `json:"ranges_ml"`
	Break       float64       `json:"break_ml"`
	Uncorrected float64       `json:"uncorrected_ml"`
	Least       float64       `json:"least_ml"`
	Most        float64       `json:"most_ml"`
}

// Expected: dilution-corrected and uncorrected results of two lines with fixed
// ranges, worked out apart from this project's code and kept to 0.001 mL. The
// committed script gives the same; its spread over other arms lies inside the
// tolerances.
func TestTwoLineAnswers(t *testing.T) {
	var ref map[string]json.RawMessage
	load(t, "two_line.json", &ref)
	for _, c := range []struct {
		name      string
		corrected []float64
		raw       []float64
	}{
		{"conductance-strong", []float64{10.000}, []float64{9.792}},
		{"conductance-weak", []float64{9.988}, []float64{9.705}},
		{"conductance-mixture", []float64{4.054, 11.969}, []float64{3.965, 11.793}},
		{"conductance-silver", []float64{10.000}, []float64{9.795}},
	} {
		var breaks []twoLine
		if err := json.Unmarshal(ref[c.name], &breaks); err != nil || len(breaks) != len(c.corrected) {
			t.Fatalf("%s: %d breaks, error %v; want %d", c.name, len(breaks), err, len(c.corrected))
		}
		v, y := curve(t, table(t, c.name).Dump)
		for i, g := range breaks {
			near(t, c.name+", script", g.Break, c.corrected[i], 0.00051)
			near(t, c.name+", script, uncorrected", g.Uncorrected, c.raw[i], 0.00051)
			near(t, c.name+", dump", crossing(v, corrected(v, y), g.Ranges), c.corrected[i], 0.00051)
			near(t, c.name+", dump, uncorrected", crossing(v, y, g.Ranges), c.raw[i], 0.00051)
			checkSpread(t, table(t, c.name), i+1, g)
		}
	}
}

// checkSpread asks that the spread over other arms lies inside the tolerance
// of the two-line answer and of the truth.
func checkSpread(t *testing.T, tb Table, endpoint int, g twoLine) {
	t.Helper()
	for _, a := range tb.Answers {
		if a.Endpoint == endpoint {
			near(t, tb.Name+", least of other arms", g.Least, a.VolumeML, a.ToleranceML)
			near(t, tb.Name+", most of other arms", g.Most, a.VolumeML, a.ToleranceML)
		}
	}
}

// corrected takes off the dilution; 100 mL before titration.
func corrected(v, y []float64) []float64 {
	c := make([]float64, len(y))
	for i := range y {
		c[i] = y[i] * (100 + v[i]) / 100
	}
	return c
}

// crossing fits a line by least squares to each range and returns where they
// meet.
func crossing(v, y []float64, ranges [2][2]float64) float64 {
	var a, b [2]float64
	for k, r := range ranges {
		var n, sx, sy, sxx, sxy float64
		for i := range v {
			if v[i] < r[0]-1e-9 || v[i] > r[1]+1e-9 {
				continue
			}
			n, sx, sy, sxx, sxy = n+1, sx+v[i], sy+y[i], sxx+v[i]*v[i], sxy+v[i]*y[i]
		}
		b[k] = (n*sxy - sx*sy) / (n*sxx - sx*sx)
		a[k] = (sy - b[k]*sx) / n
	}
	return (a[1] - a[0]) / (b[0] - b[1])
}
