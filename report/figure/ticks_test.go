package figure

import (
	"math"
	"slices"
	"strconv"
	"strings"
	"testing"
)

// TestNewTicks: each range with the ticks that a draughtsman would choose,
// found by hand: multiples of 1, 2 or 5 times a power of ten, as many as fit.
func TestNewTicks(t *testing.T) {
	for _, c := range []struct {
		from, to float64
		most     int
		want     []float64
		decimals int
	}{
		{0, 18, 10, []float64{0, 2, 4, 6, 8, 10, 12, 14, 16, 18}, 0},
		{0, 18, 5, []float64{0, 5, 10, 15}, 0},
		{2.4, 12.3, 6, []float64{4, 6, 8, 10, 12}, 0},
		{-0.5, 0.5, 5, []float64{-0.4, -0.2, 0, 0.2, 0.4}, 1},
		{-1, 1, 5, []float64{-1, -0.5, 0, 0.5, 1}, 1},
		{12.285, 13.009, 3, []float64{12.5, 13}, 1},
		{14.21, 14.38, 4, []float64{14.25, 14.3, 14.35}, 2},
		{0, 0.003, 4, []float64{0, 0.001, 0.002, 0.003}, 3},
		{90, 470, 4, []float64{100, 200, 300, 400}, 0},
		{0, 123456, 3, []float64{0, 50000, 100000}, 0},
		{-7e6, 7e6, 3, []float64{-5e6, 0, 5e6}, 0},
		{0.1, 0.3, 3, []float64{0.1, 0.2, 0.3}, 1}, // 3·0.1 > 0.3 in binary: the end still counts
	} {
		got := NewTicks(c.from, c.to, c.most)
		same := len(got.Values) == len(c.want)
		for i := range got.Values {
			same = same && math.Abs(got.Values[i]-c.want[i]) <= 1e-12*math.Abs(c.to-c.from)
		}
		if !same || got.Decimals != c.decimals {
			t.Errorf("NewTicks(%g, %g, %d) = %v with %d decimals, want %v with %d", c.from, c.to, c.most, got.Values, got.Decimals, c.want, c.decimals)
		}
	}
}

// TestNewTicksOfNoRange: what is no range has no ticks, and nothing loops.
func TestNewTicksOfNoRange(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	for _, r := range [][2]float64{{1, 1}, {2, 1}, {nan, 1}, {0, nan}, {0, inf}, {-inf, inf}, {1e18, 1e18 + 128}, {0, 0}} {
		if got := NewTicks(r[0], r[1], 5); len(got.Values) != 0 {
			t.Errorf("NewTicks(%g, %g) = %v, want none", r[0], r[1], got.Values)
		}
	}
	if got := NewTicks(0, 1, 0); len(got.Values) != 0 {
		t.Errorf("at most 0 ticks: got %v", got.Values)
	}
}

// TestNewTicksLaw: over many ranges there are at most as many as asked, at
// least half as many less one, all inside, evenly spaced.
func TestNewTicksLaw(t *testing.T) {
	for e := -9; e <= 9; e++ {
		for k := 1; k < 60; k++ {
			from := float64(k%7-3) * math.Pow10(e) * 0.37
			to := from + (0.3+0.171*float64(k))*math.Pow10(e)
			for _, most := range []int{3, 5, 9} {
				v := NewTicks(from, to, most).Values
				if len(v) > most || len(v) < max(most*2/5-1, 1) {
					t.Fatalf("%d ticks from %g to %g, at most %d", len(v), from, to, most)
				}
				if give := 1e-6 * (to - from); v[0] < from-give || v[len(v)-1] > to+give || !slices.IsSorted(v) {
					t.Fatalf("ticks %v from %g to %g", v, from, to)
				}
			}
		}
	}
}

// TestRounded: 0 to 0.83 with steps of 0.5 ends at 1; whole ends stay.
func TestRounded(t *testing.T) {
	for _, c := range [][4]float64{{0, 0.83, 0, 1}, {0, 1, 0, 1}, {-3.2, 4.1, -5, 5}} {
		if from, to := Rounded(c[0], c[1], 2); math.Abs(from-c[2]) > 1e-12 || math.Abs(to-c[3]) > 1e-12 {
			t.Errorf("Rounded(%g, %g) = %g, %g, want %g, %g", c[0], c[1], from, to, c[2], c[3])
		}
	}
}

// Numbers of a level axis never touch. At 6.5 pt a digit is 1.28 mm wide and a
// point 0.64 mm (0.556 and 0.278 of the size): "10.90" takes 5.7 mm and a gap,
// so that ticks 13.3 mm apart stay, ticks 6.7 mm apart become fewer.
func TestLevelTicksStandApart(t *testing.T) {
	print := func(v float64, decimals int) string { return strconv.FormatFloat(v, 'f', decimals, 64) }
	for _, c := range []struct {
		s    Scale
		most int
		want string
	}{
		{Scale{10.9, 10.93, 0, 40}, 6, "10.90 10.91 10.92 10.93"},
		{Scale{10.9, 10.93, 0, 20}, 6, "10.90 10.92"},
		{Scale{0, 10, 0, 45}, 10, "0 2 4 6 8 10"},
		{Scale{0, 9, 0, 45}, 10, "0 1 2 3 4 5 6 7 8 9"},
		{Scale{10.9, 10.93, 0, 3}, 6, "10.90"},
		{Scale{1, 1, 0, 3}, 6, ""},
	} {
		ticks := c.s.LevelTicks(c.most, print)
		var got []string
		for _, v := range ticks.Values {
			got = append(got, print(v, ticks.Decimals))
		}
		if strings.Join(got, " ") != c.want {
			t.Errorf("%+v: got %q, want %q", c.s, strings.Join(got, " "), c.want)
		}
	}
}
