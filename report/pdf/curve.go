package pdf

import (
	"math"

	"lastdrop/report"
	"lastdrop/report/figure"
)

// Edges of the figures of a run, mm.
const (
	plotLeft   = 34.0
	plotRight  = 136.0
	sideLeft   = 140.0 // of the column beside
	sidePlot   = 149.0
	stemHeight = 14.0
)

// Widths of curves, pt.
const (
	answerPt = 1.1
	thinPt   = 0.55
)

// drawFigures draws the curve and what stands beside it.
func (r *runPage) drawFigures(s *figure.Sheet) {
	p := r.e.Picture
	if p == nil || len(p.Dots) == 0 {
		r.drawNoCurve(s)
		return
	}
	edge := plotRight
	if len(r.e.Endpoints) == 0 {
		edge = right // nothing to enlarge
	}
	r.drawMain(s, p, edge)
	if len(r.e.Endpoints) > 0 {
		r.drawSide(s, p)
	}
}

func (r *runPage) drawNoCurve(s *figure.Sheet) {
	b := figure.Box{Left: left, Top: r.figTop, Right: right, Bottom: r.figFoot}
	defer s.Block("no curve", b)()
	s.FillBox(figure.Band, b)
	s.TextMid((left+right)/2, (b.Top+b.Bottom)/2, leadStyle.In(figure.Second), "No curve was kept for this page; the readings stand in the dump.")
}

// drawMain draws curve, rail, residuals and the axis that they share.
func (r *runPage) drawMain(s *figure.Sheet, p *report.Picture, edge float64) {
	defer s.Block("main figure", figure.Box{Left: left, Top: r.figTop - 3, Right: edge + 4, Bottom: r.figFoot + 2})()
	area := figure.Box{Left: plotLeft, Top: r.figTop + 2.6, Right: edge}
	axisAt := r.figFoot - 7.4
	area.Bottom = axisAt - 2.6 - 2*figure.LaneMM
	if len(p.Residuals) > 0 {
		area.Bottom -= stemHeight + 6.4
	}
	fromML, toML := volumeRange(r.e, p)
	b := valueRange(p, fromML, toML)
	lo, hi := padded(b.from, b.to, bottomShare(p), 0.05)
	a := figure.NewAxes(s, area, [2]float64{fromML, toML}, [2]float64{lo, hi}, r.d.mark.Fixed)
	t := figure.NewTicks(b.from-0.02*(b.to-b.from), hi, 7)
	r.drawBands(a, area.Bottom+2*figure.LaneMM)
	a.GridY(t)
	title := s.Text(plotLeft, r.figTop, scaleStyle, figure.Shorten(scaleStyle, p.YName, edge-plotLeft-30))
	a.Floor(points(p.Slope), p.SlopeMax, 0.3, figure.Tint)
	drawArmBands(a, p)
	a.Left(t)
	r.drawCurve(a, p)
	r.drawReadings(a, p)
	r.drawDrops(a, p)
	a.Rail(r.rail(true))
	r.drawLabels(a, p, title)
	if len(p.Residuals) > 0 {
		r.drawResiduals(s, p, figure.Box{Left: plotLeft, Top: axisAt - 1 - stemHeight, Right: edge, Bottom: axisAt - 1}, a)
	}
	a.Bottom(axisAt, a.X.LevelTicks(int((edge-plotLeft)/11), a.Print))
	s.TextRight(edge, r.figFoot, scaleStyle, figure.Shorten(scaleStyle, r.d.mark.Axis(r.e), edge-plotLeft))
}

// bottomShare leaves white under the data where a derivative stands on the
// floor.
func bottomShare(p *report.Picture) float64 {
	if len(p.Slope) > 0 {
		return 0.14
	}
	return 0.06
}

// drawBands draws the brackets as bands up through the plot.
func (r *runPage) drawBands(a *figure.Axes, foot float64) {
	for i := range r.e.Endpoints {
		b := r.e.Endpoints[i].BracketML
		if b[1] > b[0] {
			a.BandX(b[0], b[1], foot, figure.Band)
		}
	}
}

