package draft

import (
	"fmt"
	"slices"
	"strconv"
	"strings"

	"lastdrop/ingest/cells"
	"lastdrop/schemas"
)

// fact is one statement of the dump that the draft maps.
type fact struct {
	name     string // of the fact, or "indicated"
	key      string
	value    string
	unit     string
	suffix   string
	format   string
	formats  []string // several that fit; nobody can tell which
	fallback string   // what the fact always is, for facts that no line states
	out      string   // why it is not mapped; "" when it is
}

// statement is a line of key and value, of one of the kinds.
type statement struct {
	key, value string
	lines      schemas.Lines
	sep        byte
}

// stated reads a line as key and value.
func (d *draft) stated(l *line) (statement, bool) {
	filled := trimmed(l.cells)
	text := strings.TrimRight(l.text, " ;,\t|")
	kind := schemas.TextLines
	switch {
	case l.comment:
		text, kind = strings.TrimLeft(text, " "+string(rune(d.dialect.CommentChar))), schemas.CommentLines
	case len(filled) >= 2 && filled[0] != "":
		return statement{strings.TrimSpace(filled[0]), strings.Join(filled[1:], string(rune(d.dialect.Delimiter))), schemas.CellLines, 0}, true
	}
	at := strings.IndexAny(text, ":=")
	if at < 1 {
		return statement{}, false
	}
	return statement{strings.TrimSpace(text[:at]), strings.TrimSpace(text[at+1:]), kind, text[at]}, true
}

// above are the lines of the preambles, without the marks that begin runs.
func (d *draft) above() []line {
	var all []line
	before := 0
	for n := range d.tables {
		from, to := before, d.tables[n].header
		for i := from; i < to; i++ {
			if l := &d.lines[i]; d.stack.Begin != "" && len(l.cells) > 0 && l.cells[0] == d.stack.Begin {
				from = i + 1
			}
		}
		all = append(all, d.lines[from:to]...)
		before = d.tables[n].to
	}
	return all
}

// findFacts finds out how facts stand above the header, and which they are.
func (d *draft) findFacts() {
	d.findPreamble()
	d.wideNames()
	for _, l := range d.above() {
		if s, ok := d.stated(&l); ok && s.lines == d.preamble && !(d.layout == schemas.Wide && slices.Contains(d.wide, s.key)) {
			d.mapFact(s)
		}
	}
	d.countFact()
	d.kinds()
}

// findPreamble counts how lines of key and value are written.
func (d *draft) findPreamble() {
	votes := map[schemas.Lines]int{}
	seps := map[byte]int{}
	others := 0
	first := true
	for _, l := range d.above() {
		if l.blank() {
			continue
		}
		s, ok := d.stated(&l)
		if ok {
			votes[s.lines]++
			if s.sep != 0 {
				seps[s.sep]++
			}
		} else if !l.comment && !first {
			others++
		}
		first = false
	}
	d.preamble = schemas.NoPreamble
	for _, kind := range []schemas.Lines{schemas.CommentLines, schemas.CellLines, schemas.TextLines} {
		if votes[kind] > votes[d.preamble] {
			d.preamble = kind
		}
	}
	if d.preamble == schemas.NoPreamble && others > 0 {
		d.preamble = schemas.CellLines
	}
	if d.sep = ':'; seps['='] > seps[':'] {
		d.sep = '='
	}
	if d.preamble != schemas.NoPreamble {
		d.choose("preamble", string(d.preamble), fmt.Sprintf("%d lines of key and value above the header", votes[d.preamble]), "")
	}
}

// wideNames: rows directly above a wide header that have cells over several
// runs and none that is a key.
func (d *draft) wideNames() {
	if d.layout != schemas.Wide {
		return
	}
	for i := d.tables[0].header - 1; i >= 0; i-- {
		l := &d.lines[i]
		filled := 0
		for _, c := range l.cells {
			if c != "" {
				filled++
			}
		}
		if filled < 2 || l.comment || len(trimmed(l.cells)) < 3 {
			return
		}
		title := "sample"
		if len(d.wide) > 0 {
			title = fmt.Sprintf("row %d above the header", len(d.wide)+1)
		} else {
			d.facts = append(d.facts, fact{name: string(schemas.FactSample), key: title})
			d.unsure("sample: the row above the header is taken for the sample of each run")
		}
		d.wide = append([]string{title}, d.wide...)
	}
}

