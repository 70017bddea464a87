package ingest

import (
	"fmt"
	"slices"

	"lastdrop/ingest/cells"
	"lastdrop/schemas"
)

// In the layout long the rows of a run are known by its name only. Where
// nothing counts them, one that is damaged is missed by nobody: its run would
// be read without it.

// tellLost tells every run of rows that may be its own and are damaged. Where
// increments are summed, a row that is damaged for certain refuses them.
func (l *longTable) tellLost() {
	c := l.head.columns
	counted := slices.ContainsFunc(l.schema.Facts, func(f schemas.Fact) bool { return f.Name == schemas.FactReadings })
	if counted || c.number >= 0 {
		return
	}
	summed := c.volume >= 0 && c.fields[c.volume].Role == schemas.RoleIncrement
	for _, d := range l.runs {
		if len(l.runs) > 1 && !l.inFooter && l.head.unterminated() {
			d.repairs.Add(l.row.Line, "a last row without line end, which may be one of this run")
		}
		switch {
		case l.damaged == 0 || d.fault != nil:
		case summed:
			d.refuse(l.damaged, 0, -1, "", "a damaged row, which may be one of this run", "its increment would lack in every volume below it; export the dump again")
		default:
			d.repairs.Add(l.damaged, "a damaged row, which may be one of this run, not used")
		}
	}
	for _, short := range l.runs {
		if short.rows >= MinReadings {
			continue
		}
		for _, d := range l.runs {
			switch {
			case d.rows < MinReadings || d.fault != nil:
			case summed:
				d.refuse(short.line, 0, -1, "run", fmt.Sprintf("run %s has only %s", cells.Quoted([]byte(short.name)), plural(short.rows, "row")), "its name may be damaged, and its increment would lack in every volume of another run; export the dump again")
			default:
				d.repairs.Add(short.line, fmt.Sprintf("run %s has only %s; if its name is damaged, they belong to another run", cells.Quoted([]byte(short.name)), plural(short.rows, "row")))
			}
		}
	}
}
