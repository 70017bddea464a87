package simulate

import (
	"fmt"
	"math"
)

// Salt is a silver salt that precipitates. PKsp is the negative decadic
// logarithm of its solubility product in (mol/L)2.
type Salt struct {
	Anion string // with charge -1, a spectator of the vessel
	PKsp  float64
}

// PKspAgCl is that of silver chloride at 25 °C, as used in the synthetic
// table synth_KCl_AgNO3_Ve10 (10^-9.75).
const PKspAgCl = 9.75

// precipitate is a salt with the amount of its anion.
type precipitate struct {
	anion        string
	ksp, molPerL float64
}

// precipitation is the mass balance of silver with one or more anions:
// [Ag+] + sum of the solids = total silver, solid = max(0, C - Ksp/[Ag+]).
// Water and its ions play no part.
type precipitation struct {
	salts              []precipitate // least soluble first, as stated
	vessel, titrant    Solution
	v0ML, silverMolPer float64
	law                ConductivityLaw
}

// newPrecipitation checks that the titrant has silver and the vessel anions.
func newPrecipitation(t Titration, law ConductivityLaw) (*precipitation, error) {
	p := &precipitation{vessel: t.Vessel, titrant: t.Titrant, v0ML: t.V0ML, silverMolPer: t.Titrant.concentration("Ag+"), law: law}
	if !(p.silverMolPer > 0) {
		return nil, fmt.Errorf("salts are stated, but the titrant has no Ag+")
	}
	for i, s := range t.Salts {
		if i > 0 && s.PKsp >= t.Salts[i-1].PKsp {
			return nil, fmt.Errorf("salt %d is less soluble than the one before; state the least soluble first", i+1)
		}
		c := t.Vessel.concentration(s.Anion)
		if !(c > 0) {
			return nil, fmt.Errorf("the vessel has no %q to precipitate", s.Anion)
		}
		p.salts = append(p.salts, precipitate{s.Anion, math.Pow(10, -s.PKsp), c})
	}
	return p, nil
}

// concentration returns the mol/L of one spectator.
func (s Solution) concentration(name string) float64 {
	sum := 0.0
	for _, p := range s.Spectators {
		if p.Ion == name {
			sum += p.MolPerL
		}
	}
	return sum
}

// The span of log10 [Ag+] that is searched.
const lowestSilver, highestSilver = -30, 2

// free solves the mass balance for log10 [Ag+]; it rises with [Ag+].
func (p *precipitation) free(volumeML float64) (float64, error) {
	inVessel, inTitrant := share(p.v0ML, volumeML)
	if volumeML == 0 {
		return lowestSilver, nil
	}
	return root(func(u float64) (value, slope float64) {
		a := math.Pow(10, u)
		value, slope = a-p.silverMolPer*inTitrant, a
		for _, s := range p.salts {
			if solid := s.molPerL*inVessel - s.ksp/a; solid > 0 {
				value += solid
				slope += s.ksp / a
			}
		}
		return value, slope * math.Ln10
	}, lowestSilver, highestSilver)
}

// decades returns log10 [Ag+] as a silver electrode sees it: the coat of its
// own salt keeps the solution at its surface saturated, so a vessel without
// silver still has a reading.
func (p *precipitation) decades(volumeML float64) (float64, error) {
	u, err := p.free(volumeML)
	if err != nil {
		return 0, err
	}
	inVessel, _ := share(p.v0ML, volumeML)
	saturated := math.Inf(1)
	for _, s := range p.salts {
		saturated = math.Min(saturated, math.Log10(s.ksp/(s.molPerL*inVessel)))
	}
	return math.Max(u, saturated), nil
}

// volumeAt solves the same balance for the volume, which is linear once it is
// known which salts are present as solids; those drop out one by one.
func (p *precipitation) volumeAt(u float64) (volumeML, mlPerDecade float64) {
	a := math.Pow(10, u)
	solid := append([]precipitate(nil), p.salts...)
	for {
		n, d, slope := a, p.silverMolPer-a, a
		for _, s := range solid {
			n += s.molPerL - s.ksp/a
			d += s.ksp / a
			slope += s.ksp / a
		}
		v := p.v0ML * n / d
		inVessel, _ := share(p.v0ML, v)
		kept := solid[:0:0]
		for _, s := range solid {
			if s.molPerL*inVessel > s.ksp/a {
				kept = append(kept, s)
			}
		}
		if len(kept) == len(solid) {
			return v, math.Ln10 * p.v0ML * slope * (d + n) / (d * d)
		}
		solid = kept
	}
}

// endpoints adds up the anions, least soluble first.
func (p *precipitation) endpoints() ([]float64, error) {
	volumes, sum := make([]float64, 0, len(p.salts)), 0.0
	for _, s := range p.salts {
		sum += s.molPerL
		volumes = append(volumes, p.v0ML*sum/p.silverMolPer)
	}
	return volumes, nil
}

// conductivity sums the dissolved ions; those of water are left out.
func (p *precipitation) conductivity(volumeML float64) (float64, error) {
	u, err := p.free(volumeML)
	if err != nil {
		return 0, err
	}
	inVessel, inTitrant := share(p.v0ML, volumeML)
	ions := []Spectator{{"Ag+", math.Pow(10, u)}}
	for _, s := range p.salts {
		ions = append(ions, Spectator{s.anion, math.Min(s.molPerL*inVessel, s.ksp/math.Pow(10, u))})
	}
	for _, x := range p.vessel.Spectators {
		if !p.precipitates(x.Ion) {
			ions = append(ions, Spectator{x.Ion, x.MolPerL * inVessel})
		}
	}
	for _, x := range p.titrant.Spectators {
		if x.Ion != "Ag+" {
			ions = append(ions, Spectator{x.Ion, x.MolPerL * inTitrant})
		}
	}
	return p.law.of(ions)
}

// precipitates says whether an ion of the vessel is the anion of a salt.
func (p *precipitation) precipitates(name string) bool {
	for _, s := range p.salts {
		if s.anion == name {
			return true
		}
	}
	return false
}
