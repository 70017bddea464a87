package demo

import (
	"fmt"
	"math"
	"math/rand/v2"

	"lastdrop/fit/simulate"
)

// bench is one invented instrument.
type bench struct {
	name            string
	electrode       simulate.Electrode // slope and offset are drawn per run
	burette         simulate.Burette
	indicatedPlaces int // decimals of its own endpoints, mL
}

// The errors of the burette are those of a piston burette of 20 mL whose
// steps are about 1 uL; the noise is that of a well-kept electrode.
func benchA() bench {
	return bench{"Bench A", simulate.Electrode{DisplayStep: 0.01, TemperatureSD: 0.05}, simulate.Burette{ErrorSDML: 0.0012, DisplayStep: 0.001, MLPerS: 0.1}, 3}
}

func benchB() bench {
	return bench{"Bench B", simulate.Electrode{DisplayStep: 0.001}, simulate.Burette{ErrorSDML: 0.0012, DisplayStep: 0.001, MLPerS: 0.1}, 3}
}

func benchC() bench {
	return bench{"Bench C", simulate.Electrode{DisplayStep: 0.0001, TemperatureSD: 0.05}, simulate.Burette{ErrorSDML: 0.0012, DisplayStep: 0.001, MLPerS: 0.2}, 3}
}

// titration is one run with everything that a dump can say of it.
type titration struct {
	job
	bench        bench
	sample       string
	operator     string
	started      int // seconds since midnight
	temperatureC float64
	curve        simulate.Curve
	truth        simulate.Truth
	atReadingML  float64
	indicatedML  []float64
	placedML     float64 // of the fault
	kind         string  // of the endpoint: inflection, at-reading or break
}

// titrate simulates one job. Its draws depend on the generator alone.
func titrate(j job, b bench, rng *rand.Rand) (*titration, error) {
	t := &titration{job: j, bench: b, kind: "inflection"}
	t.temperatureC = math.Round(10*(22+rng.Float64())) / 10
	s := t.simulation(rng)
	var err error
	if s, err = t.stop(s); err != nil {
		return nil, err
	}
	if s, err = t.plant(s, rng); err != nil {
		return nil, err
	}
	if t.curve, t.truth, err = s.Run(rng.Uint64()); err != nil {
		return nil, fmt.Errorf("%s: %w", j.procedure.name, err)
	}
	switch {
	case j.toSet:
		t.kind = "at-reading"
		if t.atReadingML, err = s.VolumeAt(j.procedure.set); err != nil {
			return nil, err
		}
	case j.procedure.signal == simulate.Conductivity:
		t.kind = "break"
	}
	t.indicate(rng)
	return t, nil
}

// simulation draws the sample and the electrode.
func (t *titration) simulation(rng *rand.Rand) simulate.Titration {
	p := t.procedure
	c := p.lowMolar + (p.highMolar-p.lowMolar)*rng.Float64()
	s := simulate.Titration{
		Signal: p.signal, V0ML: p.v0ML(), Vessel: p.vessel(c * p.aliquotML / p.v0ML()), Titrant: p.burette,
		Ends: p.ends, Salts: p.salts, TemperatureC: t.temperatureC,
		Electrode: t.bench.electrode, Burette: t.bench.burette, Dosing: p.dosing,
	}
	e := &s.Electrode
	e.Slope, e.NoiseSD = 0.99+0.01*rng.Float64(), 0.002+0.001*rng.Float64()
	switch p.signal {
	case simulate.Potential:
		e.Offset, e.DisplayStep = 548+20*rng.Float64(), 0.1
	case simulate.Conductivity:
		e.NoiseSD = 0.0005 + 0.0003*rng.Float64()
		s.Law.Temperature = true
	default:
		e.Offset = 0.04 * (rng.Float64() - 0.5)
	}
	return s
}

