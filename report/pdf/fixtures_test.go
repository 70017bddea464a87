package pdf

import (
	"fmt"
	"math"

	"lastdrop/ingest"
	"lastdrop/report"
)

// The fixtures are closed-form curves: nothing in them was measured or
// fitted. Intervals, flags and differences are set by hand to fill the pages.

const long80 = "Spirit vinegar from vat seventeen, second drawing, bottled for the harbour shop "

func ptr(v float64) *float64 { return &v }

// logistic is a jump of height h at v0, w mL wide, on a slope.
func logistic(v, v0, w, low, h, slope float64) float64 {
	return low + slope*v + h/(1+math.Exp(-(v-v0)/w))
}

// curvePicture samples f at volumes and draws it with its numeric slope.
func curvePicture(volumes []float64, f func(float64) float64, noise float64) *report.Picture {
	p := &report.Picture{XName: "mL of sodium hydroxide 0.1 mol/L", YName: "pH", ResidualUnit: "sd", ResidualBand: 2}
	for i, v := range volumes {
		off := noise * math.Sin(float64(7*i*i+3))
		p.Dots = append(p.Dots, report.Dot{VolumeML: v, Value: f(v) + off, AsRead: f(v) + off, Line: 12 + i})
		p.Residuals = append(p.Residuals, report.XY{X: v, Y: 2.2 * math.Sin(float64(7*i*i+3))})
	}
	last := volumes[len(volumes)-1]
	for i := 0; i <= 200; i++ {
		v := last * float64(i) / 200
		p.Curve = append(p.Curve, report.XY{X: v, Y: f(v)})
		s := math.Abs(f(v+1e-4)-f(v-1e-4)) / 2e-4
		p.Slope = append(p.Slope, report.XY{X: v, Y: s})
		p.SlopeMax = max(p.SlopeMax, s)
	}
	p.SlopeName = fmt.Sprintf("dpH/dV, highest %.1f per mL", p.SlopeMax)
	return p
}

// doses are volumes that become denser towards v0 and leave out a gap.
func doses(to, v0 float64, gapFrom, gapTo float64) []float64 {
	var out []float64
	for v := 0.0; v <= to; {
		if !(v > gapFrom && v < gapTo) {
			out = append(out, math.Round(v*1000)/1000)
		}
		v += 0.06 + 0.45*math.Min(1, math.Abs(v-v0)/3)
	}
	return out
}

func base(sample, procedure, id string, verdict report.Verdict) report.Evaluation {
	return report.Evaluation{
		Record: 1, ID: id, Revision: 1, State: "new", Lastdrop: "0.1.0", Dump: "bench-a/" + id[:4] + ".csv",
		DumpSHA256: "3fa911c0b07e42d98c215e0b3fa911c0b07e42d98c215e0b3fa911c0b07e42d9", Run: 1, Line: 1, Schema: "bench-a",
		Facts: ingest.Facts{Sample: sample, Procedure: procedure, Instrument: "Bench A", Operator: "Analyst 1", Started: "2031-04-02T08:14:00+02:00",
			Titrant: "sodium hydroxide", TitrantMolPerL: ptr(0.1), AliquotML: ptr(1.5), SolventML: ptr(50), Reaction: "acid-base"},
		Signal: "pH", Verdict: verdict, Readings: 41,
		Diagnostics: report.Diagnostics{ReadingNoise: ptr(0.004), ResidualSD: ptr(1.08), V0ML: ptr(51.5)},
	}
}

