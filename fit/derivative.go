package fit

import (
	"math"
	"sort"
)

// Derivative is the name of the estimator of this file.
const Derivative = "derivative"

// derivative finds the inflections of a potentiometric curve: the interior
// maxima of dy/dV, which are the zeros of its second derivative. They are
// found on the inverse smoothing spline, where the condition reads
// d2V/du2 = 0 and is a straight line on each piece.
//
// Where single increments hold a good part of the rise, the readings decide
// themselves: the steepest increment, and in it the zero of the second
// derivative by divided differences. There
//
//	u = h/sqrt(12)
//
// for an increment h, since nothing but the increment is known of a leap
// (measured: the error of every interpolant has an sd of 0.25 to 0.29 h). The
// 95 % interval is 1.96 u, or where the increment holds most of the rise the
// increment itself and V +- 0.475 h together. (The latter alone would do if
// the truth lay anywhere in the increment with equal chance; a burette that
// aims at a change of reading crosses the endpoint late in its dose, and then
// it held 87 % of 270 strong acids. The increment alone misses by a hair
// where the endpoint falls on a reading.)
// Where the rise spreads over many increments, the spline decides and
//
//	u^2 = u_noise^2 + moves^2 + (share * h)^2/3
//
// with the noise carried through the spline, the movement when blocks of
// readings are left out, and the share of the rise that the bracket holds.
type derivative struct {
	k    *cleaned
	inv  *inverse
	l    Limits
	cand []candidate
}

func newDerivative(k *cleaned, l Limits) (*derivative, error) {
	inv, err := newInverse(k)
	if err != nil {
		return nil, err
	}
	return &derivative{k: k, inv: inv, l: l, cand: inv.candidates(l)}, nil
}

// estimates returns the accepted endpoints in rising volume, and jumps that
// stand out but are known too badly to be called endpoints.
func (d *derivative) estimates() (out, unsure []Estimate) {
	var kept []candidate
	for _, c := range d.cand {
		if !d.stands(c) {
			continue
		}
		e := d.estimate(c)
		if d.outside(e) {
			continue
		}
		if n := len(out); n > 0 && !d.apart(out[n-1], e) {
			if c.contrast > kept[n-1].contrast {
				out[n-1], kept[n-1] = e, c
			}
			continue
		}
		out, kept = append(out, e), append(kept, c)
	}
	accepted := out[:0]
	for i := range out {
		e := out[i]
		d.finish(&e, kept[i])
		if d.tooWide(e) {
			unsure = append(unsure, e)
			continue
		}
		accepted = append(accepted, e)
	}
	sort.SliceStable(accepted, func(i, j int) bool { return accepted[i].V < accepted[j].V })
	return accepted, unsure
}

// stands tells whether a candidate rises enough to be a jump: between its
// half-height points and from the flatter place, or the end of data, on
// either side.
func (d *derivative) stands(c candidate) bool {
	return c.hi-c.lo >= d.l.RiseDecades && c.u-c.before >= d.l.SideDecades && c.behind-c.u >= d.l.SideDecades
}

// Shares of the rise between the half-height points that one increment holds,
// and how well its slope must be known where it holds a part only.
const (
	mostOfTheRise  = 0.5
	partOfTheRise  = 0.25
	slopeKnownTo   = 0.1
	leastSlopeRise = 1e-9 // decades; no division by an increment without rise
)

// readingsDecide tells whether increment i is seen to be the steepest by
// itself: it holds most of the rise, or a part of it and noise and burette
// leave its slope certain to a tenth.
func (d *derivative) readingsDecide(i int, c candidate) bool {
	k, share := d.k, d.share(i, c)
	rise, h := math.Max(k.u[i+1]-k.u[i], leastSlopeRise), k.v[i+1]-k.v[i]
	unsure := math.Sqrt2 * math.Hypot(k.noise/rise, k.uv/h)
	return share >= mostOfTheRise || share >= partOfTheRise && unsure < slopeKnownTo
}

// estimate places a candidate in its bracket.
func (d *derivative) estimate(c candidate) Estimate {
	i := d.steepest(c)
	if !d.readingsDecide(i, c) {
		e, ok := d.estimateGentle(c)
		if ok && !d.tooWide(e) {
			return e
		}
		if j := d.largest(c); d.share(j, c) >= partOfTheRise {
			i = j
		} else if ok {
			return e
		}
	}
	k := d.k
	h := k.v[i+1] - k.v[i]
	v := k.secondDerivativeZero(i)
	return Estimate{
		Estimator: Derivative, Kind: Inflection, V: v, U: h / math.Sqrt(12), Contrast: c.contrast, ByReadings: true,
		Reading: k.reading(k.u[i] + (v-k.v[i])/h*(k.u[i+1]-k.u[i])),
		Bracket: [2]int{k.at[i], k.at[i+1]}, Rise: k.u[i+1] - k.u[i], Leap: d.share(i, c) >= mostOfTheRise,
	}
}

// estimateGentle places a candidate whose rise spreads over many increments.
// ok is false where the curve leans over between readings, so that the place
// in V and the place in u do not lie in one increment.
func (d *derivative) estimateGentle(c candidate) (e Estimate, ok bool) {
	g, found := d.inv.place(c)
	if !found {
		g = gentle{u: c.u, v: c.v, noise: d.inv.uncertainty(c)}
	}
	k := d.k
	i := k.bracketOf(g.v)
	if slack := 3 * k.noise; g.u < k.u[i]-slack || g.u > k.u[i+1]+slack {
		return e, false
	}
	return Estimate{
		Estimator: Derivative, Kind: Inflection, V: g.v, Contrast: c.contrast, Reading: k.reading(min(max(g.u, k.u[i]), k.u[i+1])),
		U:       math.Hypot(g.noise, math.Max(d.share(i, c), 0)*(k.v[i+1]-k.v[i])/math.Sqrt(3)),
		Bracket: [2]int{k.at[i], k.at[i+1]}, Rise: k.u[i+1] - k.u[i],
	}, true
}

