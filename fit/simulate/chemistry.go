package simulate

import (
	"fmt"
	"math"
)

// Spectator is an ion that takes no proton.
type Spectator struct {
	Ion     string // a name of the table in ions.go: "Na+", "Cl-" ...
	MolPerL float64
}

// Group is one acid with all its bases. PK ascend; Charge is that of the form
// with all protons (0 for phosphoric acid, +1 for ammonium).
type Group struct {
	MolPerL float64
	PK      []float64
	Charge  int
	Ions    []string // name of each form in the table of ions, most protons first; "" where it has no charge
}

// Solution is what stands in the vessel or in the burette. The charge that
// spectators and groups leave over is made up by H+ and OH-.
type Solution struct {
	Spectators []Spectator
	Groups     []Group
}

// End is an equivalence point: how many protons each group of the vessel, and
// of the titrant, has lost there, counted from its fully protonated form. A
// strong acid or base alone has the End with no levels at all.
type End struct {
	Levels        []int
	TitrantLevels []int
}

// Acid constants at 25 °C and zero ionic strength, [crc]; the second and third
// of phosphoric acid from memory.
const (
	pkAcetic      = 4.756
	pkAmmonium    = 9.25
	pkCarbonic1   = 6.35
	pkCarbonic2   = 10.33
	pkPhosphoric1 = 2.16
	pkPhosphoric2 = 7.21
	pkPhosphoric3 = 12.32
)

// Acetic returns acetic acid with acetate, c mol/L together.
func Acetic(c float64) Group {
	return Group{MolPerL: c, PK: []float64{pkAcetic}, Ions: []string{"", "CH3COO-"}}
}

// Ammonium returns ammonium with ammonia, c mol/L together.
func Ammonium(c float64) Group {
	return Group{MolPerL: c, PK: []float64{pkAmmonium}, Charge: 1, Ions: []string{"NH4+", ""}}
}

// Carbonic returns dissolved carbon dioxide with hydrogen carbonate and
// carbonate, c mol/L together.
func Carbonic(c float64) Group {
	return Group{MolPerL: c, PK: []float64{pkCarbonic1, pkCarbonic2}, Ions: []string{"", "HCO3-", "CO3-2"}}
}

// Phosphoric returns phosphoric acid with its three bases, c mol/L together.
// Its doubly and triply charged forms have no tabulated conductivity here.
func Phosphoric(c float64) Group {
	return Group{MolPerL: c, PK: []float64{pkPhosphoric1, pkPhosphoric2, pkPhosphoric3}, Ions: []string{"", "H2PO4-", "", ""}}
}

// check refuses what is no solution.
func (s Solution) check() error {
	for _, p := range s.Spectators {
		if _, ok := findIon(p.Ion); !ok {
			return fmt.Errorf("the ion %q is not in the table of ions", p.Ion)
		}
		if !amount(p.MolPerL) {
			return fmt.Errorf("%s has %g mol/L; 0 or more is needed", p.Ion, p.MolPerL)
		}
	}
	for i, g := range s.Groups {
		if !amount(g.MolPerL) || len(g.PK) == 0 {
			return fmt.Errorf("group %d has %g mol/L and %d pK; 0 or more and at least one are needed", i+1, g.MolPerL, len(g.PK))
		}
		for k := 1; k < len(g.PK); k++ {
			if !(g.PK[k] >= g.PK[k-1]) {
				return fmt.Errorf("group %d: pK %g stands after %g; they must ascend", i+1, g.PK[k], g.PK[k-1])
			}
		}
	}
	return nil
}

// amount says whether c can be a concentration.
func amount(c float64) bool { return c >= 0 && !math.IsInf(c, 1) }

// strong returns the charge of the spectators, mol/L.
func (s Solution) strong() float64 {
	sum := 0.0
	for _, p := range s.Spectators {
		ion, _ := findIon(p.Ion)
		sum += float64(ion.charge) * p.MolPerL
	}
	return sum
}

// forms returns the share of each form at a pH, most protons first.
func (g Group) forms(ph float64) []float64 {
	shares := make([]float64, 0, len(g.PK)+1)
	g.eachForm(ph, func(_ int, share float64) { shares = append(shares, share) })
	return shares
}

// eachForm calls f with the share of each form. The largest exponent is taken
// out, so nothing overflows.
func (g Group) eachForm(ph float64, f func(k int, share float64)) {
	exponent, highest := 0.0, 0.0
	for _, pk := range g.PK {
		exponent += ph - pk
		highest = math.Max(highest, exponent)
	}
	sum := math.Exp(-math.Ln10 * highest)
	exponent = 0
	for _, pk := range g.PK {
		exponent += ph - pk
		sum += math.Exp(math.Ln10 * (exponent - highest))
	}
	exponent = 0
	f(0, math.Exp(-math.Ln10*highest)/sum)
	for k, pk := range g.PK {
		exponent += ph - pk
		f(k+1, math.Exp(math.Ln10*(exponent-highest))/sum)
	}
}

// charge returns the charge of the group per litre, and how fast it rises
// with ln h: the variance of the number of protons.
func (g Group) charge(ph float64) (molPerL, slope float64) {
	mean, square := 0.0, 0.0
	g.eachForm(ph, func(k int, share float64) {
		mean += share * float64(k)
		square += share * float64(k) * float64(k)
	})
	return g.MolPerL * (float64(g.Charge) - mean), g.MolPerL * (square - mean*mean)
}

// balance is a solution with the charge of its spectators added up.
type balance struct {
	strong float64 // mol/L
	groups []Group
}

// charge returns the charge of all but H+ and OH-, mol/L, and its slope with
// ln h.
func (b balance) charge(ph float64) (molPerL, slope float64) {
	molPerL = b.strong
	for _, g := range b.groups {
		z, dz := g.charge(ph)
		molPerL += z
		slope += dz
	}
	return molPerL, slope
}

// atLevels returns the charge with every group at a stated form.
func (s Solution) atLevels(levels []int) (float64, error) {
	if len(levels) != len(s.Groups) {
		return 0, fmt.Errorf("an end states %d levels for %d groups", len(levels), len(s.Groups))
	}
	sum := s.strong()
	for i, g := range s.Groups {
		if levels[i] < 0 || levels[i] > len(g.PK) {
			return 0, fmt.Errorf("an end states level %d of a group with %d protons", levels[i], len(g.PK))
		}
		sum += g.MolPerL * float64(g.Charge-levels[i])
	}
	return sum, nil
}
