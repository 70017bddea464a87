package pdf

import (
	"math"
	"slices"
	"strings"

	"lastdrop/report"
	"lastdrop/report/figure"
)

// sideGap parts the blocks beside the curve, mm.
const sideGap = 6.0

// drawSide draws what stands beside the curve: up to two enlargements, and
// what each estimator says.
func (r *runPage) drawSide(s *figure.Sheet, p *report.Picture) {
	defer s.Block("side", figure.Box{Left: sideLeft - 1, Top: r.figTop - 3, Right: right + 3, Bottom: r.figFoot + 2})()
	n := min(len(r.e.Endpoints), 2)
	estimates := estimatesItem(r.e, r.d.mark)
	each := r.figFoot - r.figTop - sideGap*float64(n-1)
	if estimates.height > 0 {
		each -= estimates.height + sideGap
	}
	each = min(each/float64(n), 78)
	y := r.figTop
	for k, i := range shown(r.e, n) {
		r.drawEnlarged(s, p, &r.e.Endpoints[i], y, y+each, k == n-1)
		y += each + sideGap
	}
	if estimates.height > 0 {
		estimates.draw(s, y)
	}
}

// shown picks the endpoints to enlarge: those that a flag names first, then
// from the lowest volume; in the order of volume.
func shown(e *report.Evaluation, n int) []int {
	picked := make([]bool, len(e.Endpoints))
	left := n
	for _, f := range e.Flags {
		for i := range e.Endpoints {
			if left > 0 && f.Endpoint == e.Endpoints[i].N && !picked[i] {
				picked[i] = true
				left--
			}
		}
	}
	var out []int
	for i := range picked {
		if !picked[i] && left > 0 {
			picked[i] = true
			left--
		}
		if picked[i] {
			out = append(out, i)
		}
	}
	return out
}

// window is the range of volumes of an enlargement: three brackets wide and at
// least 20 u, wider where the indicated endpoint lies near, never beyond the
// readings.
func window(e *report.Evaluation, p *report.Picture, q *report.Endpoint) (from, to float64) {
	bracket := q.BracketML[1] - q.BracketML[0]
	half := max(1.5*bracket, 10*q.UML)
	mid := (q.BracketML[0] + q.BracketML[1]) / 2
	if !(half > 0) {
		half, mid = 0.5, q.VolumeML
	}
	var b, all bounds
	b.take(mid - half)
	b.take(mid + half)
	for _, i := range e.Indicated {
		if math.Abs(i.VolumeML-mid) < 2*half {
			b.take(i.VolumeML - 0.15*half)
			b.take(i.VolumeML + 0.15*half)
		}
	}
	for _, d := range p.Dots {
		all.take(d.VolumeML)
	}
	from, to = max(b.from, all.from), min(b.to, all.to)
	if !(to > from) {
		return b.from, b.to
	}
	return from, to
}

// drawEnlarged draws the neighbourhood of one endpoint on axes of its own; the
// last says what its signs are.
func (r *runPage) drawEnlarged(s *figure.Sheet, p *report.Picture, q *report.Endpoint, top, foot float64, last bool) {
	axis := foot - 4
	if last {
		axis -= noteLead
	}
	area := figure.Box{Left: sidePlot, Top: top + 2.6, Right: right, Bottom: axis - 1 - 2*figure.LaneMM}
	from, to := window(r.e, p, q)
	b := nearRange(p, q, from, to)
	lo, hi := padded(b.from, b.to, 0.08, 0.08)
	a := figure.NewAxes(s, area, [2]float64{from, to}, [2]float64{lo, hi}, r.d.mark.Fixed)
	t := figure.NewTicks(lo, hi, int(max(area.Height()/8, 3)))
	r.drawBands(a, area.Bottom+2*figure.LaneMM)
	drawArmBands(a, p)
	a.GridY(t)
	a.Left(t)
	r.drawCurve(a, p)
	inside := r.drawNear(a, p, q)
	r.drawDrops(a, p)
	a.Rail(near(r.rail(false), from, to))
	drawNumbers(a, inside, q)
	a.Bottom(axis, a.X.LevelTicks(5, a.Print))
	note := "numbers: lines of the dump"
	if len(p.Curve) > 0 {
		note += "; dotted: a guess"
	}
	if last {
		s.Text(sideLeft, foot, noteStyle, note)
	}
	s.Text(sideLeft, top, scaleStyle, enlargedTitle(r.e, p, q))
}

func enlargedTitle(e *report.Evaluation, p *report.Picture, q *report.Endpoint) string {
	what := "the jump enlarged"
	switch {
	case len(e.Endpoints) > 1:
		what = "endpoint " + whole(q.N) + " enlarged"
	case len(p.Arms) > 0:
		what = "the corner enlarged"
	}
	unit, _, _ := strings.Cut(p.YName, ",")
	return figure.Shorten(scaleStyle, unit, 18) + ", " + what
}

