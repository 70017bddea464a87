package demo

import "lastdrop/fit/simulate"

// procedure is one invented kind of determination of the laboratory.
type procedure struct {
	name      string
	prefix    string // of its sample names
	what      string // told in the README
	titrant   string
	reaction  string
	signal    simulate.Signal
	aliquotML float64
	solventML float64
	molPerL   float64 // of the titrant, nominal and true
	lowMolar  float64 // amount of titrand in the aliquot, mol/L
	highMolar float64
	vessel    func(c float64) simulate.Solution // c: mol/L before titration
	burette   simulate.Solution
	ends      []simulate.End
	salts     []simulate.Salt
	dosing    simulate.Dosing // without its stop
	beyond    float64         // dosing stops at so many times the last endpoint
	set       float64         // the reading of a titration to a set reading
}

// v0ML returns the volume before titration.
func (p *procedure) v0ML() float64 { return p.aliquotML + p.solventML }

func sodiumHydroxide(c float64) simulate.Solution { return spectators("Na+", c) }
func hydrochloricAcid(c float64) simulate.Solution {
	return spectators("Cl-", c)
}

func spectators(ion string, c float64) simulate.Solution {
	return simulate.Solution{Spectators: []simulate.Spectator{{Ion: ion, MolPerL: c}}}
}

// dynamic is what an automatic burette is told for a curve with a jump.
func dynamic(change, smallestML, largestML float64) simulate.Dosing {
	return simulate.Dosing{ChangePerDose: change, SmallestML: smallestML, LargestML: largestML, WaitS: 7}
}

func hydrochloric() *procedure {
	return &procedure{
		name: "hydrochloric acid strength", prefix: "HCL", titrant: "NaOH", reaction: "acid-base", signal: simulate.PH,
		what:      "Dilute hydrochloric acid for cleaning, strong acid with strong base, 10 mL with 40 mL of water.",
		aliquotML: 10, solventML: 40, molPerL: 0.1, lowMolar: 0.11, highMolar: 0.14,
		vessel: hydrochloricAcid, burette: sodiumHydroxide(0.1), ends: []simulate.End{{}},
		dosing: dynamic(0.15, 0.05, 0.5), beyond: 1.35,
	}
}

func vinegar() *procedure {
	return &procedure{
		name: "vinegar acidity", prefix: "VIN", titrant: "NaOH", reaction: "acid-base", signal: simulate.PH,
		what:      "Acetic acid of pickling vinegar, weak acid with strong base, 1.5 mL with 60 mL of water; some runs are titrated to pH 8.10.",
		aliquotML: 1.5, solventML: 60, molPerL: 0.1, lowMolar: 0.8, highMolar: 1.0,
		vessel: func(c float64) simulate.Solution {
			return simulate.Solution{Groups: []simulate.Group{simulate.Acetic(c)}}
		},
		burette: sodiumHydroxide(0.1), ends: []simulate.End{{Levels: []int{1}}},
		dosing: dynamic(0.15, 0.04, 0.5), beyond: 1.35, set: 8.1,
	}
}

func phosphoric() *procedure {
	return &procedure{
		name: "phosphoric acid cleaner", prefix: "PHO", titrant: "NaOH", reaction: "acid-base", signal: simulate.PH,
		what:      "Phosphoric acid of a descaling cleaner with strong base, 2 mL with 60 mL of water; the first two of three steps are seen.",
		aliquotML: 2, solventML: 60, molPerL: 0.1, lowMolar: 0.36, highMolar: 0.48,
		vessel: func(c float64) simulate.Solution {
			return simulate.Solution{Groups: []simulate.Group{simulate.Phosphoric(c)}}
		},
		burette: sodiumHydroxide(0.1), ends: []simulate.End{{Levels: []int{1}}, {Levels: []int{2}}},
		dosing: dynamic(0.15, 0.05, 0.5), beyond: 1.3,
	}
}

