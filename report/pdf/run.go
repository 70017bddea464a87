package pdf

import (
	"fmt"
	"math"
	"strings"

	"lastdrop/report"
	"lastdrop/report/figure"
)

// runPage is the large page of one run, and those it continues on when there
// is more to tell than one page holds.
type runPage struct {
	d       *document
	e       *report.Evaluation
	head    runHead
	figTop  float64 // of the figures' titles
	figFoot float64 // of the axis name under the last panel
	why     []strip // left column under the figures
	facts   []strip // right column
	cuts    []cut   // how the columns fall on the pages
}

// runHead is what stands above the figures.
type runHead struct {
	verdict, headline string
	identity          string
	do                []string
	figures           item
}

// Heights of the figures of a run, mm: the main plot, and all of it with rail,
// residuals and axis.
const (
	plotHeight   = 84.0
	figureHeight = 127.0
)

// columnEnd and columnStart are the inner edges of the two columns of text.
const (
	columnEnd   = 106.0
	columnStart = 110.0
)

func newRunPage(d *document, e *report.Evaluation) *runPage {
	r := &runPage{d: d, e: e, head: newRunHead(e, d.mark)}
	y := 43.4 + leadLead*float64(max(len(r.head.do)-1, 0))
	if len(r.head.do) == 0 {
		y -= 5
	}
	r.figTop = y + 6 + r.head.figures.height + 4.5
	r.figFoot = r.figTop + figureHeight - d.figureLess
	r.why, r.facts = whyStrips(e, d.mark), factStrips(e, d.mark)
	shorter := &r.why
	if height(r.facts) < height(r.why) {
		shorter = &r.facts
	}
	(*shorter)[len(*shorter)-1].white = 2.2
	*shorter = append(*shorter, refitStrips(e, d.mark)...)
	r.cut()
	return r
}

func newRunHead(e *report.Evaluation, m report.Decimal) runHead {
	h := runHead{verdict: string(e.Verdict), headline: report.SoundMeans, figures: figuresItem(e, m)}
	if f := heaviest(e); f != nil && e.Verdict != report.VerdictSound {
		w, _ := report.Words(f.Flag)
		h.headline = w.Headline
		h.do = figure.Wrap(leadStyle, w.Do, right-headX)
	}
	h.identity = procedureName(e)
	if e.Facts.Instrument != "" {
		h.identity += ", " + e.Facts.Instrument
	}
	return h
}

// cut says which strips of the two columns stand on a page.
type cut struct {
	whyTo, factsTo int
}

// cut lets the columns fall on as many pages as they need.
func (r *runPage) cut() {
	top := r.figFoot + 5
	c := cut{}
	for len(r.cuts) < 40 {
		room := r.d.foot() - top - columnHead
		c = cut{whyTo: fit(r.why, c.whyTo, room), factsTo: fit(r.facts, c.factsTo, room)}
		r.cuts = append(r.cuts, c)
		if c.whyTo == len(r.why) && c.factsTo == len(r.facts) {
			return
		}
		top = furtherTop
	}
}

// furtherTop is where the columns begin on a page that continues a run.
const furtherTop = 36.0

func (r *runPage) parts() int { return len(r.cuts) }

// headX is where the words of a headline begin, after the mark.
const headX = 28.6

func (r *runPage) drawFirst(s *figure.Sheet, number int) {
	defer r.frame(s, number)()
	r.drawHead(s)
	r.drawFigures(s)
	r.drawColumns(s, 0, r.figFoot+5)
}

func (r *runPage) drawFurther(s *figure.Sheet, number, part int) {
	defer r.frame(s, number)()
	end := s.Block("run head", figure.Box{Left: left, Top: 20, Right: right, Bottom: furtherTop})
	s.Urgent(verdictMark(r.e.Verdict), left+1.8, 26.4, 3.2)
	x := s.Text(headX-2.6, 27.4, leadStyle.As(figure.Bold), r.head.verdict)
	x = s.Text(x+2, 27.4, leadStyle, figure.Shorten(leadStyle, sampleName(r.e), right-x-24))
	s.Text(x+2, 27.4, leadStyle.In(figure.Second), "continued")
	end()
	r.drawColumns(s, part, furtherTop)
}

func (r *runPage) frame(s *figure.Sheet, number int) (finish func()) {
	e := r.e
	r.d.thumb(s, e.Verdict)
	return r.d.frame(s, number, strings.TrimSpace(e.ID+"  revision "+whole(e.Revision)), "dump sha256 "+hash(e.DumpSHA256))
}

