package terminal

import (
	"math"

	"lastdrop/report"
)

// lane is one line of the rail. Signs are set first, figures where they find
// room beside them.
type lane struct {
	signs []rune
	inks  []ink
}

func newLane(width int) *lane {
	l := &lane{signs: make([]rune, width), inks: make([]ink, width)}
	for i := range l.signs {
		l.signs[i] = ' '
	}
	return l
}

func (l *lane) put(column int, sign rune, i ink) {
	if column >= 0 && column < len(l.signs) {
		l.signs[column], l.inks[column] = sign, i
	}
}

// write sets a text where its columns and one on either side are free.
func (l *lane) write(column int, s string, i ink) bool {
	text := []rune(s)
	if column < 0 || column+len(text) > len(l.signs) {
		return false
	}
	for at := max(column-1, 0); at < min(column+len(text)+1, len(l.signs)); at++ {
		beside := at == column-1 || at == column+len(text)
		if l.signs[at] != ' ' && !(beside && isRailSign(l.signs[at])) {
			return false
		}
	}
	for k, r := range text {
		l.put(column+k, r, i)
	}
	return true
}

// isRailSign tells signs from figures: a figure may touch a sign, but not
// another figure.
func isRailSign(r rune) bool { return r != '.' && r != ',' && (r < '0' || r > '9') }

func (l *lane) pieces() []piece {
	out := make([]piece, len(l.signs))
	for i, r := range l.signs {
		out[i] = piece{l.inks[i], string(r)}
	}
	return joinInks(out)
}

// joinInks makes one piece of neighbours in one ink; spaces take any.
func joinInks(all []piece) (joined []piece) {
	for _, one := range all {
		last := len(joined) - 1
		if last >= 0 && (joined[last].ink == one.ink || one.text == " ") {
			joined[last].text += one.text
			continue
		}
		joined = append(joined, one)
	}
	return joined
}

// label is a figure that wants to stand beside columns from to to.
type label struct {
	from, to int
	text     string
	ink      ink
}

// writeRail writes the two lanes under the curve: refit with bracket, 95 %
// interval and the mark of its kind; indicated with its open mark. Figures
// that find no room stand in the lines above the curve only.
func (c *plot) writeRail() {
	refit, refitLabels := c.refitLane()
	for i := range refitLabels {
		placeLabel(refit, refitLabels[i], i == 0)
	}
	c.p.line(append([]piece{{blue, padLeft("refit ", laneLabel)}}, refit.pieces()...)...)
	indicated, labels := c.indicatedLane()
	for i := len(labels) - 1; i >= 0; i-- {
		placeLabel(indicated, labels[i], false)
	}
	c.p.line(append([]piece{{plain, padLeft("indicated ", laneLabel)}}, indicated.pieces()...)...)
}

// placeLabel tries the preferred side, then the other.
func placeLabel(l *lane, want label, leftFirst bool) {
	left, right := want.from-len([]rune(want.text))-1, want.to+2
	sides := [2]int{right, left}
	if leftFirst {
		sides = [2]int{left, right}
	}
	if !l.write(sides[0], want.text, want.ink) {
		l.write(sides[1], want.text, want.ink)
	}
}

func (c *plot) refitLane() (*lane, []label) {
	l := newLane(c.grid.width)
	if len(c.e.Endpoints) == 0 {
		l.write(1, "none", blue)
		return l, nil
	}
	var labels []label
	for i := range c.e.Endpoints {
		r := &c.e.Endpoints[i]
		if !isNumber(r.VolumeML) || !isNumber(r.Low95ML) || !isNumber(r.High95ML) {
			continue
		}
		from, to := c.bracketColumns(r)
		for k := c.column(r.Low95ML); k <= c.column(r.High95ML); k++ {
			l.put(k, '━', blue)
		}
		l.put(from, '[', plain)
		l.put(to, ']', plain)
		labels = append(labels, label{min(from, c.column(r.Low95ML)), max(to, c.column(r.High95ML)), c.p.mark.Of(r.Volume()), blue})
	}
	c.putMarks(l)
	return l, labels
}

// bracketColumns are those of the brackets of an endpoint, on either side of
// its mark.
func (c *plot) bracketColumns(r *report.Endpoint) (from, to int) {
	at := c.column(r.VolumeML)
	return min(c.column(r.BracketML[0]), at-1), max(c.column(r.BracketML[1]), at+1)
}

// putMarks sets the marks last, over the brackets of a near neighbour. Of two
// at one place the notes tell.
func (c *plot) putMarks(l *lane) {
	taken := map[int]bool{}
	for i := range c.e.Endpoints {
		r := &c.e.Endpoints[i]
		if !isNumber(r.VolumeML) || !isNumber(r.Low95ML) || !isNumber(r.High95ML) {
			continue
		}
		at := c.column(r.VolumeML)
		c.crowded = c.crowded || taken[at]
		taken[at] = true
		l.put(at, markOf(r.Kind, true), blue)
	}
}

func (c *plot) indicatedLane() (*lane, []label) {
	l := newLane(c.grid.width)
	if len(c.e.Indicated) == 0 {
		l.write(1, "none", plain)
		return l, nil
	}
	var labels []label
	for i := range c.e.Indicated {
		in := &c.e.Indicated[i]
		if math.IsNaN(in.VolumeML) {
			continue
		}
		at := c.column(in.VolumeML)
		l.put(at, markOf(in.Kind, false), plain)
		text := c.p.mark.Of(in.Volume())
		if in.VolumeML < c.left || in.VolumeML > c.right {
			text += " (beyond)"
		}
		labels = append(labels, label{at, at, text, plain})
	}
	return l, labels
}

func markOf(kind string, filled bool) rune {
	return []rune(report.KindMark(kind, filled))[0]
}
