package ingest

import (
	"fmt"

	"lastdrop/ingest/cells"
	"lastdrop/ingest/match"
	"lastdrop/schemas"
)

// wideTable is the layout wide while it is read: one table in which each run
// has columns of its own, and perhaps shares some with the others.
type wideTable struct {
	*reader
	head     *draft // preamble, header and rows, shared by all runs; no run itself
	runs     []*wideRun
	names    []nameRow
	untitled []int // columns without a title, whose cells must be empty
}

// wideRun is one run of the layout wide.
type wideRun struct {
	*draft
	from, to int    // its columns, the last one excluded
	own      []int  // those that it shares with nobody
	counted  string // the number for {n} in their titles; "" when they have none
	ended    int    // line in which its columns are empty first; 0 while they are not
}

// nameRow is a row above the header that has a cell for each run.
type nameRow struct {
	title string
	row   cells.Row
}

// maxWideRuns is how many runs one table may hold. No bench writes a tenth of
// it; it bounds the work on damaged dumps.
const maxWideRuns = 1000

// wideRows reads the layout wide.
func (r *reader) wideRows() {
	r.passFirstLine()
	w := &wideTable{reader: r}
	w.head = r.begin(0)
	w.head.wide = w
	r.begun = 0
	for r.scan.Next(&r.row) {
		if w.head.columns == nil {
			w.head.take()
		} else {
			w.tableRow()
		}
		if w.head.fault != nil {
			break
		}
	}
	w.close()
}

// close finishes every run, in the order of their columns.
func (w *wideTable) close() {
	if w.head.columns == nil {
		w.head.line = w.row.Line
		w.head.finish()
	}
	if w.head.fault != nil {
		w.problems = append(w.problems, w.head.fault)
		return
	}
	for _, run := range w.runs {
		run.repairs.Join(&w.head.repairs)
		run.statements = append(run.statements, w.head.statements...)
		run.finish()
		w.reader.close(run.draft)
	}
}

// namesRuns takes the rows above the header that have a cell for each run,
// when the row at hand is the first of them, and the header below them.
func (d *draft) namesRuns() bool {
	titles := d.schema.Wide
	if d.wide == nil || len(titles) == 0 {
		return false
	}
	ahead := d.scan
	var next cells.Row
	for range titles {
		if !ahead.Next(&next) {
			return false
		}
	}
	if !match.FitOf(d.schema, &ahead, &next).Meant() {
		return false
	}
	for _, title := range titles {
		named := nameRow{title: title, row: d.row}
		named.row.Cells = append([]cells.Cell(nil), d.row.Cells...)
		d.wide.names = append(d.wide.names, named)
		d.scan.Next(&d.row)
	}
	d.header()
	return true
}

// named takes the cells of the rows above the header into their runs. A row
// that is not as wide as the header would give its names to other runs.
func (w *wideTable) named() {
	width := len(w.head.columns.titles)
	for i := range w.names {
		row := &w.names[i].row
		if more := len(row.Cells) - width; more > max(0, w.head.columns.tail) && row.Fault == "" {
			w.head.refuse(row.Line, row.From, row.To, "", fmt.Sprintf("%s above a header of %d", plural(len(row.Cells), "cell"), width), "a delimiter is too many; export the dump again")
			return
		}
		if row.DropEmptyTail(width) {
			w.head.repairs.Add(row.Line, trailingDropped)
		}
		if row.Fault != "" {
			w.head.refuse(row.Line, row.From, row.FaultAt, "", row.Fault, "the line is damaged; export the dump again")
			return
		}
		if n := len(row.Cells); n != width {
			w.head.refuse(row.Line, row.From, row.To, "", fmt.Sprintf("%s above a header of %d", plural(n, "cell"), width), "the line is damaged; export the dump again")
			return
		}
		if label := row.Cells[0]; len(w.runs) > 0 && w.runs[0].from > 0 && !label.Empty() && !match.Equal(w.scan.Bytes(label), w.names[i].title) {
			w.head.refuse(row.Line, row.From, label.From, "", fmt.Sprintf("%s where the row %q is expected", cells.Quoted(w.scan.Bytes(label)), w.names[i].title), "a line is missing, doubled or damaged; export the dump again, or correct wide.titles")
			return
		}
		for _, run := range w.runs {
			run.named(&w.names[i])
		}
	}
}

// named takes the one cell above the run's columns.
func (d *wideRun) named(name *nameRow) {
	row := &name.row
	var found *cells.Cell
	for at := d.from; at < d.to; at++ {
		c := &row.Cells[at]
		switch {
		case c.Empty():
		case found == nil:
			found = c
		default:
			d.refuse(row.Line, row.From, c.From, "", fmt.Sprintf("%s beside %s above one run", cells.Quoted(d.scan.Bytes(*c)), cells.Quoted(d.scan.Bytes(*found))), "one cell may name a run; the line is damaged: export the dump again")
		}
	}
	if found != nil {
		d.strayQuote(row.Line, *found)
		d.addStatement(statement{key: []byte(name.title), value: d.scan.Bytes(*found), line: row.Line, start: row.From, at: found.From})
	}
}

// tableRow reads one row into every run that has not ended.
func (w *wideTable) tableRow() {
	head, row := w.head, &w.row
	switch {
	case row.Comment:
		head.comment()
		return
	case row.Blank():
		head.blanks = append(head.blanks, row.Line)
		return
	case head.unterminated():
		head.repairs.Add(row.Line, lastDropped)
		return
	case head.headerAgain():
		return
	case !row.Ended:
		head.repairs.Add(row.Line, "last row without line end kept")
	}
	if head.skippedBlanks(); !head.shape(head.columns.width) {
		w.damaged(head.fault)
		head.fault = nil
		return
	}
	for _, i := range w.untitled {
		if c := row.Cells[i]; !c.Empty() {
			head.refuseRow(c.From, "", fmt.Sprintf("%s in column %d, which has no title", cells.Quoted(w.scan.Bytes(c)), i+1), "the header is damaged, or the row; export the dump again")
			return
		}
	}
	for _, run := range w.runs {
		run.wideRow()
	}
}

// damaged refuses every run for a row that cannot be cut into their columns.
func (w *wideTable) damaged(fault *schemas.Problem) {
	for _, run := range w.runs {
		if run.fault != nil {
			run.more++
			continue
		}
		p := *fault
		run.fault = &p
	}
}

// wideRow reads the run's part of the row at hand.
func (d *wideRun) wideRow() {
	empty := true
	for _, i := range d.own {
		empty = empty && d.missing(d.scan.Bytes(d.row.Cells[i]))
	}
	switch {
	case empty && d.ended == 0:
		d.rows++ // a row lost at the end of the run is not in the count of the rows
		d.checkNumber()
		d.rows--
		d.ended = d.row.Line
	case empty:
	case d.ended > 0:
		d.refuseRow(d.row.Cells[d.own[0]].From, "", fmt.Sprintf("the run goes on below line %d, where its columns are empty", d.ended), "a row is damaged; export the dump again")
	case d.columns.volume >= 0 && d.columns.reading >= 0:
		d.rows++
		d.lastLine = d.row.Line
		d.measure()
	}
}
