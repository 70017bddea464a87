package simulate

import (
	"math"
	"testing"
)

// Equivalence volumes by hand.
func TestEndpoints(t *testing.T) {
	runs := references()
	runs["strong"] = strongStrong()
	both := strongStrong()
	both.Vessel = Solution{Spectators: []Spectator{{"Cl-", 0.01}}, Groups: []Group{Acetic(0.02)}}
	both.Ends = []End{{Levels: []int{0}}, {Levels: []int{1}}}
	runs["strong and weak"] = both
	for name, want := range map[string][]float64{
		"strong":          {10},
		"strong and weak": {5, 15},        // 50 x 0.01 / 0.1, 50 x 0.03 / 0.1
		"phosphoric":      {9, 18},        // 60 x 0.015 / 0.1, twice
		"alkalinity":      {4.2, 11.4},    // 60 x 0.007 / 0.1, 60 x 0.019 / 0.1
		"carbonated":      {1.2 / 0.098},  // carbonate counts as hydrogen carbonate: 0.1 - 0.002
		"ammonia":         {12},           // 60 x 0.02 / 0.1
		"chloride":        {12},           // 60 x 0.02 / 0.1
		"mixed":           {6.0, 6.0 * 2}, // 60 x 0.01 / 0.1, then as much again
	} {
		got, err := runs[name].EndpointsML()
		if err != nil {
			t.Fatal(name, err)
		}
		if len(got) != len(want) {
			t.Errorf("%s: endpoints %v, want %v", name, got, want)
			continue
		}
		for i := range want {
			near(t, name+", mL", got[i], want[i], 1e-9)
		}
	}
}

// Law: the volume of a reading is the inverse of the reading at a volume, and
// its slope is that of the difference quotient.
func TestVolumeIsInverse(t *testing.T) {
	for name, run := range references() {
		m, err := run.model()
		if err != nil {
			t.Fatal(err)
		}
		for v := 0.37; v < 20; v += 0.61 {
			u, err := m.decades(v)
			if err != nil {
				t.Fatal(err)
			}
			got, slope := m.volumeAt(u)
			near(t, name+", mL", got, v, 1e-9)
			const d = 1e-5
			above, _ := m.volumeAt(u + d)
			below, _ := m.volumeAt(u - d)
			near(t, name+", mL per decade", slope/((above-below)/(2*d)), 1, 1e-5)
		}
	}
}

// In a mixture of bromide and chloride the first jump ends in a corner, where
// silver chloride begins: [Ag] = Ksp/[Cl] and [Ag] + (bromide left over) =
// silver. By hand: with t = 60 + V, a = K_Cl t/0.6, bromide 0.6/t, solid
// bromide 0.6/t - K_Br/a; a + 0.6/t - K_Br/a = 0.1 V/t.
func TestCornerOfMixedHalides(t *testing.T) {
	run := references()["mixed"]
	kBr, kCl := math.Pow(10, -12.3), math.Pow(10, -9.75)
	v := 6.0
	for range 50 { // fixed point: 0.1 V = 0.6 + t (a - K_Br/a)
		total := 60 + v
		a := kCl * total / 0.6
		v = (0.6 + total*(a-kBr/a)) / 0.1
	}
	near(t, "corner, mL", steepestNear(t, run, 6), v, 1e-6)
	if v > 6 || v < 5.9 {
		t.Errorf("the corner by hand is at %g mL; it must stand just before 6", v)
	}
}

// The place of a set reading: by the closed form of the charge balance with
// V explicit, acetic acid at pH 8.1.
func TestVolumeAtReading(t *testing.T) {
	run := weakStrong()
	h, kw := math.Pow(10, -8.1), math.Pow(10, -13.995)
	alpha := 1 / (1 + math.Pow(10, 4.756-8.1))
	want := 60 * (0.02*alpha - h + kw/h) / (0.1 + h - kw/h)
	got, err := run.VolumeAt(8.1)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "mL at pH 8.1", got, want, 1e-9)
	run.Electrode = Electrode{Slope: 0.98, Offset: 0.02}
	// 7 + 0.98 (pH - 7) + 0.02 = 8.1 at pH 8.102041.
	shifted, err := run.VolumeAt(8.1)
	if err != nil {
		t.Fatal(err)
	}
	run.Electrode = Ideal()
	near(t, "pH there", at(t, run, shifted), 8.102041, 1e-6)
	if _, err := run.VolumeAt(2); err == nil {
		t.Error("pH 2 lies before the start: no error")
	}
}

// Meites and Goldman (from memory): inflection and equivalence differ most for
// the weakest acids; for acetic acid at 0.02 mol/L by less than 0.015 %, for
// pKa 9 by more than 0.1 %.
func TestInflectionAndEquivalence(t *testing.T) {
	run := weakStrong()
	near(t, "acetic acid, relative", steepestNear(t, run, 12)/12, 1, 0.00015)
	run.Vessel.Groups[0].PK = []float64{9}
	if off := math.Abs(steepestNear(t, run, 12)/12 - 1); off < 0.001 || off > 0.01 {
		t.Errorf("pKa 9: inflection %.5f off the equivalence point", off)
	}
}
