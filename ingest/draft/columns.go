package draft

import (
	"math"
	"slices"
	"strings"

	"lastdrop/schemas"
)

// field is one column as the draft has it.
type field struct {
	role     schemas.Role
	title    string
	unit     string
	why      string // shown in the file
	format   string // of a time
	suffixes []string
	empty    schemas.Empty
	refills  bool
	shared   bool
	values   []string // texts of a status
	table    *table   // the first that has it
}

// behaviour is how the numbers of a column go.
type behaviour struct {
	numbers, filled, all int
	low, high, first     float64
	rising, falling      int // steps
	counts               bool
	decimals             bool
	suffix               string
}

func (d *draft) behaviour(list []string) behaviour {
	b := behaviour{all: len(list), counts: true, low: math.Inf(1), high: math.Inf(-1)}
	last := 0.0
	for _, c := range list {
		if c == "" {
			continue
		}
		b.filled++
		v, ok := numberOf(c, &d.dialect)
		if !ok {
			continue
		}
		if i := strings.LastIndexAny(c, "0123456789"); i < len(c)-1 {
			b.suffix = strings.TrimSpace(c[i+1:])
		}
		b.decimals = b.decimals || strings.Contains(c, string(d.dialect.DecimalChar))
		if b.numbers == 0 {
			b.first, b.counts = v, v == 0 || v == 1
		} else {
			b.counts = b.counts && v == last+1
			if v > last {
				b.rising++
			}
			if v < last {
				b.falling++
			}
		}
		b.low, b.high, last = min(b.low, v), max(b.high, v), v
		b.numbers++
	}
	return b
}

// nameColumns gives every column a role: by its title, else by its numbers.
func (d *draft) nameColumns() {
	runs := -1
	if d.layout == schemas.Long {
		runs = d.runColumn(&d.tables[0])
	}
	for n := range d.tables {
		t := &d.tables[n]
		for i, title := range t.titles {
			switch {
			case title == "" || d.named(title):
			case i == runs:
				d.fields = append(d.fields, field{title: title, role: schemas.RoleRun, why: "it changes where the volume begins anew", table: t})
			default:
				f := field{title: title, why: "by its title", table: t}
				f.role, f.unit = roleNamed(title)
				d.believe(&f, d.behaviour(d.column(t, i)), i)
				d.addField(f)
			}
		}
	}
	d.missingRoles()
	d.leftOver()
	d.onlyOne()
	for i := range d.fields {
		d.detail(&d.fields[i])
	}
}

// named reports whether a title has been looked at.
func (d *draft) named(title string) bool {
	return slices.ContainsFunc(d.fields, func(f field) bool { return f.title == title })
}

// believe holds the role that a title names against the numbers.
func (d *draft) believe(f *field, b behaviour, i int) {
	numeric := b.numbers > 0 && 2*b.numbers >= b.filled
	switch f.role {
	case schemas.RoleStatus, schemas.RoleRemark:
		if numeric {
			f.role, f.why = schemas.RoleUnused, "a text is expected, numbers stand here"
		}
	case schemas.RoleTime:
		if format := clockOf(d.column(f.table, i)); format != "" {
			f.format, f.unit = format, ""
		} else if !numeric {
			f.role, f.why = schemas.RoleUnused, "no time of a known form"
		}
	case schemas.RoleNumber:
		if !b.counts {
			f.role, f.why = schemas.RoleUnused, "it does not count up by one"
			if d.layout == schemas.Long {
				f.role, f.why = schemas.RoleNumber, "it counts the rows of each run"
				if !d.countsInRuns(i) {
					f.role = schemas.RoleUnused
				}
			}
		}
	case "":
	default:
		if !numeric {
			f.role, f.why = schemas.RoleUnused, "numbers are expected, texts stand here"
		}
	}
}

// countsInRuns reports whether a column counts up by one between the changes
// of the run column.
func (d *draft) countsInRuns(i int) bool {
	t := &d.tables[0]
	changes := changesOf(d.column(t, d.runColumn(t)))
	last := 0.0
	for n, c := range d.column(t, i) {
		v, ok := numberOf(c, &d.dialect)
		begins := n == 0 || slices.Contains(changes, n)
		if !ok || begins && v != 0 && v != 1 || !begins && v != last+1 {
			return false
		}
		last = v
	}
	return true
}

