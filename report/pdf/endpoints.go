package pdf

import (
	"strings"

	"lastdrop/report"
	"lastdrop/report/figure"
)

// Edges of the columns of a list of endpoints, mm: refit, indicated,
// difference, and what stands beside.
var (
	endpointX   = [...]float64{left, 72, 113, 155}
	endpointEnd = [...]float64{68, 109, 151, right}
)

// endpointRows is a list of several endpoints in place of the four figures.
func endpointRows(e *report.Evaluation, m report.Decimal) item {
	n := min(len(e.Endpoints), 6)
	row := endpointRow{number: headStyle.As(figure.Medium), pitch: 6.8, stacked: true, mark: m}
	if n > 2 {
		row = endpointRow{number: leadStyle.As(figure.Medium), pitch: 4.8, mark: m}
	}
	h := 4.9 + row.pitch*float64(n) + 1
	return item{height: h, draw: func(s *figure.Sheet, y float64) {
		defer s.Block("endpoints", figure.Box{Left: left, Top: y, Right: right, Bottom: y + h})()
		doubt := doubtFigure(e, m)
		for i, t := range [...]struct {
			text string
			ink  figure.Ink
		}{{"refit, mL; 95 % from readings", figure.Blue}, {"indicated, mL", figure.Black}, {"refit − indicated, mL; % of refit", figure.Black}, {"", doubt.owner}} {
			s.Rule(rule(t.ink, 1), endpointX[i], endpointEnd[i], y)
			s.Text(endpointX[i], y+3.4, scaleStyle.In(t.ink), t.text)
		}
		for k := range n {
			row.draw(s, e, k, y+4.1+row.pitch*(float64(k)+0.85))
		}
		doubt.beside(s, endpointX[3], y)
		if more := len(e.Endpoints) - n; more > 0 {
			s.TextRight(right, y+h-0.5, noteStyle, "and "+whole(more)+" more in summary.xlsx")
		}
	}}
}

// beside sets label, figure and limit in one column of a list.
func (b bigFigure) beside(s *figure.Sheet, x, y float64) {
	label := scaleStyle
	if b.mono {
		label = monoNote.In(figure.Black)
	}
	s.Text(x, y+3.4, label, figure.Shorten(label, b.label, 41))
	number := headStyle.As(figure.Medium)
	end := s.Text(x, y+9.7, number, b.value)
	s.Text(end+1.4, y+9.7, bodyStyle, figure.Shorten(bodyStyle, b.unit, max(x+41-end-1.4, 3)))
	s.Text(x, y+13.2, noteStyle, figure.Shorten(noteStyle, b.note, 41))
}

// endpointRow sets one endpoint of a list; stacked notes stand on two lines
// behind the figure.
type endpointRow struct {
	number  figure.Style
	pitch   float64
	stacked bool
	mark    report.Decimal
}

func (r endpointRow) draw(s *figure.Sheet, e *report.Evaluation, k int, y float64) {
	const shape = 3.4 // room for the mark of the kind
	p, m := &e.Endpoints[k], r.mark
	mark := y - 0.36*figure.MM(r.number.SizePt)
	s.Filled(kindShape(p.Kind), endpointX[0]+1.1, mark, 2.2, figure.Blue)
	r.figure(s, endpointX[0]+shape, y, figure.Blue, m.Of(p.Volume()), p.Kind, m.Of(p.Interval()))
	if i := indicatedOf(e, p, k); i != nil {
		s.Open(kindShape(i.Kind), endpointX[1]+1.1, mark, 2.2, figure.Black)
		r.figure(s, endpointX[1]+shape, y, figure.Black, m.Of(i.Volume()), i.Kind, "")
	} else {
		r.figure(s, endpointX[1]+shape, y, figure.Black, report.Dash, "", "")
	}
	if p.Differs != nil {
		r.figure(s, endpointX[2], y, figure.Black, m.Of(p.Difference()), m.Of(p.DifferencePercent())+" %", "limit "+m.Of(p.DifferenceLimit()))
	} else {
		r.figure(s, endpointX[2], y, figure.Black, report.Dash, "", "")
	}
}

// figure sets a figure and its notes; where they share a line, the first gives
// way if there is a second.
func (r endpointRow) figure(s *figure.Sheet, x, y float64, ink figure.Ink, value, note, second string) {
	end := s.Text(x, y, r.number.In(ink), value) + 1.6
	switch {
	case second == "":
		s.Text(end, y, noteStyle, note)
	case r.stacked:
		s.Text(end, y-2.75, noteStyle, note)
		s.Text(end, y, noteStyle, second)
	case strings.HasSuffix(note, "%"):
		s.Text(end, y, noteStyle, note+"; "+second)
	default: // the mark tells the kind
		s.Text(end, y, noteStyle, second)
	}
}
