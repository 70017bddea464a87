package simulate

import (
	"fmt"
	"math"
	"math/rand/v2"
)

// Burette is how far the delivered volume differs from the displayed one.
type Burette struct {
	ErrorSDML   float64 // of each position, independent of the others; about 0.0012
	DisplayStep float64 // mL; 0 for none
	MLPerS      float64 // dosing rate; 0 for no time at all
}

// Dosing is what an automatic burette does. With FixedML all doses are equal;
// else each dose aims at a change of ChangePerDose in the reading, as far as
// SmallestML and LargestML permit.
type Dosing struct {
	FixedML       float64
	ChangePerDose float64 // pH or mV
	SmallestML    float64
	LargestML     float64
	StopML        float64 // dosing ends with the last dose that does not pass this volume
	StopReading   float64 // dosing ends with the first reading past it; 0 for none
	MoreReadings  int     // how many more readings are taken past StopReading
	WaitS         float64 // after each dose
	Over          Overdose
}

// Overdose is one dose that was not asked for, at a place that is reached
// exactly. The zero value is none.
type Overdose struct{ FromML, DoseML float64 }

// growth is how much larger than the dose before a dynamic dose may become,
// and foresight how much steeper the burette expects the curve to become; both
// are this project's choice.
const growth, foresight = 1.5, 3

// maxReadings stops a dosing that was stated without sense.
const maxReadings = 100_000

// check refuses settings under which dosing cannot work.
func (t Titration) check() error {
	d, e := t.Dosing, t.Electrode
	switch {
	case t.Signal != PH && t.Signal != Potential && t.Signal != Conductivity:
		return fmt.Errorf("the signal is %q; it must be pH, potential or conductivity", t.Signal)
	case !(d.StopML > 0):
		return fmt.Errorf("dosing stops at %g mL; it must be above 0", d.StopML)
	case d.FixedML == 0 && !(d.SmallestML > 0 && d.LargestML >= d.SmallestML && d.ChangePerDose > 0):
		return fmt.Errorf("doses of %g to %g mL for a change of %g; state them, or a fixed dose", d.SmallestML, d.LargestML, d.ChangePerDose)
	case d.FixedML < 0 || t.Burette.ErrorSDML < 0 || e.NoiseSD < 0:
		return fmt.Errorf("a fixed dose of %g mL, a burette error of %g mL, a noise of %g; none may be negative", d.FixedML, t.Burette.ErrorSDML, e.NoiseSD)
	case !(e.Lag >= 0 && e.Lag < 1):
		return fmt.Errorf("the lag is %g; it must be 0 to below 1", e.Lag)
	case t.Signal != Conductivity && !(e.Slope > 0):
		return fmt.Errorf("the electrode's slope is %g; it must be above 0", e.Slope)
	}
	return nil
}

// dose runs the burette: read, choose a dose, deliver it, read again.
func (t Titration) dose(m model, truth *Truth, rng *rand.Rand) (Curve, error) {
	var c Curve
	s := sense{electrode: t.Electrode}
	if t.Signal != Conductivity {
		s.unit = t.Electrode.unit(t.Signal, t.TemperatureC)
	}
	volume, seconds, past := 0.0, 0.0, 0
	for len(c.VolumesML) < maxReadings {
		delivered := volume
		if volume > 0 {
			delivered = math.Max(0, volume+t.Burette.ErrorSDML*rng.NormFloat64())
		}
		exact, err := t.exact(m, delivered)
		if err != nil {
			return Curve{}, fmt.Errorf("at %g mL: %w", volume, err)
		}
		c.VolumesML = append(c.VolumesML, volume)
		c.Readings = append(c.Readings, s.read(exact, rng))
		c.TimesS = append(c.TimesS, math.Round(seconds))
		c.TemperaturesC = append(c.TemperaturesC, rounded(t.TemperatureC+t.Electrode.TemperatureSD*rng.NormFloat64(), 0.1))
		truth.DeliveredML, truth.Exact = append(truth.DeliveredML, delivered), append(truth.Exact, exact)
		if t.Dosing.passed(c.Readings) {
			past++
		}
		next := t.next(c)
		if past > t.Dosing.MoreReadings || next > t.Dosing.StopML+1e-9 {
			return c, nil
		}
		seconds += t.Dosing.WaitS
		if t.Burette.MLPerS > 0 {
			seconds += (next - volume) / t.Burette.MLPerS
		}
		volume = next
	}
	return Curve{}, fmt.Errorf("more than %d readings; the doses are too small for %g mL", maxReadings, t.Dosing.StopML)
}

// passed says whether the last reading lies beyond the set reading, seen from
// the first one.
func (d Dosing) passed(readings []float64) bool {
	if d.StopReading == 0 {
		return false
	}
	first, last := readings[0], readings[len(readings)-1]
	return (last-d.StopReading)*(first-d.StopReading) <= 0
}

// next returns the displayed volume after the next dose.
func (t Titration) next(c Curve) float64 {
	volume := c.VolumesML[len(c.VolumesML)-1]
	next := volume + t.Dosing.size(c)
	if o := t.Dosing.Over; o.DoseML > 0 {
		from := rounded(o.FromML, t.Burette.DisplayStep)
		if volume == from {
			next = volume + o.DoseML
		} else if volume < from && next > from-t.Dosing.SmallestML/2 {
			next = from
		}
	}
	return rounded(next, t.Burette.DisplayStep)
}

// size returns the dose that the readings so far ask for, mL: the change
// wanted over the slope expected, which is the last one, or steeper still when
// it has been rising.
func (d Dosing) size(c Curve) float64 {
	if d.FixedML > 0 {
		return d.FixedML
	}
	n := len(c.VolumesML)
	if n < 2 {
		return math.Min(4*d.SmallestML, d.LargestML)
	}
	last := c.VolumesML[n-1] - c.VolumesML[n-2]
	slope := math.Abs(c.Readings[n-1]-c.Readings[n-2]) / last
	if n > 2 {
		before := math.Abs(c.Readings[n-2]-c.Readings[n-3]) / (c.VolumesML[n-2] - c.VolumesML[n-3])
		if slope > before && before > 0 {
			slope *= math.Min(slope/before, foresight)
		}
	}
	dose := growth * last
	if slope > 0 {
		dose = math.Min(dose, d.ChangePerDose/slope)
	}
	return math.Min(math.Max(dose, d.SmallestML), d.LargestML)
}
