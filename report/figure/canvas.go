// Package figure draws: axes, rails, marks, curves and labels, on a sheet
// measured in millimetres with the origin at its top left. It knows neither a
// file format (a Canvas does) nor what is drawn (pages do): it gets numbers,
// inks and finished words.
//
// Everything is drawn on a Sheet, which refuses coordinates that are not
// finite or not on the paper, remembers each text and mark with its box, and
// plays itself to a Canvas once a whole page has come out well. So a broken
// number spoils one page and never a file, and a test can walk the geometry.
//
// Lengths are mm, widths of strokes and sizes of type are pt.
package figure

// Point is a place: mm on a sheet, or data units where a comment says so.
type Point struct{ X, Y float64 }

// Box is an upright rectangle, mm.
type Box struct{ Left, Top, Right, Bottom float64 }

// Width and Height of the box, mm.
func (b Box) Width() float64  { return b.Right - b.Left }
func (b Box) Height() float64 { return b.Bottom - b.Top }

// Crosses tells whether two boxes share more than an edge.
func (b Box) Crosses(o Box) bool {
	return b.Left < o.Right && o.Left < b.Right && b.Top < o.Bottom && o.Top < b.Bottom
}

// Within tells whether b lies inside o, give mm of tolerance.
func (b Box) Within(o Box, give float64) bool {
	return b.Left >= o.Left-give && b.Right <= o.Right+give && b.Top >= o.Top-give && b.Bottom <= o.Bottom+give
}

// corners of the box, clockwise from the top left.
func (b Box) corners() []Point {
	return []Point{{b.Left, b.Top}, {b.Right, b.Top}, {b.Right, b.Bottom}, {b.Left, b.Bottom}}
}

// Ink is a solid colour, 0xRRGGBB.
type Ink uint32

// The inks. Three carry a meaning: Black is what an instrument wrote, Blue
// what was computed, Warm what speaks against. Hues: Okabe and Ito (from
// memory); the pale tones are solid mixtures with white.
const (
	Paper  Ink = 0xFFFFFF
	Black  Ink = 0x17191C
	Second Ink = 0x575A5F // notes, tick numbers, units
	Hair   Ink = 0xA3A5A8 // frame foot, leaders
	Grid   Ink = 0xE4E2DC // grid, row rules
	Band   Ink = 0xEFECE4 // brackets, limits, noise
	Ghost  Ink = 0xD3D0C8 // a typical curve behind a small picture
	Blue   Ink = 0x0072B2
	Tint   Ink = 0xCCE1EF // confidence bands, derivative
	Warm   Ink = 0xD55E00 // marks and limit lines, never text
	Amber  Ink = 0xE69F00 // fill of the lighter mark only
)

// Dash is the pattern of a line.
type Dash uint8

// The patterns, lengths in pt on/off.
const (
	Solid   Dash = iota
	Dashed       // 1.6/1.2
	Dotted       // 0/1.5 with round ends
	DashDot      // 5/1.6/1/1.6
	Broken       // 1.2/0.9, of the mark for what is missing
)

// Stroke is how a line is drawn.
type Stroke struct {
	Ink     Ink
	WidthPt float64
	Dash    Dash
}

// Style is how a text is set.
type Style struct {
	Face   Face
	SizePt float64
	Ink    Ink
}

// In is the style in another ink, As in another face.
func (s Style) In(i Ink) Style  { s.Ink = i; return s }
func (s Style) As(f Face) Style { s.Face = f; return s }

// MM converts a size in pt to mm.
func MM(pt float64) float64 { return pt * 25.4 / 72 }

// Canvas is what a Sheet can play itself to: a page of some file format.
// Coordinates are mm from the top left, finite and on the sheet.
type Canvas interface {
	// Stroke draws a line through the points, back to the first if closed.
	Stroke(pts []Point, closed bool, s Stroke)
	// Fill fills the polygon.
	Fill(pts []Point, ink Ink)
	// Dots draws a disc at each point.
	Dots(pts []Point, diameterMM float64, ink Ink)
	// Text sets one line, its baseline starting at the point.
	Text(at Point, s Style, text string)
	// Link makes the box lead to a page of the same document, from 1.
	Link(b Box, page int)
}
