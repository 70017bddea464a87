package draft

import (
	"fmt"
	"slices"

	"lastdrop/schemas"
)

// findFooter finds what stands below the only table.
func (d *draft) findFooter() {
	if d.layout == schemas.Stacked || d.layout == schemas.Wide {
		return
	}
	below := d.lines[d.tables[len(d.tables)-1].to:]
	at := slices.IndexFunc(below, func(l line) bool { return !l.blank() && !l.comment })
	if at < 0 {
		d.footerComments(below)
		return
	}
	l := &below[at]
	if d.layout == schemas.Long {
		d.footerRows(below[at:])
		return
	}
	d.footer.Begin = l.text
	if len(l.cells) > 0 && !l.faulty {
		d.footer.Begin = l.cells[0]
	}
	s, ok := d.stated(l)
	d.footer.Lines = schemas.UnusedLines
	if at > 0 && ok && s.lines != schemas.CommentLines { // the first line is a fact already
		d.footer = schemas.Footer{Blank: true, Lines: s.lines}
		d.choose("footer", "after a blank line", "lines of key and value stand there", "")
	} else {
		d.choose("footer", fmt.Sprintf("begins with %q", d.footer.Begin), "it stands below the rows", "")
	}
	for i := range below[at:] {
		if s, ok := d.stated(&below[at+i]); ok && s.lines != schemas.CommentLines {
			d.footer.Lines = s.lines
			d.mapFact(s)
		}
	}
	if d.footer.Lines == schemas.UnusedLines {
		d.unsure("footer: what stands below %q is not read", d.footer.Begin)
	}
}

// footerComments: comment lines below the table may be facts.
func (d *draft) footerComments(below []line) {
	for i := range below {
		if s, ok := d.stated(&below[i]); ok && s.lines == schemas.CommentLines {
			d.footer.Lines = schemas.CommentLines
			d.mapFact(s)
		}
	}
}

// footerRows: below a long table stands a row for each run.
func (d *draft) footerRows(below []line) {
	rows := slices.DeleteFunc(slices.Clone(below), func(l line) bool { return l.blank() || l.comment })
	if len(rows) < 2 || len(rows[0].cells) == 0 {
		return
	}
	t := &d.tables[0]
	names := texts(d.column(t, d.runColumn(t)))
	mark := rows[1].cells[0]
	width := len(rows[1].cells)
	run := slices.IndexFunc(rows[1].cells, func(s string) bool { return slices.Contains(names, s) })
	if run < 1 {
		return
	}
	for _, l := range rows[1:] {
		if len(l.cells) != width || l.cells[0] != mark {
			return
		}
	}
	d.footer = schemas.Footer{Begin: rows[0].cells[0], Row: mark}
	for i := 1; i < width; i++ {
		title := fmt.Sprintf("cell %d", i+1)
		if i == run {
			title = "run"
		}
		d.footer.Titles = append(d.footer.Titles, title)
	}
	d.facts = append(d.facts, fact{name: string(schemas.FactRun), key: "run"})
	d.unsure("footer: its cells have no titles in the dump; put names to footer.titles and map them as facts")
}