// drawCurve draws the fitted curve. Between the two readings of a bracket it
// is a guess, dotted.
func (r *runPage) drawCurve(a *figure.Axes, p *report.Picture) {
	if len(p.Curve) > 1 {
		from := p.Curve[0].X
		for _, g := range gaps(r.e) {
			a.Curve(between(p.Curve, from, g[0]), rule(figure.Blue, answerPt))
			a.Curve(between(p.Curve, g[0], g[1]), figure.Stroke{Ink: figure.Blue, WidthPt: answerPt, Dash: figure.Dotted})
			from = g[1]
		}
		a.Curve(between(p.Curve, from, p.Curve[len(p.Curve)-1].X), rule(figure.Blue, answerPt))
	}
	dashed := figure.Stroke{Ink: figure.Blue, WidthPt: 0.9, Dash: figure.Dashed}
	for i := range p.Arms {
		m := &p.Arms[i]
		a.Curve([]figure.Point{armPoint(m, m.FromML), armPoint(m, m.ToML)}, rule(figure.Blue, answerPt))
		if m.ExtendFromML < m.FromML {
			a.Curve([]figure.Point{armPoint(m, m.ExtendFromML), armPoint(m, m.FromML)}, dashed)
		}
		if m.ExtendToML > m.ToML {
			a.Curve([]figure.Point{armPoint(m, m.ToML), armPoint(m, m.ExtendToML)}, dashed)
		}
	}
}

// gaps are the brackets in the order of volume, none overlapping.
func gaps(e *report.Evaluation) [][2]float64 {
	var out [][2]float64
	for i := range e.Endpoints {
		b := e.Endpoints[i].BracketML
		if b[1] > b[0] && (len(out) == 0 || b[0] >= out[len(out)-1][1]) {
			out = append(out, b)
		}
	}
	return out
}

func armPoint(m *report.Arm, v float64) figure.Point {
	return figure.Point{X: v, Y: m.Intercept + m.Slope*v}
}

// drawArmBands draws the 95 % confidence band of each arm and its
// prolongation.
func drawArmBands(a *figure.Axes, p *report.Picture) {
	const n = 24
	for i := range p.Arms {
		m := &p.Arms[i]
		from, to := min(m.FromML, m.ExtendFromML), max(m.ToML, m.ExtendToML)
		if m.ExtendFromML == 0 && m.ExtendToML == 0 {
			from, to = m.FromML, m.ToML
		}
		var up, low []figure.Point
		for k := 0; k <= n; k++ {
			v := from + (to-from)*float64(k)/n
			at := armPoint(m, v)
			u := m.UIntercept*m.UIntercept + 2*v*m.CovInterceptSlope + v*v*m.USlope*m.USlope
			half := m.ConfidenceFactor95T * math.Sqrt(max(u, 0))
			up = append(up, figure.Point{X: v, Y: at.Y + half})
			low = append(low, figure.Point{X: v, Y: at.Y - half})
		}
		a.Between(up, low, figure.Tint)
	}
}

// drawReadings draws the readings: strokes as read, open discs for those left
// out, discs for those used. One far off stands at the edge, with its value.
func (r *runPage) drawReadings(a *figure.Axes, p *report.Picture) {
	var used, out, raw []figure.Point
	for _, d := range p.Dots {
		at := figure.Point{X: d.VolumeML, Y: d.Value}
		if d.LeftOut {
			out = append(out, at)
		} else {
			used = append(used, at)
		}
		if d.AsRead != d.Value {
			raw = append(raw, figure.Point{X: d.VolumeML, Y: d.AsRead})
		}
	}
	a.Strokes(raw, 1.6, rule(figure.Hair, thinPt))
	far := a.Readings(used, 1.15, false)
	far = append(far, a.Readings(out, 1.15, true)...)
	for i, q := range far {
		if i == 6 { // the flag tells how many there are
			break
		}
		r.drawFar(a, q)
	}
}

