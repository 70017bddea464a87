package report

import (
	"math"
	"strconv"
	"strings"
)

// Every figure that a person reads passes through the functions of this file,
// once. The record keeps the unrounded number.

// Minus is the sign of negative figures on paper, U+2212.
const Minus = "−"

// Dash stands for an absent value, U+2013.
const Dash = "–"

// VolumeDecimals returns how many decimals of a volume in mL its standard
// uncertainty u (mL) supports, between 2 and 4: the place of the first figure
// of u, or of the second where the first is a 1 or 2 and rounding to it alone
// would change u by up to a half. A fourth decimal is shown for its first
// figure only: burettes print three. Without a usable u it returns 3.
//
// Source: u is quoted to at most two figures and the value to the same place,
// JCGM 100:2008, 7.2.6 (from memory); keeping the second only after a 1 or 2
// is common practice, no source.
func VolumeDecimals(u float64) int {
	if !(u > 0) || math.IsInf(u, 1) {
		return 3
	}
	place := math.Ceil(-math.Log10(u))
	if u*math.Pow(10, place) < 3 && place < 3 {
		place++
	}
	return min(max(int(place), 2), 4)
}

// StepDecimals returns how many decimals a display step has: 0.01 gives 2.
// A step that is not positive gives fallback.
func StepDecimals(step float64, fallback int) int {
	if !(step > 0) || math.IsInf(step, 1) {
		return fallback
	}
	return min(max(int(math.Ceil(-math.Log10(step)-1e-9)), 0), 6)
}

// Fixed prints v with so many decimals, with a true minus sign and never
// "−0.00". It rounds the 15 significant digits that a workbook keeps, half away
// from zero: so office programs show the same figure that the pages print.
func Fixed(v float64, decimals int) string {
	s := halfAway(v, decimals)
	if strings.HasPrefix(s, "-") {
		s = s[1:]
		if strings.Trim(s, "0.") == "" {
			return s
		}
		return Minus + s
	}
	return s
}

// keptDigits are the significant digits of a number in a workbook.
const keptDigits = 15

// halfAway rounds on the decimal digits of v.
func halfAway(v float64, decimals int) string {
	s := strconv.FormatFloat(v, 'e', keptDigits-1, 64) // -d.dddddddddddddde-dd
	mantissa, power, ok := strings.Cut(s, "e")
	exponent, err := strconv.Atoi(power)
	keep := exponent + 1 + decimals // digits that stay
	if !ok || err != nil || keep >= keptDigits || keep < 0 {
		return strconv.FormatFloat(v, 'f', decimals, 64)
	}
	sign := ""
	if mantissa[0] == '-' {
		sign, mantissa = "-", mantissa[1:]
	}
	digits := "0" + mantissa[:1] + mantissa[2:] // a place for what is carried
	kept := []byte(digits[:keep+1])
	if digits[keep+1] >= '5' {
		i := len(kept) - 1
		for ; kept[i] == '9'; i-- {
			kept[i] = '0'
		}
		kept[i]++
	}
	for len(kept) < decimals+1 { // before the point stands a digit
		kept = append([]byte{'0'}, kept...)
	}
	whole := strings.TrimLeft(string(kept[:len(kept)-decimals]), "0")
	if whole == "" {
		whole = "0"
	}
	if decimals == 0 {
		return sign + whole
	}
	return sign + whole + "." + string(kept[len(kept)-decimals:])
}

// Signed is Fixed with a plus sign before positive figures.
func Signed(v float64, decimals int) string {
	s := Fixed(v, decimals)
	if strings.HasPrefix(s, Minus) || strings.Trim(s, "0.") == "" {
		return s
	}
	return "+" + s
}

// Short prints v with at most so many significant figures and no trailing
// zeros, for limits and other figures in sentences.
func Short(v float64, figures int) string {
	r, err := strconv.ParseFloat(strconv.FormatFloat(v, 'e', figures-1, 64), 64)
	if err != nil {
		return Dash
	}
	s := strconv.FormatFloat(r, 'f', -1, 64)
	return strings.Replace(s, "-", Minus, 1)
}

// Volume is the one printed form of an endpoint's volume, without unit.
func (e *Endpoint) Volume() string { return Fixed(e.VolumeML, VolumeDecimals(e.UML)) }

// Interval is the one printed form of the 95 % interval, without unit.
func (e *Endpoint) Interval() string {
	d := VolumeDecimals(e.UML)
	return Fixed(e.Low95ML, d) + " to " + Fixed(e.High95ML, d)
}

// BracketDecimals are those of the two volumes of a bracket, in mL: burettes
// print three.
const BracketDecimals = 3

// Bracket is the one printed form of the readings on either side of the
// endpoint, in mL without unit.
func (e *Endpoint) Bracket() string {
	return Fixed(e.BracketML[0], BracketDecimals) + " to " + Fixed(e.BracketML[1], BracketDecimals)
}

// Volume is the one printed form of an indicated endpoint, with the decimals
// that the instrument printed.
func (i *Indicated) Volume() string { return Fixed(i.VolumeML, StepDecimals(i.StepML, 3)) }
