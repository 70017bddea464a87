package ingest_test

import (
	"fmt"
	"slices"
	"strings"

	"lastdrop/schemas"
)

// lineDamage cuts, merges, doubles and loses lines.
func (p *polluter) lineDamage() {
	for i, line := range p.body {
		if line == "" || !p.thin(3) {
			continue
		}
		what := fmt.Sprintf("line %d", i+1)
		var more []func(*pollution)
		if !p.rows[i] && i != p.head || p.rows[i] && (!p.counts() || !p.states(schemas.FactReadings) && (!p.rows[i-1] || !p.rows[i+1])) {
			more = append(more, isApart)
		}
		p.lines("line lost", what, slices.Delete(slices.Clone(p.body), i, i+1), more...)
		if p.rows[i] && p.runs[0].TimesS != nil {
			more = nil // the time stands still
		}
		p.lines("line doubled", what, slices.Insert(slices.Clone(p.body), i, line), more...)
		if i+1 < len(p.body) {
			p.lines("lines merged", what, slices.Delete(p.with(i, line+p.body[i+1]), i+1, i+2))
		}
		runes := []rune(line)
		for range min(3, len(runes)-1) {
			n := 1 + p.rng.IntN(len(runes)-1)
			p.lines("line cut", fmt.Sprintf("%s after %d characters", what, n), p.with(i, string(runes[:n])), cut)
		}
	}
}

// rowDamage breaks rows of the table and joins parts of two.
func (p *polluter) rowDamage() {
	delimiter := string(rune(p.schema.Dialect.Delimiter))
	for i, line := range p.body {
		if !p.rows[i] || !p.rows[i+1] || !p.thin(3) {
			continue
		}
		parts := strings.Split(line, delimiter)
		n := 1 + p.rng.IntN(len(parts)-1)
		head, tail := strings.Join(parts[:n], delimiter), strings.Join(parts[n:], delimiter)
		p.lines("row broken", fmt.Sprintf("line %d behind cell %d", i+1, n), slices.Replace(slices.Clone(p.body), i, i+1, head, tail))
		p.lines("rows merged", fmt.Sprintf("lines %d and %d", i+1, i+2), slices.Replace(slices.Clone(p.body), i, i+2, line+delimiter+p.body[i+1]))
	}
}

// headerDamage loses and doubles the header, and each part of it.
func (p *polluter) headerDamage() {
	n := p.firstRow() - p.head
	header := p.body[p.head : p.head+n]
	p.lines("header lost", "all of it", slices.Delete(slices.Clone(p.body), p.head, p.head+n))
	p.lines("header doubled", "all of it", slices.Insert(slices.Clone(p.body), p.head, header...), p.repeated)
	for i := range p.body {
		if p.rows[i] && p.thin(10) {
			p.lines("header doubled", fmt.Sprintf("before line %d", i+1), slices.Insert(slices.Clone(p.body), i, header...), p.repeated)
		}
	}
	for i := range n {
		for _, one := range [][]string{slices.Delete(slices.Clone(p.body), p.head+i, p.head+i+1), slices.Insert(slices.Clone(p.body), p.head+i, p.body[p.head+i])} {
			p.lines("header row lost or doubled", fmt.Sprintf("line %d", p.head+i+1), one)
		}
	}
}

func (p *polluter) repeated(one *pollution) { one.intact = p.schema.RepeatedHeader }

func (p *polluter) firstRow() int {
	for i := range p.body {
		if p.rows[i] {
			return i
		}
	}
	return len(p.body)
}

// decimalMarks swaps the decimal mark in one number and in all.
func (p *polluter) decimalMarks() {
	own, other := string(rune(p.schema.Dialect.DecimalChar)), ","
	if own == "," {
		other = "."
	}
	swap := func(kind, what string, keep func(line, at int) bool, more ...func(*pollution)) {
		lines := slices.Clone(p.body)
		for i := range lines {
			b := []byte(lines[i])
			for j := 1; j+1 < len(b); j++ {
				if string(b[j]) == own && b[j-1]-'0' < 10 && b[j+1]-'0' < 10 && keep(i, j) {
					b[j] = other[0]
				}
			}
			lines[i] = string(b)
		}
		if !slices.Equal(lines, p.body) {
			p.lines(kind, what, lines, more...)
		}
	}
	swap("decimal mark, all", "everywhere", func(int, int) bool { return true })
	swap("decimal mark, all", "in the table", func(i, _ int) bool { return p.rows[i] })
	for i := range p.body {
		for j := range p.body[i] {
			if string(p.body[i][j]) == own && p.thin(10) {
				var more []func(*pollution)
				if !p.rows[i] && other[0] != p.schema.Dialect.Delimiter {
					more = append(more, structural) // in a text nobody can see it, in a number anybody
				}
				swap("decimal mark, one", fmt.Sprintf("line %d byte %d", i+1, j+1), func(line, at int) bool { return line == i && at == j }, more...)
			}
		}
	}
}

// columnDamage swaps two columns, with their header and under it. Under it a
// well-formed table is left, in which only implausible numbers can show it.
func (p *polluter) columnDamage() {
	delimiter := string(rune(p.schema.Dialect.Delimiter))
	width := len(strings.Split(p.body[p.head], delimiter))
	for i := range p.body {
		if p.rows[i] && len(strings.Split(p.body[i], delimiter)) != width {
			return // delimiters within cells: the rows cannot be cut like this
		}
	}
	swapped := func(a, b int, in func(i int) bool) []string {
		lines := slices.Clone(p.body)
		for i := range lines {
			cells := strings.Split(lines[i], delimiter)
			if in(i) && len(cells) == width {
				cells[a], cells[b] = cells[b], cells[a]
				lines[i] = strings.Join(cells, delimiter)
			}
		}
		return lines
	}
	for a := range width {
		for b := a + 1; b < width; b++ {
			what := fmt.Sprintf("columns %d and %d", a+1, b+1)
			var more []func(*pollution)
			if p.schema.Layout == schemas.Wide {
				more = append(more, isApart) // the order of columns parts the runs
			}
			p.lines("columns swapped", what, swapped(a, b, func(i int) bool { return i >= p.head }), more...)
			if lines := swapped(a, b, func(i int) bool { return p.rows[i] }); !slices.Equal(lines, p.body) {
				p.lines("columns swapped under the header", what, lines, isApart)
			}
		}
	}
}

// secondTables append the dump, its table and a foreign one.
func (p *polluter) secondTables() {
	whole := strings.TrimSuffix(p.clean.text, p.eol) + p.eol
	table := strings.Join(p.body[p.head:], p.eol)
	rows := strings.Join(p.body[p.firstRow():], p.eol)
	for i, more := range []string{whole, p.eol + whole, table, p.eol + table, rows, p.eol + p.eol + rows,
		"Summary" + p.eol + "mean;3,21" + p.eol, p.eol + "volume_mL,pH" + p.eol + "0,3" + p.eol + "1,4" + p.eol,
		p.eol + strings.ReplaceAll("a;b;c#1;2;3#4;5;6#", "#", p.eol)} {
		var seen []func(*pollution)
		if i == 3 && p.schema.Stack.Blank {
			seen = append(seen, isApart) // a run without facts is one
		}
		p.text("second table", fmt.Sprintf("number %d", i+1), whole+more, seen...)
	}
}
