package figure

import (
	"fmt"
	"math"
	"strings"
)

// Sheet is one page being drawn. The first coordinate that is not finite or
// not on the paper stops the drawing; Err tells which.
type Sheet struct {
	WidthMM, HeightMM float64
	Boxes             []Recorded // every text, mark and block, in the order of drawing
	Replaced          []string   // texts that hold the Replacement sign

	ops   []op
	pts   []Point
	block int
	err   error
}

// Recorded is the box of something on a sheet.
type Recorded struct {
	Kind  Recording
	Name  string // the text itself; the name of a mark or block
	Box   Box
	Block int // index in Sheet.Boxes of the block it stands in; -1 for none
	Style Style
}

// Recording is a sort of recorded box.
type Recording uint8

// The sorts.
const (
	AText  Recording = iota + 1
	AMark            // a verdict, an endpoint or the like: no text may cross it
	ABlock           // an area that the texts drawn in it may not leave
	AData            // a reading: labels keep off it
)

type opKind uint8

const (
	opStroke opKind = iota + 1
	opClosed
	opFill
	opDots
	opText
	opLink
)

type op struct {
	kind     opKind
	from, to int // of Sheet.pts
	stroke   Stroke
	style    Style
	text     string
	number   int     // page of a link
	diameter float64 // of dots, mm
}

// NewSheet returns an empty sheet.
func NewSheet(widthMM, heightMM float64) *Sheet {
	return &Sheet{WidthMM: widthMM, HeightMM: heightMM, block: -1}
}

// Reset empties the sheet and keeps its memory.
func (s *Sheet) Reset() {
	s.Boxes, s.ops, s.pts, s.block, s.err = s.Boxes[:0], s.ops[:0], s.pts[:0], -1, nil
	s.Replaced = nil
}

// Err returns why drawing stopped, nil if it did not.
func (s *Sheet) Err() error { return s.err }

// Try draws a part that the rest of the sheet can do without: if it cannot be
// drawn, the sheet is as before and Try returns why.
func (s *Sheet) Try(draw func()) error {
	if s.err != nil {
		return nil
	}
	boxes, ops, pts, replaced, block := len(s.Boxes), len(s.ops), len(s.pts), len(s.Replaced), s.block
	draw()
	err := s.err
	if err != nil {
		s.Boxes, s.ops, s.pts, s.Replaced = s.Boxes[:boxes], s.ops[:ops], s.pts[:pts], s.Replaced[:replaced]
		s.block, s.err = block, nil
	}
	return err
}

// add keeps the points and tells whether they may be drawn.
func (s *Sheet) add(what string, pts ...Point) (from, to int, ok bool) {
	if s.err != nil {
		return 0, 0, false
	}
	for _, p := range pts {
		if !(p.X >= 0 && p.X <= s.WidthMM && p.Y >= 0 && p.Y <= s.HeightMM) { // also NaN
			s.err = fmt.Errorf("%s: a point at %.4g, %.4g mm is not on the sheet of %g by %g mm", what, p.X, p.Y, s.WidthMM, s.HeightMM)
			return 0, 0, false
		}
	}
	from = len(s.pts)
	s.pts = append(s.pts, pts...)
	return from, len(s.pts), true
}

// Stroke draws a line through the points.
func (s *Sheet) Stroke(st Stroke, pts ...Point) { s.stroke(opStroke, st, pts) }

// Outline draws a closed line through the points.
func (s *Sheet) Outline(st Stroke, pts ...Point) { s.stroke(opClosed, st, pts) }

func (s *Sheet) stroke(kind opKind, st Stroke, pts []Point) {
	if len(pts) < 2 {
		return
	}
	if from, to, ok := s.add("line", pts...); ok {
		s.ops = append(s.ops, op{kind: kind, from: from, to: to, stroke: st})
	}
}

// Rule draws a level line.
func (s *Sheet) Rule(st Stroke, left, right, y float64) {
	s.Stroke(st, Point{left, y}, Point{right, y})
}

// Fill fills a polygon.
func (s *Sheet) Fill(ink Ink, pts ...Point) {
	if len(pts) < 3 {
		return
	}
	if from, to, ok := s.add("area", pts...); ok {
		s.ops = append(s.ops, op{kind: opFill, from: from, to: to, stroke: Stroke{Ink: ink}})
	}
}

// FillBox fills a rectangle.
func (s *Sheet) FillBox(ink Ink, b Box) { s.Fill(ink, b.corners()...) }

