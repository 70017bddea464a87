package plausible

import (
	"fmt"
	"math"
	"slices"
)

// Curve is one run as the rules see it: N readings in the order of time, each
// with its volume (mL), value (unit of the signal) and line of the dump.
type Curve struct {
	Signal      string // "pH", "potential" or "conductivity"
	N           int
	ReadingStep float64   // smallest step of the readings as displayed
	TimesS      []float64 // s since the start; nil when the dump has none
	VolumeML    func(i int) float64
	Value       func(i int) float64
	Line        func(i int) int
}

// Finding is what a rule says of a curve.
type Finding struct {
	Line             int
	Field, Msg, Hint string
}

// rule is one thing that no titration curve does, or hardly any.
type rule struct {
	name    string
	refuses bool   // else the run is read and the doubt is told
	reason  string // why: printed as what to do when the run is refused
	find    func(c *Curve, s *summary) *Finding
}

// rules is the one table of them; the first that refuses ends the judgement. A
// volume that goes back is none of them: fit knows what to do with one and
// flags it.
var rules = [...]rule{
	{"swapped", true, "check the columns of volume and reading in the schema", swapped},
	{"no curve", true, "a titration has a reading at each of several volumes; this may be a one-point or dead-stop record", fewVolumes},
	{"step", true, "no burette delivers that at once; check unit and decimal mark of the volume", largeStep},
	{"looks like pH", false, "", looksLikePH},
	{"looks like volts", false, "", looksLikeVolts},
	{"looks like microsiemens", false, "", looksLikeMicrosiemens},
	{"looks like microlitres", false, "", looksLikeLitres},
	{"clock", false, "", clockJumps},
}

// Judge holds a curve against every rule. refusal is nil when it can be a
// titration.
func Judge(c *Curve) (doubts []Finding, refusal *Finding) {
	if c.N == 0 {
		return nil, nil
	}
	s := summarise(c)
	for i := range rules {
		r := &rules[i]
		found := r.find(c, &s)
		switch {
		case found == nil:
		case r.refuses:
			found.Hint = r.reason
			return nil, found
		default:
			doubts = append(doubts, *found)
		}
	}
	return doubts, nil
}

// summary is what several rules ask of a curve.
type summary struct {
	volumes          int     // places where the volume differs from the one before, and the first
	lastML           float64 // highest volume
	low, high        float64 // of the readings
	largest          int     // reading after the largest step of the volume
	largestML        float64
	readingsRise     bool // at every reading
	evenSteps, other int  // steps of the readings that equal the one before, and of the volumes
}

func summarise(c *Curve) summary {
	v, x := c.VolumeML(0), c.Value(0)
	s := summary{volumes: 1, lastML: v, low: x, high: x, readingsRise: true}
	lastStep, lastRise := 0.0, 0.0
	for i := 1; i < c.N; i++ {
		v2, x2 := c.VolumeML(i), c.Value(i)
		step, rise := v2-v, x2-x
		if step != 0 {
			s.volumes++
		}
		if step > s.largestML {
			s.largest, s.largestML = i, step
		}
		s.readingsRise = s.readingsRise && rise > 0
		if i > 1 && math.Abs(step-lastStep) < 1e-9 {
			s.other++
		}
		if i > 1 && math.Abs(rise-lastRise) < 1e-9 {
			s.evenSteps++
		}
		s.lastML, s.low, s.high = max(s.lastML, v2), min(s.low, x2), max(s.high, x2)
		v, x, lastStep, lastRise = v2, x2, step, rise
	}
	return s
}

// swapped: a reading that begins at 0 and rises in equal steps is a volume,
// the more so when the volume does neither.
func swapped(c *Curve, s *summary) *Finding {
	if c.Value(0) != 0 || c.VolumeML(0) == 0 || !s.readingsRise || s.evenSteps <= s.other {
		return nil
	}
	return &Finding{Line: c.Line(0), Field: "volume", Msg: fmt.Sprintf("volumes begin at %s mL and readings at 0, which rise in even steps: the columns look swapped", Short(c.VolumeML(0)))}
}

