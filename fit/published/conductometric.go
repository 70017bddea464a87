package published

const (
	computedSource = "computed, not published: exact curve from limiting molar conductivities (CRC Handbook, P. Vanysek) without " +
		"activity correction, 100 mL before titration, titrant 0.1 mol/L; "
	byConstruction = "exact by construction"
	fixedRanges    = "two lines by least squares on the dilution-corrected readings (testdata/two_line.py), ranges in mL: "
	cornerOut      = "other sensible arms move it by less than 0.0003 mL (testdata/two_line.json) and the figure is rounded to " +
		"0.001 mL; an arm that takes in the corner reading at 10 mL errs by up to 0.006 mL and is to fail"
	armsSpread = "the farthest that 36 or more other sensible pairs of arms move it (testdata/two_line.json), rounded up: the arms " +
		"are curved, and which part is taken for straight is a choice"
)

func conductanceStrong() Table {
	return Table{
		Name: "conductance-strong", Dump: dump("conductance-strong"), Signal: "conductivity", Status: Computed,
		Source: computedSource + "1 mmol HCl with NaOH",
		Answers: []Answer{
			{Endpoint: 1, Kind: "break", VolumeML: 10, Status: Computed, How: byConstruction,
				ToleranceML: 0.002, ToleranceReason: cornerOut},
			{Endpoint: 1, Kind: "break", Estimator: "two-line", VolumeML: 10.000, Status: Computed,
				How: fixedRanges + "0 to 9 and 11 to 20", ToleranceML: 0.002, ToleranceReason: cornerOut},
		},
	}
}

func conductanceWeak() Table {
	return Table{
		Name: "conductance-weak", Dump: dump("conductance-weak"), Signal: "conductivity", Status: Computed,
		Source: computedSource + "1 mmol acetic acid (pKa 4.756) with NaOH",
		Answers: []Answer{
			{Endpoint: 1, Kind: "break", VolumeML: 10, Status: Computed, How: byConstruction,
				ToleranceML: 0.055, ToleranceReason: "two lines are biased by a weak acid's curved arm: 9.946 at worst of 240 pairs of arms"},
			{Endpoint: 1, Kind: "break", Estimator: "two-line", VolumeML: 9.988, Status: Computed,
				How: fixedRanges + "4 to 9 and 11 to 20", ToleranceML: 0.045, ToleranceReason: armsSpread},
		},
	}
}

func conductanceMixture() Table {
	return Table{
		Name: "conductance-mixture", Dump: dump("conductance-mixture"), Signal: "conductivity", Status: Computed,
		Source: computedSource + "0.4 mmol HCl and 0.8 mmol acetic acid with NaOH",
		Hard:   "three arms and a broadly rounded first corner: an estimator for one break between two arms has no right answer here",
		Answers: []Answer{
			{Endpoint: 1, Kind: "break", VolumeML: 4, Status: Computed, How: byConstruction,
				ToleranceML: 0.1, ToleranceReason: "two lines are biased by the rounded corner: 3.992 to 4.092 over 36 pairs of arms"},
			{Endpoint: 1, Kind: "break", Estimator: "two-line", VolumeML: 4.054, Status: Computed,
				How: fixedRanges + "0 to 2.5 and 6 to 11", ToleranceML: 0.065, ToleranceReason: armsSpread},
			{Endpoint: 2, Kind: "break", VolumeML: 12, Status: Computed, How: byConstruction,
				ToleranceML: 0.11, ToleranceReason: "two lines are biased by the curved middle arm: 11.896 to 11.988 over 54 pairs of arms"},
			{Endpoint: 2, Kind: "break", Estimator: "two-line", VolumeML: 11.969, Status: Computed,
				How: fixedRanges + "6 to 11 and 13 to 20", ToleranceML: 0.075, ToleranceReason: armsSpread},
		},
	}
}

func conductanceSilver() Table {
	return Table{
		Name: "conductance-silver", Dump: dump("conductance-silver"), Signal: "conductivity", Status: Computed,
		Source: computedSource + "1 mmol KCl with AgNO3 (Ksp 10^-9.75)",
		Answers: []Answer{
			{Endpoint: 1, Kind: "break", VolumeML: 10, Status: Computed, How: byConstruction,
				ToleranceML: 0.002, ToleranceReason: cornerOut},
			{Endpoint: 1, Kind: "break", Estimator: "two-line", VolumeML: 10.000, Status: Computed,
				How: fixedRanges + "0 to 9 and 11 to 20", ToleranceML: 0.002, ToleranceReason: cornerOut},
		},
	}
}
