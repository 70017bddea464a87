package ingest

import (
	"bytes"
	"fmt"
	"slices"
	"strings"

	"lastdrop/ingest/cells"
	"lastdrop/ingest/match"
	"lastdrop/ingest/plausible"
	"lastdrop/schemas"
)

// The columns that a run can do without, by their index.
const (
	timeColumn = iota
	temperatureColumn
	driftColumn
	optionalColumns
)

// columns is a header bound to the fields of a schema: the index of each
// column, -1 for none.
type columns struct {
	volume, reading, number, run, status, remark int

	optional [optionalColumns]int
	facts    []factColumn
	titles   [][]byte
	fields   []*schemas.Field   // by column; nil for an unknown one
	limits   []*plausible.Limit // by column, of its quantity
	signal   Signal
	width    int
	tail     int // empty cells behind the last title
	line     int
	text     []byte // all its rows as they stand, to know them again
	rows     int

	dosesTold bool // a status tells which rows must have an increment
	plain     bool // every row is a reading, and its volume and reading stand in it
}

// factColumn is a column that states a fact of the run in every row.
type factColumn struct {
	index int
	match.Stated
}

func newColumns(titles [][]byte, row *cells.Row, rows int) *columns {
	n := len(titles)
	return &columns{volume: -1, reading: -1, number: -1, run: -1, status: -1, remark: -1, optional: [optionalColumns]int{-1, -1, -1},
		titles: titles, fields: make([]*schemas.Field, n), limits: make([]*plausible.Limit, n),
		width: n, line: row.Line, rows: rows}
}

// signals by role of the reading.
func signalOf(r schemas.Role) Signal {
	switch r {
	case schemas.RolePotential:
		return Potential
	case schemas.RoleConductivity, schemas.RoleConductance:
		return Conductivity
	}
	return PH
}

// bind binds the row at hand as the header of the run.
func (d *draft) bind() {
	c := d.bindTitles()
	for i, text := range c.titles {
		d.bindColumn(c, i, text)
	}
	d.needColumns(c)
	d.passHeader()
}

// bindTitles makes the columns of the header at hand, none of them bound.
func (d *draft) bindTitles() *columns {
	before := len(d.row.Cells)
	if d.row.DropEmptyTail(1) {
		d.repairs.Add(d.row.Line, trailingDropped)
	}
	titles, rows := match.Titles(d.schema, &d.scan, &d.row)
	d.columns = newColumns(titles, &d.row, rows)
	d.columns.tail = before - len(d.row.Cells)
	d.lastLine = d.row.Line
	d.blanks = d.blanks[:0]
	return d.columns
}

// passHeader passes the rows of the header after the first.
func (d *draft) passHeader() {
	from := d.row.From
	for n := 1; n < d.columns.rows && d.scan.Next(&d.row); n++ {
		d.lastLine = d.row.Line
	}
	d.columns.text = d.text.Body[from:d.row.To]
	d.columns.bound()
}

// bound finds out whether the rows are plain.
func (c *columns) bound() {
	special := func(i int) bool {
		return i >= 0 && c.fields[i] != nil && (c.fields[i].Empty != schemas.EmptyRefused || c.fields[i].Refills || c.fields[i].Role == schemas.RoleIncrement)
	}
	c.dosesTold = c.status >= 0 && slices.ContainsFunc(c.fields[c.status].Values, func(v schemas.Value) bool { return v.Means == schemas.StatusDose })
	c.plain = c.facts == nil && c.remark < 0 && c.status < 0 && !special(c.volume) && !special(c.reading)
}

