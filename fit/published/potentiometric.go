package published

const (
	secondZero = "second-derivative zero by divided differences, first differences at interval mid-points, second " +
		"differences at the central reading, linear interpolation between the two beside the steepest interval"
	halfBracket = "half a bracket: between its two readings a steep curve is known only as a step, and every place in the " +
		"bracket agrees with the readings"
	nominalLimit = "the nominal volume is stoichiometric, not a truth about these readings; each estimator is asked to stay " +
		"within 0.2 mL of it (its own misfit: electrode or activity, 0.14 pH rms in a whole-curve model)"
)

func chlorideSilver() Table {
	return Table{
		Name: "chloride-silver", Dump: dump("chloride-silver"), Signal: "potential", Status: FromMemory,
		Source: "D. A. Skoog, D. M. West, F. J. Holler, S. R. Crouch, Fundamentals of Analytical Chemistry, 8th ed. 2004, " +
			"Table 21-1: 2.433 mmol of chloride with 0.1000 mol/L silver nitrate",
		Answers: []Answer{
			{Endpoint: 1, Kind: "inflection", VolumeML: 24.34, Status: FromMemory,
				How:         "printed end point, second derivative; recomputed: 24.3427, " + secondZero,
				ToleranceML: 0.05, ToleranceReason: halfBracket + "; bracket 24.30 to 24.40 mL"},
			{Endpoint: 1, Kind: "equivalence", VolumeML: 24.33, Status: FromMemory,
				How:         "stoichiometry, 2.433 mmol / 0.1000 mol/L",
				ToleranceML: 0.05, ToleranceReason: "half a bracket; readings rounded to 1 mV fix the flanks no worse"},
		},
	}
}

func weakAcid() Table {
	return Table{
		Name: "weak-acid", Dump: dump("weak-acid"), Signal: "pH", Status: Read,
		Source: "D. Harvey, Modern Analytical Chemistry, McGraw-Hill 2000, Table 9.5, p. 291: weak acid with 0.100 mol/L NaOH",
		Answers: []Answer{
			{Endpoint: 1, Kind: "inflection", VolumeML: 15.65, Status: Read,
				How:         "largest printed first derivative, 8.90 at the mid-point of 15.60 and 15.70 mL",
				ToleranceML: 0.05, ToleranceReason: halfBracket + "; bracket 15.60 to 15.70 mL"},
			{Endpoint: 1, Kind: "inflection", VolumeML: 15.669, Status: Computed,
				How:         secondZero + "; the spacing is even there, so the book's mid-point of mid-points gives the same",
				ToleranceML: 0.05, ToleranceReason: halfBracket + "; bracket 15.60 to 15.70 mL"},
			{Endpoint: 1, Kind: "equivalence", VolumeML: 15.63, Status: Computed,
				How:         "whole-curve fit with 50 mL assumed before titration; front Gran 15.49 to 15.54 mL",
				ToleranceML: 0.15, ToleranceReason: "the two outside methods differ by up to 0.14 mL"},
		},
	}
}

func phosphoric() Table {
	return Table{
		Name: "phosphoric", Dump: dump("phosphoric"), Signal: "pH", Status: Read,
		Source: "J. Martin et al., Int. J. Adv. Res. Chem. Sci. 4(9) (2017), DOI 10.20431/2349-0403.0409002, read in a public " +
			"copy that names the paper: 25 mL of 0.04389 mol/L H3PO4 with 0.09948 mol/L NaOH",
		Answers: []Answer{
			{Endpoint: 1, Kind: "inflection", VolumeML: 10.918, Status: Computed,
				How: secondZero, ToleranceML: 0.1, ToleranceReason: halfBracket + "; bracket 10.80 to 11.00 mL"},
			{Endpoint: 1, Kind: "inflection", VolumeML: 11.03, Status: Read,
				How: "published, nominal", ToleranceML: 0.2, ToleranceReason: nominalLimit},
			{Endpoint: 1, Kind: "equivalence", VolumeML: 11.03, Status: Read,
				How: "published, nominal", ToleranceML: 0.2, ToleranceReason: nominalLimit},
			{Endpoint: 2, Kind: "inflection", VolumeML: 22.194, Status: Computed,
				How: secondZero, ToleranceML: 0.15,
				ToleranceReason: "half of 22.00 to 22.30 mL: with volumes typed to 0.1 mL (u 0.029 mL) a slope over 0.1 mL is known " +
					"to 40 %, so that the readings cannot tell which of the three increments is the steepest"},
			{Endpoint: 2, Kind: "inflection", VolumeML: 22.06, Status: Read,
				How: "published, nominal", ToleranceML: 0.2, ToleranceReason: nominalLimit},
			{Endpoint: 2, Kind: "equivalence", VolumeML: 22.06, Status: Read,
				How: "published, nominal", ToleranceML: 0.2, ToleranceReason: nominalLimit},
		},
	}
}

func seawater() Table {
	const exact = "zero of the second derivative of the exact equation, testdata/inflections.py"
	return Table{
		Name: "seawater", Dump: dump("seawater"), Signal: "pH", Status: Read,
		Source: "A. G. Dickson, An exact definition of total alkalinity and a procedure for the estimation of alkalinity and " +
			"total inorganic carbon from titration data, Deep-Sea Research 28A (1981) 609-623, Table 1, read in a public copy; " +
			"200 g with 0.3000 mol/kg acid, density 1.0 g/mL put for both",
		Answers: []Answer{
			{Endpoint: 1, Kind: "inflection", VolumeML: 0.167201, Status: Computed, How: exact, MayMiss: true,
				ToleranceML: 0.01, ToleranceReason: "as the second; it is faint: only 1.6 times as steep as the first interval"},
			{Endpoint: 2, Kind: "inflection", VolumeML: 1.630501, Status: Computed, How: exact,
				ToleranceML: 0.01,
				ToleranceReason: "the steep part spans six increments and the readings are exact to 1e-6 pH: divided differences " +
					"give 1.6286, a shape-keeping cubic (SciPy) 1.6263; twice the farther one's distance"},
			{Endpoint: 2, Kind: "equivalence", VolumeML: 1.633333, Status: Read,
				How:         "published total alkalinity: 200 g x 0.00245 mol/kg / 0.3 mol/kg",
				ToleranceML: 0.0082, ToleranceReason: "0.5 %, the usual agreement limit; bisulfate and fluoride take up protons beside it"},
		},
	}
}

func diluteAcid() Table {
	return Table{
		Name: "dilute-acid", Dump: dump("dilute-acid"), Signal: "pH", Status: FromMemory,
		Source: "L. M. Schwartz, J. Chem. Educ. 69 (1992) 879-883, simulated: 49.94 mL of 1.02e-4 mol/L monoprotic acid, " +
			"pKa 8.16, with 1.004e-3 mol/L NaOH",
		Hard: "the slope at the inflection, 0.340 pH/mL, is only 1.09 times the flattest slope before it " +
			"(testdata/inflections.py): no derivative can defend an endpoint, so none is reported, or only with a flag",
		Answers: []Answer{
			{Endpoint: 1, Kind: "equivalence", VolumeML: 5.0736, Status: FromMemory,
				How:         "49.94 mL x 1.02e-4 / 1.004e-3",
				ToleranceML: 0.025,
				ToleranceReason: "0.5 %: a whole-curve fit with free pKw gives 5.072; one with pKw 14 gives 5.74 and plain Gran " +
					"5.4 to 5.7, which must not pass"},
		},
	}
}
