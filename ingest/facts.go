package ingest

import (
	"bytes"
	"fmt"
	"path"
	"slices"
	"strings"

	"lastdrop/ingest/cells"
	"lastdrop/ingest/match"
	"lastdrop/ingest/plausible"
	"lastdrop/schemas"
)

// applyFacts makes facts and indicated endpoints of the statements. A number
// that enters arithmetic and cannot be read refuses the run; any other fact
// that cannot be read is left out with a repair line.
func (d *draft) applyFacts() {
	for i := range d.schema.Facts {
		rule := &d.schema.Facts[i]
		s := d.find(string(rule.Name), rule.Titles, rule.Columns)
		if s == nil {
			s = d.fromName(rule)
		}
		switch {
		case s != nil:
			d.applyFact(rule, s)
		case rule.Default != "":
			*d.textSlot(rule.Name) = rule.Default
		case rule.Number != nil:
			d.applyConstant(rule)
		case rule.Name == schemas.FactReadings && d.fault == nil: // else it may be lost with the rest
			d.refuse(d.lastLine, 0, -1, "readings", "the dump does not state how many rows the run has", fmt.Sprintf("schema %s expects it; the line is lost: export the dump again", d.schema.Name))
		}
	}
	d.applyIndicated()
	d.applyResults()
	d.otherFacts()
}

