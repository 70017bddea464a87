package figure

import (
	"fmt"
	"math"
)

// LaneMM is the height of one lane of a rail under a large figure.
const LaneMM = 4.2

// Place is what stands in a lane of a rail: x values in data units.
type Place struct {
	At       float64
	Shape    Shape
	Label    string  // figure beside the mark
	Bracket  bool    // square brackets at From and To
	From, To float64 // of the bracket
	Bar      bool    // bar over the interval Low to High
	Low      float64
	High     float64
}

// Rail is two lanes under a curve, on its x axis: above what was computed,
// below what the instrument wrote.
type Rail struct {
	UpperName, LowerName string
	Upper, Lower         []Place
	UpperNone, LowerNone string // the word in a lane that holds nothing
}

// Rail draws the rail under the area and returns where it ends.
func (a *Axes) Rail(r Rail) (foot float64) {
	s, top := a.Sheet, a.Area.Bottom
	for _, p := range append(r.Upper[:len(r.Upper):len(r.Upper)], r.Lower...) {
		if v := p.At + p.From + p.To + p.Low + p.High; math.IsNaN(v) || math.IsInf(v, 0) {
			s.Fail(fmt.Errorf("a place at %g, %g to %g, cannot stand in a rail", p.At, p.Low, p.High))
		}
	}
	foot = top + 2*LaneMM
	hair := Stroke{Hair, gridPt, Solid}
	s.Rule(hair, a.Area.Left, a.Area.Right, top)
	s.Rule(Stroke{Grid, gridPt, Solid}, a.Area.Left, a.Area.Right, foot)
	name := Style{Face: Medium, SizePt: 6.5, Ink: Blue}
	upper, lower := top+LaneMM/2, top+1.5*LaneMM
	if r.UpperName != "" {
		s.TextRight(a.Area.Left-1.8, upper+0.8, name, r.UpperName)
		s.TextRight(a.Area.Left-1.8, lower+0.8, name.In(Black), r.LowerName)
	}
	a.lane(r.Upper, upper, LaneMM, name, true, r.Lower)
	a.lane(r.Lower, lower, LaneMM, name.In(Black), false, nil)
	if len(r.Upper) == 0 {
		s.Text(a.Area.Left+1.5, upper+0.8, tickNumber.As(Italic), r.UpperNone)
	}
	if len(r.Lower) == 0 {
		s.Text(a.Area.Left+1.5, lower+0.8, tickNumber.As(Italic), r.LowerNone)
	}
	return foot
}

// markMM is the size of a mark in a lane 4.2 mm high.
const markMM = 2.2

// lane draws one lane: bars and brackets first, marks over them, then the
// figures where they cross none. Lines pass through it on their way to the
// places below.
func (a *Axes) lane(places []Place, y, height float64, st Style, filled bool, below []Place) {
	size := markMM * height / LaneMM
	taken := make([]Box, 0, len(places)+len(below))
	for _, p := range places {
		a.span(p, y, height)
		taken = append(taken, a.extent(p, size))
	}
	for _, p := range below {
		if a.X.Holds(p.At) {
			taken = append(taken, Box{Left: a.X.MM(p.At) - 0.3, Right: a.X.MM(p.At) + 0.3})
		}
	}
	for _, p := range places {
		x := a.X.MM(p.At)
		switch {
		case !a.X.Holds(p.At) && x < a.Area.Left:
			a.Sheet.Filled(PointsLeft, a.Area.Left+size/2, y, size*0.9, Warm)
		case !a.X.Holds(p.At):
			a.Sheet.Filled(PointsRight, a.Area.Right-size/2, y, size*0.9, Warm)
		case filled:
			a.Sheet.Filled(p.Shape, x, y, size, st.Ink)
		default:
			a.Sheet.Open(p.Shape, x, y, size, st.Ink)
		}
	}
	for i, at := range a.beside(places, taken, st, filled) {
		if places[i].Label != "" && !math.IsNaN(at) {
			a.Sheet.Text(at, y+0.8, st, places[i].Label)
		}
	}
}

// span draws bar and brackets of a place.
func (a *Axes) span(p Place, y, height float64) {
	if p.Bar {
		l, r := a.clampX(a.X.MM(p.Low)), a.clampX(a.X.MM(p.High))
		if r-l < 0.8 { // narrower is told in figures only
			l, r = a.clampX((l+r)/2-0.4), a.clampX((l+r)/2+0.4)
		}
		a.Sheet.FillBox(Blue, Box{l, y - 0.55, r, y + 0.55})
	}
	if !p.Bracket {
		return
	}
	st, h := Stroke{Black, 0.55, Solid}, height*0.36
	arm := min(0.9, 0.4*math.Abs(a.X.MM(p.To)-a.X.MM(p.From))) // never across the other bracket
	for _, e := range [...]struct{ v, dir float64 }{{p.From, 1}, {p.To, -1}} {
		if !a.X.Holds(e.v) {
			continue
		}
		x := a.X.MM(e.v)
		end := a.clampX(x + e.dir*arm)
		a.Sheet.Stroke(st, Point{end, y - h}, Point{x, y - h}, Point{x, y + h}, Point{end, y + h})
	}
}

// extent is what a place covers of its lane; only Left and Right count.
func (a *Axes) extent(p Place, size float64) Box {
	x := keep(a.X.MM(p.At), a.Area.Left+size/2, a.Area.Right-size/2)
	b := Box{Left: x - size/2, Right: x + size/2}
	if p.Bracket {
		b.Left, b.Right = min(b.Left, a.clampX(a.X.MM(p.From))), max(b.Right, a.clampX(a.X.MM(p.To)))
	}
	if p.Bar {
		b.Left, b.Right = min(b.Left, a.clampX(a.X.MM(p.Low))), max(b.Right, a.clampX(a.X.MM(p.High)))
	}
	return b
}

// beside finds for each label the left end nearest to its place at which it
// crosses no mark and no other label, not a number where there is none;
// computed figures prefer the left side, written ones the right.
func (a *Axes) beside(places []Place, taken []Box, st Style, left bool) []float64 {
	const gap = 0.8
	out := make([]float64, len(places))
	for i, p := range places {
		w := TextWidth(st, p.Label)
		best := math.Inf(1)
		for j := range taken {
			for _, at := range [...]float64{taken[j].Left - gap - w, taken[j].Right + gap} {
				cost := max(taken[i].Left-(at+w), at-taken[i].Right, 0)
				if (at < taken[i].Left) != left {
					cost += 0.5
				}
				if at < a.Area.Left || at+w > a.Area.Right+overhangMM || cost >= best || crossesAny(taken, at-gap*0.9, at+w+gap*0.9) {
					continue
				}
				best, out[i] = cost, at
			}
		}
		if math.IsInf(best, 1) {
			out[i] = math.NaN()
			continue
		}
		taken = append(taken, Box{Left: out[i], Right: out[i] + w})
	}
	return out
}

// overhangMM is how far a label may leave the area to the right.
const overhangMM = 2.0

func crossesAny(taken []Box, left, right float64) bool {
	for _, t := range taken {
		if left < t.Right && t.Left < right {
			return true
		}
	}
	return false
}
