package pdf

import (
	"fmt"
	"slices"
	"strconv"

	"lastdrop/report"
	"lastdrop/report/figure"
)

// volumePages is how many large run pages a volume holds at most.
const volumePages = 200

// Book is a night planned as pages, in as many volumes as its large pages
// need. It refers to the night, which must not change until all is written.
type Book struct {
	n             *report.Night
	mark          report.Decimal
	width, height float64 // of the sheet, mm
	figureLess    float64 // mm that figures are lower than on A4
	urgent        []int   // evaluations with a large page, most urgent first
	small         []int   // sound runs with a small picture
	runAt         []stretch
	smallAt       stretch
	unreadAt      stretch
	volumes       []*document
}

// stretch is where pages stand, from the first to the last; Volume 0 says
// that there are none.
type stretch struct{ volume, page, lastVolume, lastPage int }

// Plan lays the pages of a night out in volumes.
func Plan(n *report.Night, o Options) (*Book, error) {
	if o.Pages != "" && o.Pages != "flagged" && o.Pages != "all" {
		return nil, &OptionError{Option: "pages", Value: o.Pages, Want: "flagged or all"}
	}
	b := &Book{n: n, mark: o.Decimal, width: 210, height: 297, runAt: make([]stretch, len(n.Evaluations))}
	if o.Letter {
		b.width, b.height, b.figureLess = 215.9, 279.4, 18
	}
	b.choose(o.Pages == "all")
	whole := &document{Book: b}
	runs := make([]*runPage, len(b.urgent))
	for k, i := range b.urgent {
		runs[k] = newRunPage(whole, &n.Evaluations[i])
	}
	ends := volumeEnds(runs)
	b.volumes = make([]*document, len(ends)) // their number is told on the pages
	from := 0
	for v, to := range ends {
		d := &document{Book: b, volume: v + 1, large: b.urgent[from:to]}
		b.volumes[v] = d
		d.planFront()
		d.planRuns(runs[from:to])
		if v == len(ends)-1 {
			d.planSmall()
		}
		from = to
	}
	return b, nil
}

// volumeEnds cuts the runs into volumes; the pages of one run stay together.
func volumeEnds(runs []*runPage) (ends []int) {
	pages := 0
	for k, r := range runs {
		if pages > 0 && pages+r.parts() > volumePages {
			ends, pages = append(ends, k), 0
		}
		pages += r.parts()
	}
	return append(ends, len(runs))
}

// Runs returns the evaluations with a large page, most urgent first.
func (b *Book) Runs() []int { return slices.Clone(b.urgent) }

// Volumes returns how many volumes there are, at least one.
func (b *Book) Volumes() int { return len(b.volumes) }

// Drawn is a page as it was drawn.
type Drawn struct {
	Volume, Page int
	What         string        // the run's id and dump, or the name of the page
	Says         string        // why it could not be drawn; "" when it could
	Sheet        *figure.Sheet // good until the next page is drawn
}

// Draw draws every page in turn and shows it: how tests look at the pages of a
// night.
func (b *Book) Draw(show func(Drawn)) {
	s := figure.NewSheet(b.width, b.height)
	for _, d := range b.volumes {
		for i := range d.pages {
			says := attempt(s, func() { d.pages[i].draw(s, i+1) })
			show(Drawn{Volume: d.volume, Page: i + 1, What: d.pages[i].what, Says: says, Sheet: s})
		}
	}
}

// Faults draws every page and lists, with volume and page, what cannot be drawn
// or stands where it should not; see figure.Sheet.Faults.
func (b *Book) Faults() (all []string) {
	b.Draw(func(p Drawn) {
		found := []string{p.Says}
		if p.Says == "" {
			found = p.Sheet.Faults()
		}
		for _, f := range found {
			all = append(all, fmt.Sprintf("volume %d, page %d, %s: %s", p.Volume, p.Page, p.What, f))
		}
	})
	return all
}

// FileName is the name of a volume, from 1: summary.pdf, summary-2.pdf, …
func FileName(volume int) string {
	if volume == 1 {
		return "summary.pdf"
	}
	return "summary-" + strconv.Itoa(volume) + ".pdf"
}

// IsFurtherVolume tells whether a file has the name of a volume behind the
// first.
func IsFurtherVolume(name string) bool {
	var v int
	if n := len(name); n < len("summary-2.pdf") || name[:8] != "summary-" {
		return false
	}
	v, err := strconv.Atoi(name[8 : len(name)-len(".pdf")])
	return err == nil && v >= 2 && FileName(v) == name
}

// where tells a place to a reader of the volume: "page 4", "pages 4 to 9",
// with the volume where that is another one.
func (d *document) where(at stretch) string {
	switch {
	case at.volume == 0:
		return ""
	case at.volume != at.lastVolume:
		last := stretch{at.lastVolume, at.lastPage, at.lastVolume, at.lastPage}
		return d.where(stretch{at.volume, at.page, at.volume, at.page}) + " to " + d.where(last)
	}
	text := pageRange(at.page, at.lastPage)
	if at.volume != d.volume {
		text = "volume " + whole(at.volume) + ", " + text
	}
	return text
}

// join is the stretch from the beginning of one to the end of another.
func (a stretch) join(b stretch) stretch {
	switch {
	case a.volume == 0:
		return b
	case b.volume == 0:
		return a
	}
	return stretch{a.volume, a.page, b.lastVolume, b.lastPage}
}