func ammonia() *procedure {
	return &procedure{
		name: "ammonia in refrigeration water", prefix: "AMM", titrant: "HCl", reaction: "acid-base", signal: simulate.PH,
		what:      "Ammonia in the water of the cold store, weak base with strong acid, 50 mL with 10 mL of water.",
		aliquotML: 50, solventML: 10, molPerL: 0.1, lowMolar: 0.021, highMolar: 0.03,
		vessel: func(c float64) simulate.Solution {
			return simulate.Solution{Groups: []simulate.Group{simulate.Ammonium(c)}}
		},
		burette: hydrochloricAcid(0.1), ends: []simulate.End{{Levels: []int{0}}},
		dosing: dynamic(0.15, 0.04, 0.5), beyond: 1.35,
	}
}

// Process water has 0.7 mol of hydrogen carbonate for each mol of carbonate,
// so that the second part of its curve is longer than the first.
const hydrogenCarbonateShare = 0.7

func alkalinity() *procedure {
	return &procedure{
		name: "process-water alkalinity", prefix: "WAT", titrant: "HCl", reaction: "acid-base", signal: simulate.PH,
		what:      "Carbonate and hydrogen carbonate in boiler water with strong acid, 100 mL as taken; both steps are endpoints.",
		aliquotML: 100, solventML: 0, molPerL: 0.1, lowMolar: 0.0065, highMolar: 0.009,
		vessel: func(c float64) simulate.Solution {
			return simulate.Solution{
				Spectators: []simulate.Spectator{{Ion: "Na+", MolPerL: (2 + hydrogenCarbonateShare) * c}},
				Groups:     []simulate.Group{simulate.Carbonic((1 + hydrogenCarbonateShare) * c)},
			}
		},
		burette: hydrochloricAcid(0.1), ends: []simulate.End{{Levels: []int{1}}, {Levels: []int{0}}},
		dosing: dynamic(0.15, 0.05, 0.5), beyond: 1.3,
	}
}

func brine() *procedure {
	return &procedure{
		name: "brine chloride", prefix: "BRI", titrant: "AgNO3", reaction: "precipitation", signal: simulate.Potential,
		what:      "Chloride of pickling brine with silver nitrate, 1 mL with 60 mL of water, potential of a silver electrode.",
		aliquotML: 1, solventML: 60, molPerL: 0.1, lowMolar: 1.0, highMolar: 1.4,
		vessel: func(c float64) simulate.Solution {
			return simulate.Solution{Spectators: []simulate.Spectator{{Ion: "Na+", MolPerL: c}, {Ion: "Cl-", MolPerL: c}}}
		},
		burette: simulate.Solution{Spectators: []simulate.Spectator{{Ion: "Ag+", MolPerL: 0.1}, {Ion: "NO3-", MolPerL: 0.1}}},
		salts:   []simulate.Salt{{Anion: "Cl-", PKsp: simulate.PKspAgCl}},
		dosing:  dynamic(8, 0.05, 0.5), beyond: 1.35,
	}
}

func caustic() *procedure {
	return &procedure{
		name: "caustic by conductivity", prefix: "CAU", titrant: "HCl", reaction: "acid-base", signal: simulate.Conductivity,
		what:      "Caustic soda of the bottle washer by conductivity, strong base with strong acid, 10 mL with 90 mL of water.",
		aliquotML: 10, solventML: 90, molPerL: 0.1, lowMolar: 0.095, highMolar: 0.12,
		vessel: sodiumHydroxide, burette: hydrochloricAcid(0.1), ends: []simulate.End{{}},
		dosing: simulate.Dosing{FixedML: 0.25, WaitS: 6}, beyond: 1.8,
	}
}

func vinegarConductivity() *procedure {
	p := vinegar()
	p.name, p.prefix, p.signal = "vinegar by conductivity", "VCO", simulate.Conductivity
	p.what = "Acetic acid of vinegar by conductivity, weak acid with strong base, 2 mL with 98 mL of water, titrant 0.2 mol/L."
	p.aliquotML, p.solventML, p.molPerL, p.lowMolar, p.highMolar = 2, 98, 0.2, 0.95, 1.15
	p.burette = sodiumHydroxide(0.2)
	p.dosing, p.beyond, p.set = simulate.Dosing{FixedML: 0.25, WaitS: 6}, 1.8, 0
	return p
}

// procedures lists all of them in the order of the README.
func procedures() []*procedure {
	return []*procedure{vinegar(), hydrochloric(), phosphoric(), ammonia(), brine(), alkalinity(), caustic(), vinegarConductivity()}
}
