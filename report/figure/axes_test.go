package figure

import (
	"math"
	"testing"
)

func testAxes() *Axes {
	return NewAxes(NewSheet(210, 297), Box{34, 70, 136, 154}, [2]float64{0, 18}, [2]float64{2, 13}, plainNumber)
}

// TestScale: 34 mm is 0 mL and 136 mm is 18 mL, so 9 mL is 85 mm; upwards 2
// is 154 mm and 13 is 70 mm, so 7.5 is 112 mm.
func TestScale(t *testing.T) {
	a := testAxes()
	if p := a.At(Point{9, 7.5}); math.Abs(p.X-85) > 1e-9 || math.Abs(p.Y-112) > 1e-9 {
		t.Errorf("got %v", p)
	}
}

// TestClip: by hand. The line from (0,0) to (10,10) enters the box 2..4 by
// 1..5 at (2,2) and leaves it at (4,4).
func TestClip(t *testing.T) {
	b := Box{2, 1, 4, 5}
	for _, c := range []struct {
		p, q, from, to Point
		whole, ok      bool
	}{
		{Point{0, 0}, Point{10, 10}, Point{2, 2}, Point{4, 4}, false, true},
		{Point{3, 2}, Point{3, 4}, Point{3, 2}, Point{3, 4}, true, true},
		{Point{3, 2}, Point{3, 40}, Point{3, 2}, Point{3, 5}, false, true},
		{Point{0, 0}, Point{1, 9}, Point{}, Point{}, false, false},
		{Point{0, 6}, Point{9, 6}, Point{}, Point{}, false, false},
	} {
		from, to, whole, ok := b.clip(c.p, c.q)
		if ok != c.ok || ok && (from != c.from || to != c.to || whole != c.whole) {
			t.Errorf("clip(%v, %v) = %v, %v, %v, %v", c.p, c.q, from, to, whole, ok)
		}
	}
}

// TestCutPolygon: a lozenge around a box leaves the whole box; its area is
// that of the box, 2 by 4 mm.
func TestCutPolygon(t *testing.T) {
	b := Box{2, 1, 4, 5}
	got := b.cutPolygon([]Point{{3, -9}, {13, 3}, {3, 15}, {-7, 3}})
	area := 0.0
	for i, q := range got {
		p := got[(i+len(got)-1)%len(got)]
		area += (p.X*q.Y - q.X*p.Y) / 2
		if q.X < 2 || q.X > 4 || q.Y < 1 || q.Y > 5 {
			t.Errorf("%v lies outside", q)
		}
	}
	if math.Abs(area-8) > 1e-9 {
		t.Errorf("area %g mm2, want 8", area)
	}
}

// TestThinKeepsShape: the thinned curve passes within thinMM of every point
// it leaves out, and leaves out most of a smooth one.
func TestThinKeepsShape(t *testing.T) {
	var pts []Point
	for i := 0; i <= 600; i++ {
		x := float64(i) / 6
		pts = append(pts, Point{x, 40 + 35*math.Tanh((x-60)/1.5)})
	}
	got := thin(pts, thinMM)
	if len(got) > 150 || got[0] != pts[0] || got[len(got)-1] != pts[600] {
		t.Fatalf("%d points of %d", len(got), len(pts))
	}
	k := 0
	for _, p := range pts {
		for k+2 < len(got) && got[k+1].X < p.X {
			k++
		}
		a, b := got[k], got[k+1]
		off := math.Abs((p.X-a.X)*(b.Y-a.Y)-(p.Y-a.Y)*(b.X-a.X)) / math.Hypot(b.X-a.X, b.Y-a.Y)
		if off > thinMM+1e-9 {
			t.Fatalf("%v lies %.3f mm off the thinned curve", p, off)
		}
	}
}

// TestWidened: a peak of 0.02 becomes level over 2 times half and keeps its
// height; a broad one stays as it is, but for its top.
func TestWidened(t *testing.T) {
	narrow := widened([]Point{{0, 0}, {5, 1}, {5.01, 9}, {5.02, 1}, {10, 0}}, 0.5)
	reach := 0.0
	for _, p := range narrow {
		if p.Y == 9 {
			reach = math.Max(reach, math.Abs(p.X-5.01))
		}
	}
	if math.Abs(reach-0.5) > 1e-9 {
		t.Errorf("peak reaches %.3f to a side: %v", reach, narrow)
	}
	for i := 1; i < len(narrow); i++ {
		if narrow[i].X < narrow[i-1].X {
			t.Errorf("goes back: %v", narrow)
		}
	}
}

