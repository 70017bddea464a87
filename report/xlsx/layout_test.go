package xlsx

import (
	"slices"
	"strings"
	"testing"

	"lastdrop/report"
)

func TestSheetsAndTheirHeads(t *testing.T) {
	w := write(t, inventedNight())
	if got, want := w.file.GetSheetList(), []string{"Night", "Endpoints", "Flags", "Unread", "Provenance", "Glossary"}; !slices.Equal(got, want) {
		t.Fatalf("sheets: got %q, want %q", got, want)
	}
	for _, sheet := range []string{"Endpoints", "Flags", "Unread"} {
		panes, err := w.file.GetPanes(sheet)
		if err != nil || !panes.Freeze || panes.YSplit != 1 || panes.XSplit != 2 {
			t.Errorf("%s: head is not frozen: %+v, %v", sheet, panes, err)
		}
		page, err := w.file.GetPageLayout(sheet)
		if err != nil || *page.Orientation != "landscape" || *page.FitToHeight != 0 {
			t.Errorf("%s: page %+v, %v", sheet, page, err)
		}
	}
	_, content := w.parts()
	for part, want := range map[string]string{
		"xl/worksheets/sheet2.xml": `<autoFilter ref="$A$1:$AP$9">`, "xl/worksheets/sheet3.xml": `<autoFilter ref="$A$1:$P$6">`, "xl/worksheets/sheet4.xml": `<autoFilter ref="$A$1:$K$3">`,
		"xl/workbook.xml": `name="_xlnm.Print_Titles">&#39;Endpoints&#39;!$A:$B,&#39;Endpoints&#39;!$1:$1<`,
	} {
		if !strings.Contains(content[part], want) {
			t.Errorf("%s lacks %s", part, want)
		}
	}
	for part, xml := range content {
		if strings.HasPrefix(part, "xl/worksheets/sheet") && !strings.Contains(xml, `fitToPage="true"`) {
			t.Errorf("%s is not fitted to its pages", part)
		}
	}
}

// The cell keeps the whole number; its format has the decimals that u
// supports: u = 0.2087 begins with a 2 and gives two, u = 0.0061 three, and a difference those of
// its limit 0.063.
func TestFormatsShowWhatTheUncertaintySupports(t *testing.T) {
	w := write(t, inventedNight())
	for cell, want := range map[string]string{"F2": `0.00;"−"0.00`, "G2": `0.00;"−"0.00`, "L2": `"+"0.00;"−"0.00;0.00`, "F7": `0.000;"−"0.000`, "K2": `0.00;"−"0.00`, "K7": `0.000;"−"0.000`} {
		s := w.style("Endpoints", cell)
		if s.CustomNumFmt == nil || *s.CustomNumFmt != want {
			t.Errorf("%s: got format %v, want %s", cell, s.CustomNumFmt, want)
		}
	}
	for give, want := range map[float64]string{0.0477: `"+"0.00;"−"0.00;0.00`, -0.0477: `"+"0.00;"−"0.00;0.00`, 0.0047: "0.00;0.00", -0.0047: "0.00;0.00", 0: "0.00;0.00"} {
		if got := signed(give, 2, blue).look.format(); got != want {
			t.Errorf("difference %v: got format %s, want %s", give, got, want)
		}
	}
	if got, want := number(-0.00004, 3, blue).look.format(), "0.000;0.000"; got != want { // never "−0.000"
		t.Errorf("got format %s, want %s", got, want)
	}
	if got := w.cell("Endpoints", "F2"); got != "12.6123456789012" { // 12.6123456789012345 to 15 digits
		t.Errorf("F2: got %s, want 12.6123456789012", got)
	}
}

// A verdict is told by mark, word, weight of type and tint.
func TestVerdictWithoutColour(t *testing.T) {
	w := write(t, inventedNight())
	for cell, want := range map[string]struct {
		words, tint string
		bold        bool
	}{"A2": {"■ disputed", "F4D5BF", true}, "A5": {"○ sound", "", false}, "A7": {"◆ doubtful", "FBE8BF", false}} {
		s := w.style("Endpoints", cell)
		tint := strings.Join(s.Fill.Color, " ")
		if got := w.cell("Endpoints", cell); got != want.words || s.Font.Bold != want.bold || tint != want.tint {
			t.Errorf("%s: got %q, bold %v, tint %q; want %+v", cell, got, s.Font.Bold, tint, want)
		}
	}
}

// Each link leads to the run that its row is about.
func TestLinksLeadToTheRun(t *testing.T) {
	w := write(t, inventedNight())
	for _, c := range []struct{ sheet, cell, target, row string }{
		{"Night", "H14", "'Endpoints'!A3", "AMM-0088"}, {"Night", "H15", "'Endpoints'!A2", "VIN-0417"}, {"Night", "H16", "'Endpoints'!A7", "CAU-0140, bottle washer 3"},
		{"Endpoints", "Q4", "'Flags'!A5", "AMM-0088"}, {"Endpoints", "Q7", "'Flags'!A6", "CAU-0140, bottle washer 3"}, {"Flags", "M5", "'Endpoints'!A3", "AMM-0088"},
	} {
		has, target, err := w.file.GetCellHyperLink(c.sheet, c.cell)
		if err != nil || !has || target != c.target {
			t.Errorf("%s!%s leads to %q (%v, %v), want %s", c.sheet, c.cell, target, has, err, c.target)
			continue
		}
		sheet, cell, _ := strings.Cut(strings.ReplaceAll(c.target, "'", ""), "!")
		if got := w.cell(sheet, "B"+cell[1:]); got != c.row {
			t.Errorf("%s!%s leads to the row of %q, want %q", c.sheet, c.cell, got, c.row)
		}
	}
	if has, _, _ := w.file.GetCellHyperLink("Endpoints", "Q5"); has {
		t.Error("a run without flags has a link to them")
	}
}

func TestNightWithoutRuns(t *testing.T) {
	w := write(t, &report.Night{Lastdrop: "0.1.0", Date: "2031-04-03"})
	for place, want := range map[[2]string]string{{"Night", "A1"}: "There was no run to read.", {"Endpoints", "A2"}: "There was no run to read.",
		{"Flags", "A2"}: "No run carries a flag.", {"Unread", "A2"}: "Every dump was read."} {
		if got := w.cell(place[0], place[1]); got != want {
			t.Errorf("%s: got %q, want %q", place, got, want)
		}
	}
}

// 2,100 runs: links end, rows do not.
func TestManyRuns(t *testing.T) {
	w := write(t, longNight(2100))
	if got := len(w.table("Endpoints")); got != 2100 {
		t.Errorf("got %d rows, want 2100", got)
	}
	if got, want := w.cell("Night", "A54"), "And 590 more: filter the sheet Endpoints by its first column."; got != want { // 630 of 2,100 are not sound, 40 are listed
		t.Errorf("got %q, want %q", got, want)
	}
}

func BenchmarkWorkbook1000Rows(b *testing.B) {
	n := longNight(1000)
	b.ReportAllocs()
	for b.Loop() {
		if err := Write(discard{}, n, Options{}); err != nil {
			b.Fatal(err)
		}
	}
}

type discard struct{}

func (discard) Write(p []byte) (int, error) { return len(p), nil }