// addField adds a column; in the layout wide each role once.
func (d *draft) addField(f field) {
	if d.layout == schemas.Wide {
		name, pattern := withoutNumber(f.title)
		if pattern != "" && d.wideNumbered(name) {
			f.title = pattern
		}
		for _, earlier := range d.fields {
			if earlier.title == f.title {
				return
			}
		}
	}
	d.fields = append(d.fields, f)
}

// wideNumbered reports whether several titles are this one with a number.
func (d *draft) wideNumbered(name string) bool {
	n := 0
	for _, title := range d.tables[0].titles {
		if other, pattern := withoutNumber(title); pattern != "" && other == name {
			n++
		}
	}
	return n > 1
}

// missingRoles finds volume and reading by their numbers where no title names
// them.
func (d *draft) missingRoles() {
	t := &d.tables[0]
	behaviours := make([]behaviour, len(t.titles))
	for i := range t.titles {
		behaviours[i] = d.behaviour(d.column(t, i))
	}
	has := func(is func(schemas.Role) bool) bool {
		return slices.ContainsFunc(d.fields, func(f field) bool { return is(f.role) })
	}
	at := func(f *field) int { return slices.Index(t.titles, f.title) }
	if !has(schemas.Role.IsVolume) {
		for i := range d.fields {
			f := &d.fields[i]
			if j := at(f); f.role == "" && j >= 0 && behaviours[j].numbers >= minRows && behaviours[j].falling == 0 && behaviours[j].rising > 0 && behaviours[j].low >= 0 && !behaviours[j].counts {
				f.role, f.why = schemas.RoleVolume, "no title names the volume; these numbers never fall"
				d.unsure("volume: %q was taken because its numbers never fall", f.title)
				break
			}
		}
	}
	if !has(schemas.Role.IsReading) {
		for i := range d.fields {
			f := &d.fields[i]
			j := at(f)
			if f.role != "" || j < 0 || behaviours[j].numbers < minRows {
				continue
			}
			f.role, f.unit, f.why = schemas.RolePotential, "mV", "no title names the reading; these numbers stand beside the volume"
			if b := behaviours[j]; b.low >= 0 && b.high <= 14 && b.high-b.low > 1 {
				f.role, f.unit, f.why = schemas.RolePH, "", "no title names the reading; these numbers lie between 0 and 14"
			}
			d.unsure("reading: %q was taken for %s", f.title, f.role)
			break
		}
	}
}

// leftOver: columns that nothing speaks for are of no use.
func (d *draft) leftOver() {
	for i := range d.fields {
		if f := &d.fields[i]; f.role == "" {
			f.role, f.why = schemas.RoleUnused, "no title and no number says what it is"
		}
	}
}

// onlyOne leaves one column of each role, and one reading.
func (d *draft) onlyOne() {
	order := []schemas.Role{schemas.RolePH, schemas.RoleConductivity, schemas.RoleConductance, schemas.RolePotential}
	volume := slices.IndexFunc(d.fields, func(f field) bool { return f.role == schemas.RoleVolume })
	seen := map[schemas.Role]bool{}
	for i := range d.fields {
		f := &d.fields[i]
		switch better := d.betterReading(f, order); {
		case f.role == schemas.RoleUnused:
		case better != "":
			d.unsure("reading: %q (%s) stands beside %q and is left out", f.title, f.role, better)
			f.role, f.why = schemas.RoleUnused, "a run has one reading"
		case f.role == schemas.RoleIncrement && volume >= 0:
			f.role, f.why = schemas.RoleUnused, "the volume stands beside it"
		case seen[f.role]:
			d.unsure("%s: %q is a second one and left out", f.role, f.title)
			f.role, f.why = schemas.RoleUnused, "another column is the "+string(f.role)
		}
		seen[f.role] = true
	}
}

// betterReading is the title of another reading in the table of this one that
// comes first in the order, "" for none.
func (d *draft) betterReading(f *field, order []schemas.Role) string {
	rank := slices.Index(order, f.role)
	if rank < 0 {
		return ""
	}
	for i := range d.fields {
		other := &d.fields[i]
		if r := slices.Index(order, other.role); r >= 0 && r < rank && slices.Contains(f.table.titles, other.title) {
			return other.title
		}
	}
	return ""
}

