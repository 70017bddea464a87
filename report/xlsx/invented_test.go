package xlsx

import (
	"fmt"

	"lastdrop/ingest"
	"lastdrop/report"
)

// All figures of this file are invented; none is a reference value.

func some(v float64) *float64 { return &v }

func inventedNight() *report.Night {
	return &report.Night{
		Lastdrop: "0.1.0", Date: "2031-04-03", FirstDay: "2031-04-02", LastDay: "2031-04-02",
		Laboratory: "Tern Island Preserves", Invented: true,
		Evaluations: []report.Evaluation{overshot(), silent(), twofold(), conducted(), hostile(), clean()},
		Unread: []report.Unread{
			{Record: 1, State: "new", Dump: "bench-b/0031.csv", DumpSHA256: hash('7'), Run: 2, Line: 14, Column: 9, Field: "pH",
				Says: `"7,42" is not a number`, Hint: `set decimalChar = "," in the schema`, Next: "lastdrop schema try bench-b bench-b/0031.csv", Schema: "bench-b"},
			{Record: 1, State: "earlier", Dump: "incoming/x77.txt", DumpSHA256: hash('8'), Line: 1, Says: "no schema recognises this dump",
				Hint: "draft one", Next: "lastdrop schema draft incoming/x77.txt"},
		},
		Schemas: []report.SchemaUse{{Name: "bench-a", SHA256: hash('a'), Runs: 4, From: report.Shipped}, {Name: "bench-c", SHA256: hash('c'), Runs: 2, From: report.ReplacesShipped}},
		Limits: []report.Limit{
			{Flag: "overshoot", Value: 8, Unit: "%", Means: "share of the endpoint's volume that the dose across it has", Source: "chosen for this project"},
			{Flag: "disagrees", Value: 0.5, Unit: "%", Means: "refit minus indicated, of like kind, in % of the refit", Source: "common practice, no source"},
		},
	}
}

func hash(c byte) string {
	b := make([]byte, 64)
	for i := range b {
		b[i] = c
	}
	return string(b)
}

func run(id, sample, procedure string, v report.Verdict) report.Evaluation {
	return report.Evaluation{Record: 1, ID: id, Revision: 1, State: "new", Lastdrop: "0.1.0", Dump: "bench-a/" + id[:4] + ".csv",
		DumpSHA256: hash('1'), Run: 1, Line: 1, Schema: "bench-a", SchemaSHA256: hash('a'), Signal: "pH", Readings: 63, Verdict: v,
		Facts: ingest.Facts{Sample: sample, Procedure: procedure, Instrument: "Bench A", Operator: "Analyst 1", Started: "2031-04-02T08:14:00+02:00",
			Titrant: "NaOH", TitrantMolPerL: some(0.1), AliquotML: some(10), SolventML: some(40), Reaction: "acid-base", TemperatureC: some(22.4)}}
}

func overshot() report.Evaluation {
	e := run("9f31c07a52de", "VIN-0417", "vinegar acidity", report.VerdictDisputed)
	e.Open, e.Also, e.Repairs = true, []string{"bench-a/copy/0417.csv"}, []string{"line 40: trailing delimiter dropped", "line 51: trailing delimiter dropped"}
	e.Indicated = []report.Indicated{{Kind: "inflection", VolumeML: 12.66, StepML: 0.01, Line: 13}}
	e.Endpoints = []report.Endpoint{{N: 1, Kind: "inflection", Estimator: "derivative", VolumeML: 12.6123456789012345, UML: 0.2087, Low95ML: 12.268, High95ML: 12.956,
		Reading: some(8.721), BracketML: [2]float64{12.285, 13.375}, Differs: &report.Difference{Kind: "inflection", IndicatedML: 12.66, RefitML: 12.6123456789012345, ML: -0.0476543210987655, Percent: -0.37784, LimitML: 0.063}}}
	e.Flags = []report.Flag{
		{Flag: "overshoot", Weight: report.Disputed, Endpoint: 1, Figure: 8.64, Limit: 8, Unit: "%", Lines: []int{42, 43},
			Says: "The dose after line 42 was 1.09 mL, 8.64 % of the endpoint's volume (limit 8 %) and 2.9 times its neighbours (limit 1.4)."},
		{Flag: "wide-bracket", Weight: report.Doubtful, Endpoint: 1, Figure: 8.64, Limit: 3, Unit: "%", Lines: []int{42, 43},
			Says: "The two readings around the endpoint are 8.64 % of its volume apart (limit 3 %). An endpoint found only between these two readings is the middle of a gap."},
		{Flag: "stray-reading", Weight: report.Note, Figure: 41, Limit: 12, Unit: "sd", Lines: []int{18, 19, 20}, Says: "The readings of lines 18 to 20 stand off the curve."},
	}
	return e
}

