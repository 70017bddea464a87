package pdf

import (
	"math"
	"sort"

	"lastdrop/report"
	"lastdrop/report/figure"
)

// Places of the columns of the front page, mm.
const (
	sampleX   = 26.0
	reasonX   = 60.0
	reasonEnd = 138.0
	scaleFrom = 143.0
	scaleTo   = 170.0
	valueEnd  = 184.0
)

// listRows is how many rows of what must be looked at the first page holds.
const listRows = 14

// listSection is what must be looked at first, most urgent first.
func (d *document) listSection() section {
	half := d.halfScale()
	sec := section{most: listRows, head: d.listHead(), foot: item{height: 6.5, draw: func(s *figure.Sheet, y float64) {
		s.TextRight(reasonEnd, y+3.4, noteStyle, "like kinds; grey: agreement limit; bar: 95 % from readings")
		d.laneAxis(s, half, y)
	}}}
	again := false
	for _, i := range d.urgent {
		e := &d.n.Evaluations[i]
		if e.Verdict == report.VerdictSound {
			continue
		}
		sec.rows = append(sec.rows, d.listRow(i, half, again && e.Verdict == report.VerdictDoubtful))
		again = e.Verdict == report.VerdictDisputed
	}
	return sec
}

func (d *document) listHead() item {
	return item{height: 6, draw: func(s *figure.Sheet, y float64) {
		blockTitle(s, left, right, y, "Look at these first", "most urgent first")
		s.TextRight(valueEnd, y+4.3, scaleStyle, "refit − indicated, % of the refit")
	}}
}

// lane is the scale of differences that the rows of the front page share.
func (d *document) lane(s *figure.Sheet, half float64) *figure.Lane {
	return figure.NewLane(s, scaleFrom, scaleTo, -half, half, d.mark.Fixed)
}

// laneAxis draws that scale with its numbers.
func (d *document) laneAxis(s *figure.Sheet, half, y float64) {
	l := d.lane(s, half)
	l.Axis(y+0.4, l.X.LevelTicks(5, l.Print))
}

// halfScale is how far the scale of differences reaches to each side, in %:
// far enough for all but the quarter that lie furthest out, and for twice the
// limit; those beyond stand at its edge.
func (d *document) halfScale() float64 {
	var apart, limits []float64
	for i := range d.n.Evaluations {
		if x, _ := worst(&d.n.Evaluations[i]); x != nil {
			apart = append(apart, math.Abs(x.Percent))
			limits = append(limits, limitPercent(x))
		}
	}
	if len(apart) == 0 {
		return 1
	}
	sort.Float64s(apart)
	sort.Float64s(limits)
	want := max(apart[len(apart)*3/4], 2*limits[len(limits)/2])
	if !(want > 0) || want > 1e6 {
		return 1
	}
	_, to := figure.Rounded(0, want, 2)
	return to
}

// limitPercent is the agreement limit where it stands on a scale in %.
func limitPercent(x *report.Difference) float64 {
	if v := math.Abs(100 * x.LimitML / x.RefitML); finite(v) {
		return v
	}
	return 0
}

// worst returns the difference of an evaluation that is largest by its limit,
// and its endpoint; nil when like kinds nowhere meet.
func worst(e *report.Evaluation) (x *report.Difference, at *report.Endpoint) {
	most := -1.0
	for i := range e.Endpoints {
		p := &e.Endpoints[i]
		if p.Differs == nil || !finite(p.Differs.Percent) {
			continue
		}
		by := math.Abs(p.Differs.Percent)
		if p.Differs.LimitML > 0 {
			by = math.Abs(p.Differs.ML) / p.Differs.LimitML
		}
		if x == nil || by > most {
			x, at, most = p.Differs, p, by
		}
	}
	return x, at
}

// noDifference says why a run has none.
func noDifference(e *report.Evaluation) string {
	switch {
	case len(e.Endpoints) == 0:
		return "no endpoint"
	case len(e.Indicated) == 0:
		return "none indicated"
	}
	for i := range e.Endpoints {
		if e.Endpoints[i].Differs != nil {
			return "not a number"
		}
	}
	return "unlike kinds"
}

// listRow is a run that must be looked at. firstOf opens the doubtful ones.
func (d *document) listRow(i int, half float64, firstOf bool) item {
	e := &d.n.Evaluations[i]
	sample := sampleLines(e)
	reason := reasonLines(e, d.mark)
	lines := max(len(sample)+1, len(reason)+1)
	h := 2.1 + bodyLead*float64(lines)
	return item{height: h, draw: func(s *figure.Sheet, y float64) {
		d.drawRow(s, e, y, sample, reason)
		d.drawDifference(s, e, half, y, h)
		d.drawPageLink(s, i, y)
		s.Rule(rowRule, left, right, y+h)
		if firstOf {
			s.Rule(rule(figure.Hair, 0.35), left, right, y)
		}
	}}
}