// overshot is a jump at 12.40 mL that a dose of 0.724 mL ran over.
func overshot() report.Evaluation {
	e := base("VIN-0417, spirit vinegar", "vinegar acidity", "9f31c07a52de", report.VerdictDisputed)
	f := func(v float64) float64 { return logistic(v, 12.40, 0.16, 3.3, 5.3, 0.17) + 0.6*math.Tanh(v/0.4) }
	e.Picture = curvePicture(doses(18, 12.4, 12.29, 13.0), f, 0.01)
	before, after := bracketOf(e.Picture, 12.4)
	e.Readings = len(e.Picture.Dots)
	e.Indicated = []report.Indicated{{Kind: "inflection", VolumeML: 12.66, StepML: 0.01, Line: 7}}
	e.Endpoints = []report.Endpoint{{N: 1, Kind: "inflection", Estimator: "derivative", VolumeML: 12.4013, UML: 0.21, Low95ML: 12.06, High95ML: 12.74,
		Reading: ptr(f(12.4013)), BracketML: [2]float64{before, after},
		Estimates: []report.Estimate{{Estimator: "derivative", Kind: "inflection", VolumeML: 12.4013, UFitML: 0.21}, {Estimator: "at-reading", Kind: "at-reading", VolumeML: 12.526, UFitML: 0.209}},
		Differs:   &report.Difference{Kind: "inflection", IndicatedML: 12.66, RefitML: 12.4013, ML: -0.2587, Percent: -2.086, LimitML: 0.062}}}
	e.Flags = []report.Flag{
		{Flag: "overshoot", Weight: report.Disputed, Endpoint: 1, Figure: 9.1, Limit: 8, Unit: "%", Says: "The dose after line 42 was 0.724 mL, 9.1 % of the endpoint (limit 8 %), 1.9 times its neighbours (limit 1.4), and the pH rose by 4.13 inside it; nothing between the two readings was seen, and any endpoint there is an interpolation."},
		{Flag: "wide-bracket", Weight: report.Doubtful, Endpoint: 1, Figure: 5.8, Limit: 3, Unit: "%", Says: "The bracket is 5.8 % of the endpoint volume (limit 3 %)."},
		{Flag: "volume-reversal", Weight: report.Note, Figure: 0.02, Limit: 0, Unit: "mL", Says: "The volume went back by 0.02 mL at line 31."},
	}
	return e
}

func bracketOf(p *report.Picture, v float64) (before, after float64) {
	for _, d := range p.Dots {
		if d.VolumeML <= v {
			before = d.VolumeML
		} else {
			return before, d.VolumeML
		}
	}
	return before, before
}

// caustic is two lines that cross at 9.18 mL.
func caustic() report.Evaluation {
	e := base("CAU-0140, bottle washer 3", "caustic by conductivity", "c4d80b1e77a3", report.VerdictDoubtful)
	e.Signal, e.Dump, e.Facts.Instrument = "conductivity", "bench-c/0140.csv", "Bench C"
	e.Facts.Titrant, e.Facts.Reaction = "hydrochloric acid", ""
	p := &report.Picture{XName: "mL of hydrochloric acid 0.1 mol/L", YName: "mS/cm, corrected for dilution", ResidualUnit: "%", ResidualBand: 0.45}
	down := func(v float64) float64 { return 2.18 - 0.1168*v }
	up := func(v float64) float64 { return 1.1078 + 0.421*(v-9.18) }
	for i := 0; i <= 32; i++ {
		v := 0.5 * float64(i)
		y := max(down(v), up(v)) + 0.03*math.Exp(-math.Abs(v-9.18)*1.6)
		out := v > 8.2 && v < 10.2
		p.Dots = append(p.Dots, report.Dot{VolumeML: v, Value: y, AsRead: y * 100 / (100 + 2.2*v), Line: 9 + i, LeftOut: out})
		if !out {
			p.Residuals = append(p.Residuals, report.XY{X: v, Y: 0.4 * math.Sin(float64(5*i*i+1))})
		}
	}
	p.Arms = []report.Arm{
		{Name: "falling arm, 17 readings", FromML: 0, ToML: 8, Intercept: 2.18, Slope: -0.1168, UIntercept: 0.004, USlope: 0.0009, CovInterceptSlope: -2.9e-6, ExtendFromML: 0, ExtendToML: 10.3, Readings: 17, ConfidenceFactor95T: 2.13},
		{Name: "rising arm, 12 readings", FromML: 10.5, ToML: 16, Intercept: 1.1078 - 0.421*9.18, Slope: 0.421, UIntercept: 0.02, USlope: 0.0016, CovInterceptSlope: -3.1e-5, ExtendFromML: 8.4, ExtendToML: 16, Readings: 12, ConfidenceFactor95T: 2.2},
	}
	e.Picture, e.Readings = p, len(p.Dots)
	e.Diagnostics = report.Diagnostics{ReadingNoise: ptr(0.0021), LeftOut: 4, V0ML: ptr(100)}
	e.Indicated = []report.Indicated{{Kind: "break", VolumeML: 9.2, StepML: 0.01, Line: 5}}
	e.Endpoints = []report.Endpoint{{N: 1, Kind: "break", Estimator: "two-line", VolumeML: 9.1752, UML: 0.0061, Low95ML: 9.163, High95ML: 9.187, BracketML: [2]float64{9, 9.5},
		Estimates: []report.Estimate{{Estimator: "two-line", Kind: "break", VolumeML: 9.1752, UFitML: 0.0061}},
		Differs:   &report.Difference{Kind: "break", IndicatedML: 9.2, RefitML: 9.1752, ML: -0.0248, Percent: -0.2703, LimitML: 0.0459}}}
	e.Flags = []report.Flag{{Flag: "dilution-unknown", Weight: report.Doubtful, Figure: 100, Limit: 0, Unit: "mL", Says: "Neither aliquot nor solvent is stated; 100 mL before titration was taken from the schema. Twice as much would move the break by 0.012 mL."}}
	return e
}

