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
// told receives what became of the pages, volume by volume.
func outputs(o pdf.Options, curves bool, told *[]pdf.Result) func(*report.Night) ([]night.Output, error) {
	return func(n *report.Night) ([]night.Output, error) {
		book, err := pdf.Plan(n, o)
		if err != nil {
			return nil, err
		}
		sheets := xlsx.Options{HasCurves: curves, Curves: book.Runs()}
		all := []night.Output{{Name: "summary.xlsx", Write: func(w io.Writer, n *report.Night) error { return xlsx.Write(w, n, sheets) }}}
		results := make([]pdf.Result, book.Volumes())
		*told = results
		for i := range results {
			all = append(all, night.Output{Name: pdf.FileName(i + 1), Write: func(w io.Writer, _ *report.Night) (err error) {
				results[i], err = book.Write(w, i+1)
				return err
			}})
		}
		return append(all,
			night.Output{Name: "evaluations.jsonl", Write: func(w io.Writer, n *report.Night) error { return lines.Evaluations(w, n.Evaluations) }},
			night.Output{Name: "unread.jsonl", Write: func(w io.Writer, n *report.Night) error { return lines.Unread(w, n.Unread) }},
			night.Output{Name: "waiting.jsonl", Write: func(w io.Writer, n *report.Night) error { return lines.Waiting(w, n.Waiting) }},
		), nil
	}
}

// isOutput tells whether a file has the name of one that a sweep publishes.
func isOutput(name string) bool {
	switch name {
	case "summary.xlsx", pdf.FileName(1), "evaluations.jsonl", "unread.jsonl", "waiting.jsonl":
		return true
	}
	return pdf.IsFurtherVolume(name)
}
