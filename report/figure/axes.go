package figure

import "math"

// Rules of the page language, pt.
const (
	gridPt = 0.35
	axisPt = 0.4
	tickMM = 1.0
)

// tickNumber is how tick numbers and notes are set; nothing is smaller.
var tickNumber = Style{Face: Regular, SizePt: 6.5, Ink: Second}

// Axes are a plotting area with its two scales. Data goes through them to the
// sheet; what leaves the area is clipped.
type Axes struct {
	Sheet *Sheet
	Area  Box
	X, Y  Scale
	Room  *Room                                // where labels may stand
	Print func(v float64, decimals int) string // how numbers are written

	bands []Box
}

// NewAxes returns axes over the area; x runs to the right, y upwards. An
// empty or infinite range fails the sheet.
func NewAxes(s *Sheet, area Box, x, y [2]float64, print func(float64, int) string) *Axes {
	for _, r := range [...][2]float64{x, y} {
		if span := r[1] - r[0]; !(span > 0) || math.IsInf(span, 0) {
			s.Fail(&RangeError{From: r[0], To: r[1]})
		}
	}
	return &Axes{
		Sheet: s, Area: area, Room: NewRoom(area), Print: print,
		X: Scale{x[0], x[1], area.Left, area.Right},
		Y: Scale{y[0], y[1], area.Bottom, area.Top},
	}
}

// RangeError says that a scale cannot be drawn.
type RangeError struct{ From, To float64 }

func (e *RangeError) Error() string {
	return "a scale from " + short(e.From) + " to " + short(e.To) + " cannot be drawn"
}

// At returns where a point in data units stands on the sheet.
func (a *Axes) At(p Point) Point { return Point{a.X.MM(p.X), a.Y.MM(p.Y)} }

// GridY draws the level grid.
func (a *Axes) GridY(t Ticks) {
	for _, v := range t.Values {
		a.Sheet.Rule(Stroke{Grid, gridPt, Solid}, a.Area.Left, a.Area.Right, a.Y.MM(v))
	}
}

// Left draws the upright axis from first to last tick, with its numbers.
func (a *Axes) Left(t Ticks) {
	n := len(t.Values)
	if n == 0 {
		return
	}
	ink, x := Stroke{Second, axisPt, Solid}, a.Area.Left
	a.Sheet.Stroke(ink, Point{x, a.Y.MM(t.Values[0])}, Point{x, a.Y.MM(t.Values[n-1])})
	for _, v := range t.Values {
		y := a.Y.MM(v)
		a.Sheet.Rule(ink, x-tickMM, x, y)
		a.Sheet.TextRight(x-tickMM-0.8, y+0.8, tickNumber, a.Print(v, t.Decimals))
	}
}

// Bottom draws the level axis at y mm from first to last tick, its numbers
// below it.
func (a *Axes) Bottom(y float64, t Ticks) {
	n := len(t.Values)
	if n == 0 {
		return
	}
	ink := Stroke{Second, axisPt, Solid}
	a.Sheet.Rule(ink, a.X.MM(t.Values[0]), a.X.MM(t.Values[n-1]), y)
	for _, v := range t.Values {
		x := a.X.MM(v)
		a.Sheet.Stroke(ink, Point{x, y}, Point{x, y + tickMM})
		text := a.Print(v, t.Decimals)
		half := TextWidth(tickNumber, text) / 2
		a.Sheet.Text(min(x, max(a.X.ToMM+3-half, x-half))-half, y+tickMM+2.3, tickNumber, text)
	}
}

// BandX shades the area between two x values down to foot mm; at least 0.3 mm
// wide.
func (a *Axes) BandX(from, to, foot float64, ink Ink) {
	l, r := a.clampX(a.X.MM(from)), a.clampX(a.X.MM(to))
	if r-l < 0.3 {
		l, r = a.clampX((l+r)/2-0.15), a.clampX((l+r)/2+0.15)
	}
	band := Box{l, a.Area.Top, r, foot}
	a.Sheet.FillBox(ink, band)
	a.bands = append(a.bands, band)
	for _, x := range [...]float64{l, r} { // no label across an edge
		a.Room.TakeLine([]Point{{x, a.Area.Top}, {x, a.Area.Bottom}})
	}
}

func (a *Axes) clampX(x float64) float64 { return keep(x, a.Area.Left, a.Area.Right) }

// keep returns x or the nearer end; not a number stays so, for the sheet to
// refuse.
func keep(x, low, high float64) float64 {
	if x < low {
		return low
	}
	if x > high {
		return high
	}
	return x
}

// BandY shades the area between two y values.
func (a *Axes) BandY(from, to float64, ink Ink) {
	b := Box{a.Area.Left, keep(a.Y.MM(to), a.Area.Top, a.Area.Bottom), a.Area.Right, keep(a.Y.MM(from), a.Area.Top, a.Area.Bottom)}
	a.Sheet.FillBox(ink, b)
}

// Drop draws a line from a point in data units down to foot mm, and keeps
// labels off it.
func (a *Axes) Drop(p Point, foot float64, st Stroke) {
	at := a.At(p)
	at = Point{a.clampX(at.X), keep(at.Y, a.Area.Top, a.Area.Bottom)}
	a.Sheet.Stroke(st, at, Point{at.X, foot})
	a.Room.TakeLine([]Point{at, {at.X, a.Area.Bottom}})
}

// Label sets a text at the free place nearest to a point of the sheet, on a
// ground that covers the grid, and tells whether there was one within reach mm.
func (a *Axes) Label(st Style, text string, near Point, reach float64) bool {
	text, _ = Clean(text)
	const pad = 0.5
	size := TextBox(0, 0, st, text)
	b, ok := a.Room.Find(size.Width()+2*pad, size.Height()+2*pad, near, reach)
	if !ok {
		return false
	}
	a.Room.TakeBox(b)
	a.Sheet.FillBox(a.ground(b), b)
	a.Sheet.Text(b.Left+pad, b.Top+pad-size.Top, st, text)
	return true
}

// ground is the ink behind a place: of a band or of the paper.
func (a *Axes) ground(b Box) Ink {
	for _, band := range a.bands {
		if b.Within(band, 0.1) {
			return Band
		}
	}
	return Paper
}
