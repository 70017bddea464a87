package fit_test

import "lastdrop/fit/simulate"

// family is one kind of titration; sample scales the amount titrated, so the
// endpoints move with it.
type family struct {
	name string
	make func(sample float64) simulate.Titration
	ends int
}

// salt is a shorthand for spectators that take no proton.
func salt(ion string, c float64) simulate.Spectator { return simulate.Spectator{Ion: ion, MolPerL: c} }

// acidBase is 50 mL of something with 0.1 mol/L of a strong acid or base, read
// by a pH electrode with 0.003 pH of noise and a display of 0.01.
func acidBase(vessel simulate.Solution, titrantIon string, ends ...simulate.End) simulate.Titration {
	return simulate.Titration{
		Signal: simulate.PH, V0ML: 50, TemperatureC: 25, Vessel: vessel, Ends: ends,
		Titrant:   simulate.Solution{Spectators: []simulate.Spectator{salt(titrantIon, 0.1)}},
		Electrode: simulate.Electrode{Slope: 0.99, NoiseSD: 0.003, DisplayStep: 0.01},
		Burette:   simulate.Burette{ErrorSDML: 0.0012, DisplayStep: 0.001},
	}
}

func strong(sample float64) simulate.Titration {
	return acidBase(simulate.Solution{Spectators: []simulate.Spectator{salt("Cl-", 0.02*sample)}}, "Na+", simulate.End{})
}

func acetic(sample float64) simulate.Titration {
	return acidBase(simulate.Solution{Groups: []simulate.Group{simulate.Acetic(0.02 * sample)}}, "Na+",
		simulate.End{Levels: []int{1}})
}

// ammonia falls: a weak base with hydrochloric acid.
func ammonia(sample float64) simulate.Titration {
	return acidBase(simulate.Solution{Groups: []simulate.Group{simulate.Ammonium(0.02 * sample)}}, "Cl-",
		simulate.End{Levels: []int{0}})
}

func phosphoric(sample float64) simulate.Titration {
	return acidBase(simulate.Solution{Groups: []simulate.Group{simulate.Phosphoric(0.02 * sample)}}, "Na+",
		simulate.End{Levels: []int{1}}, simulate.End{Levels: []int{2}})
}

// carbonate falls: sodium carbonate with hydrochloric acid.
func carbonate(sample float64) simulate.Titration {
	return acidBase(simulate.Solution{
		Spectators: []simulate.Spectator{salt("Na+", 0.04*sample)},
		Groups:     []simulate.Group{simulate.Carbonic(0.02 * sample)},
	}, "Cl-", simulate.End{Levels: []int{1}}, simulate.End{Levels: []int{0}})
}

// silver is chloride with 0.1 mol/L silver nitrate, in mV to 0.1 mV.
func silver(sample float64) simulate.Titration {
	s := acidBase(simulate.Solution{Spectators: []simulate.Spectator{salt("Na+", 0.02*sample), salt("Cl-", 0.02*sample)}}, "Ag+")
	s.Titrant.Spectators = append(s.Titrant.Spectators, salt("NO3-", 0.1))
	s.Signal, s.Salts = simulate.Potential, []simulate.Salt{{Anion: "Cl-", PKsp: simulate.PKspAgCl}}
	s.Electrode = simulate.Electrode{Slope: 0.99, Offset: 560, NoiseSD: 0.003, DisplayStep: 0.1}
	return s
}

// conductive is 100 mL of an acid of 0.01 mol/L with 0.1 mol/L NaOH, by
// conductivity with 0.1 % of noise.
func conductive(vessel simulate.Solution, end simulate.End) simulate.Titration {
	s := acidBase(vessel, "Na+", end)
	s.Signal, s.V0ML = simulate.Conductivity, 100
	s.Electrode = simulate.Electrode{NoiseSD: 0.001, DisplayStep: 0.0001}
	return s
}

func strongConductivity(sample float64) simulate.Titration {
	return conductive(simulate.Solution{Spectators: []simulate.Spectator{salt("Cl-", 0.01*sample)}}, simulate.End{})
}

func weakConductivity(sample float64) simulate.Titration {
	return conductive(simulate.Solution{Groups: []simulate.Group{simulate.Acetic(0.01 * sample)}}, simulate.End{Levels: []int{1}})
}

// potentiometric are the families with pH or mV, their endpoints near 10 (and
// 20) mL.
func potentiometric() []family {
	return []family{{"strong", strong, 1}, {"acetic", acetic, 1}, {"ammonia", ammonia, 1},
		{"phosphoric", phosphoric, 2}, {"carbonate", carbonate, 2}, {"silver", silver, 1}}
}

// singles are those with one endpoint.
func singles() []family {
	return []family{{"strong", strong, 1}, {"acetic", acetic, 1}, {"ammonia", ammonia, 1}, {"silver", silver, 1}}
}

func conductometric() []family {
	return []family{{"strong, conductivity", strongConductivity, 1}, {"weak, conductivity", weakConductivity, 1}}
}

// dynamic doses toward a change of 0.25 pH (15 mV), between a smallest and a
// largest dose, up to 1.5 endpoints (1.25 for two).
func dynamic(s simulate.Titration, smallestML float64) simulate.Titration {
	s.Dosing = simulate.Dosing{ChangePerDose: 0.25, SmallestML: smallestML, LargestML: 0.4, StopML: stop(s)}
	if s.Signal == simulate.Potential {
		s.Dosing.ChangePerDose = 15
	}
	return s
}

// fixed doses evenly.
func fixed(s simulate.Titration, doseML float64) simulate.Titration {
	s.Dosing = simulate.Dosing{FixedML: doseML, StopML: stop(s)}
	return s
}

// stop returns 15 mL for the endpoint at 10, 25 for that at 20, and 20 for
// conductivity.
func stop(s simulate.Titration) float64 {
	switch {
	case s.Signal == simulate.Conductivity:
		return 20
	case len(s.Ends) > 1:
		return 25
	}
	return 15
}

// way is a way to dose.
type way struct {
	name string
	dose func(simulate.Titration) simulate.Titration
}

// ways are the three that every potentiometric family is dosed in.
func ways() []way {
	return []way{
		{"dynamic 0.04", func(s simulate.Titration) simulate.Titration { return dynamic(s, 0.04) }},
		{"dynamic 0.01", func(s simulate.Titration) simulate.Titration { return dynamic(s, 0.01) }},
		{"fixed 0.2", func(s simulate.Titration) simulate.Titration { return fixed(s, 0.2) }},
	}
}

// evenWays are those for conductivity, whose curves are dosed evenly.
func evenWays() []way {
	return []way{
		{"fixed 0.1", func(s simulate.Titration) simulate.Titration { return fixed(s, 0.1) }},
		{"fixed 0.2", func(s simulate.Titration) simulate.Titration { return fixed(s, 0.2) }},
		{"fixed 0.5", func(s simulate.Titration) simulate.Titration { return fixed(s, 0.5) }},
	}
}

// sample is the amount for a seed, 0.975 to 1.025 of the nominal one.
func sample(seed uint64) float64 { return 0.975 + 0.05*fraction(seed) }
