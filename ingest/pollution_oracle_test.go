package ingest_test

import (
	"fmt"
	"math"
	"regexp"
	"slices"
	"strconv"
	"strings"

	"lastdrop/ingest"
	"lastdrop/schemas"
)

// verdict is what became of one polluted dump.
type verdict string

const (
	right    verdict = "right"    // exactly the true readings and facts, nothing to tell
	repaired verdict = "repaired" // true, or without what a repair line tells
	refused  verdict = "refused"  // unread, or the runs at fault are
	apart    verdict = "apart"    // another valid number or text, or a well-formed table: seen by nobody
	caught   verdict = "caught"   // as apart, but a doubt is told or the run is refused
	silent   verdict = "silent"   // structural damage misread without a word
)

// datum is one thing that a run says; a reading has two.
type datum struct{ key, value string }

// contents lists everything that a run says, without its place in the dump.
// Volumes that are sums (increments, a burette filled again) are listed as
// differences, so that one damaged cell is one datum.
func contents(s *schemas.Schema, r *ingest.Run) []datum {
	f := r.Facts
	list := []datum{{"signal", string(r.Signal)}, {"sample", f.Sample}, {"procedure", f.Procedure}, {"instrument", f.Instrument}, {"operator", f.Operator},
		{"purpose", f.Purpose}, {"started", f.Started}, {"titrant", f.Titrant}, {"reaction", f.Reaction},
		{"number titrant_mol_per_l", text(f.TitrantMolPerL)}, {"number aliquot_ml", text(f.AliquotML)}, {"number solvent_ml", text(f.SolventML)},
		{"number temperature_c", text(f.TemperatureC)}, {"number end_reading", text(f.EndReading)}}
	for _, o := range f.Other {
		list = append(list, datum{"other " + o.Key, o.Value})
	}
	for i, e := range r.Indicated {
		list = append(list, datum{fmt.Sprintf("number indicated %d", i), fmt.Sprint(e.VolumeML)}, datum{fmt.Sprintf("kind %d", i), e.Kind})
	}
	for i, one := range r.Results {
		list = append(list, datum{fmt.Sprintf("result %d", i), fmt.Sprintf("%v %s", one.Value, one.Unit)})
	}
	remarks := ""
	for _, m := range r.Remarks {
		remarks += m.Text + "|"
	}
	list = append(list, datum{"remarks", remarks})
	summed := false
	for _, field := range s.Fields {
		summed = summed || field.Role == schemas.RoleIncrement || field.Refills
	}
	for i, p := range r.Readings {
		v := p.VolumeML
		if summed && i > 0 {
			v = math.Round((v-r.Readings[i-1].VolumeML)*1e9) / 1e9
		}
		list = append(list, datum{fmt.Sprintf("reading %d volume", i), fmt.Sprint(v)}, datum{fmt.Sprintf("reading %d", i), fmt.Sprint(p.Value)})
	}
	for i, column := range [][]float64{r.TimesS, r.TemperaturesC, r.DriftsPerMin} {
		for j, v := range column {
			list = append(list, datum{fmt.Sprintf("beside %d, %d", j, i), fmt.Sprint(v)})
		}
	}
	return list
}

func text(v *float64) string {
	if v == nil {
		return ""
	}
	return fmt.Sprint(*v)
}

// difference is how a run that was read stands to a true one.
type difference struct {
	changed, lost, added []string // keys of data
	readings             bool     // those read are not the true ones, or the first of them
	shorter              bool     // the readings are some of the true ones, in their order
	scaled               int      // readings or volumes that are the true ones times one factor
}

func (d *difference) none() bool { return len(d.changed)+len(d.lost)+len(d.added) == 0 }

func (d *difference) size() int { return len(d.changed) + len(d.lost) + len(d.added) }

// weight tells which true run a read one is nearest to: rows that are lost say
// less than rows that are others.
func (d *difference) weight() int { return 10*(len(d.changed)+len(d.added)) + len(d.lost) }

