package figure

import (
	"fmt"
	"math"
	"strings"
	"testing"
)

// script is a Canvas that writes down what it is told.
type script struct{ lines []string }

func (c *script) say(format string, args ...any) {
	c.lines = append(c.lines, fmt.Sprintf(format, args...))
}
func (c *script) Stroke(pts []Point, closed bool, s Stroke) {
	c.say("stroke %v %v %06X %g %d", pts, closed, uint32(s.Ink), s.WidthPt, s.Dash)
}
func (c *script) Fill(pts []Point, ink Ink) { c.say("fill %v %06X", pts, uint32(ink)) }
func (c *script) Dots(pts []Point, d float64, ink Ink) {
	c.say("dots %v %g %06X", pts, d, uint32(ink))
}
func (c *script) Text(at Point, s Style, text string) { c.say("text %v %g %s", at, s.SizePt, text) }
func (c *script) Link(b Box, page int)                { c.say("link %v %d", b, page) }

func TestSheetPlaysInOrder(t *testing.T) {
	s := NewSheet(100, 50)
	s.Rule(Stroke{Blue, 0.4, Dashed}, 1, 9, 5)
	s.FillBox(Band, Box{1, 2, 3, 4})
	s.Dots(Black, 1.15, Point{7, 8})
	s.Text(10, 20, body, "pH\n7")
	s.Link(Box{1, 1, 2, 2}, 7)
	var c script
	if err := s.Play(&c); err != nil {
		t.Fatal(err)
	}
	want := []string{
		"stroke [{1 5} {9 5}] false 0072B2 0.4 1",
		"fill [{1 2} {3 2} {3 4} {1 4}] EFECE4",
		"dots [{7 8}] 1.15 17191C",
		"text {10 20} 8 pH 7",
		"link {1 1 2 2} 7",
	}
	if got := strings.Join(c.lines, "\n"); got != strings.Join(want, "\n") {
		t.Errorf("got\n%s", got)
	}
}

// TestNothingBadReachesACanvas: every way of drawing refuses what is not
// finite or not on the sheet, and then nothing of the page is played.
func TestNothingBadReachesACanvas(t *testing.T) {
	axes := func(s *Sheet) *Axes {
		return NewAxes(s, Box{20, 10, 90, 40}, [2]float64{0, 10}, [2]float64{0, 14}, plainNumber)
	}
	for _, bad := range []float64{math.NaN(), math.Inf(1), math.Inf(-1), -1e9, 1e300} {
		for name, draw := range map[string]func(*Sheet){
			"stroke":   func(s *Sheet) { s.Stroke(Stroke{Ink: Black, WidthPt: 1}, Point{1, 1}, Point{bad, 2}) },
			"fill":     func(s *Sheet) { s.Fill(Black, Point{1, 1}, Point{2, 2}, Point{1, bad}) },
			"dots":     func(s *Sheet) { s.Dots(Black, 1, Point{bad, bad}) },
			"size":     func(s *Sheet) { s.Dots(Black, bad, Point{1, 1}) },
			"text":     func(s *Sheet) { s.Text(bad, 2, body, "x") },
			"link":     func(s *Sheet) { s.Link(Box{0, 0, bad, 1}, 1) },
			"mark":     func(s *Sheet) { s.Urgent(Settle, bad, 2, 3) },
			"shape":    func(s *Sheet) { s.Open(Triangle, 3, bad, 2, Black) },
			"far text": func(s *Sheet) { s.Text(95, 2, body, "a text that leaves the paper") },
		} {
			s := NewSheet(100, 50)
			draw(s)
			refused(t, fmt.Sprintf("%s of %g", name, bad), s)
		}
		if bad == -1e9 || bad == 1e300 {
			continue // a value may lie outside an area: it is clipped
		}
		for name, draw := range map[string]func(*Axes){
			"curve":   func(a *Axes) { a.Curve([]Point{{1, 1}, {2, bad}, {3, 3}}, Stroke{Ink: Blue, WidthPt: 1}) },
			"reading": func(a *Axes) { a.Readings([]Point{{1, bad}}, 1, false) },
			"volume":  func(a *Axes) { a.Readings([]Point{{bad, 1}}, 1, true) },
			"stem":    func(a *Axes) { a.Stems([]Point{{1, bad}}) },
			"floor":   func(a *Axes) { a.Floor([]Point{{1, 5}, {1.01, bad}, {1.02, 3}, {9, 1}}, 5, 0.3, Tint) },
			"strokes": func(a *Axes) { a.Strokes([]Point{{bad, bad}}, 1, Stroke{Ink: Hair, WidthPt: 1}) },
			"range":   func(a *Axes) { NewAxes(a.Sheet, a.Area, [2]float64{0, bad}, [2]float64{0, 1}, plainNumber) },
		} {
			s := NewSheet(100, 50)
			draw(axes(s))
			refused(t, fmt.Sprintf("%s of %g", name, bad), s)
		}
	}
}

func refused(t *testing.T, what string, s *Sheet) {
	t.Helper()
	s.Rule(Stroke{Ink: Black, WidthPt: 1}, 1, 2, 3)
	var c script
	if err := s.Play(&c); err == nil || len(c.lines) > 0 {
		t.Errorf("%s was drawn: %v, %v", what, err, c.lines)
	}
}

func plainNumber(v float64, decimals int) string { return fmt.Sprintf("%.*f", decimals, v) }

// TestTryRollsBack: what cannot be drawn leaves no trace, what follows is drawn.
func TestTryRollsBack(t *testing.T) {
	s := NewSheet(100, 50)
	s.Text(5, 5, body, "before")
	err := s.Try(func() {
		s.Text(5, 10, body, "half")
		s.Dots(Black, 1, Point{math.NaN(), 1})
	})
	s.Text(5, 15, body, "after")
	var c script
	if err == nil || s.Play(&c) != nil || len(c.lines) != 2 || len(s.Boxes) != 2 {
		t.Errorf("error %v, played %v", err, c.lines)
	}
	if err := s.Try(func() { s.Text(5, 20, body, "fine") }); err != nil || len(s.Boxes) != 3 {
		t.Errorf("a part that can be drawn: %v", err)
	}
}

// TestReplacedIsTold: a text that holds the sign for what fonts lack is listed.
func TestReplacedIsTold(t *testing.T) {
	s := NewSheet(100, 50)
	s.Text(5, 5, body, "salt 🧂")
	s.Text(5, 9, body, "plain")
	if len(s.Replaced) != 1 || s.Replaced[0] != "salt \uFFFD" {
		t.Errorf("replaced: %q", s.Replaced)
	}
}
