package night

import (
	"fmt"
	"strings"

	"lastdrop/ingest"
	"lastdrop/report"
)

// exportedAgain flags every further export of a run that says something else
// of it where that counts: an indicated endpoint, or a fact that enters
// identity or arithmetic. The first export's values stand.
func (x export) exportedAgain() (flags []report.Flag) {
	first := x[0]
	for _, r := range x[1:] {
		differs := differences(first.Evaluation, r.Evaluation)
		if len(differs) == 0 {
			continue
		}
		flags = append(flags, report.Flag{
			Flag: "exported-again", Weight: report.Disputed,
			Figure: float64(len(differs)), Limit: 0, Unit: count(len(differs), "value", "values"),
			Says: fmt.Sprintf("%s holds the same run with %d other %s (none is allowed): %s.",
				place(r.Evaluation), len(differs), count(len(differs), "value", "values"), strings.Join(differs, "; ")),
		})
	}
	return flags
}

// differences names what two exports of one run do not agree on, each with
// both values. A sample or start that one side leaves out is no difference:
// the rule that makes them one run allows it.
func differences(here, there *report.Evaluation) (differs []string) {
	differs = indicatedDifferences(here.Indicated, there.Indicated)
	for _, f := range factTexts(&here.Facts, &there.Facts) {
		if f.here != f.there {
			differs = append(differs, fmt.Sprintf("%s %s there, %s here", f.name, stated(f.there), stated(f.here)))
		}
	}
	for _, f := range factNumbers(&here.Facts, &there.Facts) {
		if !sameNumber(f.here, f.there) {
			differs = append(differs, fmt.Sprintf("%s %s there, %s here", f.name, number(f.there, f.unit), number(f.here, f.unit)))
		}
	}
	return differs
}

// indicatedDifferences compares in the order in which the instrument wrote
// them.
func indicatedDifferences(here, there []report.Indicated) (differs []string) {
	for i := range max(len(here), len(there)) {
		var h, t *report.Indicated
		if i < len(here) {
			h = &here[i]
		}
		if i < len(there) {
			t = &there[i]
		}
		if h != nil && t != nil && h.Kind == t.Kind && sameNineDigits(h.VolumeML, t.VolumeML) {
			continue
		}
		differs = append(differs, fmt.Sprintf("indicated endpoint %s there, %s here", indicated(t), indicated(h)))
	}
	return differs
}

func indicated(i *report.Indicated) string {
	if i == nil {
		return "none"
	}
	return i.Volume() + " mL (" + i.Kind + ")"
}

type factText struct{ name, here, there string }

// factTexts are the facts in words that choose the arithmetic of a run.
func factTexts(here, there *ingest.Facts) []factText {
	return []factText{
		{"procedure", here.Procedure, there.Procedure},
		{"purpose", purpose(here), purpose(there)},
		{"titrant", here.Titrant, there.Titrant},
		{"reaction", here.Reaction, there.Reaction},
	}
}

// purpose is what a run is for; a run that states nothing is of a sample.
func purpose(f *ingest.Facts) string {
	if f.Purpose == "" {
		return "sample"
	}
	return f.Purpose
}

func stated(s string) string {
	if s == "" {
		return "not stated"
	}
	return fmt.Sprintf("%q", s)
}

type factNumber struct {
	name, unit  string
	here, there *float64
}

// factNumbers are the facts that enter arithmetic as numbers.
func factNumbers(here, there *ingest.Facts) []factNumber {
	return []factNumber{
		{"titrant concentration", " mol/L", here.TitrantMolPerL, there.TitrantMolPerL},
		{"aliquot", " mL", here.AliquotML, there.AliquotML},
		{"solvent", " mL", here.SolventML, there.SolventML},
		{"temperature", " °C", here.TemperatureC, there.TemperatureC},
		{"end reading", "", here.EndReading, there.EndReading},
	}
}

func sameNumber(a, b *float64) bool {
	if a == nil || b == nil {
		return a == b
	}
	return sameNineDigits(*a, *b)
}

func number(v *float64, unit string) string {
	if v == nil {
		return "not stated"
	}
	return report.Short(*v, 9) + unit
}

// place names a run for people.
func place(e *report.Evaluation) string {
	dump := e.Dump
	if strings.ContainsAny(dump, ` "()`) { // its words must not be taken for ours
		dump = fmt.Sprintf("%q", dump)
	}
	return fmt.Sprintf("%s, run %d,", dump, e.Run)
}

func count(n int, one, many string) string {
	if n == 1 {
		return one
	}
	return many
}
