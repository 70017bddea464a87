package ingest

import (
	"bytes"
	"fmt"
	"math"

	"lastdrop/ingest/cells"
	"lastdrop/schemas"
)

// table holds the rows of all runs of a dump, so that a dump costs a few
// allocations however many runs and rows it has. A run between whose rows
// those of others stand has a table of its own.
type table struct {
	readings []Reading
	optional [optionalColumns][]float64 // as long as readings once any run has the column
}

// reserve makes room for every line that is still to come.
func (r *reader) reserve(from int) {
	if r.common.readings != nil {
		return
	}
	r.common.readings = make([]Reading, 0, r.linesFrom(from))
}

// linesFrom is how many lines are still to come, at most.
func (r *reader) linesFrom(from int) int {
	rest := r.text.Body[from:]
	return max(bytes.Count(rest, []byte{'\n'}), bytes.Count(rest, []byte{'\r'})) + 1
}

// fill hands the run its part of the table.
func (t *table) fill(d *draft) {
	run := &d.run
	run.Readings = t.readings[d.first:d.end:d.end]
	for i, column := range []*[]float64{&run.TimesS, &run.TemperaturesC, &run.DriftsPerMin} {
		if d.columns.optional[i] >= 0 && !d.lost[i] && len(t.optional[i]) >= d.end {
			*column = t.optional[i][d.first:d.end:d.end]
		}
	}
}

// own gives the run a table of its own, with its rows so far.
func (t *table) own(d *draft) *table {
	rows := &table{readings: append([]Reading(nil), t.readings[d.first:d.end]...)}
	for i, column := range t.optional {
		if len(column) >= d.end {
			rows.optional[i] = append([]float64(nil), column[d.first:d.end]...)
		}
	}
	d.first, d.end = 0, len(rows.readings)
	return rows
}

// steps is the finest display seen in a column.
type steps struct {
	seen     bool
	decimals int
	times    float64
}

func (s *steps) see(n cells.Number, u schemas.Unit) {
	if !s.seen || n.Decimals > s.decimals {
		s.seen, s.decimals, s.times = true, n.Decimals, u.Times
	}
}

func (s *steps) step() float64 {
	if !s.seen {
		return 0
	}
	return cells.Step(s.decimals) * s.times
}

// data reads the row at hand as a row of the table.
func (d *draft) data() {
	if d.headerAgain() {
		return
	}
	d.lastLine = d.row.Line
	d.rows++
	if d.skippedBlanks(); !d.shape(d.columns.width) || d.columns.volume < 0 || d.columns.reading < 0 {
		return
	}
	d.measure()
}

// measure reads volume and reading of a row that has the right shape.
func (d *draft) measure() {
	c := d.columns
	d.checkNumber()
	d.checkAgain()
	if !c.plain {
		d.special()
		return
	}
	volume, ok1 := d.needed(c.volume, &d.volumeSteps)
	value, ok2 := d.needed(c.reading, &d.readingSteps)
	if ok1 && ok2 && d.fault == nil { // a run with a fault needs no readings
		d.keep(volume, value)
	}
}

// special reads a row of a table in which not every row is a reading, or whose
// volume is to be worked out.
func (d *draft) special() {
	c := d.columns
	d.columnFacts()
	d.remarked()
	means := d.status()
	skip := means == schemas.StatusSkip || means == schemas.StatusDose
	if !skip && c.fields[c.reading].Empty == schemas.EmptySkip && d.missing(d.scan.Bytes(d.row.Cells[c.reading])) {
		d.passed.see(d.row.Line)
		skip = true
	}
	if skip {
		d.deliveredOnly(means)
		return
	}
	volume, ok := d.delivered()
	value, ok2 := d.needed(c.reading, &d.readingSteps)
	if ok && ok2 && d.fault == nil {
		d.keep(volume, value)
	}
}

// keep adds a reading to the table.
func (d *draft) keep(volume, value float64) {
	t := d.table
	at := len(t.readings)
	d.checkFall(volume)
	if d.schema.SameVolume == schemas.SameLast && d.count > 0 && t.readings[d.end-1].VolumeML == volume {
		at = d.end - 1
		t.readings[at] = Reading{VolumeML: volume, Value: value, Line: d.row.Line}
		d.keepOptional(at)
		return
	}
	switch {
	case d.count == 0:
		d.first = at
	case d.end != at: // rows of other runs stand between
		t = t.own(d)
		d.table, at = t, d.end
	}
	t.readings = append(t.readings, Reading{VolumeML: volume, Value: value, Line: d.row.Line})
	d.keepOptional(at)
	d.end = at + 1
	d.count++
}

