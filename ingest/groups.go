package ingest

import (
	"fmt"

	"lastdrop/ingest/cells"
	"lastdrop/ingest/match"
	"lastdrop/schemas"
)

// The columns of a wide table become groups, one a run. One damaged title must
// never hand a column to another run, so that a header in which anything does
// not fit refuses the whole dump.

// bind binds the header and parts its columns into runs: a new one begins
// where a role comes again or the number in the titles changes.
func (w *wideTable) bind() {
	head := w.head
	c := head.bindTitles()
	shared := map[int]*schemas.Field{}
	for i, text := range c.titles {
		f := match.FieldOf(w.schema, text)
		stated := match.StatedBy(w.schema, text)
		switch {
		case len(text) == 0:
			w.untitled = append(w.untitled, i)
		case f == nil && stated.Title == "":
			head.refuseRow(head.cellAt(i), "", fmt.Sprintf("column %s is not in schema %s", cells.Quoted(text), w.schema.Name),
				`a column without meaning could be a damaged title of one with; export the dump again, or state it in fields, as "unused" if it is of no use`)
		case f == nil:
			run := w.group(i, match.NumberOf(text, stated.Title), func(run *wideRun) bool { return run.states(stated.Title) })
			run.columns.facts = append(run.columns.facts, factColumn{i, stated})
		case f.Shared:
			shared[i] = f
		case f.Role != schemas.RoleUnused:
			run := w.group(i, match.NumberOf(text, f.Titles...), func(run *wideRun) bool { return *run.columns.slot(f.Role) >= 0 })
			*run.columns.slot(f.Role) = i
			run.columns.take(i, f)
		}
	}
	w.share(shared)
	if len(w.runs) == 0 {
		head.needColumns(c)
	}
	if w.checkGroups(); head.fault == nil {
		w.named()
	}
	if w.labelled() {
		w.untitled = w.untitled[1:]
	}
	head.passHeader()
	for _, run := range w.runs {
		run.columns.bound()
	}
}

// group gives column i to the run at hand, or to the next one when that has
// such a column or another number.
func (w *wideTable) group(i int, number string, has func(*wideRun) bool) *wideRun {
	n := len(w.runs)
	if n == 0 || has(w.runs[n-1]) || number != w.runs[n-1].counted && number != "" && w.runs[n-1].counted != "" {
		run := &wideRun{draft: w.begin(w.row.Line), from: i}
		head := w.head.columns
		run.columns = newColumns(head.titles, &w.row, head.rows)
		run.table = &table{}
		run.lastLine = w.row.Line
		w.runs = append(w.runs, run)
	}
	run := w.runs[len(w.runs)-1]
	if number != "" {
		run.counted = number
	}
	run.own = append(run.own, i)
	run.to = i + 1
	return run
}

// states reports whether the run has a column of this title already.
func (d *wideRun) states(title string) bool {
	for _, f := range d.columns.facts {
		if f.Title == title {
			return true
		}
	}
	return false
}

// share gives the shared columns to every run.
func (w *wideTable) share(shared map[int]*schemas.Field) {
	for n, run := range w.runs {
		for i := range run.columns.titles { // in the order of the dump
			f := shared[i]
			if f == nil || f.Role == schemas.RoleUnused {
				continue
			}
			if slot := run.columns.slot(f.Role); *slot < 0 {
				*slot = i
				run.columns.take(i, f)
			}
		}
		run.to = len(run.columns.titles)
		if n+1 < len(w.runs) {
			run.to = w.runs[n+1].from
		}
	}
}

// checkGroups refuses a header in which a run lacks a column or comes twice.
func (w *wideTable) checkGroups() {
	head := w.head
	if head.fault != nil {
		return
	}
	if len(w.runs) > maxWideRuns {
		head.refuseRow(w.row.From, "", fmt.Sprintf("%d runs in one table", len(w.runs)), fmt.Sprintf("at most %d are read", maxWideRuns))
		return
	}
	seen := map[string]bool{}
	for _, run := range w.runs {
		if run.needColumns(run.columns); run.fault != nil {
			run.fault.Col = w.text.Column(w.row.From, head.cellAt(run.from))
			run.fault.Msg = fmt.Sprintf("the columns of run %d, from %s on: %s", run.number, cells.Quoted(run.columns.titles[run.from]), run.fault.Msg)
			head.fault = run.fault
			return
		}
		if run.counted != "" && seen[run.counted] {
			head.refuseRow(head.cellAt(run.from), "", fmt.Sprintf("the columns of run %s stand in two places", run.counted[1:]), "a title is damaged, or the columns of two runs are mixed; export the dump again")
			return
		}
		seen[run.counted] = true
		run.table.readings = make([]Reading, 0, min(w.linesFrom(w.row.To), 1000))
	}
}

// labelled reports whether the first column has no title because the rows
// above the header have their own titles in it.
func (w *wideTable) labelled() bool {
	if len(w.names) == 0 || len(w.untitled) == 0 || w.untitled[0] != 0 {
		return false
	}
	for i := range w.names {
		if row := &w.names[i].row; len(row.Cells) == 0 || !match.Equal(w.scan.Bytes(row.Cells[0]), w.names[i].title) {
			return false
		}
	}
	return true
}
