package ingest

import (
	"fmt"

	"lastdrop/ingest/cells"
	"lastdrop/schemas"
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
		case d != nil && r.marks(r.schema.Stack.End):
			d.endRow()
			d.finish()
			r.close(d)
			d = nil
		case d == nil && !r.row.Blank():
			d = r.orphan()
		case d != nil:
			d.take()
		}
	}
	if d != nil {
		r.cutShort(d, "the dump ends")
	}
	if r.begun == 0 {
		r.problems = append(r.problems, &schemas.Problem{Path: r.path, Line: r.row.Line,
			Msg: "no run in the dump", Hint: fmt.Sprintf("a run begins with %q; export it again", r.schema.Stack.Begin)})
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
	case d.row.Comment:
		d.comment()
	case d.row.Blank():
		if d.columns != nil {
			d.blanks = append(d.blanks, d.row.Line)
		}
	case d.columns == nil:
		d.above()
	case d.unterminated():
		d.repairs.add(d.row.Line, "last row without line end dropped")
	default:
		if !d.row.Ended {
			d.repairs.add(d.row.Line, "last row without line end kept")
		}
		d.data()
	}
}

// above reads a row above the header, or the header itself.
func (d *draft) above() {
	if d.row.Fault != "" {
		d.refuseRow(d.row.FaultAt, "", d.row.Fault, "the line is damaged; export the dump again")
		return
	}
	if fitHeader(d.schema, &d.scan, &d.row).meant() {
		d.reserve(d.row.To)
		d.bind()
		return
	}
	if d.schema.Preamble.Lines == schemas.CellLines {
		d.cellStatement()
		return
	}
	d.refuseRow(d.row.From, "", cells.Quoted(d.text.Body[d.row.From:d.row.To])+" is neither a fact nor the header", headerWanted(d.schema))
}

// comment reads a comment line.
func (d *draft) comment() {
	if d.schema.Preamble.Lines != schemas.CommentLines {
		return
	}
	if d.columns != nil {
		d.repairs.add(d.row.Line, "comment below the header not used")
		return
	}
	d.commentStatement()
}

// endRow takes what the row that ends a run states beside its mark.
func (d *draft) endRow() {
	if len(d.row.Cells) > 1 {
		d.state(d.row.Cells[0], d.row.Cells[1], true)
	}
}

// state notes a statement of two cells of the row at hand.
func (d *draft) state(key, value cells.Cell, mark bool) {
	d.addStatement(statement{key: d.scan.Bytes(key), value: d.scan.Bytes(value), line: d.row.Line, start: d.row.From, at: value.From, mark: mark})
}
