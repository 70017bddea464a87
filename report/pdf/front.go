package pdf

import (
	"strings"

	"lastdrop/report"
	"lastdrop/report/figure"
	"lastdrop/report/pdf/paper"
)

// planFront plans the front page and those it continues on.
func (d *document) planFront() {
	f := newFlow(17, 24, d.foot())
	if d.volume > 1 {
		f.put(d.volumeItem())
		f.addSection(6, d.contentsSection())
		d.addFront(f, "volume "+whole(d.volume))
		return
	}
	f.put(d.headlineItem())
	f.add(6, d.totalsItem())
	list := d.listSection()
	f.addSection(air, list)
	f.addSection(air, d.proceduresSection())
	at := f.addSection(air, d.unreadSection())
	if len(d.urgent) == 0 && at < 0 {
		f = d.smallBelow(f)
	}
	if at >= 0 {
		d.unreadAt = stretch{1, at + 1, 1, at + 1}
	}
	d.addFront(f, "night, front page")
	if at >= 0 {
		d.pages[at].bookmarks = append(d.pages[at].bookmarks, paper.Bookmark{Text: "unread"})
	}
}

// addFront adds the pages of a flow as the front of a volume.
func (d *document) addFront(f *flow, bookmark string) {
	for i, items := range f.pages {
		p := page{what: "front page", draw: func(s *figure.Sheet, number int) {
			defer d.frame(s, number, "", "")()
			drawItems(s, items)
		}}
		if i == 0 {
			p.bookmarks = []paper.Bookmark{{Text: bookmark}}
		}
		d.pages = append(d.pages, p)
	}
}

// headline returns what happened, what to do and the next command.
func (d *document) headline() (happened, do, next string) {
	happened, do = d.n.Headline()
	do = strings.TrimSpace(do + " " + d.besides())
	if len(d.urgent) == 0 {
		return happened, do, ""
	}
	first := &d.n.Evaluations[d.urgent[0]]
	return happened, do + " Begin with " + name(first) + ".", lookAt(first)
}

// besides tells what else a reader must know of the night. Dumps that wait are
// not told here: they change with the clock, and published pages do not.
func (d *document) besides() string {
	var said []string
	if d.n.Estimator != "" {
		said = append(said, "The estimator "+d.n.Estimator+" was asked for by name.")
	}
	if n := len(d.volumes); n > 1 {
		said = append(said, "The pages fill "+report.Number(n)+" volumes: this one"+furtherNames(n)+".")
	}
	return strings.Join(said, " ")
}

// firstDump is the dump of the most urgent run.
func (d *document) firstDump() string {
	if len(d.urgent) == 0 {
		return ""
	}
	return d.n.Evaluations[d.urgent[0]].Dump
}

// lookLabel says what a look command is for and where it works: a page cannot
// know where the swept folders lie.
func lookLabel(dump string) string {
	folder, _, found := strings.Cut(dump, "/")
	if !found {
		return "To look closer:"
	}
	return "To look closer, where " + figure.Shorten(bodyStyle, folder, 30) + " lies:"
}

// lookAt is the command that shows the run's dump, "" for a run without one.
func lookAt(e *report.Evaluation) string {
	if e.Dump == "" {
		return ""
	}
	return look(e.Dump)
}

// name is how a sentence calls a run.
func name(e *report.Evaluation) string {
	switch {
	case e.Facts.Sample != "":
		return figure.Shorten(leadStyle, e.Facts.Sample, 60)
	case e.ID != "":
		return "run " + e.ID
	}
	return "the first below"
}

func (d *document) headlineItem() item {
	happened, do, next := d.headline()
	head := headStyle.As(figure.Bold)
	first := figure.Wrap(head, happened, live)
	second := figure.Wrap(leadStyle, do, live)
	h := 11.0 + 6.4*float64(len(first)-1) + 6.4 + leadLead*float64(len(second)-1)
	if next != "" {
		h += 5.2
	}
	return item{height: h + 1, draw: func(s *figure.Sheet, y float64) {
		y = paragraph(s, left, y+11, 6.4, head, first)
		y = paragraph(s, left, y, leadLead, leadStyle, second)
		if next != "" {
			command(s, left, y+0.6, lookLabel(d.firstDump()), next)
		}
	}}
}

// command sets the next command behind what it is for: smaller, then on a
// second line, before anything of it is left out.
func command(s *figure.Sheet, x, y float64, what, next string) {
	x = s.Text(x, y, titleStyle, what) + 2
	if figure.TextWidth(monoBody, next) <= right-x {
		s.Text(x, y, monoBody, next)
		return
	}
	st := monoNote.In(figure.Black)
	lines := figure.Wrap(st, next, right-x)
	if len(lines) > 2 {
		lines = []string{figure.Shorten(st, next, right-x)}
	}
	paragraph(s, x, y, 2.9, st, lines)
}

// total is one of the four counts of a night.
type total struct {
	mark        figure.Urgency
	count       int
	word, means string
	where       string
}

func (d *document) totals() [4]total {
	n := d.n
	out := [4]total{
		{mark: figure.Settle, count: n.Count(report.VerdictDisputed), word: "disputed", means: "a second person must settle"},
		{mark: figure.Look, count: n.Count(report.VerdictDoubtful), word: "doubtful", means: "look before use"},
		{mark: figure.Calm, count: n.Count(report.VerdictSound), word: "sound", means: report.SoundMeans},
		{mark: figure.Missing, count: len(n.Unread), word: "unread", means: "not read, no result"},
	}
	for i, v := range [...]report.Verdict{report.VerdictDisputed, report.VerdictDoubtful, report.VerdictSound} {
		var at stretch
		for _, k := range d.urgent {
			if d.n.Evaluations[k].Verdict == v {
				at = at.join(d.runAt[k])
			}
		}
		out[i].where = d.where(at)
	}
	if out[2].where == "" {
		out[2].where = d.where(d.smallAt)
	}
	out[3].where = d.where(d.unreadAt)
	for i, at := range [...]stretch{2: d.smallAt, 3: d.unreadAt} {
		if at.volume == 1 && at.page == 1 {
			out[i].where = "below"
		}
	}
	return out
}

func (d *document) totalsItem() item {
	h := 17.0
	if len(d.volumes) > 1 { // a place there takes two lines
		h += noteLead
	}
	return item{height: h, draw: func(s *figure.Sheet, y float64) {
		for i, t := range d.totals() {
			x := left + 45*float64(i)
			end := s.Block("total", figure.Box{Left: x, Top: y, Right: x + 41, Bottom: y + h})
			ink := rule(figure.Black, 0.4)
			if i == 0 && t.count > 0 {
				ink.WidthPt = 1
			}
			s.Rule(ink, x, x+41, y)
			s.Urgent(t.mark, x+3.2, y+7.4, 6)
			number, word := numberStyle, leadStyle.As(figure.Bold)
			if figure.TextWidth(number, whole(t.count))+1.5+figure.TextWidth(word, t.word) > 32 {
				number.SizePt = headStyle.SizePt
			}
			to := s.Text(x+9, y+9.8, number, whole(t.count))
			s.Text(to+1.5, y+9.8, word, t.word)
			s.Text(x+9, y+13.4, noteStyle, t.means)
			if t.count > 0 {
				st := noteStyle.In(figure.Blue)
				paragraph(s, x+9, y+16.5, noteLead, st, figure.WrapAtMost(st, t.where, 32, 2))
			}
			end()
		}
	}}
}
