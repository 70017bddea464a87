package schemas

import (
	"fmt"
	"slices"
	"strconv"
	"strings"
)

// readField reads one entry of fields.
func readField(n *node) Field {
	var roles []string
	for _, f := range fieldForms {
		roles = append(roles, string(f.role))
	}
	f := Field{Role: Role(n.word("name", roles...)), Titles: n.titles("titles")}
	n.need("name", "titles")
	n.fieldNumber(&f)
	f.Shared = n.flag("shared")
	if f.Role != RoleStatus {
		n.refuse("values", "only a status has values")
	} else if f.Values = n.values("values"); len(f.Values) == 0 {
		n.problem("", "values is missing", "state what each text of the column means: "+quoteAll(statusWords()))
	}
	n.checkValues("values", f.Values, statusWords())
	n.asked = append(n.asked, "unit", "format", "values", "suffixes", "bounds", "empty", "refills")
	n.done()
	return f
}

func statusWords() []string { return []string{StatusReading, StatusTimedOut, StatusSkip} }

// fieldNumber reads the keys about the numbers of a column.
func (n *node) fieldNumber(f *Field) {
	quantities := quantitiesOf(f.Role)
	if f.Role == RoleTime && n.has("format") {
		n.clock(f)
		n.refuse("unit", "a time with a format has no unit")
		return
	}
	n.refuse("format", "only a time has a format")
	switch {
	case f.Role == RolePH && !n.has("unit"):
		f.Unit, _ = unitOf("[pH]")
	case quantities != nil:
		f.Unit = n.unit(quantities...)
	case f.Role != "":
		n.refuse("unit", fmt.Sprintf("a column %q has no unit", f.Role))
	}
	if quantities == nil {
		n.refuse("suffixes", "only a number has suffixes")
		n.refuse("bounds", "only a number has bounds")
	} else {
		n.glued(&f.Written)
	}
	n.empty(f)
}

// clock reads the format of a time column.
func (n *node) clock(f *Field) {
	s := n.text("format")
	if !n.isText("format") {
		return
	}
	p, err := ParseClock(s)
	if err != nil {
		n.problem("format", err.Error(), `state e.g. "%H:%M:%S" for the time of day or "%M:%S" for minutes and seconds since the start`)
	}
	f.Clock = p
}

// glued reads what may stand with a number in its cell.
func (n *node) glued(w *Written) {
	w.Suffixes, w.Bounds = n.texts("suffixes"), n.flag("bounds")
	for _, s := range w.Suffixes {
		if strings.TrimSpace(s) != s || s == "" || strings.ContainsAny(s[:1], "0123456789.,+-eE") {
			n.problem("suffixes", fmt.Sprintf("found %q", s), "a text without blanks around it that does not begin like a number is allowed")
		}
	}
}

// empty reads what empty cells and falling volumes mean.
func (n *node) empty(f *Field) {
	switch {
	case f.Role.IsVolume():
		f.Empty = Empty(n.word("empty", string(EmptySame)))
	case f.Role.IsReading():
		f.Empty = Empty(n.word("empty", string(EmptySkip)))
	default:
		n.refuse("empty", "only volumes and readings may be empty")
	}
	if f.Refills = n.flag("refills"); f.Role != RoleVolume {
		n.refuse("refills", "only a volume begins anew")
	}
}

// readFact reads one entry of facts.
func readFact(n *node) Fact {
	var names []string
	for _, f := range factForms {
		names = append(names, string(f.name))
	}
	f := Fact{Name: FactName(n.word("name", names...)), Titles: n.titles("titles"), Columns: n.titles("columns"), File: n.capture("file"), Folder: n.capture("folder")}
	n.need("name")
	form, quantity := formOf(f.Name)
	n.factKeys(&f, form, quantity)
	if !n.has("titles") && !n.has("default") && !n.has("columns") && !n.has("file") && !n.has("folder") {
		n.problem("", "neither titles nor default", "state where the fact stands in a dump, or what it always is")
	}
	allowed := AllowedTexts(f.Name)
	if allowed != nil && f.Default != "" && !slices.Contains(allowed, f.Default) {
		n.problem("default", fmt.Sprintf("found %q", f.Default), "allowed: "+quoteAll(allowed))
	}
	n.checkValues("values", f.Values, allowed)
	n.asked = append(n.asked, "unit", "format", "zone", "values", "default", "suffixes", "bounds")
	n.done()
	return f
}

// capture reads the pattern of a name.
func (n *node) capture(key string) Capture {
	s := n.text(key)
	if !n.has(key) || !n.isText(key) {
		return Capture{}
	}
	c, err := ParseCapture(s)
	if err != nil {
		n.problem(key, err.Error(), `state {} once for the fact and * for any text, e.g. "run-{}_*.csv"`)
	}
	return c
}

