package pdf

import (
	"strings"

	"lastdrop/report"
	"lastdrop/report/figure"
)

// strip is what a column of text keeps together on one page: lines, and what
// stands left of the first.
type strip struct {
	mark  figure.Urgency // 0 for none
	key   string         // of a fact
	name  string         // of a flag, or a small title
	note  string         // behind the name
	lines []string
	style figure.Style
	after []string // in italics, what to do
	x     float64  // of the lines, from the left edge of the column
	white float64  // below
}

func (p *strip) height() float64 {
	h := bodyLead*float64(len(p.lines)) + p.white + noteLead*float64(len(p.after))
	if p.name != "" {
		h += bodyLead
	}
	return h
}

func height(strips []strip) float64 {
	h := 0.0
	for i := range strips {
		h += strips[i].height()
	}
	return h
}

// fit returns the end of the strips that fit the room; one that is higher
// than a whole page is let through.
func fit(strips []strip, from int, room float64) (to int) {
	for to = from; to < len(strips); to++ {
		room -= strips[to].height()
		if room < -strips[to].white && (to > from || room > -200) {
			return to
		}
	}
	return to
}

func (p *strip) draw(s *figure.Sheet, x, y float64) {
	if p.mark != 0 {
		s.Urgent(p.mark, x+1.4, y-1, 2.5)
	}
	if p.name != "" {
		st := monoBody
		if p.mark == 0 && p.note == "" {
			st = titleStyle
		}
		end := s.Text(x+p.x, y, st, p.name)
		s.Text(end+2, y, noteStyle, p.note)
		y += bodyLead
	}
	if p.key != "" {
		s.Text(x, y, bodyStyle.In(figure.Second), p.key)
	}
	y = paragraph(s, x+p.x, y, bodyLead, p.style, p.lines)
	paragraph(s, x+p.x, y-0.2, noteLead, noteStyle.As(figure.Italic), p.after)
}

const (
	columnHead = 9.4 // from the rule of a column to its first baseline
	flagIndent = 4.6
	factIndent = 25.0
)

// whyStrips are the flags of a run in sentences, heaviest first. What to do
// about the first stands in the headline.
func whyStrips(e *report.Evaluation, m report.Decimal) []strip {
	var out []strip
	first := heaviest(e)
	for i := range e.Flags {
		f := &e.Flags[i]
		p := strip{name: f.Flag, note: string(f.Weight), style: bodyStyle, x: flagIndent, white: 2.2}
		p.lines = figure.Wrap(bodyStyle, m.Says(f.Says), columnEnd-left-flagIndent)
		switch f.Weight {
		case report.Disputed:
			p.mark = figure.Settle
		case report.Doubtful:
			p.mark = figure.Look
		}
		if f.Endpoint > 0 && len(e.Endpoints) > 1 {
			p.note += ", endpoint " + whole(f.Endpoint)
		}
		if w, ok := report.Words(f.Flag); ok && f != first && f.Weight != report.Note {
			p.after = figure.Wrap(noteStyle.As(figure.Italic), w.Do, columnEnd-left-flagIndent)
		}
		out = append(out, p)
	}
	if len(out) == 0 {
		out = append(out, strip{style: bodyStyle, lines: figure.Wrap(bodyStyle, "No flag speaks against this run. Sound means "+report.SoundMeans+".", columnEnd-left)})
	}
	return out
}

// refitStrips tell what the refit took; they stand under the
// shorter column.
func refitStrips(e *report.Evaluation, m report.Decimal) []strip {
	d := &e.Diagnostics
	readings := whole(e.Readings)
	if d.LeftOut > 0 {
		readings += ", " + whole(d.LeftOut) + " left out of the fit"
	}
	out := []strip{{name: "What the refit took", style: bodyStyle}, fact("readings", readings)}
	if d.V0ML != nil {
		out = append(out, fact("volume before", m.Short(*d.V0ML, 6)+" mL"))
	}
	if noise := m.Of(noiseText(e)); noise != "" {
		out = append(out, fact("noise of a reading", noise))
	}
	return append(out, fact("schema", e.Schema))
}

// noiseText tells how far readings scatter about the curve.
func noiseText(e *report.Evaluation) string {
	d := &e.Diagnostics
	switch {
	case d.RelativeNoisePercent != nil:
		return report.Short(*d.RelativeNoisePercent, 2) + " %"
	case d.ReadingNoise != nil && d.ResidualSD != nil:
		return report.Short(*d.ReadingNoise, 2) + " " + unitOf(e) + "; residuals " + report.Short(*d.ResidualSD, 2) + " times that"
	case d.ReadingNoise != nil:
		return report.Short(*d.ReadingNoise, 2) + " " + unitOf(e)
	}
	return ""
}

