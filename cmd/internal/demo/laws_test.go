package demo

import (
	"fmt"
	"math"
	"testing"
)

// lawSeeds is how many laboratories must obey the laws.
const lawSeeds = 50

// where names a run in a failure.
func where(p Planted) string {
	return fmt.Sprintf("%s run %d (%s, %s)", p.Dump, p.Run, p.Procedure, p.Fault)
}

// bracketOf returns the two ascending volumes on either side of v and how many
// lie beyond it.
func bracketOf(volumes []float64, v float64) (low, high float64, beyond int) {
	high = math.Inf(1)
	for _, x := range volumes {
		if x <= v {
			low = math.Max(low, x)
		} else {
			high, beyond = math.Min(high, x), beyond+1
		}
	}
	return low, high, beyond
}

// targets are the true places of a run that its dump reports.
func targets(p Planted) []float64 {
	switch p.Kind {
	case "at-reading":
		return []float64{p.AtReadingML}
	case "break":
		return p.EndpointsML
	}
	return p.InflectionsML
}

// The laws of the demonstration: what a run of each kind must be like, from
// the bytes of the dumps alone.
func TestLawsOnManySeeds(t *testing.T) {
	for seed := DefaultSeed; seed < DefaultSeed+lawSeeds; seed++ {
		t.Run(fmt.Sprint(seed), func(t *testing.T) {
			t.Parallel()
			files, planted, err := Files(seed)
			if err != nil {
				t.Fatal(err)
			}
			runs := map[string][]parsed{}
			for _, f := range files {
				runs[f.Path] = nil
			}
			for _, p := range planted {
				if _, ok := runs["dumps/"+p.Dump]; !ok {
					t.Errorf("%s: no such dump", where(p))
				}
			}
			for _, f := range files {
				for _, p := range planted {
					if "dumps/"+p.Dump == f.Path && p.Run > 0 && p.Expect != ExpectUnread {
						checkRun(t, p, parse(t, f)[p.Run-1])
					}
				}
			}
		})
	}
}

// checkRun applies the laws to one run.
func checkRun(t *testing.T, p Planted, r parsed) {
	t.Helper()
	places := targets(p)
	switch p.Fault {
	case NoSample:
		if len(r.indicated) != 0 || len(places) != 0 {
			t.Errorf("%s: endpoints %v, indicated %v; want none", where(p), places, r.indicated)
		}
		return
	case StopsShort:
		low, high, beyond := bracketOf(r.volumes, places[0])
		past := r.volumes[len(r.volumes)-1]/places[0] - 1
		if len(r.indicated) != 0 || beyond > 1 || past > 0.004 || past < -0.003 {
			t.Errorf("%s: ends %.3g past the endpoint, bracket %g to %g", where(p), past, low, high)
		}
		return
	}
	checkCurve(t, p, r, places)
	checkPlateau(t, p, r)
	checkBreak(t, p, r)
	checkIndicated(t, p, r, places)
}

// checkCurve looks at the doses across the endpoints and at what follows.
func checkCurve(t *testing.T, p Planted, r parsed, places []float64) {
	t.Helper()
	least, most := 0.0, 0.03
	switch p.Fault {
	case Overshoot:
		least, most = 0.085, 0.094
	case LargeOvershoot:
		least, most = 0.119, 0.131
	case Sparse:
		least, most = 0.05, 0.07
	}
	for _, v := range places {
		low, high, beyond := bracketOf(r.volumes, v)
		if part := (high - low) / v; !(part >= least && part <= most) {
			t.Errorf("%s: dose of %.4f of the endpoint across it, want %g to %g", where(p), part, least, most)
		}
		if fewest := fewestBeyond(p); beyond < fewest {
			t.Errorf("%s: %d readings past %g mL, want %d", where(p), beyond, v, fewest)
		}
	}
	if last := r.volumes[len(r.volumes)-1]; p.Kind != "at-reading" && last < 1.25*places[len(places)-1] {
		t.Errorf("%s: ends at %g mL, the last endpoint is at %g", where(p), last, places[len(places)-1])
	}
}

// fewestBeyond returns how many readings must follow an endpoint. Two runs end
// at their set reading, sparse ones have large doses.
func fewestBeyond(p Planted) int {
	switch {
	case p.Dump == "bench-a/0430.csv", p.Dump == "bench-a/0449.csv":
		return 2
	case p.Fault == Sparse:
		return 4
	}
	return 8
}

// checkIndicated looks at what the instrument says.
func checkIndicated(t *testing.T, p Planted, r parsed, places []float64) {
	t.Helper()
	if len(r.indicated) != len(places) {
		t.Fatalf("%s: indicated %v, true %v", where(p), r.indicated, places)
	}
	for i, v := range places {
		off := math.Abs(r.indicated[i]/v - 1)
		low, high, _ := bracketOf(r.volumes, v)
		inside := r.indicated[i] >= low && r.indicated[i] <= high
		switch {
		case p.Fault == WrongIndicated:
			if off < 0.02 || off > 0.04 || inside {
				t.Errorf("%s: indicated %g is %.4f off %g", where(p), r.indicated[i], off, v)
			}
		case p.Expect == ExpectAlso && p.Fault == ExportedAgain:
			if off < 0.01 {
				t.Errorf("%s: the second export differs by %.4f only", where(p), off)
			}
		case p.Kind == "at-reading" && off > 0.0005, p.Kind == "break" && off > 0.0015:
			t.Errorf("%s: indicated %g is %.5f off %g", where(p), r.indicated[i], off, v)
		case p.Kind == "inflection" && !inside && p.Fault != Lagging:
			t.Errorf("%s: indicated %g lies outside %g to %g", where(p), r.indicated[i], low, high)
		}
	}
}

// straight fits a line by least squares to the points between two volumes.
func straight(xs, ys []float64, from, to float64) (intercept, slope float64) {
	var n, sx, sy, sxx, sxy float64
	for i, x := range xs {
		if x >= from && x <= to {
			n, sx, sy, sxx, sxy = n+1, sx+x, sy+ys[i], sxx+x*x, sxy+x*ys[i]
		}
	}
	slope = (n*sxy - sx*sy) / (n*sxx - sx*sx)
	return (sy - slope*sx) / n, slope
}

// checkBreak: two straight lines through the arms, corrected for dilution, must
// find the break within 0.2 %; the amounts were chosen for that.
func checkBreak(t *testing.T, p Planted, r parsed) {
	t.Helper()
	if p.Kind != "break" || p.Fault == StrayReading {
		return
	}
	v := p.EndpointsML[0]
	ys := make([]float64, len(r.readings))
	for i, y := range r.readings {
		ys[i] = y * (p.V0ML + r.volumes[i]) / p.V0ML
	}
	a1, b1 := straight(r.volumes, ys, 0.4*v, 0.92*v)
	a2, b2 := straight(r.volumes, ys, 1.08*v, math.Inf(1))
	if off := (a2-a1)/(b1-b2)/v - 1; math.Abs(off) > 0.002 {
		t.Errorf("%s: two lines are %.5f off %g mL", where(p), off, v)
	}
}
