package fit

import (
	"math"

	"gonum.org/v1/gonum/stat/distuv"
)

// TwoLine is the name of the estimator of this file.
const TwoLine = "two-line"

// Arm is a straight arm of a conductometric curve for the page.
type Arm struct {
	Line               // of the corrected readings
	FromV, ToV float64 // mL, first and last reading used
	SD         float64 // residual standard deviation, relative to the reading
	Factor95   float64 // Student factor of the pooled degrees of freedom
	At         []int   // readings used, indices in the Curve
}

// corrected multiplies conductivities by (V0+V)/V0, which takes the dilution
// by the titrant out; without a known V0 it returns them as read.
func corrected(v, y []float64, v0 float64) []float64 {
	out := append([]float64(nil), y...)
	if v0 > 0 {
		for i := range out {
			out[i] *= (v0 + v[i]) / v0
		}
	}
	return out
}

// breaks intersects neighbouring arms. u joins Fieller's interval at 95 %
// divided by 1.96, the movement when blocks of readings are left out and the
// burette; the interval is Fieller's, stretched by what the latter two add.
//
// Two straight lines are right for strong acids and bases and for
// precipitation. Where arms bend the interval widens through the residuals
// and the jackknife, and poor-fit tells.
func (c *conduct) breaks(k *cleaned, v0 float64) (out []Estimate, arms []Arm, gain float64) {
	found, gain := c.arms()
	s2, t := pooled(found)
	s2 = math.Max(s2, sq(leastRelSD/math.Sqrt(12)))
	for i := 0; i+1 < len(found); i++ {
		a, b := found[i], found[i+1]
		x, _, low, high, ok := crossing(a.line, b.line, s2, t)
		if !ok || x <= c.v[a.from] || x >= c.v[b.to] || !c.between(a, b, x) {
			continue
		}
		e := Estimate{Estimator: TwoLine, Kind: Break, V: x, Reading: asMeasured(a.line.At(x), x, v0)}
		j := k.bracketOf(x)
		e.Bracket = [2]int{k.at[j], k.at[j+1]}
		e.Moves = c.moves(a, b, x)
		fieller := (high - low) / 2 / student95
		e.U = math.Sqrt(sq(fieller) + sq(e.Moves) + sq(k.uv))
		stretch := e.U / fieller
		e.Low, e.High = x-(x-low)*stretch, x+(high-x)*stretch
		out = append(out, e)
	}
	for _, a := range found {
		p := Arm{Line: a.line, FromV: c.v[a.from], ToV: c.v[a.to], SD: math.Sqrt(s2), Factor95: t}
		for i := a.from; i <= a.to; i++ {
			p.At = append(p.At, k.at[i])
		}
		arms = append(arms, p)
	}
	return out, arms, gain
}

// between tells whether the crossing lies where the two arms meet: between
// them, or no further inside one than the corner or one increment.
func (c *conduct) between(a, b arm, x float64) bool {
	left, right := c.v[max(a.to-1, a.from)], c.v[min(b.from+1, b.to)]
	return x >= left && x <= right
}

func asMeasured(y, v, v0 float64) float64 {
	if v0 > 0 {
		return y * v0 / (v0 + v)
	}
	return y
}

// pooled returns the residual variance (of weight one) over all arms and the
// Student factor of its degrees of freedom.
func pooled(arms []arm) (s2, t float64) {
	sse, dof := 0.0, 0
	for _, a := range arms {
		sse += a.line.SSE
		dof += a.line.N - 2
	}
	if dof < 1 {
		return 0, math.Inf(1)
	}
	return sse / float64(dof), distuv.StudentsT{Mu: 0, Sigma: 1, Nu: float64(dof)}.Quantile(0.975)
}

// moves is the delete-a-block jackknife [jack] of the crossing, arm by arm:
// each is left without a quarter of its readings in turn.
func (c *conduct) moves(a, b arm, x float64) float64 {
	variance := 0.0
	for side, m := range [2]arm{a, b} {
		n := m.to - m.from + 1
		g := min(blocks/2, n-2)
		for i := range g {
			pair := [2]Line{a.line, b.line}
			pair[side] = c.lineWithout(m, m.from+i*n/g, m.from+(i+1)*n/g-1)
			if d := pair[0].B - pair[1].B; d != 0 {
				variance += float64(g-1) / float64(g) * sq((pair[1].A-pair[0].A)/d-x)
			}
		}
	}
	return math.Sqrt(variance)
}

func (c *conduct) lineWithout(m arm, from, to int) Line {
	var x, y, w []float64
	for i := m.from; i <= m.to; i++ {
		if i < from || i > to {
			x, y, w = append(x, c.v[i]), append(y, c.y[i]), append(w, c.w[i])
		}
	}
	return fitLine(x, y, w)
}