// mapFact maps one statement to a fact or an indicated endpoint.
func (d *draft) mapFact(s statement) {
	if d.kind(s.key, s.value) {
		return
	}
	name, unit := factNamed(s.key)
	if name == "" || slices.ContainsFunc(slices.Concat(d.facts, d.ends), func(f fact) bool { return strings.EqualFold(f.key, s.key) }) {
		return
	}
	if name == schemas.FactSample && unit != "" { // "sample taken mL"
		name = schemas.FactAliquot
	}
	f := fact{name: string(name), key: s.key, value: s.value, unit: unit}
	switch name {
	case "indicated":
		d.endpoint(f)
		return
	case schemas.FactStarted:
		d.date(&f)
	case schemas.FactReadings:
		if f.value != strconv.Itoa(d.rowsOfRun()) {
			return
		}
	case schemas.FactReaction, schemas.FactPurpose:
		if allowed := schemas.AllowedTexts(name); !slices.ContainsFunc(allowed, func(a string) bool { return strings.EqualFold(a, s.value) }) {
			f.out = fmt.Sprintf("state in values what %q means: %s", s.value, strings.Join(allowed, ", "))
		}
	case schemas.FactTitrantMol, schemas.FactAliquot, schemas.FactSolvent, schemas.FactTemperature, schemas.FactDensity, schemas.FactCell, schemas.FactEndReading:
		d.quantity(&f)
	}
	if slices.ContainsFunc(d.facts, func(g fact) bool { return g.name == f.name && g.out == "" }) {
		f.out = "another key is this fact"
	}
	if f.out != "" {
		d.unsure("%s (%q) is not mapped: %s", f.name, f.key, f.out)
	}
	d.facts = append(d.facts, f)
}

// units of number facts where neither key nor value state one.
var usualUnits = map[schemas.FactName]string{schemas.FactTitrantMol: "mol/L", schemas.FactAliquot: "mL", schemas.FactSolvent: "mL", schemas.FactTemperature: "Cel", schemas.FactDensity: "g/mL", schemas.FactCell: "/cm", "indicated": "mL"}

// quantity finds unit and suffix of a number.
func (d *draft) quantity(f *fact) {
	if f.value == "" {
		f.unit = usualUnit(f)
		return
	}
	if _, ok := numberOf(f.value, &d.dialect); !ok {
		f.out = fmt.Sprintf("%q is no number with the decimal mark %q", f.value, string(d.dialect.DecimalChar))
	}
	if i := strings.LastIndexAny(f.value, "0123456789"); i >= 0 && i < len(f.value)-1 {
		f.suffix = strings.TrimSpace(f.value[i+1:])
		f.unit = unitNamed(f.suffix)
	}
	if f.name == string(schemas.FactEndReading) {
		f.unit = ""
		return
	}
	if f.unit == "" || !allowedUnit(f) {
		f.unit = usualUnit(f)
		d.unsure("unit of %q: %s is usual", f.key, f.unit)
	}
}

func usualUnit(f *fact) string { return usualUnits[schemas.FactName(f.name)] }

// allowedUnit reports whether a unit is of the quantity of the fact.
func allowedUnit(f *fact) bool {
	groups := [][]string{{"mL", "uL", "L"}, {"mol/L", "mmol/L", "mol/m3"}, {"Cel", "K"}, {"g/mL", "g/L", "kg/L"}, {"/cm", "/m"}}
	for _, g := range groups {
		if slices.Contains(g, usualUnit(f)) {
			return slices.Contains(g, f.unit)
		}
	}
	return false
}

// rowsOfRun is how many rows the first run has.
func (d *draft) rowsOfRun() int {
	n := 0
	for _, l := range d.lines[d.tables[0].from:d.tables[0].to] {
		if !l.comment && !l.blank() {
			n++
		}
	}
	return n
}

