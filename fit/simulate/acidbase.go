package simulate

import (
	"fmt"
	"math"
)

// acidBase is the exact charge balance of an acid-base titration.
type acidBase struct {
	vessel, titrant Solution
	inVessel, dosed balance // of the two, prepared
	v0ML, kw        float64
	ends            []End
	law             ConductivityLaw
}

// newAcidBase prepares the balance.
func newAcidBase(t Titration, pkw float64, law ConductivityLaw) *acidBase {
	return &acidBase{
		vessel: t.Vessel, titrant: t.Titrant, v0ML: t.V0ML, kw: math.Pow(10, -pkw), ends: t.Ends, law: law,
		inVessel: balance{t.Vessel.strong(), t.Vessel.Groups}, dosed: balance{t.Titrant.strong(), t.Titrant.Groups},
	}
}

// The span of pH that is searched: beyond anything that water can be.
const lowestPH, highestPH = -3, 18

// water returns [H+] - [OH-] and its slope with ln h.
func (a *acidBase) water(ph float64) (molPerL, slope float64) {
	h := math.Exp(-math.Ln10 * ph)
	return h - a.kw/h, h + a.kw/h
}

// decades solves the charge balance for the pH. The balance falls with pH
// everywhere, so there is exactly one solution.
func (a *acidBase) decades(volumeML float64) (float64, error) {
	inVessel, inTitrant := share(a.v0ML, volumeML)
	return root(func(ph float64) (value, slope float64) {
		q0, d0 := a.inVessel.charge(ph)
		qt, dt := a.dosed.charge(ph)
		w, dw := a.water(ph)
		return inVessel*q0 + inTitrant*qt + w, -math.Ln10 * (inVessel*d0 + inTitrant*dt + dw)
	}, lowestPH, highestPH)
}

// volumeAt uses that the same balance is linear in the volume, [gran]:
// V = -V0 (Q0 + w) / (Qt + w), w = h - Kw/h.
func (a *acidBase) volumeAt(ph float64) (volumeML, mlPerDecade float64) {
	q0, d0 := a.inVessel.charge(ph)
	qt, dt := a.dosed.charge(ph)
	w, dw := a.water(ph)
	n, dn := q0+w, d0+dw
	d, dd := qt+w, dt+dw
	return -a.v0ML * n / d, math.Ln10 * a.v0ML * (dn*d - n*dd) / (d * d)
}

// endpoints finds the volume at which all charges of the stated forms cancel.
func (a *acidBase) endpoints() ([]float64, error) {
	if len(a.ends) == 0 {
		return nil, nil
	}
	volumes := make([]float64, 0, len(a.ends))
	for _, e := range a.ends {
		q0, err := a.vessel.atLevels(e.Levels)
		if err != nil {
			return nil, fmt.Errorf("vessel: %w", err)
		}
		qt, err := a.titrant.atLevels(e.TitrantLevels)
		if err != nil {
			return nil, fmt.Errorf("titrant: %w", err)
		}
		v := -a.v0ML * q0 / qt
		if !(v > 0) || math.IsInf(v, 1) {
			return nil, fmt.Errorf("the titrant never reaches the end with levels %v", e.Levels)
		}
		volumes = append(volumes, v)
	}
	return volumes, nil
}

// conductivity sums all ions of the mixture.
func (a *acidBase) conductivity(volumeML float64) (float64, error) {
	ph, err := a.decades(volumeML)
	if err != nil {
		return 0, err
	}
	inVessel, inTitrant := share(a.v0ML, volumeML)
	ions := a.vessel.ions(nil, ph, inVessel)
	ions = a.titrant.ions(ions, ph, inTitrant)
	h := math.Pow(10, -ph)
	ions = append(ions, Spectator{"H+", h}, Spectator{"OH-", a.kw / h})
	return a.law.of(ions)
}

// ions appends the ions of a solution that was diluted to a share of 1.
func (s Solution) ions(to []Spectator, ph, share float64) []Spectator {
	for _, p := range s.Spectators {
		to = append(to, Spectator{p.Ion, p.MolPerL * share})
	}
	for _, g := range s.Groups {
		for k, form := range g.forms(ph) {
			name := ""
			if k < len(g.Ions) {
				name = g.Ions[k]
			}
			if g.Charge != k {
				to = append(to, Spectator{name, g.MolPerL * form * share})
			}
		}
	}
	return to
}
