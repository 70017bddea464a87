package refit

import (
	"fmt"
	"math"
	"strings"

	"lastdrop/fit"
	"lastdrop/ingest"
	"lastdrop/report"
)

// sentences puts the flags of one run into words: figure and limit in each,
// places named by their line in the dump.
type sentences struct {
	run    *ingest.Run
	curve  *fit.Curve
	result *fit.Result
}

func (s *sentences) flag(f fit.Flag) report.Flag {
	r := report.Flag{Flag: f.Name, Weight: weights[f.Weight], Endpoint: f.Endpoint, Figure: f.Figure, Limit: f.Limit, Unit: f.Unit}
	for _, i := range f.At {
		r.Lines = append(r.Lines, s.line(i))
	}
	r.Says = s.says(f)
	return r
}

func (s *sentences) line(i int) int { return s.run.Readings[i].Line }

func (s *sentences) says(f fit.Flag) string {
	switch f.Name {
	case "disagrees":
		return s.disagrees(f)
	case "overshoot":
		return s.overshoot(f)
	case "wide-bracket":
		b := f.About.(fit.Bracket)
		t := fmt.Sprintf("The bracket is %s mL, %s %% of the endpoint volume (limit %s %%).", volume(b.Width), report.Short(f.Figure, 2), report.Short(f.Limit, 2))
		if b.Leap {
			t += " No reading tells where in it the endpoint lies."
		}
		return t
	case "not-compared":
		return s.notCompared(f)
	case "passes-again":
		return s.passesAgain(f)
	case "noisy":
		return fmt.Sprintf("The readings scatter by %s (standard deviation; limit %s) and run backwards.", s.amountOf(f.Figure), s.amountOf(f.Limit))
	case "wide-interval":
		return s.wideInterval(f)
	case "poor-fit":
		return fmt.Sprintf("The endpoint moves by %s mL when blocks of readings are left out (limit %s mL).", volume(f.Figure), volume(f.Limit))
	case "no-endpoint":
		return s.noEndpoint(f)
	case "stops-short":
		return fmt.Sprintf("The readings that can be used end at %s mL, line %d, while the curve was still getting steeper; an endpoint needs some at least %s %% beyond it.%s",
			volume(f.Figure), s.line(f.At[0]), report.Short(fit.Defaults().PastPercent, 2), indicatedToo(f))
	case "dilution-unknown":
		return "The dump states no aliquot, so the conductivities could not be corrected for dilution by the titrant; the break is then found too early."
	case fit.LeftStray, fit.LeftStuck, fit.LeftReversal:
		return s.leftOut(f)
	}
	return f.Name
}

// volume prints a volume or difference in mL that has no uncertainty of its
// own: three decimals, four for what would be 0.00x.
func volume(v float64) string {
	if a := math.Abs(v); a > 0 && a < 0.01 {
		return report.Fixed(v, 4)
	}
	return report.Fixed(v, 3)
}

// reading prints a reading or a difference of readings with the decimals that
// the display had.
func (s *sentences) reading(y float64) string {
	fallback := map[ingest.Signal]int{ingest.PH: 2, ingest.Potential: 1, ingest.Conductivity: 3}[s.run.Signal]
	return report.Fixed(y, report.StepDecimals(s.run.ReadingStep, fallback))
}

// amount is a reading with its unit; pH stands before its number.
func (s *sentences) amount(y float64) string {
	if s.run.Signal == ingest.PH {
		return "pH " + s.reading(y)
	}
	return s.reading(y) + " " + s.run.Signal.Unit()
}

// change is a difference of readings with its unit.
func (s *sentences) change(y float64) string { return s.reading(y) + " " + s.run.Signal.Unit() }

// rise is a change of the reading after its name: "the pH changed by 4.13".
func (s *sentences) rise(y float64) string {
	if s.run.Signal == ingest.PH {
		return s.reading(y)
	}
	return s.change(y)
}

