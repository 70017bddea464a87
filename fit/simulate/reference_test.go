package simulate

import (
	"encoding/csv"
	"os"
	"strconv"
	"testing"
)

// references are the curves of testdata/reference.py, which solves them apart
// from this package (SciPy 1.10.1, brentq). All have 60 mL and a titrant of
// 0.1 mol/L.
func references() map[string]Titration {
	of := func(vessel, titrant Solution, ends ...End) Titration {
		t := strongStrong()
		t.V0ML, t.Vessel, t.Titrant, t.Ends = 60, vessel, titrant, ends
		t.Dosing.StopML = 30
		return t
	}
	naoh, hcl := Solution{Spectators: []Spectator{{"Na+", 0.1}}}, Solution{Spectators: []Spectator{{"Cl-", 0.1}}}
	taken := naoh
	taken.Groups = []Group{Carbonic(0.002)}
	mixed := silverChloride()
	mixed.Vessel = Solution{Spectators: []Spectator{{"Na+", 0.02}, {"Br-", 0.01}, {"Cl-", 0.01}}}
	mixed.Salts = []Salt{{"Br-", 12.3}, {"Cl-", PKspAgCl}}
	return map[string]Titration{
		"phosphoric": of(Solution{Groups: []Group{Phosphoric(0.015)}}, naoh, End{Levels: []int{1}}, End{Levels: []int{2}}),
		"alkalinity": of(Solution{Spectators: []Spectator{{"Na+", 0.019}}, Groups: []Group{Carbonic(0.012)}}, hcl, End{Levels: []int{1}}, End{Levels: []int{0}}),
		"carbonated": of(Solution{Groups: []Group{Acetic(0.02)}}, taken, End{Levels: []int{1}, TitrantLevels: []int{1}}),
		"ammonia":    of(Solution{Groups: []Group{Ammonium(0.02)}}, hcl, End{Levels: []int{0}}),
		"chloride":   silverChloride(),
		"mixed":      mixed,
	}
}

func TestAgainstSciPy(t *testing.T) {
	f, err := os.Open("testdata/reference.csv")
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	rows, err := csv.NewReader(f).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	runs, compared := references(), 0
	for _, row := range rows[1:] {
		run := runs[row[0]]
		volume, errV := strconv.ParseFloat(row[2], 64)
		want, errW := strconv.ParseFloat(row[3], 64)
		m, errM := run.model()
		if errV != nil || errW != nil || errM != nil {
			t.Fatal(row, errV, errW, errM)
		}
		switch row[1] {
		case "reading":
			got, err := m.decades(volume)
			if err != nil {
				t.Fatal(err)
			}
			near(t, row[0]+" at "+row[2]+" mL", got, want, 2e-11)
		case "steepest":
			near(t, row[0]+", steepest near "+row[2]+" mL", steepestNear(t, run, volume), want, 3e-6)
		}
		compared++
	}
	if compared < 50 {
		t.Errorf("%d values compared", compared)
	}
}

// steepestNear returns the inflection of the truth that is nearest to a volume.
func steepestNear(t *testing.T, run Titration, volume float64) float64 {
	t.Helper()
	_, truth, err := run.Run(1)
	if err != nil {
		t.Fatal(err)
	}
	best := truth.InflectionsML[0]
	for _, v := range truth.InflectionsML {
		if (v-volume)*(v-volume) < (best-volume)*(best-volume) {
			best = v
		}
	}
	return best
}