// sampleLines is a sample's name on at most two lines.
func sampleLines(e *report.Evaluation) []string {
	const w = reasonX - sampleX - 2
	if e.Facts.Sample == "" {
		return []string{"no sample stated"}
	}
	for _, share := range [...]float64{2, 1.85, 1.7, 1.5} {
		if lines := figure.Wrap(titleStyle, figure.Shorten(titleStyle, e.Facts.Sample, share*w), w); len(lines) <= 2 {
			return lines
		}
	}
	return []string{figure.Shorten(titleStyle, e.Facts.Sample, w)}
}

// reasonLines is the sentence of the flag that makes the verdict.
func reasonLines(e *report.Evaluation, m report.Decimal) []string {
	f := heaviest(e)
	if f == nil {
		return nil
	}
	return figure.WrapAtMost(bodyStyle, m.Says(f.Says), reasonEnd-reasonX, 3)
}

func (d *document) drawRow(s *figure.Sheet, e *report.Evaluation, y float64, sample, reason []string) {
	s.Urgent(verdictMark(e.Verdict), left+1.8, y+3.1, 3.2)
	base := y + 3.9
	at := paragraph(s, sampleX, base, bodyLead, titleStyle, sample)
	s.Text(sampleX, at, monoNote, e.ID)
	flag := ""
	if f := heaviest(e); f != nil {
		flag = f.Flag
	}
	room := reasonEnd - reasonX - figure.TextWidth(monoNote, flag) - 3
	x := s.Text(reasonX, base, titleStyle, figure.Shorten(titleStyle, procedureName(e), room))
	s.Text(x+2.5, base, monoNote, flag)
	paragraph(s, reasonX, base+bodyLead, bodyLead, bodyStyle, reason)
}

// drawPageLink leads to the page of a run, where it has one; of another volume
// it can only tell.
func (d *document) drawPageLink(s *figure.Sheet, i int, y float64) {
	at, base, st := d.runAt[i], y+3.9, noteStyle.In(figure.Blue)
	switch at.volume {
	case 0:
	case d.volume:
		from := s.TextRight(right, base, st, "page "+whole(at.page))
		s.Link(figure.Box{Left: from, Top: base - 2.5, Right: right, Bottom: base + 1}, at.page)
	default:
		s.TextRight(right, base, st, "volume "+whole(at.volume))
		s.TextRight(right, base+noteLead, st, "page "+whole(at.page))
	}
}

func procedureName(e *report.Evaluation) string {
	if e.Facts.Procedure == "" {
		return "no procedure named"
	}
	return e.Facts.Procedure
}

// drawDifference draws refit − indicated of like kinds on the shared scale.
func (d *document) drawDifference(s *figure.Sheet, e *report.Evaluation, half, y, h float64) {
	l := d.lane(s, half)
	x, p := worst(e)
	base := y + 3.9
	if x == nil {
		l.Upright(0, y, y+h, rule(figure.Hair, 0.35))
		text := noDifference(e)
		at := (scaleFrom+scaleTo)/2 + 3
		s.Text(at, base, noteStyle.As(figure.Italic), text)
		return
	}
	limit := limitPercent(x)
	l.Band(-limit, limit, y, y+h, figure.Band)
	l.Upright(0, y, y+h, rule(figure.Hair, 0.35))
	if low, high, ok := interval(x, p); ok {
		l.Bar(low, high, base-0.9, rule(figure.Blue, 1.1))
	}
	l.Point(x.Percent, base-0.9, figure.Disc, 2, figure.Blue, false)
	value := d.mark.Signed(x.Percent, 2)
	s.TextRight(valueEnd, base, noteStyle.In(figure.Black), value)
	if len(e.Endpoints) > 1 {
		s.TextRight(valueEnd, base+noteLead, noteStyle, "endpoint "+whole(p.N))
	}
}

// interval places the 95 % interval of the refit on the scale of differences
// in %; ok is false where the answer is of another kind than was compared.
func interval(x *report.Difference, p *report.Endpoint) (low, high float64, ok bool) {
	if x.Kind != p.Kind || x.RefitML == 0 || !finite(p.Low95ML+p.High95ML) {
		return 0, 0, false
	}
	per := 100 / x.RefitML
	return (p.Low95ML - x.IndicatedML) * per, (p.High95ML - x.IndicatedML) * per, true
}