func (s *sentences) signal() string {
	if s.run.Signal == ingest.PH {
		return "pH"
	}
	return string(s.run.Signal)
}

func indicated(i fit.Indicated) string {
	r := report.Indicated{VolumeML: i.V, StepML: i.StepV}
	return r.Volume()
}

// disagrees prints its figures in the one form that all reports give them.
func (s *sentences) disagrees(f fit.Flag) string {
	p := f.About.(fit.Compared)
	if p.Lone {
		return fmt.Sprintf("The instrument indicated %s mL too (%s); the refit finds no endpoint of its own there. The nearest is %s mL away, %s mL allowed.", indicated(p.Indicated), p.Indicated.Kind, volume(f.Figure), volume(f.Limit))
	}
	e := report.Endpoint{VolumeML: p.Refit.V, UML: p.Refit.U, Differs: difference(p)}
	t := fmt.Sprintf("Refit %s mL, indicated %s mL (%s): refit − indicated %s mL, %s mL allowed.", e.Volume(), indicated(p.Indicated), p.Indicated.Kind, e.Difference(), e.DifferenceLimit())
	if p.Indicated.Kind == fit.Inflection {
		b := p.Refit.Bracket
		t += fmt.Sprintf(" The indicated one lies outside the bracket of the steepest place, %s to %s mL.", volume(s.curve.V[b[0]]), volume(s.curve.V[b[1]]))
	}
	return t
}

func (s *sentences) overshoot(f fit.Flag) string {
	o := f.About.(fit.Overshoot)
	beside := ""
	if o.Beside {
		beside = ", beside the bracket of the endpoint,"
	}
	return fmt.Sprintf("The dose after line %d%s was %s mL, %s %% of the endpoint volume (limit %s %%) and %s times its neighbours (limit %s); the %s changed by %s inside it.",
		s.line(f.At[0]), beside, volume(o.Dose), report.Short(o.Percent, 2), report.Short(f.Limit, 2), report.Short(o.Times, 2),
		report.Short(fit.Defaults().OvershootTimes, 2), s.signal(), s.rise(o.Rise*s.curve.Decade()))
}

func (s *sentences) notCompared(f fit.Flag) string {
	i := f.About.(fit.Indicated)
	return fmt.Sprintf("The instrument indicated %s mL as %s; the refit has no endpoint of that kind, so nothing was compared.", indicated(i), article(i.Kind))
}

// article is a kind with "a" or "an".
func article(kind string) string {
	if strings.ContainsAny(kind[:min(len(kind), 1)], "aeiou") {
		return "an " + kind
	}
	return "a " + kind
}

func (s *sentences) passesAgain(f fit.Flag) string {
	others := f.About.([]float64)
	at := make([]string, 0, 3)
	for _, v := range others[:min(len(others), 3)] {
		at = append(at, report.Fixed(v, 2))
	}
	more := ""
	if n := len(others) - len(at); n > 0 {
		more = fmt.Sprintf(" and %d more places", n)
	}
	return fmt.Sprintf("The readings pass %s %d times (once allowed): also at %s mL%s.", s.amount(*s.curve.EndReading), len(others)+1, strings.Join(at, ", "), more)
}

// amountOf prints a standard deviation with two figures and its unit.
func (s *sentences) amountOf(y float64) string {
	return report.Short(y, 2) + " " + s.run.Signal.Unit()
}

func (s *sentences) wideInterval(f fit.Flag) string {
	if b, ok := f.About.(fit.Bracket); ok {
		return fmt.Sprintf("The 95 %% interval reaches %s mL from the endpoint, more than the agreement limit of %s mL; the bracket is %s mL.", volume(b.Half), volume(f.Limit), volume(b.Width))
	}
	cause := "scatter of the readings about the arms"
	if e := s.result.Endpoints[f.Endpoint-1]; e.Moves > e.U/math.Sqrt2 {
		cause = "arms that bend: the break moves when blocks of readings are left out"
	}
	return fmt.Sprintf("The 95 %% interval reaches %s mL from the break (limit %s mL), mainly from %s.", volume(f.Figure), volume(f.Limit), cause)
}

