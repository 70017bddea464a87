package ingest

import (
	"fmt"
	"slices"

	"lastdrop/ingest/cells"
	"lastdrop/ingest/match"
	"lastdrop/schemas"
)

// Explanation is what a schema makes of one dump, for the person who writes
// the schema.
type Explanation struct {
	Schema   string
	Path     string
	Encoding string // in which the dump was read, "" when it could not be
	Missing  string // what of the evidence in [recognise] is not there, "" when all is
	Runs     []Explained
	Problems []*schemas.Problem
}

// Explained is one run of the dump, read or not.
type Explained struct {
	Run     Run // as far as it was read; without readings when it is in Problems
	Read    bool
	Columns []Column
	Rows    []ExplainedRow // the first and the last ones
}

// Column is one column of a run's header.
type Column struct {
	Title   string
	Role    string // "" when it is not used
	Unit    string // UCUM code in the dump, "" when it has none
	Becomes string // unit after reading, as printed
}

// ExplainedRow is one row of the table as written and as read.
type ExplainedRow struct {
	Line    int
	Written []string // the cells, in the order of Columns
	Reading Reading
	TimeS   *float64
}

// explainedRows is how many rows at either end of a run are shown.
const explainedRows = 3

// Explain reads a dump with one schema, whether the dump has its evidence or
// not, and says what became of each column. The numbers are those that Read
// gives.
func Explain(data []byte, path string, schema *schemas.Schema) Explanation {
	e := Explanation{Schema: schema.Name, Path: path}
	if len(data) == 0 || len(data) > MaxBytes {
		_, _, e.Problems = Read(data, path, []*schemas.Schema{schema})
		return e
	}
	text, fault, missing := match.Fits(data, schema)
	if e.Missing = missing; fault != nil {
		e.Problems = []*schemas.Problem{{Path: path, Line: fault.Line, Col: fault.Col, Msg: fault.Msg, Hint: fault.Hint}}
		return e
	}
	e.Encoding = string(text.Encoding())
	r := readWith(schema, text, path)
	e.Problems = r.problems
	lines := map[int][]string{}
	for _, d := range r.drafts {
		e.Runs = append(e.Runs, d.explained(lines))
	}
	r.written(lines)
	for i := range e.Runs {
		for j := range e.Runs[i].Rows {
			row := &e.Runs[i].Rows[j]
			row.Written = lines[row.Line]
		}
	}
	return e
}

// explained says what became of one run, and notes in lines which rows are to
// be shown.
func (d *draft) explained(lines map[int][]string) Explained {
	one := Explained{Run: d.run, Read: d.fault == nil}
	if !one.Read {
		one.Run = Run{Number: d.number, Line: d.line, Repairs: d.repairs.Lines()}
	}
	if d.columns != nil {
		one.Columns = d.columns.explained()
	}
	n := len(one.Run.Readings)
	for i, p := range one.Run.Readings {
		if i >= explainedRows && i < n-explainedRows {
			continue
		}
		row := ExplainedRow{Line: p.Line, Reading: p}
		if one.Run.TimesS != nil {
			row.TimeS = &one.Run.TimesS[i]
		}
		one.Rows = append(one.Rows, row)
		lines[p.Line] = nil
	}
	return one
}

// explained says what each column is.
func (c *columns) explained() []Column {
	var list []Column
	for i, title := range c.titles {
		text, _, _ := cells.Clean(title)
		one := Column{Title: text}
		if f := c.fields[i]; f != nil {
			one.Role, one.Unit, one.Becomes = string(f.Role), f.Unit.Code, becomes(f)
		}
		if j := slices.IndexFunc(c.facts, func(f factColumn) bool { return f.index == i }); j >= 0 {
			one.Role = fmt.Sprintf("fact %s", c.facts[j].fact.Name)
		}
		list = append(list, one)
	}
	return list
}

// becomes is the unit that a column has after reading.
func becomes(f *schemas.Field) string {
	switch {
	case f.Role.IsVolume():
		return "mL"
	case f.Role.IsReading():
		return signalOf(f.Role).Unit()
	case f.Role == schemas.RoleTime:
		return "s"
	case f.Role == schemas.RoleTemperature:
		return "°C"
	case f.Role == schemas.RoleDrift:
		return "a minute"
	}
	return ""
}

// written fills in the cells of the lines that are asked for.
func (r *reader) written(lines map[int][]string) {
	scan := match.Scanner(r.text, r.schema)
	var row cells.Row
	for scan.Next(&row) {
		if _, asked := lines[row.Line]; !asked {
			continue
		}
		var texts []string
		for _, c := range row.Cells {
			text, _, _ := cells.Clean(scan.Bytes(c))
			texts = append(texts, text)
		}
		lines[row.Line] = texts
	}
}
