package draft

import (
	"fmt"
	"slices"
	"strings"

	"lastdrop/schemas"
)

// block is a run of lines, as indices, that are rows of numbers of one width.
type block struct{ from, to int }

// minRows is how many rows make a table: as many as make a curve.
const minRows = 5

// find returns the blocks of a trial.
func (t *trial) find() []block {
	var list []block
	at := -1 // first line of the block at hand
	last := -1
	width := 0
	end := func() {
		if at >= 0 && last+1-at >= minRows {
			list = append(list, block{at, last + 1})
		}
		at = -1
	}
	for i := range t.lines {
		l := &t.lines[i]
		if l.comment || l.blank() && at >= 0 && i+1 < len(t.lines) && t.numeric(&t.lines[i+1]) && len(t.lines[i+1].cells) == width {
			continue
		}
		if !t.numeric(l) {
			end()
			continue
		}
		if at >= 0 && len(l.cells) != width {
			end()
		}
		if at < 0 {
			at, width = i, len(l.cells)
		}
		last = i
	}
	end()
	return list
}

// numeric reports whether a line is a row of numbers: two cells at least, half
// of those that are not empty numbers.
func (t *trial) numeric(l *line) bool {
	if l.comment || l.faulty || len(l.cells) < 2 {
		return false
	}
	numbers, filled := 0, 0
	for _, c := range l.cells {
		if c == "" {
			continue
		}
		filled++
		if _, ok := t.number(c); ok {
			numbers++
		}
	}
	return numbers > 0 && 2*numbers >= filled && (numbers > 1 || filled < len(l.cells))
}

// table is one table of the dump.
type table struct {
	block
	header int // index of its first header line
	titles []string
}

// findTables gives each block its header and keeps those with the header of
// the longest.
func (d *draft) findTables(blocks []block) bool {
	var all []table
	longest := -1
	for _, b := range blocks {
		t, ok := d.headed(b)
		if !ok {
			continue
		}
		all = append(all, t)
		if longest < 0 || b.to-b.from > all[longest].to-all[longest].from {
			longest = len(all) - 1
		}
	}
	if longest < 0 {
		return false
	}
	for _, t := range all {
		if alike(t.titles, all[longest].titles) {
			d.tables = append(d.tables, t)
		}
	}
	if len(d.tables) < len(all) {
		d.unsure("%d more tables have other headers and are not read", len(all)-len(d.tables))
	}
	t := &d.tables[0]
	d.choose("header", fmt.Sprintf("line %d", d.lines[t.header].number), fmt.Sprintf("the row above %d rows of numbers", t.to-t.from), "")
	if len(d.rows) > 1 {
		d.choose("header rows", fmt.Sprint(d.rows), "a row of units stands below the names", "")
	}
	return true
}

// alike reports whether two headers are of one instrument: as wide, and half of
// their titles the same.
func alike(a, b []string) bool {
	if len(a) != len(b) {
		return false
	}
	same := 0
	for i := range a {
		if a[i] == b[i] {
			same++
		}
	}
	return 2*same >= len(a)
}

// headed finds the header of a block: the row above it, and one more when that
// row has units.
func (d *draft) headed(b block) (table, bool) {
	i := b.from - 1
	for i >= 0 && (d.lines[i].blank() || d.lines[i].comment) {
		i--
	}
	if i < 0 {
		return table{}, false
	}
	width := len(d.lines[b.from].cells)
	if !d.titled(&d.lines[i], width) {
		return table{}, false
	}
	t := table{block: b, header: i, titles: trimmed(d.lines[i].cells)}
	if i > 0 && isUnits(t.titles) && d.titled(&d.lines[i-1], width) {
		names := trimmed(d.lines[i-1].cells)
		t.header, d.rows = i-1, []int{1, 2}
		t.titles = joined(names, t.titles)
	}
	return t, true
}

// titled reports whether a line can be a header of so many columns.
func (d *draft) titled(l *line, width int) bool {
	n := len(trimmed(l.cells))
	if l.comment || l.faulty || n < 2 || n > width {
		return false
	}
	for _, c := range l.cells {
		if _, ok := numberOf(c, &d.dialect); ok && c != "" {
			return false
		}
	}
	return true
}

func trimmed(cells []string) []string {
	for len(cells) > 0 && cells[len(cells)-1] == "" {
		cells = cells[:len(cells)-1]
	}
	return cells
}

func isUnits(titles []string) bool {
	units := 0
	for _, s := range titles {
		if s == "" || strings.Trim(s, "-=") == "" {
			continue
		}
		if unitNamed(strings.Trim(s, "[]() ")) == "" {
			return false
		}
		units++
	}
	return units > 0
}

