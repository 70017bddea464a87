package pdf

import (
	"sort"

	"lastdrop/report"
	"lastdrop/report/figure"
	"lastdrop/report/pdf/paper"
)

// document is one volume being laid out. All pages of all volumes are planned
// before the first is drawn, so that each can say where the others are.
type document struct {
	*Book
	volume int   // from 1
	large  []int // evaluations with a large page here, most urgent first
	pages  []page
}

// page is one page to be drawn.
type page struct {
	what      string // for Result.Failed
	facts     []string
	bookmarks []paper.Bookmark
	draw      func(s *figure.Sheet, number int)
}

// choose sorts the runs that get a large page by urgency, and the sound ones
// that get a small picture by procedure.
func (d *Book) choose(all bool) {
	for i := range d.n.Evaluations {
		e := &d.n.Evaluations[i]
		if all || e.Verdict != report.VerdictSound {
			d.urgent = append(d.urgent, i)
		}
		if e.Verdict == report.VerdictSound && e.Picture != nil {
			d.small = append(d.small, i)
		}
	}
	sort.SliceStable(d.urgent, func(a, b int) bool {
		return d.n.Evaluations[d.urgent[a]].MoreUrgent(&d.n.Evaluations[d.urgent[b]])
	})
	sort.SliceStable(d.small, func(a, b int) bool {
		x, y := &d.n.Evaluations[d.small[a]], &d.n.Evaluations[d.small[b]]
		if x.Facts.Procedure != y.Facts.Procedure {
			return x.Facts.Procedure < y.Facts.Procedure
		}
		return x.Signal < y.Signal
	})
}

// heaviest returns the flag that makes the verdict, nil when there is none.
func heaviest(e *report.Evaluation) *report.Flag {
	for i := range e.Flags {
		if string(e.Flags[i].Weight) == string(e.Verdict) {
			return &e.Flags[i]
		}
	}
	return nil
}

// planRuns adds the large pages, with a bookmark before each verdict.
func (d *document) planRuns(runs []*runPage) {
	verdict := report.Verdict("")
	for k, i := range d.large {
		e, r := &d.n.Evaluations[i], runs[k]
		r.d = d
		first := len(d.pages) + 1
		d.runAt[i] = stretch{d.volume, first, d.volume, first + r.parts() - 1}
		marks := []paper.Bookmark{{Text: runBookmark(e), Level: 1}}
		if e.Verdict != verdict {
			verdict = e.Verdict
			marks = append([]paper.Bookmark{{Text: string(verdict)}}, marks...)
		}
		for part := range r.parts() {
			p := page{what: "run " + e.ID + " of " + e.Dump, facts: runFacts(e)}
			if part == 0 {
				p.bookmarks = marks
				p.draw = r.drawFirst
			} else {
				p.draw = func(s *figure.Sheet, number int) { r.drawFurther(s, number, part) }
			}
			d.pages = append(d.pages, p)
		}
	}
}

func runBookmark(e *report.Evaluation) string {
	name := e.Facts.Sample
	if name == "" {
		name = e.ID
	}
	if f := heaviest(e); f != nil {
		name += ", " + f.Flag
	}
	return name
}

// runFacts are told where a run's page cannot be drawn.
func runFacts(e *report.Evaluation) []string {
	return []string{
		"sample " + orDash(e.Facts.Sample), "procedure " + orDash(e.Facts.Procedure),
		"run " + e.ID + ", verdict " + string(e.Verdict),
		place(e.Dump, e.Line, 0) + ", run " + whole(e.Run) + " of that dump",
	}
}

// item is a strip of a page: its height, and how to draw it from a height on.
type item struct {
	height float64
	runs   int  // how many runs it pictures
	wide   bool // it reaches into the left margin
	draw   func(s *figure.Sheet, y float64)
}

// section is a block that may continue on further pages: its head is repeated
// there, its foot closes it on each.
type section struct {
	head item // drawn first; again on each page that continues it
	rows []item
	foot item
	most int // rows on the first page of the flow; 0 for as many as fit
}

// placed is an item with its place.
type placed struct {
	item
	y float64
}

// flow lays items and sections on pages, top to bottom.
type flow struct {
	pages  [][]placed
	y      float64 // where the next item may begin
	top    float64 // of further pages
	bottom float64
}

// newFlow begins at top on the first page and at further on the others.
func newFlow(top, further, bottom float64) *flow {
	return &flow{pages: make([][]placed, 1), y: top, top: further, bottom: bottom}
}

func (f *flow) put(it item) {
	last := len(f.pages) - 1
	f.pages[last] = append(f.pages[last], placed{it, f.y})
	f.y += it.height
}

func (f *flow) turn() {
	f.pages = append(f.pages, nil)
	f.y = f.top
}

// add places an item with white above it, on the next page if it does not fit.
func (f *flow) add(white float64, it item) {
	if f.y+white+it.height > f.bottom && len(f.pages[len(f.pages)-1]) > 0 {
		f.turn()
		white = 0
	}
	f.y += white
	f.put(it)
}

// addSection places a section; at least two of its rows stay with a head. It
// returns the page, from 0, on which it begins.
func (f *flow) addSection(white float64, sec section) (page int) {
	if len(sec.rows) == 0 {
		return -1
	}
	need := sec.head.height + sec.foot.height
	for _, r := range sec.rows[:min(2, len(sec.rows))] {
		need += r.height
	}
	if f.y+white+need > f.bottom {
		f.turn()
		white = 0
	}
	f.y += white
	page = len(f.pages) - 1
	f.put(sec.head)
	on := 0
	for _, r := range sec.rows {
		full := sec.most > 0 && len(f.pages) == 1 && on >= sec.most
		if on > 0 && (full || f.y+r.height+sec.foot.height > f.bottom) {
			f.close(sec)
			f.turn()
			f.put(sec.head)
			on = 0
		}
		f.put(r)
		on++
	}
	f.close(sec)
	return page
}

func (f *flow) close(sec section) {
	if sec.foot.draw != nil {
		f.put(sec.foot)
	}
}

// drawItems draws a page of a flow.
func drawItems(s *figure.Sheet, items []placed) {
	for _, it := range items {
		from := left
		if it.wide {
			from -= 10
		}
		end := s.Block("strip", figure.Box{Left: from, Top: it.y, Right: right, Bottom: it.y + it.height})
		it.draw(s, it.y)
		end()
	}
}
