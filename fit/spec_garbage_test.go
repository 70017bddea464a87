package fit_test

import (
	"encoding/binary"
	"fmt"
	"maps"
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"lastdrop/fit"
)

// unsound lists what no result may be, whatever the readings: numbers that are
// not finite, limits on the wrong side, brackets outside the curve, a reading
// that is neither used nor left out.
func unsound(c *fit.Curve, r *fit.Result) (faults []string) {
	say := func(format string, a ...any) { faults = append(faults, fmt.Sprintf(format, a...)) }
	before := math.Inf(-1)
	for k, e := range r.Endpoints {
		for _, x := range append([]fit.Estimate{e.Estimate}, e.Estimates...) {
			faults = append(faults, unsoundEstimate(c, x)...)
		}
		if e.V < before {
			say("endpoint %d at %g mL stands after one at %g mL", k+1, e.V, before)
		}
		before = e.V
	}
	if math.IsNaN(r.Noise) || math.IsInf(r.Noise, 0) || r.Noise < 0 {
		say("noise %g", r.Noise)
	}
	faults = append(faults, unsoundUse(c, r)...)
	return append(faults, unsoundFlags(c, r)...)
}

// unsoundUse checks that every reading is used or left out, once, and that the
// used ones rise in volume.
func unsoundUse(c *fit.Curve, r *fit.Result) (faults []string) {
	say := func(format string, a ...any) { faults = append(faults, fmt.Sprintf(format, a...)) }
	places := slices.Clone(r.Used)
	for _, l := range r.LeftOut {
		places = append(places, l.At)
	}
	slices.Sort(places)
	for i, at := range places {
		if at != i || len(places) != len(c.V) {
			say("%d readings used or left out of %d, the first wrong one %d at place %d", len(places), len(c.V), at, i)
			break
		}
	}
	for k := 1; k < len(r.Used); k++ {
		if c.V[r.Used[k]] <= c.V[r.Used[k-1]] {
			say("used volumes do not rise at reading %d", r.Used[k])
		}
	}
	if len(r.Residuals) != len(r.Used) {
		say("%d residuals of %d readings used", len(r.Residuals), len(r.Used))
	}
	return faults
}

func unsoundEstimate(c *fit.Curve, x fit.Estimate) (faults []string) {
	say := func(format string, a ...any) { faults = append(faults, x.Estimator+": "+fmt.Sprintf(format, a...)) }
	for what, y := range map[string]float64{"V": x.V, "U": x.U, "low": x.Low, "high": x.High, "reading": x.Reading, "rise": x.Rise, "moves": x.Moves, "contrast": x.Contrast} {
		if math.IsNaN(y) || math.IsInf(y, 0) {
			say("%s is %g", what, y)
		}
	}
	if !(x.Low <= x.V && x.V <= x.High) {
		say("%g mL is not within %g to %g", x.V, x.Low, x.High)
	}
	if !(x.U > 0) {
		say("U is %g", x.U)
	}
	a, b := x.Bracket[0], x.Bracket[1]
	if a < 0 || b < 0 || a >= len(c.V) || b >= len(c.V) {
		say("bracket %d, %d of %d readings", a, b, len(c.V))
	} else if !(c.V[a] <= x.V && x.V <= c.V[b]) {
		say("%g mL is not within its bracket %g to %g", x.V, c.V[a], c.V[b])
	}
	return faults
}

// unsoundFlags checks that flags point into the result, have a weight, and
// that finite figures stand beside finite limits.
func unsoundFlags(c *fit.Curve, r *fit.Result) (faults []string) {
	say := func(format string, a ...any) { faults = append(faults, fmt.Sprintf(format, a...)) }
	for _, f := range r.Flags {
		if f.Weight != fit.Note && f.Weight != fit.Doubtful && f.Weight != fit.Disputed {
			say("%s has weight %d", f.Name, f.Weight)
		}
		if f.Endpoint < 0 || f.Endpoint > len(r.Endpoints) {
			say("%s speaks of endpoint %d of %d", f.Name, f.Endpoint, len(r.Endpoints))
		}
		for _, x := range []float64{f.Figure, f.Limit} {
			if math.IsNaN(x) || math.IsInf(x, 0) {
				say("%s compares %g with %g", f.Name, f.Figure, f.Limit)
			}
		}
		for _, i := range f.At {
			if i < 0 || i >= len(c.V) {
				say("%s points to reading %d of %d", f.Name, i, len(c.V))
			}
		}
	}
	return faults
}

