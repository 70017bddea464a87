package refit

import (
	"math"

	"lastdrop/fit"
	"lastdrop/ingest"
	"lastdrop/report"
)

// evaluation takes a result into the record.
func evaluation(run *ingest.Run, c *fit.Curve, r *fit.Result) report.Evaluation {
	e := report.Evaluation{
		Run: run.Number, Line: run.Line, Facts: run.Facts, Repairs: run.Repairs,
		Signal: string(run.Signal), Readings: len(run.Readings), AsRead: run.Readings,
		Endpoints: []report.Endpoint{}, Flags: []report.Flag{}, Verdict: report.VerdictSound,
		Diagnostics: diagnostics(c, r),
	}
	for _, i := range run.Indicated {
		e.Indicated = append(e.Indicated, report.Indicated{Kind: i.Kind, VolumeML: i.VolumeML, StepML: i.StepML, Line: i.Line})
	}
	for i := range r.Endpoints {
		e.Endpoints = append(e.Endpoints, endpoint(i+1, &r.Endpoints[i], c, r))
	}
	says := sentences{run: run, curve: c, result: r}
	for _, f := range r.Flags {
		e.Flags = append(e.Flags, says.flag(f))
		e.Verdict = heavier(e.Verdict, f.Weight)
	}
	e.Open = e.Verdict == report.VerdictDisputed
	e.Picture = picture(run, c, r)
	return e
}

var weights = map[fit.Weight]report.Weight{fit.Note: report.Note, fit.Doubtful: report.Doubtful, fit.Disputed: report.Disputed}

func heavier(v report.Verdict, w fit.Weight) report.Verdict {
	switch {
	case w == fit.Disputed || v == report.VerdictDisputed:
		return report.VerdictDisputed
	case w == fit.Doubtful:
		return report.VerdictDoubtful
	}
	return v
}

func endpoint(n int, p *fit.Endpoint, c *fit.Curve, r *fit.Result) report.Endpoint {
	e := report.Endpoint{
		N: n, Kind: p.Kind, Estimator: p.Estimator, VolumeML: p.V, UML: p.U, Low95ML: p.Low, High95ML: p.High,
		Reading: &p.Reading, BracketML: [2]float64{c.V[p.Bracket[0]], c.V[p.Bracket[1]]},
	}
	for _, s := range p.Estimates {
		e.Estimates = append(e.Estimates, report.Estimate{Estimator: s.Estimator, Kind: s.Kind, VolumeML: s.V, UFitML: s.U})
	}
	for _, q := range r.Compared {
		if q.Endpoint != n {
			continue
		}
		if d := difference(q); e.Differs == nil || math.Abs(d.ML) > math.Abs(e.Differs.ML) {
			e.Differs = d
		}
	}
	return e
}

func difference(q fit.Compared) *report.Difference {
	ml := q.Refit.V - q.Indicated.V
	return &report.Difference{Kind: q.Indicated.Kind, IndicatedML: q.Indicated.V, RefitML: q.Refit.V, ML: ml, Percent: 100 * ml / q.Refit.V, LimitML: q.Limit}
}

func diagnostics(c *fit.Curve, r *fit.Result) report.Diagnostics {
	d := report.Diagnostics{LeftOut: len(r.LeftOut)}
	if c.Signal != fit.Conductivity {
		d.ReadingNoise = &r.Noise
	} else {
		percent := 100 * r.Noise
		d.RelativeNoisePercent = &percent
	}
	sum, n := 0.0, 0
	for _, x := range r.Residuals {
		if !math.IsNaN(x) {
			sum += x * x
			n++
		}
	}
	if n > 0 {
		sd := math.Sqrt(sum / float64(n))
		d.ResidualSD = &sd
	}
	if c.V0 > 0 {
		d.V0ML = &c.V0
	}
	return d
}