// single: one cell of the dump explains it all. A cell of a burette that is
// filled again changes two differences; the kind of an endpoint is lost with
// it; a density or cell constant changes every reading in the same way, the
// first time of a clock every time.
func (d *difference) single() bool {
	return d.size() == 1 || d.onlyOther() || d.all("reading", " volume") && d.size() == 2 || d.all("number indicated", "") || d.scaled > 0 && d.size() == d.scaled || d.all("beside", ", 0")
}

// all reports whether every datum that differs has such a key.
func (d *difference) all(prefix, suffix string) bool {
	for _, key := range slices.Concat(d.changed, d.lost, d.added) {
		if !strings.HasPrefix(key, prefix) && !(prefix == "number indicated" && strings.HasPrefix(key, "kind")) || !strings.HasSuffix(key, suffix) {
			return false
		}
	}
	return true
}

// onlyOther: only facts differ that the schema does not map.
func (d *difference) onlyOther() bool { return d.all("other ", "") }

// onlyFactsLost: everything is true but some facts are not there.
func (d *difference) onlyFactsLost() bool {
	return len(d.changed)+len(d.added) == 0 && !slices.ContainsFunc(d.lost, func(key string) bool { return strings.HasPrefix(key, "reading") })
}

func compare(got, want []datum) difference {
	values := map[string]string{}
	for _, w := range want {
		values[w.key] = w.value
	}
	var d difference
	factor := 0.0
	for _, g := range got {
		w, known := values[g.key]
		delete(values, g.key)
		switch {
		case known && w == g.value:
			continue
		case known && g.value == "":
			d.lost = append(d.lost, g.key)
		case known && w != "":
			d.changed = append(d.changed, g.key)
			if f := ratio(g.value, w); (strings.HasPrefix(g.key, "reading") || strings.HasPrefix(g.key, "number indicated")) && f > 0 && (factor == 0 || math.Abs(f-factor) < 1e-9*f) {
				factor = f
				d.scaled++
			}
		default:
			d.added = append(d.added, g.key)
		}
		d.readings = d.readings || strings.HasPrefix(g.key, "reading") || g.key == "signal"
	}
	for _, w := range want { // in their order
		if _, left := values[w.key]; left && w.value != "" {
			d.lost = append(d.lost, w.key)
		}
	}
	return d
}

// renamed: facts are kept under keys that nothing resembles any more.
func (d *difference) renamed() bool {
	return len(d.changed) == 0 && !d.readings && !slices.ContainsFunc(d.added, func(key string) bool { return !strings.HasPrefix(key, "other ") })
}

// ratio of two numbers, 0 for none.
func ratio(a, b string) float64 {
	x, err1 := strconv.ParseFloat(a, 64)
	y, err2 := strconv.ParseFloat(b, 64)
	if err1 != nil || err2 != nil || y == 0 {
		return 0
	}
	return x / y
}

var place = regexp.MustCompile(`^(lines? \d+( to \d+)?|file name): `)

// told lists what the repairs say that those of the clean runs do not.
func told(c *clean, r *ingest.Run) []string {
	var list []string
	for _, line := range r.Repairs {
		if line = place.ReplaceAllString(line, ""); !c.known[line] {
			list = append(list, line)
		}
	}
	return list
}

// judgement is a verdict with what led to it.
type judgement struct {
	verdict verdict
	why     string
	numbers bool   // a number is another one than in the clean dump
	sort    string // what is another one, of damage that nobody can see
}