// drawFar draws a reading beyond the scale at its edge.
func (r *runPage) drawFar(a *figure.Axes, q figure.Point) {
	x := a.At(q).X
	y, shape := a.Area.Top+1, figure.PointsUp
	if q.Y < a.Y.From {
		y, shape = a.Area.Bottom-1, figure.Triangle
	}
	a.Sheet.Filled(shape, x, y, 2, figure.Warm)
	a.Room.TakeBox(figure.Box{Left: x - 1.2, Top: y - 1.2, Right: x + 1.2, Bottom: y + 1.2})
	a.Label(noteStyle.In(figure.Black), r.printReading(q.Y), figure.Point{X: x, Y: y}, 12)
}

// printReading is the printed form of a reading: as pH meters, millivolt and
// conductivity meters commonly show it.
func (r *runPage) printReading(v float64) string {
	value, unit := splitReading(r.e, v, r.d.mark)
	if unit == "pH" {
		return "pH " + value
	}
	return value + " " + unit
}

func splitReading(e *report.Evaluation, v float64, m report.Decimal) (value, unit string) {
	unit = unitOf(e)
	return m.Fixed(v, map[string]int{"pH": 2, "mV": 1, "mS/cm": 3}[unit]), unit
}

// drawDrops joins endpoints and curve with the rail.
func (r *runPage) drawDrops(a *figure.Axes, p *report.Picture) {
	for i := range r.e.Endpoints {
		q := &r.e.Endpoints[i]
		if !a.X.Holds(q.VolumeML) {
			continue
		}
		y := readingAt(q, p)
		a.Drop(figure.Point{X: q.VolumeML, Y: y}, a.Area.Bottom+figure.LaneMM/2, rule(figure.Blue, thinPt))
	}
	for _, i := range r.e.Indicated {
		if !a.X.Holds(i.VolumeML) {
			continue
		}
		y, ok := drawnAt(p, i.VolumeML)
		if !ok {
			y = a.Y.From
		}
		a.Drop(figure.Point{X: i.VolumeML, Y: y}, a.Area.Bottom+1.5*figure.LaneMM, figure.Stroke{Ink: figure.Black, WidthPt: thinPt, Dash: figure.Dashed})
	}
}

// readingAt is where what is drawn stands at an endpoint: for arms that is not
// the endpoint's reading, which is not corrected for dilution.
func readingAt(q *report.Endpoint, p *report.Picture) float64 {
	if q.Reading != nil && len(p.Arms) == 0 {
		return *q.Reading
	}
	y, _ := drawnAt(p, q.VolumeML)
	return y
}

// drawnAt is where what is drawn stands at a volume: the curve, or the arm
// that reaches furthest out there.
func drawnAt(p *report.Picture, v float64) (y float64, ok bool) {
	if len(p.Curve) > 0 {
		return at(p.Curve, v)
	}
	near := math.Inf(1)
	for i := range p.Arms {
		m := &p.Arms[i]
		if off := max(m.FromML-v, v-m.ToML, 0); off < near {
			y, near, ok = armPoint(m, v).Y, off, true
		}
	}
	return y, ok
}

// rail is the rail of a run; figures stand in it only under large plots.
func (r *runPage) rail(names bool) figure.Rail {
	e, m := r.e, r.d.mark
	out := figure.Rail{UpperNone: "no endpoint", LowerNone: "none indicated"}
	if names {
		out.UpperName, out.LowerName = "refit", "indicated"
	}
	for i := range e.Endpoints {
		p := &e.Endpoints[i]
		out.Upper = append(out.Upper, figure.Place{
			At: p.VolumeML, Shape: kindShape(p.Kind), Label: m.Of(p.Volume()),
			Bracket: p.BracketML[1] > p.BracketML[0], From: p.BracketML[0], To: p.BracketML[1],
			Bar: true, Low: p.Low95ML, High: p.High95ML,
		})
	}
	for k := range e.Indicated {
		i := &e.Indicated[k]
		out.Lower = append(out.Lower, figure.Place{At: i.VolumeML, Shape: kindShape(i.Kind), Label: m.Of(i.Volume())})
	}
	return out
}

