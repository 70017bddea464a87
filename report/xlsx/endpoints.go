package xlsx

import (
	"strconv"
	"strings"

	"lastdrop/ingest"
	"lastdrop/report"
)

var endpointColumns = []column{
	{"verdict", 13.5, ink, false}, {"sample", 21, ink, false}, {"procedure", 29, ink, false},
	{"endpoint", 9.5, ink, true}, {"refit kind", 12, blue, false}, {"refit (mL)", 10, blue, true}, {"u, readings only (mL)", 10.5, blue, true},
	{"95 % low, readings only (mL)", 12, blue, true}, {"95 % high, readings only (mL)", 12, blue, true},
	{"indicated kind", 12, ink, false}, {"indicated (mL)", 10.5, ink, true},
	{"difference, refit − indicated (mL)", 13, blue, true}, {"difference (% of refit)", 11, blue, true}, {"agreement limit (mL)", 12, ink, true},
	{"flags", 22, ink, false}, {"what they say", 42, ink, false}, {"more in Flags", 9, ink, false},
	{"instrument", 13, ink, false}, {"operator", 13, ink, false}, {"started", 25.5, ink, false}, {"signal", 12, ink, false}, {"estimator", 12, blue, false},
	{"reading at endpoint", 10, blue, true}, {"unit of reading", 10, blue, false}, {"bracket low (mL)", 10, ink, true}, {"bracket high (mL)", 10, ink, true},
	{"titrant", 12, ink, false}, {"titrant (mol/L)", 9.5, ink, true}, {"aliquot (mL)", 9.5, ink, true}, {"solvent (mL)", 9.5, ink, true}, {"temperature (°C)", 13.5, ink, true},
	{"reaction", 13, ink, false}, {"readings", 9.5, ink, true}, {"dump", 36, ink, false}, {"run", 6, ink, true}, {"line", 7, ink, true},
	{"also in", 36, ink, false}, {"repairs", 34, ink, false}, {"id", 14.5, ink, false}, {"revision", 9, ink, true}, {"state", 9, ink, false}, {"open", 7, ink, false},
}

// linkColumn of the endpoints leads to the first flag of the run.
const linkColumn = 17

func layEndpoints(b *book, p *places) error {
	n, rows := p.night, 0
	for i := range n.Evaluations {
		rows += max(len(n.Evaluations[i].Pairs()), 1)
	}
	s := b.open(layout{name: endpointsSheet, columns: endpointColumns, table: true, frozen: 2, pagesWide: 3, rows: rows, tab: blue}, p.footer)
	for i := range n.Evaluations {
		layRun(s, &n.Evaluations[i], p.flag[i])
	}
	if rows == 0 {
		s.put(0, text("There was no run to read."))
	}
	return s.finish()
}

// layRun gives a run without an endpoint one row too.
func layRun(s *sheet, e *report.Evaluation, flagRow int) {
	pairs := e.Pairs()
	if len(pairs) == 0 {
		pairs = []report.Pair{{}}
	}
	for _, pair := range pairs {
		if flagRow > 0 && s.row < linksMost {
			s.linkTo(linkColumn, place(flagsSheet, flagRow), "to the flags of this run")
		}
		cells := append([]cell{verdictCell(e.Verdict), wrapped(e.Facts.Sample), wrapped(e.Facts.Procedure)}, figureCells(e, pair)...)
		cells = append(cells, flagCells(e, pair.Refit, flagRow)...)
		cells = append(cells, factCells(e, pair.Refit)...)
		s.put(0, append(cells, identityCells(e)...)...)
	}
}

func place(sheetName string, row int) string {
	return "'" + sheetName + "'!A" + strconv.Itoa(row)
}

func figureCells(e *report.Evaluation, pair report.Pair) []cell {
	cells := make([]cell, 11)
	if r := pair.Refit; r != nil {
		d := report.VolumeDecimals(r.UML)
		cells[0], cells[1] = count(r.N), cell{r.Kind, plain().in(blue)}
		cells[2], cells[3] = number(r.VolumeML, d, blue), number(r.UML, report.UDecimals(r.UML), blue)
		cells[4], cells[5] = number(r.Low95ML, d, blue), number(r.High95ML, d, blue)
		if f := r.Differs; f != nil {
			d = r.DifferenceDecimals()
			cells[8], cells[9], cells[10] = signed(f.ML, d, blue), signed(f.Percent, 2, blue), number(f.LimitML, report.UDecimals(f.LimitML), ink)
		}
	} else if len(e.Endpoints) == 0 {
		cells[1] = cell{"no endpoint", plain().in(blue)}
	} else {
		cells[1] = cell{"no refit beside it", plain().in(blue)}
	}
	if in := pair.Indicated; in != nil {
		cells[6], cells[7] = text(in.Kind), number(in.VolumeML, report.StepDecimals(in.StepML, 3), ink)
	}
	return cells
}

// flagCells name the flags of the run and of this endpoint, heaviest first.
func flagCells(e *report.Evaluation, of *report.Endpoint, flagRow int) []cell {
	var names, says []string
	more := cell{}
	if flagRow > 0 {
		more = link("row " + strconv.Itoa(flagRow))
	}
	for _, f := range e.Flags {
		if f.Endpoint != 0 && of != nil && f.Endpoint != of.N {
			continue
		}
		name, w := f.Flag, headlineOf(f)
		if f.Weight == report.Note {
			name, w = name+" (note)", w+" (note)"
		}
		names, says = append(names, name), append(says, w)
	}
	return []cell{wrapped(strings.Join(names, ", ")), wrapped(strings.Join(says, "; ")), more}
}

func headlineOf(f report.Flag) string {
	w, _ := report.Words(f.Flag)
	return w.Headline
}

func factCells(e *report.Evaluation, of *report.Endpoint) []cell {
	f := &e.Facts
	cells := []cell{wrapped(f.Instrument), wrapped(f.Operator), wrapped(f.Started), text(e.Signal), {}, {}, {}, {}, {},
		wrapped(f.Titrant), optional(f.TitrantMolPerL, ink), optional(f.AliquotML, ink), optional(f.SolventML, ink),
		optional(f.TemperatureC, ink), wrapped(f.Reaction), count(e.Readings)}
	if of == nil {
		return cells
	}
	cells[4] = cell{of.Estimator, plain().in(blue)}
	if of.Reading != nil {
		cells[5] = number(*of.Reading, readingDecimals(e.Signal), blue)
		cells[6] = cell{ingest.Signal(e.Signal).Unit(), plain().in(blue)}
	}
	cells[7], cells[8] = number(of.BracketML[0], report.BracketDecimals, ink), number(of.BracketML[1], report.BracketDecimals, ink)
	return cells
}

// readingDecimals are what such readings usually carry: pH 0.01, mV 0.1,
// mS/cm 0.001 (common practice, no source).
func readingDecimals(signal string) int {
	switch ingest.Signal(signal) {
	case ingest.Potential:
		return 1
	case ingest.Conductivity:
		return 3
	}
	return 2
}

func identityCells(e *report.Evaluation) []cell {
	open := ""
	if e.Open {
		open = "open"
	}
	return []cell{wrapped(e.Dump), count(e.Run), countIf(e.Line), wrapped(strings.Join(e.Also, "; ")), wrapped(strings.Join(e.Repairs, "; ")),
		text(e.ID), count(e.Revision), text(e.State), text(open)}
}
