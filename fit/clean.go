package fit

import (
	"math"
	"sort"

	"gonum.org/v1/gonum/stat/distuv"
)

// Why a reading is not used.
const (
	LeftRepeat   = "repeat"          // an earlier reading at the same volume; the last one had come to rest
	LeftReversal = "volume-reversal" // its volume is out of the order of its neighbours
	LeftStray    = "stray-reading"   // it stands off the curve of its neighbours
	LeftStuck    = "stuck"           // the display stood still
)

// LeftOut is a reading that is not used.
type LeftOut struct {
	At     int     // index in the Curve
	Why    string  // one of the Left… names
	Figure float64 // distance from the neighbours' curve, or how far it moved while the reading stood, in the reading's unit; reversal: mL from its neighbours
	Limit  float64 // what was allowed, in the unit of Figure
	ToEnd  bool    // of a stuck stretch that reaches the end of the data
}

// cleaned is a curve made fit for estimators: rising volumes, readings
// oriented so that they rise across a jump and counted in decades.
type cleaned struct {
	at       []int     // index in the Curve
	v, u     []float64 // mL, decades (conductivity: mS/cm)
	sign     float64   // of the reading: y = sign * decade * u
	decade   float64
	noise    float64 // sd of u; conductivity: relative to the reading
	relative bool    // noise is relative
	uv       float64 // u of a volume, mL: burette and display
	burette  float64 // u of the burette alone, mL
	leftOut  []LeftOut
}

// order keeps the order of time: volumes out of order are left out, and of
// several readings at one volume the last one stays, since an average would
// mix in readings that had not come to rest.
func order(c *Curve, l Limits) cleaned {
	k := cleaned{sign: 1, decade: c.Decade()}
	keep := rising(c.V)
	top := math.Inf(-1)
	for i, v := range c.V {
		n := len(k.v)
		switch {
		case !keep[i]:
			k.leftOut = append(k.leftOut, LeftOut{At: i, Why: LeftReversal, Figure: outOfOrder(c.V, keep, i)})
		case v > top:
			k.at, k.v, k.u = append(k.at, i), append(k.v, v), append(k.u, c.Y[i])
			top = v
		default: // the same volume again
			k.leftOut = append(k.leftOut, LeftOut{At: k.at[n-1], Why: LeftRepeat})
			k.at[n-1], k.u[n-1] = i, c.Y[i]
		}
	}
	if c.Signal != Conductivity {
		k.orient()
	}
	k.burette = buretteU(k.v, l)
	k.uv = math.Hypot(k.burette, displayU(k.v, c.StepV))
	return k
}

// rising chooses the readings whose volumes do not go back. A reading below
// one that was already delivered goes, as long as these are few; where leaving
// out others needs fewer by two at least, as with one volume typed ten times
// too high, the smallest set goes that restores the order.
func rising(v []float64) []bool {
	first, n := keepFirst(v)
	longest, m := keepMost(v)
	if m >= n+2 {
		return longest
	}
	return first
}

// keepFirst keeps what is not below the highest volume before it.
func keepFirst(v []float64) (keep []bool, count int) {
	keep = make([]bool, len(v))
	top := math.Inf(-1)
	for i, x := range v {
		if x >= top {
			keep[i], top = true, x
			count++
		}
	}
	return keep, count
}

// keepMost keeps a longest sequence that never falls, by patience sorting in
// O(n log n).
func keepMost(v []float64) (keep []bool, count int) {
	var tails []int // index of the smallest end of a sequence of each length
	before := make([]int, len(v))
	for i, x := range v {
		at := sort.Search(len(tails), func(t int) bool { return v[tails[t]] > x })
		before[i] = -1
		if at > 0 {
			before[i] = tails[at-1]
		}
		if at == len(tails) {
			tails = append(tails, i)
		} else {
			tails[at] = i
		}
	}
	keep = make([]bool, len(v))
	if len(tails) == 0 {
		return keep, 0
	}
	for i := tails[len(tails)-1]; i >= 0; i = before[i] {
		keep[i] = true
	}
	return keep, len(tails)
}

// outOfOrder returns how far a volume lies from the nearer of the kept ones
// before and behind it, mL.
func outOfOrder(v []float64, keep []bool, i int) float64 {
	far := math.Inf(1)
	for j := i - 1; j >= 0; j-- {
		if keep[j] {
			far = math.Abs(v[j] - v[i])
			break
		}
	}
	for j := i + 1; j < len(v); j++ {
		if keep[j] {
			return math.Min(far, math.Abs(v[j]-v[i]))
		}
	}
	return far
}

// orient turns the readings so that they rise, in decades.
func (k *cleaned) orient() {
	n := len(k.u)
	m := min(3, n)
	if median(k.u[n-m:]) < median(k.u[:m]) {
		k.sign = -1
	}
	for i := range k.u {
		k.u[i] *= k.sign / k.decade
	}
}

// reading turns decades back into the reading's unit.
func (k *cleaned) reading(u float64) float64 { return k.sign * k.decade * u }

// buretteU is the burette's standard uncertainty: the usual one, or a tenth of
// the median increment where that is less (microlitre titrations exist).
func buretteU(v []float64, l Limits) float64 {
	return min(l.BuretteUML, medianIncrement(v)/10)
}

// displayU is that of the rounding of a displayed volume, step/sqrt(12) [gum
// F.2.2.1, clause from memory]: volumes typed by hand to 0.1 mL are known no
// better.
func displayU(v []float64, step float64) float64 {
	return min(step/math.Sqrt(12), medianIncrement(v)/4)
}

func medianIncrement(v []float64) float64 {
	if len(v) < 2 {
		return 0
	}
	d := make([]float64, len(v)-1)
	for i := range d {
		d[i] = v[i+1] - v[i]
	}
	return median(d)
}

func median(a []float64) float64 {
	b := append([]float64(nil), a...)
	sort.Float64s(b)
	n := len(b)
	if n%2 == 1 {
		return b[n/2]
	}
	return (b[n/2-1] + b[n/2]) / 2
}

// sd is the standard deviation of reading i, in the unit of u.
func (k *cleaned) sd(i int) float64 {
	if k.relative {
		return k.noise * math.Abs(k.u[i])
	}
	return k.noise
}

// without drops the entries of k that drop says.
func (k *cleaned) without(drop func(i int) bool) cleaned {
	r := *k
	r.at, r.v, r.u = nil, nil, nil
	for i := range k.v {
		if !drop(i) {
			r.at, r.v, r.u = append(r.at, k.at[i]), append(r.v, k.v[i]), append(r.u, k.u[i])
		}
	}
	return r
}

// strayBound is the two-sided bound at which a run of n clean readings loses
// one with probability rate at most (Bonferroni). A fixed bound would name a
// stray in 3 to 6 % of clean runs. The noise is itself an estimate, from n/2
// differences, so the quantile is Student's with the degrees of freedom that
// they are worth.
func strayBound(n int, rate float64) float64 {
	dof := math.Max(trimmedWorth*float64(n)/2, 3)
	return distuv.StudentsT{Mu: 0, Sigma: 1, Nu: dof}.Quantile(1 - rate/2/float64(max(n, 1)))
}