// minVolumes is how many different volumes make a curve: as many as readings.
const minVolumes = 5

func fewVolumes(c *Curve, s *summary) *Finding {
	if s.volumes >= minVolumes {
		return nil
	}
	what := fmt.Sprintf("%d different volumes", s.volumes)
	if s.volumes == 1 {
		what = "one volume"
	}
	return &Finding{Line: c.Line(c.N - 1), Field: "volume", Msg: fmt.Sprintf("%d readings at %s, a curve needs at least %d", c.N, what, minVolumes)}
}

// maxStepML is the largest burette in use. Source: common practice.
const maxStepML = 100

func largeStep(c *Curve, s *summary) *Finding {
	if s.largestML <= maxStepML {
		return nil
	}
	return &Finding{Line: c.Line(s.largest), Field: "volume", Msg: fmt.Sprintf("%s mL in one increment, more than the %d mL of a large burette", Short(s.largestML), maxStepML)}
}

// looksLikePH: no glass electrode stays between 0 and 14 mV while it changes
// by more than 2 mV, but pH does.
func looksLikePH(c *Curve, s *summary) *Finding {
	if c.Signal != "potential" || s.low < 0 || s.high > 14 || s.high-s.low < 2 || c.ReadingStep > 0.01 {
		return nil
	}
	return &Finding{Line: c.Line(0), Msg: fmt.Sprintf("readings from %s to %s mV look like pH; kept as they are", Short(s.low), Short(s.high))}
}

func looksLikeVolts(c *Curve, s *summary) *Finding {
	if c.Signal != "potential" || max(math.Abs(s.low), math.Abs(s.high)) >= 2 || c.ReadingStep > 0.001 {
		return nil
	}
	return &Finding{Line: c.Line(0), Msg: fmt.Sprintf("readings from %s to %s mV look like V; kept as they are", Short(s.low), Short(s.high))}
}

// looksLikeMicrosiemens: above 200 mS/cm throughout is more than titrands
// conduct.
func looksLikeMicrosiemens(c *Curve, s *summary) *Finding {
	if c.Signal != "conductivity" || s.low <= 200 {
		return nil
	}
	return &Finding{Line: c.Line(0), Msg: fmt.Sprintf("readings from %s to %s mS/cm look like uS/cm; kept as they are", Short(s.low), Short(s.high))}
}

func looksLikeLitres(c *Curve, s *summary) *Finding {
	switch {
	case s.lastML > 0 && s.lastML < 0.1:
		return &Finding{Line: c.Line(0), Msg: fmt.Sprintf("%s mL delivered in all looks like L; kept as it is", Short(s.lastML))}
	case s.lastML > 250:
		return &Finding{Line: c.Line(0), Msg: fmt.Sprintf("%s mL delivered in all looks like uL; kept as it is", Short(s.lastML))}
	}
	return nil
}

// jumpS is how long a pause between two readings may be before it looks like a
// clock that was set: nearly an hour, and many times the usual pause.
const jumpS, usualPauses = 3000, 20

func clockJumps(c *Curve, _ *summary) *Finding {
	if len(c.TimesS) < minVolumes {
		return nil
	}
	at := 0
	for i := 1; i < len(c.TimesS); i++ {
		if pause := c.TimesS[i] - c.TimesS[i-1]; pause >= jumpS && (at == 0 || pause > c.TimesS[at]-c.TimesS[at-1]) {
			at = i
		}
	}
	if at == 0 {
		return nil
	}
	pauses := make([]float64, 0, len(c.TimesS)-1)
	for i := 1; i < len(c.TimesS); i++ {
		pauses = append(pauses, c.TimesS[i]-c.TimesS[i-1])
	}
	slices.Sort(pauses)
	pause := c.TimesS[at] - c.TimesS[at-1]
	if pause < usualPauses*pauses[len(pauses)/2] {
		return nil
	}
	return &Finding{Line: c.Line(at), Msg: fmt.Sprintf("time jumps by %s s, a pause or a clock that was set; kept as it is", Short(pause))}
}
