package ingest

import (
	"bytes"
	"fmt"
	"strings"

	"lastdrop/ingest/cells"
	"lastdrop/schemas"
)

// columns is a header row bound to the fields of a schema: the index of each
// column, -1 for none.
type columns struct {
	volume, reading, time, temperature, number, run int

	fields []*schemas.Field // by column; nil for an unknown one
	limits []*limit         // by column, of its quantity
	signal Signal
	width  int
	line   int
}

// signals by role of the reading.
func signalOf(r schemas.Role) Signal {
	switch r {
	case schemas.RolePotential:
		return Potential
	case schemas.RoleConductivity:
		return Conductivity
	}
	return PH
}

func foldEqual(b []byte, title string) bool {
	return len(b) > 0 && bytes.EqualFold(b, []byte(title))
}

// fieldOf returns the field that a header text names, nil for none. Upper and
// lower case count only where they alone tell two fields apart (t and T).
func fieldOf(s *schemas.Schema, b []byte) *schemas.Field {
	var alike *schemas.Field
	ambiguous := false
	for i := range s.Fields {
		f := &s.Fields[i]
		for _, t := range f.Titles {
			if string(b) == t {
				return f
			}
			if foldEqual(b, t) {
				ambiguous = ambiguous || alike != nil && alike != f
				alike = f
			}
		}
	}
	if ambiguous {
		return nil
	}
	return alike
}

// headerFit says how a row stands to the fields of a schema.
type headerFit struct {
	volume, reading bool
	known           int  // cells that are header texts
	numbers         bool // some cell is a number
}

// complete: a row by which a dump can be recognised.
func (h headerFit) complete() bool { return h.volume && h.reading && !h.numbers }

// meant: a row that can only have been meant as the header, even when a
// column that the run needs is missing.
func (h headerFit) meant() bool { return !h.numbers && (h.known >= 2 || h.volume) }

func fitHeader(s *schemas.Schema, scan *cells.Scanner, row *cells.Row) headerFit {
	var h headerFit
	if len(row.Cells) < 2 || row.Fault != "" {
		return h
	}
	for _, c := range row.Cells {
		b := scan.Bytes(c)
		f := fieldOf(s, b)
		if f == nil {
			if _, fault := cells.ParseNumber(b, s.Dialect.DecimalChar, 0); fault == cells.NumberOK {
				h.numbers = true
			}
			continue
		}
		h.known++
		h.volume = h.volume || f.Role == schemas.RoleVolume
		h.reading = h.reading || f.Role.IsReading()
	}
	return h
}

// bind binds the row at hand as the header of the run.
func (d *draft) bind() {
	if d.row.DropEmptyTail(1) {
		d.repairs.add(d.row.Line, trailingDropped)
	}
	c := &columns{volume: -1, reading: -1, time: -1, temperature: -1, number: -1, run: -1,
		width: len(d.row.Cells), line: d.row.Line, fields: make([]*schemas.Field, len(d.row.Cells)), limits: make([]*limit, len(d.row.Cells))}
	d.columns, d.lastLine = c, d.row.Line
	d.blanks = d.blanks[:0]
	for i, at := range d.row.Cells {
		text := d.scan.Bytes(at)
		f := fieldOf(d.schema, text)
		if f == nil {
			d.repairs.add(d.row.Line, fmt.Sprintf("column %s not used", cells.Quoted(text)))
			continue
		}
		c.fields[i], c.limits[i] = f, limitOf(string(f.Unit.Quantity))
		d.bindColumn(c.slot(f.Role), i, f, at)
	}
	d.needColumns()
}

// slot is where the index of a role is kept; nil for unused columns.
func (c *columns) slot(r schemas.Role) *int {
	switch r {
	case schemas.RoleVolume:
		return &c.volume
	case schemas.RoleTime:
		return &c.time
	case schemas.RoleTemperature:
		return &c.temperature
	case schemas.RoleNumber:
		return &c.number
	case schemas.RoleRun:
		return &c.run
	case schemas.RoleUnused:
		return nil
	}
	return &c.reading
}

func (d *draft) bindColumn(slot *int, i int, f *schemas.Field, at cells.Cell) {
	if slot == nil {
		return
	}
	if *slot >= 0 {
		first := d.columns.fields[*slot]
		d.refuseRow(at.From, string(f.Role), fmt.Sprintf("a second column, %s, beside the %s of column %d", cells.Quoted(d.scan.Bytes(at)), first.Role, *slot+1),
			"a run has one volume and one reading; export it again with one of them")
		return
	}
	*slot = i
	if f.Role.IsReading() {
		d.columns.signal = signalOf(f.Role)
	}
}

// needColumns reports what the header lacks.
func (d *draft) needColumns() {
	c := d.columns
	if c.volume >= 0 && c.reading >= 0 && (c.run >= 0 || d.schema.Layout != schemas.Long) {
		return
	}
	var has []string
	for _, at := range d.row.Cells {
		has = append(has, cells.Quoted(d.scan.Bytes(at)))
	}
	lacks := "reading"
	if c.volume < 0 {
		lacks = "volume"
	} else if c.reading >= 0 {
		lacks = "run"
	}
	d.refuseRow(d.row.From, lacks, fmt.Sprintf("no such column in the header (has %s)", strings.Join(has, ", ")), headerWanted(d.schema))
}

// headerWanted says which header texts a schema needs.
func headerWanted(s *schemas.Schema) string {
	var volume, reading, run []string
	for _, f := range s.Fields {
		for _, t := range f.Titles {
			switch {
			case f.Role == schemas.RoleVolume:
				volume = append(volume, cells.Quoted([]byte(t)))
			case f.Role.IsReading():
				reading = append(reading, cells.Quoted([]byte(t)))
			case f.Role == schemas.RoleRun:
				run = append(run, cells.Quoted([]byte(t)))
			}
		}
	}
	wanted := []string{strings.Join(volume, " or "), strings.Join(reading, " or ")}
	if run != nil {
		wanted = append(wanted, strings.Join(run, " or "))
	}
	return fmt.Sprintf("schema %s needs a header with %s", s.Name, strings.Join(wanted, " and "))
}
