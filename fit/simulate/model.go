package simulate

import (
	"fmt"
	"math"
)

// model is the chemistry of one titration.
type model interface {
	// decades returns pH or log10 [Ag+] at a volume of titrant.
	decades(volumeML float64) (float64, error)
	// volumeAt returns the volume at which that value is reached, and the
	// volume it takes for one decade more there.
	volumeAt(u float64) (volumeML, mlPerDecade float64)
	// conductivity returns mS/cm at a volume of titrant.
	conductivity(volumeML float64) (float64, error)
	// endpoints returns the equivalence volumes by stoichiometry.
	endpoints() ([]float64, error)
}

// model checks the chemistry and prepares it.
func (t Titration) model() (model, error) {
	if !(t.V0ML > 0) || math.IsInf(t.V0ML, 1) {
		return nil, fmt.Errorf("the volume before titration is %g mL; it must be above 0", t.V0ML)
	}
	for _, s := range []Solution{t.Vessel, t.Titrant} {
		if err := s.check(); err != nil {
			return nil, err
		}
	}
	pkw := t.PKw
	if pkw == 0 {
		var err error
		if pkw, err = PKw(t.TemperatureC); err != nil {
			return nil, err
		}
	}
	law := t.Law
	law.temperatureC = t.TemperatureC
	if len(t.Salts) > 0 {
		return newPrecipitation(t, law)
	}
	if t.Signal == Potential {
		return nil, fmt.Errorf("a potential needs salts that silver precipitates")
	}
	return newAcidBase(t, pkw, law), nil
}

// share returns how much of the mixture is vessel and how much is titrant.
func share(v0ML, volumeML float64) (vessel, titrant float64) {
	return v0ML / (v0ML + volumeML), volumeML / (v0ML + volumeML)
}
