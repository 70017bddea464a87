package report

import (
	"math"
	"math/big"
	"math/rand"
	"strconv"
	"strings"
	"testing"
)

// By hand: decimal ties go away from zero, as in every office program,
// whichever side of the tie the binary number lies on.
func TestFixed(t *testing.T) {
	for _, c := range []struct {
		v        float64
		decimals int
		want     string
	}{
		{8.079500000000003, 3, "8.080"}, {8.0795, 3, "8.080"}, {2.675, 2, "2.68"}, {0.125, 2, "0.13"}, {-0.125, 2, "−0.13"},
		{0.5, 0, "1"}, {1.5, 0, "2"}, {0.4999, 0, "0"}, {9.996, 2, "10.00"}, {99.95, 1, "100.0"}, {0.0004, 3, "0.000"}, {-0.0004, 3, "0.000"},
		{0.0005, 3, "0.001"}, {12.4, 2, "12.40"}, {0, 2, "0.00"}, {1234567.891, 1, "1234567.9"}, {1e-9, 3, "0.000"}, {5, 0, "5"}, {-7.25, 1, "−7.3"},
		{123456789012345678, 0, "123456789012345680"}, {0.05, 1, "0.1"}, {0.005, 1, "0.0"},
	} {
		if got := Fixed(c.v, c.decimals); got != c.want {
			t.Errorf("%v with %d decimals: got %s, want %s", c.v, c.decimals, got, c.want)
		}
	}
	if got := Fixed(math.NaN(), 2) + Fixed(math.Inf(1), 2); got != "NaN+Inf" {
		t.Errorf("no numbers: got %s", got)
	}
}

// Against exact arithmetic of package math/big on the 15 digits.
func TestFixedAgainstExact(t *testing.T) {
	random := rand.New(rand.NewSource(11))
	for range 20000 {
		v := (random.Float64() - 0.5) * math.Pow10(random.Intn(9)-4)
		if random.Intn(2) == 0 {
			v = math.Round(v*2e4) / 2e4 // many ties
		}
		decimals := random.Intn(5)
		x, ok := new(big.Rat).SetString(strconv.FormatFloat(v, 'e', 14, 64))
		if !ok {
			t.Fatal(v)
		}
		want := x.FloatString(decimals) // half away from zero, as its documentation says
		if strings.Trim(want, "-0.") == "" {
			want = strings.TrimPrefix(want, "-")
		}
		if got := strings.Replace(Fixed(v, decimals), Minus, "-", 1); got != want {
			t.Fatalf("%v with %d decimals: got %s, want %s", v, decimals, got, want)
		}
	}
}
