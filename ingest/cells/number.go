package cells

import (
	"math"
	"strconv"
)

// Number is a decimal number as written.
type Number struct {
	Value    float64 // finite
	Decimals int     // digits behind the decimal mark minus the exponent; negative for 1e3
}

// NumberFault is why text is no number.
type NumberFault int

// The outcomes of ParseNumber.
const (
	NumberOK        NumberFault = iota
	NotNumber                   // no decimal number at all
	OtherMark                   // it would be one with the other decimal mark
	NumberUnbounded             // beyond a float64
	NumberBound                 // a number with "<" or ">" before it
)

// maxNumberBytes is the longest text that is looked at as a number; no
// instrument prints more digits, and it bounds the work on damaged dumps.
const maxNumberBytes = 64

// powersOfTen are those that a float64 holds exactly.
var powersOfTen = [...]float64{1, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11,
	1e12, 1e13, 1e14, 1e15, 1e16, 1e17, 1e18, 1e19, 1e20, 1e21, 1e22}

// ParseNumber reads plain decimal syntax: sign (U+2212 too), digits, decimal
// mark, digits, exponent. No NaN, Inf, hexadecimal, underscore or grouping;
// "5." is refused, being a number cut off. The result is multiplied by ten to
// the shift before it is rounded to a float64, so that 4259.6 uS/cm is the
// float64 nearest to 4.2596.
func ParseNumber(b []byte, mark byte, shift int) (Number, NumberFault) {
	if n, ok := parseShort(b, mark, shift); ok {
		return n, NumberOK
	}
	d, ok := scanDigits(b, mark)
	if !ok {
		other := byte(',')
		if mark == ',' {
			other = '.'
		}
		if _, ok := scanDigits(b, other); ok {
			return Number{}, OtherMark
		}
		return Number{}, NotNumber
	}
	value, ok := d.float(shift)
	if !ok {
		return Number{}, NumberUnbounded
	}
	return Number{value, -d.exponent - shift}, NumberOK
}

// parseShort is the way of nearly all numbers: up to 15 digits, perhaps with a
// minus sign and a decimal mark. ok is false for every other text.
func parseShort(b []byte, mark byte, shift int) (n Number, ok bool) {
	negative := len(b) > 0 && b[0] == '-'
	if negative {
		b = b[1:]
	}
	if len(b) == 0 || len(b) > 16 {
		return n, false
	}
	var mantissa uint64
	point := len(b) // index of the mark
	for i, c := range b {
		if c -= '0'; c < 10 {
			mantissa = mantissa*10 + uint64(c)
		} else if c == mark-'0' && point == len(b) && i < len(b)-1 {
			point = i
		} else {
			return n, false
		}
	}
	decimals := 0
	if point < len(b) {
		decimals = len(b) - 1 - point
	}
	e := shift - decimals
	if mantissa >= 1<<53 || mantissa == 0 || e >= len(powersOfTen) || -e >= len(powersOfTen) {
		return n, false
	}
	n = Number{float64(mantissa), -e}
	if e < 0 {
		n.Value /= powersOfTen[-e]
	} else {
		n.Value *= powersOfTen[e]
	}
	if negative {
		n.Value = -n.Value
	}
	return n, true
}

// digits are the parts of a decimal number: mantissa · 10^exponent.
type digits struct {
	negative bool
	mantissa uint64 // of the first 19 digits
	count    int    // of digits without leading zeros
	exponent int
	text     []byte // digits and decimal mark as written
}

// scanDigits reads the syntax. A number needs a digit before or behind the
// mark, and one behind it when there is a mark.
func scanDigits(b []byte, mark byte) (d digits, ok bool) {
	if len(b) > maxNumberBytes {
		return d, false
	}
	from := d.sign(b)
	i := d.digits(b, from)
	whole := i - from
	if i < len(b) && b[i] == mark {
		fraction := i + 1
		i = d.digits(b, fraction)
		d.exponent = fraction - i
		if d.exponent == 0 {
			return d, false
		}
	}
	if whole == 0 && d.exponent == 0 {
		return d, false
	}
	d.text = b[from:i]
	return d, i == len(b) || d.scanExponent(b[i:])
}

// sign reads +, - or U+2212 and returns how many bytes it has.
func (d *digits) sign(b []byte) int {
	switch {
	case len(b) == 0:
		return 0
	case b[0] == '+':
		return 1
	case b[0] == '-':
		d.negative = true
		return 1
	case len(b) > 2 && b[0] == 0xE2 && b[1] == 0x88 && b[2] == 0x92:
		d.negative = true
		return 3
	}
	return 0
}

// digits reads digits from i on and returns the offset after them.
func (d *digits) digits(b []byte, i int) int {
	for ; i < len(b) && b[i]-'0' < 10; i++ {
		if d.count == 0 && b[i] == '0' {
			continue // leading zeros carry nothing
		}
		d.count++
		if d.count <= 19 {
			d.mantissa = d.mantissa*10 + uint64(b[i]-'0')
		}
	}
	return i
}

// scanExponent reads e or E, sign and one to four digits, and nothing after.
func (d *digits) scanExponent(b []byte) bool {
	if b[0] != 'e' && b[0] != 'E' {
		return false
	}
	var e digits
	b = b[1:]
	from := e.sign(b)
	to := e.digits(b, from)
	if to == from || to > from+4 || to < len(b) {
		return false
	}
	if e.negative {
		d.exponent -= int(e.mantissa)
	} else {
		d.exponent += int(e.mantissa)
	}
	return true
}

// float rounds mantissa · 10^(exponent + shift) once; ok is false when it is
// beyond a float64. Mantissa and power are exact in the usual case, so that
// one division or multiplication rounds once; strconv does the rest.
func (d *digits) float(shift int) (v float64, ok bool) {
	e := d.exponent + shift
	switch {
	case d.count == 0: // zero, without a sign
		return 0, true
	case d.count <= 19 && d.mantissa < 1<<53 && e >= 0 && e < len(powersOfTen):
		v = float64(d.mantissa) * powersOfTen[e]
	case d.count <= 19 && d.mantissa < 1<<53 && e < 0 && -e < len(powersOfTen):
		v = float64(d.mantissa) / powersOfTen[-e]
	default:
		v = d.slowFloat(e)
	}
	if d.negative {
		v = -v
	}
	return v, !math.IsInf(v, 0)
}

func (d *digits) slowFloat(exponent int) float64 {
	text := make([]byte, 0, maxNumberBytes+8)
	for _, c := range d.text {
		if c-'0' < 10 {
			text = append(text, c)
		}
	}
	text = strconv.AppendInt(append(text, 'e'), int64(exponent), 10)
	v, _ := strconv.ParseFloat(string(text), 64) // Inf when out of range
	return v
}

// Step returns ten to the minus decimals, the step of a display that shows so
// many; 0 when it is beyond the exact powers of ten.
func Step(decimals int) float64 {
	switch {
	case decimals >= 0 && decimals < len(powersOfTen):
		return 1 / powersOfTen[decimals]
	case decimals < 0 && -decimals < len(powersOfTen):
		return powersOfTen[-decimals]
	}
	return 0
}
