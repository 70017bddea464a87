package simulate

import (
	"encoding/csv"
	"math"
	"os"
	"strconv"
	"testing"
)

// near fails when got is further from want than tol.
func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !isNear(got, want, tol) {
		t.Errorf("%s: got %.12g, want %.12g, difference %.3g, tolerance %.3g", what, got, want, got-want, tol)
	}
}

// isNear says whether two numbers differ by no more than tol; NaN is near to
// nothing.
func isNear(got, want, tol float64) bool { return math.Abs(got-want) <= tol }

func TestIsNear(t *testing.T) {
	if !isNear(1, 1.01, 0.011) || isNear(1, 1.01, 0.009) || isNear(math.NaN(), 1, 9) || isNear(1, math.NaN(), 9) {
		t.Error("isNear lets a near miss pass, or refuses a hit")
	}
}

// table reads the two columns of a file in testdata.
func table(t *testing.T, name string) (xs, ys []float64) {
	t.Helper()
	f, err := os.Open("testdata/" + name)
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	rows, err := csv.NewReader(f).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	for _, row := range rows[1:] {
		x, errX := strconv.ParseFloat(row[0], 64)
		y, errY := strconv.ParseFloat(row[1], 64)
		if errX != nil || errY != nil {
			t.Fatalf("%s: row %v", name, row)
		}
		xs, ys = append(xs, x), append(ys, y)
	}
	return xs, ys
}

// conductance is a titration of 100 mL with 0.1 mol/L by conductivity.
func conductance(vessel, titrant Solution) Titration {
	return Titration{Signal: Conductivity, V0ML: 100, Vessel: vessel, Titrant: titrant, TemperatureC: 25, Electrode: Ideal()}
}

// The four tables were computed, apart from this program, from the limiting
// conductivities of the CRC Handbook with V0 = 100 mL and 0.1 mol/L titrant;
// they are printed to 0.001 uS/cm.
func TestSyntheticConductivities(t *testing.T) {
	naoh := Solution{Spectators: []Spectator{{"Na+", 0.1}}}
	chloride := conductance(Solution{Spectators: []Spectator{{"K+", 0.01}, {"Cl-", 0.01}}},
		Solution{Spectators: []Spectator{{"Ag+", 0.1}, {"NO3-", 0.1}}})
	chloride.Salts = []Salt{{"Cl-", PKspAgCl}}
	for name, run := range map[string]Titration{
		"synth_HCl_NaOH_Ve10.csv":         conductance(Solution{Spectators: []Spectator{{"Cl-", 0.01}}}, naoh),
		"synth_HAc_NaOH_Ve10.csv":         conductance(Solution{Groups: []Group{Acetic(0.01)}}, naoh),
		"synth_HCl_HAc_NaOH_Ve4_Ve12.csv": conductance(Solution{Spectators: []Spectator{{"Cl-", 0.004}}, Groups: []Group{Acetic(0.008)}}, naoh),
		"synth_KCl_AgNO3_Ve10.csv":        chloride,
	} {
		volumes, want := table(t, name)
		for i, v := range volumes {
			got, err := run.Reading(v)
			if err != nil {
				t.Fatalf("%s at %g mL: %v", name, v, err)
			}
			near(t, name+" at "+strconv.FormatFloat(v, 'f', 2, 64)+" mL, uS/cm", got*1000, want[i], 0.0006)
		}
	}
}

// Dickson (1981), Table 1: an alkalinity titration of sea water, simulated by
// its author; all 51 values of pH to the sixth decimal. Constants and totals
// from the paper; its kilograms stand for our litres. The charge of the
// spectators is the alkalinity with sulfate and fluoride in their most charged
// forms added, which the paper counts as zero level.
func TestDickson1981(t *testing.T) {
	const at, ct, bt, st, ft = 0.00245, 0.00220, 0.00042, 0.02824, 0.00007
	pk := func(k float64) float64 { return -math.Log10(k) }
	sea := Titration{
		Signal: PH, V0ML: 200, PKw: pk(4.32e-14), Electrode: Ideal(),
		Vessel: Solution{
			Spectators: []Spectator{{"Na+", at + 2*st + ft}},
			Groups: []Group{
				{MolPerL: ct, PK: []float64{pk(1.00e-6), pk(8.20e-10)}},
				{MolPerL: bt, PK: []float64{pk(1.78e-9)}},
				{MolPerL: st, PK: []float64{pk(1 / 12.3)}, Charge: -1},
				{MolPerL: ft, PK: []float64{pk(1.0 / 408)}},
			},
		},
		Titrant: Solution{Spectators: []Spectator{{"Cl-", 0.3}}},
		Ends:    []End{{Levels: []int{0, 0, 1, 1}}},
	}
	masses, want := table(t, "dickson1981_table1.csv")
	for i, w := range masses {
		got, err := sea.Reading(w)
		if err != nil {
			t.Fatal(err)
		}
		near(t, "pH at "+strconv.FormatFloat(w, 'f', 2, 64)+" g", got, want[i], 0.6e-6)
	}
	if len(masses) != 51 {
		t.Errorf("%d values; the table has 51", len(masses))
	}
	ends, err := sea.EndpointsML()
	if err != nil {
		t.Fatal(err)
	}
	// The paper: 200 g x 0.00245 / 0.3 = 1.63333 g.
	near(t, "equivalence, g", ends[0], 1.633333, 1e-6)
}
