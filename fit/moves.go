package fit

import "math"

// The jackknife leaves out eight groups in turn, or more where a group would
// be longer than three readings: a wider gap beside a jump moves it by what
// the gap hides, not by what the readings say.
const (
	blocks         = 8
	longestInBlock = 3
)

// moves is the delete-a-block jackknife [jack] of a candidate's place: blocks
// of neighbouring readings on its flanks are left out in turn,
// the spline is fitted again with the same smoothing, and
//
//	moves^2 = (g-1)/g * sum (v_b - v)^2
//
// Each deviation is capped at the width of the jump: uncapped it explodes on
// measured data. The readings of the jump itself stay, since without them
// there is no jump to place.
func (d *derivative) moves(c candidate) float64 {
	flank := d.flank(c)
	g := min(max(blocks, len(flank)/longestInBlock), len(flank))
	if g < 2 {
		return 0
	}
	vlo, _, _ := d.inv.curve.At(c.lo)
	vhi, _, _ := d.inv.curve.At(c.hi)
	width := math.Abs(vhi - vlo)
	var again inverse
	sum := 0.0
	for b := range g {
		from, to := b*len(flank)/g, (b+1)*len(flank)/g
		dev := again.shiftWithout(d.inv, flank[from:to], c)
		dev = math.Min(math.Abs(dev), width)
		sum += dev * dev
	}
	return math.Sqrt(float64(g-1) / float64(g) * sum)
}

// flank lists the merged points within the candidate's reach, between the
// flatter places beside it, that are not between its half-height points or
// next to them.
func (d *derivative) flank(c candidate) []int {
	u := d.inv.u
	var out []int
	for i := range u {
		if u[i] < c.before || u[i] > c.behind {
			continue
		}
		inside := i > 0 && u[i-1] <= c.hi && i+1 < len(u) && u[i+1] >= c.lo
		if !inside {
			out = append(out, i)
		}
	}
	return out
}

// shiftWithout fits s to the points of full but those listed in drop, in
// rising order, and returns how far the candidate's place moved, mL; infinite
// if no place is left.
func (s *inverse) shiftWithout(full *inverse, drop []int, c candidate) float64 {
	s.u, s.v, s.w = s.u[:0], s.v[:0], s.w[:0]
	for i := range full.u {
		if len(drop) > 0 && drop[0] == i {
			drop = drop[1:]
			continue
		}
		s.u, s.v, s.w = append(s.u, full.u[i]), append(s.v, full.v[i]), append(s.w, full.w[i])
	}
	if s.smoother.Load(s.u, s.v, s.w) != nil {
		return math.Inf(1)
	}
	s.smoother.Fit(full.lambda)
	curve := s.smoother.Cubic()
	best, far := math.Inf(1), math.Inf(1)
	for _, t := range curve.Turns() {
		if t.Least && math.Abs(t.X-c.u) < far {
			far = math.Abs(t.X - c.u)
			best, _, _ = curve.At(t.X)
		}
	}
	return best - c.v
}
