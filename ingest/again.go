package ingest

import (
	"bytes"
	"fmt"

	"lastdrop/ingest/plausible"
	"lastdrop/schemas"
)

// checkAgain refuses a row that stands twice, where a time tells that it
// cannot be another one, and the first row once titrant has been delivered.
func (d *draft) checkAgain() {
	text, column := d.text.Body[d.row.From:d.row.To], d.columns.optional[timeColumn]
	if column >= 0 && d.count > 0 && d.fault == nil && bytes.Equal(text, d.rowBefore) && !d.missing(d.scan.Bytes(d.row.Cells[column])) {
		d.refuseRow(d.row.From, "time", "the row before again, with the same time", "a row is doubled; export the dump again")
	}
	switch {
	case d.rowFirst == nil:
		d.rowFirst = text
	case d.count > 1 && d.fault == nil && bytes.Equal(text, d.rowFirst) && !bytes.Equal(text, d.rowBefore) && d.table.readings[d.first].VolumeML < d.table.readings[d.end-1].VolumeML:
		d.refuseRow(d.row.From, "", "the first row again", "a table stands twice, or another one follows; export the dump again")
	}
	d.rowBefore = text
}

// checkFall refuses a volume that falls back to where the run began: another
// table follows.
func (d *draft) checkFall(volume float64) {
	if d.count < 2 {
		return
	}
	first, last := d.table.readings[d.first].VolumeML, d.table.readings[d.end-1].VolumeML
	if volume <= first && first < last {
		d.refuseRow(d.row.From, "volume", fmt.Sprintf("the volume falls from %s mL to %s mL, where the run began", plausible.Short(last), plausible.Short(volume)), "a table stands twice, or another one follows; export the dump again")
	}
}

// checkBackwards refuses rows whose time runs backwards where increments are
// summed: the rows are in another order, or of another run.
func (d *draft) checkBackwards(column int, why string) {
	if d.columns.fields[d.columns.volume].Role == schemas.RoleIncrement {
		d.refuseRow(d.row.Cells[column].From, "time", why, "the rows are in another order or of another run, and the increments cannot be summed; export the dump again")
	}
}
