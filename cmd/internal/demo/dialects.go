package demo

import (
	"fmt"
	"strconv"
	"strings"
	"unicode/utf16"

	"lastdrop/fit/simulate"
)

// The writers of the three invented instruments and of the plain table. All
// dumps of one night bear the same date.
const (
	day       = "2031-04-02"
	dayPoints = "02.04.2031"
	offset    = "+02:00"
)

// clock prints seconds since midnight as 08:14:00.
func clock(s int) string { return fmt.Sprintf("%02d:%02d:%02d", s/3600, s/60%60, s%60) }

// fixed prints v with so many decimals and never as -0.000.
func fixed(v float64, decimals int) string {
	s := strconv.FormatFloat(v, 'f', decimals, 64)
	if strings.HasPrefix(s, "-") && strings.Trim(s, "-0.") == "" {
		return s[1:]
	}
	return s
}

// readingPlaces returns the decimals that the run's display shows.
func (t *titration) readingPlaces() int {
	switch {
	case t.procedure.signal == simulate.Potential:
		return 1
	case t.bench.electrode.DisplayStep == 0.01:
		return 2
	}
	return 3
}

// plainOptions are what differs between plain dumps.
type plainOptions struct {
	localStart   bool // start without offset, as in another export of the same run
	temperatures bool
	times        bool
}

// plain writes a run as the plain table.
func plain(t *titration, o plainOptions) []byte {
	var b strings.Builder
	fact := func(key, value string) { fmt.Fprintf(&b, "# %s: %s\n", key, value) }
	fact("sample", t.sample)
	fact("procedure", t.procedure.name)
	fact("instrument", t.bench.name)
	fact("operator", t.operator)
	start := day + "T" + clock(t.started)
	if !o.localStart {
		start += offset
	}
	fact("started", start)
	fact("titrant", t.procedure.titrant)
	fact("titrant_mol_per_l", fixed(t.procedure.molPerL, 1))
	fact("reaction", t.procedure.reaction)
	fact("aliquot_ml", fixed(t.procedure.aliquotML, 2))
	fact("solvent_ml", fixed(t.procedure.solventML, 0))
	fact("temperature_c", fixed(t.temperatureC, 1))
	for i, v := range t.indicatedML {
		key := "indicated_endpoint_ml"
		if i > 0 {
			key = fmt.Sprintf("indicated_endpoint_%d_ml", i+1)
		}
		fact(key, fixed(v, t.indicatedPlaces()))
	}
	columns := []string{"volume_mL", "pH"}
	if o.times {
		columns = append(columns, "time_s")
	}
	if o.temperatures {
		columns = append(columns, "temperature_c")
	}
	b.WriteString(strings.Join(columns, ",") + "\n")
	for i, v := range t.curve.VolumesML {
		b.WriteString(fixed(v, 3) + "," + fixed(t.curve.Readings[i], t.readingPlaces()))
		if o.times {
			b.WriteString("," + fixed(t.curve.TimesS[i], 0))
		}
		if o.temperatures {
			b.WriteString("," + fixed(t.curve.TemperaturesC[i], 1))
		}
		b.WriteString("\n")
	}
	return []byte(b.String())
}

// comma prints with a decimal comma.
func comma(v float64, decimals int) string {
	return strings.Replace(fixed(v, decimals), ".", ",", 1)
}

// benchADump writes a run as Bench A does: Windows-1252, semicolons, decimal
// commas.
func benchADump(t *titration) []byte {
	var b strings.Builder
	line := func(cells ...string) { b.WriteString(strings.Join(cells, ";") + "\r\n") }
	line("Bench A curve record", "4")
	line("Sample name", t.sample)
	line("Determination", t.procedure.name)
	line("Person", t.operator)
	line("Begun", dayPoints+" "+clock(t.started)[:5])
	line("Burette holds", t.procedure.titrant)
	line("Burette mol/L", comma(t.procedure.molPerL, 4))
	line("Sample taken mL", comma(t.procedure.aliquotML, 2))
	line("Water added mL", comma(t.procedure.solventML, 1))
	line("Temp. °C", comma(t.temperatureC, 1))
	line("Kind of reaction", t.procedure.reaction)
	where := "steepest place"
	if t.toSet {
		line("Stop at pH", comma(t.procedure.set, 2))
		where = "set reading"
	}
	for i, v := range t.indicatedML {
		if i == 0 {
			line("Endpoint seen mL", comma(v, t.indicatedPlaces()))
			line("Endpoint seen at", where)
		} else {
			line("Second endpoint seen mL", comma(v, t.indicatedPlaces()))
		}
	}
	line("Readings", strconv.Itoa(len(t.curve.VolumesML)))
	line("")
	line("Volume mL", "pH", "Temp. °C")
	for i, v := range t.curve.VolumesML {
		line(comma(v, 3), comma(t.curve.Readings[i], t.readingPlaces()), comma(t.curve.TemperaturesC[i], 1))
	}
	return latin(b.String())
}