// countFact: the row that ends a run may state how many rows it has.
func (d *draft) countFact() {
	if d.stack.End == "" {
		return
	}
	for _, l := range d.lines[d.tables[0].to:] {
		if len(l.cells) > 1 && l.cells[0] == d.stack.End {
			if l.cells[1] == strconv.Itoa(d.rowsOfRun()) {
				d.facts = append(d.facts, fact{name: string(schemas.FactReadings), key: d.stack.End, value: l.cells[1]})
			}
			return
		}
	}
}

// dateFormats are those that are tried, ISO 8601 ("") first. Where day and
// month can change places both are.
var dateFormats = []string{"", "%d.%m.%Y %H:%M:%S", "%d.%m.%Y %H:%M", "%m.%d.%Y %H:%M:%S", "%m.%d.%Y %H:%M", "%d.%m.%y %H:%M", "%m.%d.%y %H:%M", "%d/%m/%Y %H:%M:%S", "%m/%d/%Y %H:%M:%S", "%d/%m/%Y %H:%M", "%m/%d/%Y %H:%M", "%d-%m-%Y %H:%M", "%m-%d-%Y %H:%M",
	"%d/%m/%Y %I:%M %p", "%m/%d/%Y %I:%M %p", "%d/%m/%Y %I:%M:%S %p", "%m/%d/%Y %I:%M:%S %p", "%Y/%m/%d %H:%M:%S", "%Y/%m/%d %H:%M", "%Y.%m.%d %H:%M", "%Y.%m.%d %H:%M:%S", "%Y%m%d %H%M%S", "%Y%m%dT%H%M%S"}

// date finds the format of a start; nothing is guessed when two fit.
func (d *draft) date(f *fact) {
	for _, format := range dateFormats {
		var p schemas.Pattern
		if format != "" {
			var err error
			if p, err = schemas.ParsePattern(format); err != nil {
				continue
			}
		}
		if _, err := cells.ParseDate(f.value, p, schemas.Zone{}); err == nil {
			f.formats = append(f.formats, format)
		}
	}
	switch len(f.formats) {
	case 0:
		if f.out = fmt.Sprintf("%q has no date and time of a known form", f.value); f.value == "" {
			f.out = "the dump does not state it, so its form is not known"
		}
	case 1:
		f.format = f.formats[0]
	default:
		f.out = "day and month may stand either way; choose one of the formats"
	}
}

// allClock reports whether all texts of a column are clock times of a format.
func allClock(list []string, format string) bool {
	p, err := schemas.ParseClock(format)
	if err != nil || len(list) == 0 {
		return false
	}
	for _, s := range list {
		if _, err := cells.ParseClock(s, p); s != "" && err != nil {
			return false
		}
	}
	return true
}

// findEvidence finds by what a dump of this kind is known.
func (d *draft) findEvidence() {
	first := slices.IndexFunc(d.lines, func(l line) bool { return !l.blank() })
	l := &d.lines[first]
	s, isFact := d.stated(l)
	known, _ := factNamed(s.key)
	switch {
	case first >= d.tables[0].header-len(d.wide) || l.comment || isFact && known != "" || d.stack.Begin != "" && len(l.cells) > 0 && l.cells[0] == d.stack.Begin:
	case isFact && s.lines == schemas.CellLines:
		d.firstLn = s.key
	default:
		text := strings.TrimRight(l.text, " ;,\t|")
		if at := strings.IndexAny(text, "0123456789"); at >= 0 {
			text = text[:at]
		}
		d.firstLn = strings.TrimSpace(text)
	}
	if d.firstLn != "" {
		d.choose("evidence", fmt.Sprintf("the first line begins with %q", d.firstLn), "it names no sample and no time", "")
	}
	for _, f := range d.facts {
		if len(d.evidence) < 3 && d.firstLn == "" && d.preamble == schemas.CellLines && d.stack.End != f.key && slices.ContainsFunc(d.lines, func(l line) bool { return strings.HasPrefix(l.text, f.key) }) {
			d.evidence = append(d.evidence, f.key)
		}
	}
	if d.firstLn == "" && d.evidence == nil {
		d.unsure("recognise: only the header is evidence; another instrument may have the same")
	}
}