// detail finds out unit, suffixes and what empty cells mean.
func (d *draft) detail(f *field) {
	t := f.table
	i := slices.IndexFunc(t.titles, func(s string) bool {
		_, pattern := withoutNumber(s)
		return s == f.title || pattern == f.title
	})
	if i < 0 || f.role == schemas.RoleUnused {
		f.unit = ""
		return
	}
	b := d.behaviour(d.column(t, i))
	if f.unit == "" && f.format == "" {
		d.guessUnit(f, b)
	}
	if b.suffix != "" && f.role != schemas.RoleNumber && f.role != schemas.RoleRun && f.role != schemas.RoleStatus && f.role != schemas.RoleRemark && f.format == "" {
		f.suffixes = []string{b.suffix}
	}
	if f.role == schemas.RoleStatus {
		f.values = texts(d.column(t, i))
		d.unsure("%s: say in values what each text means; all are taken for readings", f.title)
	}
	missing := b.filled < b.all && d.layout != schemas.Wide
	switch {
	case missing && f.role.IsVolume():
		f.empty = schemas.EmptySame
		d.unsure("%s: empty cells are taken for no titrant since the row above", f.title)
	case missing && f.role.IsReading():
		f.empty = schemas.EmptySkip
		d.unsure("%s: rows without it are taken for no readings", f.title)
	}
	if f.role == schemas.RoleVolume && d.layout != schemas.Long && b.falling > 0 && b.falling <= 3 && b.high > 2 {
		d.unsure("%s falls in %d places; state refills = true when the burette was filled there", f.title, b.falling)
	}
	d.wideShared(f, t)
}

// wideShared: a column that stands once beside others that stand several times
// belongs to every run.
func (d *draft) wideShared(f *field, t *table) {
	if d.layout != schemas.Wide || strings.Contains(f.title, schemas.Numbered) {
		return
	}
	n := 0
	for _, title := range t.titles {
		if title == f.title {
			n++
		}
	}
	f.shared = n == 1
}

func texts(list []string) []string {
	var all []string
	for _, s := range list {
		if s != "" && !slices.Contains(all, s) && len(all) < 20 {
			all = append(all, s)
		}
	}
	slices.Sort(all)
	return all
}

// guessUnit finds the unit that no title states: from the text behind the
// numbers, else from their size.
func (d *draft) guessUnit(f *field, b behaviour) {
	if unit := unitNamed(b.suffix); unit != "" {
		f.unit = unit
		return
	}
	why := "its numbers"
	switch f.role {
	case schemas.RoleVolume, schemas.RoleIncrement:
		switch f.unit = "mL"; {
		case b.high > 250:
			f.unit = "uL"
		case b.high < 0.1:
			f.unit = "L"
		}
	case schemas.RolePotential:
		if f.unit = "mV"; max(math.Abs(b.low), math.Abs(b.high)) < 2.5 && b.decimals {
			f.unit = "V"
		}
	case schemas.RoleConductivity:
		if f.unit = "mS/cm"; b.high > 200 {
			f.unit = "uS/cm"
		}
	case schemas.RoleConductance:
		f.unit = "mS"
	case schemas.RoleTime:
		f.unit = "s"
	case schemas.RoleTemperature:
		if f.unit = "Cel"; b.low > 200 {
			f.unit = "K"
		}
	case schemas.RoleDrift:
		f.unit = "mV/min"
	default:
		return
	}
	d.unsure("unit of %q: %s by the size of %s, from %v to %v", f.title, f.unit, why, b.low, b.high)
}

// clockOf is the format of a column of clock times, "" when it is none.
func clockOf(list []string) string {
	for _, format := range []string{"%H:%M:%S", "%H:%M:%S.%f", "%M:%S", "%H:%M", "%I:%M:%S %p", "%Y-%m-%d %H:%M:%S", "%d.%m.%Y %H:%M:%S"} {
		if allClock(list, format) {
			return format
		}
	}
	return ""
}
