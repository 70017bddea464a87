package pdf

import (
	"slices"

	"lastdrop/report"
	"lastdrop/report/figure"
	"lastdrop/report/pdf/paper"
)

// Small pictures stand four in a row, 41 mm wide, on one scale for all of a
// procedure: on scales of their own a bad run would look like a good one.
const (
	smallAcross = 4
	smallWidth  = 41.0
	smallHeight = 18.2
	smallTop    = 4.4 // from the row's top to the picture's
	smallLane   = 2.0
	smallPitch  = 28.4
	smallHead   = 46.0 // where the first block of a page begins
)

// smallGroup is what shares a scale.
type smallGroup struct {
	mark                   report.Decimal
	runs                   []*report.Evaluation
	fromML, toML, low, top float64
	yTicks                 figure.Ticks
	ghost                  []report.XY // V by V of the endpoint, reading
}

// planSmall plans the small pictures of sound runs.
func (d *document) planSmall() {
	if len(d.small) == 0 || d.smallAt.volume > 0 {
		return
	}
	f := newFlow(smallHead, smallHead, d.foot())
	white := 0.0
	for _, g := range d.smallGroups() {
		f.addSection(white, g.section())
		white = 5
	}
	d.smallAt = stretch{d.volume, len(d.pages) + 1, d.volume, len(d.pages) + len(f.pages)}
	done := 0
	for i, items := range f.pages {
		from := done + 1
		for _, it := range items {
			done += it.runs
		}
		to := done
		p := page{what: "small pictures of sound runs", draw: func(s *figure.Sheet, number int) {
			defer d.frame(s, number, "", "")()
			d.thumb(s, report.VerdictSound)
			d.drawSmallHead(s, from, to)
			drawItems(s, items)
		}}
		if i == 0 {
			p.bookmarks = []paper.Bookmark{{Text: "sound, small pictures"}}
		}
		d.pages = append(d.pages, p)
	}
}

// smallBelow puts the small pictures under the blocks of the front page where
// nothing is to be done and all fit there: that night is one page. Otherwise
// the flow is as before.
func (d *document) smallBelow(f *flow) *flow {
	if len(d.small) == 0 || len(d.small) > smallMost || len(f.pages) > 1 {
		return f
	}
	g := &flow{pages: [][]placed{append([]placed(nil), f.pages[0]...)}, y: f.y, top: f.top, bottom: f.bottom}
	g.add(air, item{height: 12.5, draw: func(s *figure.Sheet, y float64) {
		blockTitle(s, left, right, y, "Sound runs", "look for the one that is not like the others")
		paragraph(s, left, y+4.3+4, noteLead, noteStyle, smallNotes[:])
	}})
	for _, group := range d.smallGroups() {
		g.addSection(3, group.section())
	}
	if len(g.pages) > 1 {
		return f
	}
	d.smallAt = stretch{1, 1, 1, 1}
	return g
}

// smallMost is more pictures than any front page has room for.
const smallMost = 24

// smallNotes explain the pictures.
var smallNotes = [...]string{
	"In the order they were run. Grey: the median curve of the procedure, laid on the endpoint. Under each picture: refit filled, indicated open.",
	"Figures: endpoint in mL; refit − indicated of like kinds, % of the refit.",
}

func (d *document) drawSmallHead(s *figure.Sheet, from, to int) {
	defer s.Block("small head", figure.Box{Left: left, Top: 20, Right: right, Bottom: smallHead})()
	s.Urgent(figure.Calm, left+3.2, 25, 6)
	x := s.Text(headX, 27, headStyle.As(figure.Bold), "sound")
	s.Text(x+2.4, 27, headStyle, "runs "+whole(from)+" to "+whole(to)+" of "+whole(len(d.small)))
	s.Text(headX, 33.4, leadStyle, capital(report.SoundMeans)+". Look for the one that is not like the others.")
	s.Text(headX, 37.8, noteStyle, smallNotes[0])
	s.Text(headX, 37.8+noteLead, noteStyle, smallNotes[1])
}

// smallGroups cuts the sound runs where procedure or signal changes.
func (d *document) smallGroups() []*smallGroup {
	var out []*smallGroup
	for _, i := range d.small {
		e := &d.n.Evaluations[i]
		if n := len(out); n > 0 && out[n-1].runs[0].Facts.Procedure == e.Facts.Procedure && out[n-1].runs[0].Signal == e.Signal {
			out[n-1].runs = append(out[n-1].runs, e)
			continue
		}
		out = append(out, &smallGroup{mark: d.mark, runs: []*report.Evaluation{e}})
	}
	for _, g := range out {
		slices.SortStableFunc(g.runs, func(a, b *report.Evaluation) int {
			switch {
			case earlier(a, b):
				return -1
			case earlier(b, a):
				return 1
			}
			return 0
		})
		g.scale()
	}
	return out
}

