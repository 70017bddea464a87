package figure

import (
	"fmt"
	"math"
	"strconv"
)

func short(v float64) string { return strconv.FormatFloat(v, 'g', 4, 64) }

// Curve draws a line through points in data units, clipped to the area.
func (a *Axes) Curve(pts []Point, st Stroke) {
	for _, part := range a.parts(pts, thinFor(st)) {
		a.Sheet.Stroke(st, part...)
		a.Room.TakeLine(part)
	}
}

// parts maps a curve to mm, clips it to the area and thins it to lie within
// give mm of itself.
func (a *Axes) parts(pts []Point, give float64) [][]Point {
	var out [][]Point
	var part []Point
	for i := 1; i < len(pts); i++ {
		p, q, whole, ok := a.Area.clip(a.At(pts[i-1]), a.At(pts[i]))
		if !ok {
			continue
		}
		if n := len(part); n == 0 || part[n-1] != p {
			if n > 1 {
				out = append(out, thin(part, give))
			}
			part = append(make([]Point, 0, len(pts)-i+1), p)
		}
		part = append(part, q)
		if !whole {
			out, part = append(out, thin(part, give)), nil
		}
	}
	if len(part) > 1 {
		out = append(out, thin(part, give))
	}
	return out
}

// clip cuts a segment to the box (Liang and Barsky's way, from memory); whole
// tells that its end was not cut. A point that is not a number passes, for the
// sheet to refuse.
func (b Box) clip(p, q Point) (from, to Point, whole, ok bool) {
	t0, t1, dx, dy := 0.0, 1.0, q.X-p.X, q.Y-p.Y
	for _, e := range [...][2]float64{{-dx, p.X - b.Left}, {dx, b.Right - p.X}, {-dy, p.Y - b.Top}, {dy, b.Bottom - p.Y}} {
		if e[0] == 0 {
			if e[1] < 0 {
				return p, q, false, false
			}
			continue
		}
		if r := e[1] / e[0]; e[0] < 0 {
			t0 = max(t0, r)
		} else {
			t1 = min(t1, r)
		}
	}
	if t0 > t1 {
		return p, q, false, false
	}
	from, to = p, q
	if t0 > 0 {
		from = b.inside(Point{p.X + t0*dx, p.Y + t0*dy})
	}
	if t1 < 1 {
		to = b.inside(Point{p.X + t1*dx, p.Y + t1*dy})
	}
	return from, to, t1 == 1, true
}

// Meets tells whether a segment touches the box.
func (b Box) Meets(p, q Point) bool {
	_, _, _, ok := b.clip(p, q)
	return ok
}

// inside takes the rounding off a point that was cut to the box.
func (b Box) inside(p Point) Point {
	return Point{keep(p.X, b.Left, b.Right), keep(p.Y, b.Top, b.Bottom)}
}

// thinMM is how far a thinned curve may lie from the whole one: a third of
// the finest line.
const thinMM = 0.04

// thinFor is that for a line of some width: a fifth of it where that is more.
func thinFor(st Stroke) float64 { return max(thinMM, MM(st.WidthPt)/5) }

// thin leaves out points that lie on the line between their neighbours.
func thin(pts []Point, give float64) []Point {
	if len(pts) < 3 {
		return pts
	}
	out := append(make([]Point, 0, 1+len(pts)/3), pts[0])
	from := 0
	for i := 2; i < len(pts); i++ {
		if !straight(pts[from:i+1], give) {
			out = append(out, pts[i-1])
			from = i - 1
		}
	}
	return append(out, pts[len(pts)-1])
}

// straight tells whether all points lie near the line from first to last.
func straight(pts []Point, give float64) bool {
	a, b := pts[0], pts[len(pts)-1]
	dx, dy := b.X-a.X, b.Y-a.Y
	length := math.Hypot(dx, dy)
	if length < 1e-9 || len(pts) > 40 {
		return length < 1e-9
	}
	for _, p := range pts[1 : len(pts)-1] {
		if off := math.Abs((p.X-a.X)*dy-(p.Y-a.Y)*dx) / length; !(off <= give) {
			return false
		}
	}
	return true
}

// leastPeakMM is the least width of a peak of a silhouette: one that is
// steeper would not be seen on paper.
const leastPeakMM = 1.2

// Floor draws a silhouette on the floor of the area: the points' y from 0 to
// highest take up to share of the height.
func (a *Axes) Floor(pts []Point, highest, share float64, ink Ink) {
	if len(pts) < 2 || !(highest > 0) {
		return
	}
	for _, p := range pts { // a peak may swallow a neighbour, but not in silence what is no number
		a.holds(p)
	}
	f := Axes{Sheet: a.Sheet, Area: a.Area, X: a.X, Y: Scale{0, highest, a.Area.Bottom, a.Area.Bottom - share*a.Area.Height()}}
	for _, part := range f.parts(widened(pts, leastPeakMM/2/a.Area.Width()*(a.X.To-a.X.From)), thinMM) {
		first, last := part[0], part[len(part)-1]
		a.Room.TakeLine(part)
		a.Sheet.Fill(ink, append([]Point{{first.X, a.Area.Bottom}}, append(part, Point{last.X, a.Area.Bottom})...)...)
	}
}

// widened lets each peak reach half to both sides: a point that stands higher
// than all within half is drawn level over that width.
func widened(pts []Point, half float64) []Point {
	out := make([]Point, 0, len(pts)+8)
	for i := 0; i < len(pts); i++ {
		p := pts[i]
		if !peaks(pts, i, half) {
			out = append(out, p)
			continue
		}
		for len(out) > 0 && out[len(out)-1].X > p.X-half {
			out = out[:len(out)-1]
		}
		out = append(out, Point{p.X - half, p.Y}, Point{p.X + half, p.Y})
		for i+1 < len(pts) && pts[i+1].X < p.X+half {
			i++
		}
	}
	return out
}