// bindColumn binds one column by its header text.
func (d *draft) bindColumn(c *columns, i int, text []byte) {
	f := match.FieldOf(d.schema, text)
	if f == nil {
		if stated := match.StatedBy(d.schema, text); stated.Title != "" {
			c.facts = append(c.facts, factColumn{i, stated})
			return
		}
		d.repairs.Add(d.row.Line, fmt.Sprintf("column %s not used", cells.Quoted(text)))
		return
	}
	slot := c.slot(f.Role)
	if slot == nil {
		c.fields[i] = f
		return
	}
	if *slot >= 0 {
		d.refuseRow(d.cellAt(i), string(f.Role), fmt.Sprintf("a second column, %s, beside the %s of column %d", cells.Quoted(text), c.fields[*slot].Role, *slot+1),
			"a run has one volume and one reading; export it again with one of them")
		return
	}
	*slot = i
	c.take(i, f)
}

// take makes column i one of the field.
func (c *columns) take(i int, f *schemas.Field) {
	c.fields[i], c.limits[i] = f, plausible.Of(string(f.Unit.Quantity))
	if f.Role == schemas.RoleTime {
		c.limits[i] = plausible.Of(string(schemas.Duration))
	}
	if f.Role.IsReading() {
		c.signal = signalOf(f.Role)
	}
}

// cellAt is where column i stands in the row at hand.
func (d *draft) cellAt(i int) int {
	if i < len(d.row.Cells) {
		return d.row.Cells[i].From
	}
	return d.row.To
}

// slot is where the index of a role is kept; nil for unused columns.
func (c *columns) slot(r schemas.Role) *int {
	switch r {
	case schemas.RoleVolume, schemas.RoleIncrement:
		return &c.volume
	case schemas.RoleTime:
		return &c.optional[timeColumn]
	case schemas.RoleTemperature:
		return &c.optional[temperatureColumn]
	case schemas.RoleDrift:
		return &c.optional[driftColumn]
	case schemas.RoleNumber:
		return &c.number
	case schemas.RoleRun:
		return &c.run
	case schemas.RoleStatus:
		return &c.status
	case schemas.RoleRemark:
		return &c.remark
	case schemas.RoleUnused:
		return nil
	}
	return &c.reading
}

// needColumns reports what the header lacks.
func (d *draft) needColumns(c *columns) {
	if c.volume >= 0 && c.reading >= 0 && (c.run >= 0 || d.schema.Layout != schemas.Long) {
		return
	}
	var has []string
	for _, text := range c.titles {
		has = append(has, cells.Quoted(text))
	}
	lacks := "reading"
	if c.volume < 0 {
		lacks = "volume"
	} else if c.reading >= 0 {
		lacks = "run"
	}
	d.refuseRow(d.row.From, lacks, fmt.Sprintf("no such column in the header (has %s)", strings.Join(has, ", ")), match.Wanted(d.schema))
}

// headerAgain passes a header that stands again inside the table, where the
// schema permits that. All its rows must be the same to the byte: passing over
// a row that stands where the second should would lose a reading.
func (d *draft) headerAgain() bool {
	rest := d.text.Body[d.row.From:]
	if !d.schema.RepeatedHeader || !bytes.HasPrefix(rest, d.columns.text) {
		return false
	}
	if after := rest[len(d.columns.text):]; len(after) > 0 && after[0] != '\n' && after[0] != '\r' {
		return false
	}
	d.repairs.Add(d.row.Line, "the header again, passed over")
	for n := 1; n < d.columns.rows && d.scan.Next(&d.row); n++ {
		d.lastLine = d.row.Line
	}
	return true
}

// columnFacts takes the facts that columns state; the same text in every row
// is one statement.
func (d *draft) columnFacts() {
	facts := d.columns.facts
	if d.factSeen == nil {
		d.factSeen = make([][]byte, len(facts))
	}
	for i, f := range facts {
		c := d.row.Cells[f.index]
		value := d.scan.Bytes(c)
		if d.missing(value) || bytes.Equal(value, d.factSeen[i]) {
			continue
		}
		d.factSeen[i] = slices.Clip(value)
		d.addStatement(statement{key: []byte(f.Title), value: value, line: d.row.Line, start: d.row.From, at: c.From})
	}
}
