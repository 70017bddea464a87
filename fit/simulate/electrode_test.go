package simulate

import (
	"math"
	"testing"
)

// curve is Run for titrations that must work.
func curve(t *testing.T, run Titration, seed uint64) (Curve, Truth) {
	t.Helper()
	c, truth, err := run.Run(seed)
	if err != nil {
		t.Fatal(err)
	}
	return c, truth
}

// An ideal electrode and burette give the exact curve back.
func TestIdealElectrode(t *testing.T) {
	run := weakStrong()
	c, truth := curve(t, run, 1)
	for i, v := range c.VolumesML {
		near(t, "reading", c.Readings[i], truth.Exact[i], 0)
		near(t, "reading", c.Readings[i], at(t, run, v), 0)
	}
}

// By hand: slope 0.98 and offset 0.03 turn pH 7 into 7.03 and pH 2 into
// 7 + 0.98 (2 - 7) + 0.03 = 2.13. The display shows steps of 0.01.
func TestSlopeOffsetDisplay(t *testing.T) {
	e := Electrode{Slope: 0.98, Offset: 0.03}
	near(t, "pH 7", e.reading(PH, 7, 25), 7.03, 1e-12)
	near(t, "pH 2", e.reading(PH, 2, 25), 2.13, 1e-12)
	near(t, "back", e.decades(PH, 2.13, 25), 2, 1e-12)
	near(t, "back, mV", e.decades(Potential, e.reading(Potential, -5, 25), 25), -5, 1e-12)
	near(t, "rounded to 0.01", rounded(3.21499, 0.01), 3.21, 0)
	near(t, "rounded to 0.1", rounded(-12.36, 0.1), -12.4, 0)
	near(t, "rounded to 0.05", rounded(3.22, 0.05), 3.2, 1e-12)
	near(t, "not rounded", rounded(3.21499, 0), 3.21499, 0)
}

// Law: y(i) = t(i) + L (y(i-1) - t(i)); with L = 0.4 a step of 1 is seen as
// 0.6, 0.84, 0.936 (by hand).
func TestLag(t *testing.T) {
	s := sense{electrode: Electrode{Slope: 1, Lag: 0.4}, unit: 1}
	near(t, "start", s.read(4, still()), 4, 0)
	for _, want := range []float64{4.6, 4.84, 4.936} {
		near(t, "after a step of 1", s.read(5, still()), want, 1e-12)
	}
	run := weakStrong()
	run.Electrode.Lag = 0.4
	c, truth := curve(t, run, 1)
	for i := 1; i < len(c.Readings); i++ {
		near(t, "lagging", c.Readings[i], truth.Exact[i]+0.4*(c.Readings[i-1]-truth.Exact[i]), 1e-12)
	}
}

// The spread of many readings is the noise asked for: the sd of n values is
// known to 1/sqrt(2n), 4 % here at three of those.
func TestNoise(t *testing.T) {
	for _, c := range []struct {
		run  Titration
		want float64 // sd of a reading in its unit, at 25 °C
	}{
		{weakStrong(), 0.003},
		{silverChloride(), 0.003 * 59.159},
	} {
		c.run.Electrode.NoiseSD = 0.003
		c.run.Dosing.FixedML = 15.0 / 3000
		got, truth := curve(t, c.run, 4)
		sum, n := 0.0, 0
		for i, y := range got.Readings {
			sum += (y - truth.Exact[i]) * (y - truth.Exact[i])
			n++
		}
		near(t, "noise sd / asked", math.Sqrt(sum/float64(n))/c.want, 1, 3/math.Sqrt(2*float64(n)))
	}
	run := conductance(Solution{Spectators: []Spectator{{"Cl-", 0.01}}}, Solution{Spectators: []Spectator{{"Na+", 0.1}}})
	run.Electrode.NoiseSD = 0.001
	run.Dosing = Dosing{FixedML: 0.01, StopML: 20}
	got, truth := curve(t, run, 4)
	sum := 0.0
	for i, y := range got.Readings {
		sum += (y/truth.Exact[i] - 1) * (y/truth.Exact[i] - 1)
	}
	near(t, "relative noise sd / asked", math.Sqrt(sum/float64(len(got.Readings)))/0.001, 1, 0.05)
}
