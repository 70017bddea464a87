package pdf

import (
	"math"
	"sort"

	"lastdrop/report"
	"lastdrop/report/figure"
)

// padded widens a range by shares of its span; a range without one becomes
// one around its value.
func padded(from, to, below, above float64) (float64, float64) {
	span := to - from
	if !(span > 0) {
		span = max(math.Abs(from)*0.02, 1e-3)
		return from - span, to + span
	}
	return from - below*span, to + above*span
}

// bounds grows a range value by value; what is not finite counts for nothing
// here and stops the drawing where it would be drawn.
type bounds struct {
	from, to float64
	any      bool
}

func (b *bounds) take(v float64) {
	if !finite(v) {
		return
	}
	if !b.any {
		b.from, b.to, b.any = v, v, true
		return
	}
	b.from, b.to = min(b.from, v), max(b.to, v)
}

func finite(v float64) bool { return !math.IsNaN(v) && !math.IsInf(v, 0) }

// near takes a value unless it lies further out than a share of the range.
func (b *bounds) near(v, share float64) {
	if span := (b.to - b.from) * share; v > b.from-span && v < b.to+span {
		b.take(v)
	}
}

// valueRange is the range of readings that settled: those left out count only
// where they lie near it, so that a stray one does not flatten the curve.
func valueRange(p *report.Picture, fromML, toML float64) bounds {
	var b bounds
	within := func(v float64) bool { return v >= fromML && v <= toML }
	for _, d := range p.Dots {
		if !d.LeftOut && within(d.VolumeML) {
			b.take(d.Value)
		}
	}
	for _, c := range p.Curve {
		if within(c.X) {
			b.take(c.Y)
		}
	}
	for _, d := range p.Dots {
		if !within(d.VolumeML) {
			continue
		}
		if !b.any {
			b.take(d.Value)
		}
		b.near(d.Value, 0.25)
		if d.AsRead != d.Value {
			b.near(d.AsRead, 0.25)
		}
	}
	return b
}

// volumeRange is the range of volumes of a run: from zero where the run
// begins near it, to the last reading, or to what stands a little beyond.
func volumeRange(e *report.Evaluation, p *report.Picture) (from, to float64) {
	var b bounds
	for _, d := range p.Dots {
		b.take(d.VolumeML)
	}
	if !b.any {
		return 0, 1
	}
	if b.from > 0 && b.from < 0.5*b.to {
		b.from = 0
	}
	for _, i := range e.Indicated {
		b.near(i.VolumeML, 0.15)
	}
	from, to = b.from, b.to
	if !(to > from) {
		return padded(from, to, 0, 0)
	}
	return from, to + 0.005*(to-from)
}

// at reads a drawn curve at a volume: the straight line between its points.
// It places lines on paper and is never printed.
func at(curve []report.XY, v float64) (y float64, ok bool) {
	k := sort.Search(len(curve), func(i int) bool { return curve[i].X >= v })
	if k == len(curve) || len(curve) == 0 {
		return 0, false
	}
	if k == 0 {
		return curve[0].Y, curve[0].X == v
	}
	a, b := curve[k-1], curve[k]
	if b.X == a.X {
		return b.Y, true
	}
	return a.Y + (b.Y-a.Y)*(v-a.X)/(b.X-a.X), true
}

func points(xy []report.XY) []figure.Point {
	out := make([]figure.Point, len(xy))
	for i, p := range xy {
		out[i] = figure.Point{X: p.X, Y: p.Y}
	}
	return out
}

// between returns the part of a curve from one volume to another, its ends
// put in.
func between(curve []report.XY, from, to float64) []figure.Point {
	var out []figure.Point
	if y, ok := at(curve, from); ok {
		out = append(out, figure.Point{X: from, Y: y})
	}
	for _, c := range curve {
		if c.X > from && c.X < to {
			out = append(out, figure.Point{X: c.X, Y: c.Y})
		}
	}
	if y, ok := at(curve, to); ok {
		out = append(out, figure.Point{X: to, Y: y})
	}
	return out
}
