package fit_test

import (
	"fmt"
	"testing"

	"lastdrop/fit"
	"lastdrop/fit/simulate"
)

// weakAcidCurve is acetic acid with NaOH 0.1 mol/L, endpoint near 10 mL, in
// so many even increments.
func weakAcidCurve(b *testing.B, readings int) *fit.Curve {
	b.Helper()
	t := simulate.Titration{
		Signal: simulate.PH, V0ML: 60, TemperatureC: 25,
		Vessel:    simulate.Solution{Groups: []simulate.Group{simulate.Acetic(1.003 / 60)}},
		Titrant:   simulate.Solution{Spectators: []simulate.Spectator{{Ion: "Na+", MolPerL: 0.1}}},
		Ends:      []simulate.End{{Levels: []int{1}}},
		Electrode: simulate.Electrode{Slope: 0.99, NoiseSD: 0.003, DisplayStep: 0.001},
		Burette:   simulate.Burette{ErrorSDML: 0.0012, DisplayStep: 0.001},
	}
	t.Dosing = simulate.Dosing{FixedML: 15 / float64(readings-1), StopML: 15}
	c, _, err := t.Run(1)
	if err != nil {
		b.Fatal(err)
	}
	return &fit.Curve{V: c.VolumesML, Y: c.Readings, Signal: fit.PH, StepV: 0.001, StepY: 0.001, Expected: true}
}

func BenchmarkDerivative(b *testing.B) {
	for _, n := range []int{63, 400} {
		c := weakAcidCurve(b, n)
		b.Run(fmt.Sprint(n), func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				r, err := fit.Evaluate(c, fit.Derivative, fit.Defaults())
				if err != nil || len(r.Endpoints) != 1 {
					b.Fatalf("%d endpoints, %v; want 1", len(r.Endpoints), err)
				}
			}
		})
	}
}

func BenchmarkTwoLine(b *testing.B) {
	for _, n := range []int{63, 400} {
		c := &fit.Curve{Signal: fit.Conductivity, V0: 100, Expected: true}
		for i := range n {
			v := 20 * float64(i) / float64(n-1)
			y := 4 - 0.3*v
			if v > 10 {
				y = 1 + 0.2*(v-10)
			}
			wave := 0.001 * float64(i%3-1)
			c.V, c.Y = append(c.V, v), append(c.Y, y*100/(100+v)+wave)
		}
		b.Run(fmt.Sprint(n), func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				r, err := fit.Evaluate(c, fit.TwoLine, fit.Defaults())
				if err != nil || len(r.Endpoints) != 1 {
					b.Fatalf("%d endpoints, %v; want 1", len(r.Endpoints), err)
				}
			}
		})
	}
}
