package xlsx

import (
	"math"
	"strconv"

	"lastdrop/report"
)

var curveColumns = []column{
	{"verdict", 13.5, ink, false}, {"sample", 21, ink, false}, {"id", 14.5, ink, false}, {"what", 20, ink, false},
	{"volume (mL)", 10, ink, true}, {"as the instrument wrote it", 12, ink, true}, {"reading", 10, ink, true}, {"computed curve", 11, blue, true},
	{"unit", 28, ink, false}, {"line of the dump", 9, ink, true}, {"more in Endpoints", 11, ink, false},
}

// Columns of the sheet of curves that charts refer to.
const (
	curveX       = "E"
	curveReading = "G"
	curveFitted  = "H"
	curveLink    = 11
)

// layCurves writes readings and computed curve of each of the runs, and a
// chart beside each of the first chartsMost.
func layCurves(b *book, p *places, runs []int) error {
	rows := 0
	for _, i := range runs {
		rows += newBlock(&p.night.Evaluations[i], 0).rows()
	}
	s := b.open(layout{name: curvesSheet, columns: curveColumns, table: true, frozen: 3, rows: rows, tab: blue}, p.footer)
	for k, i := range runs {
		e := &p.night.Evaluations[i]
		blk := newBlock(e, s.row+1)
		if s.row < linksMost {
			s.linkTo(curveLink, place(endpointsSheet, p.endpoint[i]), "to the endpoints of this run")
		}
		blk.lay(s, "row "+strconv.Itoa(p.endpoint[i]))
		if k < chartsMost {
			s.chart(blk)
		}
	}
	if rows == 0 {
		s.put(0, text("No run has a page of its own, so that no curve stands here."))
	}
	return s.finish()
}

// block is one run in the sheet of curves: readings used, readings left out,
// the computed curve or the arms, and empty rows until a chart fits beside.
type block struct {
	e         *report.Evaluation
	first     int // its first row
	used, out []report.Dot
	lines     []fitted
}

// fitted is a computed line.
type fitted struct {
	what string
	pts  []report.XY
}

func newBlock(e *report.Evaluation, first int) *block {
	blk := &block{e: e, first: first}
	if e.Picture == nil || !drawable(e.Picture) {
		return blk
	}
	for _, d := range e.Picture.Dots {
		if d.LeftOut {
			blk.out = append(blk.out, d)
		} else {
			blk.used = append(blk.used, d)
		}
	}
	if len(e.Picture.Curve) > 0 {
		blk.lines = append(blk.lines, fitted{"computed curve", e.Picture.Curve})
	}
	for i := range e.Picture.Arms {
		blk.lines = append(blk.lines, armLine(&e.Picture.Arms[i]))
	}
	return blk
}

// armLine is an arm over the readings that it uses, to where it is prolonged.
func armLine(a *report.Arm) fitted {
	line := fitted{what: a.Name}
	for _, v := range [...]float64{min(a.FromML, a.ExtendFromML), a.FromML, a.ToML, max(a.ToML, a.ExtendToML)} {
		if n := len(line.pts); n == 0 || v > line.pts[n-1].X {
			line.pts = append(line.pts, report.XY{X: v, Y: a.Intercept + a.Slope*v})
		}
	}
	return line
}

// drawable is false for a picture that holds something that is no number; the
// pages say so of it, and no cell could hold it.
func drawable(p *report.Picture) bool {
	sum := 0.0
	for _, d := range p.Dots {
		sum += 0 * (d.VolumeML + d.Value + d.AsRead)
	}
	for _, q := range p.Curve {
		sum += 0 * (q.X + q.Y)
	}
	for i := range p.Arms {
		a := &p.Arms[i]
		sum += 0 * (a.Intercept + a.Slope + a.FromML + a.ToML + a.ExtendFromML + a.ExtendToML)
	}
	return !math.IsNaN(sum) // 0 times infinity is none either
}

// filled is how many rows hold something.
func (b *block) filled() int {
	n := len(b.used) + len(b.out)
	for _, l := range b.lines {
		n += len(l.pts)
	}
	return max(n, 1)
}

func (b *block) rows() int { return max(b.filled(), chartRows+1) }

// lay writes the rows; the first leads to the endpoints.
func (b *block) lay(s *sheet, more string) {
	head := link(more)
	row := func(cells ...cell) {
		lead := []cell{verdictCell(b.e.Verdict), text(b.e.Facts.Sample), text(b.e.ID)}
		s.put(0, append(append(lead, cells...), head)...)
		head = cell{}
	}
	if len(b.used)+len(b.out) == 0 {
		row(text("no curve was kept, or it holds what is no number"), cell{}, cell{}, cell{}, cell{}, cell{}, cell{})
	}
	for _, d := range b.used {
		row(b.reading("reading", d)...)
	}
	for _, d := range b.out {
		row(b.reading("reading left out", d)...)
	}
	for _, l := range b.lines {
		for _, q := range l.pts {
			row(cell{l.what, plain().in(blue)}, number(q.X, 3, blue), cell{}, cell{}, number(q.Y, readingDecimals(b.e.Signal)+1, blue), text(b.e.Picture.YName), cell{})
		}
	}
	s.skip(b.rows() - b.filled())
}

func (b *block) reading(what string, d report.Dot) []cell {
	decimals := readingDecimals(b.e.Signal)
	return []cell{text(what), number(d.VolumeML, 3, ink), number(d.AsRead, decimals, ink), number(d.Value, decimals, ink), {}, text(b.e.Picture.YName), countIf(d.Line)}
}
