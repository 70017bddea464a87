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

	"lastdrop/report"
)

// Names of the sheets.
const (
	nightSheet      = "Night"
	endpointsSheet  = "Endpoints"
	flagsSheet      = "Flags"
	unreadSheet     = "Unread"
	provenanceSheet = "Provenance"
	glossarySheet   = "Glossary"
)

// Write writes summary.xlsx. A NaN or infinite figure is an error that names
// its cell; n.Date must be a day.
func Write(w io.Writer, n *report.Night) error {
	b, err := newBook(title(n), n.Date, "lastdrop "+n.Lastdrop)
	if err != nil {
		return err
	}
	defer b.file.Close() // nothing was put on disk that could fail to go
	p := places{night: n, endpoint: endpointRows(n), flag: flagRows(n), footer: footerText(n.Invented)}
	for _, lay := range []func(*book, *places) error{layNight, layEndpoints, layFlags, layUnread, layProvenance, layGlossary} {
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
