package simulate

import (
	"math"
	"math/rand/v2"
	"reflect"
	"testing"
)

// still returns a generator for readings without noise.
func still() *rand.Rand { return rand.New(rand.NewPCG(1, 1)) }

// dynamicRun is a realistic titration with dynamic doses.
func dynamicRun() Titration {
	t := weakStrong()
	t.Electrode = Electrode{Slope: 0.995, NoiseSD: 0.003, DisplayStep: 0.01, TemperatureSD: 0.05}
	t.Burette = Burette{ErrorSDML: 0.0012, DisplayStep: 0.001, MLPerS: 0.1}
	t.Dosing = Dosing{ChangePerDose: 0.15, SmallestML: 0.04, LargestML: 0.5, StopML: 16, WaitS: 7}
	return t
}

func TestSameSeedSameCurve(t *testing.T) {
	a, truthA := curve(t, dynamicRun(), 9)
	b, truthB := curve(t, dynamicRun(), 9)
	c, _ := curve(t, dynamicRun(), 10)
	if !reflect.DeepEqual(a, b) || !reflect.DeepEqual(truthA, truthB) {
		t.Error("the same seed gives two curves")
	}
	if reflect.DeepEqual(a, c) {
		t.Error("another seed gives the same curve")
	}
}

func TestFixedDoses(t *testing.T) {
	run := strongStrong() // 0.5 mL to 15 mL
	c, _ := curve(t, run, 1)
	if len(c.VolumesML) != 31 {
		t.Errorf("%d readings, want 31", len(c.VolumesML))
	}
	for i, v := range c.VolumesML {
		near(t, "mL", v, 0.5*float64(i), 1e-9)
	}
}

// Law: doses stay between the smallest and the largest, the last volume does
// not pass the stop, and doses shrink in the jump: the one across the endpoint
// is below 1.5 % of it on every seed.
func TestDynamicDoses(t *testing.T) {
	for seed := range uint64(200) {
		c, truth := curve(t, dynamicRun(), seed)
		n := len(c.VolumesML)
		if len(c.Readings) != n || len(c.TimesS) != n || len(c.TemperaturesC) != n || len(truth.Exact) != n || len(truth.DeliveredML) != n {
			t.Fatal("lengths differ")
		}
		for i := 1; i < n; i++ {
			dose := c.VolumesML[i] - c.VolumesML[i-1]
			if dose < 0.04-1e-9 || dose > 0.5+1e-9 {
				t.Errorf("seed %d: a dose of %g mL", seed, dose)
			}
			if wait := c.TimesS[i] - c.TimesS[i-1]; wait < 7+dose/0.1-1 || wait > 7+dose/0.1+1 {
				t.Errorf("seed %d: %g s for a dose of %g mL", seed, wait, dose)
			}
			if c.VolumesML[i-1] <= 12 && c.VolumesML[i] > 12 && dose > 0.015*12 {
				t.Errorf("seed %d: a dose of %g mL across the endpoint", seed, dose)
			}
		}
		if last := c.VolumesML[n-1]; last > 16 || last < 15.5 {
			t.Errorf("seed %d: ends at %g mL", seed, last)
		}
	}
}

// Away from both limits a dose does change the reading by what it aims at, on
// a curve without noise within a factor of two.
func TestDynamicDosesAim(t *testing.T) {
	run := dynamicRun()
	run.Electrode, run.Burette = Ideal(), Burette{}
	c, _ := curve(t, run, 1)
	free := 0
	for i := 1; i < len(c.VolumesML); i++ {
		if dose := c.VolumesML[i] - c.VolumesML[i-1]; c.VolumesML[i] > 2 && dose > 0.045 && dose < 0.45 {
			free++
			if change := c.Readings[i] - c.Readings[i-1]; change < 0.075 || change > 0.3 {
				t.Errorf("a dose of %g mL to %g mL changes the reading by %g, aimed at 0.15", dose, c.VolumesML[i], change)
			}
		}
	}
	if free < 10 {
		t.Errorf("%d doses between the limits", free)
	}
}

func TestBuretteError(t *testing.T) {
	run := strongStrong()
	run.Burette.ErrorSDML, run.Dosing.FixedML = 0.0012, 0.005
	c, truth := curve(t, run, 2)
	sum := 0.0
	for i, v := range c.VolumesML {
		sum += (truth.DeliveredML[i] - v) * (truth.DeliveredML[i] - v)
	}
	n := float64(len(c.VolumesML))
	near(t, "sd of the volumes / asked", math.Sqrt(sum/n)/0.0012, 1, 3/math.Sqrt(2*n))
	near(t, "mL at the start", truth.DeliveredML[0], 0, 0)
}

// The planted dose begins where it was asked to, and has its size.
func TestOverdose(t *testing.T) {
	for seed := range uint64(50) {
		run := dynamicRun()
		run.Dosing.Over = Overdose{FromML: 11.4321, DoseML: 1.1}
		c, _ := curve(t, run, seed)
		found := false
		for i := 1; i < len(c.VolumesML); i++ {
			dose := c.VolumesML[i] - c.VolumesML[i-1]
			if math.Abs(c.VolumesML[i-1]-11.432) < 1e-9 {
				near(t, "planted dose", dose, 1.1, 0.001)
				found = true
			} else if dose > 0.5+0.02+1e-9 {
				t.Errorf("seed %d: a dose of %g mL from %g mL", seed, dose, c.VolumesML[i-1])
			}
		}
		if !found {
			t.Errorf("seed %d: no dose begins at 11.432 mL", seed)
		}
	}
}

func TestStopsAtReading(t *testing.T) {
	for _, more := range []int{0, 2} {
		run := dynamicRun()
		run.Dosing.StopReading, run.Dosing.MoreReadings = 8.1, more
		c, _ := curve(t, run, 3)
		n := len(c.Readings)
		if past := n - 1 - more; c.Readings[past] < 8.1 || c.Readings[past-1] >= 8.1 {
			t.Errorf("with %d more the readings end %v", more, c.Readings[n-4:])
		}
	}
}

// Faults change what the dump says at their place and nothing else.
func TestFaults(t *testing.T) {
	whole, _ := curve(t, dynamicRun(), 5)
	run := dynamicRun()
	run.Faults = Faults{StrayFromML: 3, StrayBy: 0.2, StuckFromML: 5, StuckCount: 6, BackFromML: 9, BackByML: 0.1}
	c, _ := curve(t, run, 5)
	readings, volumes := 0, 0
	for i, v := range whole.VolumesML {
		if c.Readings[i] != whole.Readings[i] {
			readings++
		}
		if c.VolumesML[i] != v {
			volumes++
			near(t, "volume that goes back", c.VolumesML[i], whole.VolumesML[i-1]-0.1, 1e-9)
		}
	}
	if readings != 1+5 || volumes != 1 {
		t.Errorf("%d readings and %d volumes were changed, want 6 and 1", readings, volumes)
	}
	i := from(&whole, 3)
	near(t, "stray reading", c.Readings[i], whole.Readings[i]+0.2, 1e-9)
	i = from(&whole, 5)
	for k := i; k < i+6; k++ {
		near(t, "stuck reading", c.Readings[k], whole.Readings[i], 0)
	}
	run.Faults = Faults{StrayFromML: 99, StrayBy: 1, StuckFromML: 99, StuckCount: 5, BackFromML: 99, BackByML: 1}
	c, _ = curve(t, run, 5)
	if !reflect.DeepEqual(c, whole) {
		t.Error("a fault beyond the curve changed it")
	}
}