// judge holds what was read of a polluted dump against the truth.
func judge(c *clean, p *pollution, runs []ingest.Run, schema *schemas.Schema, problems []*schemas.Problem) judgement {
	switch {
	case len(runs)+len(problems) == 0:
		return judgement{silent, "neither runs nor problems", false, ""}
	case len(runs) == 0 && p.apart:
		return judgement{caught, "", false, "dump"}
	case len(runs) == 0:
		return judgement{refused, "", false, ""}
	case schema.Name != c.schema.Name:
		return judgement{silent, "read as " + schema.Name, false, ""}
	}
	truth := c.truth
	seen := make([]bool, len(truth))
	worst := judgement{right, "", false, ""}
	anyTold := len(problems) > 0
	for i := range runs {
		anyTold = anyTold || len(told(c, &runs[i])) > 0
	}
	for i := range runs {
		got := contents(c.schema, &runs[i])
		nearest, diff := 0, difference{}
		for j := range truth {
			if d := compare(got, truth[j]); j == 0 || d.weight() < diff.weight() {
				nearest, diff = j, d
			}
		}
		seen[nearest] = true
		diff.shorter = isPart(&runs[i], &c.runs[nearest])
		worst = worse(worst, judgeRun(p, &diff, told(c, &runs[i]), len(problems) > 0))
	}
	lost := 0
	for _, s := range seen {
		if !s {
			lost++
		}
	}
	switch {
	case lost > 0 && !anyTold && p.apart:
		return worse(worst, judgement{apart, "a run is lost", false, "run"})
	case lost > 0 && !anyTold:
		return judgement{silent, fmt.Sprintf("%d runs lost, %d problems", lost, len(problems)), false, ""}
	case len(problems) > 0 && p.apart:
		return worse(worst, judgement{caught, "", false, "run"})
	case len(problems) > 0:
		return worse(worst, judgement{refused, "", false, ""})
	}
	return worst
}

// judgeRun judges one run by what differs from the nearest true one.
func judgeRun(p *pollution, diff *difference, repairs []string, problems bool) judgement {
	why := fmt.Sprintf("changed %q, lost %q, added %q, told %q", diff.changed, diff.lost, diff.added, repairs)
	switch {
	case diff.none() && len(repairs) == 0:
		return judgement{right, "", false, ""}
	case diff.none():
		return judgement{repaired, why, false, ""}
	case p.apart || p.structural && len(diff.lost) == 0 && diff.single() && !number(diff) || diff.onlyOther() ||
		p.oneCell && !p.structural && (diff.single() || p.cut && (diff.onlyFactsLost() || diff.renamed())):
		if len(repairs) > 0 || problems {
			return judgement{caught, why, number(diff), diff.sort()}
		}
		return judgement{apart, why, number(diff), diff.sort()}
	case explains(repairs) && (!diff.readings || diff.shorter):
		return judgement{repaired, why, number(diff), ""}
	}
	return judgement{silent, why, false, ""}
}

// explains reports whether repairs tell that something is missing or another
// one. A trailing delimiter dropped tells nothing about the cells before it.
func explains(repairs []string) bool {
	return slices.ContainsFunc(repairs, func(line string) bool { return line != "trailing delimiter dropped" })
}

// sort names what differs.
func (d *difference) sort() string {
	switch {
	case d.readings || slices.ContainsFunc(d.lost, func(key string) bool { return strings.HasPrefix(key, "reading") }):
		return "readings"
	case number(d):
		return "number beside them"
	}
	return "text or fact"
}

// number reports whether a number that enters arithmetic is another one.
func number(d *difference) bool {
	return slices.ContainsFunc(slices.Concat(d.changed, d.added), func(key string) bool {
		return strings.HasPrefix(key, "number") || strings.HasPrefix(key, "reading") || strings.HasPrefix(key, "beside")
	})
}

// isPart reports whether the readings of a run are some of the true ones, in
// their order.
func isPart(got, want *ingest.Run) bool {
	at := 0
	for _, r := range want.Readings {
		if at < len(got.Readings) && got.Readings[at].VolumeML == r.VolumeML && got.Readings[at].Value == r.Value {
			at++
		}
	}
	return at == len(got.Readings) && got.Signal == want.Signal
}

var order = []verdict{right, repaired, refused, caught, apart, silent}

func worse(a, b judgement) judgement {
	if slices.Index(order, b.verdict) > slices.Index(order, a.verdict) {
		b.numbers = b.numbers || a.numbers
		return b
	}
	a.numbers = a.numbers || b.numbers
	return a
}