// factKeys reads the keys that only some facts may have.
func (n *node) factKeys(f *Fact, form form, quantity Quantity) {
	switch form {
	case formNumber:
		f.Unit = n.unit(quantity)
		n.glued(&f.Written)
		f.Number = n.number("default", f.Unit)
	case formReading:
		if n.has("unit") {
			f.Unit = n.unit(PH, Potential, Conductivity)
		}
		n.glued(&f.Written)
	default:
		n.refuse("unit", "only a number has a unit")
		n.refuse("suffixes", "only a number has suffixes")
		n.refuse("bounds", "only a number has bounds")
	}
	if form == formDate {
		n.date(f)
	} else {
		n.refuse("format", "only a date has a format")
		n.refuse("zone", "only a date has a zone")
	}
	switch form {
	case formText:
		f.Default, f.Values = n.text("default"), n.values("values")
	case formNumber:
		n.refuse("values", "only a text has values")
	default:
		n.refuse("values", "only a text has values")
		n.refuse("default", "only a text or a number with a unit has a default")
	}
}

// date reads format and zone.
func (n *node) date(f *Fact) {
	if s := n.text("format"); n.has("format") && n.isText("format") {
		p, err := ParsePattern(s)
		if err != nil {
			n.problem("format", err.Error(), `state year, month, day, hour and minute, e.g. "%d.%m.%Y %H:%M"`)
		}
		f.Format = p
	}
	if s := n.text("zone"); n.has("zone") && n.isText("zone") {
		z, err := ParseZone(s)
		if err != nil {
			n.problem("zone", err.Error(), `allowed: "UTC", an offset such as "+02:00" or a name such as "Europe/Berlin"`)
		}
		f.Zone = z
	}
}

// readIndicated reads one entry of indicated.
func readIndicated(n *node) Indicated {
	i := Indicated{Titles: n.titles("titles"), Written: Written{Unit: n.unit(Volume)}, Kind: n.word("kind", Kinds()...),
		KindTitles: n.titles("kindTitles"), KindValues: n.values("kindValues")}
	n.need("titles")
	n.glued(&i.Written)
	n.checkValues("kindValues", i.KindValues, Kinds())
	if n.has("kindValues") && !n.has("kindTitles") {
		n.problem("kindValues", "found without kindTitles", "state in kindTitles which line of the dump has the kind")
	}
	n.done()
	return i
}

// readResult reads one entry of results.
func readResult(n *node) Result {
	r := Result{Titles: n.titles("titles")}
	n.need("titles", "unit")
	n.glued(&r.Written)
	r.Unit = Unit{Code: n.text("unit"), Times: 1}
	if code := r.Unit.Code; n.has("unit") && n.isText("unit") && (code == "" || strings.ContainsFunc(code, func(c rune) bool { return c <= ' ' || c > '~' })) {
		n.problem("unit", fmt.Sprintf("found %q", code), `a UCUM code is allowed, such as "g/L", "mol/L" or "%"`)
	}
	n.done()
	return r
}

// Numbered stands in a title for a number that an instrument counts up.
const Numbered = "{n}"

// maxNumbered is how many numbered endpoints of one run are looked for.
const maxNumbered = 9

// numbered writes the entries whose titles have {n} out for each number.
func numbered(list []Indicated) []Indicated {
	var all []Indicated
	for _, one := range list {
		if !slices.ContainsFunc(one.Titles, func(t string) bool { return strings.Contains(t, Numbered) }) {
			all = append(all, one)
			continue
		}
		for n := 1; n <= maxNumbered; n++ {
			next := one
			next.Titles, next.KindTitles = withNumber(one.Titles, n), withNumber(one.KindTitles, n)
			all = append(all, next)
		}
	}
	return all
}

func withNumber(titles []string, n int) []string {
	list := make([]string, len(titles))
	for i, t := range titles {
		list[i] = strings.ReplaceAll(t, Numbered, strconv.Itoa(n))
	}
	return list
}

// need reports keys that are missing.
func (n *node) need(keys ...string) {
	for _, key := range keys {
		if !n.has(key) {
			n.problem("", key+" is missing", "every entry here states it")
		}
	}
}

// refuse reports a key that has no meaning beside the others of its table.
func (n *node) refuse(key, why string) {
	if n.has(key) {
		n.problem(key, why, "leave it out")
	}
}

// unit reads the unit, which must be there and be of one of the quantities.
func (n *node) unit(quantities ...Quantity) Unit {
	var allowed []string
	for _, q := range quantities {
		allowed = append(allowed, codes(q)...)
	}
	if !n.has("unit") {
		n.asked = append(n.asked, "unit")
		n.problem("", "unit is missing", "allowed: "+quoteAll(allowed))
		return Unit{}
	}
	u, _ := unitOf(n.word("unit", allowed...))
	return u
}

// checkValues reports meanings that are not allowed; allowed nil allows all.
func (n *node) checkValues(key string, values []Value, allowed []string) {
	for _, v := range values {
		if allowed != nil && v.Means != "" && !slices.Contains(allowed, v.Means) {
			n.problem(join(key, v.Text), fmt.Sprintf("found %q", v.Means), "allowed: "+quoteAll(allowed))
		}
	}
}

func formOf(name FactName) (form, Quantity) {
	for i := range factForms {
		if factForms[i].name == name {
			return factForms[i].form, factForms[i].quantity
		}
	}
	return formText, "" // the name itself has been reported
}
