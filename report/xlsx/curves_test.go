package xlsx

import (
	"bytes"
	"fmt"
	"math"
	"regexp"
	"slices"
	"strconv"
	"strings"
	"testing"

	"lastdrop/report"
)

// curved is a run of a known curve: 7 readings of pH = 3 + V/2, two of them
// left out, and a computed curve of 5 points.
func curved(id string) report.Evaluation {
	e := overshot()
	e.ID, e.Picture = id, &report.Picture{YName: "pH", XName: "mL of NaOH 0.1 mol/L"}
	for i := range 7 {
		v := float64(i) / 2
		d := report.Dot{VolumeML: v, Value: 3 + v/2, AsRead: 3 + v/2, Line: 20 + i, LeftOut: i == 2 || i == 5}
		if d.LeftOut {
			d.AsRead, d.Value = 13, 13
		}
		e.Picture.Dots = append(e.Picture.Dots, d)
	}
	for i := range 5 {
		e.Picture.Curve = append(e.Picture.Curve, report.XY{X: 0.75 * float64(i), Y: 3 + 0.375*float64(i)})
	}
	return e
}

// corner is a conductivity run of two arms, y = 5 - V and y = 1 + 0.5 V, that
// cross at 8/3 mL.
func corner(id string) report.Evaluation {
	e := conducted()
	e.ID, e.Picture = id, &report.Picture{YName: "mS/cm, corrected for dilution", XName: "mL of HCl 0.1 mol/L"}
	for i := range 11 {
		v := float64(i) / 2
		e.Picture.Dots = append(e.Picture.Dots, report.Dot{VolumeML: v, Value: max(5-v, 1+v/2), AsRead: 0.9 * max(5-v, 1+v/2), Line: 9 + i})
	}
	e.Picture.Arms = []report.Arm{{Name: "falling arm, 6 readings", FromML: 0, ToML: 2.5, ExtendToML: 3, Intercept: 5, Slope: -1}, {Name: "rising arm, 5 readings", FromML: 3, ToML: 5, ExtendFromML: 2, ExtendToML: 5, Intercept: 1, Slope: 0.5}}
	return e
}

func curvesNight(runs int) (n *report.Night, all []int) {
	n = inventedNight()
	n.Evaluations = nil
	for i := range runs {
		e := curved(fmt.Sprintf("%012x", i))
		if i == 1 {
			e = corner(fmt.Sprintf("%012x", i))
		}
		n.Evaluations, all = append(n.Evaluations, e), append(all, i)
	}
	return n, all
}

func TestCurvesOnlyWhenAsked(t *testing.T) {
	n, _ := curvesNight(2)
	if w := write(t, n); slices.Contains(w.file.GetSheetList(), "Curves") {
		t.Error("there is a sheet Curves that nobody asked for")
	}
}

// Readings first, then those left out, then the curve; the second run begins
// where the chart of the first has ended.
func TestCurves(t *testing.T) {
	n, all := curvesNight(2)
	w := writeWith(t, n, Options{HasCurves: true, Curves: all})
	rows := w.table("Curves")
	var volumes, readings, fits []string
	for _, r := range rows[:12] {
		volumes, readings, fits = append(volumes, r["volume (mL)"]), append(readings, r["reading"]), append(fits, r["computed curve"])
	}
	for _, c := range [][2]string{ // by hand from the laws of curved
		{strings.Join(volumes, " "), "0 0.5 1.5 2 3 1 2.5 0 0.75 1.5 2.25 3"},
		{strings.Join(readings[:7], " "), "3 3.25 3.75 4 4.5 13 13"},
		{strings.Join(fits[7:], " "), "3 3.375 3.75 4.125 4.5"},
		{rows[0]["line of the dump"] + rows[5]["line of the dump"], "2022"},
		{rows[0]["what"] + ", " + rows[5]["what"] + ", " + rows[7]["what"], "reading, reading left out, computed curve"},
		{rows[0]["more in Endpoints"], "row 2"},
	} {
		if c[0] != c[1] {
			t.Errorf("got %s, want %s", c[0], c[1])
		}
	}
	second := rows[chartRows+1:]
	if second[0]["id"] != "000000000001" || second[0]["as the instrument wrote it"] != "4.5" || second[0]["reading"] != "5" {
		t.Errorf("the second run begins with %v", second[0])
	}
	var arms []string
	for _, r := range second[11:19] {
		if r["computed curve"] != "" {
			arms = append(arms, r["volume (mL)"]+":"+r["computed curve"])
		}
	}
	if got, want := strings.Join(arms, " "), "0:5 2.5:2.5 3:2 2:2 3:2.5 5:3.5"; got != want {
		t.Errorf("arms: got %s, want %s", got, want)
	}
}

