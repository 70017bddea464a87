package simulate

import (
	"math"
	"math/rand/v2"
)

// Electrode is how the true value becomes a reading. For conductivity only
// NoiseSD, Lag and DisplayStep count.
type Electrode struct {
	Slope       float64 // 1 is the slope of theory
	Offset      float64 // pH: added to the reading; potential: mV at 1 mol/L of silver
	NoiseSD     float64 // decades; for conductivity relative to the reading
	Lag         float64 // 0 to below 1: the part of each change that a reading does not see
	DisplayStep float64 // of the reading, in its unit; 0 for none

	TemperatureSD float64 // of the displayed temperature, K
}

// Ideal returns an electrode without defects and without rounding.
func Ideal() Electrode { return Electrode{Slope: 1} }

// mvPerDecadeK is R ln10 / F in mV/K.
const mvPerDecadeK = 0.198420

// kelvin is 0 °C in K.
const kelvin = 273.15

// neutral is the pH at which an electrode has no slope error.
const neutral = 7

// unit returns how much of the reading's unit a decade is.
func (e Electrode) unit(s Signal, temperatureC float64) float64 {
	if s == Potential {
		return mvPerDecadeK * (temperatureC + kelvin)
	}
	return 1
}

// reading turns pH or log10 [Ag+] into pH or mV as an electrode without noise
// gives them.
func (e Electrode) reading(s Signal, decades, temperatureC float64) float64 {
	if s == Potential {
		return e.Offset + e.Slope*e.unit(s, temperatureC)*decades
	}
	return neutral + e.Slope*(decades-neutral) + e.Offset
}

// decades is reading the other way round.
func (e Electrode) decades(s Signal, reading, temperatureC float64) float64 {
	if s == Potential {
		return (reading - e.Offset) / (e.Slope * e.unit(s, temperatureC))
	}
	return neutral + (reading-e.Offset-neutral)/e.Slope
}

// sense is an electrode at work: it remembers what it lags behind.
type sense struct {
	electrode Electrode
	unit      float64 // of a decade; 0 for conductivity
	seen      float64 // without noise
	started   bool
}

// read returns the displayed reading for an exact one.
func (s *sense) read(exact float64, rng *rand.Rand) float64 {
	if s.started {
		s.seen = exact + s.electrode.Lag*(s.seen-exact)
	} else {
		s.seen, s.started = exact, true
	}
	sd := s.electrode.NoiseSD * s.unit
	if s.unit == 0 {
		sd = s.electrode.NoiseSD * math.Abs(exact)
	}
	return rounded(s.seen+sd*rng.NormFloat64(), s.electrode.DisplayStep)
}

// rounded returns x to the nearest multiple of a step; a step of 0 keeps it.
func rounded(x, step float64) float64 {
	if step == 0 {
		return x
	}
	per := math.Round(1 / step)
	if math.Abs(per*step-1) < 1e-9 { // 0.01: dividing by 100 gives the decimal number itself
		return math.Round(x*per) / per
	}
	return math.Round(x/step) * step
}
