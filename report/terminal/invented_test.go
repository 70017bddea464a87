package terminal

import (
	"math"
	"strings"

	"lastdrop/ingest"
	"lastdrop/report"
)

// All figures of this file are invented; none is a reference value. Curves
// are drawn from simple formulas with no chemistry in them.

func some(v float64) *float64 { return &v }

// sigmoid rises from 3 to 12 around each endpoint.
func sigmoid(v float64, endpoints ...float64) float64 {
	y := 3 + 0.08*v
	for _, at := range endpoints {
		y += 7 / float64(len(endpoints)) * (0.5 + math.Atan((v-at)*14)/math.Pi)
	}
	return y
}

// drawn is the picture of a run read at the volumes.
func drawn(volumes []float64, curve func(float64) float64) *report.Picture {
	p := &report.Picture{YName: "pH", XName: "mL of sodium hydroxide 0.1 mol/L", SlopeName: "dpH/dV, highest 7.6 per mL"}
	for i, v := range volumes {
		p.Dots = append(p.Dots, report.Dot{VolumeML: v, Value: curve(v), AsRead: curve(v), Line: 20 + i})
	}
	last := volumes[len(volumes)-1]
	for i := 0; i <= 400; i++ {
		v := last * float64(i) / 400
		p.Curve = append(p.Curve, report.XY{X: v, Y: curve(v)})
		p.Slope = append(p.Slope, report.XY{X: v, Y: math.Abs(curve(v+0.01)-curve(v-0.01)) / 0.02})
	}
	return p
}

func steps(from, by, to float64) (all []float64) {
	for i := 0; from+by*float64(i) <= to+1e-9; i++ {
		all = append(all, from+by*float64(i))
	}
	return all
}

func facts(sample, procedure string) ingest.Facts {
	return ingest.Facts{Sample: sample, Procedure: procedure, Instrument: "Bench A", Operator: "Analyst 1", Started: "2031-04-02T08:14:00+02:00",
		Titrant: "NaOH", TitrantMolPerL: some(0.1), AliquotML: some(10), SolventML: some(40), Reaction: "acid-base", TemperatureC: some(22.4),
		Other: []ingest.Fact{{Key: "Stirrer", Value: "2"}}}
}

func run(id, sample, procedure string, v report.Verdict) report.Evaluation {
	return report.Evaluation{Record: 1, ID: id, Revision: 1, State: "new", Lastdrop: "0.1.0", Dump: "bench-a/0417.csv", DumpSHA256: strings.Repeat("ab12", 16),
		Run: 1, Line: 1, Schema: "bench-a", Signal: "pH", Verdict: v, Facts: facts(sample, procedure)}
}

func overshot() report.Evaluation {
	e := run("9f31c07a52de", "VIN-0417", "vinegar acidity", report.VerdictDisputed)
	volumes := append(steps(0, 0.5, 11.5), 11.8, 12.0, 12.15, 12.285, 13.375)
	volumes = append(volumes, steps(13.5, 0.5, 18)...)
	e.Picture, e.Readings = drawn(volumes, func(v float64) float64 { return sigmoid(v, 12.61) }), len(volumes)
	e.Repairs = []string{"line 40: trailing delimiter dropped"}
	e.Indicated = []report.Indicated{{Kind: "inflection", VolumeML: 12.66, StepML: 0.01, Line: 13}}
	e.Endpoints = []report.Endpoint{{N: 1, Kind: "inflection", Estimator: "derivative", VolumeML: 12.6123, UML: 0.2087, Low95ML: 12.268, High95ML: 12.956,
		Reading: some(7.5), BracketML: [2]float64{12.285, 13.375},
		Estimates: []report.Estimate{{Estimator: "derivative", Kind: "inflection", VolumeML: 12.6123, UFitML: 0.2087}, {Estimator: "at-reading", Kind: "at-reading", VolumeML: 12.5512, UFitML: 0.31}},
		Differs:   &report.Difference{Kind: "inflection", IndicatedML: 12.66, RefitML: 12.6123, ML: -0.0477, Percent: -0.3782, LimitML: 0.063}}}
	e.Diagnostics = report.Diagnostics{ReadingNoise: some(0.0041), ResidualSD: some(1.12), LeftOut: 1}
	e.Flags = []report.Flag{
		{Flag: "overshoot", Weight: report.Disputed, Endpoint: 1, Figure: 8.64, Limit: 8, Unit: "%", Lines: []int{47, 48},
			Says: "The dose after line 47 was 1.09 mL, 8.64 % of the endpoint's volume (limit 8 %) and 2.9 times its neighbours (limit 1.4)."},
		{Flag: "wide-bracket", Weight: report.Doubtful, Endpoint: 1, Figure: 8.64, Limit: 3, Unit: "%", Lines: []int{47, 48},
			Says: "The two readings around the endpoint are 8.64 % of its volume apart (limit 3 %). An endpoint found only between these two readings is the middle of a gap."},
		{Flag: "stray-reading", Weight: report.Note, Figure: 41, Limit: 12, Unit: "sd", Lines: []int{29}, Says: "The reading of line 29 stands 41 sd off the curve (limit 12 sd); the endpoint is the same without it."},
	}
	e.Picture.Dots[9].Value, e.Picture.Dots[9].AsRead, e.Picture.Dots[9].LeftOut = 14.2, 14.2, true
	return e
}

