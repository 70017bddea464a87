package terminal

import (
	"slices"
	"strings"
	"testing"

	"lastdrop/report"
)

// straight is a line from (0, 0) to (10, 10), read at whole mL.
func straight() report.Evaluation {
	e := run("0123456789ab", "straight", "drawing", report.VerdictSound)
	e.Picture = drawn(steps(0, 1, 10), func(v float64) float64 { return v })
	e.Picture.Slope = nil
	return e
}

func drawing(t *testing.T, e report.Evaluation) []string {
	t.Helper()
	all := strings.Split(look(t, []report.Evaluation{e}, nil, Options{}), "\n")
	from := slices.IndexFunc(all, func(l string) bool { return strings.HasPrefix(l, "          pH") })
	to := slices.IndexFunc(all, func(l string) bool { return strings.Contains(l, e.Picture.XName) })
	if from < 0 || to < from {
		t.Fatalf("no drawing in\n%s", strings.Join(all, "\n"))
	}
	return all[from+1 : to]
}

func at(l string, column int) string {
	r := []rune(l)
	if column >= len(r) {
		return ""
	}
	return string(r[column])
}

// Places by hand: at 80 columns 11 go to the labels and 1 to the margin, 68
// are left, 136 dots, of which 10 mL take 135: 5 mL is dot 67.5, column
// 33.75 of 0 to 67. Upwards 17 rows have 68 dots, 67 for 10 units: 5 is dot
// 33.5 from the top, row 8.4 of 0 to 16.
func TestPlacesOfTheDrawing(t *testing.T) {
	e := straight()
	e.Endpoints = []report.Endpoint{{N: 1, Kind: "break", Estimator: "two-line", VolumeML: 5, UML: 0.01, Low95ML: 4.98, High95ML: 5.02, BracketML: [2]float64{2, 8}}}
	e.Indicated = []report.Indicated{{Kind: "at-reading", VolumeML: 10, StepML: 0.01}}
	d := drawing(t, e)
	for _, c := range []struct {
		what        string
		row, column int
		want        string
	}{
		{"first reading", 16, 11, "•"}, {"last reading", 0, 11 + 67, "•"}, {"reading at 5 mL", 8, 11 + 33, "•"},
		{"tick of 10", 0, 10, "┤"}, {"tick of 0", 16, 10, "┤"},
		{"refit", 17, 11 + 33, "◆"}, {"indicated", 18, 11 + 67, "□"},
		{"tick of 10 mL", 19, 11 + 67, "┬"}, {"number 0", 20, 11, "0"},
		{"bracket at 2 mL", 17, 11 + 13, "["}, {"bracket at 8 mL", 17, 11 + 54, "]"}, // dots 27 and 108
		{"band at 2 mL", 3, 11 + 13, "┊"}, {"band at 8 mL", 12, 11 + 54, "┊"},
	} {
		if got := at(d[c.row], c.column); got != c.want {
			t.Errorf("%s: got %q at row %d, column %d, want %q\n%s", c.what, got, c.row, c.column, c.want, strings.Join(d, "\n"))
		}
	}
}

// 1 mL is 13.5 dots, 6.75 columns: a reading 1 % of the axis away from 5 mL
// stands one column on (34.4), not on the same.
func TestOnePercentIsSeen(t *testing.T) {
	e := straight()
	e.Picture.Dots = append(e.Picture.Dots, report.Dot{VolumeML: 5.1, Value: 9})
	d := drawing(t, e)
	if got := at(d[1], 11+34); got != "•" { // 9 units: dot 6.7 from the top, row 1
		t.Errorf("got %q, want the reading\n%s", got, strings.Join(d, "\n"))
	}
}

func TestStrayStandsAtTheEdge(t *testing.T) {
	e := straight()
	e.Picture.Dots = append(e.Picture.Dots, report.Dot{VolumeML: 5, Value: 40, AsRead: 40, Line: 77, LeftOut: true},
		report.Dot{VolumeML: 2, Value: -40, AsRead: -40, Line: 78, LeftOut: true}, report.Dot{VolumeML: 9, Value: 2, LeftOut: true})
	d := drawing(t, e)
	if at(d[0], 11+33) != "▲" || at(d[16], 11+13) != "▼" || at(d[13], 11+60) != "◦" {
		t.Errorf("strays are misplaced:\n%s", strings.Join(d, "\n"))
	}
	text := look(t, []report.Evaluation{e}, nil, Options{Width: 120})
	if !strings.Contains(text, "line 77 stands beyond the scale: pH 40.00; line 78 stands beyond the scale: pH −40.00") {
		t.Errorf("the strays are not told:\n%s", text)
	}
}

func TestFlatRunIsDrawn(t *testing.T) {
	e := straight()
	for i := range e.Picture.Dots {
		e.Picture.Dots[i].Value = 7
	}
	e.Picture.Curve = nil
	d := drawing(t, e)
	if got := strings.Count(d[8], "•"); got != 11 { // 6 to 8: 7 is dot 33.5, row 8
		t.Errorf("got %d readings in the middle, want 11\n%s", got, strings.Join(d, "\n"))
	}
}

// Two endpoints close together keep their marks and both figures whole.
func TestCloseEndpointsKeepTheirFigures(t *testing.T) {
	for _, apart := range []float64{0.02, 0.2, 0.5, 1, 3} {
		e := straight()
		for i, ml := range []float64{5, 5 + apart} {
			e.Endpoints = append(e.Endpoints, report.Endpoint{N: i + 1, Kind: "inflection", VolumeML: ml, UML: 0.01, Low95ML: ml - 0.02, High95ML: ml + 0.02, BracketML: [2]float64{ml - 0.1, ml + 0.1}})
			e.Indicated = append(e.Indicated, report.Indicated{Kind: "inflection", VolumeML: ml, StepML: 0.01})
		}
		d := drawing(t, e)
		for row, lane := range d[17:19] {
			for i := range e.Endpoints {
				want := [2]string{e.Endpoints[i].Volume(), e.Indicated[i].Volume()}[row]
				fields := strings.FieldsFunc(lane, func(r rune) bool { return strings.ContainsRune(" []▼▽━", r) })
				if !slices.Contains(fields, want) {
					t.Errorf("%g mL apart, lane %d lacks %s: %s", apart, row, want, lane)
				}
			}
		}
	}
}
