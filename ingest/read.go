package ingest

import (
	"fmt"
	"slices"

	"lastdrop/ingest/cells"
	"lastdrop/ingest/match"
	"lastdrop/ingest/plausible"
	"lastdrop/ingest/repairs"
	"lastdrop/schemas"
)

// MaxBytes is the largest dump that is read: 64 MiB. A day of one bench has
// well under one; larger files are no dumps.
const MaxBytes = 64 << 20

// MinReadings is how many readings a run needs to be a curve at all. Fewer
// cannot show a slope on both sides of an endpoint. Source: common practice,
// no source.
const MinReadings = 5

// Read turns the bytes of one dump into runs. path is used in messages only.
//
// Exactly one schema of the set must fit the dump; it is returned, nil when
// none or several do. Every run of the dump is either in runs, read as the
// schema says with each repair listed, or has exactly one entry in problems:
// the first place at fault, with the number of further ones in its text, and
// Run set unless the layout has one run a dump. A problem without Run concerns
// the whole dump. Runs keep their number in the dump, so runs with problems
// leave gaps. data is not kept and not changed.
func Read(data []byte, path string, set []*schemas.Schema) (runs []Run, schema *schemas.Schema, problems []*schemas.Problem) {
	if len(data) == 0 {
		return nil, nil, []*schemas.Problem{{Path: path, Line: 1, Col: 1, Msg: "the dump is empty", Hint: "export it again"}}
	}
	if len(data) > MaxBytes {
		return nil, nil, []*schemas.Problem{{Path: path, Msg: fmt.Sprintf("%d bytes", len(data)), Hint: fmt.Sprintf("a dump has at most %d bytes (64 MiB)", MaxBytes)}}
	}
	found, problem := match.Recognise(data, path, set)
	if problem != nil {
		return nil, nil, []*schemas.Problem{problem}
	}
	if len(found.Versions) == 1 {
		schema = found.Versions[0]
		r := readWith(schema, found.Text(schema), path)
		return r.runs, schema, r.problems
	}
	return readVersions(found, path)
}

// readWith reads a dump with one schema.
func readWith(schema *schemas.Schema, text *cells.Text, path string) *reader {
	r := &reader{schema: schema, text: text, path: path, scan: match.Scanner(text, schema)}
	switch schema.Layout {
	case schemas.Long:
		r.long()
	case schemas.Wide:
		r.wideRows()
	default:
		r.sections()
	}
	r.checkVersion()
	return r
}

// reader reads one dump with one schema.
type reader struct {
	schema   *schemas.Schema
	text     *cells.Text
	path     string
	scan     cells.Scanner
	row      cells.Row // the row at hand
	common   table
	runs     []Run
	problems []*schemas.Problem
	begun    int      // runs begun so far
	trailing int      // line of the first line when it has trailing delimiters
	merged   string   // what the first line has of another one, "" for nothing
	first    int      // line of that
	drafts   []*draft // every run, in the order of the dump
}

// begin begins the next run at a line.
func (r *reader) begin(line int) *draft {
	r.begun++
	d := &draft{reader: r, table: &r.common, number: r.begun, line: line, first: len(r.common.readings), end: len(r.common.readings)}
	if r.begun == 1 && r.trailing > 0 {
		d.repairs.Add(r.trailing, trailingDropped)
	}
	if r.begun == 1 && r.merged != "" {
		d.repairs.Add(r.first, r.merged)
	}
	return d
}

// unterminated reports whether the row at hand is a last row that may be cut
// off and that the schema does not permit.
func (r *reader) unterminated() bool {
	return !r.row.Ended && (r.text.Cut || !r.schema.KeepUnterminated)
}

// passFirstLine passes the line that the schema states as evidence. The rows
// before it are blank.
func (r *reader) passFirstLine() {
	if r.schema.Recognise.FirstLine == "" && r.schema.Recognise.Begins == "" {
		return
	}
	for r.scan.Next(&r.row) {
		if r.row.Blank() {
			continue
		}
		if r.row.DropEmptyTail(1) {
			r.trailing = r.row.Line
		}
		r.mergedFirst()
		return
	}
}

// close takes a run into the result, or its problem.
func (r *reader) close(d *draft) {
	r.drafts = append(r.drafts, d)
	if d.fault == nil {
		r.runs = append(r.runs, d.run)
		return
	}
	p := d.fault
	switch {
	case d.more == 1:
		p.Msg += ", and 1 more place"
	case d.more > 1:
		p.Msg += fmt.Sprintf(", and %d more places", d.more)
	}
	if r.schema.Layout != schemas.Single {
		p.Run = d.number
	}
	r.problems = append(r.problems, p)
}

// draft is a run while it is read.
type draft struct {
	*reader
	number, line int
	statements   []statement
	columns      *columns // nil before the header
	first, end   int      // of its readings in the table
	table        *table   // that of the reader until rows of other runs come between
	count        int      // of its readings
	rows         int      // seen in the dump, refused ones too
	lastLine     int      // of the last row seen
	lastNumber   float64  // in the number column
	lastTimeS    float64  // in the time column
	clockZero    float64  // first time of a clock, s
	volume       float64  // delivered so far, in a table where it is worked out
	shown        float64  // last volume of such a table as the dump has it
	filled       float64  // volume delivered before the burette was filled last
	delivering   bool     // such a volume has been read
	timedOut     tally    // readings that had not come to rest
	passed       tally    // rows without a reading
	undosed      tally    // rows without an increment, where no status tells that none belongs there
	volumeSteps  steps
	readingSteps steps
	lost         [optionalColumns]bool // the column is not used
	factSeen     [][]byte              // last text of each column that states a fact
	remarks      []Remark
	densityGML   *float64 // of a titrant that is weighed
	cellPerCM    *float64 // constant of the conductivity cell
	inFooter     bool
	wide         *wideTable // layout wide, above its table
	rowFirst     []byte     // text of the first row
	rowBefore    []byte     // text of the row before
	blanks       []int      // lines skipped since the last row of the table
	decimalMarks int        // numbers with a decimal mark read so far
	name         string     // in the column that names the run; layout long
	orphaned     bool       // rows outside any run; layout stacked
	total        bool       // its footer row has been seen; layout long
	repairs      repairs.List
	run          Run
	fault        *schemas.Problem // the first in the file
	more         int              // further ones
}

