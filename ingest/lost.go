package ingest

import (
	"fmt"
	"slices"

	"lastdrop/ingest/cells"
	"lastdrop/schemas"
)

// Where nothing counts the rows of a run, one that is damaged may be missed by
// nobody: a comment that was a row, or a row of a long table whose name is
// damaged. A volume that is lost leaves the others as they are; an increment
// that is lost is wrong in every volume below it.

// lostRow tells of a row that may be one of the run, and refuses the run when
// its increments are summed.
func (d *draft) lostRow(line int, what string) {
	c := d.columns
	if c.volume >= 0 && c.fields[c.volume].Role == schemas.RoleIncrement {
		d.refuse(line, 0, -1, "", what+", which may be one of this run", "its increment would lack in every volume below it; export the dump again")
		return
	}
	d.repairs.Add(line, what+", which may be one of this run, not used")
}

// rowLike reports whether the comment line at hand could be a row whose first
// character is damaged, or end in one: it has the cells of one and a number
// where one belongs.
func (d *draft) rowLike() bool {
	s, c := d.scan, d.columns
	alone := cells.Scanner{Body: d.text.Body[d.row.From:d.row.To], Delimiter: s.Delimiter, Quote: s.Quote, Escape: s.Escape, Repeated: s.Repeated}
	var row cells.Row
	if !alone.Next(&row) || len(row.Cells) < c.width {
		return false
	}
	before := len(row.Cells) - c.width
	for _, i := range []int{c.volume, c.reading} {
		if i > 0 { // the first cell has the comment character in it
			_, _, fault := cells.ParseWritten(alone.Bytes(row.Cells[before+i]), &d.schema.Dialect, &c.fields[i].Written)
			if fault == cells.NumberOK {
				return true
			}
		}
	}
	return false
}

// tellLost tells every run of the rows of the table that may be its own.
func (l *longTable) tellLost() {
	counted := slices.ContainsFunc(l.schema.Facts, func(f schemas.Fact) bool { return f.Name == schemas.FactReadings })
	if counted || l.head.columns.number >= 0 {
		return
	}
	var short []*draft
	for _, d := range l.runs {
		if d.rows < MinReadings {
			short = append(short, d)
		}
	}
	for _, d := range l.runs {
		if len(l.runs) > 1 && !l.inFooter && l.head.unterminated() {
			d.repairs.Add(l.row.Line, "a last row without line end, which may be one of this run")
		}
		if d.fault != nil || d.rows < MinReadings {
			continue
		}
		for _, line := range l.rowLike {
			d.lostRow(line, "a comment with the cells of a row")
		}
		if l.damaged > 0 {
			d.lostRow(l.damaged, "a damaged row")
		}
		for _, s := range short {
			d.lostRow(s.line, fmt.Sprintf("%s named %s", plural(s.rows, "row"), cells.Quoted([]byte(s.name))))
		}
	}
}