// withstands evaluates a curve by every estimator; an error is as good as a
// result without fault.
func withstands(t *testing.T, what string, c *fit.Curve) {
	t.Helper()
	for _, estimator := range append(fit.Estimators(), "") {
		r, err := fit.Evaluate(c, estimator, fit.Defaults())
		if err != nil {
			continue
		}
		for _, f := range unsound(c, r) {
			t.Errorf("%s, %d readings, by %q: %s", what, len(c.V), estimator, f)
		}
	}
}

// garbage makes volumes and readings that no titration ever gave.
var garbage = map[string]func(g *rand.Rand, n int) (v, y []float64){
	"noise": func(g *rand.Rand, n int) (v, y []float64) {
		return rising(g, n), filled(n, func(int) float64 { return 7 + 3*g.NormFloat64() })
	},
	"constant": func(g *rand.Rand, n int) (v, y []float64) {
		return rising(g, n), filled(n, func(int) float64 { return 7 })
	},
	"decreasing volumes": func(g *rand.Rand, n int) (v, y []float64) {
		v = rising(g, n)
		slices.Reverse(v)
		return v, filled(n, func(i int) float64 { return 2 + 10*float64(i)/float64(n) })
	},
	"shuffled volumes": func(g *rand.Rand, n int) (v, y []float64) {
		v = rising(g, n)
		g.Shuffle(n, func(i, j int) { v[i], v[j] = v[j], v[i] })
		return v, filled(n, func(int) float64 { return 14 * g.Float64() })
	},
	"huge readings": func(g *rand.Rand, n int) (v, y []float64) {
		return rising(g, n), filled(n, func(int) float64 { return 1e300 * g.NormFloat64() })
	},
	"huge volumes": func(g *rand.Rand, n int) (v, y []float64) {
		return filled(n, func(i int) float64 { return 1e300 * float64(i) / 400 }), filled(n, func(int) float64 { return 14 * g.Float64() })
	},
	"huge both": func(g *rand.Rand, n int) (v, y []float64) {
		return filled(n, func(i int) float64 { return 1e300 * float64(i) / 400 }), filled(n, func(i int) float64 { return -1e300 * float64(i%3) })
	},
	"tiny volumes": func(g *rand.Rand, n int) (v, y []float64) {
		return filled(n, func(i int) float64 { return 5e-324 * float64(i) }), filled(n, func(i int) float64 { return float64(i) })
	},
	"two readings alternating": func(g *rand.Rand, n int) (v, y []float64) {
		return rising(g, n), filled(n, func(i int) float64 { return 4 + 5*float64(i%2) })
	},
	"step": func(g *rand.Rand, n int) (v, y []float64) {
		at := g.IntN(n)
		return rising(g, n), filled(n, func(i int) float64 { return 3 + 8*float64(min(1, max(0, i-at))) })
	},
	"steps": func(g *rand.Rand, n int) (v, y []float64) {
		return rising(g, n), filled(n, func(i int) float64 { return float64(2 + i*6/n*2) })
	},
	"one volume": func(g *rand.Rand, n int) (v, y []float64) {
		return filled(n, func(int) float64 { return 3 }), filled(n, func(i int) float64 { return float64(i) })
	},
	"few volumes": func(g *rand.Rand, n int) (v, y []float64) {
		return filled(n, func(i int) float64 { return float64(i * 4 / n) }), filled(n, func(int) float64 { return 14 * g.Float64() })
	},
	"negative volumes": func(g *rand.Rand, n int) (v, y []float64) {
		return filled(n, func(i int) float64 { return -5 + 10*float64(i)/float64(n) }), filled(n, func(i int) float64 { return 7 + 4*math.Tanh(float64(i-n/2)) })
	},
	"zeros": func(g *rand.Rand, n int) (v, y []float64) {
		return rising(g, n), filled(n, func(int) float64 { return 0 })
	},
	"wide spread": func(g *rand.Rand, n int) (v, y []float64) {
		x := 0.0
		return filled(n, func(int) float64 { x += math.Pow(10, 12*g.Float64()-9); return x }),
			filled(n, func(int) float64 { return math.Pow(10, 20*g.Float64()-10) })
	},
}