// keepOptional keeps time, temperature and drift of the row at hand.
func (d *draft) keepOptional(at int) {
	t := d.table
	for i, column := range d.columns.optional {
		if column < 0 {
			continue
		}
		if d.lost[i] {
			d.mergedFact(column)
			continue
		}
		v := d.optional(column, i)
		t.optional[i] = grown(t.optional[i], at, cap(t.readings))
		if len(t.optional[i]) > at {
			t.optional[i][at] = v
		} else {
			t.optional[i] = append(t.optional[i], v)
		}
	}
}

// mergedFact refuses a row that ends in a comment line with a fact. Where the
// column is read, such a cell is no number.
func (d *draft) mergedFact(column int) {
	c := d.row.Cells[column]
	b := d.scan.Bytes(c)
	if i := d.secondFact(b); i >= 0 {
		d.refuseRow(c.From+i, "", cells.Quoted(b[i:])+" stands in the line of a row", "a line end is lost; export the dump again")
	}
}

// grown makes a column as long as the readings before the row at hand.
func grown(column []float64, n, capacity int) []float64 {
	if column == nil {
		column = make([]float64, 0, capacity)
	}
	for len(column) < n {
		column = append(column, 0)
	}
	return column
}

// skippedBlanks lists the blank lines before the row, which stand inside the
// table.
func (d *draft) skippedBlanks() {
	for _, line := range d.blanks {
		d.repairs.Add(line, "blank line in the table skipped")
	}
	d.blanks = d.blanks[:0]
}

// shape reports whether the row has the cells of the header.
func (d *draft) shape(width int) bool {
	if d.row.Fault != "" {
		d.refuseRow(d.row.FaultAt, "", d.row.Fault, "the line is damaged; export the dump again")
		return false
	}
	before := len(d.row.Cells)
	if d.row.DropEmptyTail(width) {
		if before-width > d.columns.tail && d.mayBeShifted() {
			d.refuseRow(d.row.Cells[width-1].From, "", fmt.Sprintf("%s where the header in line %d has %d", plural(before, "cell"), d.columns.line, width+d.columns.tail), "a delimiter is too many, and the last cell may be another one's; export the dump again")
			return false
		}
		d.repairs.Add(d.row.Line, trailingDropped)
	}
	n := len(d.row.Cells)
	if n == width {
		return true
	}
	at := d.row.To
	hint := "the line is damaged; export the dump again"
	if n > width {
		at = d.row.Cells[width].From
		if d.schema.Dialect.Delimiter == ',' {
			hint = "a decimal comma in a dump with commas between the columns? export it again with a decimal point"
		}
	}
	d.refuseRow(at, "", fmt.Sprintf("%s where the header in line %d has %d", plural(n, "cell"), d.columns.line, width), hint)
	return false
}

// mayBeShifted reports whether a delimiter too many may have moved the cells of
// a row into the columns beside their own: the last one may be empty.
func (d *draft) mayBeShifted() bool {
	last := len(d.row.Cells) - 1
	if last != d.columns.width-1 {
		return false
	}
	f := d.columns.fields[last]
	return f == nil || d.schema.Layout == schemas.Wide || f.Empty != schemas.EmptyRefused || !f.Role.IsReading() && f.Role != schemas.RoleVolume
}

// checkNumber: a column that counts the rows must count up by one, or a row is
// lost, doubled or moved.
func (d *draft) checkNumber() {
	i := d.columns.number
	if i < 0 {
		return
	}
	at := d.row.Cells[i]
	n, fault := cells.ParseNumber(d.scan.Bytes(at), d.schema.Dialect.DecimalChar, 0)
	switch {
	case fault != cells.NumberOK:
		d.refuseRow(at.From, "number", fmt.Sprintf("%s is not a number", cells.Quoted(d.scan.Bytes(at))), "this column counts the rows; the line is damaged")
		n.Value = math.NaN() // nothing can follow it or fail to
	case d.rows > 1 && !math.IsNaN(d.lastNumber) && n.Value != d.lastNumber+1:
		d.refuseRow(at.From, "number", fmt.Sprintf("row %v follows row %v", n.Value, d.lastNumber), "a row is missing, doubled or moved; export the dump again")
	case d.rows == 1 && n.Value != 0 && n.Value != 1:
		d.refuseRow(at.From, "number", fmt.Sprintf("the first row has the number %v", n.Value), "rows before it are missing; export the dump again")
	}
	d.lastNumber = n.Value
}
