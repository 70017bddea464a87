package report

import "math"

// Pair is one line of a table of endpoints: a refitted endpoint and the
// indicated one that stands beside it. Either may be nil, not both; the two
// may be of unlike kinds.
type Pair struct {
	Refit     *Endpoint
	Indicated *Indicated
}

// Pairs sets every indicated endpoint beside a refitted one: the one that it
// was compared with, else the nearest without one. None is left out: what
// finds no refit stands alone, behind the others.
func (e *Evaluation) Pairs() []Pair {
	pairs := make([]Pair, len(e.Endpoints))
	for i := range e.Endpoints {
		pairs[i].Refit = &e.Endpoints[i]
	}
	left := e.pairCompared(pairs)
	for len(left) > 0 {
		p, i := nearest(pairs, left)
		if p < 0 {
			break
		}
		pairs[p].Indicated = left[i]
		left = append(left[:i:i], left[i+1:]...)
	}
	for _, in := range left {
		pairs = append(pairs, Pair{Indicated: in})
	}
	return pairs
}

// pairCompared pairs those that a difference names and returns the others.
func (e *Evaluation) pairCompared(pairs []Pair) (left []*Indicated) {
	for i := range e.Indicated {
		in, p := &e.Indicated[i], 0
		for ; p < len(pairs); p++ {
			d := pairs[p].Refit.Differs
			if pairs[p].Indicated == nil && d != nil && d.Kind == in.Kind && d.IndicatedML == in.VolumeML {
				pairs[p].Indicated = in
				break
			}
		}
		if p == len(pairs) {
			left = append(left, in)
		}
	}
	return left
}

// nearest returns the closest pair without an indicated endpoint and one of
// left; -1 when every pair has one. The first of equals wins.
func nearest(pairs []Pair, left []*Indicated) (pair, indicated int) {
	pair, best := -1, math.Inf(1)
	for p := range pairs {
		for i, in := range left {
			d := math.Abs(pairs[p].Refit.VolumeML - in.VolumeML)
			if pairs[p].Indicated == nil && d < best {
				pair, indicated, best = p, i, d
			}
		}
	}
	return pair, indicated
}
