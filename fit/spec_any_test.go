package fit_test

import (
	"fmt"
	"math"
	"math/rand/v2"
	"testing"

	"lastdrop/fit"
	"lastdrop/fit/simulate"
)

// anyTitration is a titration of a family as a laboratory might set it up:
// 0.002 to 0.1 mol/L, the first endpoint at 2 to 25 mL, 0.001 to 0.01 decades
// of noise, displays of 0.01 or 0.001 pH, electrodes of 95 to 101 %, doses of
// 0.5 to 2.5 % of the endpoint or by the slope.
func anyTitration(fam family, seed uint64) simulate.Titration {
	g := rand.New(rand.NewPCG(seed, 9))
	amount, end := math.Pow(10, -1+1.7*g.Float64()), 2+23*g.Float64()
	s := fam.make(amount)
	s.V0ML = 30 + 90*g.Float64()
	for i := range s.Titrant.Spectators {
		s.Titrant.Spectators[i].MolPerL = 0.02 * amount * s.V0ML / end
	}
	s.Electrode.NoiseSD, s.Electrode.Slope = 0.001*math.Pow(10, g.Float64()), 0.95+0.06*g.Float64()
	if g.IntN(2) == 1 {
		s.Electrode.DisplayStep /= 10
	}
	s.Dosing.StopML = end * float64(fam.ends) * (1.15 + 0.5*g.Float64())
	if g.IntN(3) > 0 {
		s.Dosing.FixedML = end * (0.005 + 0.02*g.Float64())
		return s
	}
	s.Dosing.ChangePerDose, s.Dosing.LargestML = 0.1+0.4*g.Float64(), 0.2+0.4*g.Float64()
	s.Dosing.SmallestML = []float64{0.005, 0.01, 0.02, 0.05}[g.IntN(4)]
	if s.Signal == simulate.Potential {
		s.Dosing.ChangePerDose *= 59.16
	}
	return s
}

// The number of endpoints, and the interval, of titrations of every kind: 99
// and 93 % (numerics §5), and nothing wrong by more than a limit and a bracket
// in silence.
func TestAnyTitration(t *testing.T) {
	t.Parallel()
	for _, fam := range potentiometric() {
		var right, covers rate
		var percent []float64
		for seed := uint64(1); seed <= 100; seed++ {
			c, truth := run(t, anyTitration(fam, seed), seed)
			r := evaluate(t, c, "")
			right.add(len(r.Endpoints) == fam.ends)
			for k, e := range r.Endpoints {
				if len(r.Endpoints) != fam.ends {
					continue
				}
				want := truth.InflectionsML[k]
				covers.add(e.Low <= want && want <= e.High)
				percent = append(percent, 100*math.Abs(e.V-want)/want)
				allowed := max(fit.Defaults().Agreement(want), c.V[e.Bracket[1]]-c.V[e.Bracket[0]]) + slack
				if math.Abs(e.V-want) > allowed && heaviest(r) < fit.Doubtful {
					t.Errorf("%s, seed %d: endpoint%s, truth %.4f mL, in silence; reading %.2f, bracket reads %g to %g", fam.name, seed, places(r), want, e.Reading, c.Y[e.Bracket[0]], c.Y[e.Bracket[1]])
				}
			}
		}
		t.Logf("%s: number right %v, covers %v, median error %.4f %%", fam.name, right, covers, median(percent))
		right.credible(t, fam.name+", number of endpoints", 99)
		covers.credible(t, fmt.Sprintf("%s, 95 %% interval", fam.name), 93)
	}
}