// nearRange is the range of values of an enlargement: curve, arms and readings
// within the window. Readings left out count where they lie near.
func nearRange(p *report.Picture, q *report.Endpoint, from, to float64) bounds {
	b := valueRange(p, from, to)
	for i := range p.Arms {
		m := &p.Arms[i]
		for _, v := range [...]float64{q.VolumeML, from, to} {
			if v == q.VolumeML || v >= m.FromML && v <= m.ToML {
				b.take(armPoint(m, v).Y)
			}
		}
	}
	if !b.any {
		b.take(readingAt(q, p))
	}
	whole := valueRange(p, math.Inf(-1), math.Inf(1))
	for _, d := range p.Dots {
		if d.VolumeML >= from && d.VolumeML <= to && d.Value >= whole.from && d.Value <= whole.to {
			b.take(d.Value)
		}
	}
	return b
}

// near leaves what stands outside the window out of a rail.
func near(r figure.Rail, from, to float64) figure.Rail {
	keep := func(all []figure.Place) (out []figure.Place) {
		for _, p := range all {
			if p.At >= from && p.At <= to {
				out = append(out, p)
			}
		}
		return out
	}
	r.Upper, r.Lower = keep(r.Upper), keep(r.Lower)
	if len(r.Lower) == 0 && r.LowerNone != "" {
		r.LowerNone = "none indicated here"
	}
	return r
}

// drawNear draws the readings of the window, those of the bracket larger, and
// returns them.
func (r *runPage) drawNear(a *figure.Axes, p *report.Picture, q *report.Endpoint) (inside []report.Dot) {
	for _, d := range p.Dots {
		if !a.X.Holds(d.VolumeML) || !a.Y.Holds(d.Value) {
			continue
		}
		inside = append(inside, d)
		size := 1.15
		if edgeOf(q, d) {
			size = 1.9
		}
		a.Readings([]figure.Point{{X: d.VolumeML, Y: d.Value}}, size, d.LeftOut)
	}
	return inside
}

// edgeOf tells whether a reading is one of the two of the bracket.
func edgeOf(q *report.Endpoint, d report.Dot) bool {
	return d.VolumeML == q.BracketML[0] || d.VolumeML == q.BracketML[1]
}

// drawNumbers writes the lines of the dump beside the readings, those of the
// bracket first and bold, others where there is room.
func drawNumbers(a *figure.Axes, inside []report.Dot, q *report.Endpoint) {
	for _, edge := range [...]bool{true, false} {
		st, left := noteStyle, 8
		if edge {
			st = noteStyle.As(figure.Bold).In(figure.Black)
		}
		for _, d := range inside {
			if edgeOf(q, d) != edge || d.Line == 0 || left == 0 {
				continue
			}
			if a.Label(st, whole(d.Line), a.At(figure.Point{X: d.VolumeML, Y: d.Value}), 5) {
				left--
			}
		}
	}
}

// Heights of the rows of estimates beside the curve, mm.
const (
	scaleRowHeight = 4.4
	tableRowHeight = 3.8
	mostRows       = 8 // of either; the workbook has all
)

// estimatesItem shows what each estimator says: on one scale where the run
// has one endpoint, as a table where several leave no common scale.
func estimatesItem(e *report.Evaluation, m report.Decimal) item {
	switch {
	case len(e.Endpoints) == 1 && len(e.Endpoints[0].Estimates) > 0:
		return scaleItem(e, &e.Endpoints[0], m)
	case len(e.Endpoints) > 1:
		return tableItem(e, m)
	}
	return item{}
}

// answers tells whether an estimate is the answer of its endpoint.
func answers(p *report.Endpoint, t *report.Estimate) bool {
	return t.Estimator == p.Estimator && t.Kind == p.Kind && t.VolumeML == p.VolumeML
}

// estimateVolume is the printed form of an estimate: that of the endpoint
// where it is the answer.
func estimateVolume(p *report.Endpoint, t *report.Estimate) string {
	if answers(p, t) {
		return p.Volume()
	}
	return report.Fixed(t.VolumeML, report.VolumeDecimals(t.UFitML))
}

// tableItem is one row an estimate, by endpoint.
func tableItem(e *report.Evaluation, m report.Decimal) item {
	rows := 0
	for i := range e.Endpoints {
		rows += len(e.Endpoints[i].Estimates)
	}
	if rows == 0 {
		return item{}
	}
	show := min(rows, mostRows)
	h := 4.6 + tableRowHeight*float64(show)
	if show < rows {
		h += noteLead
	}
	return item{height: h, draw: func(s *figure.Sheet, y float64) {
		s.Text(sideLeft, y, scaleStyle, "estimates")
		s.TextRight(tableVolume, y, noteStyle, "mL")
		s.TextRight(right, y, noteStyle, "u of its fit")
		y += 0.8
		for i := range e.Endpoints {
			p := &e.Endpoints[i]
			for k := range p.Estimates {
				if show--; show < 0 {
					s.Text(sideLeft, y+noteLead, noteStyle, "and "+whole(rows-mostRows)+" more in summary.xlsx")
					return
				}
				y += tableRowHeight
				drawEstimate(s, p, &p.Estimates[k], y, m)
			}
		}
	}}
}

