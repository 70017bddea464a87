package schemas

import (
	"fmt"
	"slices"
)

// readField reads one entry of fields.
func readField(n *node) Field {
	var roles []string
	for _, f := range fieldQuantity {
		roles = append(roles, string(f.role))
	}
	f := Field{Role: Role(n.word("name", roles...)), Titles: n.titles("titles")}
	n.need("name", "titles")
	var quantity Quantity
	for _, q := range fieldQuantity {
		if q.role == f.Role {
			quantity = q.quantity
		}
	}
	switch {
	case f.Role == RolePH && !n.has("unit"):
		f.Unit, _ = unitOf("[pH]")
	case quantity != "":
		f.Unit = n.unit(quantity)
	case f.Role != "":
		n.refuse("unit", fmt.Sprintf("a column %q has no unit", f.Role))
	}
	n.asked = append(n.asked, "unit")
	n.done()
	return f
}

// readFact reads one entry of facts.
func readFact(n *node) Fact {
	var names []string
	for _, f := range factForms {
		names = append(names, string(f.name))
	}
	f := Fact{Name: FactName(n.word("name", names...)), Titles: n.titles("titles"), Default: n.text("default")}
	n.need("name")
	form, quantity := formOf(f.Name)
	n.factKeys(&f, form, quantity)
	if !n.has("titles") && !n.has("default") {
		n.problem("", "neither titles nor default", "state where the fact stands in a dump, or what it always is")
	}
	allowed := AllowedTexts(f.Name)
	if allowed != nil && f.Default != "" && !slices.Contains(allowed, f.Default) {
		n.problem("default", fmt.Sprintf("found %q", f.Default), "allowed: "+quoteAll(allowed))
	}
	n.checkValues("values", f.Values, allowed)
	n.asked = append(n.asked, "unit", "format", "zone", "values")
	n.done()
	return f
}

// factKeys reads the keys that only some facts may have.
func (n *node) factKeys(f *Fact, form form, quantity Quantity) {
	switch form {
	case formNumber:
		f.Unit = n.unit(quantity)
	case formReading:
		if n.has("unit") {
			f.Unit = n.unit(PH, Potential, Conductivity)
		}
	default:
		n.refuse("unit", "only a number has a unit")
	}
	if form == formDate {
		n.date(f)
	} else {
		n.refuse("format", "only a date has a format")
		n.refuse("zone", "only a date has a zone")
	}
	if form == formText {
		f.Values = n.values("values")
	} else {
		n.refuse("values", "only a text has values")
		n.refuse("default", "only a text has a default")
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
			n.problem("zone", err.Error(), `allowed: "UTC" or an offset such as "+02:00"`)
		}
		f.Zone = z
	}
}

// readIndicated reads one entry of indicated.
func readIndicated(n *node) Indicated {
	i := Indicated{Titles: n.titles("titles"), Unit: n.unit(Volume), Kind: n.word("kind", Kinds()...),
		KindTitles: n.titles("kindTitles"), KindValues: n.values("kindValues")}
	n.need("titles")
	n.checkValues("kindValues", i.KindValues, Kinds())
	if n.has("kindValues") && !n.has("kindTitles") {
		n.problem("kindValues", "found without kindTitles", "state in kindTitles which line of the dump has the kind")
	}
	n.done()
	return i
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
