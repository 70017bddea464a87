package ingest

import (
	"bytes"
	"fmt"
	"math"

	"lastdrop/ingest/cells"
	"lastdrop/schemas"
)

// table holds the rows of all runs of a dump, so that a dump costs a few
// allocations however many runs and rows it has.
type table struct {
	readings      []Reading
	timesS        []float64 // as long as readings once any run has times
	temperaturesC []float64
	owner         []int // run number of each reading; layout long only
}

// reserve makes room for every line that is still to come.
func (r *reader) reserve(from int) {
	if r.table.readings != nil {
		return
	}
	rest := r.text.Body[from:]
	n := max(bytes.Count(rest, []byte{'\n'}), bytes.Count(rest, []byte{'\r'})) + 1
	r.table.readings = make([]Reading, 0, n)
}

// fill hands the run its part of the table.
func (t *table) fill(d *draft) {
	run, c := &d.run, d.columns
	if d.interleaved {
		t.gather(d)
	} else {
		run.Readings = t.readings[d.first:d.end:d.end]
		run.TimesS = part(t.timesS, d.first, d.end)
		run.TemperaturesC = part(t.temperaturesC, d.first, d.end)
	}
	if c.time < 0 || d.lost[0] {
		run.TimesS = nil
	}
	if c.temperature < 0 || d.lost[1] {
		run.TemperaturesC = nil
	}
}

func part(all []float64, first, end int) []float64 {
	if len(all) < end {
		return nil
	}
	return all[first:end:end]
}

// gather copies the rows of a run between whose rows others stand.
func (t *table) gather(d *draft) {
	for i := d.first; i < d.end; i++ {
		if t.owner[i] != d.number {
			continue
		}
		d.run.Readings = append(d.run.Readings, t.readings[i])
		if len(t.timesS) > i {
			d.run.TimesS = append(d.run.TimesS, t.timesS[i])
		}
		if len(t.temperaturesC) > i {
			d.run.TemperaturesC = append(d.run.TemperaturesC, t.temperaturesC[i])
		}
	}
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
	c := d.columns
	d.rows++
	d.lastLine = d.row.Line
	if d.skippedBlanks(); !d.shape(c.width) || c.volume < 0 || c.reading < 0 {
		return
	}
	d.checkNumber()
	volume, ok1 := d.needed(c.volume, &d.volumeSteps)
	value, ok2 := d.needed(c.reading, &d.readingSteps)
	if !ok1 || !ok2 || d.fault != nil {
		return // a run with a fault needs no readings
	}
	t := &d.table
	at := len(t.readings)
	t.readings = append(t.readings, Reading{VolumeML: volume, Value: value, Line: d.row.Line})
	if c.time >= 0 {
		t.timesS = d.optional(c.time, 0, grown(t.timesS, at, cap(t.readings)))
	}
	if c.temperature >= 0 {
		t.temperaturesC = d.optional(c.temperature, 1, grown(t.temperaturesC, at, cap(t.readings)))
	}
	if d.schema.Layout == schemas.Long {
		t.owner = append(t.owner, d.number)
	}
	switch {
	case d.count == 0:
		d.first = at
	case d.end != at:
		d.interleaved = true
	}
	d.end = at + 1
	d.count++
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
		d.repairs.add(line, "blank line in the table skipped")
	}
	d.blanks = d.blanks[:0]
}

// shape reports whether the row has the cells of the header.
func (d *draft) shape(width int) bool {
	if d.row.Fault != "" {
		d.refuseRow(d.row.FaultAt, "", d.row.Fault, "the line is damaged; export the dump again")
		return false
	}
	if d.row.DropEmptyTail(width) {
		d.repairs.add(d.row.Line, trailingDropped)
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

// needed reads a volume or reading; without it the run is refused.
func (d *draft) needed(i int, s *steps) (v float64, ok bool) {
	at, f := d.row.Cells[i], d.columns.fields[i]
	b := d.scan.Bytes(at)
	n, fault := cells.ParseNumber(b, d.schema.Dialect.DecimalChar, f.Unit.Shift)
	v, l := n.Value*f.Unit.Times+f.Unit.Plus, d.columns.limits[i]
	if fault != cells.NumberOK || !l.admits(v) || d.missing(b) {
		_, _, why, hint := d.quantity(b, f.Unit, l)
		d.refuseRow(at.From, string(f.Role), why, hint)
		return 0, false
	}
	s.see(n, f.Unit)
	if n.Decimals+f.Unit.Shift > 0 {
		d.decimalMarks++
	}
	return v, true
}

// optional reads a time or temperature; where one cannot be used the column is
// left out and the run says so.
func (d *draft) optional(i, which int, column []float64) []float64 {
	if d.lost[which] {
		return append(column, 0)
	}
	at, f := d.row.Cells[i], d.columns.fields[i]
	_, v, why, _ := d.quantity(d.scan.Bytes(at), f.Unit, d.columns.limits[i])
	if f.Role == schemas.RoleTime {
		if why == "" && d.count > 0 && v < d.lastTimeS {
			why = fmt.Sprintf("%v s after %v s, time runs backwards", v, d.lastTimeS)
		}
		d.lastTimeS = v
	}
	if why != "" {
		d.lost[which] = true
		d.repairs.add(d.row.Line, fmt.Sprintf("%s: %s; the column is not used", f.Role, why))
	}
	return append(column, v)
}

// quantity reads a number of a unit and holds it against its limit. why is ""
// when it can be used.
func (d *draft) quantity(b []byte, u schemas.Unit, l *limit) (n cells.Number, v float64, why, hint string) {
	if d.missing(b) {
		return n, 0, "the cell is empty", "the dump is damaged or the reading failed; export it again"
	}
	n, fault := cells.ParseNumber(b, d.schema.Dialect.DecimalChar, u.Shift)
	if fault != cells.NumberOK {
		why, hint = d.notNumber(b, fault)
		return n, 0, why, hint
	}
	v = n.Value
	if u.Times != 1 {
		v *= u.Times
	}
	v += u.Plus
	if why = l.breaks(v); why != "" {
		return n, 0, why, l.hint
	}
	return n, v, "", ""
}

// missing reports whether a text means "not given".
func (d *draft) missing(b []byte) bool {
	if len(b) == 0 {
		return true
	}
	for _, m := range d.schema.Dialect.MissingValues {
		if string(b) == m {
			return true
		}
	}
	return false
}

func (d *draft) notNumber(b []byte, fault cells.NumberFault) (why, hint string) {
	why = cells.Quoted(b) + " is not a number"
	switch {
	case fieldOf(d.schema, b) != nil:
		return cells.Quoted(b) + " is the header again", "two exports in one file? export each by itself"
	case fault == cells.NumberUnbounded:
		return cells.Quoted(b) + " is too large", "the cell is damaged; export the dump again"
	case fault == cells.OtherMark && d.decimalMarks > 0:
		return why, fmt.Sprintf("other numbers of the run have the decimal mark %q; export the dump again", string(d.schema.Dialect.DecimalChar))
	case fault == cells.OtherMark && d.schema.Dialect.DecimalChar == '.':
		return why, `set decimalChar = "," in the schema`
	case fault == cells.OtherMark:
		return why, `set decimalChar = "." in the schema`
	}
	return why, "a plain decimal number is expected; the cell is damaged or the column is another one"
}