// hash is the beginning of a hash, in fours.
func hash(sha string) string {
	if len(sha) < 16 {
		return orDash(sha)
	}
	return sha[:4] + " " + sha[4:8] + " " + sha[8:12] + " " + sha[12:16] + " …"
}

func sampleName(e *report.Evaluation) string {
	if e.Facts.Sample == "" {
		return "no sample stated"
	}
	return e.Facts.Sample
}

func (r *runPage) drawHead(s *figure.Sheet) {
	h := &r.head
	defer s.Block("run head", figure.Box{Left: left, Top: 20, Right: right, Bottom: r.figTop - 4})()
	s.Urgent(verdictMark(r.e.Verdict), left+3.2, 25, 6)
	x := s.Text(headX, 27, headStyle.As(figure.Bold), h.verdict)
	s.Text(x+2.4, 27, headStyle, figure.Shorten(headStyle, h.headline, right-x-2.4))
	rest := leadStyle.In(figure.Second)
	identity := figure.Shorten(rest, h.identity, 80)
	sample := leadStyle.As(figure.Medium)
	x = s.Text(headX, 33.2, sample, figure.Shorten(sample, sampleName(r.e), right-headX-3-figure.TextWidth(rest, identity)))
	s.Text(x+2.4, 33.2, rest, identity)
	y := paragraph(s, headX, 38.2, leadLead, leadStyle, h.do)
	if r.e.Dump != "" {
		command(s, headX, y+0.4, lookLabel(r.e.Dump), look(r.e.Dump))
	}
	h.figures.draw(s, y+0.4+6)
}

// figuresItem are the four large figures of a run, or one row an endpoint.
func figuresItem(e *report.Evaluation, m report.Decimal) item {
	if len(e.Endpoints) > 1 {
		return endpointRows(e, m)
	}
	return item{height: 16.4, draw: func(s *figure.Sheet, y float64) {
		for i, b := range bigFigures(e, m) {
			b.draw(s, left+45*float64(i), y)
		}
	}}
}

// bigFigure is a figure in large type under the rule of its owner.
type bigFigure struct {
	label, value, unit, note string
	owner                    figure.Ink
	mono                     bool
}

func (b bigFigure) draw(s *figure.Sheet, x, y float64) {
	const w = 41.0
	defer s.Block("figure", figure.Box{Left: x, Top: y, Right: x + w, Bottom: y + 16.4})()
	s.Rule(rule(b.owner, 1), x, x+w, y)
	text := b.owner
	if text == figure.Warm {
		text = figure.Black
	}
	label := scaleStyle.In(text)
	if b.mono {
		label = monoNote.In(text)
	}
	s.Text(x, y+3.4, label, figure.Shorten(label, b.label, w))
	number := numberStyle.In(text)
	unit := bodyStyle.In(text)
	if figure.TextWidth(number, b.value)+1.6+figure.TextWidth(unit, b.unit) > w {
		number.SizePt = leadStyle.SizePt
	}
	if figure.TextWidth(number, b.value) > w { // a figure is never cut
		s.Fail(fmt.Errorf("%s: %.12s… is too long a figure", b.label, b.value))
	}
	end := s.Text(x, y+11.4, number, b.value)
	if b.value != report.Dash {
		s.Text(end+1.6, y+11.4, unit, figure.Shorten(unit, b.unit, max(x+w-end-1.6, 3)))
	}
	s.Text(x, y+15.4, noteStyle, figure.Shorten(noteStyle, b.note, w))
}

