package ingest

import (
	"bytes"
	"fmt"

	"lastdrop/ingest/cells"
	"lastdrop/ingest/match"
	"lastdrop/schemas"
)

const (
	trailingDropped = "trailing delimiter dropped"
	lastDropped     = "last row without line end dropped"
)

// sections reads the layouts single and stacked: each run is a preamble, a
// header and rows, one below the other.
func (r *reader) sections() {
	r.passFirstLine()
	var d *draft
	if r.schema.Layout == schemas.Single {
		d = r.begin(1)
	}
	for r.scan.Next(&r.row) {
		switch {
		case r.marks(r.schema.Stack.Begin):
			r.cutShort(d, "the next run begins")
			d = r.begin(r.row.Line)
			d.lastLine = r.row.Line
			d.markRow()
		case d != nil && r.marks(r.schema.Stack.End):
			d.markRow()
			d.finish()
			r.close(d)
			d = nil
		case d == nil && r.row.Blank():
		case d == nil && r.schema.Stack.Blank:
			d = r.begin(r.row.Line)
			d.lastLine = r.row.Line
			d.take()
		case d == nil:
			d = r.orphan()
		case r.schema.Stack.Blank && d.parted():
			d.finish()
			r.close(d)
			d = r.begin(r.row.Line)
			d.lastLine = r.row.Line
			d.take()
		default:
			d.take()
		}
	}
	if d != nil {
		r.cutShort(d, "the dump ends")
	}
	r.needRun()
}

// needRun reports a dump without any run.
func (r *reader) needRun() {
	if r.begun == 0 {
		p := &schemas.Problem{Path: r.path, Line: r.row.Line, Msg: "no run in the dump", Hint: "export it again"}
		if begin := r.schema.Stack.Begin; begin != "" {
			p.Hint = fmt.Sprintf("a run begins with %q; export it again", begin)
		}
		r.problems = append(r.problems, p)
	}
}

// marks reports whether the first cell of the row at hand is this mark.
func (r *reader) marks(mark string) bool {
	return mark != "" && len(r.row.Cells) > 0 && string(r.scan.Bytes(r.row.Cells[0])) == mark
}

// cutShort ends a run that its own end row has not ended.
func (r *reader) cutShort(d *draft, what string) {
	if d == nil {
		return
	}
	if end := r.schema.Stack.End; end != "" && !d.orphaned {
		d.refuse(r.row.Line, 0, -1, "", fmt.Sprintf("%s, and the run begun in line %d has no %q", what, d.line, end), "the dump is cut off; export it again")
	}
	d.finish()
	r.close(d)
}

// orphan begins a run for rows that stand outside any: most likely its begin
// row is damaged, and passing them over would lose a run in silence.
func (r *reader) orphan() *draft {
	d := r.begin(r.row.Line)
	d.orphaned = true
	text := r.text.Body[r.row.From:r.row.To]
	d.refuseRow(r.row.From, "", cells.Quoted(text)+" stands outside any run", fmt.Sprintf("a run begins with %q; its line may be damaged: export the dump again", r.schema.Stack.Begin))
	return d
}

// take reads the row at hand into the run.
func (d *draft) take() {
	switch {
	case d.orphaned:
	case d.inFooter:
		d.below()
	case d.columns != nil && d.footerBegins():
		d.inFooter = true
		switch {
		case d.schema.Footer.Blank:
			d.below()
		case d.unterminated():
			d.repairs.Add(d.row.Line, lastDropped)
		case d.schema.Footer.Lines != schemas.UnusedLines:
			d.markRow()
		}
	case d.row.Comment && d.unterminated():
		d.repairs.Add(d.row.Line, lastDropped)
	case d.row.Comment:
		d.comment()
	case d.row.Blank() && d.unterminated() && d.row.To > d.row.From:
		d.repairs.Add(d.row.Line, lastDropped)
	case d.row.Blank():
		if d.columns != nil {
			d.blanks = append(d.blanks, d.row.Line)
		}
	case d.columns == nil:
		d.above()
	case d.unterminated():
		d.repairs.Add(d.row.Line, lastDropped)
	default:
		if !d.row.Ended {
			d.repairs.Add(d.row.Line, "last row without line end kept")
		}
		d.data()
	}
}

// above reads a row above the header, or the header itself.
func (d *draft) above() {
	if d.namesRuns() {
		return
	}
	if d.schema.Preamble.Lines == schemas.TextLines && !match.FitOf(d.schema, &d.scan, &d.row).Meant() {
		d.textStatement()
		return
	}
	if d.row.Fault != "" {
		d.refuseRow(d.row.FaultAt, "", d.row.Fault, "the line is damaged; export the dump again")
		return
	}
	if match.FitOf(d.schema, &d.scan, &d.row).Meant() {
		d.header()
		return
	}
	if d.schema.Preamble.Lines == schemas.CellLines {
		d.cellStatement()
		return
	}
	d.refuseRow(d.row.From, "", cells.Quoted(d.text.Body[d.row.From:d.row.To])+" is neither a fact nor the header", match.Wanted(d.schema))
}

