package draft

import (
	"bytes"
	"fmt"
	"path"
	"slices"
	"strings"

	"lastdrop/schemas"
)

// write makes the TOML of the draft.
func (d *draft) write() []byte {
	var b bytes.Buffer
	b.WriteString("# A draft made from " + oneLine(path.Base(strings.ReplaceAll(d.name, `\`, "/"))) + ". Read it before you use it.\n")
	for _, c := range d.report.Choices {
		fmt.Fprintf(&b, "#   %s: %s (%s)", c.What, oneLine(c.Chosen), oneLine(c.Why))
		if c.RunnerUp != "" {
			fmt.Fprintf(&b, "; next to it %s", oneLine(c.RunnerUp))
		}
		b.WriteString("\n")
	}
	if len(d.report.Unsure) > 0 {
		b.WriteString("# To be checked:\n")
		for _, s := range d.report.Unsure {
			b.WriteString("#   " + oneLine(s) + "\n")
		}
	}
	b.WriteString("# What each key means is documented in language.md.\n\n")
	fmt.Fprintf(&b, "name   = %s                 # give it a name of its own\nlayout = %s\n", quoted(schemaName(d.name)), quoted(string(d.layout)))
	d.writeDialect(&b)
	d.writeEvidence(&b)
	d.writeParts(&b)
	for i := range d.fields {
		d.fields[i].write(&b)
	}
	for i := range d.facts {
		d.facts[i].write(&b, nil)
	}
	for i := range d.ends {
		d.ends[i].write(&b, d.kindLines())
	}
	return b.Bytes()
}

func (d *draft) writeDialect(b *bytes.Buffer) {
	fmt.Fprintf(b, "\n[dialect]\nencoding    = %s\ndelimiter   = %s\ndecimalChar = %s\n", quoted(string(d.encoding)), quoted(string(rune(d.dialect.Delimiter))), quoted(string(rune(d.dialect.DecimalChar))))
	if d.dialect.CommentChar != 0 {
		fmt.Fprintf(b, "commentChar = %s\n", quoted(string(rune(d.dialect.CommentChar))))
	}
	if d.dialect.GroupChar != "" {
		fmt.Fprintf(b, "groupChar   = %s\n", quoted(d.dialect.GroupChar))
	}
	if d.rows != nil {
		b.WriteString("headerRows  = [1, 2]                  # names and units\n")
	}
}

func (d *draft) writeEvidence(b *bytes.Buffer) {
	b.WriteString("\n[recognise]\nheader = true                         # volume and reading, by the titles below\n")
	if d.firstLn != "" {
		fmt.Fprintf(b, "firstLineBegins = %s\n", quoted(d.firstLn))
	}
	if d.evidence != nil {
		fmt.Fprintf(b, "lines = %s             # each begins a line of every dump\n", list(d.evidence))
	}
}

// writeParts writes preamble, stack, wide and footer.
func (d *draft) writeParts(b *bytes.Buffer) {
	if d.preamble != schemas.NoPreamble {
		fmt.Fprintf(b, "\n[preamble]\nlines = %s\n", quoted(string(d.preamble)))
		if d.preamble != schemas.CellLines {
			fmt.Fprintf(b, "separator = %s\n", quoted(string(rune(d.sep))))
		}
	}
	if d.layout == schemas.Stacked {
		b.WriteString("\n[stack]\n")
		if d.stack.Blank {
			b.WriteString("blank = true                          # a blank line ends a run\n")
		} else {
			fmt.Fprintf(b, "begin = %s\n", quoted(d.stack.Begin))
		}
		if d.stack.End != "" {
			fmt.Fprintf(b, "end   = %s\n", quoted(d.stack.End))
		}
	}
	if d.wide != nil {
		fmt.Fprintf(b, "\n[wide]\ntitles = %s              # of the rows above the header\n", list(d.wide))
	}
	f := &d.footer
	if f.Lines == schemas.NoPreamble && f.Titles == nil {
		return
	}
	b.WriteString("\n[footer]\n")
	if f.Blank {
		b.WriteString("blank = true\n")
	} else if f.Begin != "" {
		fmt.Fprintf(b, "begin = %s\n", quoted(f.Begin))
	}
	if f.Lines != schemas.NoPreamble {
		fmt.Fprintf(b, "lines = %s\n", quoted(string(f.Lines)))
	} else {
		fmt.Fprintf(b, "row = %s\ntitles = %s\n", quoted(f.Row), list(f.Titles))
	}
}

// write writes one column.
func (f *field) write(b *bytes.Buffer) {
	fmt.Fprintf(b, "\n[[fields]]\nname   = %s%s# %s\ntitles = [%s]\n", quoted(string(f.role)), strings.Repeat(" ", max(1, 27-len(f.role))), oneLine(f.why), quoted(f.title))
	if f.unit != "" && f.role != schemas.RoleNumber && f.role != schemas.RoleRun && f.role != schemas.RoleStatus && f.role != schemas.RoleRemark {
		fmt.Fprintf(b, "unit   = %s\n", quoted(f.unit))
	}
	if f.format != "" {
		fmt.Fprintf(b, "format = %s\n", quoted(f.format))
	}
	if f.suffixes != nil {
		fmt.Fprintf(b, "suffixes = %s\n", list(f.suffixes))
	}
	if f.empty != "" {
		fmt.Fprintf(b, "empty  = %s\n", quoted(string(f.empty)))
	}
	if f.shared {
		b.WriteString("shared = true                         # it belongs to every run\n")
	}
	if f.role == schemas.RoleStatus {
		b.WriteString("# reading, timed-out or skip: say what each text means\nvalues = { ")
		for i, v := range f.values {
			if i > 0 {
				b.WriteString(", ")
			}
			fmt.Fprintf(b, "%s = \"reading\"", quoted(v))
		}
		b.WriteString(" }\n")
	}
}

// kindLines are the keys about the kind of an endpoint.
func (d *draft) kindLines() []string {
	switch {
	case d.kindKey == "":
		return nil
	case d.kindTexts == nil:
		return []string{"kind   = " + quoted(d.kindKey)}
	}
	var pairs []string
	for _, text := range d.kindTexts {
		if means := kindWords[strings.ToLower(text)]; means != "" {
			pairs = append(pairs, quoted(text)+" = "+quoted(means))
		}
	}
	return []string{"kindTitles = [" + quoted(d.kindKey) + "]", "kindValues = { " + strings.Join(pairs, ", ") + " }"}
}

// write writes one fact, as a comment when it is not mapped.
func (f *fact) write(b *bytes.Buffer, more []string) {
	var lines []string
	table := "[[facts]]"
	if f.name == "indicated" {
		table = "[[indicated]]"
	} else {
		lines = append(lines, "name   = "+quoted(f.name))
	}
	lines = append(lines, "titles = ["+quoted(f.key)+"]")
	if f.unit != "" && (usualUnit(f) != "" || f.name == "indicated") {
		lines = append(lines, "unit   = "+quoted(f.unit))
	}
	if f.suffix != "" {
		lines = append(lines, "suffixes = "+list([]string{f.suffix}))
	}
	if f.format != "" {
		lines = append(lines, "format = "+quoted(f.format))
	}
	if f.out != "" {
		for _, format := range f.formats {
			if format != "" {
				lines = append(lines, "format = "+quoted(format))
			}
		}
	}
	lines = append(lines, more...)
	comment := ""
	b.WriteString("\n")
	if f.out != "" {
		comment = "# "
		fmt.Fprintf(b, "# Not mapped: %s.\n", oneLine(f.out))
	}
	b.WriteString(comment + table + "\n")
	for _, l := range lines {
		b.WriteString(comment + l + "\n")
	}
}

// schemaName makes a name of a schema of a dump's path.
func schemaName(name string) string {
	base := path.Base(strings.ReplaceAll(name, `\`, "/"))
	base = strings.TrimSuffix(base, path.Ext(base))
	mapped := strings.Map(func(r rune) rune {
		switch {
		case r >= 'a' && r <= 'z', r >= '0' && r <= '9', r == '-':
			return r
		case r >= 'A' && r <= 'Z':
			return r + 'a' - 'A'
		}
		return '-'
	}, base)
	if mapped = strings.Trim(mapped, "-"); mapped == "" {
		return "new"
	}
	return "new-" + mapped
}

// quoted writes a text as TOML has it.
func quoted(s string) string {
	var b strings.Builder
	b.WriteByte('"')
	for _, r := range s {
		switch {
		case r == '"' || r == '\\':
			b.WriteByte('\\')
			b.WriteRune(r)
		case r == '\t':
			b.WriteString(`\t`)
		case r < ' ' || r == 0x7f:
			fmt.Fprintf(&b, `\u%04X`, r)
		default:
			b.WriteRune(r)
		}
	}
	b.WriteByte('"')
	return b.String()
}

func list(texts []string) string {
	all := make([]string, len(texts))
	for i, s := range texts {
		all[i] = quoted(s)
	}
	return "[" + strings.Join(slices.Clip(all), ", ") + "]"
}

// oneLine makes text safe in a comment.
func oneLine(s string) string {
	return strings.Map(func(r rune) rune {
		if r < ' ' && r != '\t' || r == 0x7f {
			return '\ufffd'
		}
		return r
	}, s)
}
