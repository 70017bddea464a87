package fit

import "math"

// arm is a straight stretch of a conductometric curve: readings from..to
// (inclusive) and the line through them.
type arm struct {
	from, to int
	line     Line
}

// Rules for arms. They are chosen on simulated curves (measured 2026).
const (
	maxPieces    = 4    // two breaks, a rounded corner or curved start beside them
	leastInPiece = 3    // readings
	leastInArm   = 4    // readings
	armShare     = 0.12 // of the volume range that an arm spans at least: shorter pieces are corners or a curved start
	leastAngle   = 0.2  // change of slope at a break against the steepest arm
	armBound     = 3    // sd beyond which a reading at an arm's end belongs to the corner
	leastRelSD   = 3e-4 // a conductivity is not straight to better than this: cell, temperature, ion interaction
)

// conduct is a conductometric curve prepared for two-line work.
type conduct struct {
	v, y, w []float64 // mL; mS/cm corrected for dilution; 1/y^2
	relSD   float64   // noise relative to the reading
	prefix  []sums
}

func newConduct(v, y []float64, stepY float64) *conduct {
	c := &conduct{v: v, y: y, w: make([]float64, len(y)), prefix: make([]sums, len(y)+1)}
	top := 0.0
	for _, a := range y {
		top = math.Max(top, a)
	}
	rel := make([]float64, len(y))
	var s sums
	for i, a := range y {
		floor := math.Max(a, 0.02*top) // near zero the amplifier's own noise counts
		c.w[i] = 1 / (floor * floor)
		rel[i] = a / floor
		s.add(v[i]-v[0], a, c.w[i])
		c.prefix[i+1] = s
	}
	c.relSD = relativeNoise(v, y, c.w, stepY)
	return c
}

// relativeNoise is readingNoise of y relative to its level: a corner is one
// reading of many and does not move the median.
func relativeNoise(v, y, w []float64, stepY float64) float64 {
	n := len(v)
	if n < 6 {
		return 0.002
	}
	r := make([]float64, n-2)
	level := make([]float64, n)
	for i := range level {
		level[i] = 1 / math.Sqrt(w[i])
	}
	for i := range r {
		a := (v[i+2] - v[i+1]) / (v[i+2] - v[i])
		r[i] = math.Abs(y[i+1]-a*y[i]-(1-a)*y[i+2]) / math.Sqrt(1+a*a+(1-a)*(1-a)) / level[i+1]
	}
	least := math.Max(leastRelSD, stepY/math.Sqrt(12)/median(level))
	return math.Min(math.Max(trimmedSD(r), least), 0.03)
}

func (c *conduct) sse(from, to int) float64 { return c.prefix[to+1].minus(c.prefix[from]).sse() }

// split is the best division of the readings into stretches, each with a line
// of its own: the first reading of each and the sum of squares.
type split struct {
	starts []int
	sse    float64
}

// finest is the number of places at which a stretch may begin: with more
// readings only every second, third ... is tried, since arms are trimmed
// afterwards reading by reading.
const finest = 120

// splits returns the best division into 1, 2, ... most stretches, by dynamic
// programming on the sum of squares: cost[p][e] is the least one for p+1
// stretches over the readings before edge e.
func (c *conduct) splits(most int) []split {
	edges := c.edges()
	n := len(edges) - 1
	cost, from := make([][]float64, most), make([][]int, most)
	var out []split
	for p := range cost {
		cost[p], from[p] = make([]float64, n+1), make([]int, n+1)
		for e := 1; e <= n; e++ {
			cost[p][e] = math.Inf(1)
			if p == 0 && edges[e] >= leastInPiece {
				cost[0][e] = c.sse(0, edges[e]-1)
			}
			for s := p; p > 0 && edges[s]+leastInPiece <= edges[e]; s++ {
				if t := cost[p-1][s] + c.sse(edges[s], edges[e]-1); t < cost[p][e] {
					cost[p][e], from[p][e] = t, s
				}
			}
		}
		starts := make([]int, p+1)
		for q, e := p, n; q > 0; q-- {
			e = from[q][e]
			starts[q] = edges[e]
		}
		out = append(out, split{starts, cost[p][n]})
	}
	return out
}

// edges are the readings at which a stretch may begin, and the number of
// readings.
func (c *conduct) edges() []int {
	stride := (len(c.v) + finest - 1) / finest
	var out []int
	for i := 0; i < len(c.v); i += stride {
		out = append(out, i)
	}
	return append(out, len(c.v))
}

