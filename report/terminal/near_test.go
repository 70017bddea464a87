package terminal

import (
	"strings"
	"testing"

	"lastdrop/report"
)

// pair is a run of two endpoints so far apart, mL; the axis has 68 columns for
// 16 mL, one for 0.24 mL.
func pair(apart float64) report.Evaluation {
	e := twofold()
	e.Picture = drawn(steps(0, 0.05, 16), func(v float64) float64 { return 15 - sigmoid(v, 8, 8+apart) })
	e.Indicated = nil
	for i := range e.Endpoints {
		p, v := &e.Endpoints[i], 8+apart*float64(i)
		p.VolumeML, p.Low95ML, p.High95ML, p.BracketML, p.Differs = v, v-0.01, v+0.01, [2]float64{v - 0.02, v + 0.03}, nil
	}
	return e
}

func railOf(t *testing.T, text string) string {
	t.Helper()
	for _, l := range strings.Split(text, "\n") {
		if strings.HasPrefix(l, "     refit ") {
			return l
		}
	}
	t.Fatal("no rail")
	return ""
}

// However near two endpoints lie, each has its mark, or the notes say that
// they share one; no figure is cut.
func TestEndpointsNearEachOther(t *testing.T) {
	for _, c := range []struct {
		apart  float64
		marks  int
		shared bool
	}{{3, 2, false}, {1, 2, false}, {0.5, 2, false}, {0.25, 2, false}, {0.02, 1, true}} {
		e := pair(c.apart)
		text := look(t, []report.Evaluation{e}, nil, Options{})
		rail := railOf(t, text)
		if got := strings.Count(rail, "▼"); got != c.marks {
			t.Errorf("%g mL apart: %d marks in %q, want %d", c.apart, got, rail, c.marks)
		}
		if got := strings.Contains(strings.Join(strings.Fields(text), " "), "share one mark"); got != c.shared {
			t.Errorf("%g mL apart: notes say that a mark is shared: %v, want %v", c.apart, got, c.shared)
		}
		for _, word := range strings.Fields(strings.Map(func(r rune) rune {
			if strings.ContainsRune("[]▼━", r) {
				return ' '
			}
			return r
		}, strings.TrimPrefix(rail, "     refit "))) {
			if word != e.Endpoints[0].Volume() && word != e.Endpoints[1].Volume() {
				t.Errorf("%g mL apart: %q in %q is no figure of the run", c.apart, word, rail)
			}
		}
	}
}

// A falling curve, names of 80 characters in several scripts, and emoji keep
// every line within the width.
func TestLookKeepsItsWidth(t *testing.T) {
	e := twofold()
	e.Facts.Sample = "Бочка 7, spirit vinegar from vat seventeen, second drawing, harbour shop 塩水 🧂🧪"
	e.Facts.Procedure = strings.Repeat("a procedure with a name ", 4)
	for _, width := range []int{40, 60, 80, 120} {
		for _, run := range []report.Evaluation{e, conducted(), pair(0.5)} {
			for _, l := range strings.Split(look(t, []report.Evaluation{run}, nil, Options{Width: width}), "\n") {
				if n := cells(l); n > width && !strings.Contains(l, "Next:") {
					t.Errorf("width %d: %d columns: %q", width, n, l)
				}
			}
		}
	}
}

// Residuals of conductivity runs are told in % of the reading, as the record
// has them, others in standard deviations.
func TestResidualsHaveTheirUnit(t *testing.T) {
	e := conducted()
	e.Diagnostics.ResidualSD = some(0.25)
	if got := look(t, []report.Evaluation{e}, nil, Options{Width: 120}); !strings.Contains(got, "residuals 0.25 % of the reading") {
		t.Error(got)
	}
	o := overshot()
	o.Diagnostics.ResidualSD = some(1.1)
	if got := look(t, []report.Evaluation{o}, nil, Options{Width: 120}); !strings.Contains(got, "residuals 1.1 sd") {
		t.Error(got)
	}
}