// peaks tells whether a point stands higher than its neighbours and all others
// within half.
func peaks(pts []Point, i int, half float64) bool {
	p := pts[i]
	if i > 0 && pts[i-1].Y >= p.Y || i+1 < len(pts) && pts[i+1].Y > p.Y {
		return false
	}
	for k := i - 1; k >= 0 && p.X-pts[k].X < half; k-- {
		if pts[k].Y >= p.Y {
			return false
		}
	}
	for k := i + 1; k < len(pts) && pts[k].X-p.X < half; k++ {
		if pts[k].Y > p.Y {
			return false
		}
	}
	return p.Y > 0
}

// Between fills the area between two curves that share their x values, given
// as points of the upper and of the lower one.
func (a *Axes) Between(upper, lower []Point, ink Ink) {
	if len(upper) < 2 || len(lower) < 2 {
		return
	}
	area := make([]Point, 0, len(upper)+len(lower))
	for _, p := range upper {
		area = append(area, a.At(p))
	}
	for i := len(lower) - 1; i >= 0; i-- {
		area = append(area, a.At(lower[i]))
	}
	a.Sheet.Fill(ink, a.Area.cutPolygon(area)...)
}

// cutPolygon cuts a polygon to the box, edge by edge (Sutherland and Hodgman's
// way, from memory). Points that are not numbers stay, for the sheet to refuse.
func (b Box) cutPolygon(pts []Point) []Point {
	for _, outside := range [...]func(Point) float64{ // mm beyond each edge
		func(p Point) float64 { return b.Left - p.X },
		func(p Point) float64 { return p.X - b.Right },
		func(p Point) float64 { return b.Top - p.Y },
		func(p Point) float64 { return p.Y - b.Bottom },
	} {
		var in []Point
		for i, q := range pts {
			p := pts[(i+len(pts)-1)%len(pts)]
			dp, dq := outside(p), outside(q)
			if (dp > 0) != (dq > 0) {
				t := dp / (dp - dq)
				in = append(in, b.snap(Point{p.X + t*(q.X-p.X), p.Y + t*(q.Y-p.Y)}))
			}
			if !(dq > 0) {
				in = append(in, q)
			}
		}
		pts = in
	}
	return pts
}

// snap takes rounding off a point cut to an edge of the box.
func (b Box) snap(p Point) Point {
	for _, e := range [...]float64{b.Left, b.Right} {
		if math.Abs(p.X-e) < 1e-9 {
			p.X = e
		}
	}
	for _, e := range [...]float64{b.Top, b.Bottom} {
		if math.Abs(p.Y-e) < 1e-9 {
			p.Y = e
		}
	}
	return p
}

// holds maps a point and tells whether it lies in the area. A point that is
// not finite fails the sheet: nothing may be missing from a page in silence.
func (a *Axes) holds(p Point) (at Point, ok bool) {
	if s := p.X + p.Y; math.IsNaN(s) || math.IsInf(s, 0) {
		a.Sheet.Fail(fmt.Errorf("a value at %g, %g cannot be drawn", p.X, p.Y))
		return at, false
	}
	return a.At(p), a.X.Holds(p.X) && a.Y.Holds(p.Y)
}

// Readings draws a disc at each point within the area and returns those that
// lie outside.
func (a *Axes) Readings(pts []Point, diameterMM float64, open bool) (outside []Point) {
	in := make([]Point, 0, len(pts))
	for _, p := range pts {
		if at, ok := a.holds(p); ok {
			in = append(in, at)
			a.Sheet.record(AData, "reading", at.X, at.Y, diameterMM)
			a.Room.TakeBox(Box{at.X - 0.8, at.Y - 0.8, at.X + 0.8, at.Y + 0.8})
		} else {
			outside = append(outside, p)
		}
	}
	if open {
		a.Sheet.Ring(Black, diameterMM+0.2, 0.5, in...)
	} else {
		a.Sheet.Dots(Black, diameterMM, in...)
	}
	return outside
}

// Strokes draws a short level stroke at each point within the area.
func (a *Axes) Strokes(pts []Point, lengthMM float64, st Stroke) {
	for _, p := range pts {
		if at, ok := a.holds(p); ok {
			l, r := a.clampX(at.X-lengthMM/2), a.clampX(at.X+lengthMM/2)
			a.Sheet.Rule(st, l, r, at.Y)
			a.Room.TakeLine([]Point{{l, at.Y}, {r, at.Y}})
		}
	}
}

// Stems draws a stem with a disc from zero to each point; one that leaves the
// area ends at its edge in a triangle that points on.
func (a *Axes) Stems(pts []Point) {
	zero := a.Y.MM(0)
	for _, p := range pts {
		at, ok := a.holds(p)
		if !ok && !a.X.Holds(p.X) {
			continue
		}
		end := keep(at.Y, a.Area.Top, a.Area.Bottom)
		a.Sheet.Stroke(Stroke{Black, 0.55, Solid}, Point{at.X, zero}, Point{at.X, end})
		switch {
		case at.Y < a.Area.Top:
			a.Sheet.Filled(PointsUp, at.X, end+0.8, 1.6, Warm)
		case at.Y > a.Area.Bottom:
			a.Sheet.Filled(Triangle, at.X, end-0.8, 1.6, Warm)
		default:
			a.Sheet.Dots(Black, 0.95, Point{at.X, end})
		}
	}
}