func silent() report.Evaluation {
	e := run("e77b1400d3c9", "AMM-0088", "ammonia in refrigeration water", report.VerdictDisputed)
	e.Indicated = []report.Indicated{{Kind: "inflection", VolumeML: 7.9, StepML: 0.01}, {Kind: "inflection", VolumeML: 15.8, StepML: 0.01}}
	e.Flags = []report.Flag{{Flag: "stops-short", Weight: report.Disputed, Figure: 7.9, Limit: 8.4, Unit: "mL", Lines: []int{51}, Says: "Dosing ended at 7.90 mL, inside the jump; at least 8.4 mL are needed."}}
	return e
}

func twofold() report.Evaluation {
	e := run("51ad90c2b8f4", "WAT-0305", "process-water alkalinity", report.VerdictSound)
	e.Indicated = []report.Indicated{{Kind: "inflection", VolumeML: 4.31, StepML: 0.01}, {Kind: "inflection", VolumeML: 11.97, StepML: 0.01}}
	e.Endpoints = []report.Endpoint{
		{N: 1, Kind: "inflection", Estimator: "derivative", VolumeML: 4.3127, UML: 0.0112, Low95ML: 4.2907, High95ML: 4.3347, BracketML: [2]float64{4.25, 4.35}},
		{N: 2, Kind: "inflection", Estimator: "derivative", VolumeML: 11.9688, UML: 0.0094, Low95ML: 11.9504, High95ML: 11.9872, BracketML: [2]float64{11.95, 12}},
	}
	return e
}

func conducted() report.Evaluation {
	e := run("c4d80b1e77a3", "CAU-0140, bottle washer 3", "caustic by conductivity", report.VerdictDoubtful)
	e.Signal, e.Dump, e.Line, e.Facts.Instrument = "conductivity", "bench-c/0140.csv", 3, "Bench C"
	e.Facts.SolventML = nil
	e.Indicated = []report.Indicated{{Kind: "break", VolumeML: 9.2, StepML: 0.001}}
	e.Endpoints = []report.Endpoint{{N: 1, Kind: "break", Estimator: "two-line", VolumeML: 9.175, UML: 0.0061, Low95ML: 9.163, High95ML: 9.187, Reading: some(1.1104),
		BracketML: [2]float64{9, 9.5}, Differs: &report.Difference{Kind: "break", IndicatedML: 9.2, RefitML: 9.175, ML: -0.025, Percent: -0.2725, LimitML: 0.0459}}}
	e.Flags = []report.Flag{{Flag: "dilution-unknown", Weight: report.Doubtful, Figure: 0, Limit: 0, Unit: "mL", Says: "The dump states an aliquot of 10 mL and no solvent; without it the break may be found too early."}}
	return e
}

// hostile has the texts that a sheet must not obey.
func hostile() report.Evaluation {
	e := run("0d4f6c28a1b5", `=HYPERLINK("x";"y")`, "+1-2", report.VerdictSound)
	e.Facts.Operator, e.Facts.Instrument, e.Facts.Titrant = "@SUM(A1)", "-1", "_x0041_ & <b>\"NaOH\"</b>"
	e.Facts.Reaction = "\x1b[31macid\u202Ebase\x00\n"
	e.Facts.Started = " 0417 "
	e.Endpoints = []report.Endpoint{{N: 1, Kind: "at-reading", Estimator: "at-reading", VolumeML: 1e-7, UML: 0.00002, Low95ML: -0.00004, High95ML: 0.00004, BracketML: [2]float64{0, 0.1}}}
	return e
}

func clean() report.Evaluation {
	e := run("77aa00bb11cc", "Spirit vinegar of the northern cask row, second drawing, bottle 14 of 220 äöü 山", "vinegar acidity", report.VerdictSound)
	e.Endpoints = []report.Endpoint{{N: 1, Kind: "inflection", Estimator: "derivative", VolumeML: 0.1 + 0.2, UML: 0.0031, Low95ML: 0.29, High95ML: 0.31, BracketML: [2]float64{0.28, 0.31}}}
	return e
}

// longNight has as many runs as asked, one row each.
func longNight(runs int) *report.Night {
	n := inventedNight()
	n.Evaluations = nil
	for i := 0; i < runs; i++ {
		e := conducted()
		switch i % 10 {
		case 0:
			e = overshot()
		case 1, 2, 3, 4, 5, 6, 7:
			e = clean()
		}
		e.ID = fmt.Sprintf("%012x", i)
		e.Dump = fmt.Sprintf("bench-a/%04d.csv", i)
		n.Evaluations = append(n.Evaluations, e)
	}
	return n
}