var chartCells = regexp.MustCompile(`<f>(?:&#39;|')Curves(?:&#39;|')!\$([A-Z])\$(\d+):\$[A-Z]\$(\d+)</f>`)

// Each chart refers to the rows of its run and to nothing else, in inks of its
// own: those of a theme are not drawn by every program.
func TestChartsReferToTheirRun(t *testing.T) {
	n, all := curvesNight(3)
	w := writeWith(t, n, Options{HasCurves: true, Curves: all})
	rows := w.table("Curves")
	_, content := w.parts()
	for i, sections := range []int{3, 3, 3} { // used, left out and curve; readings and two arms; as the first
		xml := content["xl/charts/chart"+strconv.Itoa(i+1)+".xml"]
		refs := chartCells.FindAllStringSubmatch(xml, -1)
		if len(refs) != 2*sections {
			t.Fatalf("chart %d has %d ranges, want %d", i+1, len(refs), 2*sections)
		}
		for _, ref := range refs {
			from, _ := strconv.Atoi(ref[2])
			to, _ := strconv.Atoi(ref[3])
			for row := from; row <= to; row++ {
				r := rows[row-2]
				head := map[string]string{"E": "volume (mL)", "G": "reading", "H": "computed curve"}[ref[1]]
				if r["id"] != n.Evaluations[i].ID || r[head] == "" {
					t.Errorf("chart %d, row %d, column %s: id %s, %q", i+1, row, ref[1], r["id"], r[head])
				}
			}
		}
		if strings.Contains(xml, "schemeClr val=\"accent") || !strings.Contains(xml, `<a:srgbClr val="0072B2">`) || !strings.Contains(xml, n.Evaluations[i].ID) {
			t.Errorf("chart %d: inks or title: %s", i+1, xml)
		}
	}
	// pH 3 to 4.5 is what the readings used span; the two at 13 lie beyond.
	if xml := content["xl/charts/chart1.xml"]; !strings.Contains(xml, `<max val="4.6">`) && !strings.Contains(xml, `<max val="4.5">`) {
		t.Errorf("the scale of chart 1 takes in the readings left out: %s", xml)
	}
}

func TestChartsHaveALimit(t *testing.T) {
	n, all := curvesNight(chartsMost + 3)
	w := writeWith(t, n, Options{HasCurves: true, Curves: all})
	names, _ := w.parts()
	charts := 0
	for _, name := range names {
		if strings.HasPrefix(name, "xl/charts/chart") {
			charts++
		}
	}
	if charts != 50 {
		t.Errorf("got %d charts, want 50", charts)
	}
	if rows := w.table("Curves"); rows[len(rows)-1]["id"] == "" && len(rows) < (chartsMost+2)*(chartRows+1) {
		t.Errorf("the runs without a chart are missing: %d rows", len(rows))
	}
}

func TestSameBytesWithCurves(t *testing.T) {
	n, all := curvesNight(6)
	first := writeWith(t, n, Options{HasCurves: true, Curves: all})
	for i := range 6 {
		if again := writeWith(t, n, Options{HasCurves: true, Curves: all}); !bytes.Equal(first.bytes, again.bytes) {
			t.Fatalf("writing %d gave other bytes", i+2)
		}
	}
}

// A curve that is no number is told and costs nobody the workbook; a run
// without a picture has a row too.
func TestCurvesThatCannotBeDrawn(t *testing.T) {
	n, all := curvesNight(5)
	n.Evaluations[0].Picture.Dots[3].Value = math.NaN()
	n.Evaluations[1].Picture.Arms[1].Slope = math.Inf(1)
	n.Evaluations[2].Picture = nil
	n.Evaluations[3].Picture.Curve[2].Y = math.Inf(-1)
	w := writeWith(t, n, Options{HasCurves: true, Curves: all})
	told := 0
	for _, r := range w.table("Curves") {
		if strings.HasPrefix(r["what"], "no curve was kept") {
			told++
		}
	}
	if told != 4 {
		t.Errorf("%d runs are told, want 4", told)
	}
	w = writeWith(t, n, Options{HasCurves: true})
	if got := w.cell("Curves", "A2"); !strings.HasPrefix(got, "No run has a page") {
		t.Errorf("without runs: %q", got)
	}
}