// bigFigures of a run with one endpoint or none.
func bigFigures(e *report.Evaluation, m report.Decimal) [4]bigFigure {
	refit := bigFigure{label: "refit", value: report.Dash, note: "no endpoint found", owner: figure.Blue, unit: "mL"}
	indicated := bigFigure{label: "indicated", value: report.Dash, note: "the instrument wrote none", owner: figure.Black, unit: "mL"}
	apart := bigFigure{label: "refit − indicated", value: report.Dash, note: "nothing to compare", owner: figure.Black, unit: "mL"}
	var p *report.Endpoint
	if len(e.Endpoints) > 0 {
		p = &e.Endpoints[0]
		refit.label, refit.value = "refit, "+p.Kind, m.Of(p.Volume())
		refit.note = intervalNote(m.Of(p.Interval()), 41)
	}
	if i := indicatedOf(e, p, 0); i != nil {
		indicated.label, indicated.value = "indicated, "+i.Kind, m.Of(i.Volume())
		indicated.note = "as the instrument wrote it"
		if i.Line > 0 {
			indicated.note += ", line " + whole(i.Line)
		}
		if more := len(e.Indicated) - 1; more > 0 {
			indicated.note += "; " + whole(more) + " more"
		}
		if p != nil {
			apart.note = "unlike kinds are not compared"
		}
	}
	if p != nil && p.Differs != nil {
		apart.label += ", " + p.Differs.Kind
		apart.value, apart.note = m.Of(p.Difference()), apartNote(p, m)
	}
	return [4]bigFigure{refit, indicated, apart, doubtFigure(e, m)}
}

// intervalNote says what the interval is made of: the readings only, no
// burette.
func intervalNote(interval string, width float64) string {
	note := "95 % from readings: " + interval
	if figure.TextWidth(noteStyle, note) > width {
		note = "95 %, readings: " + interval
	}
	return note
}

func apartNote(p *report.Endpoint, m report.Decimal) string {
	return m.Of(p.DifferencePercent()) + " % of refit; limit " + m.Of(p.DifferenceLimit()) + " mL"
}

// indicatedOf returns the indicated endpoint that belongs to the k-th refitted
// one: the one it was compared with, else the k-th if there are as many, nil
// if none can be told.
func indicatedOf(e *report.Evaluation, p *report.Endpoint, k int) *report.Indicated {
	if p != nil && p.Differs != nil {
		for i := range e.Indicated {
			if e.Indicated[i].VolumeML == p.Differs.IndicatedML && e.Indicated[i].Kind == p.Differs.Kind {
				return &e.Indicated[i]
			}
		}
	}
	if k < len(e.Indicated) && (k == 0 && len(e.Endpoints) <= 1 || len(e.Indicated) == len(e.Endpoints)) {
		return &e.Indicated[k]
	}
	return nil
}

// doubtFigure is the figure of the flag that makes the verdict, with its
// limit. Where that has none, or says what stands beside it, the place is for
// the reading at the endpoint or for how many readings there are.
func doubtFigure(e *report.Evaluation, m report.Decimal) bigFigure {
	b := bigFigure{label: "readings", value: whole(e.Readings), note: leftOut(e), owner: figure.Black}
	f := heaviest(e)
	if f != nil && f.Figure != 0 && f.Limit != 0 && f.Flag != "disagrees" {
		b = bigFigure{label: f.Flag, value: m.Of(amount(f.Figure, f.Unit)), unit: f.Unit, owner: figure.Warm, mono: true}
		b.note = "limit " + m.Of(amount(f.Limit, f.Unit)) + " " + f.Unit
	} else if len(e.Endpoints) == 1 && e.Endpoints[0].Reading != nil && e.Signal != "conductivity" {
		value, unit := splitReading(e, *e.Endpoints[0].Reading, m)
		b = bigFigure{label: "reading at the refit", value: value, unit: unit, owner: figure.Blue, note: whole(e.Readings) + " readings, " + b.note}
		b.note = strings.TrimSuffix(b.note, " of the fit")
	}
	return b
}

// leftOut tells how many readings the fit did not use: those that a flag names,
// or, of a break, how many each arm has.
func leftOut(e *report.Evaluation) string {
	if e.Picture != nil && len(e.Picture.Arms) > 0 {
		return inArms(e.Picture.Arms)
	}
	if n := e.Diagnostics.LeftOut; n > 0 {
		return whole(n) + " left out of the fit"
	}
	return "none left out of the fit"
}

// inArms counts the readings of each arm.
func inArms(arms []report.Arm) string {
	said := whole(arms[0].Readings)
	for i := 1; i < len(arms); i++ {
		joint := ", "
		if i+1 == len(arms) {
			joint = " and "
		}
		said += joint + whole(arms[i].Readings)
	}
	if len(arms) == 1 {
		return said + " in the one arm"
	}
	return said + " in the arms"
}

// amount prints a figure or limit of a flag as the flag's sentence does.
func amount(v float64, unit string) string {
	switch {
	case unit != "mL":
		return report.Short(v, 2)
	case math.Abs(v) < 0.01:
		return report.Fixed(v, 4)
	}
	return report.Fixed(v, 3)
}
