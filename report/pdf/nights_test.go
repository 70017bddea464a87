package pdf

import (
	"fmt"
	"math"
	"math/rand"
	"strings"

	"lastdrop/ingest"
	"lastdrop/report"
)

// soundNight is a night with nothing to do.
func soundNight(runs int) *report.Night {
	n := emptyNight()
	for i := range runs {
		n.Evaluations = append(n.Evaluations, sound(i))
	}
	return n
}

// largeNight has 1,000 runs, 260 of them to be looked at, 300 unread dumps.
func largeNight() *report.Night {
	n := emptyNight()
	for i := range 1000 {
		e := sound(i)
		switch {
		case i%10 == 3:
			e = overshot()
		case i%10 == 5:
			e = caustic()
		case i%17 == 4:
			e = alkalinity(false)
		}
		e.ID = fmt.Sprintf("%012x", i+1)
		if i%3 == 0 && e.Verdict == report.VerdictSound {
			e.Picture = nil
		}
		n.Evaluations = append(n.Evaluations, e)
	}
	for i := range 300 {
		n.Unread = append(n.Unread, report.Unread{Record: 1, State: "new", Dump: fmt.Sprintf("bench-b/%04d.csv", i), Line: 1 + i, Column: 4,
			Field: "pH", Says: `"7,42" is not a number`, Hint: `set decimalChar = "," in bench-b.toml`, Next: fmt.Sprintf("lastdrop schema try bench-b bench-b/%04d.csv", i)})
	}
	for i := range 60 {
		n.Waiting = append(n.Waiting, report.Waiting{Dump: fmt.Sprintf("bench-c/%04d.csv", i), Says: "12 s old; a sweep takes dumps from 15 min on"})
	}
	return n
}

// hardNight has what does not fit: long names, many and long flags, five
// endpoints, all repairs, a wrong indicated endpoint far out.
func hardNight() *report.Night {
	n := emptyNight()
	n.Laboratory = strings.Repeat(long80, 2)
	long := strings.Repeat("Four lines of a sentence with the figure 12.345 mL and its limit 0.062 mL. ", 4)
	for _, e := range []report.Evaluation{overshot(), brine(), blankCurve(), caustic(), alkalinity(true)} {
		e.Facts.Sample = long80 + long80
		e.Facts.Procedure = "determination of the acidity of vinegar by titration with sodium hydroxide to pH 8.1"
		e.Facts.Instrument, e.Facts.Operator = strings.Repeat("Bench ", 14), strings.Repeat("Analyst", 20)
		e.Dump = "bench-a/" + strings.Repeat("a-very-long-name-of-a-folder/", 5) + "it's here.csv"
		e.Schema = strings.Repeat("bench", 12)
		for i := range e.Flags {
			e.Flags[i].Says = long
		}
		for _, w := range report.Flags() {
			e.Flags = append(e.Flags, report.Flag{Flag: w.Flag, Weight: report.Doubtful, Figure: 12345678.9, Limit: 0.000012345, Unit: "mS/cm per mL", Says: long})
		}
		for i := range 20 {
			e.Repairs = append(e.Repairs, fmt.Sprintf("line %d: trailing delimiter dropped", i))
			e.Facts.Other = append(e.Facts.Other, ingest.Fact{Key: "A key that is rather long", Value: long80})
		}
		e.Also = []string{"bench-a/copy/" + e.Dump}
		n.Evaluations = append(n.Evaluations, e)
	}
	e := alkalinity(false)
	for k := 2; k < 7; k++ {
		p := e.Endpoints[1]
		p.N, p.VolumeML = k+1, p.VolumeML+0.02*float64(k)
		e.Endpoints = append(e.Endpoints, p)
	}
	n.Evaluations = append(n.Evaluations, e)
	n.Unread = []report.Unread{{Record: 1, State: "earlier", Dump: strings.Repeat("folder/", 40) + "x.csv", Run: 123456, Line: 1234567, Column: 123456, Field: "a field", Says: long, Hint: long, Next: "lastdrop schema try " + strings.Repeat("x", 300)}}
	n.Waiting = []report.Waiting{{Dump: strings.Repeat("folder/", 40), Says: long}}
	return n
}