// factStrips are the facts as the dump says them.
func factStrips(e *report.Evaluation, m report.Decimal) []strip {
	f := &e.Facts
	var out []strip
	number := func(v *float64, unit string) string { return m.Of(number(v, unit)) }
	add := func(key, value string) {
		if strings.TrimSpace(value) != "" {
			out = append(out, fact(key, value))
		}
	}
	add("sample", orDash(f.Sample))
	add("procedure", orDash(f.Procedure))
	add("instrument", f.Instrument)
	add("operator", f.Operator)
	add("purpose", f.Purpose)
	add("started", moment(f.Started))
	add("titrant", titrant(f.Titrant, f.TitrantMolPerL, m))
	add("aliquot", strings.TrimPrefix(number(f.AliquotML, "mL")+prefixed(", solvent ", number(f.SolventML, "mL")), ", "))
	add("reaction", f.Reaction)
	add("temperature", number(f.TemperatureC, "°C"))
	add("end reading", number(f.EndReading, unitOf(e)))
	for _, o := range f.Other {
		add(o.Key, o.Value)
	}
	add("dump", place(orDash(e.Dump), e.Line, 0)+", run "+whole(e.Run))
	for _, a := range e.Also {
		add("also in", a)
	}
	for i, r := range e.Repairs {
		if i == 3 && len(e.Repairs) > 4 {
			add("repairs", whole(len(e.Repairs)-3)+" more, in evaluations.jsonl")
			break
		}
		add("repair", r)
	}
	return out
}

func fact(key, value string) strip {
	const w = right - columnStart - factIndent
	return strip{
		key: figure.Shorten(bodyStyle, key, factIndent-1.5), x: factIndent, style: bodyStyle,
		lines: figure.WrapAtMost(bodyStyle, orDash(value), w, 3),
	}
}

func number(v *float64, unit string) string {
	if v == nil {
		return ""
	}
	if unit == "pH" {
		return "pH " + report.Short(*v, 6)
	}
	return report.Short(*v, 6) + " " + unit
}

// prefixed puts words before a value that is there.
func prefixed(words, value string) string {
	if value == "" {
		return ""
	}
	return words + value
}

func titrant(name string, molPerL *float64, m report.Decimal) string {
	if molPerL == nil {
		return name
	}
	return strings.TrimSpace(name + " " + m.Short(*molPerL, 6) + " mol/L")
}

// unitOf is the unit of a run's readings, by its signal.
func unitOf(e *report.Evaluation) string {
	switch e.Signal {
	case "potential":
		return "mV"
	case "conductivity":
		return "mS/cm"
	}
	return "pH"
}

// drawColumns draws the columns of text that fall on a page.
func (r *runPage) drawColumns(s *figure.Sheet, part int, y float64) {
	whyFrom, factsFrom, c := 0, 0, r.cuts[part]
	if part > 0 {
		whyFrom, factsFrom = r.cuts[part-1].whyTo, r.cuts[part-1].factsTo
	}
	why, facts := r.why[whyFrom:c.whyTo], r.facts[factsFrom:c.factsTo]
	title, note := "Why it is "+string(r.e.Verdict), ""
	if r.e.Verdict == report.VerdictSound {
		title = "Flags"
	}
	if part == 0 && c.whyTo < len(r.why) || part == 0 && c.factsTo < len(r.facts) {
		note = "continued on the next page"
	}
	foot := r.d.footTop()
	if len(why) > 0 {
		r.drawColumn(s, figure.Box{Left: left, Top: y, Right: columnEnd, Bottom: foot}, title, note, why)
	}
	if len(facts) > 0 {
		r.drawColumn(s, figure.Box{Left: columnStart, Top: y, Right: right, Bottom: foot}, "Facts", "as the dump says", facts)
	}
}

func (r *runPage) drawColumn(s *figure.Sheet, b figure.Box, title, note string, strips []strip) {
	defer s.Block(title, b)()
	blockTitle(s, b.Left, b.Right, b.Top, title, note)
	y := b.Top + columnHead
	for i := range strips {
		strips[i].draw(s, b.Left, y)
		y += strips[i].height()
	}
}