func joined(names, units []string) []string {
	var list []string
	for i := range max(len(names), len(units)) {
		a, b := "", ""
		if i < len(names) {
			a = names[i]
		}
		if i < len(units) {
			b = units[i]
		}
		switch {
		case a == "" || b == "":
			list = append(list, a+b)
		default:
			list = append(list, a+" "+b)
		}
	}
	return list
}

// column returns the cells of one column of a table.
func (d *draft) column(t *table, i int) []string {
	var list []string
	for _, l := range d.lines[t.from:t.to] {
		if !l.comment && !l.blank() && i < len(l.cells) {
			list = append(list, l.cells[i])
		}
	}
	return list
}

// findLayout tells the four layouts apart.
func (d *draft) findLayout() {
	t := &d.tables[0]
	switch {
	case len(d.tables) > 1:
		d.layout = schemas.Stacked
		d.findMarks()
		d.choose("layout", "stacked", fmt.Sprintf("the header stands %d times", len(d.tables)), "")
	case d.isWide(t):
		d.layout = schemas.Wide
		d.choose("layout", "wide", "the header has the volume or the reading several times", "single")
	case d.runColumn(t) >= 0:
		d.layout = schemas.Long
		d.choose("layout", "long", fmt.Sprintf("column %q changes where the volume begins anew", t.titles[d.runColumn(t)]), "single")
	default:
		d.layout = schemas.Single
		d.choose("layout", "single", "one table, one header", "")
	}
}

// findMarks finds what begins and ends a run in a stacked dump.
func (d *draft) findMarks() {
	first := func(from, to int) []string { // first cells of the lines that are not blank
		var list []string
		for _, l := range d.lines[from:to] {
			if !l.blank() && !l.comment && len(l.cells) > 0 {
				list = append(list, l.cells[0])
			}
		}
		return list
	}
	var gaps [][]string
	for i := 1; i < len(d.tables); i++ {
		gaps = append(gaps, first(d.tables[i-1].to, d.tables[i].header))
	}
	head, tail := first(0, d.tables[0].header), first(d.tables[len(d.tables)-1].to, len(d.lines))
	everywhere := func(s string, more []string) bool {
		return s != "" && slices.Contains(more, s) && !slices.ContainsFunc(gaps, func(g []string) bool { return !slices.Contains(g, s) })
	}
	if len(gaps[0]) > 0 && everywhere(gaps[0][0], tail) {
		d.stack.End = gaps[0][0]
	}
	for _, s := range gaps[0] {
		if s != d.stack.End && everywhere(s, head) {
			d.stack.Begin = s
			break
		}
	}
	if d.stack.Begin != "" {
		d.choose("beginning of a run", fmt.Sprintf("%q", d.stack.Begin), "it stands above every table", "a blank line")
		return
	}
	d.stack = schemas.Stack{Blank: true}
	d.choose("end of a run", "a blank line", "no line stands above every table", "")
	if d.lines[d.tables[0].to-1].number+1 == d.lines[d.tables[1].header].number {
		d.unsure("stack: nothing stands between the runs; a damaged dump cannot be noticed")
	}
}

// isWide reports whether the header has a volume or reading several times.
func (d *draft) isWide(t *table) bool {
	seen := map[string]int{}
	for _, title := range t.titles {
		name, _ := withoutNumber(title)
		role, _ := roleNamed(name)
		if role.IsReading() || role.IsVolume() {
			seen[strings.ToLower(name)]++
		}
	}
	for _, n := range seen {
		if n > 1 {
			return true
		}
	}
	return false
}

// runColumn is the column that names the runs of one table, -1 for none: its
// text changes exactly where a rising column falls.
func (d *draft) runColumn(t *table) int {
	for i := range t.titles {
		names := d.column(t, i)
		changes := changesOf(names)
		if len(changes) == 0 || len(changes) > len(names)/minRows {
			continue
		}
		for j := range t.titles {
			if j != i && slices.Equal(d.falls(t, j), changes) {
				return i
			}
		}
	}
	return -1
}

func changesOf(list []string) []int {
	var at []int
	for i := 1; i < len(list); i++ {
		if list[i] != list[i-1] {
			at = append(at, i)
		}
	}
	return at
}

// falls returns where a column of numbers falls, nil when it is none.
func (d *draft) falls(t *table, column int) []int {
	var at []int
	last := 0.0
	for i, c := range d.column(t, column) {
		v, ok := numberOf(c, &d.dialect)
		if !ok {
			return nil
		}
		if i > 0 && v < last {
			at = append(at, i)
		}
		last = v
	}
	return at
}
