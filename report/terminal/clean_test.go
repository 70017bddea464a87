package terminal

import (
	"slices"
	"strings"
	"testing"
)

// Columns as Unicode Standard Annex 11 gives them: CJK and emoji two, accents
// none.
func TestCells(t *testing.T) {
	for s, want := range map[string]int{"VIN-0417": 8, "äöü": 3, "e\u0301": 1, "山田": 4, "😀": 2, "−0.05 °C": 8, "": 0, "Ａ": 2, "\u200D": 0} {
		if got := cells(s); got != want {
			t.Errorf("%q: got %d, want %d", s, got, want)
		}
	}
}

func TestShorten(t *testing.T) {
	for _, c := range []struct {
		give string
		most int
		want string
	}{
		{"VIN-0417", 8, "VIN-0417"},
		{"abcdefghij", 7, "abc…hij"},
		{"abcdefghij", 6, "abc…ij"},
		{"abcdefghij", 1, "…"},
		{"abcdefghij", 0, ""},
		{"山田山田山田", 7, "山…田"},        // two and two columns, one lost on either side
		{"aaaae\u0301b", 4, "aa…b"}, // the accent goes with its letter
		{"a\x1b[2Jb", 9, "a\uFFFDb"},
	} {
		got := Shorten(c.give, c.most)
		if got != c.want || cells(got) > c.most {
			t.Errorf("%q in %d: got %q (%d columns), want %q", c.give, c.most, got, cells(got), c.want)
		}
	}
}

func TestWrap(t *testing.T) {
	for _, c := range []struct {
		give string
		most int
		want []string
	}{
		{"", 20, nil},
		{"one two three", 9, []string{"one two", "three"}},
		{"a dose of 1.09 mL here", 14, []string{"a dose of", "1.09 mL here"}}, // number and unit stay together
		{"reading (pH 4.46) too", 12, []string{"reading", "(pH 4.46)", "too"}},
		{"share (limit 8 %) of it", 15, []string{"share (limit", "8 %) of it"}},
		{"abcdefghijklmnop", 8, []string{"abcdefgh", "ijklmnop"}},
		{"山田山田山田", 8, []string{"山田山田", "山田"}},
	} {
		if got := wrap(c.give, c.most); !slices.Equal(got, c.want) {
			t.Errorf("%q in %d: got %q, want %q", c.give, c.most, got, c.want)
		}
	}
	for _, l := range wrap(strings.Repeat("pH 4.46 and 12.5 mL ", 40), 8) {
		if cells(l) > 8 {
			t.Errorf("%q is wider than 8", l)
		}
	}
}
