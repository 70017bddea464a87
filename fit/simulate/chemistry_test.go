package simulate

import (
	"math"
	"testing"
)

// strongStrong is 50 mL of 0.02 mol/L hydrochloric acid with 0.1 mol/L sodium
// hydroxide: 10 mL to the equivalence point.
func strongStrong() Titration {
	return Titration{
		Signal: PH, V0ML: 50, TemperatureC: 25, Electrode: Ideal(),
		Vessel:  Solution{Spectators: []Spectator{{"Cl-", 0.02}}},
		Titrant: Solution{Spectators: []Spectator{{"Na+", 0.1}}},
		Ends:    []End{{}},
		Dosing:  Dosing{FixedML: 0.5, StopML: 15},
	}
}

// weakStrong is 60 mL of 0.02 mol/L acetic acid with 0.1 mol/L sodium
// hydroxide: 12 mL to the equivalence point.
func weakStrong() Titration {
	t := strongStrong()
	t.V0ML, t.Vessel, t.Ends = 60, Solution{Groups: []Group{Acetic(0.02)}}, []End{{Levels: []int{1}}}
	return t
}

// silverChloride is 60 mL of 0.02 mol/L sodium chloride with 0.1 mol/L silver
// nitrate: 12 mL to the equivalence point.
func silverChloride() Titration {
	t := strongStrong()
	t.Signal, t.V0ML = Potential, 60
	t.Vessel = Solution{Spectators: []Spectator{{"Na+", 0.02}, {"Cl-", 0.02}}}
	t.Titrant = Solution{Spectators: []Spectator{{"Ag+", 0.1}, {"NO3-", 0.1}}}
	t.Salts = []Salt{{"Cl-", PKspAgCl}}
	return t
}

// at is Reading for volumes that must work.
func at(t *testing.T, run Titration, volumeML float64) float64 {
	t.Helper()
	y, err := run.Reading(volumeML)
	if err != nil {
		t.Fatal(err)
	}
	return y
}

// Closed form: with excess acid C, h = (C + sqrt(C2 + 4 Kw))/2.
func TestStrongAcidStrongBase(t *testing.T) {
	run := strongStrong()
	kw := math.Pow(10, -13.995) // 25 °C, [mf]
	for _, v := range []float64{0, 1, 5, 9, 9.9, 9.99, 10.01, 10.1, 11, 20} {
		excess := (50*0.02 - 0.1*v) / (50 + v)
		h := (excess + math.Sqrt(excess*excess+4*kw)) / 2
		if excess < 0 {
			h = 2 * kw / (-excess + math.Sqrt(excess*excess+4*kw))
		}
		near(t, "pH", at(t, run, v), -math.Log10(h), 1e-10)
	}
	// Half titrated: 0.5 mmol in 55 mL, pH = 2.0414 (hand arithmetic).
	near(t, "pH at half", at(t, run, 5), 2.0414, 0.0001)
	// At the equivalence point pH = pKw/2 at any temperature: 13.995/2, and 13.275/2 at 50 °C.
	near(t, "pH at equivalence", at(t, run, 10), 6.9975, 1e-9)
	run.TemperatureC = 50
	near(t, "pH at equivalence, 50 °C", at(t, run, 10), 6.6375, 1e-9)
	// Far past it the base counts: 1 mmol in 70 mL, pOH 1.8451, pH = 13.995 - 1.8451.
	run.TemperatureC = 25
	near(t, "pH at 20 mL", at(t, run, 20), 12.1499, 0.0001)
}

// The limit of Henderson and Hasselbalch: in a concentrated buffer the pH is
// pKa + log (base/acid).
func TestBufferLimit(t *testing.T) {
	run := weakStrong()
	run.Vessel, run.Titrant = Solution{Groups: []Group{Acetic(2)}}, Solution{Spectators: []Spectator{{"Na+", 10}}}
	// 2 mol/L x 60 mL / 10 mol/L = 12 mL; at 3, 6, 9 mL the ratio is 1/3, 1, 3.
	near(t, "pH at a quarter", at(t, run, 3), 4.756-math.Log10(3), 1e-4)
	near(t, "pH at half", at(t, run, 6), 4.756, 1e-4)
	near(t, "pH at three quarters", at(t, run, 9), 4.756+math.Log10(3), 1e-4)
	// Weak acid alone: h2 = Ka (c - h), Ka = 10^-4.756, c = 0.02: h = 5.8357e-4, pH 3.2339 (hand arithmetic).
	near(t, "pH of 0.02 mol/L", at(t, weakStrong(), 0), 3.2339, 0.0001)
}

func TestPKw(t *testing.T) {
	for _, c := range []struct{ temperature, want, tol float64 }{
		{0, 14.938, 1e-12}, {25, 13.995, 1e-12}, {50, 13.275, 1e-12}, {100, 12.265, 1e-12}, // the table of [mf]
		{0, 14.946, 0.016}, {50, 13.264, 0.016}, {75, 12.696, 0.0165}, {100, 12.252, 0.016}, // IAPWS R11-07, as in the CRC Handbook
		// Cubic between 20 and 25 °C by hand: (9 (14.163 + 13.995) - 14.340 - 13.836) / 16.
		{22.5, 14.077875, 1e-9},
	} {
		got, err := PKw(c.temperature)
		if err != nil {
			t.Fatal(err)
		}
		near(t, "pKw", got, c.want, c.tol)
	}
	for _, wrong := range []float64{-0.1, 100.1, math.NaN()} {
		if _, err := PKw(wrong); err == nil {
			t.Errorf("pKw at %g °C: no error", wrong)
		}
	}
}

// Silver: with excess chloride x = [Ag] = Ksp/[Cl]; at the equivalence point
// pAg = pKsp/2 exactly; past it the excess counts.
func TestSilverChloride(t *testing.T) {
	run := silverChloride()
	perDecade := 59.159 // mV at 25 °C: R T ln10 / F, CODATA
	near(t, "mV at equivalence", at(t, run, 12), -9.75/2*perDecade, 0.01)
	// 16 mL: 0.4 mmol in 76 mL, log = -2.27875 (hand arithmetic; solubility adds 1e-6 of it).
	near(t, "mV at 16 mL", at(t, run, 16), -2.27875*perDecade, 0.01)
	// 0 mL: saturated by the coat, log Ksp - log 0.02 = -9.75 + 1.69897.
	near(t, "mV at 0 mL", at(t, run, 0), -8.05103*perDecade, 0.01)
	run.Electrode.Offset, run.Electrode.Slope = 550, 0.98
	near(t, "mV, other electrode", at(t, run, 12), 550-0.98*9.75/2*perDecade, 0.01)
}