// scale sets the one scale of a group and its typical curve.
func (g *smallGroup) scale() {
	var x, y bounds
	for _, e := range g.runs {
		from, to := volumeRange(e, e.Picture)
		b := valueRange(e.Picture, from, to)
		x.take(from)
		x.take(to)
		if b.any {
			y.take(b.from)
			y.take(b.to)
		}
	}
	g.fromML, g.toML = x.from, x.to
	g.low, g.top = padded(y.from, y.to, 0.06, 0.06)
	g.yTicks = figure.NewTicks(g.low, g.top, 3)
	g.ghost = typical(g.runs)
}

func (g *smallGroup) section() section {
	e := g.runs[0]
	sec := section{head: item{height: 8, draw: func(s *figure.Sheet, y float64) {
		note := e.Picture.YName
		if x := g.mark.Axis(e); x != "" {
			note += "; " + x
		}
		blockTitle(s, left, right, y, figure.Shorten(titleStyle, procedureName(e), 90), note)
	}}}
	sec.foot = item{height: 4, wide: true, draw: func(s *figure.Sheet, y float64) {
		// The last number may stand half beyond the last picture.
		defer s.Block("axes of small pictures", figure.Box{Left: left - 10, Top: y, Right: right + 3, Bottom: y + 4})()
		for k := range min(len(g.runs), smallAcross) {
			a := g.axes(s, k, y-smallPitch)
			a.Bottom(y-0.9, a.X.LevelTicks(4, a.Print))
		}
		s.TextRight(left-2, y+2.4, noteStyle, "mL")
	}}
	for from := 0; from < len(g.runs); from += smallAcross {
		runs := g.runs[from:min(from+smallAcross, len(g.runs))]
		sec.rows = append(sec.rows, item{height: smallPitch, runs: len(runs), wide: true, draw: func(s *figure.Sheet, y float64) {
			for k, e := range runs {
				g.draw(s, e, k, y)
			}
		}})
	}
	return sec
}

func (g *smallGroup) axes(s *figure.Sheet, k int, y float64) *figure.Axes {
	x := left + 45*float64(k)
	area := figure.Box{Left: x, Top: y + smallTop, Right: x + smallWidth, Bottom: y + smallTop + smallHeight}
	return figure.NewAxes(s, area, [2]float64{g.fromML, g.toML}, [2]float64{g.low, g.top}, g.mark.Fixed)
}

// draw is one small picture.
func (g *smallGroup) draw(s *figure.Sheet, e *report.Evaluation, k int, y float64) {
	a := g.axes(s, k, y)
	box := figure.Box{Left: a.Area.Left, Top: y, Right: a.Area.Right, Bottom: y + smallPitch}
	if k == 0 {
		a.Left(g.yTicks)
	}
	defer s.Block("small picture", box)()
	edge := s.TextRight(a.Area.Right, y+3.2, monoNote, e.ID)
	s.Text(a.Area.Left, y+3.2, bodyStyle, figure.Shorten(bodyStyle, sampleName(e), edge-a.Area.Left-1.5))
	if err := s.Try(func() { g.drawPicture(a, e) }); err != nil {
		s.Text(a.Area.Left, y+10, noteStyle.As(figure.Italic), "could not be drawn")
	}
}

// drawPicture draws typical curve, curve, readings, rail and figures.
func (g *smallGroup) drawPicture(a *figure.Axes, e *report.Evaluation) {
	if veq, ok := lastEndpoint(e); ok {
		laid := make([]figure.Point, len(g.ghost))
		for i, q := range g.ghost {
			laid[i] = figure.Point{X: q.X * veq, Y: q.Y * strength(e, veq)}
		}
		a.Curve(laid, rule(figure.Ghost, 2.2))
	}
	line := smallCurve(e.Picture)
	a.Curve(points(line), rule(figure.Blue, 0.6))
	used, out := apart(a, e.Picture.Dots)
	a.Readings(used, 0.6, false)
	a.Readings(out, 0.6, true)
	smallRail(a, e)
	g.drawFigures(a, e, line)
}

// apart returns the readings used and left out, without those that would lie
// on the one before.
func apart(a *figure.Axes, dots []report.Dot) (used, out []figure.Point) {
	const least = 0.6 // mm, the size of a disc
	last := figure.Point{X: -1e9}
	for _, d := range dots {
		p := figure.Point{X: d.VolumeML, Y: d.Value}
		at := a.At(p)
		if dx, dy := at.X-last.X, at.Y-last.Y; dx*dx+dy*dy < least*least {
			continue
		}
		last = at
		if d.LeftOut {
			out = append(out, p)
		} else {
			used = append(used, p)
		}
	}
	return used, out
}