// TestReadingsOutside: a reading beyond the scale is handed back, not drawn.
func TestReadingsOutside(t *testing.T) {
	a := testAxes()
	out := a.Readings([]Point{{1, 3}, {2, 99}, {17, 12}}, 1.15, false)
	if len(out) != 1 || out[0] != (Point{2, 99}) || len(a.Sheet.Boxes) != 2 || a.Sheet.Err() != nil {
		t.Errorf("outside %v, drawn %v, %v", out, a.Sheet.Boxes, a.Sheet.Err())
	}
}

// TestLabelKeepsOffData: a label goes to the nearest free place, and two do
// not cross; with no place within reach there is none.
func TestLabelKeepsOffData(t *testing.T) {
	a := testAxes()
	var line []Point
	for i := 0; i <= 100; i++ {
		line = append(line, Point{18 * float64(i) / 100, 2 + 11*float64(i)/100})
	}
	a.Curve(line, Stroke{Ink: Blue, WidthPt: 1})
	near := a.At(Point{9, 7.5})
	for range 6 {
		if !a.Label(body, "falling arm", near, 60) {
			t.Fatal("no place found")
		}
	}
	for i, p := range a.Sheet.Boxes {
		for _, q := range a.Sheet.Boxes[:i] {
			if p.Box.Crosses(q.Box) {
				t.Errorf("%v crosses %v", p, q)
			}
		}
		for k := 1; k < len(line); k++ {
			if p.Box.Meets(a.At(line[k-1]), a.At(line[k])) {
				t.Errorf("%v lies on the curve", p)
				break
			}
		}
	}
	if a.Label(body, "too far", near, 0.1) {
		t.Error("a label was set out of reach")
	}
}

// TestEveryTickHasANumber: as many numbers as ticks, none across another.
func TestEveryTickHasANumber(t *testing.T) {
	for _, to := range []float64{0.0034, 0.5, 7, 18, 50, 1234, 9e5} {
		s := NewSheet(210, 297)
		a := NewAxes(s, Box{34, 70, 136, 154}, [2]float64{0, to}, [2]float64{-to, to}, plainNumber)
		x, y := NewTicks(0, to, 9), NewTicks(-to, to, 7)
		a.Bottom(160, x)
		a.Left(y)
		if n := len(x.Values) + len(y.Values); len(s.Boxes) != n {
			t.Errorf("to %g: %d numbers for %d ticks", to, len(s.Boxes), n)
		}
		for i, p := range s.Boxes {
			for _, q := range s.Boxes[:i] {
				if p.Box.Crosses(q.Box) {
					t.Errorf("to %g: %q crosses %q", to, p.Name, q.Name)
				}
			}
		}
	}
}

// TestRailLabels: however close two to six endpoints lie, no figure crosses
// another figure or a mark.
func TestRailLabels(t *testing.T) {
	for n := 1; n <= 6; n++ {
		for _, apart := range []float64{0.01, 0.2, 0.6, 1, 2, 3} {
			a := testAxes()
			var r Rail
			for i := range n {
				v := 1 + apart*float64(i)
				r.Upper = append(r.Upper, Place{At: v, Shape: Triangle, Label: "12.401", Bracket: true, From: v - 0.1, To: v + 0.2, Bar: true, Low: v - 0.01, High: v + 0.01})
				r.Lower = append(r.Lower, Place{At: v + 0.05, Shape: Triangle, Label: "12.66"})
			}
			a.Rail(r)
			labels := 0
			for i, p := range a.Sheet.Boxes {
				if p.Kind == AText {
					labels++
				}
				for _, q := range a.Sheet.Boxes[:i] {
					if (p.Kind == AText || q.Kind == AText) && p.Box.Crosses(q.Box) {
						t.Errorf("%d places %.2f mL apart: %q crosses %q", n, apart, p.Name, q.Name)
					}
				}
			}
			if n <= 2 && labels != 2*n {
				t.Errorf("%d places %.2f mL apart: %d figures", n, apart, labels)
			}
		}
	}
}

// TestLaneEdge: a point beyond a shared scale stands at its end, pointing on.
func TestLaneEdge(t *testing.T) {
	s := NewSheet(210, 297)
	l := NewLane(s, 143, 170, -1, 1, plainNumber)
	if l.Point(-4, 20, Disc, 2, Blue, false) || l.Point(7, 25, Disc, 2, Blue, false) || !l.Point(0, 30, Disc, 2, Blue, true) {
		t.Error("inside and outside mistaken")
	}
	for i, want := range []float64{144, 169, 156.5} { // half a mark inside the ends; the middle
		if b := s.Boxes[i].Box; math.Abs((b.Left+b.Right)/2-want) > 1e-9 {
			t.Errorf("mark %d stands at %.2f mm, want %.2f", i, (b.Left+b.Right)/2, want)
		}
	}
}
