package terminal

import (
	"math"
	"strconv"
	"strings"

	"lastdrop/report"
	"lastdrop/report/figure"
)

const (
	laneLabel = 11 // columns before the plot: room for "indicated"
	plotRows  = 17
	ticksAcross,
	ticksUp = 8, 6
)

// plot maps the values of a picture to the characters of a grid.
type plot struct {
	p                *page
	e                *report.Evaluation
	grid             *grid
	left, right      float64 // mL
	bottom, top      float64 // in the unit of the curve
	across, up       figure.Ticks
	beyond           []report.Dot // readings that the scale leaves out
	openDot, guessed bool         // what the notes must explain
	crowded          bool         // endpoints share one place of the rail
}

// curve draws the run: curve and readings, the rail below, the volume axis.
// A run without a picture, or whose figures make no scale, says so instead.
func (p *page) curve(e *report.Evaluation) {
	c := &plot{p: p, e: e}
	if e.Picture == nil || !c.scale() {
		p.line(piece{faint, "  There is no curve to draw."})
		return
	}
	c.grid = newGrid(p.width-laneLabel-1, plotRows)
	c.drawBrackets()
	c.drawCurve()
	c.drawArms()
	c.drawReadings()
	c.writeRows()
	c.writeSlope()
	c.writeRail()
	c.writeAxis()
	c.writeNotes()
}

// scale takes in the readings that the fit used and the curve. A reading that
// was left out may widen it by a sixth; one farther off stands at the edge.
func (c *plot) scale() bool {
	c.left, c.right = math.Inf(1), math.Inf(-1)
	c.bottom, c.top = math.Inf(1), math.Inf(-1)
	used := 0
	for _, d := range c.e.Picture.Dots {
		if !isNumber(d.VolumeML) || !isNumber(d.Value) {
			return false
		}
		c.left, c.right = min(c.left, d.VolumeML), max(c.right, d.VolumeML)
		if !d.LeftOut {
			used++
			c.takeIn(d.Value)
		}
	}
	if used == 0 {
		for _, d := range c.e.Picture.Dots {
			c.takeIn(d.Value)
		}
	}
	for _, xy := range c.e.Picture.Curve {
		if isNumber(xy.X) && isNumber(xy.Y) {
			c.takeIn(xy.Y)
		}
	}
	c.widen()
	c.left = min(c.left, 0) // a run begins with an empty beaker
	c.across = figure.NewTicks(c.left, c.right, ticksAcross)
	c.up = figure.NewTicks(c.bottom, c.top, ticksUp)
	return len(c.across.Values) > 1 && len(c.up.Values) > 0
}

func isNumber(v float64) bool { return !math.IsNaN(v) && !math.IsInf(v, 0) }

func (c *plot) takeIn(v float64) { c.bottom, c.top = min(c.bottom, v), max(c.top, v) }

func (c *plot) widen() {
	if !(c.top > c.bottom) { // a flat run is drawn in the middle
		c.bottom, c.top = c.bottom-1, c.top+1
	}
	reach := (c.top - c.bottom) / 6
	low, high := c.bottom-reach, c.top+reach
	for _, d := range c.e.Picture.Dots {
		if d.Value < low || d.Value > high {
			c.beyond = append(c.beyond, d)
		} else {
			c.takeIn(d.Value)
		}
	}
	c.bottom, c.top = figure.Rounded(c.bottom, c.top, ticksUp*2)
}

// dotX and dotY are places in the raster of dots.
func (c *plot) dotX(ml float64) float64 {
	return (ml - c.left) / (c.right - c.left) * float64(c.grid.width*2-1)
}
func (c *plot) dotY(v float64) float64 {
	return (c.top - v) / (c.top - c.bottom) * float64(c.grid.height*4-1)
}

// column and row are places in characters; a volume beyond the ends of the
// axis stands at its end.
func (c *plot) column(ml float64) int {
	return min(max(int(c.dotX(ml)/2), 0), c.grid.width-1)
}
func (c *plot) row(v float64) int { return min(max(int(c.dotY(v)/4), 0), c.grid.height-1) }

func (c *plot) drawBrackets() {
	for i := range c.e.Endpoints {
		for _, ml := range c.e.Endpoints[i].BracketML {
			for row := 0; row < c.grid.height; row++ {
				c.grid.put(c.column(ml), row, glyph{'┊', faint, true})
			}
		}
	}
}

// drawCurve draws the curve that runs through the readings; inside a bracket
// it is a guess and dotted.
func (c *plot) drawCurve() {
	curve, phase := c.e.Picture.Curve, 0
	for i := 1; i < len(curve); i++ {
		dash := 0
		if c.inBracket(curve[i-1].X, curve[i].X) {
			dash, c.guessed = 1, true
		}
		phase = c.stroke(curve[i-1], curve[i], dash, phase)
	}
}

func (c *plot) inBracket(from, to float64) bool {
	for i := range c.e.Endpoints {
		if b := c.e.Endpoints[i].BracketML; from >= b[0] && to <= b[1] {
			return true
		}
	}
	return false
}

// stroke draws between two points; the dots passed before and after are those
// of grid.stroke.
func (c *plot) stroke(from, to report.XY, dash, phase int) int {
	if !isNumber(from.X) || !isNumber(from.Y) || !isNumber(to.X) || !isNumber(to.Y) {
		return phase
	}
	return c.grid.stroke(c.dotX(from.X), c.dotY(from.Y), c.dotX(to.X), c.dotY(to.Y), dash, phase)
}

