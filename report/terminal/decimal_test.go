package terminal

import (
	"bytes"
	"regexp"
	"strings"
	"testing"

	"lastdrop/ingest"
	"lastdrop/report"
)

var fraction = regexp.MustCompile(`[0-9]\.[0-9]`)

// With the comma, look and mail print the same but for the mark in figures of
// ours; what dumps state keeps its points.
func TestDecimalComma(t *testing.T) {
	stated := []string{"dumps/12.3e/6.0501.csv", "12.3e", "1.0501 %", "2.0501", "3.0501", "acid 0.0501 N", "pH 10.0501", "11.0501", "bench-1.5", "second/13.5.csv", "repaired 14.5", "7.0501 is", "use 8.0501", "look 9.0501", "0.1.0", "out.5/a.pdf"}
	runs := []report.Evaluation{overshot(), twofold(), conducted(), silent()}
	for i := range runs {
		e := &runs[i]
		e.Facts.Sample, e.Facts.Procedure, e.Facts.Operator, e.Facts.Instrument = "12.3e", "1.0501 %", "2.0501", "3.0501"
		e.Facts.Titrant, e.Dump, e.Schema, e.Also, e.Repairs = "acid 0.0501 N", "dumps/12.3e/6.0501.csv", "bench-1.5", []string{"second/13.5.csv"}, []string{"repaired 14.5"}
		e.Facts.Other = []ingest.Fact{{Key: "11.0501", Value: "pH 10.0501"}}
	}
	unread := []report.Unread{{Dump: "dumps/12.3e/6.0501.csv", Says: "7.0501 is not known", Hint: "use 8.0501", Next: "look 9.0501"}}
	with := func(m report.Decimal) string {
		var b bytes.Buffer
		if err := Look(&b, runs, unread, Options{Decimal: m}); err != nil {
			t.Fatal(err)
		}
		n := &report.Night{Date: "2031-04-03", Lastdrop: "0.1.0", Evaluations: runs, Unread: unread}
		if err := Summary(&b, n, SummaryOptions{Files: []string{"out.5/a.pdf"}, Decimal: m}); err != nil {
			t.Fatal(err)
		}
		return b.String()
	}
	point, comma := strings.Split(with(report.DecimalPoint), "\n"), strings.Split(with(report.DecimalComma), "\n")
	if len(point) != len(comma) {
		t.Fatalf("%d lines with the point, %d with the comma", len(point), len(comma))
	}
	changed := 0
	for i := range point {
		rest := comma[i]
		for _, s := range stated {
			if strings.Count(point[i], s) != strings.Count(comma[i], s) {
				t.Errorf("%q became %q", point[i], comma[i])
			}
			rest = strings.ReplaceAll(rest, s, "")
		}
		if fraction.MatchString(rest) {
			t.Errorf("a figure with a point: %q", comma[i])
		}
		if point[i] != comma[i] {
			changed++
		}
	}
	if changed < 40 {
		t.Errorf("only %d lines changed", changed)
	}
}
