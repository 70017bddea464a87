package demo

import (
	"math"
	"math/rand/v2"

	"lastdrop/fit/simulate"
)

// plant changes a simulation so that it has the job's fault. Places are parts
// of the first endpoint, so every seed has them in the same part of the curve.
func (t *titration) plant(s simulate.Titration, rng *rand.Rand) (simulate.Titration, error) {
	ends, err := s.EndpointsML()
	if err != nil {
		return s, err
	}
	first := ends[0]
	flat := (0.45 + 0.1*rng.Float64()) * first
	switch t.fault {
	case Overshoot:
		s.Dosing.Over = overdose(first, 0.087+0.005*rng.Float64(), rng)
		t.placedML = s.Dosing.Over.FromML
	case LargeOvershoot:
		s.Dosing.Over = overdose(first, 0.12+0.01*rng.Float64(), rng)
		t.placedML = s.Dosing.Over.FromML
	case Sparse:
		// The endpoint falls into the middle of a dose, so that one bracket holds the jump.
		dose := first / (float64(15+rng.IntN(3)) + 0.4 + 0.2*rng.Float64())
		s.Dosing = simulate.Dosing{FixedML: places(dose, 3), StopML: s.Dosing.StopML, WaitS: s.Dosing.WaitS}
	case StopsShort:
		s.Dosing.SmallestML = 0.02
		s.Dosing.StopReading, err = s.Reading(0.9995 * first)
	case NoSample:
		s.Vessel, s.Ends = simulate.Solution{}, nil
	case Lagging:
		s.Electrode.Lag = 0.4
	case StrayReading:
		s.Faults.StrayFromML, t.placedML = flat, flat
		s.Faults.StrayBy, err = strayBy(s, flat)
		if rng.IntN(2) == 0 {
			s.Faults.StrayBy = -s.Faults.StrayBy
		}
	case StuckReading:
		// Early, so that all six stand well before the first jump.
		t.placedML = flat - 0.25*first
		s.Faults.StuckFromML, s.Faults.StuckCount = t.placedML, 6
	case VolumeReversal:
		t.placedML = flat
		s.Faults.BackFromML, s.Faults.BackByML = flat, 0.08+0.04*rng.Float64()
	}
	return s, err
}

// overdose is a dose of a part of the endpoint that has the endpoint well
// inside.
func overdose(endML, part float64, rng *rand.Rand) simulate.Overdose {
	dose := part * endML
	return simulate.Overdose{FromML: endML - (0.35+0.3*rng.Float64())*dose, DoseML: dose}
}

// strayBy returns how far a stray reading is off, in the reading's unit: 25 or
// more standard deviations of the noise, which an eye sees at once.
func strayBy(s simulate.Titration, volumeML float64) (float64, error) {
	switch s.Signal {
	case simulate.Potential:
		return 9, nil
	case simulate.Conductivity:
		y, err := s.Reading(volumeML)
		return 0.02 * math.Abs(y), err
	}
	return 0.18, nil
}
