// Package xlsx writes the workbook of a night: a front sheet in sentences, a
// row for each endpoint, for each flag and for each unread dump, where the
// figures come from, and a glossary. It computes nothing: every cell is a
// field that somebody else filled. A number cell keeps 15 significant digits
// and shows the decimals that its uncertainty supports; units stand in the
// heads. There is no formula in it, and the same night gives the same bytes.
//
// Sources: [ooxml] ECMA-376 part 1 (from memory).
package xlsx

import (
	"io"
	"slices"

	"lastdrop/report"
)

// Names of the sheets.
const (
	nightSheet      = "Night"
	endpointsSheet  = "Endpoints"
	flagsSheet      = "Flags"
	unreadSheet     = "Unread"
	curvesSheet     = "Curves"
	provenanceSheet = "Provenance"
	glossarySheet   = "Glossary"
)

// Options are what a workbook has besides what every one has.
type Options struct {
	HasCurves bool
	Curves    []int // evaluations whose readings and curves the sheet of curves has, in its order
}

// Write writes summary.xlsx. A NaN or infinite figure is an error that names
// its cell; n.Date must be a day.
func Write(w io.Writer, n *report.Night, o Options) error {
	b, err := newBook(title(n), n.Date, "lastdrop "+n.Lastdrop)
	if err != nil {
		return err
	}
	defer b.file.Close() // nothing was put on disk that could fail to go
	p := places{night: n, endpoint: endpointRows(n), flag: flagRows(n), footer: footerText(n.Invented), curves: o.HasCurves}
	sheets := []func(*book, *places) error{layNight, layEndpoints, layFlags, layUnread, layProvenance, layGlossary}
	if o.HasCurves {
		sheets = slices.Insert(sheets, 3, func(b *book, p *places) error { return layCurves(b, p, o.Curves) })
	}
	for _, lay := range sheets {
		if err := lay(b, &p); err != nil {
			return err
		}
	}
	return b.write(w)
}

func title(n *report.Night) string {
	t := "Endpoints of " + report.Day(n.Date)
	if n.Laboratory != "" {
		t = n.Laboratory + ": " + t
	}
	return report.Visible(t)
}

// places tells where the rows of an evaluation stand, for links.
type places struct {
	night    *report.Night
	endpoint []int // first row in Endpoints, by evaluation
	flag     []int // first row in Flags, by evaluation; 0 without flags
	footer   string
	curves   bool // there is a sheet of curves
}

func endpointRows(n *report.Night) []int {
	rows, next := make([]int, len(n.Evaluations)), 2
	for i := range n.Evaluations {
		rows[i] = next
		next += max(len(n.Evaluations[i].Pairs()), 1)
	}
	return rows
}

func flagRows(n *report.Night) []int {
	rows, next := make([]int, len(n.Evaluations)), 2
	for i := range n.Evaluations {
		if k := len(n.Evaluations[i].Flags); k > 0 {
			rows[i] = next
			next += k
		}
	}
	return rows
}
