package plausible

import (
	"fmt"
	"strings"
	"testing"
)

// curve has one reading a line, from line 11 on.
func curve(signal string, step float64, timesS, volumesML, values []float64) *Curve {
	return &Curve{Signal: signal, N: len(values), ReadingStep: step, TimesS: timesS,
		VolumeML: func(i int) float64 { return volumesML[i] }, Value: func(i int) float64 { return values[i] }, Line: func(i int) int { return i + 11 }}
}

func TestJudge(t *testing.T) {
	five := []float64{0, 1, 2, 3, 4}
	rising := []float64{3.2, 3.9, 5.1, 9.4, 11.2}
	for _, c := range []struct {
		name string
		c    *Curve
		want string
	}{
		{"sound", curve("pH", 0.01, nil, five, rising), ""},
		{"none", curve("pH", 0.01, nil, nil, nil), ""},
		{"swapped", curve("pH", 0.01, nil, rising, five), "11: volume: volumes begin at 3.2 mL and readings at 0, which rise in even steps: the columns look swapped; check the columns of volume and reading in the schema"},
		{"first volume is not 0", curve("potential", 1, nil, []float64{1, 2, 3, 4, 5}, []float64{0, 5, 11, 90, 140}), ""},
		{"one volume", curve("potential", 1, nil, []float64{2, 2, 2, 2, 2}, []float64{10, 5, 11, 90, 140}), "15: volume: 5 readings at one volume, a curve needs at least 5; a titration has a reading at each of several volumes; this may be a one-point or dead-stop record"},
		{"few volumes", curve("potential", 1, nil, []float64{0, 0, 2, 2, 2}, []float64{10, 5, 11, 90, 140}), "15: volume: 5 readings at 2 different volumes, a curve needs at least 5; a titration has a reading at each of several volumes; this may be a one-point or dead-stop record"},
		{"step", curve("pH", 0.01, nil, []float64{0, 1, 2, 102.1, 103}, rising), "14: volume: 100.1 mL in one increment, more than the 100 mL of a large burette; no burette delivers that at once; check unit and decimal mark of the volume"},
		{"a step of a large burette", curve("pH", 0.01, nil, []float64{0, 1, 2, 102, 103}, rising), ""},
		{"pH as mV", curve("potential", 0.01, nil, five, rising), "doubt 11: readings from 3.2 to 11.2 mV look like pH; kept as they are"},
		{"few mV, coarse", curve("potential", 0.1, nil, five, rising), ""},
		{"V as mV", curve("potential", 0.0001, nil, five, []float64{-0.1, 0.1, 0.2, 0.3, 0.35}), "doubt 11: readings from -0.1 to 0.35 mV look like V; kept as they are"},
		{"µS as mS", curve("conductivity", 1, nil, five, []float64{900, 700, 400, 450, 600}), "doubt 11: readings from 400 to 900 mS/cm look like uS/cm; kept as they are"},
		{"L as mL", curve("pH", 0.01, nil, []float64{0, 0.01, 0.02, 0.025, 0.0999}, rising), "doubt 11: 0.0999 mL delivered in all looks like L; kept as it is"},
		{"µL as mL", curve("pH", 0.01, nil, []float64{200, 220, 240, 250, 260}, rising), "doubt 11: 260 mL delivered in all looks like uL; kept as it is"},
		{"clock an hour on", curve("pH", 0.01, []float64{0, 10, 20, 3630, 3640}, five, rising), "doubt 14: time jumps by 3610 s, a pause or a clock that was set; kept as it is"},
		{"slow throughout", curve("pH", 0.01, []float64{0, 3000, 6000, 9100, 12000}, five, rising), ""},
	} {
		t.Run(c.name, func(t *testing.T) {
			doubts, refusal := Judge(c.c)
			var lines []string
			for _, d := range doubts {
				lines = append(lines, fmt.Sprintf("doubt %d: %s", d.Line, d.Msg))
			}
			if refusal != nil {
				lines = append(lines, fmt.Sprintf("%d: %s: %s; %s", refusal.Line, refusal.Field, refusal.Msg, refusal.Hint))
			}
			if got := strings.Join(lines, "\n"); got != c.want {
				t.Errorf("\ngot  %s\nwant %s", got, c.want)
			}
		})
	}
}

func TestLimits(t *testing.T) {
	for _, c := range []struct {
		name string
		v    float64
		want string
	}{
		{"pH", 16, ""}, {"pH", 16.01, "16.01 is outside -2 to 16"}, {"potential", -2000, ""}, {"potential", -2000.5, "-2000.5 mV is outside -2000 to 2000 mV"},
		{"conductivity", -0.001, "-0.001 mS/cm is outside 0 to 2000 mS/cm"}, {"aliquot_ml", 0, "0 mL is outside above 0 to 10000 mL"}, {"nothing", -1e300, ""},
		{"density_g_per_ml", 0.4, "0.4 g/mL is outside 0.5 to 3 g/mL"},
	} {
		if got := Of(c.name).Breaks(c.v); got != c.want || Of(c.name).Admits(c.v) != (c.want == "") {
			t.Errorf("%s %v: %q, want %q", c.name, c.v, got, c.want)
		}
	}
}
