package fit

import (
	"math"
	"sort"

	"gonum.org/v1/gonum/stat/distuv"
)

// Why a reading is not used.
const (
	LeftRepeat   = "repeat"          // an earlier reading at the same volume; the last one had come to rest
	LeftReversal = "volume-reversal" // its volume lies below one that was already delivered
	LeftStray    = "stray-reading"   // it stands off the curve of its neighbours
	LeftStuck    = "stuck"           // the display stood still
)

// LeftOut is a reading that is not used.
type LeftOut struct {
	At     int     // index in the Curve
	Why    string  // one of the Left… names
	Figure float64 // distance from the neighbours' curve, or how far it moved while the reading stood, in the reading's unit; reversal: mL back
	Limit  float64 // what was allowed, in the unit of Figure
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
	uv       float64 // burette u, mL
	leftOut  []LeftOut
}

// order keeps the order of time: volumes that go back are left out, and of
// several readings at one volume the last one stays, since an average would
// mix in readings that had not come to rest.
func order(c *Curve, l Limits) cleaned {
	k := cleaned{sign: 1, decade: c.Decade()}
	top := math.Inf(-1)
	for i, v := range c.V {
		switch n := len(k.v); {
		case v > top:
			k.at, k.v, k.u = append(k.at, i), append(k.v, v), append(k.u, c.Y[i])
			top = v
		case v == top && k.at[n-1] == i-1:
			k.leftOut = append(k.leftOut, LeftOut{At: k.at[n-1], Why: LeftRepeat})
			k.at[n-1], k.u[n-1] = i, c.Y[i]
		default:
			k.leftOut = append(k.leftOut, LeftOut{At: i, Why: LeftReversal, Figure: top - v})
		}
	}
	if c.Signal != Conductivity {
		k.orient()
	}
	k.uv = buretteU(k.v, c.StepV, l)
	return k
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

// buretteU is the standard uncertainty of a delivered volume: the burette's,
// or a tenth of the median increment where that is less (microlitre
// titrations exist), and the rounding of the display, step/sqrt(12) [gum
// F.2.2.1, clause from memory]. Volumes typed by hand to 0.1 mL are known no
// better.
func buretteU(v []float64, step float64, l Limits) float64 {
	if len(v) < 2 {
		return l.BuretteUML
	}
	d := make([]float64, len(v)-1)
	for i := range d {
		d[i] = v[i+1] - v[i]
	}
	inc := median(d)
	return math.Hypot(min(l.BuretteUML, inc/10), min(step/math.Sqrt(12), inc/4))
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