// drawArms draws each arm over the readings it uses and dashes it to and past
// the crossing.
func (c *plot) drawArms() {
	const dash = 3
	for _, a := range c.e.Picture.Arms {
		at := func(ml float64) report.XY { return report.XY{X: ml, Y: a.Intercept + a.Slope*ml} }
		c.stroke(at(a.FromML), at(a.ToML), 0, 0)
		if a.ExtendToML > a.ToML {
			c.stroke(at(a.ToML), at(a.ExtendToML), dash, 0)
		}
		if a.ExtendFromML < a.FromML {
			c.stroke(at(a.FromML), at(a.ExtendFromML), dash, 0)
		}
	}
}

const (
	readingSign = '•'
	leftOutSign = '◦'
)

func (c *plot) drawReadings() {
	for _, d := range c.e.Picture.Dots {
		if d.LeftOut && d.Value >= c.bottom && d.Value <= c.top {
			c.openDot = true
			c.grid.put(c.column(d.VolumeML), c.row(d.Value), glyph{sign: leftOutSign})
		}
	}
	for _, d := range c.e.Picture.Dots {
		if !d.LeftOut {
			c.grid.put(c.column(d.VolumeML), c.row(d.Value), glyph{sign: readingSign})
		}
	}
	for _, d := range c.beyond {
		sign := '▲'
		if d.Value < c.bottom {
			sign = '▼'
		}
		c.grid.put(c.column(d.VolumeML), c.row(d.Value), glyph{sign: sign, ink: warm})
	}
}

func (c *plot) writeRows() {
	c.p.line(piece{strong, strings.Repeat(" ", laneLabel-1) + Shorten(c.e.Picture.YName, c.grid.width)})
	labels := map[int]string{}
	first, last := c.grid.height, -1
	for _, v := range c.up.Values {
		row := c.row(v)
		labels[row] = c.p.mark.Fixed(v, c.up.Decimals)
		first, last = min(first, row), max(last, row)
	}
	for row := 0; row < c.grid.height; row++ {
		axis := " "
		label, numbered := labels[row]
		switch {
		case numbered:
			axis = "┤"
		case row > first && row < last:
			axis = "│"
		}
		c.p.line(append([]piece{{faint, padLeft(label, laneLabel-2) + " " + axis}}, c.grid.row(row)...)...)
	}
}

// writeSlope is one line of bars: where the curve is steep.
func (c *plot) writeSlope() {
	const bars = "▁▂▃▄▅▆▇█"
	highest := 0.0
	columns := make([]float64, c.grid.width)
	for _, s := range c.e.Picture.Slope {
		if isNumber(s.X) && isNumber(s.Y) {
			at := c.column(s.X)
			columns[at] = max(columns[at], s.Y)
			highest = max(highest, s.Y)
		}
	}
	if highest == 0 {
		return
	}
	levels := []rune(bars)
	line := make([]rune, len(columns))
	for i, v := range columns {
		line[i] = ' '
		if level := int(math.Round(v / highest * float64(len(levels)))); level > 0 {
			line[i] = levels[level-1]
		}
	}
	c.p.line(piece{faint, padLeft("slope ", laneLabel)}, piece{blue, string(line)})
}

// writeAxis has the ticks of the volume axis, their numbers and its name.
func (c *plot) writeAxis() {
	width := c.grid.width + laneLabel
	axis, numbers := []rune(strings.Repeat(" ", width)), []rune(strings.Repeat(" ", width+1))
	first, last := c.column(c.across.Values[0]), c.column(c.across.Values[len(c.across.Values)-1])
	for i := first; i <= last; i++ {
		axis[laneLabel+i] = '─'
	}
	free := 0
	for _, v := range c.across.Values {
		at := laneLabel + c.column(v)
		axis[at] = '┬'
		label := []rune(c.p.mark.Fixed(v, c.across.Decimals))
		from := min(at-(len(label)-1)/2, len(numbers)-len(label))
		if from >= free {
			copy(numbers[from:], label)
			free = from + len(label) + 1
		}
	}
	c.p.line(piece{faint, string(axis)})
	c.p.line(piece{faint, string(numbers)})
	c.p.line(piece{strong, padLeft(Shorten(c.p.mark.Axis(c.e), width), width)})
}

// writeNotes explains the signs that are not common.
func (c *plot) writeNotes() {
	var notes []string
	if c.e.Picture.SlopeName != "" && len(c.e.Picture.Slope) > 0 {
		notes = append(notes, "slope: "+Clean(c.p.mark.Says(c.e.Picture.SlopeName)))
	}
	if c.guessed {
		notes = append(notes, "dotted: a guess, no readings there")
	}
	if c.openDot {
		notes = append(notes, string(leftOutSign)+" left out of the fit")
	}
	if c.crowded {
		notes = append(notes, "endpoints too near to each other for this scale share one mark")
	}
	for _, d := range c.beyond[:min(len(c.beyond), 3)] {
		notes = append(notes, "line "+strconv.Itoa(d.Line)+" stands beyond the scale: "+c.p.readingSays(c.e.Signal, d.AsRead))
	}
	if more := len(c.beyond) - 3; more > 0 {
		notes = append(notes, "and "+strconv.Itoa(more)+" more")
	}
	if len(notes) > 0 {
		c.p.sentence(faint, strings.Repeat(" ", laneLabel), strings.Join(notes, "; "))
	}
}