func twofold() report.Evaluation {
	e := run("51ad90c2b8f4", "WAT-0305", "process-water alkalinity", report.VerdictSound)
	e.Dump, e.Run, e.Facts.Titrant = "bench-b/0305.tsv", 2, "HCl"
	volumes := steps(0, 0.25, 16)
	e.Picture, e.Readings = drawn(volumes, func(v float64) float64 { return 15 - sigmoid(v, 4.3, 4.95) }), len(volumes)
	e.Picture.XName = "mL of hydrochloric acid 0.1 mol/L"
	e.Indicated = []report.Indicated{{Kind: "inflection", VolumeML: 4.31, StepML: 0.01}, {Kind: "inflection", VolumeML: 4.97, StepML: 0.01}}
	e.Endpoints = []report.Endpoint{
		{N: 1, Kind: "inflection", Estimator: "derivative", VolumeML: 4.3127, UML: 0.0112, Low95ML: 4.2907, High95ML: 4.3347, BracketML: [2]float64{4.25, 4.5},
			Differs: &report.Difference{Kind: "inflection", IndicatedML: 4.31, RefitML: 4.3127, ML: 0.0027, Percent: 0.0626, LimitML: 0.0216}},
		{N: 2, Kind: "inflection", Estimator: "derivative", VolumeML: 4.9512, UML: 0.0094, Low95ML: 4.9328, High95ML: 4.9696, BracketML: [2]float64{4.75, 5},
			Differs: &report.Difference{Kind: "inflection", IndicatedML: 4.97, RefitML: 4.9512, ML: -0.0188, Percent: -0.3797, LimitML: 0.0248}},
	}
	return e
}

func conducted() report.Evaluation {
	e := run("c4d80b1e77a3", "CAU-0140, bottle washer 3", "caustic by conductivity", report.VerdictDoubtful)
	e.Signal, e.Dump, e.Facts.Instrument, e.Facts.SolventML = "conductivity", "bench-c/0140.csv", "Bench C", nil
	p := &report.Picture{YName: "mS/cm, corrected for dilution", XName: "mL of hydrochloric acid 0.1 mol/L",
		Arms: []report.Arm{
			{Name: "falling arm, 16 readings", FromML: 0.5, ToML: 8, Intercept: 2.18, Slope: -0.1166, USlope: 0.0004, ExtendFromML: 0.5, ExtendToML: 10.3, Readings: 16},
			{Name: "rising arm, 12 readings", FromML: 10.5, ToML: 16, Intercept: -2.8, Slope: 0.4262, USlope: 0.0012, ExtendFromML: 8.7, ExtendToML: 16, Readings: 12}}}
	for i, v := range steps(0, 0.5, 16) {
		y := max(2.18-0.1166*v, -2.8+0.4262*v)
		p.Dots = append(p.Dots, report.Dot{VolumeML: v, Value: y, AsRead: y * 100 / (100 + v), Line: 12 + i, LeftOut: v == 0 || v > 8 && v < 10.5})
	}
	e.Picture, e.Readings = p, len(p.Dots)
	e.Indicated = []report.Indicated{{Kind: "break", VolumeML: 9.2, StepML: 0.001, Line: 49}}
	e.Endpoints = []report.Endpoint{{N: 1, Kind: "break", Estimator: "two-line", VolumeML: 9.175, UML: 0.0061, Low95ML: 9.163, High95ML: 9.187, Reading: some(1.1104),
		BracketML: [2]float64{9, 9.5}, Estimates: []report.Estimate{{Estimator: "two-line", Kind: "break", VolumeML: 9.175, UFitML: 0.0061}},
		Differs: &report.Difference{Kind: "break", IndicatedML: 9.2, RefitML: 9.175, ML: -0.025, Percent: -0.2725, LimitML: 0.0459}}}
	e.Diagnostics = report.Diagnostics{V0ML: some(100), LeftOut: 5}
	e.Flags = []report.Flag{{Flag: "dilution-unknown", Weight: report.Doubtful, Unit: "mL", Says: "The dump states an aliquot of 10 mL and no solvent; without it the break may be found too early."}}
	return e
}

func silent() report.Evaluation {
	e := run("e77b1400d3c9", "AMM-0088", "ammonia in refrigeration water", report.VerdictDisputed)
	volumes := steps(0, 0.25, 7.9)
	e.Picture, e.Readings = drawn(volumes, func(v float64) float64 { return 11 - 0.3*v }), len(volumes)
	e.Picture.Slope = nil
	e.Indicated = []report.Indicated{{Kind: "inflection", VolumeML: 8.1, StepML: 0.01}}
	e.Flags = []report.Flag{{Flag: "stops-short", Weight: report.Disputed, Figure: 7.75, Limit: 8.4, Unit: "mL", Lines: []int{51}, Says: "Dosing ended at 7.75 mL, inside the jump; at least 8.4 mL are needed."}}
	return e
}

func inventedNight() *report.Night {
	n := &report.Night{Lastdrop: "0.1.0", Date: "2031-04-03", FirstDay: "2031-04-02", LastDay: "2031-04-02", Laboratory: "Tern Island Preserves", Invented: true,
		Evaluations: []report.Evaluation{overshot(), twofold(), conducted(), silent()},
		Unread: []report.Unread{
			{Record: 1, State: "new", Dump: "bench-b/0031.csv", Run: 2, Line: 14, Column: 9, Field: "pH", Says: `"7,42" is not a number`,
				Hint: `set decimalChar = "," in the schema`, Next: "lastdrop schema try bench-b bench-b/0031.csv"},
			{Record: 1, State: "new", Dump: "incoming/x77.txt", Line: 1, Says: "no schema recognises this dump", Hint: "draft one", Next: "lastdrop schema draft incoming/x77.txt"},
		},
		Waiting:    []report.Waiting{{Record: 1, Dump: "bench-c/0007.csv", Says: "12 s old; a sweep takes dumps from 15 min on"}},
		OtherFiles: 3}
	return n
}
