package published

import (
	"bytes"
	"encoding/csv"
	"encoding/json"
	"math"
	"os"
	"strconv"
	"strings"
	"testing"
)

// near fails the test unless got is within tolerance of want.
func near(t *testing.T, what string, got, want, tolerance float64) {
	t.Helper()
	if d := got - want; !(math.Abs(d) <= tolerance) {
		t.Errorf("%s: got %.7g, want %.7g, difference %.2g, tolerance %.2g", what, got, want, d, tolerance)
	}
}

// table returns the table of that name.
func table(t *testing.T, name string) Table {
	t.Helper()
	for _, tb := range Tables() {
		if tb.Name == name {
			return tb
		}
	}
	t.Fatalf("no table %q", name)
	return Table{}
}

// rows returns the cells below header and # lines of a two-column text.
func rows(t *testing.T, data []byte) [][]string {
	t.Helper()
	r := csv.NewReader(bytes.NewReader(data))
	r.Comment = '#'
	all, err := r.ReadAll()
	if err != nil || len(all) < 2 {
		t.Fatalf("%d rows, error %v", len(all), err)
	}
	return all[1:]
}

// curve returns volumes (mL) and readings of a dump.
func curve(t *testing.T, data []byte) (v, y []float64) {
	t.Helper()
	for _, r := range rows(t, data) {
		v, y = append(v, number(t, r[0])), append(y, number(t, r[1]))
	}
	return v, y
}

func number(t *testing.T, s string) float64 {
	t.Helper()
	f, err := strconv.ParseFloat(s, 64)
	if err != nil {
		t.Fatal(err)
	}
	return f
}

// load reads a JSON file of testdata.
func load(t *testing.T, name string, into any) {
	t.Helper()
	data, err := os.ReadFile("testdata/" + name)
	if err != nil {
		t.Fatal(err)
	}
	if err := json.Unmarshal(data, into); err != nil {
		t.Fatal(err)
	}
}

func TestTablesSayAllTheyMust(t *testing.T) {
	seen := map[string]bool{}
	for _, tb := range Tables() {
		v, _ := curve(t, tb.Dump)
		if seen[tb.Name] || tb.Source == "" || tb.Status == "" || len(tb.Answers) == 0 {
			t.Errorf("%s: repeated name, or source, status or answers missing", tb.Name)
		}
		seen[tb.Name] = true
		for i, a := range tb.Answers {
			if a.Endpoint < 1 || a.Kind == "" || a.Status == "" || a.How == "" || a.ToleranceReason == "" {
				t.Errorf("%s, answer %d: endpoint, kind, status, how or the reason of the tolerance is missing", tb.Name, i)
			}
			if !(a.ToleranceML > 0) || a.VolumeML <= v[0] || a.VolumeML >= v[len(v)-1] {
				t.Errorf("%s, answer %d: %g ± %g mL, readings go from %g to %g mL", tb.Name, i, a.VolumeML, a.ToleranceML, v[0], v[len(v)-1])
			}
		}
	}
}

// A computation that is 1 % off must fail on every table that is not hard.
func TestToleranceIsTighterThanOnePercent(t *testing.T) {
	for _, tb := range Tables() {
		tight := tb.Hard != ""
		for _, a := range tb.Answers {
			tight = tight || a.Kind != "equivalence" && !a.MayMiss && a.ToleranceML < 0.01*a.VolumeML
		}
		if !tight {
			t.Errorf("%s: every tolerance is 1 %% or wider", tb.Name)
		}
	}
}

// decimals counts the digits behind the point.
func decimals(s string) int {
	_, part, _ := strings.Cut(s, ".")
	return len(part)
}

// The dumps hold the digits of the sources (testdata/source, in the units of
// the sources): same rows, same digits, the point moved.
func TestDumpsHoldTheSourcesDigits(t *testing.T) {
	places := map[string]int{"potential": 3, "pH": 0, "conductivity": -3} // V to mV, µS/cm to mS/cm
	for _, tb := range Tables() {
		data, err := os.ReadFile("testdata/source/" + tb.Name + ".csv")
		if err != nil {
			t.Fatal(err)
		}
		source, dumped, p := rows(t, data), rows(t, tb.Dump), places[tb.Signal]
		if len(source) != len(dumped) {
			t.Fatalf("%s: %d rows in the source, %d in the dump", tb.Name, len(source), len(dumped))
		}
		for i, r := range source {
			digits := strings.TrimLeft(strings.Replace(r[1], ".", "", 1), "0")
			if got := strings.TrimLeft(strings.Replace(dumped[i][1], ".", "", 1), "0"); got != digits {
				t.Errorf("%s, row %d: digits %s became %s", tb.Name, i+1, digits, got)
			}
			if decimals(dumped[i][1]) != decimals(r[1])-p || dumped[i][0] != r[0] {
				t.Errorf("%s, row %d: %v became %v, the point moves by %d", tb.Name, i+1, r, dumped[i], p)
			}
		}
	}
}

// A caller that writes into a dump does not change what the next one gets.
func TestDumpIsACopy(t *testing.T) {
	first := Tables()[0].Dump
	want := append([]byte(nil), first...)
	first[0] ^= 0xff
	if !bytes.Equal(Tables()[0].Dump, want) {
		t.Error("a change in one dump is seen in the next")
	}
}