// alkalinity falls and has two endpoints, at 1.33 and 7.78 mL.
func alkalinity(near bool) report.Evaluation {
	e := base("WAT-0305", "process-water alkalinity", "77aa01b2c3d4", report.VerdictDoubtful)
	e.Facts.Titrant = "hydrochloric acid"
	a, b := 1.33, 7.78
	if near {
		a, b = 5.1, 5.9
	}
	f := func(v float64) float64 {
		return 11.0 - logistic(v, a, 0.12, 0, 2.0, 0.12) - logistic(v, b, 0.14, 0, 3.2, 0.05)
	}
	e.Picture = curvePicture(doses(11, (a+b)/2, 0, 0), f, 0.01)
	e.Picture.XName = "mL of hydrochloric acid 0.1 mol/L"
	e.Readings = len(e.Picture.Dots)
	for i, v := range [...]float64{a, b} {
		before, after := bracketOf(e.Picture, v)
		e.Indicated = append(e.Indicated, report.Indicated{Kind: "inflection", VolumeML: math.Round(100*v+1.3) / 100, StepML: 0.01, Line: 5 + i})
		ind := e.Indicated[i].VolumeML
		e.Endpoints = append(e.Endpoints, report.Endpoint{N: i + 1, Kind: "inflection", Estimator: "derivative", VolumeML: v + 0.0004, UML: 0.006, Low95ML: v - 0.012, High95ML: v + 0.012,
			Reading: ptr(f(v)), BracketML: [2]float64{before, after},
			Estimates: []report.Estimate{{Estimator: "derivative", Kind: "inflection", VolumeML: v + 0.0004, UFitML: 0.006}, {Estimator: "at-reading", Kind: "at-reading", VolumeML: v + 0.02, UFitML: 0.003}},
			Differs:   &report.Difference{Kind: "inflection", IndicatedML: ind, RefitML: v + 0.0004, ML: v + 0.0004 - ind, Percent: 100 * (v + 0.0004 - ind) / (v + 0.0004), LimitML: 0.03}})
	}
	e.Flags = []report.Flag{{Flag: "wide-interval", Weight: report.Doubtful, Endpoint: 2, Figure: 0.9, Limit: 0.5, Unit: "%", Says: "The 95 % half-width of endpoint 2 is 0.9 % (limit 0.5 %); the main cause is the bracket."}}
	return e
}

// blankCurve has no endpoint.
func blankCurve() report.Evaluation {
	e := base("VCO-0019", "vinegar acidity", "0d4f6c28a1b5", report.VerdictDisputed)
	f := func(v float64) float64 { return 5.2 + 0.11*v + 0.05*math.Sin(v) }
	var at []float64
	for i := 0; i < 30; i++ {
		at = append(at, 0.5*float64(i))
	}
	e.Picture = curvePicture(at, f, 0.01)
	e.Readings = 30
	e.Indicated = []report.Indicated{{Kind: "inflection", VolumeML: 9.35, StepML: 0.01, Line: 6}}
	e.Flags = []report.Flag{{Flag: "no-endpoint", Weight: report.Disputed, Figure: 0, Limit: 0, Unit: "", Says: "No jump of 0.25 decade was found between 0 and 14.5 mL; the dump names a titrant and indicates 9.35 mL."}}
	return e
}