// Edges of the columns of the table of estimates, mm.
const (
	tableName   = sideLeft + 6
	tableKind   = tableName + 17
	tableVolume = right - 12
)

func drawEstimate(s *figure.Sheet, p *report.Endpoint, t *report.Estimate, y float64, m report.Decimal) {
	st := noteStyle.In(figure.Blue)
	if answers(p, t) {
		st = st.As(figure.Bold)
	}
	s.Text(sideLeft, y, noteStyle, whole(p.N))
	s.Filled(kindShape(t.Kind), sideLeft+3.6, y-0.8, 1.9, figure.Blue)
	s.Text(tableName, y, st, figure.Shorten(st, t.Estimator, tableKind-tableName-1))
	volume := m.Of(estimateVolume(p, t))
	room := tableVolume - tableKind - figure.TextWidth(st, volume) - 1.5
	s.Text(tableKind, y, noteStyle, figure.Shorten(noteStyle, t.Kind, room))
	s.TextRight(tableVolume, y, st, volume)
	s.TextRight(right, y, noteStyle, m.Fixed(t.UFitML, report.UDecimals(t.UFitML)))
}

// scaleRow is one row of the estimates on one scale.
type scaleRow struct {
	name      string
	at        float64
	low, high float64
	kind      string
	answer    bool
	indicated bool
}

// scaleRows are the estimates of an endpoint grouped by kind, that of the
// answer first, each group with what the instrument indicated of that kind.
func scaleRows(e *report.Evaluation, p *report.Endpoint) []scaleRow {
	kinds := []string{p.Kind}
	for _, t := range p.Estimates {
		if !slices.Contains(kinds, t.Kind) {
			kinds = append(kinds, t.Kind)
		}
	}
	for _, i := range e.Indicated {
		if !slices.Contains(kinds, i.Kind) {
			kinds = append(kinds, i.Kind)
		}
	}
	var out []scaleRow
	for _, kind := range kinds {
		for k := range p.Estimates {
			if t := &p.Estimates[k]; t.Kind == kind {
				row := scaleRow{name: t.Estimator, at: t.VolumeML, low: t.VolumeML - 1.96*t.UFitML, high: t.VolumeML + 1.96*t.UFitML, kind: kind}
				if row.answer = answers(p, t); row.answer {
					row.low, row.high = p.Low95ML, p.High95ML
				}
				out = append(out, row)
			}
		}
		for _, i := range e.Indicated {
			if i.Kind == kind {
				out = append(out, scaleRow{name: "indicated", at: i.VolumeML, low: i.VolumeML, high: i.VolumeML, kind: kind, indicated: true})
			}
		}
	}
	return out[:min(len(out), mostRows)]
}

// kindWhite parts the groups of unlike kinds, mm.
const kindWhite = 1.2

// scaleItem draws the estimates of an endpoint on one scale, like kinds
// together: only they are compared.
func scaleItem(e *report.Evaluation, p *report.Endpoint, m report.Decimal) item {
	rows := scaleRows(e, p)
	h := 5.6 + scaleRowHeight*float64(len(rows)) + 5
	for i := 1; i < len(rows); i++ {
		if rows[i].kind != rows[i-1].kind {
			h += kindWhite
		}
	}
	return item{height: h, draw: func(s *figure.Sheet, y float64) {
		s.Text(sideLeft, y, scaleStyle, "estimates, mL; bar: 95 %; only like kinds compare")
		from, to := rows[0].low, rows[0].high
		for _, r := range rows {
			from, to = min(from, r.low), max(to, r.high)
		}
		from, to = padded(from, to, 0.08, 0.08)
		l := figure.NewLane(s, sideLeft+24, right-2, from, to, m.Fixed)
		y += 5.6
		for i, r := range rows {
			if i > 0 && r.kind != rows[i-1].kind {
				s.Rule(rowRule, sideLeft, right, y-2.6)
				y += kindWhite
			}
			drawScaleRow(s, l, r, y)
			y += scaleRowHeight
		}
		l.Axis(y-1.6, l.X.LevelTicks(4, l.Print))
	}}
}

func drawScaleRow(s *figure.Sheet, l *figure.Lane, r scaleRow, y float64) {
	ink := figure.Blue
	st, bar := scaleStyle.As(figure.Regular), 1.0
	if r.answer {
		st, bar = scaleStyle.As(figure.Bold), 2.4
	}
	if r.indicated {
		ink = figure.Black
	}
	s.Text(sideLeft, y, st.In(ink), figure.Shorten(st, r.name, 22))
	l.Bar(r.low, r.high, y-0.8, rule(ink, bar))
	l.Point(r.at, y-0.8, kindShape(r.kind), 2, ink, r.indicated)
}