// bic is n ln(sse/n) + parameters ln n; the sum of squares is never taken
// below what the noise floor leaves, so that rounding in noise-free data does
// not invent pieces.
func (c *conduct) bic(sse float64, pieces int) float64 {
	n := float64(len(c.v))
	return n*math.Log(math.Max(sse/n, sq(leastRelSD)/4)) + float64(3*pieces-1)*math.Log(n)
}

// arms chooses the number of stretches by BIC, drops those too short to be an
// arm (corners, the curved start of a weak acid), and trims the others to
// their straight part. gain is by how much BIC prefers this to one line.
func (c *conduct) arms() (arms []arm, gain float64) {
	var best []int
	low, one := math.Inf(1), 0.0
	for p, s := range c.splits(min(maxPieces, len(c.v)/leastInPiece)) {
		b := c.bic(s.sse, p+1)
		if p == 0 {
			one = b
		}
		if b < low-2 { // less is no reason for one more piece
			low, best = b, s.starts
		}
	}
	span := c.v[len(c.v)-1] - c.v[0]
	for i, s := range best {
		e := len(c.v) - 1
		if i+1 < len(best) {
			e = best[i+1] - 1
		}
		if e-s+1 < leastInArm || c.v[e]-c.v[s] < armShare*span {
			continue
		}
		arms = append(arms, c.trim(s, e))
	}
	arms = c.join(arms)
	for i := range arms {
		c.shorten(&arms[i], i == 0, i+1 == len(arms))
	}
	return arms, one - low
}

// shorten drops readings from the far end of an arm that bends (from both
// ends of a middle arm), until what is left is straight or no longer than an
// arm must be: the line near the corner is the one that counts.
func (c *conduct) shorten(a *arm, first, last bool) {
	span := c.v[len(c.v)-1] - c.v[0]
	for c.bends(*a) {
		b := *a
		if first || !last {
			b.from++
		}
		if last || !first {
			b.to--
		}
		if b.to-b.from+1 < leastInArm+1 || c.v[b.to]-c.v[b.from] < armShare*span {
			return
		}
		b.line = c.line(b.from, b.to)
		*a = b
	}
}

// bends tells whether an arm's curvature differs from zero by more than the
// bound: the slope of its residuals against (v - middle)^2.
func (c *conduct) bends(a arm) bool {
	l, mid := a.line, (c.v[a.from]+c.v[a.to])/2
	x, r, w := make([]float64, 0, l.N), make([]float64, 0, l.N), c.w[a.from:a.to+1]
	for i := a.from; i <= a.to; i++ {
		x = append(x, sq(c.v[i]-mid))
		r = append(r, c.y[i]-l.At(c.v[i]))
	}
	q := fitLine(x, r, w)
	sd := math.Max(c.relSD, math.Sqrt(q.SSE/float64(max(l.N-3, 1))))
	return math.Abs(q.B) > armBound*sd*math.Sqrt(q.VarB)
}

// trim grows an arm from the inner part of its stretch outwards as long as
// readings follow the line: two in a row beyond the bound end it.
func (c *conduct) trim(from, to int) arm {
	n := to - from + 1
	cut := min(n/5, (n-leastInArm)/2)
	a := arm{from: from + cut, to: to - cut}
	a.line = c.line(a.from, a.to)
	for grown := true; grown; {
		grown = false
		if a.to < to && c.follows(a, a.to+1) {
			a.to++
			grown = true
		}
		if a.from > from && c.follows(a, a.from-1) {
			a.from--
			grown = true
		}
		if grown {
			a.line = c.line(a.from, a.to)
		}
	}
	return a
}

func (c *conduct) line(from, to int) Line {
	return fitLine(c.v[from:to+1], c.y[from:to+1], c.w[from:to+1])
}

// follows tells whether reading i lies on the arm's line within the bound on
// its prediction error.
func (c *conduct) follows(a arm, i int) bool {
	l := a.line
	sd := math.Max(c.relSD, math.Sqrt(l.SSE/float64(max(l.N-2, 1))))
	lever := l.VarA + 2*c.v[i]*l.Cov + c.v[i]*c.v[i]*l.VarB
	return math.Abs(c.y[i]-l.At(c.v[i])) <= armBound*sd*math.Sqrt(1/c.w[i]+lever)
}

// join makes one arm of neighbours whose slopes hardly differ: a long arm that
// bends a little is no break.
func (c *conduct) join(arms []arm) []arm {
	steepest := 0.0
	for _, a := range arms {
		steepest = math.Max(steepest, math.Abs(a.line.B))
	}
	var out []arm
	for _, a := range arms {
		if n := len(out); n > 0 && math.Abs(a.line.B-out[n-1].line.B) < leastAngle*steepest {
			out[n-1].to = a.to
			out[n-1].line = c.line(out[n-1].from, a.to)
			continue
		}
		out = append(out, a)
	}
	return out
}
