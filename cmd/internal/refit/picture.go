package refit

import (
	"fmt"
	"math"
	"strings"

	"lastdrop/fit"
	"lastdrop/ingest"
	"lastdrop/report"
)

// curvePoints is the number of points of a drawn curve beside the readings
// themselves: a page is 102 mm wide, so they lie under 1 mm apart.
const curvePoints = 120

// leapPieces is the least number of pieces of an increment in which the curve
// rises by more than a thirtieth of its range.
const leapPieces = 6

// drawing is a picture being filled.
type drawing struct{ *report.Picture }

// sample adds the place v of the shape-keeping curve.
func (p drawing) sample(r *fit.Result, v float64) {
	y, slope, _ := r.Shape.At(v)
	p.Curve = append(p.Curve, report.XY{X: v, Y: y})
	p.Slope = append(p.Slope, report.XY{X: v, Y: math.Abs(slope)})
	p.SlopeMax = math.Max(p.SlopeMax, math.Abs(slope))
}

// picture keeps what a page draws of a run.
func picture(run *ingest.Run, c *fit.Curve, r *fit.Result) *report.Picture {
	p := &report.Picture{YName: yName(run, c), XName: xName(run.Facts)}
	p.Dots = dots(run, c, r)
	if r.Shape != nil {
		drawnCurve(drawing{p}, run, c, r)
	}
	for _, a := range r.Arms {
		p.Arms = append(p.Arms, arm(a, len(r.Arms), c))
	}
	p.ResidualUnit, p.ResidualBand = "sd", 2
	if c.Signal == fit.Conductivity {
		p.ResidualUnit, p.ResidualBand = "%", 200*r.Noise
	}
	for i, at := range r.Used {
		if !math.IsNaN(r.Residuals[i]) {
			p.Residuals = append(p.Residuals, report.XY{X: c.V[at], Y: r.Residuals[i]})
		}
	}
	return p
}

func dots(run *ingest.Run, c *fit.Curve, r *fit.Result) []report.Dot {
	used := make([]bool, len(c.V))
	inArm := make([]bool, len(c.V))
	drawn := append([]float64(nil), c.Y...)
	for i, at := range r.Used {
		used[at] = true
		if r.Corrected != nil {
			drawn[at] = r.Corrected[i]
		}
	}
	for _, a := range r.Arms {
		for _, at := range a.At {
			inArm[at] = true
		}
	}
	out := make([]report.Dot, len(c.V))
	for i := range out {
		left := !used[i] || c.Signal == fit.Conductivity && !inArm[i]
		if !used[i] && c.Signal == fit.Conductivity && c.V0 > 0 {
			drawn[i] *= (c.V0 + c.V[i]) / c.V0
		}
		out[i] = report.Dot{VolumeML: c.V[i], Value: drawn[i], AsRead: c.Y[i], Line: run.Readings[i].Line, LeftOut: left}
	}
	return out
}

// drawnCurve samples the shape-keeping curve at every reading and between
// them, closer where it leaps.
func drawnCurve(p drawing, run *ingest.Run, c *fit.Curve, r *fit.Result) {
	n := len(r.Used)
	even := (c.V[r.Used[n-1]] - c.V[r.Used[0]]) / curvePoints
	low, high := span(c.Y)
	for i, at := range r.Used {
		if i+1 == n {
			p.sample(r, c.V[at])
			break
		}
		next := r.Used[i+1]
		pieces := math.Ceil((c.V[next] - c.V[at]) / even)
		if math.Abs(c.Y[next]-c.Y[at]) > (high-low)/30 {
			pieces = math.Max(pieces, leapPieces)
		}
		for m := 0.0; m < pieces; m++ {
			p.sample(r, c.V[at]+m/pieces*(c.V[next]-c.V[at]))
		}
	}
	p.SlopeName = "d" + slopeSymbol(run.Signal) + "/dV, highest " + report.Short(p.SlopeMax, 2) + slopeUnit(run.Signal)
}

func slopeSymbol(s ingest.Signal) string {
	if s == ingest.Potential {
		return "E"
	}
	return "pH"
}

func slopeUnit(s ingest.Signal) string {
	if s == ingest.Potential {
		return " mV/mL"
	}
	return " per mL"
}

func arm(a fit.Arm, arms int, c *fit.Curve) report.Arm {
	name := "rising arm"
	if a.Line.B < 0 {
		name = "falling arm"
	}
	reach := 0.08 * (c.V[len(c.V)-1] - c.V[0])
	return report.Arm{
		Name: fmt.Sprintf("%s, %d readings", name, a.Line.N), FromML: a.FromV, ToML: a.ToV,
		Intercept: a.Line.A, Slope: a.Line.B, Readings: a.Line.N,
		UIntercept: a.SD * math.Sqrt(a.Line.VarA), USlope: a.SD * math.Sqrt(a.Line.VarB), CovInterceptSlope: a.SD * a.SD * a.Line.Cov,
		ExtendFromML: math.Max(a.FromV-reach, 0), ExtendToML: a.ToV + reach, ResidualSD: a.SD, ConfidenceFactor95T: a.Factor95,
	}
}

func yName(run *ingest.Run, c *fit.Curve) string {
	switch {
	case run.Signal != ingest.Conductivity:
		return run.Signal.Unit()
	case c.V0 > 0:
		return "mS/cm, corrected for dilution"
	}
	return "mS/cm, as read"
}

func xName(f ingest.Facts) string {
	name := "mL of titrant"
	if f.Titrant != "" {
		name = "mL of " + f.Titrant
	}
	if f.TitrantMolPerL != nil {
		name += " " + strings.TrimSpace(report.Short(*f.TitrantMolPerL, 4)) + " mol/L"
	}
	return name
}
