package fit

import (
	"math"
	"sort"
)

// Weight says how much a flag speaks against an endpoint.
type Weight int

// The weights, lightest first.
const (
	Note Weight = iota + 1
	Doubtful
	Disputed
)

// Flag is a named reason for doubt with the figure and the limit that it
// compares; words are made from them elsewhere.
type Flag struct {
	Name     string
	Weight   Weight
	Endpoint int // 1-based; 0 for the run
	Figure   float64
	Limit    float64
	Unit     string
	At       []int // readings concerned, indices in the Curve
	About    any   // what a sentence needs beside: Compared, Overshoot, LeftOut ...
}

// Compared is an indicated endpoint beside the nearest refit of like kind.
type Compared struct {
	Indicated Indicated
	Endpoint  int      // 1-based number of the answer it belongs to
	Refit     Estimate // of the indicated one's kind
	Limit     float64  // mL
	Disagrees bool
	Lone      bool // the refit has a nearer indicated endpoint: this one has no counterpart
}

// Overshoot is what the overshoot rule saw.
type Overshoot struct {
	Dose, Median, Times, Rise, Percent float64
	Beside                             bool // the dose lies beside the bracket
}

// judge sets the flags of an evaluation from its endpoints.
func judge(c *Curve, k *cleaned, r *Result, l Limits, endsInJump bool) {
	r.compare(c, k, l)
	for i := range r.Endpoints {
		e := &r.Endpoints[i]
		n := i + 1
		limit := l.agreement(e.V, k.burette)
		k.overshoot(r, e, n, l)
		if e.Kind == Break {
			r.wideInterval(e, n, limit)
		} else {
			k.wideBracket(r, e, n, l)
		}
		if e.Moves > limit/3 {
			r.poorFit(e, n, limit)
		}
	}
	if n := len(r.Passes); n > 0 && r.Estimator == AtReadingName && len(r.Endpoints) > 0 {
		r.flag(Flag{Name: "passes-again", Weight: Disputed, Endpoint: 1, Figure: float64(n + 1), Limit: 1, Unit: "passes", About: r.Passes})
	}
	if c.Signal == Conductivity && c.V0 <= 0 {
		r.flag(Flag{Name: "dilution-unknown", Weight: Doubtful, Unit: "mL"})
	}
	if len(r.Unsure) > 0 {
		r.unsure(len(r.Endpoints) == 0 && c.Expected, l)
	} else if len(r.Endpoints) == 0 {
		r.missing(c, k, endsInJump, l)
	}
}

// unsure tells of a jump or break that stands out but whose place is known
// too badly: lost in silence it would be missed among the others.
func (r *Result) unsure(disputed bool, l Limits) {
	u := r.Unsure[0]
	r.flag(Flag{Name: "no-endpoint", Weight: heavier(disputed), Figure: 100 * student95 * u.U / u.V, Limit: l.HalfWidthMost, Unit: "%", At: u.Bracket[:], About: u})
}

// poorFit flags an endpoint that hangs on a few readings.
func (r *Result) poorFit(e *Endpoint, n int, limit float64) {
	f := Flag{Name: "poor-fit", Weight: Doubtful, Endpoint: n, Figure: e.Moves, Limit: limit / 3, Unit: "mL"}
	if e.Moves > limit {
		f.Weight, f.Limit = Disputed, limit
	}
	r.flag(f)
}

func heavier(disputed bool) Weight {
	if disputed {
		return Disputed
	}
	return Doubtful
}

func (r *Result) flag(f Flag) { r.Flags = append(r.Flags, f) }

// missing says why there is no endpoint.
func (r *Result) missing(c *Curve, k *cleaned, endsInJump bool, l Limits) {
	n := len(k.v)
	name := "no-endpoint"
	if endsInJump && c.EndReading == nil {
		name = "stops-short"
	}
	f := Flag{Name: name, Weight: heavier(c.Expected), Figure: k.v[n-1], Unit: "mL", At: []int{k.at[n-1]}}
	if len(c.Indicated) > 0 {
		f.About = c.Indicated[0]
	}
	if name == "no-endpoint" {
		f.Figure, f.Limit, f.Unit = 0, 1, "endpoints"
	}
	r.flag(f)
}

// compare sets beside each indicated endpoint the nearest refit of like kind
// and flags those that disagree. An inflection disagrees if it lies outside
// the bracket that holds the refit's, one display step allowed, and further
// from it than the limit; other kinds if they differ by more than the limit
// and 3 u of the difference, u^2 + step^2/12. The step is never taken as more
// than the limit: an export that drops trailing zeros writes 51 for 51.000.
// An indicated endpoint beside whose refit another one lies nearer has no
// counterpart and disagrees. One without a refit of its kind is told.
func (r *Result) compare(c *Curve, k *cleaned, l Limits) {
	for _, ind := range c.Indicated {
		p, ok := r.like(ind)
		if !ok {
			r.notCompared(c, ind)
			continue
		}
		p.Lone = nearer(c.Indicated, ind, p.Refit.V)
		d := math.Abs(p.Refit.V - ind.V)
		p.Limit = l.agreement(p.Refit.V, k.burette)
		step := math.Min(ind.StepV, p.Limit)
		if ind.Kind == Inflection {
			low, high := c.V[p.Refit.Bracket[0]]-step, c.V[p.Refit.Bracket[1]]+step
			p.Disagrees = (ind.V < low || ind.V > high) && d > p.Limit
		} else {
			p.Limit = math.Max(p.Limit, 3*math.Sqrt(sq(p.Refit.U)+sq(step)/12))
			p.Disagrees = d > p.Limit
		}
		p.Disagrees = p.Disagrees || p.Lone
		r.Compared = append(r.Compared, p)
		if p.Disagrees {
			r.flag(Flag{Name: "disagrees", Weight: Disputed, Endpoint: p.Endpoint, Figure: d, Limit: p.Limit, Unit: "mL", About: p})
		}
	}
}

