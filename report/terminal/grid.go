package terminal

import "math"

// grid is a rectangle of characters with a raster of dots below it: each
// character holds 2 x 4 dots of the braille patterns.
type grid struct {
	width, height int // in characters
	dots          []byte
	cells         []glyph // sign 0 where there is none
	dotInk        ink
}

type glyph struct {
	sign   rune
	ink    ink
	behind bool // dots stand before it
}

func newGrid(width, height int) *grid {
	return &grid{width: width, height: height, dots: make([]byte, width*height), cells: make([]glyph, width*height), dotInk: blue}
}

// brailleBits are the dots of a braille pattern by column and row.
//
// Source: Unicode block U+2800, dots 1 to 8 (from memory).
var brailleBits = [2][4]byte{{0x01, 0x02, 0x04, 0x40}, {0x08, 0x10, 0x20, 0x80}}

// dot sets one dot; x and y count dots from the top left. Dots outside are
// left out.
func (g *grid) dot(x, y int) {
	if x < 0 || y < 0 || x >= g.width*2 || y >= g.height*4 {
		return
	}
	g.dots[y/4*g.width+x/2] |= brailleBits[x%2][y%4]
}

// stroke draws a straight line of dots. With dash > 0 every second stretch of
// so many dots is left out; phase is how many dots were passed before, and
// the number after the stroke is returned.
func (g *grid) stroke(x0, y0, x1, y1 float64, dash, phase int) int {
	steps := int(math.Ceil(max(math.Abs(x1-x0), math.Abs(y1-y0), 1)))
	steps = min(steps, 4*(g.width*2+g.height*4)) // beyond the grid nothing is seen
	for i := 0; i <= steps; i++ {
		if dash > 0 && (phase+i)/dash%2 == 1 {
			continue
		}
		part := float64(i) / float64(steps)
		g.dot(int(math.Floor(x0+part*(x1-x0))), int(math.Floor(y0+part*(y1-y0))))
	}
	return phase + steps
}

// put sets a character in place of what stood there; one outside is left out.
func (g *grid) put(column, row int, one glyph) {
	if column < 0 || row < 0 || column >= g.width || row >= g.height {
		return
	}
	g.cells[row*g.width+column] = one
}

// row returns a line of the grid; stretches of one ink are one piece.
func (g *grid) row(row int) (pieces []piece) {
	var run []rune
	now := plain
	for c := 0; c < g.width; c++ {
		one := g.cells[row*g.width+c]
		if bits := g.dots[row*g.width+c]; bits != 0 && (one.sign == 0 || one.behind) {
			one = glyph{sign: 0x2800 + rune(bits), ink: g.dotInk}
		}
		if one.sign == 0 {
			one = glyph{sign: ' ', ink: now}
		}
		if one.ink != now && len(run) > 0 {
			pieces, run = append(pieces, piece{now, string(run)}), nil
		}
		now = one.ink
		run = append(run, one.sign)
	}
	return append(pieces, piece{now, string(run)})
}