// fromName takes a fact out of the name of the dump or of its folder, nil
// when they do not state it.
func (d *draft) fromName(rule *schemas.Fact) *statement {
	folder, file := path.Split(strings.ReplaceAll(d.path, `\`, "/"))
	value := rule.File.Of(file)
	if value == "" {
		value = rule.Folder.Of(path.Base(folder))
	}
	if value == "" {
		return nil
	}
	return &statement{key: []byte("file name"), value: []byte(value), at: -1}
}

// applyConstant takes a number that the schema states, where the dump does not.
func (d *draft) applyConstant(rule *schemas.Fact) {
	v := *rule.Number
	if l := plausible.Of(string(rule.Name)); !l.Admits(v) {
		d.refuse(d.line, 0, -1, string(rule.Name), l.Breaks(v), fmt.Sprintf("correct the default in schema %s", d.schema.Name))
		return
	}
	if rule.Name == schemas.FactTemperature {
		d.run.Facts.TemperatureC = &v
		return
	}
	*d.numberSlot(rule.Name) = &v
}

// find returns the one statement with a key among the titles, nil for none.
// A fact that is stated twice with different values refuses the run, for
// nobody can tell which one holds.
func (d *draft) find(field string, titles, columns []string) *statement {
	var found *statement
	for i := range d.statements {
		s := &d.statements[i]
		if !equalFold(s.key, titles) && !equalFold(s.key, columns) {
			continue
		}
		s.used = true
		switch {
		case d.missing(s.value):
		case found == nil:
			found = s
		case bytes.Equal(found.value, s.value):
			d.repairs.Add(s.line, fmt.Sprintf("%s stated again", field))
		default:
			d.refuse(s.line, s.start, s.at, field, fmt.Sprintf("%s here, %s in line %d", cells.Quoted(s.value), cells.Quoted(found.value), found.line), "a fact may be stated once; export the dump again")
		}
	}
	return found
}

func (d *draft) applyFact(rule *schemas.Fact, s *statement) {
	switch rule.Name {
	case schemas.FactStarted:
		d.applyStart(rule, s)
	case schemas.FactReadings:
		d.checkCount(s)
	case schemas.FactRun: // has joined the footer row to its run
	case schemas.FactTemperature:
		if _, v, why, _ := d.quantity(s.value, s.line, &rule.Written, plausible.Of(string(rule.Name))); why != "" {
			d.repairs.Add(s.line, fmt.Sprintf("%s: %s; the fact is not used", rule.Name, why))
		} else {
			d.run.Facts.TemperatureC = &v
		}
	case schemas.FactTitrantMol, schemas.FactAliquot, schemas.FactSolvent, schemas.FactEndReading, schemas.FactDensity, schemas.FactCell:
		d.applyNumber(rule, s)
	default:
		*d.textSlot(rule.Name) = d.factText(rule, s)
	}
}

// applyStart reads when the run was started; the time of day may stand by
// itself.
func (d *draft) applyStart(rule *schemas.Fact, s *statement) {
	text := s.value
	if rule.Times != nil {
		of := d.find("started", rule.Times, nil)
		if of == nil {
			d.repairs.Add(s.line, fmt.Sprintf("started: no time of day beside %s; the fact is not used", cells.Quoted(s.value)))
			return
		}
		text = slices.Concat(s.value, []byte{' '}, of.value)
	}
	date, err := cells.ParseDate(string(text), rule.Format, rule.Zone)
	if err != nil {
		d.repairs.Add(s.line, fmt.Sprintf("started: %s %v; the fact is not used", cells.Quoted(text), err))
	}
	d.run.Facts.Started = date
}

// applyNumber reads a number that enters arithmetic.
func (d *draft) applyNumber(rule *schemas.Fact, s *statement) {
	written, l := rule.Written, plausible.Of(string(rule.Name))
	if rule.Name == schemas.FactEndReading {
		readings := d.columns.fields
		if d.columns.reading < 0 {
			return // the header has been refused
		}
		own := readings[d.columns.reading].Unit
		if written.Unit.Code == "" {
			written.Unit = own
		}
		if unit := written.Unit; unit.Quantity != own.Quantity {
			d.refuse(s.line, s.start, s.at, string(rule.Name), fmt.Sprintf("a %s in a run whose readings are %s", unit.Quantity, own.Quantity), "export it again, or state in the schema what the fact is")
			return
		}
		l = plausible.Of(string(own.Quantity))
	}
	_, v, why, hint := d.quantity(s.value, s.line, &written, l)
	if why != "" {
		d.refuse(s.line, s.start, s.at, string(rule.Name), why, hint)
		return
	}
	*d.numberSlot(rule.Name) = &v
}

// textSlot is where a text fact is kept.
func (d *draft) textSlot(name schemas.FactName) *string {
	f := &d.run.Facts
	switch name {
	case schemas.FactSample:
		return &f.Sample
	case schemas.FactProcedure:
		return &f.Procedure
	case schemas.FactInstrument:
		return &f.Instrument
	case schemas.FactOperator:
		return &f.Operator
	case schemas.FactPurpose:
		return &f.Purpose
	case schemas.FactTitrant:
		return &f.Titrant
	}
	return &f.Reaction
}

// numberSlot is where a number that enters arithmetic is kept.
func (d *draft) numberSlot(name schemas.FactName) **float64 {
	f := &d.run.Facts
	switch name {
	case schemas.FactTitrantMol:
		return &f.TitrantMolPerL
	case schemas.FactAliquot:
		return &f.AliquotML
	case schemas.FactSolvent:
		return &f.SolventML
	case schemas.FactDensity:
		return &d.densityGML
	case schemas.FactCell:
		return &d.cellPerCM
	}
	return &f.EndReading
}

// factText is the cleaned text of a fact, translated by the schema's values.
func (d *draft) factText(rule *schemas.Fact, s *statement) string {
	text := d.cleaned(string(rule.Name), s)
	for _, v := range rule.Values {
		if match.Equal([]byte(text), v.Text) {
			return v.Means
		}
	}
	allowed := schemas.AllowedTexts(rule.Name)
	if allowed == nil {
		return text
	}
	i := slices.IndexFunc(allowed, func(a string) bool { return match.Equal([]byte(text), a) })
	if i < 0 {
		d.repairs.Add(s.line, fmt.Sprintf("%s: %s is not known; the fact is not used", rule.Name, cells.Quoted(s.value)))
		return ""
	}
	return allowed[i]
}

// cleaned is the value of a statement as text that is safe to show.
func (d *draft) cleaned(field string, s *statement) string {
	text, replaced, cut := cells.Clean(s.value)
	if replaced {
		d.repairs.Add(s.line, fmt.Sprintf("%s: characters that cannot be shown replaced", field))
	}
	if cut {
		d.repairs.Add(s.line, fmt.Sprintf("%s: cut to %d characters", field, cells.MaxTextRunes))
	}
	return text
}

// checkCount holds the number of rows seen against the one that is stated.
func (d *draft) checkCount(s *statement) {
	n, fault := cells.ParseNumber(s.value, d.schema.Dialect.DecimalChar, 0)
	if fault != cells.NumberOK {
		d.refuse(s.line, s.start, s.at, "readings", cells.Quoted(s.value)+" is not a number", "it is the count of rows; the line is damaged: export the dump again")
		return
	}
	if n.Value != float64(d.rows) && d.fault == nil { // else it may follow from that
		d.refuse(d.lastLine, 0, -1, "readings", fmt.Sprintf("%s where line %d states %s", plural(d.rows, "row"), s.line, cells.Quoted(s.value)), "the dump is cut off or damaged; export it again")
	}
}

// otherFacts keeps the statements that no rule has used. Where keys are not
// free, as they are in comment lines, the run says so, and everywhere when the
// key is nearly a known one: it may be a damaged or misspelt one.
func (d *draft) otherFacts() {
	for i := range d.statements {
		s := &d.statements[i]
		if s.used || s.mark || d.missing(s.value) {
			continue
		}
		key, _, _ := cells.Clean(s.key)
		if near := d.nearKey(string(s.key)); match.Equal(s.key, near) {
			d.repairs.Add(s.line, cells.Quoted(s.key)+" by itself is no fact, kept as it is")
		} else if near != "" {
			d.repairs.Add(s.line, fmt.Sprintf("%s is nearly %q, kept as it is", cells.Quoted(s.key), near))
		} else if held := d.heldKey(s.key); held != "" && d.schema.Preamble.Lines != schemas.CellLines {
			d.repairs.Add(s.line, fmt.Sprintf("%s holds %q, kept as it is", cells.Quoted(s.key), held))
		} else if split := d.splitKey(s); split != "" {
			d.repairs.Add(s.line, fmt.Sprintf("%s and its value look like %q, kept as they are", cells.Quoted(s.key), split))
		} else if len(s.key) > 0 && s.key[0]-'0' < 10 && d.schema.Preamble.Lines != schemas.CellLines {
			d.repairs.Add(s.line, cells.Quoted(s.key)+" may be the rest of the line above, kept as it is")
		} else if d.schema.Preamble.Lines == schemas.CellLines {
			d.repairs.Add(s.line, fmt.Sprintf("%s is not in schema %s, kept as it is", cells.Quoted(s.key), d.schema.Name))
		}
		d.run.Facts.Other = append(d.run.Facts.Other, Fact{key, d.cleaned(key, s)})
	}
}
