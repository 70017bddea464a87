package ingest

import (
	"fmt"
	"slices"
	"strings"

	"lastdrop/ingest/cells"
	"lastdrop/ingest/match"
	"lastdrop/ingest/plausible"
	"lastdrop/schemas"
)

// applyIndicated reads the endpoints that the instrument found.
func (d *draft) applyIndicated() {
	for i := range d.schema.Indicated {
		rule := &d.schema.Indicated[i]
		kind := d.find("indicated kind", rule.KindTitles, nil)
		s := d.find("indicated", rule.Titles, nil)
		if s == nil {
			if i == 0 && kind != nil {
				d.repairs.Add(kind.line, "the kind of an indicated endpoint that is not stated")
			}
			continue
		}
		n, v, why, hint := d.quantity(s.value, s.line, &rule.Written, plausible.Of("volume"))
		if why != "" {
			d.refuse(s.line, s.start, s.at, "indicated", why, hint)
			continue
		}
		var shown steps
		shown.see(n, rule.Unit)
		d.run.Indicated = append(d.run.Indicated, Indicated{Kind: d.kind(rule, kind), VolumeML: v, StepML: shown.step(), Line: s.line})
	}
}

// kind is the kind of an indicated endpoint. One that is stated and not known
// refuses the run: only like kinds are compared, and a guess could hide a
// difference.
func (d *draft) kind(rule *schemas.Indicated, s *statement) string {
	if s == nil {
		switch {
		case rule.Kind != "":
			return rule.Kind
		case d.run.Signal == Conductivity:
			return "break"
		}
		return "inflection"
	}
	var known []string
	for _, v := range rule.KindValues {
		if match.Equal(s.value, v.Text) {
			return v.Means
		}
		known = append(known, cells.Quoted([]byte(v.Text)))
	}
	if len(known) == 0 {
		for _, k := range schemas.Kinds() {
			if match.Equal(s.value, k) {
				return k
			}
			known = append(known, cells.Quoted([]byte(k)))
		}
	}
	slices.Sort(known)
	d.refuse(s.line, s.start, s.at, "indicated kind", cells.Quoted(s.value)+" is not known", fmt.Sprintf("known are %s", strings.Join(known, ", ")))
	return ""
}

// applyResults reads the results that the instrument worked out. They are for
// comparison only: one that is no number is left out.
func (d *draft) applyResults() {
	for i := range d.schema.Results {
		rule := &d.schema.Results[i]
		s := d.find("result", rule.Titles, nil)
		if s == nil {
			continue
		}
		_, v, why, _ := d.quantity(s.value, s.line, &rule.Written, plausible.Of(""))
		if why != "" {
			d.repairs.Add(s.line, fmt.Sprintf("result: %s; it is not used", why))
			continue
		}
		key, _, _ := cells.Clean(s.key)
		d.run.Results = append(d.run.Results, Result{Key: key, Value: v, Text: d.cleaned("result", s), Unit: rule.Unit.Code, Line: s.line})
	}
}