func (s *sentences) noEndpoint(f fit.Flag) string {
	l := fit.Defaults()
	var t string
	if u, ok := f.About.(fit.Estimate); ok {
		return fmt.Sprintf("Something stands out near %s mL, but its place is known to ± %s %% only (limit %s %%): no endpoint can be named there.", report.Fixed(u.V, 2), report.Short(f.Figure, 2), report.Short(f.Limit, 2))
	}
	switch {
	case s.curve.Signal == fit.Conductivity:
		t = fmt.Sprintf("No break found: no two straight arms of at least 4 readings meet with an angle that stands out and a 95 %% half-width below %s %%.", report.Short(l.HalfWidthMost, 2))
	case s.result.Estimator == fit.AtReadingName:
		low, high := span(s.curve.Y)
		t = fmt.Sprintf("The readings never pass %s; they run from %s to %s.", s.amount(*s.curve.EndReading), s.reading(low), s.reading(high))
	default:
		t = fmt.Sprintf("No place of the curve is steep enough: an endpoint needs %s times the slope of the flatter places beside it and a rise of %s on either side.",
			report.Short(l.Contrast, 2), s.change(l.SideDecades*s.curve.Decade()))
	}
	return t + indicatedToo(f)
}

// indicatedToo tells of an endpoint that only the instrument saw.
func indicatedToo(f fit.Flag) string {
	if i, ok := f.About.(fit.Indicated); ok {
		return fmt.Sprintf(" The instrument indicated %s mL.", indicated(i))
	}
	return ""
}

func span(y []float64) (low, high float64) {
	low, high = y[0], y[0]
	for _, v := range y {
		low, high = math.Min(low, v), math.Max(high, v)
	}
	return low, high
}

func (s *sentences) leftOut(f fit.Flag) string {
	m := f.About.(fit.Moved)
	at := m.First.At
	switch f.Name {
	case fit.LeftStray:
		t := fmt.Sprintf("Line %d stands %s off the curve of its neighbours (limit %s)", s.line(at), s.change(f.Figure), s.change(f.Limit))
		switch m.Count {
		case 1:
			t += " and was left out."
		case 2:
			t += ", and 1 more; both were left out."
		default:
			t += fmt.Sprintf(", and %d more; all were left out.", m.Count-1)
		}
		return t + s.consequence(m)
	case fit.LeftStuck:
		until := fmt.Sprintf("up to line %d", s.line(f.At[len(f.At)-1]))
		if m.First.ToEnd {
			until = fmt.Sprintf("from line %d to the end", s.line(f.At[0]))
		}
		return fmt.Sprintf("The %s stood at %s %s while the curve moved by %s (limit %s); %s left out.%s", s.signal(), s.reading(s.curve.Y[at]),
			until, s.rise(f.Figure), s.rise(f.Limit), were(m.Count), s.consequence(m))
	}
	return fmt.Sprintf("The volume in line %d, %s mL, is out of order by %s mL; %s left out.", s.line(at), volume(s.curve.V[at]), volume(f.Figure), were(m.Count))
}

// were counts readings that were left out.
func were(n int) string {
	if n == 1 {
		return "1 reading was"
	}
	return fmt.Sprintf("%d readings were", n)
}

// consequence tells what the readings left out would do to the endpoint.
func (s *sentences) consequence(m fit.Moved) string {
	them := "it"
	if m.Count > 1 {
		them = "them"
	}
	switch {
	case len(s.result.Endpoints) == 0:
		return ""
	case math.IsNaN(m.By):
		return fmt.Sprintf(" With %s in, no endpoint is found.", them)
	case strings.Trim(volume(m.By), "0.") == "":
		return fmt.Sprintf(" The endpoint is the same with %s in.", them)
	}
	return fmt.Sprintf(" With %s in, the endpoint moves by %s mL.", them, volume(m.By))
}
