package schemaview

import (
	"fmt"
	"io"
	"strconv"

	"lastdrop/ingest"
	"lastdrop/report"
)

// runsShown is how many runs are told in full; a person who writes a schema
// looks at the first ones.
const runsShown = 3

// repairsShown is how many repairs of a run are told: a schema that does not fit
// has one for every line.
const repairsShown = 8

// Try writes what a schema makes of a dump: columns, first and last rows,
// facts, indicated endpoints, repairs. all is true for every run in full. The
// problems are not in it: they are errors.
func Try(w io.Writer, e *ingest.Explanation, all bool) error {
	p := &page{}
	read := 0
	for i := range e.Runs {
		if e.Runs[i].Read {
			read++
		}
	}
	found := fmt.Sprintf("%d of %d %s read", read, len(e.Runs), count(len(e.Runs), "run", "runs"))
	if len(e.Runs) == 0 {
		found = "no run found"
	}
	p.hang("", 0, fmt.Sprintf("%s with schema %s: %s.", e.Path, e.Schema, found))
	if e.Encoding != "" {
		p.row("encoding", e.Encoding)
	}
	if e.Missing != "" {
		p.row("evidence", e.Missing)
	} else if e.Encoding != "" {
		p.row("evidence", "all that [recognise] states is there")
	}
	for i := range e.Runs {
		if i >= runsShown && !all {
			p.heading(fmt.Sprintf("And %d more; --all shows every run.", len(e.Runs)-i))
			break
		}
		p.run(&e.Runs[i], all)
	}
	return p.writeTo(w)
}

func (p *page) run(one *ingest.Explained, all bool) {
	r := &one.Run
	head := fmt.Sprintf("RUN %d, line %d: not read", r.Number, r.Line)
	if one.Read {
		head = fmt.Sprintf("RUN %d, line %d: read, %d readings of %s", r.Number, r.Line, len(r.Readings), r.Signal)
	}
	p.heading(head)
	p.become(one.Columns)
	p.rows(one)
	p.stated(r)
	for i, repair := range r.Repairs {
		if i >= repairsShown && !all {
			p.row("", fmt.Sprintf("and %d more; --all shows every one", len(r.Repairs)-i))
			break
		}
		p.row(first(i, "repairs"), repair)
	}
}

// first is a label that stands before the first of several.
func first(i int, label string) string {
	if i > 0 {
		return ""
	}
	return label
}

const titleWidth, roleWidth = 34, 24

// become tells which column became what.
func (p *page) become(columns []ingest.Column) {
	if len(columns) == 0 {
		return
	}
	p.line("  " + pad("column", titleWidth) + pad("is", roleWidth) + "unit")
	for _, c := range columns {
		role, unit := c.Role, c.Unit
		if role == "" {
			role = "not used"
		}
		if c.Becomes != "" && c.Becomes != unit && unit != "["+c.Becomes+"]" {
			unit += " becomes " + c.Becomes
		}
		p.line("  " + pad(cut(c.Title, titleWidth-2), titleWidth) + pad(cut(role, roleWidth-1), roleWidth) + cut(unit, width-2-titleWidth-roleWidth))
	}
}

const lineWidth, writtenWidth, valueWidth = 8, 16, 13

// rows are the first and the last rows as written and as read.
func (p *page) rows(one *ingest.Explained) {
	if len(one.Rows) == 0 {
		return
	}
	volume, reading := -1, -1
	for i, c := range one.Columns {
		switch c.Role {
		case "volume", "increment":
			volume = i
		case "pH", "potential", "conductivity", "conductance":
			reading = i
		}
	}
	timed := one.Run.TimesS != nil
	p.line("")
	head := padLeft("line", lineWidth) + "  " + pad("written", writtenWidth) + padLeft("mL", valueWidth) + "  " +
		pad("written", writtenWidth) + padLeft(one.Run.Signal.Unit(), valueWidth)
	if timed {
		head += padLeft("s", 10)
	}
	p.line(head)
	for i, row := range one.Rows {
		if i > 0 && row.Line > one.Rows[i-1].Line+1 {
			p.line(padLeft("…", lineWidth))
		}
		text := padLeft(strconv.Itoa(row.Line), lineWidth) + "  " + pad(cell(row.Written, volume), writtenWidth) + padLeft(figure(row.Reading.VolumeML), valueWidth) +
			"  " + pad(cell(row.Written, reading), writtenWidth) + padLeft(figure(row.Reading.Value), valueWidth)
		if timed && row.TimeS != nil {
			text += padLeft(figure(*row.TimeS), 10)
		}
		p.line(text)
	}
	p.line("")
}

// figure is a converted number as a person compares it; nine digits are more
// than any instrument writes.
func figure(v float64) string { return report.Short(v, 9) }

func cell(written []string, column int) string {
	if column < 0 || column >= len(written) {
		return ""
	}
	return cut(written[column], writtenWidth-2)
}

// stated are the facts and what the instrument found.
func (p *page) stated(r *ingest.Run) {
	n := 0
	say := func(name, value string) {
		if value != "" {
			p.row(first(n, "facts"), name+" "+value)
			n++
		}
	}
	f := &r.Facts
	for _, t := range [...]struct{ name, value string }{
		{"sample", f.Sample}, {"procedure", f.Procedure}, {"instrument", f.Instrument}, {"operator", f.Operator},
		{"purpose", f.Purpose}, {"started", f.Started}, {"titrant", f.Titrant}, {"reaction", f.Reaction},
	} {
		say(t.name, quote(t.value))
	}
	for _, t := range [...]struct {
		name  string
		value *float64
		unit  string
	}{
		{"titrant_mol_per_l", f.TitrantMolPerL, " mol/L"}, {"aliquot_ml", f.AliquotML, " mL"}, {"solvent_ml", f.SolventML, " mL"},
		{"temperature_c", f.TemperatureC, " °C"}, {"end_reading", f.EndReading, " " + r.Signal.Unit()},
	} {
		if t.value != nil {
			say(t.name, figure(*t.value)+t.unit)
		}
	}
	for _, o := range f.Other {
		say("(not mapped) "+o.Key+":", quote(o.Value))
	}
	for i, in := range r.Indicated {
		p.row(first(i, "indicated"), fmt.Sprintf("%s at %s mL, line %d", in.Kind, figure(in.VolumeML), in.Line))
	}
	for i, out := range r.Results {
		p.row(first(i, "results"), fmt.Sprintf("%s: %s %s, line %d, kept as stated", out.Key, out.Text, out.Unit, out.Line))
	}
	for i, rem := range r.Remarks {
		p.row(first(i, "remarks"), fmt.Sprintf("line %d: %s", rem.Line, rem.Text))
	}
}

func quote(s string) string {
	if s == "" {
		return ""
	}
	return `"` + s + `"`
}