// latin encodes text whose runes are all below 256 in Windows-1252; the
// characters of this package have the same code there as in Unicode.
func latin(s string) []byte {
	out := make([]byte, 0, len(s))
	for _, r := range s {
		out = append(out, byte(r))
	}
	return out
}

// benchBDump writes runs as Bench B does: stacked, with tabs, UTF-16LE with a
// byte order mark. With cut the text ends inside the last run.
func benchBDump(runs []*titration, cut bool) []byte {
	var b strings.Builder
	line := func(cells ...string) { b.WriteString(strings.Join(cells, "\t") + "\r\n") }
	line("bench B day log")
	for n, t := range runs {
		if n > 0 {
			line("")
		}
		line("> curve", strconv.Itoa(n+1))
		benchBFacts(t, line)
		rows := len(t.curve.VolumesML)
		if cut && n == len(runs)-1 {
			rows /= 2
		}
		for i := range rows {
			line(strconv.Itoa(i+1), fixed(t.curve.VolumesML[i], 3), fixed(t.curve.Readings[i], t.readingPlaces()), fixed(t.curve.TimesS[i], 0))
		}
		if rows == len(t.curve.VolumesML) {
			line("< curve", strconv.Itoa(rows))
		}
	}
	return utf16le(b.String())
}

// benchBFacts writes the lines between the mark of a run and its table.
func benchBFacts(t *titration, line func(...string)) {
	line("sample", t.sample)
	line("determination", t.procedure.name)
	line("operator", t.operator)
	line("start", day+" "+clock(t.started))
	line("titrant", t.procedure.titrant)
	line("mol/L", fixed(t.procedure.molPerL, 4))
	line("aliquot mL", fixed(t.procedure.aliquotML, 3))
	line("water mL", fixed(t.procedure.solventML, 1))
	line("temperature °C", fixed(t.temperatureC, 1))
	line("reaction", t.procedure.reaction)
	for i, v := range t.indicatedML {
		if i == 0 {
			line("end mL", fixed(v, t.indicatedPlaces()))
			line("end kind", t.kind)
		} else {
			line("end 2 mL", fixed(v, t.indicatedPlaces()))
		}
	}
	heading := "pH"
	if t.procedure.signal == simulate.Potential {
		heading = "E/mV"
	}
	line("no.", "V/mL", heading, "t/s")
}

// utf16le encodes text with a byte order mark.
func utf16le(s string) []byte {
	out := []byte{0xff, 0xfe}
	for _, u := range utf16.Encode([]rune(s)) {
		out = append(out, byte(u), byte(u>>8))
	}
	return out
}

// benchCDump writes runs as Bench C does: one long table, the facts of each
// run in its foot. first is the number of the first run.
func benchCDump(runs []*titration, first int) []byte {
	var b strings.Builder
	b.WriteString("bench C shift table\nrun,step,dose_uL,delivered_uL,cond_uS_per_cm,temp_C\n")
	for n, t := range runs {
		before := 0.0
		for i, v := range t.curve.VolumesML {
			fmt.Fprintf(&b, "C%04d,%d,%s,%s,%s,%s\n", first+n, i, fixed(1000*(v-before), 0), fixed(1000*v, 0),
				fixed(1000*t.curve.Readings[i], 1), fixed(t.curve.TemperaturesC[i], 1))
			before = v
		}
	}
	b.WriteString("totals\n")
	for n, t := range runs {
		seen := ""
		if len(t.indicatedML) > 0 {
			seen = fixed(1000*t.indicatedML[0], 0)
		}
		fmt.Fprintf(&b, "total,C%04d,%d,%s,%s,%s,%s,%sT%s%s,%s,%g,%g,%g,%s\n", first+n, len(t.curve.VolumesML), seen, t.sample,
			t.procedure.name, t.operator, day, clock(t.started), offset, t.procedure.titrant, t.procedure.molPerL,
			t.procedure.aliquotML, t.procedure.solventML, t.procedure.reaction)
	}
	return []byte(b.String())
}
