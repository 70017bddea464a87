package pdf

import (
	"sort"
	"strings"
	"unicode"

	"lastdrop/report"
	"lastdrop/report/figure"
)

// markRuns is how many runs of a procedure stand as one mark each; where
// there are more, bars whose length counts stand for them.
const markRuns = 14

// group is the runs of one procedure, in the order they were run.
type group struct {
	procedure string
	runs      []*report.Evaluation
}

// groups sorts the night by procedure; runs without one come last.
func (d *document) groups() []group {
	at := map[string]int{}
	var out []group
	for i := range d.n.Evaluations {
		e := &d.n.Evaluations[i]
		k, ok := at[e.Facts.Procedure]
		if !ok {
			k = len(out)
			at[e.Facts.Procedure] = k
			out = append(out, group{procedure: e.Facts.Procedure})
		}
		out[k].runs = append(out[k].runs, e)
	}
	sort.Slice(out, func(a, b int) bool {
		if (out[a].procedure == "") != (out[b].procedure == "") {
			return out[b].procedure == ""
		}
		return out[a].procedure < out[b].procedure
	})
	for _, g := range out {
		sort.SliceStable(g.runs, func(a, b int) bool { return earlier(g.runs[a], g.runs[b]) })
	}
	return out
}

// earlier orders by start; runs without one come last.
func earlier(a, b *report.Evaluation) bool {
	if (a.Facts.Started == "") != (b.Facts.Started == "") {
		return b.Facts.Started == ""
	}
	return a.Facts.Started < b.Facts.Started
}

func (g *group) count(v report.Verdict) int {
	n := 0
	for _, e := range g.runs {
		if e.Verdict == v {
			n++
		}
	}
	return n
}

// Right edges of the counts, mm.
var countEnds = [...]float64{120, 129.5, 138}

const (
	markX     = 62.0
	markPitch = 3.4
)

// proceduresSection is every run of the night by procedure.
func (d *document) proceduresSection() section {
	half := d.halfScale()
	groups := d.groups()
	most := markRuns
	for _, g := range groups {
		most = max(most, len(g.runs))
	}
	sec := section{head: item{height: 5.6, draw: procedureHead}, foot: item{height: 6.5, draw: func(s *figure.Sheet, y float64) {
		d.laneAxis(s, half, y)
		s.TextRight(138, y+3.4, noteStyle, "one stroke a run; right: the median")
	}}}
	for _, g := range groups {
		sec.rows = append(sec.rows, item{height: 4.9, draw: func(s *figure.Sheet, y float64) {
			d.drawGroup(s, &g, half, y, markPitch*markRuns/float64(most))
		}})
	}
	return sec
}

func procedureHead(s *figure.Sheet, y float64) {
	blockTitle(s, left, markX+48, y, "Every run of the night, by procedure", "in the order they were run")
	s.Rule(blockRule, markX+48, right, y)
	for i, word := range [...]string{"disputed", "doubtful", "sound"} {
		s.TextRight(countEnds[i], y+4.3, noteStyle, word)
	}
	s.TextRight(valueEnd, y+4.3, scaleStyle, "refit − indicated, %")
}

func (d *document) drawGroup(s *figure.Sheet, g *group, half, y, perRun float64) {
	base := y + 3.4
	name := g.procedure
	if name == "" {
		name = "no procedure named"
	}
	s.Text(left, base, bodyStyle, figure.Shorten(bodyStyle, name, markX-left-2))
	if len(g.runs) <= markRuns {
		for i, e := range g.runs {
			s.Urgent(verdictMark(e.Verdict), markX+1.4+markPitch*float64(i), y+2.45, 2.5)
		}
	} else {
		verdictBar(s, g, y+2.45, perRun)
	}
	for i, v := range [...]report.Verdict{report.VerdictDisputed, report.VerdictDoubtful, report.VerdictSound} {
		count, st := g.count(v), bodyStyle
		if v != report.VerdictSound && count > 0 {
			st = titleStyle
		}
		text := whole(count)
		if count == 0 {
			text = report.Dash
		}
		s.TextRight(countEnds[i], base, st, text)
	}
	d.drawStrip(s, g, half, y)
	s.Rule(rowRule, left, right, y+4.9)
}

// verdictBar is a bar whose length counts runs, cut by verdict.
func verdictBar(s *figure.Sheet, g *group, y, perRun float64) {
	x := markX
	for _, v := range [...]report.Verdict{report.VerdictDisputed, report.VerdictDoubtful, report.VerdictSound} {
		n := g.count(v)
		if n == 0 {
			continue
		}
		b := figure.Box{Left: x, Top: y - 1.1, Right: x + max(perRun*float64(n), 0.7), Bottom: y + 1.1}
		switch v {
		case report.VerdictDisputed:
			s.FillBox(figure.Warm, b)
		case report.VerdictDoubtful:
			s.FillBox(figure.Amber, b)
			s.Outline(rule(figure.Black, 0.6), corners(b)...)
		default:
			s.Outline(rule(figure.Second, 0.75), corners(b)...)
		}
		x = b.Right + 0.5
	}
}

