package fit

import (
	"math"
	"sort"

	"lastdrop/fit/spline"
)

// inverse is the curve read the other way round, V against u. Where the
// reading leaps, V hardly moves, so this curve is smooth exactly where the
// other one is a step, and its smoothing follows the noise of both axes.
type inverse struct {
	smoother spline.Smoother
	u, v, w  []float64 // merged points, weights 1/sd_V^2
	least    float64   // dV/du below which a place counts as upright, mL per decade
	lambda   float64
	curve    spline.Cubic
}

// weights returns 1/sd_V^2 of each reading,
//
//	sd_V^2 = u_burette^2 + (noise * dV/du)^2
//
// with dV/du from the geometric mean of the secants on either side: the
// flatter one alone would make readings in a jump look exact.
func (k *cleaned) weights() []float64 {
	n := len(k.v)
	w := make([]float64, n)
	prev := 0.0
	for i := range w {
		next := prev
		if i+1 < n {
			next = math.Max((k.u[i+1]-k.u[i])/(k.v[i+1]-k.v[i]), 1e-6)
		}
		if i == 0 {
			prev = next
		}
		slope := math.Sqrt(prev * next)
		w[i] = 1 / (k.uv*k.uv + k.noise*k.noise/(slope*slope))
		prev = next
	}
	return w
}

// newInverse fits V against u so that weighted chi2 equals the number of
// readings, then again with the weights that its own slope gives: secants of
// neighbouring readings are noisy where readings crowd, and a weight that
// follows the noise pulls the curve. Equal readings become one point with
// their weights together.
func newInverse(k *cleaned) (*inverse, error) {
	s := &inverse{least: k.steepestSecant()}
	w := k.weights()
	for pass := range reweighted + 1 {
		if pass > 0 {
			s.reweight(k, w)
		}
		s.u, s.v, s.w = s.u[:0], s.v[:0], s.w[:0]
		s.merge(k.u, k.v, w)
		if err := s.smoother.Load(s.u, s.v, s.w); err != nil {
			return nil, err
		}
		s.lambda = s.smoother.FitChi2(float64(len(s.u)))
		s.smoother.Fit(s.lambda)
		s.curve = s.smoother.Cubic()
	}
	return s, nil
}

// reweight sets w to 1/sd_V^2 with dV/du from the curve fitted last.
func (s *inverse) reweight(k *cleaned, w []float64) {
	for i := range w {
		_, slope, _ := s.curve.At(k.u[i])
		w[i] = 1 / (k.uv*k.uv + sq(k.noise*math.Max(slope, s.least)))
	}
}

const reweighted = 1

// merge sorts by u and joins readings closer than a part in 10^9 of the
// range.
func (s *inverse) merge(u, v, w []float64) {
	idx := make([]int, len(u))
	for i := range idx {
		idx[i] = i
	}
	sort.SliceStable(idx, func(a, b int) bool { return u[idx[a]] < u[idx[b]] })
	tie := 1e-9 * (u[idx[len(idx)-1]] - u[idx[0]])
	for _, i := range idx {
		n := len(s.u)
		if n == 0 || u[i]-s.u[n-1] > tie {
			s.u, s.v, s.w = append(s.u, u[i]), append(s.v, v[i]), append(s.w, w[i])
			continue
		}
		sum := s.w[n-1] + w[i]
		s.v[n-1] = (s.v[n-1]*s.w[n-1] + v[i]*w[i]) / sum
		s.w[n-1] = sum
	}
}

// candidate is a steep place of the curve: an interior maximum of dy/dV.
type candidate struct {
	u, v     float64 // where, decades and mL
	slope    float64 // dV/du there, mL per decade; may be 0 or less in a leap
	lo, hi   float64 // u between which dy/dV is at least half as high
	before   float64 // u of the flatter place (or end of data) on either side
	behind   float64
	contrast float64 // the smaller of both sides
}

// extreme is a turn of the inverse slope, or an end of the data.
type extreme struct {
	u, height float64 // height = dy/dV, decades per mL
	peak      bool
}

// candidates returns the interior maxima of dy/dV = 1/(dV/du) that stand out
// from both flatter places beside them.
func (s *inverse) candidates(l Limits) []candidate {
	ext := prominent(s.extremes(), l)
	var out []candidate
	for i := 1; i+1 < len(ext); i++ {
		if !ext[i].peak {
			continue
		}
		v, slope, _ := s.curve.At(ext[i].u)
		c := candidate{u: ext[i].u, v: v, slope: slope, before: ext[i-1].u, behind: ext[i+1].u}
		c.contrast = ext[i].height / math.Max(ext[i-1].height, ext[i+1].height)
		c.lo, c.hi = s.halfHeight(c, ext[i].height/2)
		out = append(out, c)
	}
	return out
}

