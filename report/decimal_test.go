package report

import (
	"strings"
	"testing"

	"lastdrop/ingest"
)

func TestDecimalOfFigures(t *testing.T) {
	for _, c := range [][2]string{
		{DecimalComma.Fixed(-12.345, 2), "−12,35"}, // 12.345 is a little more in binary
		{DecimalPoint.Fixed(-12.345, 2), "−12.35"},
		{DecimalComma.Signed(0.27, 2), "+0,27"},
		{DecimalComma.Short(0.0459, 2), "0,046"},
		{DecimalComma.Of("12.06 to 12.74"), "12,06 to 12,74"},
		{DecimalComma.Of(Dash), "–"},
	} {
		if c[0] != c[1] {
			t.Errorf("got %s, want %s", c[0], c[1])
		}
	}
}

// Only figures of ours change in a sentence: no name, no path, nothing quoted.
func TestDecimalInSentences(t *testing.T) {
	for says, want := range map[string]string{
		"Refit 12.910 mL, indicated 13.309 mL (inflection): refit − indicated −0.399 mL, 0.065 mL allowed.": "Refit 12,910 mL, indicated 13,309 mL (inflection): refit − indicated −0,399 mL, 0,065 mL allowed.",
		"The bracket is 5.8 % of the endpoint volume (limit 1.4) and ± 0.5 %.":                              "The bracket is 5,8 % of the endpoint volume (limit 1,4) and ± 0,5 %.",
		"The readings never pass pH 8.10; they run from 2.45 to 7.90.":                                      "The readings never pass pH 8,10; they run from 2,45 to 7,90.",
		"+0.3, -0.3 and (−0.3).":                                                 "+0,3, -0,3 and (−0,3).",
		"dumps/12.3e.csv, run 1, holds 0.5 mL":                                   "dumps/12.3e.csv, run 1, holds 0,5 mL",
		"dumps/1.5/2.5, dumps/12.3, lot-1.5 and 3.5-lot, v0.1.0, 1.2.3 and x1.5": "dumps/1.5/2.5, dumps/12.3, lot-1.5 and 3.5-lot, v0.1.0, 1.2.3 and x1.5",
		`sample "1.5 \" 2.5 mL" and "3.5", then 4.5`:                             `sample "1.5 \" 2.5 mL" and "3.5", then 4,5`,
		`left open "1.5`: `left open "1.5`,
		"4 readings. Line 7. 12:14 on 2 April 2031.": "4 readings. Line 7. 12:14 on 2 April 2031.",
		"ends at 1.5": "ends at 1,5",
		"":            "",
	} {
		if got := DecimalComma.Says(says); got != want {
			t.Errorf("%s:\n got %s\nwant %s", says, got, want)
		}
		if got := DecimalPoint.Says(says); got != says {
			t.Errorf("%s: the point changes it to %s", says, got)
		}
	}
}

func TestDecimalOfAnAxis(t *testing.T) {
	concentration := 0.1
	for name, want := range map[string]string{
		"mL of NaOH 0.1 mol/L":       "mL of NaOH 0,1 mol/L",
		"mL of acid 0.5 N 0.1 mol/L": "mL of acid 0.5 N 0,1 mol/L",
		"mL of titrant":              "mL of titrant",
	} {
		e := &Evaluation{Facts: ingest.Facts{TitrantMolPerL: &concentration}, Picture: &Picture{XName: name}}
		if got := DecimalComma.Axis(e); got != want {
			t.Errorf("got %s, want %s", got, want)
		}
		if e.Facts.TitrantMolPerL = nil; DecimalComma.Axis(e) != name {
			t.Errorf("without a stated concentration %s becomes %s", name, DecimalComma.Axis(e))
		}
	}
}

// FuzzDecimal: a sentence loses nothing but points that become commas, and is
// as before in quotes.
func FuzzDecimal(f *testing.F) {
	f.Add(`dumps/1.5.csv: 2.5 mL (limit 3.5 %), sample "4.5"`)
	f.Fuzz(func(t *testing.T, s string) {
		got := DecimalComma.Says(s)
		if len(got) != len(s) {
			t.Fatalf("%q became %q", s, got)
		}
		for i := range len(s) {
			if got[i] != s[i] && !(s[i] == '.' && got[i] == ',' && i > 0 && strings.ContainsRune("0123456789", rune(s[i-1]))) {
				t.Fatalf("%q became %q at %d", s, got, i)
			}
		}
	})
}
