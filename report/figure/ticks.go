package figure

import "math"

// Scale maps values to mm along one direction of a sheet.
type Scale struct{ From, To, FromMM, ToMM float64 }

// MM returns where a value stands.
func (s Scale) MM(v float64) float64 {
	return s.FromMM + (v-s.From)/(s.To-s.From)*(s.ToMM-s.FromMM)
}

// Holds tells whether a value lies between the ends of the scale.
func (s Scale) Holds(v float64) bool { return v >= s.From && v <= s.To }

// Ticks are the values at which an axis is numbered.
type Ticks struct {
	Values   []float64
	Step     float64
	Decimals int // that their labels need
}

// mostTicks bounds what Ticks returns, whatever was asked for.
const mostTicks = 50

// NewTicks returns the multiples of 1, 2 or 5 times a power of ten between
// from and to, as many as possible but at most so many. It returns none when
// the range is empty or not finite.
func NewTicks(from, to float64, most int) Ticks {
	most = min(most, mostTicks)
	span := to - from
	if !(span > 0) || math.IsInf(span, 0) || most < 1 || span < 1e-12*max(math.Abs(from), math.Abs(to)) {
		return Ticks{}
	}
	power := int(math.Floor(math.Log10(span / float64(most))))
	for ; ; power++ {
		for _, m := range [...]float64{1, 2, 5} {
			if t := multiples(from, to, m, power); len(t) <= most {
				return Ticks{Values: t, Step: m * math.Pow10(max(power, 0)) / math.Pow10(max(-power, 0)), Decimals: max(-power, 0)}
			}
		}
	}
}

// labelGap parts the numbers of neighbouring ticks of a level axis, mm.
const labelGap = 1.2

// LevelTicks are NewTicks of a level scale, fewer where their numbers would
// touch: 10.910 and 10.915 need more room than 10 and 15.
func (s Scale) LevelTicks(most int, print func(v float64, decimals int) string) Ticks {
	t := NewTicks(s.From, s.To, most)
	for n := len(t.Values) - 1; n >= 1 && !s.parted(t, print); n-- {
		t = NewTicks(s.From, s.To, n)
	}
	return t
}

// parted tells whether the numbers of ticks stand apart.
func (s Scale) parted(t Ticks, print func(v float64, decimals int) string) bool {
	for i := 1; i < len(t.Values); i++ {
		a, b := TextWidth(tickNumber, print(t.Values[i-1], t.Decimals)), TextWidth(tickNumber, print(t.Values[i], t.Decimals))
		if s.MM(t.Values[i])-s.MM(t.Values[i-1]) < (a+b)/2+labelGap {
			return false
		}
	}
	return true
}

// multiples lists k·m·10^power between from and to, with a billionth of the
// step allowed at the ends; one more than mostTicks at most.
func multiples(from, to, m float64, power int) []float64 {
	unit, per := m*math.Pow10(max(power, 0)), math.Pow10(max(-power, 0))
	first := math.Ceil(from*per/unit - 1e-9)
	last := math.Floor(to*per/unit + 1e-9)
	var out []float64
	for k := first; k <= last && len(out) <= mostTicks; k++ {
		out = append(out, k*unit/per+0) // minus zero becomes zero
	}
	return out
}

// Rounded returns the range widened to whole steps of ticks, for scales whose
// ends are numbered.
func Rounded(from, to float64, most int) (float64, float64) {
	step := NewTicks(from, to, most).Step
	if step == 0 {
		return from, to
	}
	return math.Floor(from/step+1e-9) * step, math.Ceil(to/step-1e-9) * step
}
