package fit_test

import (
	"fmt"
	"math"
	"math/rand/v2"
	"testing"

	"lastdrop/fit"
)

// bent is a strong acid's conductivity, 41 readings over 20 mL with a sharp
// break near 10, one arm of which is bowed: by so many mS/cm in its middle, on
// an arm of 3 (falling) or 2.3 mS/cm.
func bent(seed uint64, falling bool, bow, noise float64) (c *fit.Curve, breakML float64) {
	g := rand.New(rand.NewPCG(seed, 2))
	b := 10 + 0.3*(fraction(seed)-0.5)
	c = &fit.Curve{Signal: fit.Conductivity, V0: 100, Expected: true, StepV: 0.001, StepY: 0.001}
	for i := range 41 {
		v := 0.5 * float64(i)
		y, x := 1.2+0.3*(b-v), (b-v)/b
		if v > b {
			y, x = 1.2+0.23*(v-b), (v-b)/b
		}
		if falling == (v < b) {
			y += 4 * bow * x * (1 - x)
		}
		y *= 100 / (100 + v) * (1 + noise*g.NormFloat64())
		c.V, c.Y = append(c.V, v), append(c.Y, math.Round(y*1000)/1000)
	}
	return c, b
}

// twoLineWeights checks wide-interval and poor-fit of every break against the
// rules: half-width (of an interval that is not even, the larger one) above the
// limit, disputed above twice; jackknife above a third of the limit, disputed
// above it.
func twoLineWeights(t *testing.T, what string, r *fit.Result) {
	t.Helper()
	for k, e := range r.Endpoints {
		limit := max(0.005*e.V, 0.010) // numerics §4
		wantFlag(t, what, r, "wide-interval", k+1, byTwo(max(e.High-e.V, e.V-e.Low), limit, 2*limit))
		wantFlag(t, what, r, "poor-fit", k+1, byTwo(e.Moves, limit/3, limit))
	}
}

// Numerics §4: a wrong result (off by more than 0.5 %) carries some flag in 80
// % at least; and wide-interval and poor-fit stand exactly where their rules
// put them. Bent arms, from hardly to badly.
func TestBentArmIsNotSilent(t *testing.T) {
	t.Parallel()
	var spoken, told rate
	for _, side := range []string{"falling arm", "rising arm"} {
		for _, bow := range []float64{0.01, 0.025, 0.05, 0.1} {
			for _, noise := range []float64{0.0005, 0.002} {
				var off, silent rate
				for seed := uint64(1); seed <= 40; seed++ {
					c, b := bent(seed, side == "falling arm", bow, noise)
					r := evaluate(t, c, "")
					twoLineWeights(t, fmt.Sprintf("%s bowed by %g mS/cm, noise %g, seed %d", side, bow, noise, seed), r)
					wrong := len(r.Endpoints) != 1 || math.Abs(r.Endpoints[0].V-b) > 0.005*b
					off.add(wrong)
					if wrong {
						silent.add(heaviest(r) < fit.Doubtful)
						spoken.add(heaviest(r) >= fit.Doubtful)
					}
					if bow == 0.1 {
						told.add(len(flagged(r, "poor-fit"))+len(flagged(r, "wide-interval")) > 0)
					}
				}
				t.Logf("%s bowed by %g mS/cm, noise %g: off by more than 0.5 %% %v, of them silent %v", side, bow, noise, off, silent)
			}
		}
	}
	t.Logf("flag on a wrong break: %v; worst bow, poor-fit or wide-interval: %v", spoken, told)
	spoken.credible(t, "flag on a wrong break of bent arms", 80)
}

// Noise widens the interval: the flags stand where their rules put them, the
// interval covers, and nothing wrong is silent.
func TestNoisyConductivities(t *testing.T) {
	t.Parallel()
	var wide, spoken rate
	for _, fam := range conductometric() {
		for _, noise := range []float64{0.001, 0.003, 0.01, 0.03} {
			var covers rate
			for _, w := range evenWays() {
				for seed := uint64(1); seed <= 15; seed++ {
					s := w.dose(fam.make(sample(seed)))
					s.Electrode.NoiseSD = noise
					c, truth := run(t, s, seed)
					r := evaluate(t, c, "")
					what := fmt.Sprintf("%s, noise %g, %s, seed %d", fam.name, noise, w.name, seed)
					twoLineWeights(t, what, r)
					if len(r.Endpoints) == 0 {
						saysNoEndpoint(t, what, c, r)
						continue
					}
					e, want := r.Endpoints[0], truth.EndpointsML[0]
					covers.add(e.Low <= want && want <= e.High)
					wide.add(len(flagged(r, "wide-interval")) > 0)
					if math.Abs(e.V-want) > 0.005*want {
						spoken.add(heaviest(r) >= fit.Doubtful)
					}
				}
			}
			t.Logf("%s, noise %g: covers %v", fam.name, noise, covers)
			covers.credible(t, fmt.Sprintf("%s, noise %g, 95 %% interval", fam.name, noise), 93)
		}
	}
	t.Logf("wide-interval: %v; flag on a wrong break: %v", wide, spoken)
	spoken.atLeast(t, "flag on a wrong break of noisy curves", 80)
	if wide.n == 0 {
		t.Error("no interval was wide")
	}
}
