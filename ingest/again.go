package ingest

import "bytes"

// checkAgain refuses rows that stand twice where that can be seen: the same
// time as in the row before, or the first row again when titrant has been
// delivered since.
func (d *draft) checkAgain() {
	text := d.text.Body[d.row.From:d.row.To]
	switch {
	case d.firstRow == nil:
		d.firstRow = text
	case bytes.Equal(text, d.rowBefore):
		if d.columns.optional[timeColumn] >= 0 && !d.lost[timeColumn] && d.count > 0 {
			d.refuseRow(d.row.From, "time", "the row before again, with the same time", "a row is doubled; export the dump again")
		}
	case d.count > 1 && bytes.Equal(text, d.firstRow) && d.table.readings[d.first].VolumeML < d.table.readings[d.end-1].VolumeML:
		d.refuseRow(d.row.From, "", "the first row again", "a table stands twice, or another one follows; export the dump again")
	}
	d.rowBefore = text
}