// drawStrip draws the differences of all runs of a procedure, and the median.
func (d *document) drawStrip(s *figure.Sheet, g *group, half, y float64) {
	l := d.lane(s, half)
	var all []float64
	for _, e := range g.runs {
		if x, _ := worst(e); x != nil {
			all = append(all, x.Percent)
		}
	}
	l.Upright(0, y, y+4.9, rule(figure.Hair, 0.35))
	for _, v := range all {
		if l.X.Holds(v) {
			l.Upright(v, y+1.2, y+3.7, rule(figure.Blue, 0.55))
		} else {
			l.Point(v, y+2.45, figure.Disc, 1.8, figure.Blue, false)
		}
	}
	text, st := report.Dash, noteStyle.In(figure.Black)
	if m, ok := median(all); ok {
		text = d.mark.Signed(m, 2)
	}
	s.TextRight(valueEnd, y+3.4, st, text)
}

// unreadMost is how many unread dumps the pages list; a folder of the wrong
// files must not bury the pages of the runs.
const unreadMost = 60

// unreadX is where reason and next step of an unread dump stand, mm.
const unreadX = 82.0

// unreadSection lists what could not be read: place, reason, next step.
func (d *document) unreadSection() section {
	sec := section{head: item{height: 6, draw: func(s *figure.Sheet, y float64) {
		blockTitle(s, left, right, y, "Unread", "place in the dump, reason and next step; these have no result")
	}}}
	for i := range d.n.Unread[:min(len(d.n.Unread), unreadMost)] {
		sec.rows = append(sec.rows, unreadRow(&d.n.Unread[i]))
	}
	if more := len(d.n.Unread) - unreadMost; more > 0 {
		sec.rows = append(sec.rows, item{height: 5.8, draw: func(s *figure.Sheet, y float64) {
			s.Text(sampleX, y+3.9, bodyStyle, "And "+whole(more)+" more, in the sheet Unread of summary.xlsx and in unread.jsonl.")
		}})
	}
	return sec
}

func unreadRow(u *report.Unread) item {
	where := figure.WrapAtMost(monoNote, place(u.Dump, u.Line, u.Column), unreadX-sampleX-3, 3)
	under := figure.Wrap(noteStyle, unreadNote(u), unreadX-sampleX-3)
	why := figure.WrapAtMost(bodyStyle, unreadReason(u), right-unreadX, 4)
	var next []string
	if u.Next != "" {
		next = figure.Wrap(monoNote, u.Next, right-unreadX)
	}
	h := 2.1 + max(noteLead*float64(len(where)+len(under)), bodyLead*float64(len(why))+noteLead*float64(len(next)))
	return item{height: h, draw: func(s *figure.Sheet, y float64) {
		s.Urgent(figure.Missing, left+1.8, y+2.7, 2.5)
		at := paragraph(s, sampleX, y+3.5, noteLead, monoNote.In(figure.Black), where)
		paragraph(s, sampleX, at, noteLead, noteStyle, under)
		at = paragraph(s, unreadX, y+3.5, bodyLead, bodyStyle, why)
		paragraph(s, unreadX, at-0.2, noteLead, monoNote.In(figure.Blue), next)
		s.Rule(rowRule, left, right, y+h)
	}}
}

// unreadNote is what stands under the place.
func unreadNote(u *report.Unread) string {
	var parts []string
	if u.Run > 0 {
		parts = append(parts, "run "+whole(u.Run)+" of the dump")
	}
	if u.State == "earlier" {
		parts = append(parts, "unread since an earlier sweep")
	}
	return strings.Join(parts, ", ")
}

// unreadReason is field, what was found, and what to do.
func unreadReason(u *report.Unread) string {
	text := sentence(u.Says)
	if u.Field != "" {
		text = u.Field + ": " + u.Says
	}
	text = strings.TrimSuffix(text, ".") + "."
	if u.Hint != "" {
		text += " " + sentence(strings.TrimSuffix(u.Hint, ".")) + "."
	}
	return text
}

// sentence begins with a capital, unless its first word is a key or a name
// that a capital would change.
func sentence(s string) string {
	first, _, _ := strings.Cut(s, " ")
	for _, r := range first {
		if !unicode.IsLower(r) {
			return s
		}
	}
	return capital(s)
}
