package ingest

import (
	"fmt"
	"math"
	"strconv"
)

// limit is what a quantity can be at all. A number beyond it is a damaged
// cell, another column or another unit, and never enters a run.
type limit struct {
	name      string // a quantity of a column, or a fact
	low, high float64
	above     bool // low itself is refused too
	unit      string
	hint      string
}

// limits is the one table of plausibility. Sources: common practice, no
// source, but for the conductivity, whose highest values in water are near
// 850 mS/cm (strong acids about 30 %, from memory).
var limits = [...]limit{
	{"volume", 0, 1000, false, "mL", "no burette delivers that; check column, unit and decimal mark"},
	{"pH", -2, 16, false, "", "no pH electrode shows that; check column and decimal mark"},
	{"potential", -2000, 2000, false, "mV", "no electrode in water shows that; check column, unit and decimal mark"},
	{"conductivity", 0, 2000, false, "mS/cm", "no solution conducts like that; check column, unit and decimal mark"},
	{"time", 0, 1e6, false, "s", "no titration takes that long; check column and unit"},
	{"temperature", -20, 150, false, "°C", "no titrand is that cold or hot; check column and unit"},
	{"titrant_mol_per_l", 0, 20, true, "mol/L", "no titrant has that; check unit and decimal mark"},
	{"aliquot_ml", 0, 10000, true, "mL", "no vessel holds that; check unit and decimal mark"},
	{"solvent_ml", 0, 10000, false, "mL", "no vessel holds that; check unit and decimal mark"},
	{"temperature_c", -20, 150, false, "°C", "no titrand is that cold or hot; check unit"},
}

// noLimit admits every finite number.
var noLimit = limit{low: math.Inf(-1), high: math.Inf(1)}

func limitOf(name string) *limit {
	for i := range limits {
		if limits[i].name == name {
			return &limits[i]
		}
	}
	return &noLimit
}

func (l *limit) admits(v float64) bool {
	return v >= l.low && v <= l.high && !(l.above && v == l.low)
}

// breaks says how a value breaks the limit, "" when it does not.
func (l *limit) breaks(v float64) string {
	if l.admits(v) {
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
	return fmt.Sprintf("%s%s is outside %s%s to %s%s", short(v), unit, from, short(l.low), short(l.high), unit)
}

// short prints a number with at most 9 significant figures.
func short(v float64) string { return strconv.FormatFloat(v, 'g', 9, 64) }
