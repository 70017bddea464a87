package pdf

import (
	"lastdrop/report"
	"lastdrop/report/figure"
)

// furtherNames are the files of the volumes behind the first, as the end of
// an enumeration.
func furtherNames(volumes int) string {
	if volumes > 4 {
		return " and " + FileName(2) + " to " + FileName(volumes)
	}
	text := ""
	for v := 2; v <= volumes; v++ {
		if v == volumes {
			text += " and " + FileName(v)
		} else {
			text += ", " + FileName(v)
		}
	}
	return text
}

// volumeItem heads a further volume.
func (d *document) volumeItem() item {
	return item{height: 20, draw: func(s *figure.Sheet, y float64) {
		s.Text(left, y+11, headStyle.As(figure.Bold), "Volume "+whole(d.volume)+" of "+whole(len(d.volumes))+": further runs of the night.")
		s.Text(left, y+18, leadStyle, "What must be done first, the counts and what is unread stand in volume 1, "+FileName(1)+".")
	}}
}

// Right edge of the names and left edge of the flags of the contents, mm.
const (
	contentsProcedure = 84.0
	contentsFlag      = 134.0
	contentsID        = 162.0
)

// contentsSection lists the runs of a further volume, a line each.
func (d *document) contentsSection() section {
	sec := section{head: item{height: 6, draw: func(s *figure.Sheet, y float64) {
		blockTitle(s, left, right, y, "Runs of this volume", "most urgent first")
	}}}
	for _, i := range d.large {
		sec.rows = append(sec.rows, item{height: 4.9, draw: func(s *figure.Sheet, y float64) {
			d.drawContents(s, i, y)
		}})
	}
	return sec
}

func (d *document) drawContents(s *figure.Sheet, i int, y float64) {
	e, base := &d.n.Evaluations[i], y+3.5
	s.Urgent(verdictMark(e.Verdict), left+1.8, y+2.5, 2.5)
	s.Text(sampleX, base, titleStyle, figure.Shorten(titleStyle, sampleName(e), contentsProcedure-sampleX-2))
	s.Text(contentsProcedure, base, bodyStyle, figure.Shorten(bodyStyle, procedureName(e), contentsFlag-contentsProcedure-2))
	if f := heaviest(e); f != nil && e.Verdict != report.VerdictSound {
		s.Text(contentsFlag, base, monoNote, figure.Shorten(monoNote, f.Flag, contentsID-contentsFlag-2))
	}
	s.Text(contentsID, base, monoNote, figure.Shorten(monoNote, e.ID, right-contentsID-12))
	s.Rule(rowRule, left, right, y+4.9)
	d.drawPageLink(s, i, y-0.4)
}