// brine is a mV curve with a stray reading and an 80-character name in Latin,
// other scripts and emoji.
func brine() report.Evaluation {
	e := base("Бочка 7 "+long80[:52]+" 塩水 🧂", "brine chloride", "51ad90c2b8f4", report.VerdictDisputed)
	e.Signal = "potential"
	e.Facts.Titrant, e.Facts.Reaction = "silver nitrate", "precipitation"
	f := func(v float64) float64 { return logistic(v, 14.318, 0.10, 92, 320, 1.6) }
	e.Picture = curvePicture(doses(20, 14.318, 0, 0), f, 0.4)
	e.Picture.YName, e.Picture.SlopeName, e.Picture.XName = "mV", "dE/dV, highest 800 mV per mL", "mL of silver nitrate 0.1 mol/L"
	e.Picture.Dots[9].Value, e.Picture.Dots[9].AsRead, e.Picture.Dots[9].LeftOut = 1890, 1890, true
	e.Readings = len(e.Picture.Dots)
	e.Diagnostics.LeftOut = 1
	before, after := bracketOf(e.Picture, 14.318)
	e.Indicated = []report.Indicated{{Kind: "inflection", VolumeML: 14.92, StepML: 0.01, Line: 7}}
	e.Endpoints = []report.Endpoint{{N: 1, Kind: "inflection", Estimator: "derivative", VolumeML: 14.3181, UML: 0.0123, Low95ML: 14.294, High95ML: 14.342, Reading: ptr(f(14.318)), BracketML: [2]float64{before, after},
		Estimates: []report.Estimate{{Estimator: "derivative", Kind: "inflection", VolumeML: 14.3181, UFitML: 0.0123}},
		Differs:   &report.Difference{Kind: "inflection", IndicatedML: 14.92, RefitML: 14.3181, ML: -0.6019, Percent: -4.204, LimitML: 0.0716}}}
	e.Flags = []report.Flag{
		{Flag: "disagrees", Weight: report.Disputed, Endpoint: 1, Figure: 0.602, Limit: 0.072, Unit: "mL", Says: "The instrument indicates 14.92 mL, the refit 14.32 mL: 0.602 mL apart (limit 0.072 mL)."},
		{Flag: "stray-reading", Weight: report.Note, Figure: 1700, Limit: 12, Unit: "mV", Lines: []int{21}, Says: "Line 21 stands 1700 mV off its neighbours (limit 12 mV); it was left out."},
	}
	return e
}

// sound is a vinegar run like the others, its jump at v0.
func sound(i int) report.Evaluation {
	v0 := 12.7 + 0.02*float64(i%7)
	e := base(fmt.Sprintf("VIN-%04d", 418+i), "vinegar acidity", fmt.Sprintf("%04x60c2b8f4", i+1), report.VerdictSound)
	f := func(v float64) float64 { return logistic(v, v0, 0.16, 3.3, 5.3, 0.17) + 0.6*math.Tanh(v/0.4) }
	e.Picture = curvePicture(doses(18, v0, 0, 0), f, 0.01)
	before, after := bracketOf(e.Picture, v0)
	d := 0.01 * float64(i%5-2)
	e.Indicated = []report.Indicated{{Kind: "inflection", VolumeML: math.Round(100*(v0-d)) / 100, StepML: 0.01, Line: 7}}
	e.Endpoints = []report.Endpoint{{N: 1, Kind: "inflection", Estimator: "derivative", VolumeML: v0, UML: 0.008, Low95ML: v0 - 0.016, High95ML: v0 + 0.016, Reading: ptr(f(v0)), BracketML: [2]float64{before, after},
		Estimates: []report.Estimate{{Estimator: "derivative", Kind: "inflection", VolumeML: v0, UFitML: 0.008}},
		Differs:   &report.Difference{Kind: "inflection", IndicatedML: v0 - d, RefitML: v0, ML: d, Percent: 100 * d / v0, LimitML: 0.063}}}
	e.Facts.Started = fmt.Sprintf("2031-04-02T%02d:%02d:00+02:00", 8+i/30%12, i%60)
	return e
}

// emptyNight has no run.
func emptyNight() *report.Night {
	return &report.Night{Lastdrop: "0.1.0", Date: "2031-04-03", FirstDay: "2031-04-02", LastDay: "2031-04-02", Laboratory: "Tern Island Preserves", Invented: true}
}

// demoNight has every sort of page.
func demoNight() *report.Night {
	n := emptyNight()
	n.Evaluations = []report.Evaluation{overshot(), brine(), blankCurve(), caustic(), alkalinity(false), alkalinity(true)}
	for i := range 20 {
		n.Evaluations = append(n.Evaluations, sound(i))
	}
	n.Unread = []report.Unread{
		{Record: 1, State: "new", Dump: "bench-b/0031.csv", Line: 14, Column: 9, Field: "pH", Says: `"7,42" is not a number`, Hint: `set decimalChar = "," in bench-b.toml`, Next: "lastdrop schema try bench-b bench-b/0031.csv"},
		{Record: 1, State: "earlier", Dump: "bench-a/0419.csv", Run: 2, Line: 58, Column: 1, Says: "the dump ends inside a row", Hint: "export it again"},
		{Record: 1, State: "new", Dump: "incoming/a-folder-with-a-long-name/and-one-more-below-it/x77-export-of-the-second-of-april.txt", Line: 1, Column: 1, Says: "no schema recognises this dump", Next: "lastdrop schema draft 'incoming/a-folder-with-a-long-name/and-one-more-below-it/x77-export-of-the-second-of-april.txt'"},
	}
	n.Waiting = []report.Waiting{{Record: 1, Dump: "bench-c/0007.csv", Says: "12 s old; a sweep takes dumps from 15 min on"}}
	return n
}
