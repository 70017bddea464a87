package pdf

import (
	"lastdrop/report"
	"lastdrop/report/figure"
)

// The live width: 12 columns of 11 mm, gutters of 4.
const (
	left  = 20.0
	right = 196.0
	live  = right - left
)

// Leading of the sizes of type, mm.
const (
	noteLead = 3.3
	bodyLead = 3.7
	leadLead = 4.6
)

// air is the white above the rule of a block, mm.
const air = 8.0

// The styles of the page language.
var (
	noteStyle   = figure.Style{Face: figure.Regular, SizePt: 6.5, Ink: figure.Second}
	monoNote    = figure.Style{Face: figure.Mono, SizePt: 6.5, Ink: figure.Second}
	monoBody    = figure.Style{Face: figure.Mono, SizePt: 8, Ink: figure.Black}
	bodyStyle   = figure.Style{Face: figure.Regular, SizePt: 8, Ink: figure.Black}
	titleStyle  = figure.Style{Face: figure.Bold, SizePt: 8, Ink: figure.Black}
	scaleStyle  = figure.Style{Face: figure.Medium, SizePt: 6.5, Ink: figure.Black}
	leadStyle   = figure.Style{Face: figure.Regular, SizePt: 10, Ink: figure.Black}
	headStyle   = figure.Style{Face: figure.Regular, SizePt: 15, Ink: figure.Black}
	numberStyle = figure.Style{Face: figure.Medium, SizePt: 20, Ink: figure.Black}
)

func rule(ink figure.Ink, widthPt float64) figure.Stroke {
	return figure.Stroke{Ink: ink, WidthPt: widthPt}
}

// blockRule opens a block; rowRule parts rows of a list.
var (
	blockRule = rule(figure.Black, 0.4)
	rowRule   = rule(figure.Grid, 0.35)
)

// footTop is where the footer begins, foot the last mm that blocks may use.
func (d *document) footTop() float64 { return d.height - 20.6 }
func (d *document) foot() float64    { return d.footTop() - 3 }

// frame draws header and footer when the returned function is called: last, so
// that the text of a page, read out or extracted, begins with its headline.
// identity stands before the page number, basis at the foot: what the page was
// made from.
func (d *document) frame(s *figure.Sheet, number int, identity, basis string) (finish func()) {
	return func() {
		d.header(s, number, identity)
		d.footer(s, basis)
	}
}

func (d *document) header(s *figure.Sheet, number int, identity string) {
	pageText := "page " + whole(number) + " of " + whole(len(d.pages))
	if n := len(d.volumes); n > 1 {
		pageText += ", volume " + whole(d.volume) + " of " + whole(n)
	}
	edge := right - figure.TextWidth(bodyStyle, pageText)
	if identity != "" {
		edge -= 3 + figure.TextWidth(monoNote, identity)
	}
	defer s.Block("header", figure.Box{Left: left, Top: 10, Right: right, Bottom: 17})()
	s.Drop(left+1.6, 13.2, 4)
	x := s.Text(left+4.2, 14.6, titleStyle, "lastdrop")
	when := d.when()
	room := edge - 3 - x - 3 - figure.TextWidth(bodyStyle, when) - 3
	if lab := d.n.Laboratory; lab != "" && room > 10 {
		x = s.Text(x+3, 14.6, bodyStyle, figure.Shorten(bodyStyle, lab, room))
	}
	s.Text(x+3, 14.6, bodyStyle.In(figure.Second), when)
	s.Text(edge, 14.6, monoNote, identity)
	s.TextRight(right, 14.6, bodyStyle, pageText)
	s.Rule(blockRule, left, right, 17)
}

// when tells the date of the publication and the days of the runs.
func (d *document) when() string {
	text := "published " + day(d.n.Date)
	if d.n.FirstDay != "" || d.n.LastDay != "" {
		text += ", runs of " + days(d.n.FirstDay, d.n.LastDay)
	}
	return text
}

func (d *document) footer(s *figure.Sheet, basis string) {
	y := d.footTop()
	defer s.Block("footer", figure.Box{Left: left, Top: y, Right: right, Bottom: y + 9})()
	s.Rule(rowRule, left, right, y)
	s.Text(left, y+3.6, noteStyle, report.Caution)
	if d.n.Invented {
		s.Text(left, y+3.6+noteLead, noteStyle.As(figure.Medium), report.InventedNote)
	}
	text := "lastdrop " + d.n.Lastdrop
	if basis != "" {
		text += ", " + basis
	}
	s.TextRight(right, y+3.6+noteLead, noteStyle, text)
}

// thumb draws the mark in the right margin by which a printed stack is
// thumbed.
func (d *document) thumb(s *figure.Sheet, v report.Verdict) {
	b := figure.Box{Left: d.width - 9, Right: d.width - 5}
	edge := rule(figure.Black, 0.6)
	switch v {
	case report.VerdictSound:
		b.Top, b.Bottom = 76, 96
		s.Outline(rule(figure.Second, 0.75), corners(b)...)
	case report.VerdictDoubtful:
		b.Top, b.Bottom = 52, 72
		half := b
		half.Top = 62
		s.FillBox(figure.Amber, half)
		s.Outline(edge, corners(b)...)
	default:
		b.Top, b.Bottom = 28, 48
		s.FillBox(figure.Warm, b)
	}
}

func corners(b figure.Box) []figure.Point {
	return []figure.Point{{X: b.Left, Y: b.Top}, {X: b.Right, Y: b.Top}, {X: b.Right, Y: b.Bottom}, {X: b.Left, Y: b.Bottom}}
}

// verdictMark is the mark of a verdict.
func verdictMark(v report.Verdict) figure.Urgency {
	switch v {
	case report.VerdictSound:
		return figure.Calm
	case report.VerdictDoubtful:
		return figure.Look
	}
	return figure.Settle
}

// kindShape is the shape of a kind of endpoint.
func kindShape(kind string) figure.Shape {
	switch kind {
	case "inflection":
		return figure.Triangle
	case "at-reading":
		return figure.Square
	case "break":
		return figure.Lozenge
	}
	return figure.Disc
}

// blockTitle draws the rule, title and note of a block and returns the
// baseline of its title.
func blockTitle(s *figure.Sheet, from, to, y float64, title, note string) float64 {
	s.Rule(blockRule, from, to, y)
	x := s.Text(from, y+4.3, titleStyle, title)
	if note != "" {
		s.Text(x+2.5, y+4.3, noteStyle, figure.Shorten(noteStyle, note, to-x-2.5))
	}
	return y + 4.3
}

// paragraph sets lines one below the other and returns the next baseline.
func paragraph(s *figure.Sheet, x, y, lead float64, st figure.Style, lines []string) float64 {
	for _, l := range lines {
		s.Text(x, y, st, l)
		y += lead
	}
	return y
}

// drawFailure replaces a page that could not be drawn.
func (d *document) drawFailure(s *figure.Sheet, number int, p *page, says string) {
	defer d.frame(s, number, "", "")()
	s.Text(left, 28, headStyle.As(figure.Bold), "This page could not be drawn.")
	y := paragraph(s, left, 35, leadLead, leadStyle, figure.Wrap(leadStyle, "The figures of the run are in evaluations.jsonl and summary.xlsx; they are not affected.", live))
	y += 4
	for _, f := range append(append([]string{p.what}, p.facts...), "why: "+says) {
		y = paragraph(s, left, y, bodyLead, bodyStyle, figure.WrapAtMost(bodyStyle, f, live, 6)) + 1
	}
}