// refuse notes why the run cannot be read; at is an offset of the text in the
// line that begins at start, or negative for the whole line.
func (d *draft) refuse(line, start, at int, field, msg, hint string) {
	p := &schemas.Problem{Path: d.path, Line: line, Field: field, Msg: msg, Hint: hint}
	if at >= 0 {
		p.Col = d.text.Column(start, at)
	}
	if d.fault == nil {
		d.fault = p
		return
	}
	d.more++
	if p.Line < d.fault.Line || p.Line == d.fault.Line && p.Col > 0 && (p.Col < d.fault.Col || d.fault.Col == 0) {
		d.fault = p
	}
}

// refuseRow is refuse at an offset of the row at hand.
func (d *draft) refuseRow(at int, field, msg, hint string) {
	d.refuse(d.row.Line, d.row.From, at, field, msg, hint)
}

// finish checks the run when all of it has been seen and makes it.
func (d *draft) finish() {
	if d.columns == nil {
		if d.fault == nil {
			d.refuse(d.line, 0, -1, "", "no header row", match.Wanted(d.schema))
		}
		return
	}
	if begin := d.schema.Footer.Begin; begin != "" && d.schema.Footer.Lines != "" && !d.inFooter && d.fault == nil {
		d.refuse(d.lastLine, 0, -1, "", fmt.Sprintf("no line below the rows begins with %q", begin), "the dump is cut off; export it again")
	}
	d.run = Run{Number: d.number, Line: d.line, Signal: d.columns.signal, Remarks: d.remarks}
	d.applyFacts()
	if d.fault == nil && d.count < MinReadings {
		d.refuse(d.lastLine, 0, -1, "", fmt.Sprintf("%s, a curve needs at least %d", plural(d.count, "reading"), MinReadings), "the curve is too short; titrate or export again")
	}
	if d.fault != nil {
		return
	}
	d.run.ReadingStep, d.run.VolumeStepML = d.readingSteps.step(), d.volumeSteps.step()
	d.table.fill(d)
	d.convert()
	d.judge()
	if d.text.Cut {
		d.repairs.Add(d.lastLine, "the dump ends within a character and is cut off")
	}
	d.run.Repairs = d.repairs.Lines()
}

// convert makes volumes of a titrant that was weighed and conductivities of
// conductances.
func (d *draft) convert() {
	c, run := d.columns, &d.run
	if c.fields[c.volume].Unit.Quantity == schemas.Mass {
		if d.densityGML == nil {
			d.refuse(c.line, 0, -1, "density_g_per_ml", "the titrant is weighed and its density is not known", fmt.Sprintf("state it in the dump, or as a default in schema %s", d.schema.Name))
			return
		}
		for i := range run.Readings {
			run.Readings[i].VolumeML /= *d.densityGML
		}
		run.VolumeStepML /= *d.densityGML
	}
	if c.fields[c.reading].Role == schemas.RoleConductance {
		if d.cellPerCM == nil {
			d.refuse(c.line, 0, -1, "cell_constant_per_cm", "the readings are conductances and the cell constant is not known", fmt.Sprintf("state it in the dump, or as a default in schema %s", d.schema.Name))
			return
		}
		for i := range run.Readings {
			run.Readings[i].Value *= *d.cellPerCM
		}
		run.ReadingStep *= *d.cellPerCM
	}
	d.timedOut.told(d, "reading", "had not come to rest, used as they are")
	d.passed.told(d, "row", "without a reading, passed over")
	d.undosed.told(d, "row", "without an increment, taken as no titrant")
}

// judge holds the whole curve against the rules of plausibility.
func (d *draft) judge() {
	if d.fault != nil {
		return
	}
	doubts, refusal := plausible.Judge(d.curve())
	if refusal != nil {
		d.refuse(refusal.Line, 0, -1, refusal.Field, refusal.Msg, refusal.Hint)
		return
	}
	for _, one := range doubts {
		d.repairs.Add(one.Line, one.Msg)
	}
}

// curve is the run as the rules of plausibility see it.
func (d *draft) curve() *plausible.Curve {
	r := d.run.Readings
	return &plausible.Curve{Signal: string(d.run.Signal), N: len(r), TimesS: d.run.TimesS, ReadingStep: d.run.ReadingStep,
		VolumeML: func(i int) float64 { return r[i].VolumeML }, Value: func(i int) float64 { return r[i].Value }, Line: func(i int) int { return r[i].Line }}
}

func plural(n int, what string) string {
	if n == 1 {
		return "1 " + what
	}
	return fmt.Sprintf("%d %ss", n, what)
}

// equalFold reports whether b is one of the titles, upper and lower case
// alike.
func equalFold(b []byte, titles []string) bool {
	return slices.ContainsFunc(titles, func(t string) bool { return match.Equal(b, t) })
}