// header binds the row at hand as the header.
func (d *draft) header() {
	if d.schema.Layout == schemas.Wide {
		d.wide.bind()
		return
	}
	d.reserve(d.row.To)
	d.bind()
}

// comment reads a comment line.
func (d *draft) comment() {
	footer := d.schema.Footer.Lines == schemas.CommentLines && d.schema.Footer.Begin == ""
	switch {
	case d.columns == nil && d.schema.Preamble.Lines == schemas.CommentLines, d.columns != nil && footer:
		d.commentStatement()
	case d.columns != nil && d.schema.Preamble.Lines == schemas.CommentLines:
		d.repairs.Add(d.row.Line, "comment below the header not used")
	case d.columns != nil && d.rowLike():
		d.lostRow(d.row.Line, "a comment with the cells of a row")
	}
}

// footerBegins reports whether the row at hand begins the lines below the
// table.
func (d *draft) footerBegins() bool {
	f := &d.schema.Footer
	if f.Lines == schemas.NoPreamble {
		return false
	}
	if f.Blank {
		return d.parted()
	}
	return d.marks(f.Begin) || f.Lines == schemas.CommentLines && f.Begin != "" && d.row.Comment && bytes.HasPrefix(d.text.Body[d.row.From:d.row.To], []byte(f.Begin))
}

// parted reports whether blank lines stand between the rows and the row at
// hand, which goes on otherwise. A row of numbers after a blank line goes on
// with the table: the line is more likely too many than the rows are facts.
func (d *draft) parted() bool {
	if d.rows == 0 || len(d.blanks) == 0 || d.row.Blank() {
		return false
	}
	c := d.columns
	if c.volume < 0 || c.reading < 0 || len(d.row.Cells) <= max(c.volume, c.reading) {
		return true
	}
	if c.status >= 0 && len(d.row.Cells) == c.width && d.knownStatus(d.scan.Bytes(d.row.Cells[c.status])) {
		return false
	}
	numbers := 0
	for _, i := range []int{c.volume, c.reading} {
		b := d.scan.Bytes(d.row.Cells[i])
		_, _, fault := cells.ParseWritten(b, &d.schema.Dialect, &c.fields[i].Written)
		if fault == cells.NumberOK {
			numbers++
		} else if !d.missing(b) {
			return true
		}
	}
	return numbers == 0
}

// knownStatus reports whether a text is one that the schema knows for a row.
func (d *draft) knownStatus(b []byte) bool {
	for _, v := range d.columns.fields[d.columns.status].Values {
		if len(b) > 0 && match.Equal(b, v.Text) {
			return true
		}
	}
	return false
}

// below reads a row of the footer.
func (d *draft) below() {
	lines := d.schema.Footer.Lines
	switch {
	case lines == schemas.UnusedLines || d.row.Blank():
	case d.unterminated():
		d.repairs.Add(d.row.Line, lastDropped)
	case d.row.Comment:
		if lines == schemas.CommentLines {
			d.commentStatement()
		}
	case lines == schemas.TextLines:
		d.textStatement()
	case lines == schemas.CellLines && d.row.Fault == "":
		d.cellStatement()
	default:
		d.refuseRow(d.row.From, "", cells.Quoted(d.text.Body[d.row.From:d.row.To])+" is no line of the footer", "a line is damaged, or another table follows; export the dump again")
	}
}

// markRow takes what a row that begins or ends something states beside its
// mark: one cell. More of them are told, for a line end may be lost.
func (d *draft) markRow() {
	if d.row.Fault != "" {
		d.repairs.Add(d.row.Line, d.row.Fault)
	}
	if d.schema.Footer.Lines == schemas.TextLines || d.schema.Preamble.Lines == schemas.TextLines {
		d.tellKeys(d.text.Body[d.row.From:d.row.To])
	}
	for i, c := range d.row.Cells {
		switch {
		case i == 1 && !c.Empty():
			d.state(d.row.Cells[0], c, true)
		case i > 1 && !c.Empty():
			d.repairs.Add(d.row.Line, fmt.Sprintf("%s behind %s not used", cells.Quoted(d.text.Body[c.From:d.row.To]), cells.Quoted(d.scan.Bytes(d.row.Cells[0]))))
			return
		}
	}
}

// state notes a statement of two cells of the row at hand.
func (d *draft) state(key, value cells.Cell, mark bool) {
	d.addStatement(statement{key: d.scan.Bytes(key), value: d.scan.Bytes(value), line: d.row.Line, start: d.row.From, at: value.From, mark: mark})
}
