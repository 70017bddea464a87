package figure

// Lane is a level scale that rows of a list share: each row draws its point
// and its bar at its own height, the axis stands once at the foot.
type Lane struct {
	Sheet *Sheet
	X     Scale
	Print func(v float64, decimals int) string
}

// NewLane returns a shared scale from left to right mm.
func NewLane(s *Sheet, left, right float64, from, to float64, print func(v float64, decimals int) string) *Lane {
	if !(to > from) {
		s.Fail(&RangeError{From: from, To: to})
	}
	return &Lane{Sheet: s, X: Scale{from, to, left, right}, Print: print}
}

func (l *Lane) at(v float64) float64 { return keep(l.X.MM(v), l.X.FromMM, l.X.ToMM) }

// Band shades the values from low to high between two heights.
func (l *Lane) Band(low, high, top, foot float64, ink Ink) {
	l.Sheet.FillBox(ink, Box{l.at(low), top, l.at(high), foot})
}

// Upright draws a line at a value between two heights.
func (l *Lane) Upright(v, top, foot float64, st Stroke) {
	if l.X.Holds(v) {
		l.Sheet.Stroke(st, Point{l.X.MM(v), top}, Point{l.X.MM(v), foot})
	}
}

// Bar draws an interval at height y.
func (l *Lane) Bar(low, high, y float64, st Stroke) {
	from, to := l.at(low), l.at(high)
	if to > from {
		l.Sheet.Rule(st, from, to, y)
	}
}

// Point draws a shape at a value; one beyond the scale stands at its end as a
// triangle that points on, and inside is false.
func (l *Lane) Point(v, y float64, k Shape, size float64, ink Ink, open bool) (inside bool) {
	x := l.X.MM(v)
	switch {
	case l.X.Holds(v) && open:
		l.Sheet.Open(k, x, y, size, ink)
	case l.X.Holds(v):
		l.Sheet.Filled(k, x, y, size, ink)
	case v < l.X.From:
		l.Sheet.Filled(PointsLeft, l.X.FromMM+size/2, y, size, Warm)
	case v > l.X.To:
		l.Sheet.Filled(PointsRight, l.X.ToMM-size/2, y, size, Warm)
	default: // not a number
		l.Sheet.Filled(k, x, y, size, ink)
	}
	return l.X.Holds(v)
}

// Axis draws the scale with its numbers at height y.
func (l *Lane) Axis(y float64, t Ticks) {
	a := Axes{Sheet: l.Sheet, X: l.X, Print: l.Print}
	a.Bottom(y, t)
}