func filled(n int, f func(int) float64) []float64 {
	x := make([]float64, n)
	for i := range x {
		x[i] = f(i)
	}
	return x
}

// rising are volumes in uneven steps.
func rising(g *rand.Rand, n int) []float64 {
	x := 0.0
	return filled(n, func(int) float64 { x += 0.01 + 0.3*g.Float64(); return x })
}

func TestGarbageGivesNoNonsense(t *testing.T) {
	end := 7.0
	for _, kind := range slices.Sorted(maps.Keys(garbage)) {
		for seed := uint64(1); seed <= 20; seed++ {
			g := rand.New(rand.NewPCG(seed, 5))
			v, y := garbage[kind](g, 5+int(395*fraction(seed)*fraction(seed)))
			for signal := fit.PH; signal <= fit.Conductivity; signal++ {
				c := &fit.Curve{V: v, Y: y, Signal: signal, V0: 50 * float64(seed%3), StepV: 0.001 * float64(seed%2), StepY: 0.01 * float64(seed%2),
					Expected: seed%2 == 0, Indicated: []fit.Indicated{{Kind: fit.Inflection, V: 3}, {Kind: fit.Break, V: 3}, {Kind: fit.AtReading, V: 3}}}
				if seed%4 == 0 {
					c.EndReading = &end
				}
				withstands(t, fmt.Sprintf("%s, seed %d, signal %d", kind, seed, signal), c)
			}
		}
	}
}

// bytesAsCurve reads a curve from bytes: a byte of options, then either 2 + 2
// bytes a reading (a volume's step and a reading, both scaled) or 8 + 8 bytes.
func bytesAsCurve(data []byte) *fit.Curve {
	if len(data) == 0 {
		return nil
	}
	o := data[0]
	c := &fit.Curve{Signal: fit.Signal(1 + o%3), Expected: o&4 != 0, StepY: 0.01 * float64(o>>3&1), StepV: 0.001 * float64(o>>3&1), V0: 50 * float64(o>>4&1)}
	data = data[1:]
	if o&32 != 0 {
		end := 7.0
		c.EndReading = &end
	}
	volume := 0.0
	for o&64 == 0 && len(data) >= 4 && len(c.V) < 400 {
		volume += float64(int16(binary.LittleEndian.Uint16(data))) / 32768
		c.V, c.Y, data = append(c.V, volume), append(c.Y, float64(int16(binary.LittleEndian.Uint16(data[2:])))/2000), data[4:]
	}
	for o&64 != 0 && len(data) >= 16 && len(c.V) < 400 {
		c.V = append(c.V, math.Float64frombits(binary.LittleEndian.Uint64(data)))
		c.Y, data = append(c.Y, math.Float64frombits(binary.LittleEndian.Uint64(data[8:]))), data[16:]
	}
	return c
}

func FuzzEvaluate(f *testing.F) {
	for o := range byte(128) {
		data := []byte{o}
		for i := range 30 {
			data = binary.LittleEndian.AppendUint16(data, 6000)
			data = binary.LittleEndian.AppendUint16(data, uint16(5000+14000*math.Tanh(float64(i-15)/3)/2))
		}
		f.Add(data)
	}
	// Found by fuzzing: a fall of 13 pH between rises of 5 to 25 gave its two endpoints in the wrong order.
	f.Add([]byte("\x06000\xf8p\x172\xf8p\x173\xf8p\x175\xf8x\x179\xf8y\x17B\xf8y\x17S\xf8p\x17t\xf8x\x17\xb3\xf8z\x172\xf9p\x171\xfax\x17z\xfbx0\xb5\xfeXp7\x98\x03p\x17\xbd\np0\x88 p\x17R!p0x#p![0x\x17R0p1\xfd#p1\xe40p0a1z0\x9c1x\x1700x111x020a020a0\xdd000\xde"))
	f.Fuzz(func(t *testing.T, data []byte) {
		if c := bytesAsCurve(data); c != nil {
			withstands(t, "fuzz", c)
		}
	})
}