// nearer tells whether another indicated endpoint of the kind lies nearer to v.
func nearer(all []Indicated, ind Indicated, v float64) bool {
	for _, o := range all {
		if o.Kind == ind.Kind && math.Abs(o.V-v) < math.Abs(ind.V-v) {
			return true
		}
	}
	return false
}

// notCompared tells of an indicated endpoint of a kind that no estimate of an
// existing endpoint has: a note, or doubtful where the kind cannot be one of
// this signal.
func (r *Result) notCompared(c *Curve, ind Indicated) {
	if len(r.Endpoints) == 0 {
		return // no-endpoint or stops-short tells it
	}
	impossible := (ind.Kind == Break) != (c.Signal == Conductivity)
	r.flag(Flag{Name: "not-compared", Weight: heavierNote(impossible), Figure: ind.V, Unit: "mL", About: ind})
}

// like finds the estimate of the indicated endpoint's kind that lies nearest.
func (r *Result) like(ind Indicated) (p Compared, ok bool) {
	for i, e := range r.Endpoints {
		for _, est := range e.Estimates {
			if est.Kind != ind.Kind || ok && math.Abs(est.V-ind.V) >= math.Abs(p.Refit.V-ind.V) {
				continue
			}
			p, ok = Compared{Indicated: ind, Endpoint: i + 1, Refit: est}, true
		}
	}
	return p, ok
}

// overshoot flags a dose across the fitted endpoint, or right beside its
// bracket, that is large against its neighbours and against the endpoint:
// where a jump begins or ends inside such a dose, the steepest increment left
// is the one beside it.
func (k *cleaned) overshoot(r *Result, e *Endpoint, n int, l Limits) {
	if e.Kind == Break {
		return
	}
	at := k.bracketOf(e.V)
	for _, i := range [3]int{at, at - 1, at + 1} {
		if i < 0 || i+1 >= len(k.v) {
			continue
		}
		o, ok := k.dose(i, e.V)
		if !ok || o.Rise <= l.OvershootDecades || o.Times < l.OvershootTimes || o.Percent < l.OvershootPercent {
			continue
		}
		o.Beside = i != at
		weight := Doubtful
		for _, p := range r.Compared {
			if p.Endpoint == n && math.Abs(p.Refit.V-p.Indicated.V) > p.Limit {
				weight = Disputed
			}
		}
		r.flag(Flag{Name: "overshoot", Weight: weight, Endpoint: n, Figure: o.Percent, Limit: l.OvershootPercent, Unit: "%", At: []int{k.at[i], k.at[i+1]}, About: o})
		return
	}
}

// dose compares increment i with the median of its six neighbours, three on
// either side where there are as many, and with the endpoint at v.
func (k *cleaned) dose(i int, v float64) (o Overshoot, ok bool) {
	var near []float64
	for j := i - 3; j <= i+3; j++ {
		if j != i && j >= 0 && j+1 < len(k.v) {
			near = append(near, k.v[j+1]-k.v[j])
		}
	}
	if len(near) == 0 {
		return o, false
	}
	o.Dose, o.Median, o.Rise = k.v[i+1]-k.v[i], median(near), math.Abs(k.u[i+1]-k.u[i])
	o.Times, o.Percent = o.Dose/o.Median, 100*o.Dose/v
	return o, true
}

// Bracket is what the wide-bracket rule saw.
type Bracket struct {
	Width float64 // mL
	Half  float64 // 95 % half-width to the longer side, mL
	Leap  bool    // no reading tells where in the bracket the endpoint lies
}

// wideBracket flags answers of derivative and at-reading whose bracket is
// wide. Where only their interval exceeds the agreement limit that is told:
// no doubt by itself, but nobody should find out later.
func (k *cleaned) wideBracket(r *Result, e *Endpoint, n int, l Limits) {
	about := Bracket{Width: k.volumeAt(e.Bracket[1]) - k.volumeAt(e.Bracket[0]), Half: math.Max(e.High-e.V, e.V-e.Low), Leap: e.Leap}
	floor := l.AgreementFloorU * k.burette
	percent := 100 * about.Width / e.V
	f := Flag{Name: "wide-bracket", Weight: Doubtful, Endpoint: n, Figure: percent, Limit: l.WideBracketDoubtfulPercent, Unit: "%", At: e.Bracket[:], About: about}
	switch {
	case percent > l.WideBracketDisputedPercent && about.Width > floor:
		f.Weight, f.Limit = Disputed, l.WideBracketDisputedPercent
	case percent > l.WideBracketDoubtfulPercent && about.Width > floor:
	case about.Half > l.agreement(e.V, k.burette):
		f.Name, f.Weight, f.Figure, f.Limit, f.Unit = "wide-interval", Note, about.Half, l.agreement(e.V, k.burette), "mL"
	default:
		return
	}
	r.flag(f)
}

// wideInterval flags a break whose 95 % half-width exceeds the limit.
func (r *Result) wideInterval(e *Endpoint, n int, limit float64) {
	half := math.Max(e.High-e.V, e.V-e.Low)
	if half > limit {
		r.flag(Flag{Name: "wide-interval", Weight: heavier(half > 2*limit), Endpoint: n, Figure: half, Limit: limit, Unit: "mL"})
	}
}

func sortFlags(f []Flag) {
	sort.SliceStable(f, func(i, j int) bool { return f[i].Weight > f[j].Weight })
}
