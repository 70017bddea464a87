package simulate

import (
	"fmt"
	"math"
)

// ConductivityLaw says how far conductivities differ from the sum of the
// limiting ones at 25 °C. The zero value is that sum.
type ConductivityLaw struct {
	SquareRoot  bool // take off the square-root law of Kohlrausch and Onsager
	Temperature bool // 2 %/K away from 25 °C

	temperatureC float64
}

// Constants of Onsager's limiting law in water at 25 °C for ions of charge 1,
// from memory: L = L0 - (60.20 + 0.229 L0) sqrt(c). Half of the first term is
// given to each of the two ions.
const (
	onsagerPerIon = 60.20 / 2 // S cm2/mol (L/mol)^1/2
	onsagerFactor = 0.229     // (L/mol)^1/2
)

// perKelvin is the relative change of conductivity with temperature; common
// practice, no source.
const perKelvin = 0.02

// of returns the conductivity in mS/cm of ions in mol/L. With lambda in
// S cm2/mol per equivalent, kappa = sum lambda |z| c is in mS/cm as it stands.
func (l ConductivityLaw) of(ions []Spectator) (float64, error) {
	root := 0.0
	if l.SquareRoot {
		root = math.Sqrt(ionicStrength(ions))
	}
	sum := 0.0
	for _, p := range ions {
		i, ok := findIon(p.Ion)
		if !ok {
			return 0, fmt.Errorf("the conductivity of the ion %q is not tabulated", p.Ion)
		}
		lambda := i.equivalent - (onsagerPerIon+onsagerFactor*i.equivalent)*root
		sum += math.Max(lambda, 0) * math.Abs(float64(i.charge)) * p.MolPerL
	}
	if l.Temperature {
		sum *= 1 + perKelvin*(l.temperatureC-25)
	}
	return sum, nil
}

// ionicStrength is half the sum of c z2, mol/L.
func ionicStrength(ions []Spectator) float64 {
	sum := 0.0
	for _, p := range ions {
		i, _ := findIon(p.Ion)
		sum += p.MolPerL * float64(i.charge*i.charge) / 2
	}
	return sum
}
