// Package fit finds endpoints in titration curves: numbers in, estimates with
// uncertainty and flags out. It knows no file, schema, clock or logger and
// none of the other packages.
//
// Units: volumes V in mL delivered, readings y in their own unit (pH, mV,
// mS/cm); a reading counted in decades is u = y/D with D = 1 for pH and the
// Nernst slope for potentials. Standard uncertainties have k = 1 and come
// from the readings alone.
//
// Data flow: Curve -> clean (what is used, what is left out) -> estimator ->
// Endpoints -> flags.
//
// Sources:
//
//	[fieller]  E. C. Fieller, J. R. Stat. Soc. B 16 (1954) 175
//	[gum]      JCGM 100:2008
//	[jack]     delete-a-group jackknife, B. Efron, The Jackknife, the
//	           Bootstrap and Other Resampling Plans (1982) (from memory)
package fit

import (
	"fmt"
	"math"
)

// Signal is the quantity of the readings.
type Signal int

// The signals.
const (
	PH           Signal = iota + 1 // pH
	Potential                      // mV
	Conductivity                   // mS/cm
)

// The kinds of endpoint; only like kinds are compared.
const (
	Inflection = "inflection" // steepest place
	AtReading  = "at-reading" // a fixed pH or mV
	Break      = "break"      // kink of a conductometric curve
)

// Indicated is an endpoint that the instrument gave.
type Indicated struct {
	Kind  string
	V     float64 // mL
	StepV float64 // display step, mL; 0 unknown
}

// Curve is one run as numbers, readings in the order of time.
type Curve struct {
	V, Y         []float64 // mL, and the signal's unit
	Signal       Signal
	StepV, StepY float64 // display steps; 0 unknown
	V0           float64 // volume before titration, mL; 0 unknown
	TemperatureC float64 // 0 is taken as not stated: 25 °C
	Electrons    int     // of the sensed species, for potentials; 0 is taken as 1
	EndReading   *float64
	Expected     bool // an endpoint was expected
	Indicated    []Indicated
}

// Decade returns D, the units of one decade of activity.
func (c *Curve) Decade() float64 {
	if c.Signal != Potential {
		return 1
	}
	t := c.TemperatureC
	if t == 0 {
		t = 25
	}
	return 0.19842 * (t + 273.15) / float64(max(c.Electrons, 1)) // R T ln 10 / (n F), mV
}

// minReadings is the least number of readings that any estimator works with:
// two on either side of a bracket and one more (common practice, no source).
const minReadings = 5

// absurd is a number that no burette and no electrode gives; beyond it sums of
// squares could overflow.
const absurd = 1e9

// Check returns what makes the curve unfit for any estimator: unequal
// lengths, a value that is not finite or absurdly large, too few readings, a
// conductivity that is nowhere above 0.
func (c *Curve) Check() error {
	if len(c.V) != len(c.Y) {
		return fmt.Errorf("%d volumes and %d readings; as many of each are needed", len(c.V), len(c.Y))
	}
	if len(c.V) < minReadings {
		return fmt.Errorf("%d readings; a curve needs at least %d", len(c.V), minReadings)
	}
	top := math.Inf(-1)
	for i := range c.V {
		if !(math.Abs(c.V[i]) < absurd && math.Abs(c.Y[i]) < absurd) {
			return fmt.Errorf("reading %d is (%g mL, %g); finite numbers below %g are needed", i+1, c.V[i], c.Y[i], absurd)
		}
		top = math.Max(top, c.Y[i])
	}
	if c.Signal == Conductivity && top <= 0 {
		return fmt.Errorf("no conductivity is above 0 (highest %g mS/cm); is the cell connected?", top)
	}
	return nil
}