// steepestSecant returns half the least dV/du of a single increment. Where
// the curve leaps the spline may stand upright or lean over; the readings
// cannot tell a steeper place than their own steepest increment, or hardly.
func (k *cleaned) steepestSecant() float64 {
	least := math.Inf(1)
	for i := 0; i+1 < len(k.v); i++ {
		if d := k.u[i+1] - k.u[i]; d > 0 {
			least = math.Min(least, (k.v[i+1]-k.v[i])/d)
		}
	}
	return least / 2
}

func (s *inverse) extremes() []extreme {
	first, last := s.curve.Knots()
	height := func(slope float64) float64 { return 1 / math.Max(slope, s.least) }
	at := func(u float64) float64 { _, m, _ := s.curve.At(u); return height(m) }
	ext := []extreme{{u: first, height: at(first)}}
	for _, t := range s.curve.Turns() {
		ext = append(ext, extreme{u: t.X, height: height(t.Slope), peak: t.Least})
	}
	return append(ext, extreme{u: last, height: at(last)})
}

// prominent removes pairs of a peak and the flatter place beside it that are
// no two places, the least different first: those that differ by less than
// the contrast, and those inside the data that lie closer than the rise that
// an endpoint needs on a side, which are one jump split by noise. The two
// ends of the data stay; a peak at an end is no interior maximum and no
// flatter place either.
func prominent(ext []extreme, l Limits) []extreme {
	ext = alternate(ext)
	for len(ext) > 2 {
		weakest, ratio := -1, math.Inf(1)
		for i := 0; i+1 < len(ext); i++ {
			inside := i > 0 && i+2 < len(ext)
			r := ext[i].height / ext[i+1].height
			r = math.Max(r, 1/r)
			same := r < l.Contrast || inside && ext[i+1].u-ext[i].u < l.SideDecades
			if same && r < ratio {
				weakest, ratio = i, r
			}
		}
		if weakest < 0 {
			break
		}
		switch {
		case weakest == 0: // the end takes the place of its neighbour
			ext = append(ext[:1], ext[2:]...)
			ext[0].peak = !ext[1].peak
		case weakest == len(ext)-2:
			ext = append(ext[:weakest], ext[weakest+1])
			ext[weakest].peak = !ext[weakest-1].peak
		default:
			ext = append(ext[:weakest], ext[weakest+2:]...)
		}
		ext = alternate(ext)
	}
	return ext
}

// alternate marks the ends by their neighbours and joins neighbours of one
// sort, keeping the more extreme one.
func alternate(ext []extreme) []extreme {
	n := len(ext)
	if n > 1 {
		ext[0].peak = ext[0].height > ext[1].height
		ext[n-1].peak = ext[n-1].height > ext[n-2].height
	}
	out := ext[:1]
	for _, e := range ext[1:] {
		last := &out[len(out)-1]
		if e.peak != last.peak {
			out = append(out, e)
		} else if e.peak == (e.height > last.height) {
			*last = e
		}
	}
	return out
}

// halfHeight returns the u on either side of a candidate at which dy/dV has
// fallen to half, looking no further than the flatter places.
func (s *inverse) halfHeight(c candidate, half float64) (lo, hi float64) {
	limit := 1 / half
	edge := func(end float64) float64 {
		inside, outside := c.u, end
		if _, m, _ := s.curve.At(end); m <= limit {
			return end
		}
		for range 40 { // wiggles below the contrast may lie between: any crossing serves
			mid := (inside + outside) / 2
			if _, m, _ := s.curve.At(mid); m <= limit {
				inside = mid
			} else {
				outside = mid
			}
		}
		return (inside + outside) / 2
	}
	return edge(c.before), edge(c.behind)
}

// uncertainty returns the standard uncertainty (mL) of a candidate's place
// from the noise of the readings: the place is where V” = 0, so
//
//	dV = dS(u) - S'(u) * dS''(u)/S'''(u)
//
// which is linear in the readings; first-order propagation, [gum] 5.1.2
// (clause from memory).
func (s *inverse) uncertainty(c candidate) float64 {
	g, m, second := s.curve.Functionals(c.u)
	third := s.curve.Third(c.u)
	if third <= 0 {
		return math.Inf(1)
	}
	for i := range m {
		m[i] -= c.slope / third * second[i]
	}
	grad := s.smoother.Influence(s.lambda, g, m)
	sum := 0.0
	for i, d := range grad {
		sum += d * d / s.w[i]
	}
	return math.Sqrt(sum)
}
