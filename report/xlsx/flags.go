package xlsx

import (
	"strconv"

	"lastdrop/report"
)

var flagColumns = []column{
	{"weight", 13.5, ink, false}, {"sample", 21, ink, false}, {"procedure", 29, ink, false}, {"endpoint", 9.5, ink, true}, {"flag", 18, ink, false},
	{"what happened", 33, ink, false}, {"in figures", 62, ink, false}, {"figure", 10, ink, true}, {"limit", 9, ink, true}, {"unit", 8, ink, false},
	{"lines of the dump", 16, ink, false}, {"what to do", 44, ink, false}, {"more in Endpoints", 11, ink, false}, {"dump", 36, ink, false}, {"run", 6, ink, true}, {"id", 14.5, ink, false},
}

// flagLinkColumn of the flags leads to the endpoints of the run.
const flagLinkColumn = 13

func layFlags(b *book, p *places) error {
	n, rows := p.night, 0
	for i := range n.Evaluations {
		rows += len(n.Evaluations[i].Flags)
	}
	s := b.open(layout{name: flagsSheet, columns: flagColumns, table: true, frozen: 2, pagesWide: 2, rows: rows, tab: warm}, p.footer)
	for i := range n.Evaluations {
		e := &n.Evaluations[i]
		for k := range e.Flags {
			layFlag(s, e, &e.Flags[k], p.endpoint[i])
		}
	}
	if rows == 0 {
		s.put(0, text("No run carries a flag."))
	}
	return s.finish()
}

func layFlag(s *sheet, e *report.Evaluation, f *report.Flag, endpointRow int) {
	if s.row < linksMost {
		s.linkTo(flagLinkColumn, place(endpointsSheet, endpointRow), "to the endpoints of this run")
	}
	w, _ := report.Words(f.Flag)
	s.put(0, weightCell(f.Weight), wrapped(e.Facts.Sample), wrapped(e.Facts.Procedure), countIf(f.Endpoint), text(f.Flag),
		wrapped(w.Headline), wrapped(f.Says), figure(f.Figure), figure(f.Limit),
		text(f.Unit), wrapped(report.LineList(f.Lines)), wrapped(w.Do),
		link("row "+strconv.Itoa(endpointRow)), wrapped(e.Dump), count(e.Run), text(e.ID))
}
