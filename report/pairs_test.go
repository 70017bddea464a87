package report

import (
	"fmt"
	"strings"
	"testing"
)

func paired(e *Evaluation) string {
	var all []string
	for _, p := range e.Pairs() {
		one := [2]string{"-", "-"}
		if p.Refit != nil {
			one[0] = fmt.Sprint(p.Refit.N)
		}
		if p.Indicated != nil {
			one[1] = fmt.Sprint(p.Indicated.VolumeML)
		}
		all = append(all, one[0]+":"+one[1])
	}
	return strings.Join(all, " ")
}

func at(volumes ...float64) (all []Endpoint) {
	for i, v := range volumes {
		all = append(all, Endpoint{N: i + 1, Kind: "inflection", VolumeML: v})
	}
	return all
}

func seen(volumes ...float64) (all []Indicated) {
	for _, v := range volumes {
		all = append(all, Indicated{Kind: "inflection", VolumeML: v})
	}
	return all
}

func TestPairs(t *testing.T) {
	compared := at(4, 12)
	compared[0].Differs = &Difference{Kind: "inflection", IndicatedML: 11}
	for _, c := range []struct {
		name string
		e    Evaluation
		want string
	}{
		{"nothing", Evaluation{}, ""},
		{"one and one", Evaluation{Endpoints: at(12), Indicated: seen(12.5)}, "1:12.5"},
		{"only the second is indicated", Evaluation{Endpoints: at(4, 12), Indicated: seen(11.9)}, "1:- 2:11.9"},
		{"in the other order", Evaluation{Endpoints: at(4, 12), Indicated: seen(11.9, 4.1)}, "1:4.1 2:11.9"},
		{"what was compared stands together", Evaluation{Endpoints: compared, Indicated: seen(11, 13)}, "1:11 2:13"},
		{"no refit", Evaluation{Indicated: seen(8, 16)}, "-:8 -:16"},
		{"one too many", Evaluation{Endpoints: at(12), Indicated: seen(4, 12.1)}, "1:12.1 -:4"},
	} {
		if got := paired(&c.e); got != c.want {
			t.Errorf("%s: got %q, want %q", c.name, got, c.want)
		}
	}
}

// By hand: u = 0.0061 supports 0.001; the limit 0.0459 has its first figure
// at 0.01; -0.025 stands with three decimals.
func TestDifference(t *testing.T) {
	e := Endpoint{VolumeML: 9.175, UML: 0.0061, Differs: &Difference{ML: -0.025, Percent: -0.27248, LimitML: 0.0459}}
	for name, c := range map[string][2]string{
		"difference": {e.Difference(), "−0.025"}, "percent": {e.DifferencePercent(), "−0.27"}, "limit": {e.DifferenceLimit(), "0.046"}, "u": {e.U(), "0.0061"},
		"none": {(&Endpoint{}).Difference() + (&Endpoint{}).DifferencePercent() + (&Endpoint{}).DifferenceLimit(), "–––"},
	} {
		if c[0] != c[1] {
			t.Errorf("%s: got %s, want %s", name, c[0], c[1])
		}
	}
	coarse := Endpoint{UML: 0.4, Differs: &Difference{ML: 0.0477, LimitML: 0.063}} // u alone would hide it
	if got := coarse.Difference(); got != "+0.05" {
		t.Errorf("got %s, want +0.05", got)
	}
}

func TestUDecimals(t *testing.T) {
	for u, want := range map[float64]int{0.2087: 2, 0.1: 2, 0.0061: 4, 0.00031: 5, 1e-9: 5, 3.2: 1, 40: 1, 0: 3, -1: 3} {
		if got := UDecimals(u); got != want {
			t.Errorf("%v: got %d, want %d", u, got, want)
		}
	}
}