// drawLabels names bracket, derivative, arms and raw readings where they
// stand. titleEnd is where the scale's name ends: what finds no place in the
// plot is told behind it.
func (r *runPage) drawLabels(a *figure.Axes, p *report.Picture, titleEnd float64) {
	blue := noteStyle.In(figure.Blue)
	var homeless []string
	for i := range p.Arms {
		m := &p.Arms[i]
		if m.Name != "" && !a.Label(blue, m.Name, a.At(armPoint(m, (m.FromML+m.ToML)/2)), 14) {
			homeless = append(homeless, m.Name)
		}
	}
	for i := range r.e.Endpoints {
		q := &r.e.Endpoints[i]
		if same := i > 0 && q.BracketML == r.e.Endpoints[i-1].BracketML; q.BracketML[1] > q.BracketML[0] && !same {
			edge := figure.Point{X: a.X.MM(q.BracketML[0]), Y: a.Area.Top + 2}
			if !a.Label(noteStyle, r.bracketText(q), edge, 30) && i == 0 {
				homeless = append(homeless, r.bracketText(q))
			}
		}
	}
	if slope := r.d.mark.Says(p.SlopeName); len(p.Slope) > 0 && slope != "" {
		if !a.Label(blue, slope, slopePeak(a, p), 45) {
			homeless = append(homeless, slope)
		}
	}
	if at, ok := rawLabel(a, p); ok {
		a.Label(noteStyle, "as read", at, 20)
	}
	x := a.Area.Right
	for _, text := range homeless {
		if x-figure.TextWidth(noteStyle, text) > titleEnd+3 {
			x = a.Sheet.TextRight(x, r.figTop, noteStyle, text) - 4
		}
	}
}

func (r *runPage) bracketText(q *report.Endpoint) string {
	return "bracket " + r.d.mark.Of(q.Bracket()) + " mL"
}

// slopePeak is where the derivative's silhouette is highest.
func slopePeak(a *figure.Axes, p *report.Picture) figure.Point {
	top := p.Slope[0]
	for _, v := range p.Slope {
		if v.Y > top.Y {
			top = v
		}
	}
	return figure.Point{X: a.X.MM(top.X), Y: a.Area.Bottom - 0.22*a.Area.Height()}
}

// rawLabel is where the uncorrected readings end; ok is false when there are
// none or none apart from the corrected ones.
func rawLabel(a *figure.Axes, p *report.Picture) (at figure.Point, ok bool) {
	for _, d := range p.Dots {
		q := figure.Point{X: d.VolumeML, Y: d.AsRead}
		if d.AsRead != d.Value && a.Y.Holds(d.AsRead) && math.Abs(a.Y.MM(d.AsRead)-a.Y.MM(d.Value)) > 3 {
			at, ok = a.At(q), true
		}
	}
	return at, ok
}

// drawResiduals draws the stems on the volume axis of the curve.
func (r *runPage) drawResiduals(s *figure.Sheet, p *report.Picture, area figure.Box, curve *figure.Axes) {
	most := p.ResidualBand
	var all bounds
	for _, q := range p.Residuals {
		all.take(math.Abs(q.Y))
	}
	most = max(most, min(all.to, 6*max(p.ResidualBand/2, 1e-300)))
	if p.ResidualBand <= 0 {
		most = all.to
	}
	if !(most > 0) && !math.IsNaN(most) {
		most = 1
	}
	a := figure.NewAxes(s, area, [2]float64{curve.X.From, curve.X.To}, [2]float64{-1.15 * most, 1.15 * most}, r.d.mark.Fixed)
	if p.ResidualBand > 0 {
		a.BandY(-p.ResidualBand, p.ResidualBand, figure.Band)
	}
	s.Rule(rule(figure.Hair, 0.35), area.Left, area.Right, a.Y.MM(0))
	a.Left(figure.NewTicks(-1.15*most, 1.15*most, 5))
	a.Stems(points(p.Residuals))
	unit := p.ResidualUnit
	if unit == "sd" {
		unit = "in standard deviations of the noise"
	}
	title := "residual"
	if unit != "" {
		title += ", " + unit
	}
	s.Text(plotLeft, area.Top-1.4, scaleStyle, title)
	note := ""
	if p.ResidualBand > 0 {
		note = "grey: ± 2 × noise"
	}
	if len(p.Arms) > 0 {
		note = "open discs: in no arm; " + note
	}
	s.TextRight(area.Right, area.Top-1.4, noteStyle, note)
}
