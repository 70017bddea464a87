package main

import (
	"io"

	"lastdrop/cmd/internal/night"
	"lastdrop/report"
	"lastdrop/report/lines"
	"lastdrop/report/pdf"
	"lastdrop/report/xlsx"
)

// outputs are the files of a night. Those that a person may hold open come
// first: where the system refuses to replace one, nothing has moved yet.
// told receives what became of the pages.
func outputs(o pdf.Options, told *pdf.Result) []night.Output {
	return []night.Output{
		{Name: "summary.xlsx", Write: xlsx.Write},
		{Name: "summary.pdf", Write: func(w io.Writer, n *report.Night) (err error) {
			*told, err = pdf.Write(w, n, o)
			return err
		}},
		{Name: "evaluations.jsonl", Write: func(w io.Writer, n *report.Night) error { return lines.Evaluations(w, n.Evaluations) }},
		{Name: "unread.jsonl", Write: func(w io.Writer, n *report.Night) error { return lines.Unread(w, n.Unread) }},
		{Name: "waiting.jsonl", Write: func(w io.Writer, n *report.Night) error { return lines.Waiting(w, n.Waiting) }},
	}
}