// stop sets where dosing ends: well past the last endpoint, at a whole or half
// mL, or at the set reading.
func (t *titration) stop(s simulate.Titration) (simulate.Titration, error) {
	ends, err := s.EndpointsML()
	if err != nil {
		return s, err
	}
	s.Dosing.StopML = math.Ceil(2*t.procedure.beyond*ends[len(ends)-1]) / 2
	if t.endsAtSet {
		s.Dosing.StopReading, s.Dosing.MoreReadings = t.procedure.set, 2
	}
	return s, nil
}

// indicate writes what the instrument says of its own curve.
func (t *titration) indicate(rng *rand.Rand) {
	if t.fault == NoSample || t.fault == StopsShort {
		return
	}
	switch t.kind {
	case "at-reading":
		t.indicatedML = []float64{t.atReadingML * (1 + 0.0004*(rng.Float64()-0.5))}
	case "break":
		t.indicatedML = []float64{t.truth.EndpointsML[0] * (1 + 0.002*(rng.Float64()-0.5))}
	default:
		for _, v := range t.truth.InflectionsML {
			t.indicatedML = append(t.indicatedML, t.nearSteepest(v, rng))
		}
	}
	if t.fault == WrongIndicated {
		off := 0.024 + 0.012*rng.Float64()
		if rng.IntN(2) == 0 {
			off = -off
		}
		t.indicatedML[0] *= 1 + off
	}
	for i, v := range t.indicatedML {
		t.indicatedML[i] = places(v, t.indicatedPlaces())
	}
}

// nearSteepest returns a place inside the bracket of readings that holds the
// steepest place v, as an instrument would interpolate it. A lagging electrode
// shows its jump late: there the instrument follows its own readings.
func (t *titration) nearSteepest(v float64, rng *rand.Rand) float64 {
	low, high := t.bracket(v)
	if t.fault == Lagging {
		low, high = t.steepestSeen()
		v = (low + high) / 2
	}
	v += 0.5 * (rng.Float64() - 0.5) * (high - low)
	margin := 0.15 * (high - low)
	return math.Min(math.Max(v, low+margin), high-margin)
}

// bracket returns the displayed volumes on either side of v. Volumes that a
// planted fault sent back are passed over.
func (t *titration) bracket(v float64) (low, high float64) {
	high = math.Inf(1)
	for _, x := range t.curve.VolumesML {
		if x <= v {
			low = math.Max(low, x)
		} else {
			high = math.Min(high, x)
		}
	}
	return low, high
}

// steepestSeen returns the two displayed volumes between which the displayed
// reading changed fastest in the second half of the curve.
func (t *titration) steepestSeen() (low, high float64) {
	vs, ys := t.curve.VolumesML, t.curve.Readings
	steepest := 0.0
	for i := len(vs) / 3; i+1 < len(vs); i++ {
		if s := math.Abs(ys[i+1]-ys[i]) / (vs[i+1] - vs[i]); s > steepest {
			steepest, low, high = s, vs[i], vs[i+1]
		}
	}
	return low, high
}

// indicatedPlaces is 2 for plain dumps: their writer rounds.
func (t *titration) indicatedPlaces() int {
	if t.dialect == "plain" {
		return 2
	}
	return t.bench.indicatedPlaces
}

// places rounds to so many decimals.
func places(v float64, n int) float64 {
	per := math.Pow(10, float64(n))
	return math.Round(v*per) / per
}

// planted tells what is true of the run.
func (t *titration) planted(dump string, run int) Planted {
	s := tell(t.fault)
	return Planted{
		Dump: dump, Run: run, Sample: t.sample, Procedure: t.procedure.name, Signal: string(t.procedure.signal), Kind: t.kind,
		V0ML: t.truth.V0ML, EndpointsML: t.truth.EndpointsML, InflectionsML: t.truth.InflectionsML, AtReadingML: t.atReadingML,
		Fault: t.fault, PlacedML: t.placedML, Expect: s.expect, Flag: s.flag, Weight: s.weight,
	}
}
