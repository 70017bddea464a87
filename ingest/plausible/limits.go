// Package plausible holds what no titration can show: limits of single numbers
// and rules about whole curves, each in one table with its reason. It reads no
// dump and knows no schema.
//
// Sources: common practice, no source, where none is stated at the entry.
package plausible

import (
	"fmt"
	"math"
	"strconv"
)

// Limit is what a quantity can be at all. A number beyond it is a damaged
// cell, another column or another unit, and never enters a run.
type Limit struct {
	Name      string // a quantity of a column, or a fact
	low, high float64
	above     bool // low itself is refused too
	unit      string
	Hint      string
}

// limits is the one table of plausibility. Sources: common practice, no
// source, but for the conductivity, whose highest values in water are near
// 850 mS/cm (strong acids about 30 %, from memory).
var limits = [...]Limit{
	{"volume", 0, 1000, false, "mL", "no burette delivers that; check column, unit and decimal mark"},
	{"pH", -2, 16, false, "", "no pH electrode shows that; check column and decimal mark"},
	{"potential", -2000, 2000, false, "mV", "no electrode in water shows that; check column, unit and decimal mark"},
	{"conductivity", 0, 2000, false, "mS/cm", "no solution conducts like that; check column, unit and decimal mark"},
	{"time", 0, 1e6, false, "s", "no titration takes that long; check column and unit"},
	{"temperature", -20, 150, false, "°C", "no titrand is that cold or hot; check column and unit"},
	{"titrant_mol_per_l", 0, 20, true, "mol/L", "no titrant has that; check unit and decimal mark"},
	{"aliquot_ml", 0, 10000, true, "mL", "no vessel holds that; check unit and decimal mark"},
	{"solvent_ml", 0, 10000, false, "mL", "no vessel holds that; check unit and decimal mark"},
	{"mass", 0, 1000, false, "g", "no burette delivers that; check column, unit and decimal mark"},
	{"conductance", 0, 100000, false, "mS", "no cell in a solution shows that; check column, unit and decimal mark"},
	{"drift", -100000, 100000, false, "", "no electrode drifts like that; check column and unit"},
	{"density_g_per_ml", 0.5, 3, false, "g/mL", "no titrant is that light or dense; check unit and decimal mark"},
	{"cell_constant_per_cm", 0.001, 100, false, "/cm", "no conductivity cell has that; check unit and decimal mark"},
	{"temperature_c", -20, 150, false, "°C", "no titrand is that cold or hot; check unit"},
}

// noLimit admits every finite number.
var noLimit = Limit{low: math.Inf(-1), high: math.Inf(1)}

// Of returns the limit of a quantity or fact, by name; every finite number is
// within that of an unknown one.
func Of(name string) *Limit {
	for i := range limits {
		if limits[i].Name == name {
			return &limits[i]
		}
	}
	return &noLimit
}

// Admits reports whether a value can be.
func (l *Limit) Admits(v float64) bool {
	return v >= l.low && v <= l.high && !(l.above && v == l.low)
}

// Breaks says how a value breaks the limit, "" when it does not.
func (l *Limit) Breaks(v float64) string {
	if l.Admits(v) {
		return ""
	}
	unit := l.unit
	if unit != "" {
		unit = " " + unit
	}
	from := ""
	if l.above {
		from = "above "
	}
	return fmt.Sprintf("%s%s is outside %s%s to %s%s", Short(v), unit, from, Short(l.low), Short(l.high), unit)
}

// Short prints a number with at most 9 significant figures.
func Short(v float64) string { return strconv.FormatFloat(v, 'g', 9, 64) }
