// Package simulate makes titration curves whose truth is known exactly. It
// serves tests and the demonstration laboratory; no estimator uses it, and it
// uses none of them.
//
// A Titration says what stands in the vessel, what is dosed, how the burette
// doses and how the electrode reads. Run solves the chemistry at every
// reading, adds the defects that were asked for, and returns the curve that an
// instrument would have written together with the truth.
//
// Units: volumes in mL, concentrations in mol/L, temperatures in °C, times in
// s, potentials in mV, conductivities in mS/cm. A decade is a factor of ten in
// the activity of the sensed ion: 1 pH, or about 58 mV. Activities are taken
// for concentrations, but for the optional square-root law of conductivity.
//
// Same Titration, same seed: same curve.
//
// Sources:
//
//	[crc]  CRC Handbook of Chemistry and Physics, tables of limiting molar conductivities and of acid constants
//	[mf]   W. L. Marshall, E. U. Franck, J. Phys. Chem. Ref. Data 10 (1981) 295, the ion product of water
//	[gran] G. Gran, Analyst 77 (1952) 661, the balances with the volume explicit
package simulate

import (
	"fmt"
	"math/rand/v2"
)

// Signal is the quantity that is read.
type Signal string

// The signals.
const (
	PH           Signal = "pH"           // needs an acid-base titration
	Potential    Signal = "potential"    // mV of a silver electrode; needs salts
	Conductivity Signal = "conductivity" // mS/cm
)

// Titration is one titration to be simulated. Signal, V0ML, Vessel, Titrant,
// Electrode and Dosing are needed; the zero value of the rest means a perfect
// burette, 25 °C where TemperatureC is meant literally (0 is 0 °C), and no
// fault.
type Titration struct {
	Signal       Signal
	V0ML         float64  // volume before titration
	Vessel       Solution // before titration
	Titrant      Solution
	Ends         []End   // equivalence points of an acid-base titration, in the order they are met
	Salts        []Salt  // what silver precipitates; makes it a precipitation titration
	TemperatureC float64 // 0 to 100
	PKw          float64 // 0: from TemperatureC, [mf]
	Law          ConductivityLaw
	Electrode    Electrode
	Burette      Burette
	Dosing       Dosing
	Faults       Faults
}

// Curve is what an instrument would have written, in the order of time.
type Curve struct {
	VolumesML     []float64 // as displayed
	Readings      []float64 // as displayed: pH, mV or mS/cm
	TimesS        []float64 // since the first reading
	TemperaturesC []float64 // as displayed
}

// Truth is what no instrument knows.
type Truth struct {
	V0ML          float64
	EndpointsML   []float64 // equivalence, by stoichiometry; for conductivity the breaks
	InflectionsML []float64 // steepest place of the curve near each endpoint; nil for conductivity
	DeliveredML   []float64 // what really was in the vessel at each reading
	Exact         []float64 // each reading without noise, lag, rounding and faults
}

// Run simulates the titration. It returns an error when the Titration is not
// one (a negative concentration, an unknown ion, a titrant without effect ...).
func (t Titration) Run(seed uint64) (Curve, Truth, error) {
	m, err := t.model()
	if err != nil {
		return Curve{}, Truth{}, err
	}
	if err := t.check(); err != nil {
		return Curve{}, Truth{}, err
	}
	truth, err := t.truth(m)
	if err != nil {
		return Curve{}, Truth{}, err
	}
	curve, err := t.dose(m, &truth, rand.New(rand.NewPCG(seed, stream)))
	if err != nil {
		return Curve{}, Truth{}, err
	}
	t.Faults.plant(&curve, t.Electrode.DisplayStep, t.Burette.DisplayStep)
	return curve, truth, nil
}

// stream is the second word of the generator's seed; any constant would do.
const stream = 0x7465726e

// Reading returns the reading without noise, lag and rounding at a volume of
// titrant.
func (t Titration) Reading(volumeML float64) (float64, error) {
	m, err := t.model()
	if err != nil {
		return 0, err
	}
	return t.exact(m, volumeML)
}

// EndpointsML returns the equivalence volumes by stoichiometry, in the order
// they are met; none when no Ends are stated.
func (t Titration) EndpointsML() ([]float64, error) {
	m, err := t.model()
	if err != nil {
		return nil, err
	}
	return m.endpoints()
}

// VolumeAt returns the volume at which the curve without noise passes a pH or
// a potential in mV. It returns an error for conductivity, and when the
// volume would be negative.
func (t Titration) VolumeAt(reading float64) (float64, error) {
	m, err := t.model()
	if err != nil {
		return 0, err
	}
	if t.Signal == Conductivity {
		return 0, fmt.Errorf("a conductivity does not belong to one volume; ask for pH or potential")
	}
	v, _ := m.volumeAt(t.Electrode.decades(t.Signal, reading, t.TemperatureC))
	if !(v >= 0) {
		return 0, fmt.Errorf("the reading %g is not passed by titrant", reading)
	}
	return v, nil
}

// exact is Reading with the model at hand.
func (t Titration) exact(m model, volumeML float64) (float64, error) {
	if t.Signal == Conductivity {
		return m.conductivity(volumeML)
	}
	u, err := m.decades(volumeML)
	if err != nil {
		return 0, err
	}
	return t.Electrode.reading(t.Signal, u, t.TemperatureC), nil
}
