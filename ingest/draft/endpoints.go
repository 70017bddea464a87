package draft

import (
	"fmt"
	"slices"
	"strings"

	"lastdrop/schemas"
)

// kindWords are what benches call the kinds of endpoints. Source: common
// practice.
var kindWords = map[string]string{
	"inflection": "inflection", "inflexion": "inflection", "steepest place": "inflection", "steepest": "inflection", "slope": "inflection", "wendepunkt": "inflection",
	"set reading": "at-reading", "set point": "at-reading", "fixed": "at-reading", "at-reading": "at-reading", "fixed reading": "at-reading", "endpoint": "at-reading",
	"break": "break", "kink": "break", "two lines": "break", "knick": "break", "equivalence": "equivalence",
}

// kind takes a key that says which kind an endpoint is of.
func (d *draft) kind(key, value string) bool {
	words := " " + wordsOf(key) + " "
	_, isNumber := numberOf(value, &d.dialect)
	about := strings.Contains(words, " end") || strings.Contains(words, " ep") || strings.Contains(words, " indicated ") || strings.Contains(words, " equivalence ")
	if name, _ := factNamed(key); value == "" || isNumber || !about || name != "" && name != "indicated" {
		return false
	}
	d.kindKey = key
	if !slices.Contains(d.kindTexts, value) {
		d.kindTexts = append(d.kindTexts, value)
	}
	return true
}

// kinds: endpoints of a kind that nobody knows are not mapped, for only like
// kinds may be compared.
func (d *draft) kinds() {
	slices.Sort(d.kindTexts)
	for _, text := range d.kindTexts {
		if kindWords[strings.ToLower(text)] != "" {
			continue
		}
		for i := range d.ends {
			d.ends[i].out = fmt.Sprintf("state in kindValues what %q means: %s", text, strings.Join(schemas.Kinds(), ", "))
		}
		d.unsure("the kind %q of an endpoint is not known", text)
	}
	stops := slices.ContainsFunc(d.facts, func(f fact) bool {
		return f.name == string(schemas.FactEndReading) && f.value != "" && f.out == ""
	})
	if stops && d.kindKey == "" && d.ends != nil {
		d.unsure("the kind of the endpoints is not stated; at-reading because a reading to stop at is")
		d.kindKey = "at-reading"
	}
}

// endpoint maps an endpoint that the instrument found.
func (d *draft) endpoint(f fact) {
	f.name = "indicated"
	d.quantity(&f)
	if f.out != "" {
		d.unsure("%s (%q) is not mapped: %s", f.name, f.key, f.out)
	}
	d.ends = append(d.ends, f)
}
