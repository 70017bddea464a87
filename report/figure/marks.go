package figure

import "math"

// Urgency is a mark that gains ink and corners with urgency, so that a grey
// copy still tells the four apart.
type Urgency uint8

// The four marks, calmest first.
const (
	Calm    Urgency = iota + 1 // ring
	Look                       // lozenge, its left half filled
	Settle                     // solid square with a white stroke and point
	Missing                    // empty square, broken edge
)

// Urgent draws an urgency mark of size mm with its middle at x, y.
func (s *Sheet) Urgent(u Urgency, x, y, size float64) {
	s.record(AMark, "urgency", x, y, size)
	h := size / 2
	square := Box{x - h, y - h, x + h, y + h}
	switch u {
	case Calm:
		s.Ring(Second, size*0.94, math.Min(0.75, 0.3*size), Point{x, y})
	case Look:
		top, right, foot, left := Point{x, y - h*1.12}, Point{x + h*1.12, y}, Point{x, y + h*1.12}, Point{x - h*1.12, y}
		s.Fill(Paper, top, right, foot, left)
		s.Fill(Amber, top, foot, left)
		s.Stroke(Stroke{Black, 0.6, Solid}, top, foot)
		s.Outline(Stroke{Black, 0.6, Solid}, top, right, foot, left)
	case Settle:
		s.FillBox(Warm, square)
		s.FillBox(Paper, Box{x - 0.07*size, y - 0.28*size, x + 0.07*size, y + 0.09*size})
		s.FillBox(Paper, Box{x - 0.07*size, y + 0.17*size, x + 0.07*size, y + 0.31*size})
	case Missing:
		s.FillBox(Paper, square)
		s.Outline(Stroke{Black, 0.6, Broken}, square.corners()...)
	}
}

// Shape is what an endpoint or a point outside its limits is drawn as.
type Shape uint8

// The shapes.
const (
	Disc     Shape = iota + 1
	Triangle       // point down
	Square
	Lozenge
	PointsUp // triangles that point the way something broke out
	PointsLeft
	PointsRight
)

// outline returns the corners of a shape of size mm.
func (k Shape) outline(x, y, size float64) []Point {
	h := size / 2
	switch k {
	case Triangle:
		return []Point{{x - h, y - 0.8*h}, {x + h, y - 0.8*h}, {x, y + h}}
	case PointsUp:
		return []Point{{x - h, y + 0.8*h}, {x + h, y + 0.8*h}, {x, y - h}}
	case PointsLeft:
		return []Point{{x + 0.8*h, y - h}, {x + 0.8*h, y + h}, {x - h, y}}
	case PointsRight:
		return []Point{{x - 0.8*h, y - h}, {x - 0.8*h, y + h}, {x + h, y}}
	case Lozenge:
		return []Point{{x, y - h}, {x + h, y}, {x, y + h}, {x - h, y}}
	}
	return Box{x - 0.88*h, y - 0.88*h, x + 0.88*h, y + 0.88*h}.corners()
}

// Filled draws a shape as solid ink; Open draws it as an edge of ink around
// paper.
func (s *Sheet) Filled(k Shape, x, y, size float64, ink Ink) {
	s.record(AMark, "shape", x, y, size)
	if k == Disc {
		s.Dots(ink, size, Point{x, y})
		return
	}
	s.Fill(ink, k.outline(x, y, size)...)
}

// Open: see Filled.
func (s *Sheet) Open(k Shape, x, y, size float64, ink Ink) {
	s.record(AMark, "shape", x, y, size)
	if k == Disc {
		s.Ring(ink, size, 0.7, Point{x, y})
		return
	}
	corners := k.outline(x, y, size-0.2)
	s.Fill(Paper, corners...)
	s.Outline(Stroke{ink, 0.7, Solid}, corners...)
}

// Drop draws the program's sign, a drop of size mm height, its middle at x, y.
func (s *Sheet) Drop(x, y, size float64) {
	const n = 28
	pts := make([]Point, 0, n)
	for i := range n {
		t := 2 * math.Pi * float64(i) / n
		wide := math.Sin(t) * math.Pow(math.Sin(t/2), 1.6)
		pts = append(pts, Point{x + 0.42*size*wide, y - 0.5*size*math.Cos(t)})
	}
	s.record(AMark, "drop", x, y, size)
	s.Fill(Black, pts...)
}
