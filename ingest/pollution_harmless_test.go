package ingest_test

import (
	"fmt"
	"slices"
	"strings"
)

// harmless leaves the information as it is.
func (p *polluter) harmless() {
	d := &p.schema.Dialect
	delimiter, blank := string(rune(d.Delimiter)), p.schema.Stack.Blank || p.schema.Footer.Blank
	each := func(kind, what string, f func(i int, line string) string) {
		lines := slices.Clone(p.body)
		for i := range lines {
			if i < len(lines)-1 || lines[i] != "" {
				lines[i] = f(i, lines[i])
			}
		}
		p.lines(kind, what, lines, intact)
	}
	each("trailing delimiters", "everywhere", func(_ int, line string) string { return line + delimiter })
	each("trailing delimiters", "three everywhere", func(_ int, line string) string { return line + delimiter + delimiter + delimiter })
	each("trailing delimiters", "rows and header", func(i int, line string) string {
		if i >= p.head {
			return line + delimiter
		}
		return line
	})
	each("trailing blanks", "everywhere", func(_ int, line string) string {
		if d.Delimiter == ' ' || line == "" {
			return line
		}
		return line + "  "
	})
	if d.Delimiter != ' ' {
		each("blanks around cells", "in the rows", func(i int, line string) string {
			if p.rows[i] && !strings.ContainsAny(line, `"\`) {
				return " " + strings.ReplaceAll(line, delimiter, " "+delimiter+" ") + " "
			}
			return line
		})
	}
	if d.QuoteChar != 0 {
		q := string(rune(d.QuoteChar))
		each("quotes around cells", "in the rows", func(i int, line string) string {
			if p.rows[i] && !strings.ContainsAny(line, q+`\`) {
				return q + strings.ReplaceAll(line, delimiter, q+delimiter+q) + q
			}
			return line
		})
	}
	p.lines("blank lines", "at the end", append(slices.Clone(p.body), "", ""), intact)
	p.lines("blank lines", "at the begin", append([]string{"", ""}, p.body...), intact)
	for i := range p.body {
		if !p.thin(5) || blank && !p.rows[i] && i != 0 {
			continue
		}
		p.lines("blank lines", fmt.Sprintf("before line %d", i+1), slices.Insert(slices.Clone(p.body), i, ""), intact)
		if c := d.CommentChar; c != 0 && i > 0 {
			p.lines("comments", fmt.Sprintf("before line %d", i+1), slices.Insert(slices.Clone(p.body), i, string(rune(c))+" looked at by hand"), intact)
		}
	}
	if p.schema.KeepUnterminated {
		p.text("final line end", "put behind", strings.TrimSuffix(p.clean.text, p.eol)+p.eol, intact)
	}
}
