package pdf

import (
	"regexp"
	"strings"
	"testing"

	"lastdrop/ingest"
	"lastdrop/report"
	"lastdrop/report/figure"
)

// namedInFigures is a night in which all that a dump states looks like
// figures; none of it may change with the mark.
func namedInFigures() (n *report.Night, stated []string) {
	n = demoNight()
	n.Laboratory = "Room 1.5"
	stated = []string{"dumps/12.3e/6.0501.csv", "Room 1.5", "12.3e", "1.0501 %", "2.0501", "3.0501", "acid 0.0501 N", "7.0501 is not known", "8.0501", "look 9.0501", "pH 10.0501", "11.0501", "0.1.0", "bench-1.5", "second/13.5.csv", "repaired 14.5"}
	for i := range n.Evaluations {
		e := &n.Evaluations[i]
		e.Facts.Sample, e.Facts.Procedure, e.Facts.Operator, e.Facts.Instrument = "12.3e", "1.0501 %", "2.0501", "3.0501"
		e.Facts.Titrant, e.Dump, e.Schema, e.Also, e.Repairs = "acid 0.0501 N", "dumps/12.3e/6.0501.csv", "bench-1.5", []string{"second/13.5.csv"}, []string{"repaired 14.5"}
		e.Facts.Other = []ingest.Fact{{Key: "11.0501", Value: "pH 10.0501"}}
		e.Picture.XName = "mL of acid 0.0501 N 0.1 mol/L"
	}
	n.Unread = []report.Unread{{State: "new", Dump: "dumps/12.3e/6.0501.csv", Line: 4, Field: "pH", Says: "7.0501 is not known", Hint: "use 8.0501", Next: "look 9.0501"}}
	return n, stated
}

var fraction = regexp.MustCompile(`[0-9]\.[0-9]`)

// TestDecimalComma: with the comma every page has the same texts but for the
// mark in figures of ours; what dumps state keeps its points.
func TestDecimalComma(t *testing.T) {
	n, stated := namedInFigures()
	with := func(m report.Decimal) (all []string) {
		for _, pages := range []string{"flagged", "all"} {
			d, err := firstVolume(n, Options{Pages: pages, Decimal: m})
			if err != nil {
				t.Fatal(err)
			}
			all = append(all, drawnTexts(t, d)...)
		}
		return all
	}
	point, comma := with(report.DecimalPoint), with(report.DecimalComma)
	if len(point) != len(comma) {
		t.Fatalf("%d texts with the point, %d with the comma", len(point), len(comma))
	}
	changed := 0
	for i := range point {
		rest := comma[i]
		for _, s := range stated {
			rest = strings.ReplaceAll(rest, s, "")
			if strings.Count(point[i], s) != strings.Count(comma[i], s) {
				t.Errorf("%q became %q", point[i], comma[i])
			}
		}
		if fraction.MatchString(rest) {
			t.Errorf("a figure with a point: %q", comma[i])
		}
		if point[i] != comma[i] {
			changed++
		}
	}
	if changed < 200 {
		t.Errorf("only %d texts changed", changed)
	}
}

// The page is laid out alike with either mark.
func TestMarksAreEquallyWide(t *testing.T) {
	for _, face := range figure.Faces() {
		st := figure.Style{Face: face, SizePt: 8}
		if p, c := figure.TextWidth(st, "."), figure.TextWidth(st, ","); p != c {
			t.Errorf("face %d: point %g mm, comma %g mm", face, p, c)
		}
	}
}