func (d *derivative) share(i int, c candidate) float64 {
	return (d.k.u[i+1] - d.k.u[i]) / (c.hi - c.lo)
}

// steepest returns the steepest of the increments that reach between the
// half-height points.
func (d *derivative) steepest(c candidate) int {
	return d.best(c, func(i int) float64 { return (d.k.u[i+1] - d.k.u[i]) / (d.k.v[i+1] - d.k.v[i]) })
}

func (d *derivative) best(c candidate, score func(i int) float64) int {
	k, best, most := d.k, d.k.bracketOf(c.v), math.Inf(-1)
	for i := 0; i+1 < len(k.u); i++ {
		if k.u[i+1] < c.lo || k.u[i] > c.hi {
			continue
		}
		if s := score(i); s > most {
			best, most = i, s
		}
	}
	return best
}

// secondDerivativeZero returns where the second derivative by divided
// differences passes zero inside the steepest increment i: first differences
// stand at the mid-points of the increments, second differences at the
// reading between two, and the zero is interpolated between the readings at
// either end (common practice, no source: the way of pharmacopoeias and
// standards). At an end of the data, or if the second differences do not
// change sign, it is the middle.
func (k *cleaned) secondDerivativeZero(i int) float64 {
	v, u := k.v, k.u
	middle := (v[i] + v[i+1]) / 2
	if i < 1 || i+2 >= len(v) {
		return middle
	}
	secant := func(j int) float64 { return (u[j+1] - u[j]) / (v[j+1] - v[j]) }
	a := (secant(i) - secant(i-1)) / ((v[i+1] - v[i-1]) / 2)
	b := (secant(i+1) - secant(i)) / ((v[i+2] - v[i]) / 2)
	if !(a > 0 && b < 0) {
		return middle
	}
	return v[i] + (v[i+1]-v[i])*a/(a-b)
}

// outside tells whether an estimate lies at an end of the data or too near the
// last reading.
func (d *derivative) outside(e Estimate) bool {
	k := d.k
	n := len(k.v)
	return e.Bracket[0] == k.at[0] || e.V <= 0 || k.v[n-1] < e.V*(1+d.l.PastPercent/100)
}

// tooWide tells whether an estimate from many readings is known too badly to
// be called an endpoint. A wide bracket has a flag of its own.
func (d *derivative) tooWide(e Estimate) bool {
	return !e.ByReadings && student95*e.U > d.l.HalfWidthMost/100*e.V
}

// largest returns the increment with the largest rise among those that reach
// between the half-height points: a stray dose across a gentle jump is not
// the steepest increment, but it hides the place.
func (d *derivative) largest(c candidate) int {
	return d.best(c, func(i int) float64 { return d.k.u[i+1] - d.k.u[i] })
}

// apart tells whether two neighbouring endpoints are two: at least three
// increments lie between their brackets and two of these in a row are flatter
// than both brackets by the contrast. Hand-typed volumes and electrode lag
// split one jump in two; the readings themselves must show the gap.
func (d *derivative) apart(a, b Estimate) bool {
	k := d.k
	ia, ib := k.bracketOf(a.V), k.bracketOf(b.V)
	if ib-ia < 4 {
		return false
	}
	secant := func(i, j int) float64 { return (k.u[j] - k.u[i]) / (k.v[j] - k.v[i]) }
	steep := math.Min(secant(ia, ia+1), secant(ib, ib+1))
	flat := math.Inf(1)
	for i := ia + 1; i+2 <= ib; i++ {
		flat = math.Min(flat, secant(i, i+2))
	}
	return flat*d.l.Contrast <= steep
}

// finish adds what leaving out blocks of readings does and the interval. An
// endpoint that single readings decide does not hang on its flanks.
func (d *derivative) finish(e *Estimate, c candidate) {
	if !e.ByReadings {
		e.Moves = d.moves(c)
		e.U = math.Hypot(e.U, e.Moves)
	}
	half := student95 * e.U
	e.Low, e.High = e.V-half, e.V+half
	if e.Leap {
		low, high := d.k.volumeAt(e.Bracket[0]), d.k.volumeAt(e.Bracket[1])
		half = uniform95 * (high - low)
		e.Low, e.High = math.Min(low, e.V-half), math.Max(high, e.V+half)
	}
}

// volumeAt returns the volume of the reading with index at in the Curve.
func (k *cleaned) volumeAt(at int) float64 {
	for i, a := range k.at {
		if a == at {
			return k.v[i]
		}
	}
	return math.NaN()
}

// endsInJump tells whether the curve is still getting steeper where the
// readings end: the last stretch stands out from the flatter place before it
// like a jump, but nothing flat follows.
func (d *derivative) endsInJump() bool {
	ext := prominent(d.inv.extremes(), d.l)
	n := len(ext)
	if n < 2 {
		return false
	}
	if ext[n-1].peak && ext[n-1].height > d.l.Contrast*ext[n-2].height && ext[n-1].u-ext[n-2].u >= d.l.RiseDecades {
		return true
	}
	for _, c := range d.cand { // a peak with too little behind it
		if c.hi-c.lo >= d.l.RiseDecades && c.u-c.before >= d.l.SideDecades {
			e := d.estimate(c)
			tooNear := c.behind-c.u < d.l.SideDecades || d.k.v[len(d.k.v)-1] < e.V*(1+d.l.PastPercent/100)
			if tooNear && e.Bracket[0] != d.k.at[0] {
				return true
			}
		}
	}
	return false
}