// smallRail is the rail without figures.
func smallRail(a *figure.Axes, e *report.Evaluation) {
	s := a.Sheet
	foot := a.Area.Bottom
	s.Rule(rule(figure.Hair, 0.35), a.Area.Left, a.Area.Right, foot)
	for i := range e.Endpoints {
		p := &e.Endpoints[i]
		if a.X.Holds(p.VolumeML) {
			a.Drop(figure.Point{X: p.VolumeML, Y: readingAt(p, e.Picture)}, foot+smallLane/2, rule(figure.Blue, 0.4))
			s.Filled(kindShape(p.Kind), a.X.MM(p.VolumeML), foot+smallLane/2, 1.6, figure.Blue)
		}
	}
	for _, i := range e.Indicated {
		if a.X.Holds(i.VolumeML) {
			s.Open(kindShape(i.Kind), a.X.MM(i.VolumeML), foot+1.5*smallLane, 1.6, figure.Black)
		}
	}
}

// drawFigures writes volumes and differences into a corner that the curve
// leaves free.
func (g *smallGroup) drawFigures(a *figure.Axes, e *report.Evaluation, line []report.XY) {
	n := min(len(e.Endpoints), 3)
	if n == 0 {
		a.Sheet.Text(a.Area.Left+1, a.Area.Top+2.6, noteStyle.As(figure.Italic), "no endpoint")
		return
	}
	const w, gap = 8.5, 1.2
	width, high := 2*w+gap, noteLead*float64(n)
	x, top := freeCorner(a, line, width, high)
	for k := range n {
		p := &e.Endpoints[k]
		y := top + 2.4 + noteLead*float64(k)
		a.Sheet.TextRight(x+w, y, noteStyle.In(figure.Blue), g.mark.Of(p.Volume()))
		if p.Differs != nil {
			a.Sheet.TextRight(x+width, y, noteStyle.In(figure.Black), g.mark.Signed(p.Differs.Percent, 2))
		}
	}
}

// freeCorner is the top left of a place in a picture that its curve does not
// enter: above at the left, right or middle, then below, else the first.
func freeCorner(a *figure.Axes, line []report.XY, width, high float64) (x, y float64) {
	at := a.Area
	right, middle, below := at.Right-width-0.5, (at.Left+at.Right-width)/2, at.Bottom-high-0.9
	places := [...]figure.Point{{X: at.Left + 0.5, Y: at.Top}, {X: right, Y: at.Top}, {X: middle, Y: at.Top},
		{X: at.Left + 0.5, Y: below}, {X: right, Y: below}, {X: middle, Y: below}}
	for _, p := range places {
		if !enters(a, line, figure.Box{Left: p.X - 0.6, Top: p.Y - 0.2, Right: p.X + width + 0.6, Bottom: p.Y + high + 0.8}) {
			return p.X, p.Y
		}
	}
	return places[0].X, places[0].Y
}

// enters tells whether a curve passes through a box.
func enters(a *figure.Axes, line []report.XY, b figure.Box) bool {
	for i := 1; i < len(line); i++ {
		p, q := a.At(figure.Point(line[i-1])), a.At(figure.Point(line[i]))
		if b.Meets(p, q) {
			return true
		}
	}
	return false
}

// smallCurve is the curve of a picture, or its readings where it has none.
func smallCurve(p *report.Picture) []report.XY {
	if len(p.Curve) > 1 {
		return p.Curve
	}
	var out []report.XY
	for _, d := range p.Dots {
		if n := len(out); !d.LeftOut && (n == 0 || d.VolumeML > out[n-1].X) {
			out = append(out, report.XY{X: d.VolumeML, Y: d.Value})
		}
	}
	return out
}

func lastEndpoint(e *report.Evaluation) (ml float64, ok bool) {
	if n := len(e.Endpoints); n > 0 && e.Endpoints[n-1].VolumeML > 0 {
		return e.Endpoints[n-1].VolumeML, true
	}
	return 0, false
}

// strength is what readings are counted in: a conductivity grows with the
// strength of the sample, as the volume does; pH and mV do not.
func strength(e *report.Evaluation, veq float64) float64 {
	if e.Signal != "conductivity" {
		return 1
	}
	if y, ok := at(smallCurve(e.Picture), veq); ok && y > 0 {
		return y
	}
	return 1
}

// typical is the median of at least three runs at volumes counted in the
// endpoint's: strength aside, all good runs lie on it. It ends where less than
// three quarters of the runs go on.
func typical(runs []*report.Evaluation) []report.XY {
	const n = 90
	type scaled struct {
		line   []report.XY
		vx, vy float64
	}
	var all []scaled
	most := 0.0
	for _, e := range runs {
		v, ok := lastEndpoint(e)
		if line := smallCurve(e.Picture); ok && len(line) > 1 {
			all = append(all, scaled{line, v, strength(e, v)})
			most = max(most, line[len(line)-1].X/v)
		}
	}
	if len(all) < 3 || !(most < 100) {
		return nil
	}
	var out []report.XY
	for i := 0; i <= n; i++ {
		x := most * float64(i) / n
		var y []float64
		for _, s := range all {
			if v, ok := at(s.line, x*s.vx); ok && finite(v) {
				y = append(y, v/s.vy)
			}
		}
		if m, ok := median(y); ok && 4*len(y) >= 3*len(all) {
			out = append(out, report.XY{X: x, Y: m})
		}
	}
	return out
}