// Dots draws discs.
func (s *Sheet) Dots(ink Ink, diameterMM float64, pts ...Point) {
	if len(pts) == 0 {
		return
	}
	if math.IsNaN(diameterMM) || diameterMM <= 0 || diameterMM > 50 {
		s.Fail(fmt.Errorf("a disc of %g mm", diameterMM))
	}
	if from, to, ok := s.add("disc", pts...); ok {
		s.ops = append(s.ops, op{kind: opDots, from: from, to: to, stroke: Stroke{Ink: ink}, diameter: diameterMM})
	}
}

// Ring draws open discs: an edge of ink, paper inside.
func (s *Sheet) Ring(ink Ink, diameterMM, edgePt float64, pts ...Point) {
	s.Dots(ink, diameterMM, pts...)
	s.Dots(Paper, diameterMM-2*MM(edgePt), pts...)
}

// Text sets one line, left at x with its baseline at y, and returns its right
// end. Text that is not clean is cleaned.
func (s *Sheet) Text(x, y float64, st Style, text string) (right float64) {
	if text, _ = Clean(text); text == "" {
		return x
	}
	b := TextBox(x, y, st, text)
	from, to, ok := s.add("text", Point{x, y}, Point{b.Right, y})
	if !ok {
		return x
	}
	s.ops = append(s.ops, op{kind: opText, from: from, to: to, style: st, text: text})
	if strings.ContainsRune(text, Replacement) {
		s.Replaced = append(s.Replaced, text)
	}
	s.Boxes = append(s.Boxes, Recorded{Kind: AText, Name: text, Box: b, Block: s.block, Style: st})
	return b.Right
}

// TextRight sets one line that ends at x and returns its left end.
func (s *Sheet) TextRight(x, y float64, st Style, text string) (left float64) {
	left = x - TextWidth(st, text)
	s.Text(left, y, st, text)
	return left
}

// TextMid sets one line with its middle at x.
func (s *Sheet) TextMid(x, y float64, st Style, text string) {
	s.Text(x-TextWidth(st, text)/2, y, st, text)
}

// TextBox returns the box that a text fills: from the top of a capital to the
// foot of a descender (0.74 and 0.21 of the size, measured on the Go fonts).
func TextBox(x, y float64, st Style, text string) Box {
	h := MM(st.SizePt)
	return Box{x, y - 0.74*h, x + TextWidth(st, text), y + 0.21*h}
}

// Link makes a box lead to a page.
func (s *Sheet) Link(b Box, page int) {
	if from, to, ok := s.add("link", Point{b.Left, b.Top}, Point{b.Right, b.Bottom}); ok {
		s.ops = append(s.ops, op{kind: opLink, from: from, to: to, number: page})
	}
}

// Block names an area; texts drawn until the returned function is called
// belong to it.
func (s *Sheet) Block(name string, b Box) (end func()) {
	outer := s.block
	s.Boxes = append(s.Boxes, Recorded{Kind: ABlock, Name: name, Box: b, Block: outer})
	s.block = len(s.Boxes) - 1
	return func() { s.block = outer }
}

// record keeps the box of a mark or a reading.
func (s *Sheet) record(kind Recording, name string, x, y, size float64) {
	if s.err == nil {
		h := size / 2
		s.Boxes = append(s.Boxes, Recorded{Kind: kind, Name: name, Box: Box{x - h, y - h, x + h, y + h}, Block: s.block})
	}
}

// Fail stops the drawing of a sheet on which something cannot be told.
func (s *Sheet) Fail(err error) {
	if s.err == nil {
		s.err = err
	}
}

// Play draws the sheet on a canvas, or returns why it cannot be drawn and
// leaves the canvas untouched.
func (s *Sheet) Play(c Canvas) error {
	if s.err != nil {
		return s.err
	}
	for i := range s.ops {
		o := &s.ops[i]
		pts := s.pts[o.from:o.to]
		switch o.kind {
		case opStroke, opClosed:
			c.Stroke(pts, o.kind == opClosed, o.stroke)
		case opFill:
			c.Fill(pts, o.stroke.Ink)
		case opDots:
			c.Dots(pts, o.diameter, o.stroke.Ink)
		case opText:
			c.Text(pts[0], o.style, o.text)
		case opLink:
			c.Link(Box{pts[0].X, pts[0].Y, pts[1].X, pts[1].Y}, o.number)
		}
	}
	return nil
}
