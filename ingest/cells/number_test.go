package cells

import (
	"fmt"
	"math"
	"math/rand/v2"
	"strconv"
	"strings"
	"testing"
)

func TestParseNumber(t *testing.T) {
	for _, c := range []struct {
		text     string
		mark     byte
		shift    int
		value    float64
		decimals int
	}{
		{"0", '.', 0, 0, 0}, {"0.000", '.', 0, 0, 3}, {"-0.0", '.', 0, 0, 1}, {"12.66", '.', 0, 12.66, 2}, {"12,66", ',', 0, 12.66, 2},
		{"+5", '.', 0, 5, 0}, {"-5", '.', 0, -5, 0}, {"−5.5", '.', 0, -5.5, 1}, {".5", '.', 0, 0.5, 1}, {"-.5", '.', 0, -0.5, 1},
		{"007", '.', 0, 7, 0}, {"1e3", '.', 0, 1000, -3}, {"1.5E-3", '.', 0, 0.0015, 4}, {"4.2596e+3", '.', 0, 4259.6, 1},
		{"4259.6", '.', -3, 4.2596, 4}, {"0,0621", ',', 3, 62.1, 1}, {"500", '.', -3, 0.5, 3}, {"0.3", '.', 1, 3, 0},
		{"9007199254740993", '.', 0, 9007199254740992, 0}, // 2^53 + 1: tie, half to even
		{"1" + strings.Repeat("0", 30), '.', -30, 1, 30}, {"0." + strings.Repeat("0", 30) + "1", '.', 31, 1, 0},
		{"123456789012345678901234567890", '.', 0, 123456789012345678901234567890, 0},
	} {
		n, fault := ParseNumber([]byte(c.text), c.mark, c.shift)
		if fault != NumberOK || n.Value != c.value || math.Signbit(n.Value) != (c.value < 0) || n.Decimals != c.decimals {
			t.Errorf("%q shift %d: %v with %d decimals, fault %d; want %v with %d", c.text, c.shift, n.Value, n.Decimals, fault, c.value, c.decimals)
		}
	}
}

func TestNotNumbers(t *testing.T) {
	for _, c := range []struct {
		text string
		mark byte
		want NumberFault
	}{
		{"", '.', NotNumber}, {"-", '.', NotNumber}, {".", '.', NotNumber}, {"5.", '.', NotNumber}, {"--5", '.', NotNumber}, {"+-5", '.', NotNumber},
		{"5-", '.', NotNumber}, {"1 000", '.', NotNumber}, {"1_000", '.', NotNumber}, {"0x1p-2", '.', NotNumber}, {"NaN", '.', NotNumber}, {"Inf", '.', NotNumber},
		{"-inf", '.', NotNumber}, {"1e", '.', NotNumber}, {"1e+", '.', NotNumber}, {"1e1.5", '.', NotNumber}, {"1e12345", '.', NotNumber}, {"e5", '.', NotNumber},
		{"1.2.3", '.', NotNumber}, {"1,2,3", '.', NotNumber}, {"1.234,5", '.', NotNumber}, {"1.234,5", ',', NotNumber}, {"7,42", '.', OtherMark}, {"7.42", ',', OtherMark},
		{"5mL", '.', NotNumber}, {"<5", '.', NotNumber}, {"٣", '.', NotNumber}, {"1e999", '.', NumberUnbounded}, {"-1e400", '.', NumberUnbounded},
		{strings.Repeat("1", 65), '.', NotNumber}, {"1\x00", '.', NotNumber},
	} {
		if _, fault := ParseNumber([]byte(c.text), c.mark, 0); fault != c.want {
			t.Errorf("%q with mark %q: fault %d, want %d", c.text, c.mark, fault, c.want)
		}
	}
}

// strconv is the outside reference: the nearest float64 of any decimal text,
// with the shift as a further exponent.
func TestParseNumberRoundsAsStrconv(t *testing.T) {
	r := rand.New(rand.NewPCG(1, 2))
	for range 200_000 {
		digits := 1 + r.IntN(20)
		text := ""
		for range digits {
			text += strconv.Itoa(r.IntN(10))
		}
		point := r.IntN(digits)
		if point > 0 {
			text = text[:point] + "." + text[point:]
		}
		exponent := 0
		if r.IntN(4) == 0 {
			exponent = r.IntN(60) - 30
			text += fmt.Sprintf("e%d", exponent)
		}
		shift := r.IntN(7) - 3
		mantissa, _, _ := strings.Cut(text, "e")
		want, err := strconv.ParseFloat(fmt.Sprintf("%se%d", mantissa, exponent+shift), 64)
		if err != nil {
			t.Fatal(err)
		}
		got, fault := ParseNumber([]byte(text), '.', shift)
		if fault != NumberOK || got.Value != want {
			t.Fatalf("%s shift %d: %v (fault %d), want %v", text, shift, got.Value, fault, want)
		}
	}
}

func TestStep(t *testing.T) {
	for decimals, want := range map[int]float64{0: 1, 1: 0.1, 2: 0.01, 3: 0.001, 6: 1e-6, -2: 100, 40: 0, -40: 0} {
		if got := Step(decimals); got != want {
			t.Errorf("step of %d decimals: %v, want %v", decimals, got, want)
		}
	}
}

// Whatever the text, a number that is accepted is finite, and reading it again
// from its shortest form gives the same number.
func FuzzNumber(f *testing.F) {
	for _, s := range []string{"12.66", "-0,5", "1e-3", "−7", "5.", "1e999", "0x1", "9007199254740993"} {
		f.Add([]byte(s), true, 0)
	}
	f.Fuzz(func(t *testing.T, b []byte, comma bool, shift int) {
		mark := byte('.')
		if comma {
			mark = ','
		}
		n, fault := ParseNumber(b, mark, shift%10)
		if fault != NumberOK {
			return
		}
		if math.IsNaN(n.Value) || math.IsInf(n.Value, 0) {
			t.Fatalf("%q gives %v", b, n.Value)
		}
		again, fault := ParseNumber([]byte(strconv.FormatFloat(n.Value, 'g', -1, 64)), '.', 0)
		if fault != NumberOK || again.Value != n.Value {
			t.Fatalf("%q: %v, again %v (fault %d)", b, n.Value, again.Value, fault)
		}
	})
}