// bareNight has runs of which next to nothing is known, and curves that are
// short, flat, steep, level or upside down.
func bareNight() *report.Night {
	n := &report.Night{Date: "not a date", Lastdrop: "0.1.0"}
	add := func(p *report.Picture, v report.Verdict) {
		e := report.Evaluation{Verdict: v, Signal: "pH", Picture: p}
		if v != report.VerdictSound {
			e.Flags = []report.Flag{{Flag: "a-flag-of-tomorrow", Weight: report.Weight(v), Says: ""}}
		}
		n.Evaluations = append(n.Evaluations, e)
	}
	add(nil, report.VerdictDisputed)
	add(nil, report.VerdictSound)
	add(&report.Picture{}, report.VerdictDoubtful)
	add(&report.Picture{Dots: []report.Dot{{VolumeML: 1, Value: 7}}}, report.VerdictDisputed)
	add(&report.Picture{Dots: []report.Dot{{VolumeML: 1, Value: 7}, {VolumeML: 2, Value: 7}}}, report.VerdictSound)
	add(&report.Picture{Dots: []report.Dot{{VolumeML: 0, Value: -1e6}, {VolumeML: 1e-6, Value: 1e6}}, YName: "mV", XName: "mL"}, report.VerdictDoubtful)
	add(&report.Picture{Dots: []report.Dot{{VolumeML: 5, Value: 1, LeftOut: true}, {VolumeML: 5, Value: 2, LeftOut: true}}, Residuals: []report.XY{{X: 5, Y: 0}}}, report.VerdictDoubtful)
	return n
}

// seedNight has 40 curves whose jumps, noise, intervals, indicated endpoints
// and brackets are drawn from a seed.
func seedNight() *report.Night {
	r := rand.New(rand.NewSource(7))
	n := emptyNight()
	for i := range 40 {
		e := base(fmt.Sprintf("SEED-%04d", i), "vinegar acidity", fmt.Sprintf("%012x", i), report.VerdictDisputed)
		sign := 1 - 2*float64(i%2)
		v0, w := 1+17*r.Float64(), 0.02+0.5*r.Float64()
		f := func(v float64) float64 { return 7 + sign*(logistic(v, v0, w, -3, 1+6*float64(i%4), 0.1)) }
		e.Picture = curvePicture(doses(2+v0*(1+r.Float64()), v0, v0-r.Float64(), v0+r.Float64()), f, 0.02)
		before, after := bracketOf(e.Picture, v0)
		u := math.Pow(10, -4+3.5*r.Float64())
		ind := v0 + u*10*r.NormFloat64()
		e.Indicated = []report.Indicated{{Kind: "inflection", VolumeML: ind, StepML: 0.01, Line: 7}}
		e.Endpoints = []report.Endpoint{{N: 1, Kind: "inflection", Estimator: "derivative", VolumeML: v0, UML: u, Low95ML: v0 - 2*u, High95ML: v0 + 2*u, Reading: ptr(f(v0)), BracketML: [2]float64{before, after},
			Estimates: []report.Estimate{{Estimator: "derivative", Kind: "inflection", VolumeML: v0, UFitML: u}, {Estimator: "at-reading", Kind: "at-reading", VolumeML: v0 + 3*u, UFitML: u / 2}},
			Differs:   &report.Difference{Kind: "inflection", IndicatedML: ind, RefitML: v0, ML: v0 - ind, Percent: 100 * (v0 - ind) / v0, LimitML: 0.05}}}
		e.Flags = []report.Flag{{Flag: "disagrees", Weight: report.Disputed, Endpoint: 1, Figure: math.Abs(v0 - ind), Limit: 0.05, Unit: "mL", Says: "The two are apart."}}
		n.Evaluations = append(n.Evaluations, e)
	}
	return n
}
