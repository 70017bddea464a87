package ingest

import (
	"bytes"
	"fmt"
	"slices"

	"lastdrop/ingest/cells"
	"lastdrop/schemas"
)

// longTable is the layout long while it is read: one header, rows that name
// their run, a footer.
type longTable struct {
	*reader
	head     *draft // preamble and header, shared by all runs; no run itself
	runs     []*draft
	byName   map[string]*draft
	last     *draft
	lastName string
	blanks   []int // lines skipped since the last row
	rowLike  []int // comment lines that could be rows
	damaged  int   // line of the first row that cannot be cut into its cells, 0 for none

	inFooter  bool
	titles    [][]byte // of the footer's cells
	runTitle  int      // index of the one that names the run
	lastTotal *draft   // of the last footer row
}

// long reads the layout long.
func (r *reader) long() {
	r.passFirstLine()
	l := &longTable{reader: r, byName: map[string]*draft{}}
	l.bindFooter()
	l.head = r.begin(0)
	r.begun = 0
	for r.scan.Next(&r.row) {
		switch {
		case l.inFooter:
			l.footerRow()
		case l.head.columns == nil:
			l.head.take()
		case r.marks(r.schema.Footer.Begin):
			l.inFooter = true
		default:
			l.tableRow()
		}
		if l.head.fault != nil {
			break
		}
	}
	l.close()
}

// close finishes every run, in the order of their first rows.
func (l *longTable) close() {
	if l.head.columns == nil {
		l.head.line = l.row.Line
		l.head.finish()
	}
	if l.head.fault != nil {
		l.reader.problems = append(l.reader.problems, l.head.fault)
		return
	}
	if len(l.runs) == 0 {
		l.reader.problems = append(l.reader.problems, &schemas.Problem{Path: l.path, Line: l.head.columns.line, Msg: "no row below the header", Hint: "the dump is cut off; export it again"})
	}
	l.tellLost()
	for _, d := range l.runs {
		d.repairs.Join(&l.head.repairs)
		if l.schema.Footer.Begin != "" && !d.total && d.fault == nil {
			d.refuse(l.row.Line, 0, -1, "", fmt.Sprintf("the dump ends without the footer row of run %s", cells.Quoted([]byte(d.name))), "the dump is cut off; export it again")
		}
		d.finish()
		l.reader.close(d)
	}
}

// tableRow reads a row of the table into its run.
func (l *longTable) tableRow() {
	i := l.head.columns.run
	row := &l.row
	switch {
	case row.Comment && l.head.rowLike():
		l.rowLike = append(l.rowLike, row.Line)
		return
	case row.Comment:
		if l.last != nil {
			l.last.comment()
		}
		return
	case row.Blank():
		if l.last != nil {
			l.blanks = append(l.blanks, row.Line)
		}
		return
	case l.head.headerAgain():
		return
	case bytes.Equal(l.text.Body[row.From:row.To], l.head.columns.text):
		l.head.refuseRow(row.From, "", "the header again", "the table stands twice, or another one follows; export the dump again")
		return
	}
	name := []byte{}
	if i < len(row.Cells) {
		name = l.scan.Bytes(row.Cells[i])
	}
	cut := *row
	if cut.DropEmptyTail(l.head.columns.width); len(cut.Cells) != l.head.columns.width && l.byName[string(name)] == nil && l.last != nil {
		name = []byte(l.lastName) // most likely a part of the row before
	}
	d := l.of(name)
	d.blanks, l.blanks = l.blanks, d.blanks[:0]
	d.take()
	if row.Ended && l.damaged == 0 && (row.Fault != "" || len(row.Cells) != l.head.columns.width) {
		l.damaged = row.Line
	}
}

// of returns the run of this name; a new one when it is the first time.
func (l *longTable) of(name []byte) *draft {
	if l.last != nil && string(name) == l.lastName {
		return l.last
	}
	d := l.byName[string(name)]
	if d == nil {
		d = l.begin(l.row.Line)
		d.name = string(name)
		d.columns, d.statements = l.head.columns, append([]statement(nil), l.head.statements...)
		d.lastLine = l.row.Line
		if len(name) == 0 {
			d.refuseRow(l.row.From, "run", "the cell that names the run is empty", "the line is damaged; export the dump again")
		}
		l.byName[d.name] = d
		l.runs = append(l.runs, d)
	}
	l.last, l.lastName = d, d.name
	return d
}

// footerRow reads one row of the footer into the run that it is about.
func (l *longTable) footerRow() {
	row, footer := &l.row, &l.schema.Footer
	if row.Comment || row.Blank() {
		return
	}
	rest := row.Cells
	if footer.Row != "" {
		if !l.marks(footer.Row) {
			l.stray()
			return
		}
		rest = rest[1:]
	}
	if len(rest) <= l.runTitle {
		l.stray()
		return
	}
	l.total(l.about(l.scan.Bytes(rest[l.runTitle])), len(row.Cells)-len(rest))
}

// bindFooter finds the title that names the run.
func (l *longTable) bindFooter() {
	for i, title := range l.schema.Footer.Titles {
		l.titles = append(l.titles, []byte(title))
		for j := range l.schema.Facts {
			if f := &l.schema.Facts[j]; f.Name == schemas.FactRun && equalFold(l.titles[i], f.Titles) {
				l.runTitle = i
			}
		}
	}
}

// about returns the run that a footer row is about.
func (l *longTable) about(name []byte) *draft {
	d := l.byName[string(name)]
	if d == nil {
		d = l.of(name)
		d.refuseRow(l.row.From, "run", fmt.Sprintf("a footer row of run %s, which has no row in the table", cells.Quoted(name)), "rows are missing or the line is damaged; export the dump again")
	}
	return d
}

// stray is a row below the table that is about no run. It may be the rest of
// the footer row before it, whose run cannot be trusted then.
func (l *longTable) stray() {
	d := l.lastTotal
	if d == nil {
		d = l.begin(l.row.Line)
		d.columns = l.head.columns
		l.runs = append(l.runs, d)
	}
	d.refuseRow(l.row.From, "", cells.Quoted(l.text.Body[l.row.From:l.row.To])+" is no footer row", "a line is damaged or broken in two, or another table follows; export the dump again")
}

// total takes the statements of a footer row, whose first cells are no facts.
func (l *longTable) total(d *draft, marks int) {
	if d.total {
		d.refuseRow(l.row.From, "", fmt.Sprintf("a second footer row of run %s", cells.Quoted([]byte(d.name))), "the line is doubled; export the dump again")
		return
	}
	d.total = true
	l.lastTotal = d
	if l.unterminated() {
		d.refuseRow(l.row.To, "", "the footer row has no line end and may be cut off", "export the dump again")
		return
	}
	row, titles := &l.row, l.titles
	if row.Fault != "" {
		d.refuseRow(row.FaultAt, "", row.Fault, "the line is damaged; export the dump again")
		return
	}
	if row.DropEmptyTail(marks + len(titles)) {
		d.repairs.Add(row.Line, trailingDropped)
	}
	if n := len(row.Cells); n != marks+len(titles) {
		d.refuseRow(row.To, "", fmt.Sprintf("%s in a footer row, schema %s has %d", plural(n, "cell"), l.schema.Name, marks+len(titles)), "the line is damaged; export the dump again")
		return
	}
	d.statements = slices.Grow(d.statements, len(titles))
	for i, title := range titles {
		c := row.Cells[marks+i]
		d.strayQuote(row.Line, c)
		d.addStatement(statement{key: title, value: l.scan.Bytes(c), line: row.Line, start: row.From, at: c.From})
	}
}
